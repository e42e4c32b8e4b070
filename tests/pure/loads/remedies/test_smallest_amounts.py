"""The smallest of each kind of change, asked by itself: the steps in full. The sums stand in `rejects`."""

from collections.abc import Callable
from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Zone
from loads.balance.events import Event, Leaving
from loads.balance.remedies.amounts import least_ballast, least_removed
from loads.balance.remedies.arranging import Found, arranged
from loads.balance.remedies.fuelling import fuel_elsewhere, less_fuel
from loads.balance.remedies.question import Question
from loads.balance.remedies.reach import ways_of
from loads.balance.remedies.steps import Ballast, Refuel, Reseat, Shift, Take
from tests.pure.loads.making import F, envelope, limit
from tests.pure.loads.remedies import rejects
from tests.pure.loads.remedies.rejects import Asked, aircraft, gallons, line, loaded, question_of
from tests.pure.loads.round_figures import q


def reseated(question: Question) -> Found | None:
    return arranged(question, ways_of(question.result, question.ready), people=True, items=False)


def shifted(question: Question) -> Found | None:
    return arranged(question, ways_of(question.result, question.ready), people=False, items=True)


def both(question: Question) -> Found | None:
    return arranged(question, ways_of(question.result, question.ready), people=True, items=True)


def told(found: Found | None) -> str:
    """The steps in a line, with a mark where nothing proves that less would not do."""
    if found is None:
        return "none"
    assert found.result.verdict == "within"
    steps = []
    for step in found.steps:
        match step:
            case Reseat(person, end):
                steps.append(f"{person.seat.id} to {end.id}")
            case Shift(item, end, weight):
                steps.append(f"{float(weight):g} of {item.pointer} to {end.id}")
            case Take(item, weight):
                steps.append(f"{float(weight):g} of {item.pointer}")
            case Ballast(place, weight):
                steps.append(f"{float(weight):g} in {place.id}")
            case Refuel(tank, volume):
                steps.append(f"{float(volume):+g} in {tank.id}")
    return ", ".join(steps) + ("" if found.proven else " ?")


