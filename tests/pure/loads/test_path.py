"""The burn between the phases: kinks, gaps, the worst point, which envelope holds where, how it is told."""

from dataclasses import replace
from fractions import Fraction
from math import floor

import pytest

from fleet.basis import BurnStage, TankTable
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.fuel import fuel_states
from loads.balance.path import burn_path
from loads.balance.prepared import prepared
from records.canonical import canonical
from tests.pure.loads.making import (
    ROOMY,
    envelope,
    load,
    result_of,
    tank,
    twin,
    twin_empty,
    with_limits,
)
from tests.pure.loads.naive_path import assert_as_sampled, sampled

F = Fraction
SAMPLES = 2_000
FLIGHT = ("take-off", "landing")


def rear_first(aft="119.5", **more):
    """The twin with a nose tank that burns before the main, which lies aft: the CG goes aft, then back."""
    tanks = (tank("MAIN", 150, 120), tank("NOSE", 40, 60))
    basis = replace(
        with_limits(**ROOMY),
        tanks=tanks,
        burn_order=(BurnStage(("NOSE",)), BurnStage(("MAIN",))),
        taxi_order=(BurnStage(("MAIN",)),),
        envelopes=(envelope((100, 3000), (100, 7500), (aft, 7500), (aft, 3000)),),
    )
    return replace(basis, **more)


def flight(nose=40, main=70, trip=480, least=120):
    document = load(limits=[])
    amounts = {"NOSE": nose, "MAIN": main}
    document["fuel"] |= {
        "at_engine_start": {name: {"value": held, "unit": "US gal"} for name, held in amounts.items()},
        "taxi": {"value": 6, "unit": "lb"},
        "trip": {"value": trip, "unit": "lb"},
        "minimum_at_landing": {"value": least, "unit": "lb"},
    }
    return document


def path_of(document, basis):
    declared = read_load(document, basis)
    result = assess(declared, basis, twin_empty())
    states = {state.phase: state for state in result.states}
    return burn_path(declared.fuel, fuel_states(declared.fuel, prepared(basis)), states)


def dry(result):
    """The aircraft without fuel: in these loads nothing but what can burn is in the tanks."""
    state = result.state("zero fuel")
    return state.weight, state.moment, state.lateral_moment


def assert_no_sample_is_worse(document, basis, axis="longitudinal", samples=SAMPLES):
    declared = read_load(document, basis)
    result = assess(declared, basis, twin_empty())
    check = result.check(f"path.{axis}")
    assert_as_sampled(check, sampled(declared, basis, dry(result), axis, samples))
    return check


def test_take_off_and_landing_inside_and_the_middle_outside_is_outside():
    document, basis = flight(), rear_first()
    result = result_of(document, basis)

    for code in ("cg.ramp", "cg.take-off", "cg.landing", "cg.minimum-at-landing"):
        assert result.check(code).outcome == "pass", code
    check = assert_no_sample_is_worse(document, basis)
    assert result.verdict == "outside"
    assert (check.outcome, check.edge) == ("fail", "aft")
    # By hand: worst when the nose tank is just empty, 40 gal = 240 lb after take-off.
    worst = result.state("take-off").weight - 240
    moment = result.state("take-off").moment - 240 * 40
    assert check.room == F("119.5") - moment / worst
    assert check.at["feeding"] == ["NOSE"]
    assert check.at["fuel"] == "414"
    assert check.at["point"] == "between take-off and landing"
    assert F(check.actual) > F(check.limit)
    assert check.what_next


def test_the_governing_line_names_the_worst_point_of_the_burn():
    document = result_of(flight(), rear_first()).as_document()

    assert document["governing"]["cg"].startswith("along the burn: ")
    assert "beyond the aft limit, between take-off and landing, at " in document["governing"]["cg"]
    assert document["governing"]["cg"].endswith(" lb with 414 lb of fuel")
    canonical(document)


def test_where_a_phase_is_the_worst_point_the_governing_line_names_the_phase():
    result = result_of()
    document = result.as_document()

    assert document["governing"]["cg"].startswith("at the ramp: ")
    check = result.check("path.longitudinal")
    assert (check.phase, check.at["point"]) == ("ramp", "ramp")
    assert check.margin_text.endswith(" limit, at the ramp")
    assert check.room == result.check("cg.ramp").room


