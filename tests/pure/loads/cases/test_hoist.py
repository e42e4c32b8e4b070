"""Who and what comes aboard in flight: hoisted up, or picked up. Take-off is without them, landing with them,
and both sides of every event are judged.

Common practice; every figure is reckoned by hand on the invented aircraft of `round_figures`.
"""

from copy import deepcopy
from dataclasses import replace
from typing import Any

import pytest

from fleet.standard_weights_reading import read_standard_weights
from fleet.stations import Rail
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.shape import check_shape
from records.refusal import Invalid
from tests.pure.loads.cases.test_loads_that_leave_or_move import event
from tests.pure.loads.making import F, place, seat
from tests.pure.loads.round_figures import EMPTY, SEATS, at, box, flown, q, round_basis, round_load
from tests.pure.loads.standards import seasonal_document

SAVED = {"name": "T. Brisk", "seat": "S2", "weight": q(220), "how": "estimated"}
FOUND = SAVED | {"how": "declared"}
CRATE = {"kind": "cargo", "what": "crate", "place": "HOLD", "weight": q(300), "how": "weighed"}


def refused(document: dict[str, Any], basis: Any = None) -> set[tuple[str, str]]:
    """The faults of a load, as (pointer, code)."""
    with pytest.raises(Invalid) as caught:
        read_load(document, basis or round_basis())
    return {(fault.pointer, fault.code) for fault in caught.value.faults}


def test_somebody_hoisted_up_is_not_in_the_take_off_weight_and_is_in_the_landing_weight() -> None:
    # take-off: 2000 + 200 + 360 = 2560 lb; 200000 + 18000 + 36000 = 254000 lb in
    # landing: 120 lb less, 220 lb more at 110 in: 2660 lb; 254000 - 12000 + 24200 = 266200 lb in
    result = flown(round_load(sequence=[event(60, come_aboard=[FOUND])]))

    assert at(result, "take-off") == (2560, 254_000)
    assert at(result, "landing") == (2660, 266_200)
    assert result.verdict == "within"
    gained = [line for line in result.lines if line.group == "sequence"]
    assert [(line.what, line.weight, line.moment, line.pointer) for line in gained] == [
        ("event 1, comes aboard: s2, passenger", 220, 24_200, "/sequence/0/come_aboard/0")
    ]


def test_persons_on_board_stay_the_count_at_the_start_and_the_greatest_number_is_told() -> None:
    # one pilot; one comes, then another while the first is still aboard: three of five seats
    more = FOUND | {"name": "W. Ash", "seat": "S3"}
    result = flown(round_load(sequence=[event(30, come_aboard=[FOUND]), event(60, come_aboard=[more])]))

    assert result.check("persons.count").outcome == "pass"
    greatest = result.check("persons.greatest")
    assert (greatest.outcome, greatest.actual, greatest.limit) == ("pass", "3", "5")
    persons = result.as_document()["persons"]
    assert isinstance(persons, dict)
    assert (persons["total"], persons["greatest_in_flight"]) == (1, 3)


def test_a_seat_whose_person_stands_elsewhere_is_no_seat_for_who_comes() -> None:
    # five seats, five people aboard, four of them at the door: a sixth has none
    stood = [event(20, move=[{"seat": name, "to": "DOOR"} for name in SEATS])]
    came = [event(30, come_aboard=[FOUND | {"seat": "S1"}])]
    assert refused(round_load(4, sequence=stood + came)) == {("/sequence/1/come_aboard/0/seat", "seat-taken")}


def test_more_people_than_seats_is_outside() -> None:
    # S3 and S4 are blocked once everybody is read: three may be aboard, and four are
    basis = round_basis()
    declared = read_load(round_load(2, sequence=[event(30, come_aboard=[FOUND | {"seat": "S3"}])]), basis)
    few = replace(declared, configuration=replace(declared.configuration, seats=("P", "S1", "S2")))
    check = assess(few, basis, EMPTY).check("persons.greatest")
    assert (check.outcome, check.actual, check.limit) == ("fail", "4", "3")
    assert check.margin_text == "1 more than there are seats"


def test_on_the_hoist_the_arm_and_the_limit_of_the_hoist_count_then_those_of_the_seat() -> None:
    # the hoist stands 60 in aft of the datum and bears 210 lb; 220 lb hang on it
    basis = round_basis(places=(*round_basis().places, place("HOIST", 60, 210)))
    basis = replace(
        basis,
        configurations=(replace(basis.configurations[0], places=("DOOR", "HOLD", "HOOK", "HOIST")),),
    )
    hung = FOUND | {"at": "HOIST"}
    up = [event(60, come_aboard=[hung]), event(60, move=[{"seat": "S2", "to": "S2"}])]

    result = flown(round_load(sequence=up), basis)

    check = result.check("place.HOIST")
    assert (check.outcome, check.actual, check.limit) == ("fail", "220", "210")
    assert check.margin_text == "10 lb above the limit, after event 1"
    assert result.check("seat.S2").outcome == "pass"
    assert at(result, "landing") == (2660, 266_200)
    # 2500 lb at 248000 before; on the hoist 2720 lb and 248000 + 13200: 96.03 in; inside 272200: 100.07 in
    narrow = flown(
        round_load(sequence=[event(60, come_aboard=[hung]), up[1]]), replace(basis, envelopes=(box(97, 120),))
    )
    worst = narrow.check("path.longitudinal")
    assert (worst.outcome, worst.edge) == ("fail", "forward")
    assert worst.room == F(261_200, 2720) - 97
    assert "after event 1" in worst.margin_text


