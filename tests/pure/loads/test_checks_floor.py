"""The checks of what a floor bears, each told in full, by hand; the aft hold runs along the aircraft."""

from dataclasses import replace

import pytest

from fleet.quantities import Unit
from loads.balance.checks_floor import floor_checks
from loads.balance.declared import read_load
from loads.balance.prepared import prepared
from loads.balance.result import Check
from tests.pure.loads.cases.test_floor import NONE, crate, hold, loaded, per_area, per_length, quantity, sides
from tests.pure.loads.making import SOURCE, F, place

PAGE = str(SOURCE)
AREA, RUN = "aft hold, floor load on an area", "aft hold, floor load along its length"
FREE = per_area(None)
SHORT = "Take an item out, or put items on one pallet or spreader and enter its size."


def told(basis, *items, change=None):
    """The checks of a load with these items."""
    declared = read_load(loaded(*items), basis)
    if change is not None:
        declared = replace(declared, items=tuple(change(item) for item in declared.items))
    return floor_checks(declared, prepared(basis))


def free(kind, title, number=1):
    """The check of an item of cargo where there is no limit."""
    code, title = f"floor-{kind}.AFT-HOLD.{number}", f"{title}, item {number} (cargo)"
    return Check(code, title, "pass", margin_text="no limit", source=PAGE)


def test_an_item_within_a_limit_on_an_area():
    """180 lb on 4 ft2 are 45 lb/ft2."""
    assert told(hold(per_area(50), NONE), crate(180, sides(24, 24))) == [
        Check(
            "floor-area.AFT-HOLD.1",
            f"{AREA}, item 1 (cargo)",
            "pass",
            actual="45",
            limit="50",
            unit="lb/ft2",
            margin="5",
            margin_text="5 lb/ft2 below the limit",
            source=PAGE,
            room=F(5),
        ),
        free("run", RUN),
    ]


def test_an_item_beyond_a_limit_along_its_length_that_may_be_turned():
    """120 lb, 18 in along and 24 in across, are 80 lb/ft of 60; they need 2 ft, just what it is across."""
    assert told(hold(FREE, per_length(60)), crate(120, sides(24, 18, "across"))) == [
        free("area", AREA),
        Check(
            "floor-run.AFT-HOLD.1",
            f"{RUN}, item 1 (cargo)",
            "fail",
            actual="80",
            limit="60",
            unit="lb/ft",
            margin="-20",
            margin_text="20 lb/ft above the limit",
            source=PAGE,
            what_next=(
                "Turn item 1, or stand it on a spreader: at least 2 ft along the aircraft under it, and more "
                "by what the spreader itself weighs; or put part of it elsewhere."
            ),
            room=F(-20),
        ),
    ]


def test_a_place_that_runs_across_is_told_so():
    basis = hold(FREE, per_length(60), runs="across")
    (_, turned), (_, short) = (
        told(basis, crate(120, sides(24, 18))),
        told(basis, crate(120, sides(18, "23.99", "across"))),
    )

    assert (turned.actual, short.actual) == ("80", "80")
    assert turned.what_next.startswith(
        "Turn item 1, or stand it on a spreader: at least 2 ft across the aircraft under it"
    )
    assert short.what_next.startswith(
        "Stand item 1 on a spreader: at least 2 ft across the aircraft under it"
    )


def test_what_lies_on_a_spreader_needs_a_larger_one():
    """10 + 130 lb on a board of 24 in x 24 in: 70 lb/ft of 60, so 2.333 ft, rounded up."""
    board = {"weight": quantity(10, "lb"), **sides(24, 24)}
    basis = hold(per_area(33), per_length(60))
    area, run = told(basis, crate(130, sides(12, 12), spreader=board))

    # 140 lb at 33 lb/ft2 need 4.2424 ft2.
    assert area.what_next == (
        "Stand item 1 on a larger spreader: at least 4.3 ft2 under it; or put part of it elsewhere."
    )
    assert run.what_next == (
        "Stand item 1 on a larger spreader: at least 2.4 ft along the aircraft under it; "
        "or put part of it elsewhere."
    )