def test_the_document_tells_kinks_and_worst_points_for_the_plot():
    document = result_of(flight(), rear_first()).as_document()
    path = document["path"]

    assert [point["weight"] for point in path["points"]] == [path["worst"][0]["weight"]]
    assert path["worst"][0]["axis"] == "longitudinal"
    at = next(check["at"] for check in document["checks"] if check["code"] == "path.longitudinal")
    assert path["worst"][0] == {"axis": "longitudinal", **at}
    assert document["not_assessed"] == []


def bent_main():
    """The twin with one main tank whose arm comes forward as it fills, straight in arm: a bent moment."""
    table = TankTable("volume", "arm", "arm", None, ((F(0), F(150)), (F(120), F(130))))
    basis = rear_first(burn_order=(BurnStage(("MAIN",)), BurnStage(("NOSE",))))
    return replace(basis, tanks=(replace(basis.tanks[0], table=table), basis.tanks[1]))


def touching(basis, document, plane, by):
    """The basis with an aft edge that touches the path a third of the way to the landing, shifted by `by`."""
    path = next(each for each in path_of(document, basis).stretches if each.leg == "flight")
    weight = path.start.weight - (path.start.weight - path.end.weight) / 3
    moment = path.at(weight).moment
    # The slope of a quadratic is that of the chord around it.
    around = path.at(weight + 1).moment - path.at(weight - 1).moment
    slope = around / 2
    if plane == "arm":
        slope = (slope - moment / weight) / weight
    touch = moment if plane == "moment" else moment / weight
    high = tuple((touch + slope * (y - weight) + by, y) for y in (F(7500), F(3000)))
    low = tuple((F(100) * (y if plane == "moment" else 1), y) for y in (F(3000), F(7500)))
    return replace(basis, envelopes=(envelope(*low, *high, plane=plane, phases=FLIGHT),))


@pytest.mark.parametrize(("plane", "make"), [("arm", rear_first), ("arm", bent_main), ("moment", bent_main)])
def test_an_edge_that_touches_the_path_between_its_kinks_is_kept_and_a_hair_nearer_is_broken(plane, make):
    basis = make(burn_order=(BurnStage(("MAIN",)),)) if make is rear_first else make()
    document = flight(nose=0, main=110, trip=540, least=60)
    hair = F(1, 10**30)

    on, kept, broken = (
        result_of(document, touching(basis, document, plane, by)) for by in (F(0), hair, -hair)
    )

    for result in (on, kept, broken):
        assert {result.check(f"cg.{phase}").outcome for phase in FLIGHT} == {"pass"}
    assert (on.verdict, on.check("path.longitudinal").room) == ("within", 0)
    assert on.check("path.longitudinal").margin_text.startswith("on the aft limit, between take-off and")
    assert kept.verdict == "within"
    assert broken.verdict == "outside"
    failed = broken.check("path.longitudinal")
    assert failed.room < 0
    assert F(failed.actual) > F(failed.limit)
    assert_no_sample_is_worse(document, touching(basis, document, plane, F(-1, 3)))


def test_a_notch_between_take_off_and_landing_is_outside():
    basis, document = rear_first(aft="140"), flight(nose=0, main=110, trip=540, least=60)
    take_off, landing = (result_of(document, basis).state(phase) for phase in FLIGHT)
    middle = (take_off.weight + landing.weight) / 2
    arm = (take_off.arm + landing.arm) / 2
    notched = envelope(
        (100, 3000),
        (100, 7500),
        (140, 7500),
        (140, middle + 60),
        (arm - 2, middle),
        (140, middle - 60),
        (140, 3000),
    )

    result = result_of(document, replace(basis, envelopes=(notched,)))

    assert result.check("cg.take-off").outcome == result.check("cg.landing").outcome == "pass"
    check = assert_no_sample_is_worse(document, replace(basis, envelopes=(notched,)))
    assert (check.outcome, check.edge) == ("fail", "aft")


@pytest.mark.parametrize(
    ("low", "high", "where"),
    [(3000, 5600, "at the ramp"), (5100, 7500, "with the least fuel at landing")],
)
def test_an_envelope_without_a_part_at_some_weight_of_the_burn_has_no_margin_there(low, high, where):
    basis = rear_first(aft="140")
    short = envelope((100, low), (100, high), (140, high), (140, low))
    check = result_of(flight(least=6), replace(basis, envelopes=(short,))).check("path.longitudinal")

    assert (check.outcome, check.room, check.limit, check.edge) == ("fail", None, None, None)
    assert check.margin_text == f"no part of the envelope lies at this weight, {where}"


