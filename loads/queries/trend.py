"""How often loads were rejected, by aircraft and limit, week by week."""

from dataclasses import dataclass
from datetime import datetime, timedelta
from typing import Final

from django.db import connection

# Of a load assessed several times the first rejected assessment counts, once for each limit that was broken
# or could not be checked.
_REJECTED: Final = """
SELECT c.registration, p.load_id, p.departure, broken ->> 'code', broken ->> 'title', broken ->> 'result'
FROM loads_present p
JOIN fleet_aircraft c ON c.id = p.aircraft_id
JOIN LATERAL (SELECT a.result FROM loads_assessment a
              WHERE a.load_id = p.load_id AND a.verdict IN ('outside', 'unresolved')
              ORDER BY a.number LIMIT 1) r ON true
LEFT JOIN LATERAL jsonb_path_query(
    r.result::jsonb, '$.checks[*] ? (@.result == "fail" || @.result == "unresolved")') broken ON true
WHERE p.operator_id = %s AND p.rejected AND p.departure >= %s AND p.departure < %s
ORDER BY p.departure, p.load_id
"""
_SUBMITTED: Final = """
SELECT c.registration, count(*) FROM loads_present p JOIN fleet_aircraft c ON c.id = p.aircraft_id
WHERE p.operator_id = %s AND p.departure >= %s AND p.departure < %s GROUP BY c.registration
"""
WEEK: Final = timedelta(days=7)


@dataclass(frozen=True, slots=True)
class LimitTrend:
    """One limit of one aircraft: how many loads it stopped, and the last such departure."""

    registration: str
    code: str
    title: str
    result: str
    loads: int
    last: datetime


@dataclass(frozen=True, slots=True)
class AircraftTrend:
    """One aircraft: loads declared, loads rejected, and rejected by week, the oldest week first."""

    registration: str
    declared: int
    rejected: int
    weeks: tuple[int, ...]


@dataclass(frozen=True, slots=True)
class Trend:
    """Departures from `since` to `until`; weeks of seven days, the last one ends at `until`."""

    since: datetime
    until: datetime
    aircraft: tuple[AircraftTrend, ...]
    limits: tuple[LimitTrend, ...]


def reject_trend(operator: str, since: datetime, until: datetime) -> Trend:
    """This function will count rejected loads that depart from `since` to `until`, by aircraft and limit.

    A revision is a load of its own: a flight rejected twice counts twice.
    """
    with connection.cursor() as cursor:
        cursor.execute(_REJECTED, [operator, since, until])
        rows = cursor.fetchall()
        cursor.execute(_SUBMITTED, [operator, since, until])
        declared = dict(cursor.fetchall())
    loads = {(registration, load): departure for registration, load, departure, *_ in rows}
    return Trend(since, until, _by_aircraft(loads, declared, since, until), _by_limit(rows))


def _by_aircraft(
    loads: dict[tuple[str, object], datetime], declared: dict[str, int], since: datetime, until: datetime
) -> tuple[AircraftTrend, ...]:
    count = -((since - until) // WEEK)
    found = []
    for registration, total in declared.items():
        weeks = [0] * count
        for (of, _), departure in loads.items():
            if of == registration:
                weeks[count - 1 - (until - departure - timedelta(microseconds=1)) // WEEK] += 1
        found.append(AircraftTrend(registration, total, sum(weeks), tuple(weeks)))
    return tuple(sorted(found, key=lambda one: (-one.rejected, one.registration)))


def _by_limit(
    rows: list[tuple[str, object, datetime, str | None, str | None, str | None]],
) -> tuple[LimitTrend, ...]:
    found: dict[tuple[str, str, str], LimitTrend] = {}
    for registration, _, departure, code, title, result in rows:
        if code is None or title is None or result is None:
            continue
        before = found.get((registration, code, result))
        count = before.loads + 1 if before else 1
        found[registration, code, result] = LimitTrend(registration, code, title, result, count, departure)
    return tuple(sorted(found.values(), key=lambda one: (-one.loads, one.registration, one.code)))
