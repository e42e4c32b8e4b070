"""Remedies in plain words: what to do, what it changes, and what would break next. Seats and places are
named, never a person.
"""

from collections.abc import Sequence
from fractions import Fraction

from fleet.basis import Phase
from loads.balance.aboard import FuelPlan
from loads.balance.prepared import Prepared
from loads.balance.remedies.leaving import Left
from loads.balance.remedies.question import broken
from loads.balance.remedies.steps import Ballast, Refit, Refuel, Reseat, Shift, Step, Take
from loads.balance.result import Json, Result
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed

SHOWN: tuple[Phase, ...] = ("take-off", "zero fuel", "landing")
NUMBERS = ("one", "two", "three", "four", "five", "six", "seven", "eight", "nine")


def sentence(steps: Sequence[Step], plan: FuelPlan, ready: Prepared) -> str:
    """Return what to do, in one sentence or two."""
    people = [step for step in steps if isinstance(step, Reseat)]
    fuel = [step for step in steps if isinstance(step, Refuel)]
    said = []
    if people:
        said.append(_reseated(people))
    for step in steps:
        match step:
            case Shift(item, end, weight):
                part = _part(item.kind, weight, ready, whole=step.whole)
                said.append(f"Move {part} from {item.place.name} to {end.name}")
            case Take(item, weight):
                part = _part(item.kind, weight, ready, whole=step.whole)
                said.append(f"Leave {part} in {item.place.name} behind")
            case Ballast(place, weight):
                said.append(f"Load {_weight(weight, ready)} of ballast in {place.name}")
            case Refit(configuration):
                said.append(
                    f"Fly it in configuration {configuration.name}, everybody and everything as it is"
                )
    if fuel:
        said.append(_refuelled(fuel, plan, ready))
    return ". ".join(said) + "."


def left_sentence(left: Left, ready: Prepared) -> str:
    """Return the last resort: how many, from which rows, how heavy at least."""
    number = NUMBERS[left.people - 1] if left.people <= len(NUMBERS) else str(left.people)
    who = f"{number} passenger{'' if left.people == 1 else 's'}"
    if not left.rows:
        return (
            f"As the last resort, {who} would have to stay behind, and not any {number}: try who it may be."
        )
    together = "of" if left.people == 1 else "together of"
    rows = "row" if len(left.rows) == 1 else "rows"
    least = _weight(left.weight, ready)
    where = f"from {rows} {_listed(left.rows)}"
    return f"As the last resort, {who} {together} at least {least} {where} would have to stay behind."


def figures(before: Result, after: Result, ready: Prepared) -> list[Json]:
    """Return weights and centres of gravity before and after, as printed."""
    found: list[Json] = []
    phases = [{str(each["phase"]): each for each in _phases(one)} for one in (before, after)]
    for phase in SHOWN:
        if all(phase in each for each in phases):
            old, new = (each[phase] for each in phases)
            name = phase[0].upper() + phase[1:]
            found.append(_figure(f"{name} weight", ready.weight, old["weight"], new["weight"]))
            found.append(_figure(f"{name} CG", ready.length, old["arm"], new["arm"]))
    return found


def mended(before: Result, after: Result) -> list[Json]:
    """Return every limit that was broken: the margin before, and the margin after."""
    then = {check.code: check for check in after.checks}
    return [
        {
            "code": check.code,
            "title": check.title,
            "before": check.margin_text,
            "after": then[check.code].margin_text if check.code in then else "nothing there any more",
        }
        for check in broken(before)
    ]


def _phases(result: Result) -> list[Json]:
    found = result.document.get("phases")
    return found if isinstance(found, list) else []


def _figure(title: str, unit: str, before: object, after: object) -> Json:
    return {"title": title, "unit": unit, "before": before, "after": after}


def _reseated(people: Sequence[Reseat]) -> str:
    ways = [(step.person.seat.name, step.end.name) for step in people]
    infants = " with the infant on the lap" if any(step.person.lap_infant for step in people) else ""
    if len(ways) == 1:
        return f"Reseat the passenger in {ways[0][0]}{infants} to {ways[0][1]}"
    if len(ways) == 2 and ways[0] == ways[1][::-1]:  # noqa: PLR2004  # two who change with each other
        return f"Let the passengers in {ways[0][0]} and {ways[0][1]} change seats"
    listed = ", ".join(f"{start} to {end}" for start, end in ways)
    return f"Reseat {len(ways)} passengers{infants}: {listed}"


def _refuelled(fuel: Sequence[Refuel], plan: FuelPlan, ready: Prepared) -> str:
    total = sum((step.volume for step in fuel), Fraction(0))
    parts = [
        f"{_volume(abs(step.volume), ready)} {'more' if step.volume > 0 else 'less'} in {step.tank.name}"
        for step in fuel
    ]
    if total:
        weight = printed(abs(total) * plan.density, WEIGHT_PLACES, "up")
        less = f"Carry {_volume(abs(total), ready)} ({weight} {ready.weight}) less fuel"
        return f"{less}: {', '.join(parts)}" if len(parts) > 1 else f"{less} in {fuel[0].tank.name}"
    return f"Carry the same fuel otherwise: {', '.join(parts)}"


def _part(kind: str, weight: Fraction, ready: Prepared, *, whole: bool) -> str:
    amount = _weight(weight, ready)
    return f"all of the {kind} ({amount})" if whole else f"{amount} of the {kind}"


def _weight(weight: Fraction, ready: Prepared) -> str:
    return f"{printed(weight, WEIGHT_PLACES, 'up')} {ready.weight}"


def _volume(volume: Fraction, ready: Prepared) -> str:
    return f"{printed(volume, VOLUME_PLACES, 'up')} {ready.volume}"


def _listed(rows: Sequence[str]) -> str:
    """Return rows as people say them: `3`, `3-5`, `1 and 3`."""
    numbers = [int(row) for row in rows if row.isdigit()]
    if len(numbers) == len(rows) > 1 and numbers == list(range(numbers[0], numbers[-1] + 1)):
        return f"{numbers[0]}-{numbers[-1]}"
    return rows[0] if len(rows) == 1 else f"{', '.join(rows[:-1])} and {rows[-1]}"
