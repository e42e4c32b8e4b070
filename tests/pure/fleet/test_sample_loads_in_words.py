"""Every way in which a sample load differs from what the manual prints, in full, and what judges it."""

from dataclasses import replace
from fractions import Fraction

import pytest

from fleet.basis import FixedItem, SampleLoad
from fleet.sample_loads import SampleFailure, failures_of
from tests.pure.loads.making import SOURCE, envelope, limits, twin

F = Fraction


def sample(**changes):
    """6,000 lb at 120 in, 720,000 lb in: inside the twin's envelope."""
    load = SampleLoad(
        name="A",
        weights=(FixedItem("empty", F(5000), F(118), F(0)), FixedItem("load", F(1000), F(130), F(0))),
        moments=(None, None),
        phase="take-off",
        total_weight=F(6000),
        total_moment=F(720_000),
        tolerance_moment=F(5),
        within=True,
        source=SOURCE,
    )
    return replace(load, **changes)


def failures(basis=None, **changes):
    return failures_of(replace(basis or twin(), sample_loads=(sample(**changes),)))


def test_a_load_that_comes_out_as_printed_to_the_tolerance_fails_in_nothing():
    assert failures() == failures(total_moment=F(720_005)) == failures(total_moment=F(719_995)) == ()
    assert failures(moments=(F(590_000), None)) == ()
    assert failures(moments=(None, F(130_005))) == ()


@pytest.mark.parametrize(
    ("changes", "code", "detail"),
    [
        ({"total_weight": F("6000.5")}, "sample-weight", "weights add up to 6000 lb; printed is 6000.5"),
        (
            {"total_moment": F("720005.1")},
            "sample-moment",
            "the moments add up to 720000 lb in, the manual prints 720005.1",
        ),
        (
            {"moments": (F(590_006), None)},
            "sample-moment",
            "the moments add up to 720006 lb in, the manual prints 720000",
        ),
        ({"within": False}, "sample-verdict", "comes out within limits, the manual shows it outside"),
        (
            {"phase": "minimum at landing"},
            "sample-no-envelope",
            "no longitudinal envelope serves minimum at landing, so the sample load cannot be judged",
        ),
    ],
)
def test_what_differs_is_told_with_both_figures(changes, code, detail):
    assert failures(**changes) == (SampleFailure("A", code, detail),)


def test_every_difference_of_every_load_is_told():
    basis = replace(
        twin(),
        sample_loads=(
            sample(total_weight=F(1), total_moment=F(1), within=False),
            sample(name="B", within=False),
        ),
    )
    assert [(one.name, one.code) for one in failures_of(basis)] == [
        ("A", "sample-weight"),
        ("A", "sample-moment"),
        ("A", "sample-verdict"),
        ("B", "sample-verdict"),
    ]
    assert failures_of(replace(twin(), sample_loads=())) == ()


@pytest.mark.parametrize(
    ("phase", "field"),
    [("ramp", "ramp"), ("take-off", "take_off"), ("zero fuel", "zero_fuel"), ("landing", "landing")],
)
def test_a_load_heavier_than_the_limit_of_its_phase_is_outside(phase, field):
    outside = "comes out outside limits, the manual shows it within"
    for most, found in ((6000, ()), ("5999.9", (SampleFailure("A", "sample-verdict", outside),)), (None, ())):
        basis = replace(twin(), limits=limits(**{field: most}))
        assert failures(basis, phase=phase) == found
    assert failures(replace(twin(), limits=limits()), phase=phase) == ()


def test_the_landing_limit_holds_on_down_to_the_minimum_at_landing():
    low = envelope((100, 4000), (100, 7000), (130, 7000), (130, 4000), phases=("minimum at landing",))
    basis = replace(twin(), envelopes=(low,), limits=limits(landing=5999))
    assert [one.code for one in failures(basis, phase="minimum at landing")] == ["sample-verdict"]


def test_the_first_longitudinal_envelope_of_the_phase_judges():
    lateral = envelope((-5, 4000), (-5, 7000), (5, 7000), axis="lateral")
    other = envelope((1, 4000), (1, 7000), (2, 7000), phases=("ramp",))
    basis = twin()
    assert failures(replace(basis, envelopes=(lateral, other, *basis.envelopes))) == ()
    outside = envelope((1, 4000), (1, 7000), (2, 7000))
    assert [one.code for one in failures(replace(basis, envelopes=(outside, *basis.envelopes)))] == [
        "sample-verdict"
    ]
