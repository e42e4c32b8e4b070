"""The loads of one part of a recheck as they are stored: quickly for the bulk sums, in full for the rest."""

from collections.abc import Iterator, Mapping, Sequence
from datetime import datetime
from typing import Any, Final, NamedTuple
from uuid import UUID

from django.db import connection

AT_ONCE: Final = 500
# What a last-minute change made of a load is what was assessed, so its body counts.
_BODY: Final = "convert_from(coalesce(c.body, d.body), 'UTF8')"
_JOINED: Final = """
JOIN loads_assessment s ON s.id = p.assessment_id
JOIN loads_declaration d ON d.load_id = p.load_id
LEFT JOIN loads_latechange c ON s.number > 1 AND c.assessment_id = s.id
WHERE p.state NOT IN ('superseded', 'withdrawn')
"""
# What the bulk sums need of every load, and no more. Versions stay texts: they are compared, load by load.
BULK_COLUMNS: Final = (
    f"p.verdict, {_BODY}, p.departure::text, s.engine, p.aircraft_id::text, s.loading_basis_id::text, "
    "s.empty_weight_id::text, s.provisions::text"
)
BULK_ROWS: Final = f"FROM loads_present p {_JOINED}"
# The planner takes an array for a few rows, whatever it holds, so each is looked up by its number. Whole
# tables read for each part would cost with the square of all that is stored.
_PART: Final = f"""
FROM loads_recheckpart r
CROSS JOIN LATERAL unnest(r.loads) WITH ORDINALITY w (load_id, turn)
JOIN loads_present p ON p.load_id = w.load_id {_JOINED} AND r.id = %(part)s
"""
_FOR_BULK: Final = f"SELECT w.turn, {BULK_COLUMNS} {_PART}"
_IN_FULL: Final = f"""
SELECT w.turn, p.load_id, p.assessment_id, p.verdict, {_BODY}, p.aircraft_id, p.departure,
       s.loading_basis_id, s.empty_weight_id, s.provisions, s.assessed_at
{_PART} AND w.turn = ANY (%(turns)s) ORDER BY w.turn
"""


class Stored(NamedTuple):
    """A load as it is stored: its turn in its part, the verdict of the assessment in use, what was declared,
    and the versions and the instant it was assessed with.
    """

    turn: int
    load: UUID
    assessment: UUID
    verdict: str
    body: str
    aircraft: UUID
    departure: datetime
    loading_basis: UUID | None
    empty_weight: UUID | None
    provisions: Sequence[UUID]
    assessed: datetime


def rows_for_bulk(part: int) -> Iterator[tuple[Any, ...]]:
    """This function will yield the loads of a part in any order, but for those that were replaced or
    withdrawn: the turn, and `BULK_COLUMNS`.
    """
    return _read(_FOR_BULK, {"part": part})


def rows_in_full(part: int, turns: Sequence[int]) -> Iterator[Stored]:
    """This function will yield some loads of a part in their order, but for those gone meanwhile."""
    return map(Stored._make, _read(_IN_FULL, {"part": part, "turns": list(turns)}))


def _read(statement: str, values: Mapping[str, Any]) -> Iterator[tuple[Any, ...]]:
    """Yield the rows through a cursor of the server, a few hundred at a time, so that memory stays flat."""
    with connection.chunked_cursor() as cursor:
        cursor.execute(statement, values)
        while rows := cursor.fetchmany(AT_ONCE):
            yield from rows
