"""Where the verdict of a load that varies may turn: between two such amounts nothing turns.

The judge is the assessment itself, which knows nothing of these turns: at drawn amounts between two of them
it says what it says halfway between. Tanks, tables, envelopes with notches, lateral limits, balances of fuel,
tables of trim and events are drawn; the loads are inside, outside, or pass from one to the other.
"""

import time
from dataclasses import replace
from fractions import Fraction
from itertools import pairwise
from typing import Any

import pytest
from hypothesis import HealthCheck, event, given, settings
from hypothesis import strategies as st

from fleet.basis import Basis
from fleet.fuel_balance import FuelBalance
from fleet.stations import Rail
from fleet.trim import Trim, TrimLine, TrimTable
from loads.balance.aboard import Declared, Item
from loads.balance.assess import assess
from loads.balance.polynomial import Root
from loads.balance.prepared import prepared
from loads.balance.remedies.question import Question, broken
from loads.balance.remedies.reaching import COMES_BACK
from loads.balance.remedies.steps import Refuel, taken
from loads.balance.remedies.varying import Change, Varying, table_points
from loads.balance.result import Result
from tests.pure.loads.making import SOURCE, twin_empty
from tests.pure.loads.test_path_across import lateral_limits
from tests.pure.loads.test_path_against_sampling import DECLARED, envelopes, flights
from tests.pure.loads.test_sequence_against_sampling import sequenced

F = Fraction
TENTH = F(1, 10)
MOST = F(3000)
QUIET = settings(max_examples=8, deadline=None, suppress_health_check=list(HealthCheck))


def asked(declared: Declared, basis: Basis) -> Question:
    def judge(changed: Declared) -> Result:
        return assess(changed, basis, twin_empty(), advised=False)

    return Question(declared, judge(declared), prepared(basis), judge, time.monotonic, time.monotonic() + 600)


def changes(declared: Declared, basis: Basis) -> dict[str, tuple[Change, Fraction]]:
    """Each way a load is varied by, with the greatest amount: in a place, each tank, the density."""
    hold = basis.places[1]
    lever = replace(hold, arm=F(260), lateral_arm=F(-40))
    tank = declared.fuel.tanks[0]
    plan = declared.fuel

    def loaded(count: Fraction) -> Declared:
        line = Item("cargo", "more", lever, count * TENTH, "weighed", removed=False, pointer="")
        return replace(declared, items=(*declared.items, line))

    def denser(count: Fraction) -> Declared:
        return replace(declared, fuel=replace(plan, density=plan.density * (1 + count / 1000)))

    def fuller(count: Fraction) -> Declared:
        return taken(declared, [Refuel(tank.tank, count * TENTH)])

    room = (tank.tank.capacity - tank.usable - tank.trapped) / TENTH
    return {
        "place": (Change(loaded), MOST),
        "density": (Change(denser, over=(F(1), F(1, 1000)), refuels=True), F(500)),
        "tank": (Change(fuller, refuels=True, marks=table_points(tank, TENTH)), room),
    }


def told(varying: Varying, at: Fraction) -> object:
    """What is broken at an amount, of what may come back."""
    result = varying.result(at)
    if result is None:
        return None
    known = [check.code for check in broken(result) if check.code.startswith((*COMES_BACK, "tank-table."))]
    return frozenset(known)


def assert_nothing_turns_between(declared: Declared, basis: Basis, kind: str, data: Any) -> None:
    change, most = changes(declared, basis)[kind]
    if most <= 0:
        return
    varying = Varying(asked(declared, basis), change)
    turns = [Root(F(0), F(0)), *varying.turns(F(0), most), Root(most, most)]
    seen = set()
    between = [pair for pair in pairwise(turns) if pair[0].high < pair[1].low]
    some = data.draw(st.sets(st.integers(0, len(between) - 1), max_size=5)) if between else ()
    for turn, following in (between[number] for number in sorted(some)):
        middle = told(varying, (turn.high + following.low) / 2)
        seen.add(middle)
        for _ in range(2):
            share = F(data.draw(st.integers(1, 9999)), 10000)
            at = turn.high + (following.low - turn.high) * share
            assert told(varying, at) == middle, (turn, following, at)
    event(f"{kind}: {len(seen)} different")


