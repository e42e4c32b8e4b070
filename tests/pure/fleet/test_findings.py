"""What one reading of a document carries along, each part by itself."""

from fractions import Fraction

from fleet.basis import Envelope, FixedItem
from fleet.basis_reading.applicability import combinations, everything, in_words
from fleet.basis_reading.envelopes import lateral_limits_entered, phases_of, read_envelopes
from fleet.basis_reading.findings import Findings, exact, number
from fleet.basis_reading.floors import read_floor
from fleet.basis_reading.fuel import read_burn_order, read_tanks, read_taxi_order
from fleet.basis_reading.limits import contradictions, given_limits, read_limits
from fleet.basis_reading.presentation import across_of, divided_by, index_of, read_presentation
from fleet.basis_reading.reading import basis_from_text
from fleet.basis_reading.samples import read_sample_loads
from fleet.basis_reading.trim import read_trim
from fleet.basis_reading.variants import read_variants
from fleet.presentation import IndexUnits
from fleet.quantities import Unit
from fleet.sourced import Limit, Source
from fleet.stations import Floor, FloorLimit
from records.canonical import canonical
from records.refusal import Fault
from tests.pure.fleet.documents import basis_document, changed
from tests.pure.fleet.everything import PAGE, amount, limit
from tests.pure.fleet.everything import everything as full

F = Fraction


def findings(*faults, **more):
    document = {
        "document": {"number": "FM", "revision": "C"},
        "units": {"weight": "lb", "length": "in", "volume": "US gal"},
    }
    return Findings(document | more, list(faults))


def fault(pointer):
    return Fault(pointer, "code", "detail")


def told(one):
    return [(each.pointer, each.code, each.detail) for each in one.faults]


def test_a_reading_counts_in_the_units_of_its_document():
    one = findings()
    assert (one.weight, one.length, one.volume) == (Unit.LB, Unit.IN, Unit.US_GAL)
    assert (one.density, one.moment) == (Unit.LB_PER_US_GAL, Unit.LB_IN)


def test_where_a_fault_of_form_lies_all_that_holds_it_is_unsound_and_nothing_beside_it():
    one = findings(fault("/seats/12/arm"), fault("/trim"))
    for pointer in ("/seats", "/seats/12", "/seats/12/arm", "/trim", ""):
        assert one.sound(pointer) is False
    for pointer in ("/seats/1", "/seats/12/name", "/seats/12/ar", "/tri", "/places", "/trim/step"):
        assert one.sound(pointer) is True
    assert findings().sound("") is True


def test_entries_are_the_sound_objects_of_a_list_with_their_places():
    one = findings(fault("/seats/1/arm"), seats=[{"id": "A"}, {"id": "B"}, {"id": "C"}], zones={"id": "D"})
    assert list(one.entries("seats")) == [("/seats/0", {"id": "A"}), ("/seats/2", {"id": "C"})]
    assert list(one.entries("zones")) == list(one.entries("places")) == []


def test_names_are_those_of_unsound_entries_too_as_far_as_there_are_any():
    one = findings(fault("/seats/1/arm"), seats=[{"id": "A"}, {"id": "B"}, {"id": 7}, {}, "text"], zones={})
    assert one.named("seats") == {"A", "B"}
    assert one.named("zones") == one.named("places") == frozenset()


def test_a_source_defaults_to_the_document_and_revision_of_the_basis():
    one = findings()
    assert one.source({"page": "1"}) == Source("FM", "C", "1")
    assert one.source({"page": "1", "revision": "D"}) == Source("FM", "D", "1")
    assert one.source({"page": "1", "document": "S7"}) == Source("S7", "", "1")
    assert one.source({"page": "1", "document": "S7", "revision": "2"}) == Source("S7", "2", "1")


def test_a_limit_is_a_value_none_with_its_page_or_not_entered():
    one = findings()
    assert one.limit(None, "/at") is None
    assert one.limit({"none": True, "source": {"page": "1"}}, "/at") == Limit(None, Source("FM", "C", "1"))
    assert one.limit(limit(5), "/at") == Limit(F(5), Source("FM", "C", "7-1"))
    assert one.faults == []
    assert one.limit(limit(0), "/at") == Limit(F(0), Source("FM", "C", "7-1"))
    assert told(one) == [("/at/value", "not-above-zero", "must be above zero; correct it")]


