"""One load, every check: what passes, what fails and how it is said, and what is not known."""

from copy import deepcopy
from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import FixedItem
from records.canonical import canonical
from tests.pure.loads.making import (
    ROOMY,
    envelope,
    limit,
    load,
    result_of,
    twin,
    with_limits,
)

F = Fraction


def test_the_sum_is_what_a_hand_makes_of_the_lines():
    """Computed by hand from the load of `making`: 4350 + 181 + 176 + 71.5 kg + 9 kg + 120 + 780 of fuel."""
    result = result_of()
    kg = 1 / F("0.45359237")
    weight = 4350 + 181 + 176 + F("80.5") * kg + 120
    moment = F("507240.5") + 181 * 92 + 176 * 124 + F("80.5") * kg * 124 + 120 * 190

    assert result.verdict == "within"
    assert result.state("zero fuel").weight == weight
    assert result.state("zero fuel").moment == moment
    assert result.state("ramp").weight == weight + 780
    assert result.state("ramp").moment == moment + 600 * 121 + 180 * 133
    assert result.state("take-off").weight == weight + 756
    assert result.state("landing").weight == weight + 336
    assert result.state("minimum at landing").weight == weight + 240


def test_every_total_of_the_sheet_is_the_sum_of_the_lines_above_it_and_the_phase_it_names():
    result = result_of()
    weight = moment = lateral = F(0)
    totals = {}
    for line in result.lines:
        if line.total:
            assert (line.weight, line.moment, line.lateral_moment) == (weight, moment, lateral)
            totals[line.group] = line.weight
        else:
            weight, moment = weight + line.weight, moment + line.moment
            lateral += line.lateral_moment

    assert totals["operating weight"] == 4350 + 181
    for phase in ("zero fuel", "ramp", "take-off", "landing"):
        assert totals[phase] == result.state(phase).weight


def test_the_operating_weight_is_empty_weight_equipment_operating_items_and_crew():
    basis = twin()
    kit = basis.configurations[0]
    divider = fixed_item("cabin divider", -30, 140)
    oxygen = fixed_item("oxygen bottles", 14, 60)
    basis = replace(
        basis, configurations=(replace(kit, equipment=(divider,), operating_items=(oxygen,)), kit)
    )

    result = result_of(basis=basis)
    document = result.as_document()

    assert document["operating_weight"]["weight"] == "4515"
    assert [row["group"] for row in document["sumsheet"][:5]] == [
        "empty weight",
        "equipment",
        "operating items",
        "crew",
        "operating weight",
    ]


def fixed_item(what, weight, arm):
    return FixedItem(what, F(weight), F(arm), F(0))


def test_the_recorded_moment_beats_weight_times_arm():
    line = result_of().lines[0]

    assert line.moment == F("507240.5")
    assert line.arm == F("507240.5") / 4350


@pytest.mark.parametrize(
    ("which", "phase"),
    [
        ("ramp", "ramp"),
        ("take_off", "take-off"),
        ("zero_fuel", "zero fuel"),
        ("landing", "landing"),
    ],
)
def test_a_limit_of_weight_fails_its_own_phase_and_says_what_to_take_off(which, phase):
    actual = result_of().state(phase).weight
    basis = with_limits(**ROOMY)
    exact = replace(basis.limits, **{which: replace(limit(0), value=actual)})
    basis = replace(basis, configurations=(replace(basis.configurations[0], limits=exact),))
    just_under = replace(exact, **{which: replace(limit(0), value=actual - F(1, 1000))})
    over = replace(basis, configurations=(replace(basis.configurations[0], limits=just_under),))
    code = f"weight.{phase.replace(' ', '-')}"

    assert result_of(basis=basis).check(code).margin_text == "on the limit"
    assert result_of(basis=basis).verdict == "within"
    failed = result_of(basis=over)
    assert failed.verdict == "outside"
    assert failed.check(code).outcome == "fail"
    assert "0.1 lb" in failed.check(code).what_next
    assert F(failed.check(code).actual) > F(failed.check(code).limit)


