"""Loads by departure, a page at a time."""

from dataclasses import dataclass
from datetime import datetime
from uuid import UUID

from django.db.models import Exists, OuterRef, Q

from loads.models import Step
from loads.queries.current import Current, current_at, steps_with_their_loads

MOST_ROWS = 200


@dataclass(frozen=True, slots=True)
class Filters:
    """What to list: departures from `since` (included) to `until` (not included); None and "" leave a filter
    out.
    """

    since: datetime | None = None
    until: datetime | None = None
    aircraft: str = ""
    state: str = ""
    verdict: str = ""
    reference: str = ""
    reach: frozenset[str] | None = None  # the registrations somebody is limited to; None: to none


@dataclass(frozen=True, slots=True)
class Place:
    """The place in the list after which the next page begins: departure and number of the last load shown."""

    departure: datetime
    load: UUID


@dataclass(frozen=True, slots=True)
class Page:
    """Some loads in the order of departure, and where the next page begins, if there is one."""

    loads: tuple[Current, ...]
    after: Place | None


def list_loads(operator: str, filters: Filters, *, after: Place | None = None, most: int = 50) -> Page:
    """This function will return at most `most` loads of the operator, the earliest departure first."""
    later = Step.objects.filter(load_id=OuterRef("load_id"), number__gt=OuterRef("number"))
    rows = (
        steps_with_their_loads()
        .filter(_wanted(operator, filters, after), ~Exists(later))
        .order_by("load__departure", "load_id")[: most + 1]
    )
    found = [current_at(last) for last in rows]
    shown = tuple(found[:most])
    more = len(found) > most
    return Page(shown, Place(shown[-1].load.departure, shown[-1].load.id) if more else None)


def _wanted(operator: str, filters: Filters, after: Place | None) -> Q:
    wanted = Q(load__operator_id=operator)
    if filters.since is not None:
        wanted &= Q(load__departure__gte=filters.since)
    if filters.until is not None:
        wanted &= Q(load__departure__lt=filters.until)
    if filters.aircraft:
        wanted &= Q(load__aircraft__registration=filters.aircraft.upper())
    if filters.reach is not None:
        wanted &= Q(load__aircraft__registration__in=filters.reach)
    if filters.state:
        wanted &= Q(after=filters.state)
    if filters.verdict:
        wanted &= Q(assessment__verdict=filters.verdict)
    if filters.reference:
        wanted &= Q(load__reference=filters.reference)
    if after is not None:
        wanted &= Q(load__departure__gt=after.departure) | Q(
            load__departure=after.departure, load_id__gt=after.load
        )
    return wanted
