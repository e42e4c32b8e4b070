"""What an inspector asks first: the loads of one aircraft on one day, and whether any paper lacks."""

from dataclasses import dataclass
from datetime import datetime

from django.db import connection
from django.db.models import Exists, OuterRef, QuerySet

from fleet.models import Aircraft
from loads.models import Paper, Signature, Step
from loads.queries.answer import signatures_of
from loads.queries.current import Current, current_at, steps_with_their_loads
from records.models import Seal
from records.queries import seal_of

MOST_FLIGHTS = 200
# States of a load that never will need a manifest.
_GONE = ("superseded", "withdrawn")
_GAPS = """
SELECT number + 1, following - 1 FROM (
    SELECT number, lead(number) OVER (ORDER BY number) AS following
    FROM loads_paper WHERE operator_id = %s) held
WHERE following > number + 1 ORDER BY number LIMIT 20
"""


@dataclass(frozen=True, slots=True)
class Flown:
    """One load with its signatures, its manifest number and the seal of the acceptance, if it has one."""

    current: Current
    signatures: tuple[Signature, ...]
    paper: Paper | None
    seal: Seal | None


@dataclass(frozen=True, slots=True)
class Numbers:
    """The manifest numbers of an operator: how many, the first and last (None without any), how many are
    filed, and each gap as (first missing, last missing), which the database does not allow.
    """

    count: int
    first: int | None
    last: int | None
    filed: int
    gaps: tuple[tuple[int, int], ...]

    @property
    def unbroken(self) -> bool:
        """Whether the numbers run from 1 without a gap."""
        return not self.gaps and self.first in {None, 1} and self.count == (self.last or 0)


def loads_of_day(aircraft: Aircraft, since: datetime, until: datetime) -> tuple[Flown, ...]:
    """This function will return every load of the aircraft planned to depart from `since` to `until`, also
    those that were replaced or withdrawn.
    """
    rows = _last_steps(aircraft.operator_id).filter(
        load__aircraft=aircraft, load__departure__gte=since, load__departure__lt=until
    )
    return tuple(
        _flown(current_at(row)) for row in rows.order_by("load__departure", "load_id")[:MOST_FLIGHTS]
    )


def flights_without_manifest(operator: str, since: datetime, until: datetime) -> tuple[Current, ...]:
    """This function will return the loads planned to depart from `since` to `until` that have no manifest and
    were neither replaced nor withdrawn, the latest first.
    """
    rows = (
        _last_steps(operator)
        .filter(load__departure__gte=since, load__departure__lt=until, load__paper__isnull=True)
        .exclude(after__in=_GONE)
    )
    return tuple(current_at(row) for row in rows.order_by("-load__departure", "-load_id")[:MOST_FLIGHTS])


def numbers_of(operator: str) -> Numbers:
    """This function will count the manifest numbers of the operator and look for gaps."""
    with connection.cursor() as cursor:
        cursor.execute(
            "SELECT count(*), min(p.number), max(p.number), count(f.paper_id) FROM loads_paper p"
            " LEFT JOIN loads_filedpaper f ON f.paper_id = p.load_id WHERE p.operator_id = %s",
            [operator],
        )
        count, first, last, filed = cursor.fetchone()
        cursor.execute(_GAPS, [operator])
        gaps = tuple((low, high) for low, high in cursor.fetchall())
    return Numbers(count, first, last, filed, gaps)


def _last_steps(operator: str) -> "QuerySet[Step]":
    later = Step.objects.filter(load_id=OuterRef("load_id"), number__gt=OuterRef("number"))
    return steps_with_their_loads().filter(~Exists(later), operator_id=operator)


def _flown(current: Current) -> Flown:
    paper = Paper.objects.filter(load=current.load).select_related("filed").first()
    seal = seal_of(paper.act) if paper is not None else None
    return Flown(current, tuple(signatures_of(current.load)), paper, seal)