def test_sizes_are_told_in_the_unit_of_the_limit_metres_to_the_millimetre():
    """120 lb at 50 kg/m: 54.4310844 kg need 1.0886... m."""
    (_, run) = told(hold(FREE, per_length(50, Unit.KG_PER_M)), crate(120, sides(18, 18)))

    assert (run.unit, run.limit) == ("kg/m", "50")
    assert "at least 1.089 m along the aircraft" in run.what_next


def test_a_limit_that_was_not_entered():
    (area, run) = told(hold(None, None), crate(80, sides(24, 24)))

    assert area == Check(
        "floor-area.AFT-HOLD.1",
        f"{AREA}, item 1 (cargo)",
        "unresolved",
        margin_text="the limit was not entered",
        what_next="Enter this limit in the loading basis, or the page that shows there is none.",
    )
    assert run == area._replace(code="floor-run.AFT-HOLD.1", title=f"{RUN}, item 1 (cargo)")


def test_an_item_without_a_footprint_or_a_weight():
    basis = hold(per_area(50), NONE)
    unknown = Check(
        "floor-area.AFT-HOLD.1",
        f"{AREA}, item 1 (cargo)",
        "unresolved",
        unit="lb/ft2",
        margin_text="the footprint of item 1 is not known",
        source=PAGE,
        what_next="Enter the footprint of item 1: what touches the floor, not its outline.",
    )
    assert told(basis, crate(80))[0] == unknown

    def weightless(item):
        return replace(item, weight=None)

    assert told(basis, crate(80, sides(24, 24)), change=weightless)[0] == unknown._replace(
        margin_text="the weight of item 1 is not known", what_next="Enter the weight of item 1."
    )
    assert told(basis, crate(80), change=weightless)[0] == unknown


def test_what_needs_no_footprint_stands_here_without_one():
    basis = hold(per_area(50), NONE, free_up_to=F(40))
    text = "nothing that needs a footprint stands here"

    assert told(basis, crate(40), crate(12)) == [
        Check("floor-area.AFT-HOLD", AREA, "pass", margin_text=text),
        Check("floor-run.AFT-HOLD", RUN, "pass", margin_text=text),
    ]
    assert told(basis, crate("40.1"))[0].outcome == "unresolved"
    # A weight that is not known is not known to be light.
    assert told(basis, crate(12), change=lambda item: replace(item, weight=None))[0].outcome == "unresolved"


def test_where_nothing_stands_nothing_is_told():
    basis = hold(per_area(50), per_length(60))
    elsewhere = crate(80, sides(24, 24)) | {"place": "NOSE-HOLD"}

    assert told(basis) == told(basis, elsewhere) == []
    removed = told(basis, crate(80, sides(24, 24)), change=lambda item: replace(item, removed=True))
    assert removed == []


def test_two_places_with_a_floor_are_told_each_and_one_without_does_not_end_it():
    basis = hold(per_area(50), NONE)
    (aft,) = (one for one in basis.places if one.id == "AFT-HOLD")
    nose = replace(place("NOSE-HOLD", 30, 250), floor=replace(aft.floor, per_area=per_area(60)))
    places = (place("WING-LOCKER", 145, None), nose, aft)
    ahead = crate(80, sides(24, 24)) | {"place": "NOSE-HOLD"}

    found = told(replace(basis, places=places), crate(80, sides(24, 24)), ahead)

    assert [(check.code, check.limit) for check in found] == [
        ("floor-area.NOSE-HOLD.2", "60"),
        ("floor-run.NOSE-HOLD.2", None),
        ("floor-area.AFT-HOLD.1", "50"),
        ("floor-run.AFT-HOLD.1", None),
    ]


def test_of_items_within_the_limit_the_one_with_the_least_room_is_told_the_first_of_equals():
    basis = hold(per_area(50), NONE)
    wide, small = crate(40, sides(24, 24)), crate(40, sides(12, 12))

    assert told(basis, wide, small, wide)[0].code == "floor-area.AFT-HOLD.2"
    assert told(basis, wide, wide)[0].code == "floor-area.AFT-HOLD.1"
    full = crate(50, sides(12, 12))  # no room at all is the least
    assert told(basis, small, full)[0].code == "floor-area.AFT-HOLD.2"
    assert told(basis, crate("49.5", sides(12, 12)), full)[0].code == "floor-area.AFT-HOLD.2"