SMALLEST: list[tuple[Callable[[], Asked], Callable[[Question], Found | None], str]] = [
    (rejects.too_far_aft, reseated, "S3 to S1"),
    (rejects.too_far_aft, shifted, "38 of /items/0 to NOSE"),
    (rejects.too_far_aft, least_removed, "79.2 of /items/0"),
    (rejects.too_far_aft, least_ballast, "73.1 in NOSE"),
    (rejects.too_far_aft, less_fuel, "none"),
    (rejects.too_far_aft, fuel_elsewhere, "none"),
    (rejects.too_heavy_to_take_off, reseated, "none"),
    (rejects.too_heavy_to_take_off, shifted, "none"),
    (rejects.too_heavy_to_take_off, least_removed, "28 of /items/0"),
    (rejects.too_heavy_to_take_off, least_ballast, "none"),
    (rejects.too_heavy_to_take_off, less_fuel, "-4.7 in LEFT"),
    (rejects.too_heavy_to_take_off, fuel_elsewhere, "none"),
    (rejects.too_heavy_and_both_tanks_alike, least_removed, "none"),
    (rejects.too_heavy_and_both_tanks_alike, less_fuel, "-2.7 in LEFT, -2.7 in RIGHT"),
    (rejects.too_far_left, less_fuel, "-14.4 in LEFT"),
    (rejects.too_far_left, fuel_elsewhere, "-7.2 in LEFT, +7.2 in RIGHT"),
    (rejects.neither_people_nor_bags_alone, reseated, "none"),
    (rejects.neither_people_nor_bags_alone, shifted, "none"),
    (rejects.neither_people_nor_bags_alone, both, "S4 to S1, 15.2 of /items/0 to NOSE"),
    (rejects.neither_people_nor_bags_alone, least_removed, "106.7 of /items/0"),
    (rejects.neither_people_nor_bags_alone, least_ballast, "none"),
    (rejects.another_configuration, least_removed, "70 of /items/0"),
    (rejects.two_change_seats, reseated, "S1 to S3, S3 to S1"),
    (rejects.two_change_seats, least_ballast, "37.4 in NOSE"),
    (rejects.two_change_seats, least_removed, "none"),
    (rejects.an_infant_goes_along, reseated, "S3 to S1"),
    (rejects.bags_in_other_units, shifted, "32.1 of /items/0 to NOSE"),
    (rejects.a_crate_goes_whole, shifted, "30 of /items/1 to NOSE"),
    (rejects.a_crate_goes_whole, least_removed, "130 of /items/2"),
    (rejects.a_crate_goes_whole, least_ballast, "53.9 in NOSE"),
    (rejects.fuel_typed_otherwise, less_fuel, "-2.5 in L/1, -2.5 in R~1"),
    (rejects.a_notch_between, reseated, "S3 to S2"),
    (rejects.a_notch_between, shifted, "6.6 of /items/0 to REAR"),
    (rejects.a_notch_between, least_removed, "12.7 of /items/0"),
    (rejects.a_notch_between, least_ballast, "9.3 in NOSE"),
    (rejects.slanting_sides, reseated, "S3 to S1, S4 to S2"),
    (rejects.slanting_sides, shifted, "51.9 of /items/0 to NOSE"),
    (rejects.slanting_sides, least_ballast, "none"),
    (rejects.too_light, least_ballast, "40 in REAR"),
    (rejects.too_light, least_removed, "none"),
    (rejects.a_full_floor, shifted, "none"),
    (rejects.a_full_floor, least_ballast, "none"),
    (rejects.a_place_too_full, shifted, "30 of /items/0 to NOSE"),
    (rejects.a_place_too_full, least_removed, "30 of /items/0"),
    (rejects.somebody_too_heavy_for_a_seat, reseated, "S2 to S1"),
    (rejects.somebody_too_heavy_for_a_seat, least_removed, "none"),
    (rejects.somebody_too_heavy_for_a_seat, less_fuel, "none"),
    (rejects.whoever_leaves_in_flight_keeps_the_seat, reseated, "none"),
    (rejects.whoever_leaves_in_flight_keeps_the_seat, least_removed, "79.2 of /items/0"),
    (rejects.from_the_middle_to_both_wings, less_fuel, "-13.9 in MIDDLE"),
    (rejects.from_the_middle_to_both_wings, fuel_elsewhere, "-14 in MIDDLE, +7 in LEFT, +7 in RIGHT"),
    (
        rejects.from_both_wings_to_the_middle,
        fuel_elsewhere,
        "-1.4 in LEFT, -1.4 in RIGHT, +2.8 in MIDDLE",
    ),
    (rejects.a_hump_between_two_points, shifted, "4.2 of /items/0 to NOSE"),
    (rejects.a_hump_between_two_points, least_removed, "8.8 of /items/0"),
    (rejects.a_hump_between_two_points, least_ballast, "8.1 in NOSE"),
    (rejects.no_single_kind_helps, least_removed, "none"),
    (rejects.no_single_kind_helps, less_fuel, "none"),
]


@pytest.mark.parametrize(("make", "kind", "steps"), SMALLEST)
def test_the_smallest_change_of_a_kind(
    make: Callable[[], Asked], kind: Callable[[Question], Found | None], steps: str
) -> None:
    assert told(kind(question_of(make()))) == steps


@pytest.mark.parametrize("kind", [reseated, shifted, least_removed, least_ballast])
def test_without_time_no_program_is_solved(kind: Callable[[Question], Found | None]) -> None:
    question = question_of(rejects.too_far_aft())
    question.until = 0.0
    assert told(kind(question)) == "none"
    assert question.tried == 0


def test_without_time_no_fuel_is_told() -> None:
    for make, kind in ((rejects.too_far_left, fuel_elsewhere), (rejects.too_heavy_to_take_off, less_fuel)):
        question = question_of(make())
        question.until = 0.0
        assert told(kind(question)) == "none"


def full_of(*lines: dict[str, Any], **weights: Any) -> Question:
    document = loaded({"S1": 200})
    document["items"] = list(lines)
    return question_of((document, aircraft(weights)))


def test_the_largest_lines_of_a_place_stay_behind_first() -> None:
    # 2,748 lb and 90 in the rear: 2,838, and 2,770 allowed: 68 lb of 20, 40 and 30.
    lines = (line("REAR", q(20)), line("REAR", q(40)), line("REAR", q(30), "cargo"))
    assert told(least_removed(full_of(*lines, take_off=2770))) == "40 of /items/1, 28 of /items/2"
    assert told(least_removed(full_of(*lines, take_off=2748))) == (
        "40 of /items/1, 30 of /items/2, 20 of /items/0"
    )
    assert told(least_removed(full_of(*lines, take_off=2747))) == "none"


