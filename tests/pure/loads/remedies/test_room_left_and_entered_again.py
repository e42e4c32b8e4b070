"""Room in envelopes that are left and entered again: the amount told is where they are left first.

The oracle tries every tenth, and where two neighbours hold, many amounts between them.
"""

from dataclasses import replace
from fractions import Fraction
from functools import partial
from typing import Any

import pytest

from fleet.basis import Basis
from loads.balance.aboard import Declared
from loads.balance.remedies.more import how_much_more
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.reaching import reached
from loads.balance.remedies.steps import Ballast, Refuel, taken
from loads.balance.remedies.varying import Change
from tests.pure.loads.making import F, envelope
from tests.pure.loads.remedies.cabins import NINETEEN_EDGES, asked, empty_of, nineteen, seated
from tests.pure.loads.remedies.test_room import lines

# A slit from the top of the envelope down to 9,440 lb, between arms of 204.3 and 204.5.
SLIT = (
    (195, 8000),
    (195, 11000),
    (201, 14000),
    (F("204.3"), 14000),
    (F("204.4"), 9440),
    (F("204.5"), 14000),
    (212, 14000),
    (212, 8000),
)


def slit() -> Basis:
    return replace(nineteen(), envelopes=(envelope(*SLIT),))


def question(basis: Basis) -> Question:
    document = seated({"ROW3-A": 200, "ROW3-B": 150, "ROW3-C": 150}, {"AFT-HOLD": 100}, gallons=60)
    return asked(document, basis, empty_of(7600, 203))


def first_break(asked_of: Question, place: str, most: int) -> Fraction:
    """The last whole pound that holds with every whole pound below it."""
    held = next(one for one in asked_of.ready.basis.places if one.id == place)
    for pounds in range(1, most + 1):
        if asked_of.judge(taken(asked_of.declared, [Ballast(held, Fraction(pounds))])).verdict != "within":
            return Fraction(pounds - 1)
    return Fraction(most)


def test_a_slit_that_is_passed_over_between_two_amounts_looked_at_is_found() -> None:
    asked_of = question(slit())
    assert asked_of.result.verdict == "within"
    hold = next(one for one in asked_of.ready.basis.places if one.id == "AFT-HOLD")
    for quarter in (125, 250, 375, 500):
        loaded = taken(asked_of.declared, [Ballast(hold, Fraction(quarter))])
        assert asked_of.judge(loaded).verdict == "within", "beyond the slit it is inside again"

    told = lines(how_much_more(asked_of))["place", "AFT-HOLD"]

    reached = first_break(asked_of, "AFT-HOLD", 500)
    assert reached < 250
    assert reached <= F(str(told["amount"])) < reached + 1
    assert str(told["stopped_by"]).startswith(("CG", "centre of gravity"))
    for more, within in ((F(str(told["amount"])), True), (F(str(told["amount"])) + TENTH, False)):
        loaded = taken(asked_of.declared, [Ballast(hold, more)])
        assert (asked_of.judge(loaded).verdict == "within") is within


def heavier(of: Question, count: Fraction) -> Declared:
    people = tuple(
        replace(one, weight=(one.weight or 0) * (1 + count / 1000)) for one in of.declared.passengers
    )
    return replace(of.declared, passengers=people)


def denser(of: Question, count: Fraction) -> Declared:
    plan = of.declared.fuel
    return replace(of.declared, fuel=replace(plan, density=plan.density * (1 + count / 1000)))


def fuller(of: Question, count: Fraction) -> Declared:
    return taken(of.declared, [Refuel(of.declared.fuel.tanks[0].tank, count * TENTH)])


@pytest.mark.parametrize(
    ("kind", "more"),
    [
        (heavier, {}),
        (denser, {"over": (F(1), F("0.001")), "refuels": True}),
        (fuller, {"refuels": True}),
    ],
)
@pytest.mark.parametrize("middle", [90, 200])
def test_a_slit_anywhere_is_where_the_room_ends(kind: Any, more: Any, middle: int) -> None:
    """A narrow V from the top of the envelope, down to where the take-off comes by at one amount."""
    whole = question(nineteen())
    take_off = whole.judge(kind(whole, Fraction(middle))).state("take-off")
    beside = whole.judge(kind(whole, Fraction(middle + 12))).state("take-off")
    half = abs(beside.arm - take_off.arm)
    tip = [(take_off.arm + way * half, 14000) for way in (-1, 1)]
    edges = [
        *NINETEEN_EDGES[:3],
        tip[0],
        (take_off.arm, take_off.weight - F("0.5")),
        tip[1],
        *NINETEEN_EDGES[3:],
    ]
    cut = question(replace(nineteen(), envelopes=(envelope(*edges),)))
    assert cut.result.verdict == "within"

    found = reached(cut, Change(partial(kind, cut), **more), 400)

    first = next(
        (n for n in range(1, 4 * 400) if cut.judge(kind(cut, Fraction(n, 4))).verdict != "within"), None
    )
    assert first is not None
    assert 0 < found.count == (first - 1) // 4 < middle
    assert found.stop is not None
    assert found.stop.code in ("cg.ramp", "cg.take-off", "path.longitudinal")