def test_the_least_of_all_bounds_is_allowed_and_the_first_named_of_equals_governs():
    result = result_of().as_document()
    allowed = result["allowable_take_off"]

    # performance 6700; structural 6800; landing 6500 + 420; zero fuel 6200 + 756; ramp 6840 - 24
    assert [one["weight"] for one in allowed["candidates"]] == ["6800", "6920", "6956", "6816", "6700"]
    assert (allowed["weight"], allowed["governed_by"]) == ("6700", "performance sheet 12")
    assert result["governing"]["weight"] == (
        "take-off weight 5760.5 of 6700 lb allowed, governed by performance sheet 12: 939.5 lb left"
    )


@pytest.mark.parametrize(
    ("values", "governs", "weight"),
    [
        ({"take_off": 6000}, "structural take-off", "6000"),
        ({"landing": 5500}, "landing limit + trip fuel", "5920"),
        ({"zero_fuel": 5100}, "zero-fuel limit + take-off fuel", "5856"),
        ({"ramp": 5900}, "ramp limit - taxi fuel", "5876"),
    ],
)
def test_each_bound_can_govern(values, governs, weight):
    document = load(limits=[])
    allowed = result_of(document, with_limits(**{**ROOMY, **values})).as_document()["allowable_take_off"]

    assert (allowed["governed_by"], allowed["weight"]) == (governs, weight)


def test_a_landing_limit_stated_with_the_load_bounds_take_off_and_landing():
    stated = {"at": "landing", "weight": {"value": 5300, "unit": "lb"}, "source": "wet runway sheet"}
    result = result_of(load(limits=[stated]))

    assert result.check("performance.landing.1").outcome == "fail"
    allowed = result.as_document()["allowable_take_off"]
    assert (allowed["governed_by"], allowed["weight"]) == ("wet runway sheet + trip fuel", "5720")


def test_the_lightest_moment_of_the_flight_must_reach_the_minimum_flying_weight():
    result = result_of(basis=with_limits(**{**ROOMY, "minimum_flying": 5250}))
    check = result.check("weight.minimum-flying")

    assert (check.outcome, check.phase) == ("fail", "minimum at landing")
    assert check.what_next.startswith("Add at least 5.6 lb")


def test_landing_fuel_below_the_stated_minimum_fails_and_is_not_hidden_by_refuelling():
    document = load()
    document["fuel"]["minimum_at_landing"] = {"value": 340, "unit": "lb"}
    result = result_of(document)

    check = result.check("fuel.minimum-at-landing")
    assert (check.outcome, check.margin) == ("fail", "-4")
    assert "4 lb (0.7 US gal)" in check.what_next
    assert result.state("minimum at landing") == result.state("landing")._replace(phase="minimum at landing")


def test_less_fuel_is_only_advised_where_the_minimum_at_landing_allows_it():
    stated = {"at": "take-off", "weight": {"value": 5700, "unit": "lb"}, "source": "sheet"}
    plenty = result_of(load(limits=[stated])).check("performance.take-off.1").what_next
    document = load(limits=[stated])
    document["fuel"]["minimum_at_landing"] = {"value": 300, "unit": "lb"}
    short = result_of(document).check("performance.take-off.1").what_next

    assert plenty == "Take off at least 60.5 lb of people or items, or carry 10.1 US gal less fuel."
    assert "only 36 lb is above the minimum at landing" in short


def test_a_lap_infant_adds_its_weight_at_that_seat_and_counts_as_a_person():
    result = result_of()
    with_infant = F(result.check("seat.ROW1-R").actual)

    assert with_infant == F("177.5")
    assert result.as_document()["persons"] == {"crew": 1, "passengers": 2, "lap_infants": 1, "total": 4}


def test_a_place_a_seat_a_zone_and_a_tank_each_have_their_limit():
    document = load()
    bag = document["items"][0]
    document["items"] = [
        {**bag, "what": f"bag {number}", "weight": {"value": 101, "unit": "lb"}} for number in range(3)
    ]
    document["passengers"][0] |= {"seat": "ROW2-L", "weight": {"value": 301, "unit": "lb"}}

    result = result_of(document)

    assert result.check("place.AFT-HOLD").margin == "-3"
    assert result.check("place.AFT-HOLD").what_next == "Move or take off at least 3 lb from aft hold."
    assert result.check("seat.ROW2-L").outcome == "fail"
    assert result.check("zone.REAR").margin == "-4"
    assert result.check("tank.LEFT-AUX").margin == "15"


