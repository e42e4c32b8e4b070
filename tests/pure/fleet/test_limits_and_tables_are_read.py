"""What a loading basis states of margins, trim, fuel and moving parts arrives whole, too."""

from fleet.basis import (
    OtherDatum,
)
from fleet.basis_reading.curtailments import read_curtailments
from fleet.basis_reading.datums import read_other_datums
from fleet.basis_reading.envelopes import read_envelopes
from fleet.basis_reading.fuel_balance import read_fuel_balance
from fleet.basis_reading.lateral import read_lateral_by_cg
from fleet.basis_reading.limits import read_limits
from fleet.basis_reading.positions import read_positions
from fleet.basis_reading.presentation import read_presentation
from fleet.basis_reading.trim import read_trim
from fleet.basis_reading.variants import read_variants
from fleet.curtailment import Amounts, Curtailment, Inset
from fleet.fuel_balance import FuelBalance
from fleet.lateral import LateralByCg
from fleet.positions import MovingPart, PartState
from fleet.presentation import DividedMoment, IndexUnits, Presentation
from fleet.sourced import Source
from fleet.trim import Trim, TrimLine, TrimTable
from tests.pure.fleet.stated import KG_M, OTHER, PAGE, F, findings


def test_lateral_limits_against_the_cg():
    points = (("3.8", -90), ("3.8", 90), ("4.2", 60), ("4.2", -60))
    assert read_lateral_by_cg(findings()) == (
        LateralByCg(
            id="hover",
            phases=("take-off", "landing", "minimum at landing"),
            gives="moment",
            points=tuple((F(arm) / F("0.0254"), moment * KG_M) for arm, moment in points),
            source=OTHER,
            configurations=("row-2-out",),
            categories=("utility",),
            positions=(("GEAR", ("UP",)),),
        ),
    )


def test_moving_parts():
    assert read_positions(findings()) == (
        MovingPart(
            "GEAR",
            "landing gear",
            "DOWN",
            (
                PartState("DOWN", "down", F(0), ("ground", "flight"), PAGE),
                PartState("UP", "up", -10 * KG_M, ("flight",), PAGE),
            ),
        ),
        MovingPart(
            "FLAPS",
            "flaps",
            "IN",
            (
                PartState("IN", "in", F(0), ("ground", "flight"), PAGE),
                PartState("OUT", "out", F(500), ("ground", "flight"), PAGE),
            ),
        ),
    )


def test_how_far_the_fuel_may_differ():
    assert read_fuel_balance(findings()) == (
        FuelBalance(
            "MAINS",
            "main tanks",
            ("LEFT-MAIN",),
            ("RIGHT-MAIN",),
            "volume",
            F(10),
            (),
            ("take-off",),
            PAGE,
        ),
        FuelBalance(
            "WINGS",
            "all tanks",
            ("LEFT-MAIN", "LEFT-AUX"),
            ("RIGHT-MAIN", "RIGHT-AUX"),
            "weight",
            None,
            ((F(0), F(200)), (F(600), F(90)), (F(1320), F(0))),
            ("ramp", "take-off", "landing"),
            OTHER,
        ),
    )


def test_trim_tables_by_flap_and_rising_weight():
    points = ((F(150), F(8)), (F(160), F(2)))
    assert read_trim(findings()) == Trim(
        "arm",
        "units nose up",
        F("0.5"),
        F(0),
        F(9),
        OTHER,
        (
            TrimTable("up", (TrimLine(F(4000), points, OTHER), TrimLine(F(7000), points, PAGE))),
            TrimTable("10", (TrimLine(None, points, PAGE),)),
        ),
    )


def test_the_operators_margins():
    none = Inset(F(0), F(0))
    envelopes = read_envelopes(findings(), read_variants(findings(), read_limits(findings())))
    assert read_curtailments(findings(), envelopes) == (
        Curtailment(
            id="SEATING",
            purpose="seating variation",
            phases=("take-off", "landing", "minimum at landing"),
            rows=(
                Amounts(None, F(5000), Inset(F(0), 10 * KG_M), Inset(F("0.5"), F(0)), none, none),
                Amounts(F(5000), None, Inset(F("0.25"), F(0)), none, none, none),
            ),
            source=Source("OM-A", "4", "8-12"),
            configurations=("six-seat",),
            categories=("normal",),
        ),
    )


def test_how_moments_are_shown():
    assert read_presentation(findings()) == Presentation(
        IndexUnits(F(155), F(1000), F(40), OTHER), DividedMoment(F(1000), PAGE)
    )


def test_other_datums():
    assert read_other_datums(findings()) == (
        OtherDatum("firewall", 1 / F("0.0254"), OTHER),
        OtherDatum("nose tip", F(-3), OTHER),
    )
