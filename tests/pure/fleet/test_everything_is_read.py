"""What a loading basis states arrives whole: every field of every section, exactly, with its own source.

1 lb is 0.45359237 kg and 1 in is 2.54 cm, both exactly (the international pound and inch, remembered).
"""

import pytest

from fleet.basis import (
    BurnStage,
    Chord,
    Configuration,
    Envelope,
    FixedItem,
    Limits,
    Place,
    SampleLoad,
    Seat,
    Tank,
    TankTable,
    Zone,
)
from fleet.basis_reading import read_basis
from fleet.basis_reading.configurations import read_configurations
from fleet.basis_reading.envelopes import read_envelopes
from fleet.basis_reading.fuel import read_burn_order, read_tanks, read_taxi_order
from fleet.basis_reading.limits import read_limits
from fleet.basis_reading.performance import read_performance
from fleet.basis_reading.running_sums import read_conditions, read_cumulative
from fleet.basis_reading.samples import read_sample_loads
from fleet.basis_reading.stations import read_places, read_seats, read_zones
from fleet.basis_reading.variants import read_variants
from fleet.flight_rules import CertificationCategory, Modification, PerformanceRule
from fleet.quantities import Unit
from fleet.sourced import Limit
from fleet.stations import (
    Condition,
    Conditional,
    Cumulative,
    CumulativeStep,
    Floor,
    FloorLimit,
    Rail,
    Setting,
)
from tests.pure.fleet.everything import everything
from tests.pure.fleet.stated import LB, OTHER, PAGE, F, findings, most, of


def test_what_the_basis_is_of():
    one = read_basis(everything())
    assert (one.aircraft_type, one.category, one.engines) == ("Ostrel Kestava 62", "aeroplane", 2)
    assert (one.passenger_seats_installed, one.datum, one.fits) == (4, "nose reference plane", ("wheels",))
    assert (one.weight_unit, one.length_unit, one.volume_unit) == (Unit.LB, Unit.IN, Unit.US_GAL)
    assert one.chord == Chord(F(148), F(64), of("6-3"))
    assert one.lateral_limits_entered is True
    assert (len(one.seats), len(one.places), len(one.zones), len(one.tanks)) == (6, 3, 1, 4)
    assert (len(one.burn_order), len(one.taxi_order), len(one.envelopes)) == (2, 1, 1)
    assert (len(one.configurations), len(one.sample_loads), len(one.positions)) == (2, 2, 2)
    assert (len(one.conditions), len(one.cumulative), len(one.certification_categories)) == (2, 2, 2)
    assert (len(one.modifications), len(one.performance), len(one.lateral_by_cg)) == (1, 1, 1)
    assert (len(one.fuel_balance), len(one.curtailments), len(one.other_datums)) == (2, 1, 2)
    assert (one.limits, one.trim is None, one.presentation is None) == (LIMITS, False, False)


def test_seats():
    seats = read_seats(findings())
    plain, railed, attended = seats[0], seats[2], seats[3]
    assert plain == Seat(
        "COCKPIT-L", "left cockpit seat", "crew", F(132), F("-11.5"), most(300, of("6-9")), of("6-9")
    )
    assert railed == Seat(
        "ROW1-L",
        "row 1, left",
        "passenger",
        F(168),
        F(-12),
        most(300, of("6-9")),
        of("6-9"),
        row="1",
        exit_row=True,
        infant_restraint=True,
        attendant=False,
        conditional=(Conditional(frozenset({"NET"}), Limit(120 / LB, OTHER)),),
        rail=Rail(
            F(162), F("4.5") / F("0.0254"), (Setting("2", F(165)), Setting("5", F("4.4") / F("0.0254"))), PAGE
        ),
    )
    assert (attended.exit_row, attended.infant_restraint, attended.attendant) == (False, False, True)


def test_places_and_zones():
    hold, _, aft = read_places(findings())
    assert hold == Place("NOSE-HOLD", "nose hold", F(88), F(0), most(240, of("6-10")), of("6-10"))
    assert aft == Place(
        "AFT-HOLD",
        "aft hold",
        F(236),
        F(0),
        most(200, of("6-10")),
        of("6-10"),
        conditional=(
            Conditional(frozenset({"NET"}), most(260)),
            Conditional(frozenset({"NET", "DOOR"}), Limit(None, PAGE)),
        ),
        floor=Floor(
            runs="along",
            per_area=FloorLimit(F(75) / 144, Unit.LB_PER_FT2, PAGE),  # 144 square inches to a square foot
            per_length=FloorLimit(150 / LB * F("0.0254"), Unit.KG_PER_M, OTHER),
            free_up_to=F(25),
            free_kinds=("baggage",),
            length=F(48),
        ),
        external=True,
    )
    assert read_zones(findings()) == (
        Zone(
            "AFT-CABIN",
            "row 2 and aft hold together",
            ("ROW2-L", "ROW2-R", "ROW2-FLOOR", "AFT-HOLD"),
            most(640, of("6-10")),
            (Conditional(frozenset({"DOOR"}), most(500)),),
        ),
    )