def test_little_is_above_zero_and_a_quantity_is_exact():
    one = findings()
    assert one.above_zero(amount("0.1", "lb"), Unit.LB, "/at") == F("0.1")
    assert one.faults == []
    assert exact(amount("1", "m"), Unit.MM) == 1000
    assert number("0.30") == F("0.3")


def test_ids_are_known_and_named_once():
    one = findings()
    one.known(["A", "X", "A", "X"], frozenset("AB"), "/at", "seat")
    assert told(one) == [
        ("/at/1", "unknown-id", "X is no seat of this basis; correct or enter it"),
        ("/at/2", "duplicate", "A stands here twice; remove one"),
        ("/at/3", "unknown-id", "X is no seat of this basis; correct or enter it"),
    ]


def test_an_id_is_given_once_within_all_the_lists_named():
    one = findings(seats=[{"id": "A"}, {"id": "A"}], places=[{"id": "B"}, {"id": "A"}], zones=[{"id": "A"}])
    one.once(("seats", "places"))
    assert told(one) == [
        ("/seats/1/id", "duplicate-id", "A is already used; give another id"),
        ("/places/1/id", "duplicate-id", "A is already used; give another id"),
    ]


def test_a_limit_with_a_fault_of_form_counts_as_not_entered():
    one = findings(fault("/limits/ramp/value"), limits={"ramp": {"value": "x"}, "landing": limit(5)})
    read = read_limits(one)
    assert (read.ramp, read.landing) == (None, Limit(F(5), Source("FM", "C", "7-1")))
    assert given_limits(findings(), [], "/limits") == read_limits(findings())


def test_limits_contradict_only_where_one_of_the_pair_is_named():
    read = read_limits(findings(limits={"ramp": limit(5), "take_off": limit(6), "landing": limit(7)}))
    words = {
        "take_off": "the take off limit lies above the ramp limit; check both figures",
        "landing": "the landing limit lies above the ramp limit; check both figures",
    }
    assert list(contradictions(read, {"ramp"})) == [
        ("landing", words["landing"]),
        ("take_off", words["take_off"]),
    ]
    assert [field for field, _ in contradictions(read, {"zero_fuel"})] == []
    assert [field for field, _ in contradictions(read, {"take_off"})] == ["landing", "take_off"]


def test_cases_are_told_by_configuration_category_and_deciding_states():
    one = Findings(full(), [])
    assert everything(one) == {
        (configuration, category, f"GEAR {state}")
        for configuration in ("six-seat", "row-2-out")
        for category in ("normal", "utility")
        for state in ("DOWN", "UP")
    }
    assert combinations(one, {"configurations": ["six-seat"], "categories": ["normal"]}) == {
        ("six-seat", "normal", "GEAR DOWN"),
        ("six-seat", "normal", "GEAR UP"),
    }
    held = {"positions": [{"part": "GEAR", "states": ["UP"]}], "external_load": "carried"}
    assert combinations(one, held) == {
        (configuration, category, "GEAR UP")
        for configuration in ("six-seat", "row-2-out")
        for category in ("normal", "utility")
    }
    hooked = Findings(changed(full(), "/envelopes/0/external_load", "none"), [])
    assert len(everything(hooked)) == 16
    assert ("six-seat", "normal", "GEAR UP", "external load carried") in everything(hooked)
    assert ("six-seat", "normal", "GEAR UP", "external load none") in everything(hooked)
    assert in_words(("six-seat", "", "GEAR UP")) == "configuration six-seat, GEAR UP"
    assert in_words(("six-seat", "normal")) == "configuration six-seat, category normal"
    assert everything(findings()) == {("", "")}


def test_phases_by_the_words_of_a_document():
    assert phases_of(["landing", "zero-fuel", "ramp", "take-off"]) == (
        "landing",
        "minimum at landing",
        "zero fuel",
        "ramp",
        "take-off",
    )


def test_lateral_limits_are_entered_by_an_envelope_a_table_or_a_page_that_shows_none():
    def envelope(axis):
        corners = ((F(1), F(1)), (F(1), F(2)), (F(2), F(2)))
        return Envelope("e", axis, ("ramp",), "arm", corners, Source("FM", "", "1"))

    assert lateral_limits_entered(findings(), ()) is False
    assert lateral_limits_entered(findings(), (envelope("longitudinal"),)) is False
    assert lateral_limits_entered(findings(), (envelope("longitudinal"), envelope("lateral"))) is True
    assert lateral_limits_entered(findings(lateral_by_cg=[]), ()) is True
    none = findings(lateral_limits={"none": True})
    assert lateral_limits_entered(none, ()) is True
    assert none.faults == []
    assert lateral_limits_entered(none, (envelope("lateral"),)) is True
    assert told(none) == [
        ("/lateral_limits", "limits-contradict", "there are lateral limits; remove one of the two")
    ]


