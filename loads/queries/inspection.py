"""What an inspector asks first: the loads of one aircraft on one day, and whether any paper lacks."""

from dataclasses import dataclass
from datetime import datetime

from django.db import connection

from fleet.models import Aircraft
from loads.models import Paper, Signature
from loads.queries.answer import signatures_of
from loads.queries.current import Current, current_of, loads_present
from records.models import Seal
from records.queries import seal_of

MOST_FLIGHTS = 200
# What has no manifest: the database lets no load be accepted, and so none depart, without its number, and the
# others were replaced or withdrawn.
_WITHOUT = ("open", "prepared", "loaded")
# Looked through one by one; that the older ones have no gap is held by the database (see `_HELD`).
NEWEST = 1000
_NUMBERS = """
SELECT (SELECT min(number) FROM loads_paper WHERE operator_id = %(operator)s), max(newest.number),
    count(*), count(f.paper_id)
FROM (SELECT load_id, number FROM loads_paper WHERE operator_id = %(operator)s
      ORDER BY number DESC LIMIT %(most)s) newest
LEFT JOIN loads_filedpaper f ON f.paper_id = newest.load_id
"""
_GAPS = """
SELECT number + 1, following - 1 FROM (
    SELECT number, lead(number) OVER (ORDER BY number) AS following
    FROM (SELECT number FROM loads_paper WHERE operator_id = %(operator)s
          ORDER BY number DESC LIMIT %(most)s) newest) held
WHERE following > number + 1 ORDER BY number LIMIT 20
"""
# Each number names the one before it, which is there, and none is taken twice.
_TIES = (
    "paper_follows_the_one_before", "paper_numbers_have_no_gaps", "paper_number_is_taken_once"
)  # fmt: skip
_HELD = """
SELECT count(*) FROM pg_constraint
WHERE conrelid = 'loads_paper'::regclass AND conname = ANY (%s) AND convalidated AND conenforced
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
    """The manifest numbers of an operator: the first and last (None without any); of the newest, how many
    were looked at and how many of these are filed, and each gap among them as (first missing, last missing),
    which the database does not allow. `held` tells whether the ties that hold all of them stand.
    """

    first: int | None
    last: int | None
    newest: int
    filed: int
    gaps: tuple[tuple[int, int], ...]
    held: bool

    @property
    def unbroken(self) -> bool:
        """Whether the numbers run from 1 without a gap."""
        return self.held and not self.gaps and self.first in {None, 1}


def loads_of_day(aircraft: Aircraft, since: datetime, until: datetime) -> tuple[Flown, ...]:
    """This function will return every load of the aircraft planned to depart from `since` to `until`, also
    those that were replaced or withdrawn.
    """
    rows = (
        loads_present()
        .select_related("assessment__loading_basis", "assessment__empty_weight")
        .defer("assessment__loading_basis__document", "assessment__empty_weight__document")
        .filter(
            operator_id=aircraft.operator_id, aircraft=aircraft, departure__gte=since, departure__lt=until
        )
    )
    return tuple(_flown(current_of(row)) for row in rows.order_by("departure", "load_id")[:MOST_FLIGHTS])


def flights_without_manifest(operator: str, since: datetime, until: datetime) -> tuple[Current, ...]:
    """This function will return the loads planned to depart from `since` to `until` that have no manifest and
    were neither replaced nor withdrawn, the latest first.
    """
    rows = loads_present().filter(
        operator_id=operator, state__in=_WITHOUT, departure__gte=since, departure__lt=until
    )
    return tuple(current_of(row) for row in rows.order_by("-departure", "-load_id")[:MOST_FLIGHTS])


def numbers_of(operator: str) -> Numbers:
    """This function will return the manifest numbers of the operator and look for gaps in the newest."""
    asked: dict[str, str | int] = {"operator": operator, "most": NEWEST}
    with connection.cursor() as cursor:
        cursor.execute(_NUMBERS, asked)
        first, last, newest, filed = cursor.fetchone()
        cursor.execute(_GAPS, asked)
        gaps = tuple((low, high) for low, high in cursor.fetchall())
        cursor.execute(_HELD, [list(_TIES)])
        held = cursor.fetchone() == (len(_TIES),)
    return Numbers(first, last, newest, filed, gaps, held)


def _flown(current: Current) -> Flown:
    paper = Paper.objects.filter(load=current.load).select_related("filed").first()
    seal = seal_of(paper.act) if paper is not None else None
    return Flown(current, tuple(signatures_of(current.load)), paper, seal)