def test_the_weight_just_after_may_be_above_the_maximum_although_take_off_and_landing_are_not() -> None:
    # take-off 2560; after 30 lb 300 lb come: 2830 lb; 300 lb go at 90 lb burned; landing 2440 lb
    crate = {"place": "HOLD", "what": "crate"}
    run = [event(30, come_aboard=[CRATE]), event(90, leave=[crate])]
    basis = round_basis(weights={"take_off": 2800, "landing": 2800})

    result = flown(round_load(sequence=run), basis)

    assert result.check("weight.take-off").outcome == result.check("weight.landing").outcome == "pass"
    check = result.check("weight.in-flight")
    assert (check.outcome, check.actual, check.limit, check.room) == ("fail", "2830", "2800", -30)
    assert check.title == "weight in flight, just after event 1"
    assert check.source == "VP2-FM rev B p. 6-4"
    allowable = result.as_document()["allowable_take_off"]
    assert isinstance(allowable, dict)
    # 2800 less the 270 lb by which the flight gets heavier
    assert allowable["weight"] == "2530"
    assert allowable["governed_by"] == "maximum in flight, just after event 1"


@pytest.mark.parametrize(("limit", "outcome"), [(2500, "pass"), (2499, "fail")])
def test_zero_fuel_counts_the_greatest_load_of_the_flight(limit: int, outcome: str) -> None:
    # without fuel 2200 lb at the start, 2500 lb with the crate, 2200 lb again
    crate = {"place": "HOLD", "what": "crate"}
    run = [event(30, come_aboard=[CRATE]), event(90, leave=[crate])]

    result = flown(round_load(sequence=run), round_basis(weights={"zero_fuel": limit}))

    check = result.check("weight.zero-fuel")
    assert (check.outcome, check.actual) == (outcome, "2500")
    assert at(result, "zero fuel")[0] == 2200


def test_the_lightest_moment_may_lie_before_something_comes_aboard() -> None:
    # 2560 at take-off, 2470 just before 300 lb come at 90 lb burned, 2740 at landing
    run = [event(90, come_aboard=[CRATE])]
    basis = round_basis(weights={"minimum_flying": 2471})

    check = flown(round_load(sequence=run, fuel={"minimum_at_landing": q(240)}), basis).check(
        "weight.minimum-flying"
    )
    assert (check.outcome, check.room) == ("fail", -1)
    assert check.title == "minimum flying weight, just before event 1"


def test_an_estimated_weight_of_somebody_hoisted_up_is_unresolved_as_for_anybody() -> None:
    result = flown(round_load(sequence=[event(60, come_aboard=[SAVED])]))
    assert result.check("weights.estimated").margin_text == "estimated: s2"
    assert result.verdict == "unresolved"


def test_a_standard_weight_comes_from_the_table_for_who_comes_aboard_too() -> None:
    # The invented table: an adult in winter (1 December) 200 lb, a child 90 lb; landing 200 and 90 lb more.
    table = read_standard_weights(seasonal_document())
    adult = {"name": "T. Brisk", "seat": "S2", "category": "adult", "how": "standard"}
    child = {"name": "M. Brisk", "seat": "S3", "category": "child", "how": "standard"}
    document = round_load(sequence=[event(60, come_aboard=[adult, child])])
    basis = round_basis()

    result = assess(read_load(document, basis, table), basis, EMPTY)

    assert at(result, "take-off")[0] == 2560
    assert at(result, "landing")[0] == 2440 + 290
    told = result.as_document()["standard_weights"]
    assert isinstance(told, dict)
    assert told["standard"] == 2
    # Without a table it is not known, and the load is unresolved.
    bare = flown(document)
    assert (bare.check("weights.unknown").outcome, bare.verdict) == ("unresolved", "unresolved")


def test_who_comes_aboard_may_leave_again_and_somebody_lowered_may_come_back() -> None:
    # N. S1 is lowered at 30 lb, comes up at 60 with T. Brisk, who is set down at 90: landing as if only S1
    back = {"name": "N. S1", "seat": "S1", "position": "winch operator", "weight": q(200), "how": "weighed"}
    run = [
        event(30, leave=[{"seat": "S1"}]),
        event(60, come_aboard=[back, FOUND]),
        event(90, leave=[{"seat": "S2"}]),
    ]
    result = flown(round_load(1, sequence=run))

    assert at(result, "take-off") == (2760, 276_000)
    assert at(result, "landing") == (2640, 264_000)
    assert result.check("persons.greatest").actual == "3"