def test_conditions_and_running_sums():
    assert read_conditions(findings()) == (
        Condition("NET", "net fitted", PAGE),
        Condition("DOOR", "door off", OTHER),
    )
    assert read_cumulative(findings()) == (
        Cumulative(
            "AFT-RUN",
            "from the tail",
            "tail",
            (
                CumulativeStep("station 236", ("AFT-HOLD",), most(190)),
                CumulativeStep("station 200", ("ROW2-L", "ROW2-R"), None),
            ),
        ),
        Cumulative(
            "NOSE-RUN",
            "from the nose",
            "nose",
            (
                CumulativeStep("station 88", ("NOSE-HOLD",), None),
                CumulativeStep("station 132", ("COCKPIT-L",), most(500, OTHER)),
            ),
        ),
    )


def test_tanks_and_the_orders_in_which_they_feed():
    tanks = read_tanks(findings())
    assert tanks[2] == Tank(
        "LEFT-MAIN",
        "left main tank",
        F(70),
        F(-92),
        TankTable(
            "volume",
            "arm",
            "arm",
            None,
            ((F(0), F(166)), (F(20), F("167.4")), (F(45), F("168.8")), (F(70), F("169.6"))),
        ),
        of("6-15"),
    )
    assert [tank.id for tank in tanks] == ["LEFT-AUX", "RIGHT-AUX", "LEFT-MAIN", "RIGHT-MAIN"]
    mains = BurnStage(("LEFT-MAIN", "RIGHT-MAIN"))
    assert read_burn_order(findings()) == (BurnStage(("LEFT-AUX", "RIGHT-AUX")), mains)
    assert read_taxi_order(findings(), ()) == (mains,)


LIMITS = Limits(
    ramp=most(6240, of("2-4")),
    take_off=most(6200, of("2-4")),
    zero_fuel=most(5500, of("2-4")),
    landing=most(5900, of("2-4")),
    minimum_flying=Limit(None, of("2-4")),
)


def test_limits_and_what_replaces_and_tightens_them():
    limits = read_limits(findings())
    variants = read_variants(findings(), limits)
    assert limits == LIMITS
    assert variants.certification_categories == (
        CertificationCategory("normal", "normal category", (), PAGE),
        CertificationCategory(
            "utility",
            "utility category",
            (("take_off", most(6100)), ("landing", most(5800, OTHER))),
            OTHER,
        ),
    )
    assert variants.modifications == (Modification("HEAVY", "heavy gear", (("landing", most(6000)),), OTHER),)


def test_configurations():
    kit = (FixedItem("document case and flight kit", F(14), F(140), F(0)),)
    variants = read_variants(findings(), read_limits(findings()))
    six, freight = read_configurations(findings(), variants)
    assert six == Configuration(
        id="six-seat",
        name="six seats",
        seats=("COCKPIT-L", "COCKPIT-R", "ROW1-L", "ROW1-R", "ROW2-L", "ROW2-R"),
        places=("NOSE-HOLD", "AFT-HOLD"),
        minimum_crew=1,
        fit="wheels",
        equipment=(),
        operating_items=kit,
        limits=LIMITS,
    )
    assert freight == Configuration(
        id="row-2-out",
        name="row 2 taken out",
        seats=("COCKPIT-L", "COCKPIT-R", "ROW1-L", "ROW1-R"),
        places=("NOSE-HOLD", "ROW2-FLOOR", "AFT-HOLD"),
        minimum_crew=1,
        fit="wheels",
        equipment=(
            FixedItem("row 2, left seat out", F(-23), F(201), F(-12)),
            FixedItem("row 2, right seat out", F(-23), F(201), F(12)),
            FixedItem("floor net and rings", F(17), F(198), F(0)),
        ),
        operating_items=kit,
        limits=Limits(
            ramp=LIMITS.ramp,
            take_off=LIMITS.take_off,
            zero_fuel=most(5400),
            landing=most(6000),
            minimum_flying=LIMITS.minimum_flying,
        ),
        modifications=("HEAVY",),
        performance=(PerformanceRule("landing", False, (), (), OTHER),),
    )


def test_rules_on_performance():
    rule = PerformanceRule("take-off", True, ("climb",), ("passenger-charter", "ferry"), PAGE)
    assert read_performance(findings(), everything()["performance"], "/performance") == (rule,)


def test_envelopes():
    points = (("150.5", 3700), ("150.5", 4800), ("155.9", 6240), ("161.95", 6240), (163, 5400), (163, 3700))
    assert read_envelopes(findings(), read_variants(findings(), read_limits(findings()))) == (
        Envelope(
            id="normal",
            axis="longitudinal",
            phases=("ramp", "take-off", "landing", "minimum at landing", "zero fuel"),
            plane="arm",
            points=tuple((F(arm), F(weight)) for arm, weight in points),
            source=of("2-5"),
        ),
    )


@pytest.mark.parametrize(
    ("place", "phase", "within", "page", "printed"),
    [
        (0, "take-off", True, "6-20", (5678, 896500)),
        (1, "zero fuel", False, "6-21", (5058, 828200)),
    ],
)
def test_sample_loads(place, phase, within, page, printed):
    sample = read_sample_loads(findings())[place]
    assert sample.weights[:1] == (FixedItem("empty weight", F(3948), F("157.4"), F(0)),)
    assert sample == SampleLoad(
        name=("manual sample A", "manual sample B, too far aft")[place],
        weights=sample.weights,
        moments=(None,) * (8, 5)[place],
        phase=phase,
        total_weight=F(printed[0]),
        total_moment=F(printed[1]),
        tolerance_moment=F(50),
        within=within,
        source=of(page),
    )
