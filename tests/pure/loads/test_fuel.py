"""Which tank feeds when, exactly, against a slow second burner that goes drop by drop."""

from dataclasses import replace
from fractions import Fraction

from hypothesis import given, settings
from hypothesis import strategies as st

from fleet.basis import BurnStage, TankTable
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.fuel import burn, fuel_states
from loads.balance.prepared import prepared
from tests.pure.loads.making import load, tank, twin, twin_empty

F = Fraction

DROPS = 12  # a drop is a twelfth of a unit, so that one to four tanks share whole drops


def drop_by_drop(contents, order, drops):
    """An independent burner: one round takes equal drops from every tank of the stage that still holds
    some.
    """
    left = {name: held * DROPS * 60 for name, held in contents.items()}
    wanted = drops * 60
    for stage in order:
        while wanted and (feeding := [name for name in stage.tanks if left.get(name)]):
            share = min(F(wanted, len(feeding)), *(left[name] for name in feeding))
            for name in feeding:
                left[name] -= share
            wanted -= share * len(feeding)
    return {name: F(held, DROPS * 60) for name, held in left.items()}, F(wanted, DROPS * 60)


@given(
    st.lists(st.integers(0, 40), min_size=4, max_size=4),
    st.integers(0, 2400),
    st.sampled_from([(("A", "B"), ("C", "D")), (("A", "B", "C", "D"),), (("A",), ("D", "B")), ()]),
)
def test_nothing_is_lost_and_nothing_goes_below_empty(amounts, drops, stages):
    contents = dict(zip("ABCD", map(F, amounts), strict=True))
    order = tuple(BurnStage(names) for names in stages)

    left, short = burn(contents, order, F(drops, DROPS))

    assert (left, short) == drop_by_drop(contents, order, drops)
    assert sum(contents.values()) - sum(left.values()) + short == F(drops, DROPS)
    assert all(0 <= left[name] <= contents[name] for name in contents)


def test_tanks_of_a_stage_feed_equally_and_one_that_runs_dry_leaves_the_rest_feeding():
    left, short = burn({"L": F(10), "R": F(4)}, (BurnStage(("L", "R")),), F(11))

    assert left == {"L": F(3), "R": F(0)}
    assert short == 0


def test_a_later_stage_waits_until_the_earlier_one_is_dry():
    order = (BurnStage(("AUX",)), BurnStage(("MAIN",)))

    assert burn({"MAIN": F(20), "AUX": F(5)}, order, F(5))[0] == {"MAIN": F(20), "AUX": F(0)}
    assert burn({"MAIN": F(20), "AUX": F(5)}, order, F("5.5"))[0] == {"MAIN": F("19.5"), "AUX": F(0)}


def test_taxi_fuel_comes_out_of_its_own_tanks_and_the_trip_out_of_the_burn_order():
    basis = twin()
    states = fuel_states(read_load(load(), basis).fuel, prepared(basis))

    assert states["ramp"].usable["LEFT-MAIN"] == 50
    assert states["take-off"].usable == {"LEFT-MAIN": 48, "RIGHT-MAIN": 48, "LEFT-AUX": 15, "RIGHT-AUX": 15}
    assert states["landing"].usable == {"LEFT-MAIN": 28, "RIGHT-MAIN": 28, "LEFT-AUX": 0, "RIGHT-AUX": 0}
    assert states["minimum at landing"].usable_weight == 240
    assert states["zero fuel"].weight == 0


def test_trapped_fuel_stays_at_its_arm_when_the_usable_fuel_is_gone():
    basis = twin()
    document = load()
    document["fuel"]["not_usable"] = {"LEFT-AUX": {"value": 30, "unit": "lb"}}

    states = fuel_states(read_load(document, basis).fuel, prepared(basis))

    assert states["zero fuel"].weight == 30
    assert states["zero fuel"].moment == 30 * 133
    assert states["zero fuel"].lateral_moment == 30 * -90
    assert states["landing"].weight - states["landing"].usable_weight == 30
    assert states["ramp"].weight == 130 * 6 + 30


def test_fuel_no_stage_feeds_stays_aboard_at_zero_fuel():
    basis = twin()
    basis = replace(basis, burn_order=basis.burn_order[1:])
    document = load()
    document["fuel"]["trip"]["value"] = 300

    states = fuel_states(read_load(document, basis).fuel, prepared(basis))

    assert states["zero fuel"].usable == {"LEFT-MAIN": 0, "RIGHT-MAIN": 0, "LEFT-AUX": 15, "RIGHT-AUX": 15}


def test_burned_moment_is_before_less_after_where_the_table_bends():
    """AH64-BURN of the reference examples, computed there: the first 23.2 gal come from the upper arm."""
    table = TankTable(
        "volume", "arm", "arm", None, ((F(0), F("150.6")), (F("132.8"), F("150.6")), (F(156), F("153.7")))
    )
    one = replace(tank("L-TANK", 0, 156), table=table)
    basis = replace(
        twin(), tanks=(one,), burn_order=(BurnStage(("L-TANK",)),), taxi_order=(BurnStage(("L-TANK",)),)
    )
    document = load()
    document["fuel"] |= {
        "density": {"value": "6.5", "unit": "lb/US gal", "source": "manual"},
        "at_engine_start": {"L-TANK": {"value": 156, "unit": "US gal"}},
        "taxi": {"value": 0, "unit": "lb"},
        "trip": {"value": "150.8", "unit": "lb"},
    }

    result = assess(read_load(document, basis), basis, twin_empty())

    burned = result.state("take-off").moment - result.state("landing").moment
    assert burned == F("25853.88")
    assert abs(burned / F("150.8") - F("171.44")) < F("0.01")


def test_fuel_off_the_end_of_a_table_is_unresolved_and_never_extrapolated():
    basis = twin()
    bent = TankTable("volume", "arm", "arm", None, ((F(10), F(121)), (F(60), F(122))))
    basis = replace(basis, tanks=(replace(basis.tanks[0], table=bent), *basis.tanks[1:]))
    document = load()
    document["fuel"]["minimum_at_landing"] = {"value": 60, "unit": "lb"}

    result = assess(read_load(document, basis), basis, twin_empty())

    check = result.check("tank-table.LEFT-MAIN")
    assert (check.outcome, check.phase) == ("unresolved", "minimum at landing")
    assert result.verdict == "unresolved"
    assert result.states == ()


@settings(max_examples=50, deadline=None)
@given(st.integers(1, 700), st.integers(0, 60))
def test_a_burn_in_two_parts_is_the_burn_at_once(first, second):
    basis = twin()
    contents = {one.id: one.capacity for one in basis.tanks}

    halfway, _ = burn(contents, basis.burn_order, F(first, 10))
    twice, short = burn(halfway, basis.burn_order, F(second))

    assert (twice, short) == burn(contents, basis.burn_order, F(first, 10) + second)