def test_bad_events_are_refused_by_named_field_all_at_once() -> None:
    again = FOUND | {"seat": "S4"}
    run = [
        event(10, leave=[{"seat": "S2"}]),
        event(20, come_aboard=[FOUND, FOUND | {"name": "A. New", "seat": "S9"}]),
        event(30, come_aboard=[again, FOUND | {"name": "B. New", "seat": "S1"}]),
        event(40, come_aboard=[CRATE | {"place": "LOFT"}, CRATE, CRATE]),
        event(50, come_aboard=[FOUND | {"name": "C. New", "place": "HOLD"}]),
        event(60, come_aboard=[]),
        event(70, come_aboard=[FOUND | {"name": "D. New", "seat": "S3", "at": "LOFT"}]),
    ]
    assert refused(round_load(1, sequence=run)) == {
        ("/sequence/0/leave/0/seat", "not-aboard-yet"),
        ("/sequence/1/come_aboard/1/seat", "unknown-seat"),
        ("/sequence/2/come_aboard/0/name", "comes-aboard-twice"),
        ("/sequence/2/come_aboard/1/seat", "seat-taken"),
        ("/sequence/3/come_aboard/0/place", "unknown-place"),
        ("/sequence/3/come_aboard/2/what", "comes-aboard-twice"),
        ("/sequence/4/come_aboard/0/seat", "one-of"),
        ("/sequence/5/come_aboard", "empty"),
        ("/sequence/6/come_aboard/0/at", "unknown-place"),
    }


@pytest.mark.parametrize(
    ("line", "pointer", "code"),
    [
        (FOUND | {"position": "pilot in command"}, "position", "pilot-in-command-stays"),
        (FOUND | {"position": "medic", "restraint": q(5)}, "restraint", "unknown-field"),
        ({"name": "T. Brisk", "seat": "S2", "how": "declared"}, "weight", "missing"),
        ({"seat": "S2", "how": "declared", "weight": q(220)}, "name", "missing"),
        (CRATE | {"kind": "equipment", "removed": True}, "removed", "unknown-field"),
        (FOUND | {"kind": "cargo"}, "kind", "unknown-field"),
    ],
)
def test_a_line_of_who_comes_aboard_is_held_to_its_fields(line: Any, pointer: str, code: str) -> None:
    assert refused(round_load(sequence=[event(60, come_aboard=[line])])) == {
        (f"/sequence/0/come_aboard/0/{pointer}", code)
    }


def test_nobody_comes_aboard_before_take_off() -> None:
    early = [event(0, since="engine start", come_aboard=[FOUND])]
    assert refused(round_load(sequence=early)) == {("/sequence/0/come_aboard", "comes-before-take-off")}


def test_the_form_of_these_lines_is_asked_without_a_basis_too() -> None:
    document = deepcopy(round_load(sequence=[event(60, come_aboard=[FOUND, CRATE])]))
    check_shape(document)
    document["sequence"][0]["come_aboard"][0]["weight"] = q(-1)
    with pytest.raises(Invalid) as caught:
        check_shape(document)
    assert [fault.pointer for fault in caught.value.faults] == ["/sequence/0/come_aboard/0/weight/value"]


def test_a_seat_on_a_rail_is_judged_at_both_ends_for_who_comes_aboard_too() -> None:
    seats = round_basis().seats
    rail = Rail(F(100), F(130), (), seats[0].source)
    basis = round_basis(
        box(80, 102), seats=tuple(replace(s, rail=rail) if s.id == "S2" else s for s in seats)
    )

    # at 60 lb burned 248000 + 220 * 130 = 276600 at 2720 lb: 101.69 in; at the landing 270600 / 2660 = 101.73
    result = flown(round_load(sequence=[event(60, come_aboard=[FOUND])]), basis)
    worst = result.check("path.longitudinal")
    assert worst.outcome == "pass"
    assert worst.margin_text.endswith("seats on rails aft")
    assert worst.room is not None
    assert worst.room <= 102 - F(270_600, 2660)


def test_both_sides_of_the_event_are_on_the_path() -> None:
    # just before 2500 lb at 99.2 in; just after, 300 lb at 130 in more: 287000 / 2800 = 102.5 in
    run = [event(60, come_aboard=[CRATE])]
    result = flown(round_load(sequence=run), round_basis(box("99", "102.5")))
    assert result.check("path.longitudinal").outcome == "fail"
    landing = 254_000 - 12_000 + 39_000
    assert at(result, "landing") == (2740, landing)
    assert seat("S1", 110).arm == 110
