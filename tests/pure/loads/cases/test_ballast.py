"""Ballast: permanent ballast is part of the empty weight and its equipment list; temporary ballast is load,
lies in a place, and is within every limit of that place, its zones and its floor. Common practice; permanent
ballast in the empty weight: 14 CFR 27.29 (read).
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import FixedItem, Zone
from fleet.quantities import Unit
from fleet.stations import Cumulative, CumulativeStep, Floor, FloorLimit
from fleet.weighing import EmptyFigures
from loads.balance.assess import assess
from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.pure.loads.making import SOURCE, F, limit, load, place, result_of, twin, twin_empty


def ballast(weight: Any, where: str = "NOSE-HOLD", **more: Any) -> dict[str, Any]:
    weighs = {"value": weight, "unit": "lb"}
    return {"kind": "ballast", "what": "lead bags", "place": where, "weight": weighs, "how": "weighed"} | more


def with_ballast(*items: dict[str, Any]) -> dict[str, Any]:
    return load(persons_on_board=1, passengers=[], items=list(items))


def test_temporary_ballast_is_load_at_every_phase() -> None:
    bare, ballasted = result_of(with_ballast()), result_of(with_ballast(ballast(100)))

    for before, after in zip(bare.states, ballasted.states, strict=True):
        assert after.weight - before.weight == 100
        assert after.moment - before.moment == 3000  # 100 lb at 30 in
    operating = [result.as_document()["operating_weight"] for result in (bare, ballasted)]
    assert operating[0] == operating[1]  # it is no part of the operating weight


def test_permanent_ballast_is_in_the_empty_weight_and_in_no_place() -> None:
    empty = twin_empty()
    heavier = EmptyFigures(
        empty.weight + 100, empty.moment + 3000, empty.lateral_moment, empty.datum, empty.fit, empty.how
    )
    declared = read_load(with_ballast(), twin())

    permanent, temporary = assess(declared, twin(), heavier), result_of(with_ballast(ballast(100)))

    assert permanent.state("take-off") == temporary.state("take-off")
    assert [check.code for check in permanent.checks if check.code.startswith("place.")] == []
    assert temporary.check("place.NOSE-HOLD").actual == "100"


def test_ballast_that_comes_with_a_configuration_is_in_the_operating_weight() -> None:
    basis = twin()
    bags = FixedItem("ballast box", F(100), F(30), F(0))
    full = replace(basis.configurations[0], equipment=(bags,))
    result = result_of(with_ballast(), replace(basis, configurations=(full, *basis.configurations[1:])))

    assert result.state("take-off") == result_of(with_ballast(ballast(100))).state("take-off")


def test_ballast_is_held_by_its_place_its_zone_and_a_running_sum() -> None:
    nose = Zone("NOSE", "nose", ("NOSE-HOLD",), limit(180))
    steps = (CumulativeStep("nose hold", ("NOSE-HOLD",), limit(150)),)
    basis = replace(twin(), zones=(nose,), cumulative=(Cumulative("RUN", "nose on", "nose", steps),))

    result = result_of(with_ballast(ballast(100), ballast(80, what="more bags")), basis)

    assert result.check("place.NOSE-HOLD").margin == "70"  # 180 of 250
    assert result.check("zone.NOSE").margin_text == "on the limit"  # 180 of 180
    assert result.check("cumulative.RUN").margin == "-30"  # 180 of 150


def test_ballast_stands_on_the_floor_like_any_item() -> None:
    most = FloorLimit(F(2), Unit.LB_PER_IN2, SOURCE)
    floor = Floor("along", most, FloorLimit(None, None, SOURCE))
    hold = replace(place("NOSE-HOLD", 30, 250), floor=floor)
    basis = replace(twin(), places=(hold, *twin().places[1:]))

    box = {side: {"value": 10, "unit": "in"} for side in ("length", "width")} | {"lies": "along"}
    plain, footed = ballast(100), ballast(100, footprint=box)

    assert result_of(with_ballast(plain), basis).check("floor-area.NOSE-HOLD.1").outcome == "unresolved"
    # 100 lb on 100 in2: 1 lb/in2 of 2.
    assert result_of(with_ballast(footed), basis).check("floor-area.NOSE-HOLD.1").margin == "1"


@pytest.mark.parametrize(
    ("item", "pointer", "code"),
    [
        (ballast(0), "/items/0/weight/value", "zero"),
        (ballast("NaN"), "/items/0/weight/value", "number-form"),
        (ballast("1e3"), "/items/0/weight/value", "number-form"),
        (ballast("12,5"), "/items/0/weight/value", "number-form"),
        (ballast(10, removed=True), "/items/0/removed", "removed-not-equipment"),
        (ballast(10, "TAIL"), "/items/0/place", "unknown-place"),
        (ballast(10, how="guessed"), "/items/0/how", "choice"),
    ],
)
def test_ballast_that_cannot_be_is_refused_with_its_field(item: Any, pointer: str, code: str) -> None:
    with pytest.raises(Invalid) as refused:
        read_load(with_ballast(item), twin())

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.value.faults}