def test_an_envelope_for_landing_alone_binds_from_the_landing_on_and_not_before():
    wide = replace(rear_first(aft="140").envelopes[0], phases=("ramp", "take-off"))
    document = flight(trip=480, least=60)
    plain = result_of(document, rear_first(aft="140"))
    landing = plain.state("landing")
    narrow = envelope((100, 3000), (100, 7500), (landing.arm, 7500), (landing.arm, 3000), phases=("landing",))
    result = result_of(document, replace(rear_first(), envelopes=(wide, narrow)))

    # The mains lie aft of the CG, so it was farther aft before the landing and is farther forward after it.
    assert plain.state("take-off").arm < landing.arm
    assert max(F(point["arm"]) for point in plain.as_document()["path"]["points"]) > landing.arm
    assert (result.verdict, result.check("path.longitudinal").room) == ("within", 0)
    assert result.check("path.longitudinal").phase == "landing"


def test_the_envelope_of_take_off_binds_until_the_least_fuel_at_landing():
    document = flight(trip=300, least=60)
    plain = result_of(document, rear_first(aft="140"))
    landing, least = plain.state("landing"), plain.state("minimum at landing")
    wide = replace(rear_first(aft="140").envelopes[0], phases=("ramp", "landing"))
    between_them = (landing.weight + least.weight) / 2
    flown = envelope((90, between_them), (90, 7500), (140, 7500), (140, between_them), phases=("take-off",))
    result = result_of(document, replace(rear_first(), envelopes=(wide, flown)))

    assert result.check("cg.landing").outcome == result.check("cg.minimum-at-landing").outcome == "pass"
    assert result.check("path.longitudinal").outcome == "fail"
    assert result.check("path.longitudinal").at["point"] == "minimum at landing"


def test_the_ramp_envelope_binds_while_taxiing_and_without_one_taxiing_is_not_judged():
    basis = rear_first(aft="140", taxi_order=(BurnStage(("NOSE",)),))
    document = flight()
    ramp = result_of(document, basis).state("ramp")
    tight = envelope((100, 3000), (100, 7500), (ramp.arm, 7500), (ramp.arm, 3000), phases=("ramp",))
    flown = replace(basis.envelopes[0], phases=FLIGHT)
    judged = result_of(document, replace(basis, envelopes=(flown, tight)))
    told = result_of(document, replace(basis, envelopes=(flown,)))

    assert judged.check("cg.ramp").outcome == judged.check("cg.take-off").outcome == "pass"
    assert judged.check("path.longitudinal").outcome == "fail"
    assert judged.check("path.longitudinal").phase == "take-off"
    assert told.check("path.longitudinal").outcome == "pass"


def test_a_hair_above_the_weight_of_a_corner_the_narrower_part_binds():
    document = flight()
    ramp = result_of(document, rear_first(aft="140")).state("ramp")
    level = floor(ramp.weight)
    arm = ramp.arm - 1
    outline = ((100, 3000), (100, 7500), (arm, 7500), (arm, level), (140, level), (140, 3000))
    result = result_of(document, replace(rear_first(), envelopes=(envelope(*outline),)))

    assert 0 < ramp.weight - level < 1
    check = result.check("path.longitudinal")
    assert (check.outcome, check.phase, check.room) == ("fail", "ramp", -1)
    assert result.check("cg.ramp").room == -1


def test_lateral_limits_are_checked_along_the_burn():
    """One side burns first, and both sides hold the same at take-off and nearly so at the least fuel."""
    wide = replace(
        twin().envelopes[0], points=((F(90), F(3000)), (F(90), F(9000)), (F(150), F(9000)), (F(150), F(3000)))
    )
    across = envelope((-2, 3000), (-2, 9000), (2, 9000), (2, 3000), axis="lateral")
    stages = (BurnStage(("LEFT-MAIN",)), BurnStage(("RIGHT-MAIN",)))
    basis = replace(
        with_limits(**ROOMY), envelopes=(wide, across), burn_order=stages, taxi_order=twin().taxi_order
    )
    document = load(limits=[])
    document["fuel"]["at_engine_start"] |= {
        name: {"value": 0, "unit": "US gal"} for name in ("LEFT-AUX", "RIGHT-AUX")
    }
    document["fuel"] |= {
        "trip": {"value": 540, "unit": "lb"},
        "minimum_at_landing": {"value": 20, "unit": "lb"},
    }
    result = result_of(document, basis)

    assert result.check("lateral.take-off").outcome == result.check("lateral.landing").outcome == "pass"
    check = assert_no_sample_is_worse(document, basis, "lateral")
    assert (check.outcome, check.edge, check.at["feeding"]) == ("fail", "right", ["LEFT-MAIN"])


