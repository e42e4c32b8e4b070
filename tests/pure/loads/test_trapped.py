"""Fuel that a restriction makes unusable: the greater of both counts, within the tank."""

from fractions import Fraction

import pytest

from fleet.restrictions import Ruled
from loads.balance.declared import read_load
from loads.balance.trapped import with_trapped
from records.refusal import Fault, Invalid
from tests.pure.loads.making import load, twin

F = Fraction


def trapped_of(declared_volume, ruled_volumes):
    """What cannot be used in each tank: `declared_volume` of the left main is declared, the rest is ruled."""
    document = load()
    if declared_volume:
        document["fuel"]["not_usable"] = {"LEFT-MAIN": {"value": declared_volume, "unit": "US gal"}}
    basis = twin()
    made = with_trapped(read_load(document, basis), Ruled(basis, ruled_volumes))
    return {held.tank.id: held.trapped for held in made.fuel.tanks if held.trapped}


@pytest.mark.parametrize(
    ("declared", "ruled", "trapped"),
    [
        (0, {}, {}),
        (3, {}, {"LEFT-MAIN": 3}),
        (3, {"LEFT-MAIN": F(2)}, {"LEFT-MAIN": 3}),
        (3, {"LEFT-MAIN": F(4)}, {"LEFT-MAIN": 4}),
        (0, {"LEFT-MAIN": F(10)}, {"LEFT-MAIN": 10}),  # 50 usable and 10 are the 60 it holds
        (3, {"RIGHT-AUX": F(1)}, {"LEFT-MAIN": 3, "RIGHT-AUX": 1}),
    ],
)
def test_the_greater_of_what_is_declared_and_what_is_ruled_counts(declared, ruled, trapped):
    assert trapped_of(declared, ruled) == trapped


def test_the_usable_fuel_stays_as_it_was():
    basis = twin()
    declared = read_load(load(), basis)

    made = with_trapped(declared, Ruled(basis, {"LEFT-MAIN": F(4)}))

    assert [held.usable for held in made.fuel.tanks] == [held.usable for held in declared.fuel.tanks]
    assert with_trapped(declared, Ruled(basis, {})) == declared


def test_every_tank_that_would_hold_too_much_is_named():
    with pytest.raises(Invalid) as refused:
        trapped_of(0, {"LEFT-MAIN": F("10.25"), "RIGHT-MAIN": F(11), "LEFT-AUX": F(1)})

    assert refused.value.faults == tuple(
        Fault(
            f"/fuel/at_engine_start/{tank}",
            "over-capacity",
            f"with {stuck} US gal that a restriction makes unusable, more than {name} holds, "
            "which is 60 US gal; correct it",
        )
        for tank, name, stuck in (("LEFT-MAIN", "left-main", "10.3"), ("RIGHT-MAIN", "right-main", "11"))
    )