def across(entry, **more):
    one = Findings(full() | more, [])
    found = across_of(one, "/at", {"axis": "longitudinal", "plane": "arm", "unit": "in"} | entry)
    assert one.faults == []
    return found(F(5000), F(50))


def test_what_is_printed_across_an_envelope_becomes_an_arm_or_a_moment():
    """The chord begins at 148 in and is 64 in long; an index of 50 at 5,000 lb is (50 - 40) * 1000 + 155 *
    5000 = 785,000 lb in.
    """
    assert across({}) == 50
    assert across({"unit": "ft"}) == 600
    assert across({"unit": "lb ft", "plane": "moment"}) == 600
    assert across({"unit": "lb ft", "plane": "moment", "divided_by": 100}) == 60_000
    assert across({"unit": "% MAC"}) == 180
    assert across({"unit": "index", "plane": "moment"}) == 785_000
    assert across({"axis": "lateral"}) == 50


def test_figures_printed_whole_are_multiplied_by_one_and_a_divisor_may_be_below_one():
    one = findings()
    assert divided_by(one, "/at", {}, moments=False) == 1
    assert divided_by(one, "/at", {"divided_by": "0.5"}, moments=True) == F("0.5")
    assert one.faults == []


def test_an_index_of_the_basis_is_found_and_a_divisor_may_be_below_one():
    small = changed(full(), "/presentation/index/divisor/value", "0.5")
    wanted = IndexUnits(F(155), F("0.5"), F(40), Source("OK62-S7", "2", "3"))
    one = Findings(small, [])
    assert index_of(one, "/at") == wanted
    assert read_presentation(one).index == wanted
    assert one.faults == []


def test_an_index_that_stands_for_nothing_is_read_on_with_one_so_that_more_faults_are_found():
    one = Findings(changed(full(), "/presentation/index/divisor/value", 0), [])
    assert index_of(one, "/at").divisor == 1
    assert one.faults == []


def test_trim_against_percent_of_the_chord_and_against_an_index():
    chord = changed(changed(full(), "/trim/against", "chord"), "/trim/against_unit", ...)
    found = read_trim(Findings(chord, []))
    assert found.against == "chord"
    assert found.tables[1].lines[0].points == ((F(3810), F(8)), (F(4064), F(2)))
    index = changed(chord, "/trim/against", "index")
    index = changed(index, "/trim/tables/2/weight", amount("0.5", "lb"))
    one = Findings(changed(index, "/trim/range", ...), [])
    found = read_trim(one)
    assert one.faults == []
    assert (found.against, found.lowest, found.highest, found.source) == ("arm", None, None, None)
    # (3810 - 40) * 1000 / 0.5 + 155
    assert found.tables[1].lines[0].points[0] == (F(3770_000) / F("0.5") + 155, F(8))


def test_a_basis_without_trim_or_with_a_page_that_shows_none_has_none():
    assert read_trim(findings()) is None
    assert read_trim(findings(trim={"none": True, "source": PAGE})) is None
    assert read_trim(findings(fault("/trim/step"), trim=full()["trim"])) is None
    assert read_presentation(findings(fault("/presentation/index"), presentation={})) is None
    assert read_presentation(findings()) is None


def test_the_text_of_a_stored_basis_is_read_once():
    text = canonical(basis_document("twin")).decode()
    assert basis_from_text(text) is basis_from_text(text)
    assert basis_from_text(text).aircraft_type == "Ostrel Kestava 62"


FLOOR = {
    "runs": "across",
    "per_area": limit("0.5", "kg/m2"),
    "per_length": {"none": True, "source": {"page": "2"}},
    "length": amount("0.5", "in"),
    "no_footprint": {"up_to": amount("0.25", "lb"), "kinds": ["mail", "baggage"]},
}
FM = Source("FM", "C", "7-1")


