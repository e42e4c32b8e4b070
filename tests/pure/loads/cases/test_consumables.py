"""Consumables: oxygen, de-ice fluid, hopper, water, oil for a long ferry. They are items of that kind in
places, weigh at every phase, and are no fuel: nothing of them is burned, and at zero fuel they are aboard.

Zero fuel is the aircraft without disposable fuel and oil (14 CFR 110.2, read); what else is carried stays in.
The weight of de-ice fluid, water and oil by volume is the operator's figure; here each is stated as a weight.
"""

from typing import Any

import pytest

from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.pure.loads.making import F, load, result_of, twin


def consumable(weight: Any, place: str = "NOSE-HOLD", **more: Any) -> dict[str, Any]:
    weighs = {"value": weight, "unit": "lb"}
    return {
        "kind": "consumable",
        "what": "de-ice fluid",
        "place": place,
        "weight": weighs,
        "how": "weighed",
    } | more


def carrying(*items: dict[str, Any]) -> dict[str, Any]:
    return load(items=list(items))


def test_a_consumable_weighs_at_its_place_at_every_phase_zero_fuel_too() -> None:
    without, with_fluid = result_of(carrying()), result_of(carrying(consumable(42)))

    for before, after in zip(without.states, with_fluid.states, strict=True):
        assert after.weight - before.weight == 42
        assert after.moment - before.moment == 42 * 30  # the nose hold is at 30 in
        assert after.fuel == before.fuel
    assert {state.phase for state in with_fluid.states} >= {"zero fuel", "take-off", "landing"}


def test_a_consumable_counts_against_its_place_and_zone() -> None:
    hold = result_of(carrying(consumable(301, "AFT-HOLD")))

    assert hold.check("place.AFT-HOLD").outcome == "fail"
    assert hold.check("place.AFT-HOLD").margin == "-1"
    assert hold.check("zone.REAR").actual == "301"


def test_a_consumable_has_a_line_of_its_own_that_says_its_kind_and_is_in_the_zero_fuel_total() -> None:
    result = result_of(carrying(consumable(42)))
    lines = list(result.lines)
    at = next(n for n, line in enumerate(lines) if line.what == "nose hold, consumable")
    total = next(n for n, line in enumerate(lines) if line.group == "zero fuel")

    assert lines[at].weight == F(42)
    assert at < total


def test_a_consumable_at_zero_fuel_can_break_the_zero_fuel_limit() -> None:
    # Empty 4350, crew 181: 4531 lb of 6200 at zero fuel, so 1669 lb are left.
    crew = {"persons_on_board": 1, "passengers": []}

    on, over = (
        result_of({**carrying(consumable(weight, "WING-LOCKER")), **crew}).check("weight.zero-fuel")
        for weight in ("1669", "1669.1")
    )

    assert (on.outcome, over.outcome) == ("pass", "fail")


@pytest.mark.parametrize(
    ("item", "pointer", "code"),
    [
        (consumable(0), "/items/0/weight/value", "zero"),
        (consumable(-5), "/items/0/weight/value", "negative"),
        (consumable(5, removed=True), "/items/0/removed", "removed-not-equipment"),
        (consumable(5, kind="oil"), "/items/0/kind", "choice"),
        (consumable(5, "HOPPER"), "/items/0/place", "unknown-place"),
        (consumable(5) | {"weight": {"value": 5, "unit": "l"}}, "/items/0/weight/unit", "unit-dimension"),
    ],
)
def test_a_consumable_that_cannot_be_is_refused_with_its_field(
    item: dict[str, Any], pointer: str, code: str
) -> None:
    with pytest.raises(Invalid) as refused:
        read_load(carrying(item), twin())

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.value.faults}