def test_whole_pieces_and_parts_make_up_the_least_together() -> None:
    # 55 lb too much of a crate of 50 and bags of 30.
    lines = (line("REAR", q(50), "equipment"), line("REAR", q(30)))
    assert told(least_removed(full_of(*lines, take_off=2773))) == "5 of /items/1, 50 of /items/0"
    assert told(least_removed(full_of(*lines, take_off=2748))) == "30 of /items/1, 50 of /items/0"
    assert told(least_removed(full_of(lines[0], take_off=2797))) == "50 of /items/0"


def test_a_line_of_less_than_a_tenth_more_stays_behind_as_it_is() -> None:
    assert told(least_removed(full_of(line("REAR", q("40.25")), take_off=2748))) == "40.25 of /items/0"
    assert told(least_removed(full_of(line("REAR", q("40.25")), take_off="2787.9"))) == "0.4 of /items/0"
    assert told(least_removed(full_of(line("REAR", q("40.25")), take_off="2788.2"))) == "0.1 of /items/0"


def test_what_was_taken_out_of_the_empty_weight_cannot_stay_behind() -> None:
    bench = line("REAR", q(50), "equipment", removed=True)
    assert told(least_removed(full_of(bench, line("NOSE", q(20)), take_off=2700))) == "18 of /items/1"
    assert told(least_removed(full_of(bench, take_off=2690))) == "none"


def test_ballast_goes_where_there_is_room_and_a_limit_was_entered() -> None:
    # 2,460 lb at landing with the least fuel: 2,470 must be flown.
    light = {"minimum_flying": 2470}
    for name, other in (("NOSE", "REAR"), ("REAR", "NOSE")):
        for most in (limit("0.09"), limit(0), None):
            basis = aircraft(light)
            places = tuple(replace(one, maximum=most) if one.id == name else one for one in basis.places)
            question = question_of((loaded({"S1": 200}), replace(basis, places=places)))
            assert told(least_ballast(question)) == f"10 in {other}"
        outside = replace(aircraft(light), places=())
        places = tuple(replace(one, external=one.id == name) for one in aircraft(light).places)
        question = question_of((loaded({"S1": 200}), replace(outside, places=places)))
        assert told(least_ballast(question)) == f"10 in {other}"


def test_what_an_event_names_does_not_stay_behind() -> None:
    question = full_of(line("REAR", q(60)), line("NOSE", q(20)), take_off=2798)  # 30 lb too much
    assert told(least_removed(question)) == "30 of /items/0"
    event = Event(1, "flight", F(5), "/sequence/0", leaving=(Leaving("/items/0", F(5)),))
    question.declared = replace(question.declared, sequence=(event,))
    assert told(least_removed(question)) == "none"
    named = replace(event, leaving=(Leaving("/items/1"),))
    question.declared = replace(question.declared, sequence=(named,))
    assert told(least_removed(question)) == "30 of /items/0"
    both = replace(event, leaving=(Leaving("/items/0"), Leaving("/items/1")))
    question.declared = replace(question.declared, sequence=(both,))
    assert least_removed(question) is None


def test_beside_what_an_event_names_the_other_line_of_the_place_stays_behind() -> None:
    question = full_of(line("REAR", q(60)), line("REAR", q(50)), take_off=2838)  # 20 lb too much
    assert told(least_removed(question)) == "20 of /items/0"
    event = Event(1, "flight", F(5), "/sequence/0", leaving=(Leaving("/items/0", F(5)),))
    question.declared = replace(question.declared, sequence=(event,))

    assert told(least_removed(question)) == "20 of /items/1"


def test_no_ballast_goes_where_the_configuration_has_no_place() -> None:
    basis = aircraft({"minimum_flying": 2470})
    (own,) = basis.configurations
    for name in ("NOSE", "REAR"):
        known = replace(basis, configurations=(replace(own, places=(name,)),))
        assert told(least_ballast(question_of((loaded({"S1": 200}), known)))) == f"10 in {name}"
    nowhere = replace(basis, configurations=(replace(own, places=()),))
    assert least_ballast(question_of((loaded({"S1": 200}), nowhere))) is None


