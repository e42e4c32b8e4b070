"""Checks of fuel imbalance: what the tanks on the left hold against those on the right, all along.

While tanks feed, their contents and the fuel aboard change evenly, so the difference less what is allowed is
greatest where a tank runs dry, another stage feeds, at a phase, or at a point of the manual's table. All of
these are looked at; nothing is sampled. Fuel that cannot be used counts: it weighs where it lies.
"""

from collections.abc import Iterable, Iterator, Mapping, Sequence
from fractions import Fraction
from itertools import pairwise
from typing import Literal, NamedTuple

from fleet.fuel_balance import FuelBalance
from loads.balance.aboard import FuelPlan
from loads.balance.checks_lateral import AT
from loads.balance.fuel import Contents
from loads.balance.margins import Figure, below
from loads.balance.prepared import Prepared
from loads.balance.result import Check
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, printed

Leg = Literal["taxi", "flight", "reserve"]
WHERE: dict[Leg, str] = {
    "taxi": "between engine start and take-off",
    "flight": "between take-off and landing",
    "reserve": "between landing and the least fuel at landing",
}
AT_PHASES: Mapping[str, str] = {phase: words.strip() for phase, words in AT.items()}
PHASES_OF: dict[Leg, tuple[str, ...]] = {
    "taxi": ("ramp",),
    "flight": ("take-off",),
    "reserve": ("take-off", "landing"),
}


class Held(NamedTuple):
    """What the tanks hold at one kink of the flight (usable), and the leg it is on; `name` where it is a
    phase.
    """

    leg: Leg
    contents: Contents
    name: str = ""


class Difference(NamedTuple):
    """Left less right at one point of the flight, with what is allowed there (None: off the table)."""

    held: Held
    left: Fraction
    right: Fraction
    allowed: Fraction | None

    @property
    def over(self) -> Fraction:
        """Return how far the difference is above what is allowed; below 0: room."""
        return abs(self.left - self.right) - (self.allowed or 0)


def fuel_balance_checks(plan: FuelPlan, course: Sequence[Held], ready: Prepared) -> list[Check]:
    """Return one check for every limit of the basis; `course` are the kinks of the flight in their order."""
    trapped = {fuel.tank.id: fuel.trapped for fuel in plan.tanks}
    return [_check(limit, plan.density, trapped, course, ready) for limit in ready.basis.fuel_balance]


def differences(
    limit: FuelBalance, density: Fraction, trapped: Contents, course: Iterable[Held]
) -> Iterator[Difference]:
    """Yield the differences at every point where one can be the worst, in the order of flight."""
    per = density if limit.by == "weight" else Fraction(1)
    held = [one for one in course if set(PHASES_OF[one.leg]) & set(limit.phases)]
    for before, after in pairwise([None, *held]):
        if before is not None and after is not None and before.leg == after.leg:
            yield from _at_points(limit, per, trapped, before, after)
        if after is not None:
            yield _difference(limit, per, trapped, after)


def _at_points(
    limit: FuelBalance, per: Fraction, trapped: Contents, before: Held, after: Held
) -> Iterator[Difference]:
    """Yield the differences where the fuel aboard passes a point of the table."""
    full, less = (sum(held.contents.values(), Fraction(0)) * per for held in (before, after))
    if full == less:
        return
    for aboard, _ in limit.points:
        if less < aboard < full:
            share = (full - aboard) / (full - less)
            contents = {
                tank: volume + (after.contents[tank] - volume) * share
                for tank, volume in before.contents.items()
            }
            yield _difference(limit, per, trapped, Held(after.leg, contents))


def _difference(limit: FuelBalance, per: Fraction, trapped: Contents, held: Held) -> Difference:
    left, right = (
        sum((held.contents[tank] + trapped.get(tank, 0) for tank in tanks), Fraction(0)) * per
        for tanks in (limit.left, limit.right)
    )
    return Difference(held, left, right, limit.allowed(sum(held.contents.values(), Fraction(0)) * per))


def _check(
    limit: FuelBalance, density: Fraction, trapped: Contents, course: Sequence[Held], ready: Prepared
) -> Check:
    unit, places = (ready.weight, WEIGHT_PLACES) if limit.by == "weight" else (ready.volume, VOLUME_PLACES)
    code, title = f"fuel-balance.{limit.id}", f"fuel balance, {limit.name}"
    found = list(differences(limit, density, trapped, course))
    judged = [one for one in found if one.allowed is not None]
    worst = max(judged, key=lambda one: one.over, default=None)
    if len(judged) < len(found) and (worst is None or worst.over <= 0):
        off = next(one for one in found if one.allowed is None)
        aboard = sum(off.held.contents.values(), Fraction(0)) * (density if limit.by == "weight" else 1)
        text = f"{_where(off)} the table does not cover {printed(aboard, places)} {unit} of fuel aboard"
        enter = "Enter the rest of its table in the loading basis, or change the fuel."
        return Check(code, title, "unresolved", unit=unit, margin_text=text, what_next=enter)
    if worst is None:
        return Check(
            code, title, "pass", unit=unit, margin_text="no fuel is aboard", source=str(limit.source)
        )

    def fix(excess: Fraction) -> str:
        heavy = "left" if worst.left > worst.right else "right"
        less = f"{printed(excess, places, 'up')} {unit}"
        return f"Load or transfer fuel so that the {heavy} side holds at least {less} less {_where(worst)}."

    figure = Figure(code, title, abs(worst.left - worst.right), unit, places, worst.held.name or None)
    check = below(figure, worst.allowed or Fraction(0), str(limit.source), fix)
    left, right = (printed(side, places) for side in (worst.left, worst.right))
    text = f"{check.margin_text} {_where(worst)}: left {left}, right {right} {unit}"
    return check._replace(margin_text=text)


def _where(found: Difference) -> str:
    return AT_PHASES[found.held.name] if found.held.name else WHERE[found.held.leg]
