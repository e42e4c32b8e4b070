"""The same fuel in other tanks: the least that has to change them, compared with trying every tenth."""

from dataclasses import replace
from typing import Any

from loads.balance.remedies.fuelling import fuel_elsewhere, less_fuel
from loads.balance.remedies.question import TENTH, Question
from loads.balance.remedies.steps import Refuel, taken
from tests.pure.loads.making import F, seat
from tests.pure.loads.remedies.cabins import asked, cabin, empty_of, seated

WEIGHTS = {"ramp": 1200, "take_off": 1190, "zero_fuel": 1180, "landing": 1185, "minimum_flying": 300}
BOX = ((30, 300), (30, 1300), (42, 1300), (42, 300))


def lopsided(left: Any, right: Any, *, minimum: Any = 8) -> Question:
    """A pilot and one passenger; more fuel on the left than the lateral limit of 1.5 in bears."""
    basis = cabin(
        [seat("COCKPIT-L", 34, 0, "crew"), seat("S1", 38, 0, "passenger")],
        holds=(("H1", 50, 20),),
        tanks=(("LEFT", 36, 20, -30), ("RIGHT", 36, 20, 30)),
        edges=BOX,
        weights=WEIGHTS,
        lateral=((F(-3, 2), 300), (F(-3, 2), 1300), (F(3, 2), 1300), (F(3, 2), 300)),
    )
    document = seated({"S1": 160}, {}, crew={"COCKPIT-L": 170}, trip=12, minimum=minimum)
    document["fuel"]["taxi"] = {"value": 2, "unit": "lb"}
    for tank, gallons in (("LEFT", left), ("RIGHT", right)):
        document["fuel"]["at_engine_start"][tank] = {"value": gallons, "unit": "US gal"}
    return asked(document, basis, empty_of(400, 36))


def least_over(question: Question) -> Any:
    """The least volume from left to right that holds, by trying every tenth."""
    left, right = (held.tank for held in question.declared.fuel.tanks)
    for tenths in range(1, 200):
        steps = [Refuel(left, -tenths * TENTH), Refuel(right, tenths * TENTH)]
        if question.judge(taken(question.declared, steps)).verdict == "within":
            return tenths * TENTH
    return None


def test_the_least_fuel_changes_tanks_and_none_of_it_is_left_out() -> None:
    question = lopsided(14, 4)
    assert question.result.check("lateral.take-off").outcome == "fail"
    found = fuel_elsewhere(question)
    assert found is not None
    changes = {step.tank.id: step.volume for step in found.steps if isinstance(step, Refuel)}
    assert changes["LEFT"] + changes["RIGHT"] == 0
    assert changes["RIGHT"] == least_over(question)


def test_where_a_weight_is_broken_no_other_tank_helps() -> None:
    question = lopsided(14, 4)
    own = question.declared.configuration
    tight = replace(own, limits=replace(own.limits, take_off=replace(own.limits.take_off, value=F(700))))  # type: ignore[type-var]  # a limit with a value
    question.declared = replace(question.declared, configuration=tight)
    question.result = question.judge(question.declared)
    assert fuel_elsewhere(question) is None


def test_no_fuel_is_left_out_where_none_is_above_the_least_at_landing() -> None:
    # 18 US gal are 117 lb; less 2 lb taxi and 12 lb trip, 103 lb are there at landing: all of it is wanted.
    assert less_fuel(lopsided(14, 4, minimum=103)) is None
    assert less_fuel(lopsided(14, 4, minimum=8)) is not None