def test_a_removed_equipment_lightens_the_aircraft_but_not_the_place_it_came_from():
    document = load()
    document["items"].append(
        {
            "kind": "equipment",
            "what": "cabinet",
            "place": "AFT-HOLD",
            "weight": {"value": 22, "unit": "lb"},
            "how": "weighed",
            "removed": True,
        }
    )
    result = result_of(document)

    assert result.state("ramp").weight == result_of().state("ramp").weight - 22
    assert result.state("ramp").moment == result_of().state("ramp").moment - 22 * 190
    assert result.check("place.AFT-HOLD").actual == "120"


def test_of_two_envelopes_at_one_phase_both_must_hold_the_load():
    basis = twin()
    narrow = envelope((117, 4000), (117, 7000), ("118.5", 7000), ("118.5", 4000), phases=("take-off",))
    result = result_of(basis=replace(basis, envelopes=(*basis.envelopes, narrow)))

    assert result.check("cg.take-off").outcome == "fail"
    assert result.check("cg.take-off").limit == "118.5"
    assert result.check("cg.landing").outcome == "pass"


def test_lateral_limits_are_judged_at_every_phase_and_read_as_left_and_right():
    basis = twin()
    across = envelope((-2, 4000), (-2, 7000), ("-0.1", 7000), ("-0.1", 4000), axis="lateral")
    result = result_of(basis=replace(basis, envelopes=(*basis.envelopes, across)))
    tight = envelope(("-0.1", 4000), ("-0.1", 7000), (2, 7000), (2, 4000), axis="lateral")
    failed = result_of(basis=replace(basis, envelopes=(*basis.envelopes, tight)))

    assert result.check("lateral.take-off").outcome == "pass"
    assert result.check("lateral.take-off").edge == "right"
    assert failed.check("lateral.landing").outcome == "fail"
    assert failed.check("lateral.landing").edge == "left"
    assert result.as_document()["phases"][1]["lateral_text"] == "L 0.23 in"


def test_a_cg_line_names_the_nearest_edge_its_phase_and_both_margins():
    line = result_of().as_document()["governing"]["cg"]

    assert line == "at the ramp: 6.58 in from the forward limit, 1015.5 lb at the same arm"


def test_a_return_above_landing_weight_is_an_advisory_and_never_a_verdict():
    result = result_of(basis=with_limits(**{**ROOMY, "landing": 5400}))

    assert result.verdict == "within"
    assert (
        "overweight for landing until 60.1 US gal (360.5 lb) are burned" in result.as_document()["advisories"]
    )


def test_the_same_inputs_give_the_same_bytes():
    first = canonical(result_of().as_document())
    again = canonical(result_of(deepcopy(load())).as_document())

    assert first == again
    assert b"Osei" not in first


def test_a_percentage_of_the_chord_is_only_told_where_there_is_a_chord():
    assert result_of().as_document()["phases"][0]["percent_chord"] == "14.1"
    bare = result_of(basis=replace(twin(), chord=None))
    assert bare.as_document()["phases"][0]["percent_chord"] is None


def test_nothing_typed_freely_about_people_or_things_stands_in_a_result():
    document = load()
    document["items"][0]["what"] = "bags of Liora Osei"
    document["items"][0]["weight"]["value"] = 290

    assert b"Osei" not in canonical(result_of(document).as_document())


@pytest.mark.parametrize("taken", ["4531", "4532", "99999"])
def test_more_taken_out_than_the_aircraft_weighs_is_outside_and_never_an_error(taken):
    document = load()
    document["passengers"] = []
    document["persons_on_board"] = 1
    document["items"] = [
        {
            "kind": "equipment",
            "what": "everything",
            "place": "AFT-HOLD",
            "weight": {"value": taken, "unit": "lb"},
            "how": "weighed",
            "removed": True,
        }
    ]
    result = result_of(document)

    assert result.verdict == "outside"
    assert result.check("weight.total").outcome == "fail"
    assert result.states == ()


def test_equipment_taken_out_that_leaves_exactly_nothing_is_no_division_by_zero():
    basis = twin()
    one = basis.configurations[0]
    gone = fixed_item("the whole of it", -(4350 + 181), 100)
    result = result_of(basis=replace(basis, configurations=(replace(one, equipment=(gone,)), one)))

    assert result.as_document()["operating_weight"] is None