def test_without_lateral_limits_there_is_no_lateral_path():
    assert "path.lateral" not in {check.code for check in result_of().checks}


def gapped(first=20):
    basis = rear_first(aft="140")
    table = TankTable("volume", "arm", "arm", None, ((F(first), F(38)), (F(60), F(40))))
    return replace(basis, tanks=(basis.tanks[0], replace(basis.tanks[1], table=table)))


def test_a_table_that_begins_above_nothing_leaves_the_burn_below_it_unresolved():
    result = result_of(flight(), gapped())

    assert {result.check(code).outcome for code in ("cg.take-off", "cg.landing")} == {"pass"}
    check = result.check("path.longitudinal")
    assert (result.verdict, check.outcome) == ("unresolved", "unresolved")
    assert (
        check.margin_text
        == "between take-off and landing nose holds less than 20 US gal, where its table begins"
    )
    assert check.what_next


def test_what_is_known_beside_such_a_gap_is_still_judged():
    wide, path = gapped(), path_of(flight(), gapped())
    tight = replace(
        wide, envelopes=(replace(wide.envelopes[0], points=rear_first("116.5").envelopes[0].points),)
    )

    assert [gap.tank for gap in path.gaps] == ["NOSE"]
    assert result_of(flight(), tight).check("path.longitudinal").outcome == "fail"


def test_without_a_take_off_envelope_the_path_is_unresolved():
    basis = rear_first(aft="140")
    basis = replace(basis, envelopes=(replace(basis.envelopes[0], phases=("ramp", "landing")),))

    assert result_of(flight(), basis).check("path.longitudinal").outcome == "unresolved"


def test_kinks_are_at_a_dry_tank_another_stage_and_a_point_of_a_table():
    table = TankTable("volume", "arm", "arm", None, ((F(0), F(150)), (F(50), F(148)), (F(120), F(151))))
    basis = rear_first(aft="140")
    basis = replace(basis, tanks=(replace(basis.tanks[0], table=table), basis.tanks[1]))
    path = path_of(flight(nose=20, main=70, trip=300), basis)

    assert [(one.leg, one.feeding) for one in path.stretches] == [
        ("taxi", ("MAIN",)),
        ("flight", ("NOSE",)),
        ("flight", ("MAIN",)),
        ("flight", ("MAIN",)),
        ("reserve", ("MAIN",)),
    ]
    # By hand: 1 gal of taxi fuel, then 20 gal of the nose, then 19 gal of the main down to its row of 50.
    start = path.stretches[0].start.weight
    assert [start - one.end.weight for one in path.stretches[:3]] == [6, 126, 240]
    assert all(one.end == other.start for one, other in zip(path.stretches, path.stretches[1:], strict=False))


def test_a_move_that_mends_every_phase_but_not_the_burn_between_is_not_named():
    bags = {"kind": "baggage", "what": "bags", "place": "AFT-HOLD", "how": "weighed"}
    document = flight() | {"items": [{**bags, "weight": {"value": 150, "unit": "lb"}}]}
    plain = result_of(document, rear_first(aft="140"))
    worst = max(F(point["arm"]) for point in plain.as_document()["path"]["points"])
    basis = rear_first(aft=str(worst - F(1, 2)))

    failed = result_of(document, basis).check("path.longitudinal")
    amount = F(failed.what_next.split("at least ")[1].split(" lb")[0])
    rest = {**bags, "weight": {"value": str(float(150 - amount)), "unit": "lb"}}
    moved = {**bags, "place": "NOSE-HOLD", "weight": {"value": str(float(amount)), "unit": "lb"}}

    assert failed.outcome == "fail"
    assert "aft hold to nose hold" in failed.what_next
    assert result_of(document | {"items": [rest, moved]}, basis).verdict == "within"