def test_what_fails_is_told_item_by_item_and_no_other():
    basis = hold(per_area(50), NONE)
    heavy, small = crate(60, sides(12, 12)), crate(40, sides(12, 12))

    codes = [check.code for check in told(basis, heavy, small, heavy)]
    assert codes == ["floor-area.AFT-HOLD.1", "floor-area.AFT-HOLD.3", "floor-run.AFT-HOLD.1"]


TWO = (crate(80, sides(24, 12)), crate(80, sides(24, 12)))  # 40 lb/ft each, 80 side by side
TOGETHER = Check(
    "floor-run.AFT-HOLD",
    "aft hold, floor load along its length, items together",
    "advisory",
    unit="lb/ft",
    margin_text=(
        "side by side these items would load it with 80 lb/ft of 60: "
        "stand them one behind another, lengthwise"
    ),
    source=PAGE,
)


def test_items_that_must_not_stand_side_by_side():
    assert told(hold(FREE, per_length(60)), *TWO)[-1] == TOGETHER
    assert told(hold(FREE, per_length(60), length=F(48)), *TWO)[-1] == TOGETHER
    assert told(hold(FREE, per_length(60), length=F("47.95")), *TWO)[-1] == TOGETHER._replace(
        outcome="unresolved",
        margin_text=(
            "side by side these items would load it with 80 lb/ft of 60, "
            "and one behind another they need 48 in of 47.9 in"
        ),
        what_next=SHORT,
    )


def test_items_that_must_not_stand_side_by_side_where_the_place_runs_across():
    """12 in across each: 80 lb/ft each, of 100; side by side 160."""
    across = told(hold(FREE, per_length(100), runs="across", length=F(24)), *TWO)[-1]
    short = told(hold(FREE, per_length(100), runs="across", length=F(23)), *TWO)[-1]

    beside = "side by side these items would load it with 160 lb/ft of 100"
    assert across.margin_text == f"{beside}: stand them one behind another, across the aircraft"
    assert short.margin_text == f"{beside}, and one behind another they need 24 in of 23 in"


def test_what_items_load_side_by_side_is_rounded_up_and_its_limit_down():
    """80 lb on 23.02 in are 41.702... lb/ft; twice that is 83.405..., of 60.06. They need 46.04 in."""
    two = (crate(80, sides("23.02", 12)), crate(80, sides("23.02", 12)))

    found = told(hold(FREE, per_length("60.06"), length=F("46.03")), *two)[-1]
    assert "would load it with 83.5 lb/ft of 60," in found.margin_text
    assert found.margin_text.endswith("they need 46.1 in of 46 in")


@pytest.mark.parametrize(
    ("basis", "items"),
    [
        (hold(FREE, per_length(80)), TWO),  # just the limit, side by side
        (hold(FREE, per_length("39.9")), TWO),  # each alone is too much
        (hold(FREE, NONE), TWO),
        (hold(FREE, None), TWO),
        (hold(FREE, per_length(60)), TWO[:1]),
        (hold(FREE, per_length(60)), (*TWO, crate(80))),  # one of them stands on nothing known
    ],
)
def test_otherwise_nothing_is_told_of_items_together(basis, items):
    assert [check for check in told(basis, *items) if "together" in check.title] == []


def test_items_each_at_the_limit_are_told_together():
    """40 lb/ft of 40 each."""
    assert told(hold(FREE, per_length(40)), *TWO)[-1].code == "floor-run.AFT-HOLD"


def test_an_item_that_needs_no_footprint_does_not_keep_the_others_from_being_told():
    basis = hold(FREE, per_length(60), free_kinds=("baggage",))

    assert told(basis, *TWO, crate(30) | {"kind": "baggage"})[-1] == TOGETHER


def called(pointer, number):
    (area, _) = told(hold(per_area(50), NONE), crate(80), change=lambda item: replace(item, pointer=pointer))
    assert area.code == f"floor-area.AFT-HOLD.{number}"
    return area.margin_text.removeprefix("the footprint of ").removesuffix(" is not known")


def test_an_item_is_called_by_its_line_or_by_its_event_and_line():
    assert called("/items/6", "7") == "item 7"
    assert called("/sequence/2/come_aboard/4", "3.5") == "coming item 3.5"
    assert called("", "added") == "an added item"
