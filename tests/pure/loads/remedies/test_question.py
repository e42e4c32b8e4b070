"""What is asked: how long there is, what is broken, and by how much all weights may change."""

from dataclasses import replace
from typing import Any

import pytest

from loads.balance.remedies.question import broken
from tests.pure.loads.remedies.rejects import aircraft, loaded, question_of, too_far_aft, two_stay
from tests.pure.loads.round_figures import q


@pytest.mark.parametrize(
    ("weights", "limits", "wanted"),
    [
        # Ramp 2,760, take-off 2,748, landing 2,628, zero fuel 2,400 of 3,600, least fuel at landing 2,460.
        ({}, [], (-960, 1200)),
        ({"take_off": 2750}, [], (-960, 2)),
        ({"take_off": 2700}, [], (-960, -48)),
        ({"minimum_flying": 2500}, [], (40, 1200)),
        ({"ramp": 2765, "landing": 2629}, [], (-960, 1)),
        ({}, [{"at": "landing", "weight": q(2600), "source": "sheet 4"}], (-960, -28)),
    ],
)
def test_how_much_lighter_and_heavier_it_may_be(
    weights: dict[str, Any], limits: list[Any], wanted: tuple[int, int]
) -> None:
    document = loaded({"S1": 200}) | {"limits": limits}
    assert question_of((document, aircraft(weights))).weight_range() == wanted


def test_without_limits_of_weight_it_may_be_anything() -> None:
    question = question_of((loaded({"S1": 200}), aircraft()))
    checks = tuple(one for one in question.result.checks if not one.code.startswith("weight."))
    question.result = replace(question.result, checks=checks)
    assert question.weight_range() == (None, None)


def test_what_is_broken_is_known_by_its_kind() -> None:
    question = question_of(too_far_aft())
    assert {one.code for one in broken(question.result)} == {
        "cg.ramp",
        "cg.take-off",
        "cg.zero-fuel",
        "cg.landing",
        "cg.minimum-at-landing",
        "path.longitudinal",
    }
    assert question.breaks("cg.")
    assert question.breaks("seat.", "path.")
    assert not question.breaks("seat.", "weight.")
    assert question_of(two_stay()).breaks("weight.take-off")


def test_seconds_are_counted_down_to_nothing() -> None:
    question = question_of(too_far_aft())
    now = iter((10.0, 57.5, 60.0, 61.0))
    question.clock = lambda: next(now)
    assert [question.left() for _ in range(4)] == [50.0, 2.5, 0.0, 0.0]


def test_every_assessment_is_counted() -> None:
    question = question_of(too_far_aft())
    assert question.tried == 0
    assert question.assessed(question.declared) == question.result
    assert question.tried == 1