def test_what_a_floor_bears_is_read_into_the_units_of_the_basis_with_the_unit_it_was_entered_in():
    one = findings()
    square = F("0.5") / F("0.45359237") * F("0.0254") ** 2
    assert read_floor(one, "/at", FLOOR) == Floor(
        runs="across",
        per_area=FloorLimit(square, Unit.KG_PER_M2, FM),
        per_length=FloorLimit(None, None, Source("FM", "C", "2")),
        free_up_to=F("0.25"),
        free_kinds=("mail", "baggage"),
        length=F("0.5"),
    )
    assert read_floor(one, "/at", {"runs": "along"}) == Floor("along", None, None, None, (), None)
    assert read_floor(one, "/at", None) is None
    assert one.faults == []


def test_tanks_behind_one_whose_table_is_none_are_read_too_and_small_figures_are_figures():
    document = changed(full(), "/tanks/0/table/gives", "moment")
    document = changed(document, "/tanks/1/capacity/value", "0.5")
    one = Findings(document, [])
    assert [tank.id for tank in read_tanks(one)] == ["RIGHT-AUX", "LEFT-MAIN", "RIGHT-MAIN"]
    assert told(one) == [
        ("/tanks/0/table/gives_unit", "unit-dimension", "in is no unit of moment; correct it")
    ]


def test_an_envelope_serves_a_phase_without_a_limit_and_those_behind_it_are_judged_still():
    document = changed(full(), "/limits/ramp", ...)
    document = changed(document, "/limits/zero_fuel/value", 3700)
    document = changed(document, "/configurations/1/limits", ...)
    one = Findings(document, [])
    read_envelopes(one, read_variants(one, read_limits(one)))
    assert [(each.pointer, each.code) for each in dict.fromkeys(one.faults)] == [
        ("/envelopes/0/phases/3", "envelope-outside-limits")
    ]
    none = Findings(changed(document, "/limits/ramp", {"none": True, "source": PAGE}), [])
    read_envelopes(none, read_variants(none, read_limits(none)))
    assert [each.code for each in dict.fromkeys(none.faults)] == ["envelope-outside-limits"]


def test_an_index_envelope_has_each_corner_at_the_moment_of_its_own_weight():
    """Index 40 at a weight is 155 times the weight in moment, whatever it is divided by."""
    document = changed(full(), "/envelopes/0/plane", "moment")
    document = changed(document, "/envelopes/0/unit", "index")
    document = changed(document, "/envelopes/0/points", [[3700, 40], [6240, 40], [6240, 60]])
    one = Findings(document, [])
    (envelope,) = read_envelopes(one, read_variants(one, read_limits(one)))
    assert envelope.points == (
        (F(3700 * 155), F(3700)),
        (F(6240 * 155), F(6240)),
        (F(6240 * 155 + 20_000), F(6240)),
    )


def test_a_table_of_one_point_is_refused_at_its_points():
    one = Findings(changed(full(), "/tanks/0/table/points", [[0, 138]]), [])
    read_tanks(one)
    assert told(one) == [
        (
            "/tanks/0/table/points",
            "tank-table-too-short",
            "a tank table needs at least two points; enter those of the manual",
        )
    ]


def test_taxiing_feeds_by_the_burn_order_where_it_has_no_order_of_its_own():
    one = Findings(changed(full(), "/taxi_order", ...), [])
    burn = read_burn_order(one)
    assert read_taxi_order(one, burn) is burn
    own = read_taxi_order(Findings(full(), []), burn)
    assert [stage.tanks for stage in own] == [("LEFT-MAIN", "RIGHT-MAIN")]


def test_a_sample_load_keeps_the_moments_the_manual_prints_and_the_arms_they_make():
    """5,000 lb in at 50 lb are 100 in; 100 lb at 60 in are given as an arm."""
    document = changed(full(), "/sample_loads/0/tolerance_moment/value", "0.5")
    lines = [
        {"what": "seats", "weight": amount(100, "lb"), "arm": amount(5, "ft")},
        {"what": "holds", "weight": amount(50, "lb"), "moment": amount(5000, "lb in")},
    ]
    one = Findings(changed(document, "/sample_loads/0/weights", lines), [])
    sample = read_sample_loads(one)[0]
    assert sample.weights == (
        FixedItem("seats", F(100), F(60), F(0)),
        FixedItem("holds", F(50), F(100), F(0)),
    )
    assert (sample.moments, sample.tolerance_moment) == ((None, F(5000)), F("0.5"))
    assert one.faults == []
