"""Between two turns nothing turns, in loads that were chosen for what is awkward in them: a tank that runs
dry at another point of the flight, a table of arms with a bend, fuel that cannot be used, and a flight for
which there would not be enough.

The judge is the assessment itself, at a seventh, a half and six sevenths of the way between two turns.
"""

from collections.abc import Callable
from dataclasses import replace
from fractions import Fraction
from itertools import pairwise
from typing import Any

import pytest

from fleet.basis import Basis, TankTable
from loads.balance.aboard import Declared
from loads.balance.polynomial import Root
from loads.balance.remedies.question import Question, broken
from loads.balance.remedies.reaching import COMES_BACK
from loads.balance.remedies.steps import Refuel, taken
from loads.balance.remedies.varying import Change, Varying, table_points
from tests.pure.loads.making import F, envelope
from tests.pure.loads.remedies.rejects import Asked, aircraft, gallons, loaded, question_of
from tests.pure.loads.round_figures import q

SHARES = (F(1, 7), F(1, 2), F(6, 7))
ACROSS = envelope((-1, 1000), (-1, 5000), (2, 5000), (2, 1000), axis="lateral")
NOTCHED = envelope(
    (98, 1000), (98, 5000), (F("99.4"), 5000), (F("99.6"), 2500), (F("99.8"), 5000), (102, 5000), (102, 1000)
)
BENT = TankTable(
    "volume", "arm", "arm", None, ((F(0), F(90)), (F(12), F(110)), (F(31), F(95)), (F(50), F(130)))
)


def with_tables(basis: Basis) -> Basis:
    return replace(basis, tanks=tuple(replace(one, table=BENT) for one in basis.tanks))


def uneven() -> Asked:
    """More on the left than on the right, which runs dry on the way."""
    return loaded({"S2": 150}, at_engine_start=gallons(26, 22)), aircraft(envelopes=(NOTCHED, ACROSS))


def bent_tables() -> Asked:
    basis = with_tables(aircraft(envelopes=(NOTCHED, ACROSS)))
    return loaded({"S1": 150}, at_engine_start=gallons(20, 28)), basis


def bent_tables_and_trapped() -> Asked:
    document, basis = bent_tables()
    document["fuel"]["not_usable"] = {"LEFT": q(3, "US gal"), "RIGHT": q(5, "US gal")}
    return document, basis


def hardly_enough() -> Asked:
    """The trip takes all there is: with less there would not be enough."""
    return loaded({"S1": 150}, at_engine_start=gallons(12, 15), minimum_at_landing=q(20)), with_tables(
        aircraft(envelopes=(NOTCHED, ACROSS))
    )


def fuller(question: Question) -> tuple[Change, Fraction]:
    held = question.declared.fuel.tanks[0]

    def changed(count: Fraction) -> Declared:
        return taken(question.declared, [Refuel(held.tank, count / 10)])

    marks = table_points(held, F(1, 10))
    return Change(changed, refuels=True, marks=marks), 10 * (held.tank.capacity - held.usable - held.trapped)


def emptier(question: Question) -> tuple[Change, Fraction]:
    held = question.declared.fuel.tanks[1]

    def changed(count: Fraction) -> Declared:
        return taken(question.declared, [Refuel(held.tank, -count / 10)])

    return Change(changed, refuels=True, marks=table_points(held, F(-1, 10))), 10 * held.usable


def denser(question: Question) -> tuple[Change, Fraction]:
    plan = question.declared.fuel

    def changed(count: Fraction) -> Declared:
        return replace(question.declared, fuel=replace(plan, density=plan.density * (1 + count / 1000)))

    return Change(changed, over=(F(1), F(1, 1000)), refuels=True), F(500)


def told(varying: Varying, at: Fraction) -> object:
    result = varying.result(at)
    if result is None:
        return None
    codes = (check.code for check in broken(result))
    return frozenset(code for code in codes if code.startswith((*COMES_BACK, "tank-table.")))


@pytest.mark.parametrize(
    ("make", "kind", "part"),
    [
        (uneven, fuller, (0, 1)),
        (uneven, emptier, (0, 1)),
        (bent_tables, fuller, (0, F(1, 8))),
        (bent_tables, emptier, (F(7, 8), 1)),
        (bent_tables, denser, (0, F(1, 20))),
        (bent_tables_and_trapped, fuller, (F(1, 8), F(2, 8))),
        (bent_tables_and_trapped, emptier, (0, F(1, 8))),
        (hardly_enough, fuller, (0, F(1, 20))),
        (hardly_enough, emptier, (0, 1)),
        (hardly_enough, denser, (0, 1)),
    ],
)
def test_nothing_turns_between_two_turns(
    make: Callable[[], Asked],
    kind: Callable[[Question], tuple[Change, Fraction]],
    part: tuple[Any, Any],
) -> None:
    question = question_of(make())
    change, most = kind(question)
    varying, (low, high) = Varying(question, change), (most * part[0], most * part[1])
    turns = [Root(low, low), *varying.turns(low, high), Root(high, high)]
    for one, other in pairwise(turns):
        if one.high < other.low:
            between = {told(varying, one.high + (other.low - one.high) * share) for share in SHARES}
            assert len(between) == 1, (float(one.high), float(other.low))