def drawn_limits(basis: Basis, declared: Declared, data: Any) -> Basis:
    drawn = [data.draw(envelopes("longitudinal", F(118))), data.draw(envelopes("lateral", F(0)))]
    basis = replace(basis, envelopes=tuple(drawn))
    if data.draw(st.booleans()):
        take_off = assess(declared, basis, twin_empty()).states
        if take_off:
            limit = data.draw(
                lateral_limits(take_off[1].arm + F(1, 2), data.draw(st.sampled_from((F(1, 10), F(1)))))
            )
            basis = replace(basis, lateral_by_cg=(limit,))
    return basis


@pytest.mark.parametrize("kind", ["place", "density", "tank"])
@QUIET
@given(flights(), st.data())
def test_nothing_turns_between_two_turns(kind: str, flight: Any, data: Any) -> None:
    basis, plan = flight
    declared = replace(DECLARED, fuel=plan)
    assert_nothing_turns_between(declared, drawn_limits(basis, declared, data), kind, data)


@pytest.mark.parametrize("kind", ["place", "density", "tank"])
@QUIET
@given(sequenced(), st.data())
def test_nothing_turns_between_two_turns_of_a_flight_with_events(kind: str, flight: Any, data: Any) -> None:
    basis, declared = flight
    assert_nothing_turns_between(declared, drawn_limits(basis, declared, data), kind, data)


@pytest.mark.parametrize("kind", ["place", "density", "tank"])
@QUIET
@given(flights(), st.data())
def test_nothing_turns_between_in_the_balance_of_fuel_and_trim(kind: str, flight: Any, data: Any) -> None:
    basis, plan = flight
    names = [tank.id for tank in basis.tanks]
    by = data.draw(st.sampled_from(("weight", "volume")))
    unit = F(6) if by == "weight" else F(1)
    points = tuple((F(at) * unit, F(data.draw(st.integers(1, 60))) * unit) for at in (0, 40, 90, 150, 2000))
    balance = FuelBalance(
        "B", "b", tuple(names[::2]), tuple(names[1::2]), by, None, points, ("ramp", "take-off"), SOURCE
    )
    lines = []
    for weight in (4000, 5600, 9000):
        settings_ = [F(data.draw(st.integers(0, 90)), 10) for _ in range(3)]
        cgs = (F(95), F(117) + F(data.draw(st.integers(0, 40)), 10), F(140))
        lines.append(TrimLine(F(weight), tuple(zip(cgs, settings_, strict=True)), SOURCE))
    one = data.draw(st.booleans())
    table = TrimTable(None, (replace(lines[0], weight=None),) if one else tuple(lines))
    trim = Trim("arm", "units", F(1, 10), F(3), F(6), SOURCE, (table,))
    basis = replace(basis, fuel_balance=(balance,), trim=trim)
    assert_nothing_turns_between(replace(DECLARED, fuel=plan), basis, kind, data)


@QUIET
@given(flights(), st.data())
def test_nothing_turns_between_with_seats_on_open_rails(flight: Any, data: Any) -> None:
    basis, plan = flight
    rail = Rail(F(118), F(130), (), SOURCE)
    people = tuple(replace(one, seat=replace(one.seat, rail=rail)) for one in DECLARED.passengers)
    declared = replace(DECLARED, fuel=plan, passengers=people)
    drawn = [data.draw(envelopes("longitudinal", F(118))), data.draw(envelopes("lateral", F(0)))]
    assert_nothing_turns_between(declared, replace(basis, envelopes=tuple(drawn)), "place", data)