def test_a_limit_of_the_flight_bounds_the_ballast_as_a_place_does() -> None:
    # 40 lb too little at landing, and a place without a limit; 2,748 lb at take-off may be 2,788 and no less.
    for allowed, wanted in ((2788, "40 in NOSE"), (F("2787.9"), "none")):
        basis = aircraft({"minimum_flying": 2500, "take_off": allowed})
        (nose, rear), (own,) = basis.places, basis.configurations
        places = (replace(nose, maximum=limit(None)), rear)
        known = replace(basis, places=places, configurations=(replace(own, places=("NOSE",)),))
        assert told(least_ballast(question_of((loaded({"S1": 200}), known)))) == wanted


def test_ballast_of_exactly_the_room_there_is() -> None:
    nose = (line("NOSE", q(90)), line("REAR", q(200)))
    assert told(least_ballast(full_of(*nose, minimum_flying=2760))) == "10 in NOSE"
    assert told(least_ballast(full_of(*nose, minimum_flying="2760.1"))) == "none"
    nearly = (line("NOSE", q("99.9")), line("REAR", q(200)))
    assert told(least_ballast(full_of(*nearly, minimum_flying=F("2760.0")))) == "0.1 in NOSE"
    assert told(least_ballast(full_of(*nose, minimum_flying=2760, take_off=3048))) == "10 in NOSE"
    assert told(least_ballast(full_of(*nose, minimum_flying=2760, take_off=3047))) == "none"


def test_a_zone_holds_ballast_back_though_a_place_before_it_has_no_limit() -> None:
    # 40 lb in the rear as in `too_light`, but its floor bears 30: 10 in the nose and 30 in the rear.
    document, basis = rejects.too_light()
    places = tuple(replace(one, maximum=limit(None)) if one.id == "NOSE" else one for one in basis.places)
    floor = Zone("FLOOR", "floor", ("S3", "REAR"), limit(30))
    question = question_of((document, replace(basis, places=places, zones=(floor,))))
    assert told(least_ballast(question)) == "10 in NOSE, 30 in REAR"
    # Nothing binds where the limit of a zone is shown to be none.
    free = question_of(
        (document, replace(basis, places=places, zones=(replace(floor, maximum=limit(None)),)))
    )
    assert told(least_ballast(free)) == "40 in REAR"


def test_people_in_a_zone_count_for_it() -> None:
    # 190 lb in the rear and 200 in the seat before it, where the floor bears 370: 20 lb too much.
    basis = aircraft()
    floor = Zone("FLOOR", "floor", ("S1", "REAR"), limit(370))
    question = question_of((loaded({"S1": 200}, ("REAR", 190), ("NOSE", 60)), replace(basis, zones=(floor,))))
    assert told(shifted(question)) == "20 of /items/0 to NOSE"
    assert told(least_removed(question)) == "20 of /items/0"


def test_fuel_is_left_out_down_to_the_least_at_landing_and_no_further() -> None:
    # 3,062 lb: 162 too much are 27 US gal, and 228 at landing are as much above 66. One tank would do, too:
    # of two ways alike the first is told, both tanks.
    both = "-13.5 in LEFT, -13.5 in RIGHT"
    for minimum, allowed, wanted in (
        (60, 2900, both),
        (66, 2900, both),
        (67, 2900, "none"),
        (66, 2896, "none"),
        (228, 3057, "none"),
    ):
        document = loaded({"S1": 200, "S2": 180}, minimum_at_landing=q(minimum))
        document["items"] = [line("NOSE", q(67)), line("REAR", q(67))]
        question = question_of((document, aircraft({"take_off": allowed})))
        assert told(less_fuel(question)) == wanted, (minimum, allowed)


def test_no_more_is_carried_over_than_a_tank_takes() -> None:
    across = envelope((F(-3, 2), 1000), (F(-3, 2), 5000), (F(3, 2), 5000), (F(3, 2), 1000), axis="lateral")
    for right, wanted in ((F(60), "-7.2 in LEFT, +7.2 in RIGHT"), (F("27.2"), None), (F("27.1"), "none")):
        basis = aircraft(envelopes=(*aircraft().envelopes, across))
        tanks = (basis.tanks[0], replace(basis.tanks[1], capacity=right))
        document = loaded({"S1": 200}, at_engine_start=gallons(40, 20))
        found = fuel_elsewhere(question_of((document, replace(basis, tanks=tanks))))
        assert told(found) == (wanted or "-7.2 in LEFT, +7.2 in RIGHT")
