"""Checks of running sums: stations from the nose or from the tail, each with a maximum for all up to it.

nose --> station 1 | station 2 | station 3     at 3 the sum of what 1, 2 and 3 hold is limited
"""

from fractions import Fraction

from fleet.stations import Cumulative, CumulativeStep
from loads.balance.checks_places import Held
from loads.balance.margins import Figure, below
from loads.balance.prepared import Prepared
from loads.balance.result import Check, Json
from loads.balance.rounding import WEIGHT_PLACES, printed

Sum = tuple[
    CumulativeStep, Fraction | None
]  # a station, and what all stations up to it hold; None: not known


def running_checks(held: Held, ready: Prepared) -> list[Check]:
    """Return one check for each cumulative limit of which a station holds something.

    Every step of the sum is tried; the worst station stands in the check, and all of them in its `at`.
    """
    return [
        _check(limit, sums, ready) for limit in ready.basis.cumulative if (sums := _sums(limit, held)) != []
    ]


def _sums(limit: Cumulative, held: Held) -> list[Sum]:
    """Return the running sums from the first station that holds something on."""
    found: list[Sum] = []
    total: Fraction | None = Fraction(0)
    begun = False
    for step in limit.steps:
        for member in step.members:
            if member in held:
                begun, weight = True, held[member]
                total = None if total is None or weight is None else total + weight
        if begun:
            found.append((step, total))
    return found


def _check(limit: Cumulative, sums: list[Sum], ready: Prepared) -> Check:
    code, name, unit = f"cumulative.{limit.id}", limit.name, ready.weight
    stations: list[Json] = []
    judged: list[tuple[Check, CumulativeStep]] = []
    for step, total in sums:
        maximum = None if step.maximum is None else step.maximum.value
        stations.append(
            {
                "station": step.name,
                "sum": None if total is None else printed(total, WEIGHT_PLACES),
                "limit": None if maximum is None else printed(maximum, WEIGHT_PLACES, "down"),
            }
        )
        judged.append((_at_station(limit, step, total, code, ready), step))
    at: Json = {"from": limit.start, "stations": stations}
    for outcome in ("fail", "unresolved", "pass"):
        found = [(check, step) for check, step in judged if check.outcome == outcome]
        if found and outcome != "pass":
            worst, step = min(found, key=lambda each: each[0].room or Fraction(0))
            return worst._replace(title=f"{name}, {limit.start} to {step.name}", at=at)
    limited = [(check, step) for check, step in judged if check.room is not None]
    if not limited:
        return judged[-1][0]._replace(title=name, unit=unit, at=at)
    worst, step = min(limited, key=lambda each: each[0].room or Fraction(0))
    return worst._replace(title=f"{name}, {limit.start} to {step.name}", at=at)


def _at_station(
    limit: Cumulative, step: CumulativeStep, total: Fraction | None, code: str, ready: Prepared
) -> Check:
    unit, stretch = ready.weight, f"from the {limit.start} to {step.name}"
    if step.maximum is None:
        text = f"the limit of the sum {stretch} was not entered"
        fix = "Enter this limit in the loading basis, or the page that shows there is none."
        return Check(code, "", "unresolved", unit=unit, margin_text=text, what_next=fix)
    source = str(step.maximum.source)
    if step.maximum.value is None:
        return Check(code, "", "pass", unit=unit, margin_text="no limit", source=source)
    if total is None:
        text = f"a weight {stretch} is not known"
        fix = f"Enter the weight of all that is {stretch}."
        return Check(code, "", "unresolved", unit=unit, margin_text=text, source=source, what_next=fix)

    def fix_of(over: Fraction) -> str:
        further = "aft" if limit.start == "nose" else "forward"
        amount = f"{printed(over, WEIGHT_PLACES, 'up')} {unit}"
        return f"Take off at least {amount} of what is {stretch}, or move it further {further}."

    return below(Figure(code, "", total, unit, WEIGHT_PLACES), step.maximum.value, source, fix_of)
