"""Loads by departure, a page at a time."""

from dataclasses import dataclass
from datetime import datetime
from uuid import UUID

from django.db.models import Q
from django.db.models.fields.tuple_lookups import Tuple, TupleGreaterThan

from loads.queries.current import Current, current_of, loads_present

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
    rows = loads_present().filter(_wanted(operator, filters, after)).order_by("departure", "load_id")
    found = [current_of(one) for one in rows[: most + 1]]
    shown = tuple(found[:most])
    more = len(found) > most
    return Page(shown, Place(shown[-1].load.departure, shown[-1].load.id) if more else None)


def _wanted(operator: str, filters: Filters, after: Place | None) -> Q:
    wanted = Q(operator_id=operator)
    if filters.since is not None and (after is None or after.departure < filters.since):
        wanted &= Q(departure__gte=filters.since)
    if filters.until is not None:
        wanted &= Q(departure__lt=filters.until)
    if filters.aircraft:
        wanted &= Q(aircraft__registration=filters.aircraft.upper())
    if filters.reach is not None:
        wanted &= Q(aircraft__registration__in=filters.reach)
    if filters.state:
        wanted &= Q(state=filters.state)
    if filters.verdict:
        wanted &= Q(verdict=filters.verdict)
    if filters.reference:
        # The operator of the load is that of its line here; named, so that one index answers.
        wanted &= Q(load__operator_id=operator, load__reference=filters.reference)
    if after is not None:
        # Compared as one row, an index is entered there, and the database knows how much follows: said with
        # OR, and beside a beginning, it took what follows for a handful and looked for it another way.
        place = Tuple("departure", "load_id")
        wanted &= Q(TupleGreaterThan(place, (after.departure, after.load)))
    return wanted
