"""Every refusal of an empty weight word by word, and the whole of one that is read."""

from dataclasses import replace
from datetime import UTC, date, datetime
from fractions import Fraction

import pytest

from fleet.basis import OtherDatum
from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import (
    EmptyWeightParticulars,
    read_as_recorded,
    read_empty_weight,
    read_particulars,
)
from fleet.sourced import Source
from fleet.weighing import EmptyFigures, Restated
from tests.pure.fleet.documents import basis_document, changed, empty_weight_document, told

F = Fraction
BASIS = replace(read_basis(basis_document("twin")), fits=("wheels", "skids"))
PLANE = "nose reference plane"


def twin(**changes):
    """The empty weight of the twin: 3,962 lb, 624,042 lb in, 157.5 in, lateral -1,180 lb in."""
    document = empty_weight_document("twin")
    for field, value in changes.items():
        document = changed(document, f"/{field}", value)
    return document


def pounds(value):
    return {"value": value, "unit": "lb"}


def inches(value, unit="in"):
    return {"value": value, "unit": unit}


def moment(value, unit="lb in"):
    return {"value": value, "unit": unit}


def test_the_figures_of_a_document_in_the_units_of_the_basis():
    assert read_empty_weight(twin(), BASIS) == EmptyFigures(
        weight=F(3962),
        moment=F(624042),
        lateral_moment=F(-1180),
        datum=PLANE,
        fit="wheels",
        how="weighing",
        restated=None,
    )


def test_the_particulars_of_a_document():
    assert read_particulars(twin(weighed_on="2026-03-17")) == EmptyWeightParticulars(
        how="weighing",
        fit="wheels",
        datum=PLANE,
        weighed_on=date(2026, 3, 17),
        date=date(2026, 3, 18),
        true_from=datetime(2026, 3, 19, tzinfo=UTC),
        report="W-2026-07",
        signed_by="M. Ferrow",
    )


def test_a_figure_without_a_day_of_weighing_was_weighed_on_its_own_day():
    assert read_particulars(twin()).weighed_on == date(2026, 3, 18)


def test_figures_as_recorded_keep_their_datum_and_fit_whatever_the_basis_has():
    figures = read_as_recorded(twin(datum="firewall", fit="floats"), BASIS)

    assert (figures.datum, figures.fit, figures.moment, figures.restated) == (
        "firewall",
        "floats",
        624042,
        None,
    )


def test_figures_from_another_datum_are_restated_and_the_working_is_kept():
    """3,962 lb, 40 in further aft: 624,042 + 158,480 = 782,522 lb in."""
    page = Source("OK62-FM", "D", "6-2")
    basis = replace(
        BASIS, other_datums=(OtherDatum("nose tip", F(7), page), OtherDatum("earlier", F(40), page))
    )
    found = read_empty_weight(twin(datum="earlier"), basis)

    assert (found.datum, found.moment, found.lateral_moment) == (PLANE, 782_522, -1180)
    assert found.restated == Restated("earlier", F(624_042), F(40), page)
    assert read_empty_weight(twin(), basis).restated is None
    assert read_as_recorded(twin(datum="earlier", fit="floats"), basis) == replace(found, fit="floats")
    assert read_as_recorded(twin(datum="firewall"), basis).datum == "firewall"
    assert read_as_recorded(twin(), basis).restated is None


def test_little_weighs_something():
    light = {"weight": pounds("0.5"), "moment": moment("78.75"), "lateral_moment": moment(0)}
    assert read_empty_weight(twin(**light), BASIS).weight == F("0.5")


TOO_EARLY = "a weighing holds from the day it was done, or later; correct one of the two dates"


@pytest.mark.parametrize(
    ("changes", "faults"),
    [
        (
            {"datum": "firewall", "fit": "floats"},
            [
                (
                    "/datum",
                    "datum-differs",
                    f"the loading basis counts arms from '{PLANE}'; restate the figures for that datum, or "
                    "enter in the basis how far this one lies from it",
                ),
                ("/fit", "fit-unknown", "not a fit of the loading basis; use one of wheels, skids"),
            ],
        ),
        ({"weight": pounds(0)}, [("/weight/value", "not-above-zero", "must be above zero; correct it")]),
        ({"weight": pounds("-1")}, [("/weight/value", "not-above-zero", "must be above zero; correct it")]),
        (
            {"weight": pounds(0), "weighed_on": "2026-03-19"},
            [
                ("/weight/value", "not-above-zero", "must be above zero; correct it"),
                (
                    "/weighed_on",
                    "weighed-after-date",
                    "the weighing a figure rests on is not after the figure; correct one of the two dates",
                ),
            ],
        ),
        ({"true_from": "2026-03-16T23:59:59Z"}, [("/true_from", "true-before-weighing", TOO_EARLY)]),
        (
            # 3,962 lb at 155.9 in are 617,675.8 lb in; 1 % of 624,042 are 6,240.42, and 6,366.2 lie between.
            {"arm": inches("155.9")},
            [
                (
                    "/moment",
                    "moment-against-arm",
                    "weight times arm is 617675.8 lb in, over 1 % away; correct one or omit it",
                )
            ],
        ),
        (
            {"arm": inches("155.9"), "lateral_arm": inches(3)},
            [
                (
                    "/moment",
                    "moment-against-arm",
                    "weight times arm is 617675.8 lb in, over 1 % away; correct one or omit it",
                ),
                (
                    "/lateral_moment",
                    "moment-against-arm",
                    "weight times arm is 11886.0 lb in, over 1 % away; correct one or omit it",
                ),
            ],
        ),
        (
            # 2,000 kg at 4 m are 8,000 kg m.
            {
                "weight": inches(2000, "kg"),
                "arm": inches("4.0", "m"),
                "moment": moment(7000, "kg m"),
                "lateral_moment": moment(0),
            },
            [
                (
                    "/moment",
                    "moment-against-arm",
                    "weight times arm is 8000.0 kg m, over 1 % away; correct one or omit it",
                )
            ],
        ),
        ({"report": ...}, [("/report", "missing", "report is missing; give it")]),
    ],
)
def test_a_refusal_says_where_and_what_to_do(changes, faults):
    assert told(lambda document: read_empty_weight(document, BASIS), twin(**changes)) == faults


def test_a_day_is_a_day_somewhere_so_a_weighing_may_hold_from_the_day_before():
    """Half a day east of Greenwich the 18th begins on the 17th."""
    assert read_particulars(twin(true_from="2026-03-17T00:00:00Z"))
    assert read_particulars(twin(weighed_on="2026-03-18"))


def test_an_opening_entry_may_hold_from_long_before_its_paper():
    assert read_particulars(twin(how="opening entry", true_from="2020-01-01T00:00:00Z"))


def test_one_percent_is_no_gross_difference_and_a_hair_more_is():
    """1,000 kg at 100.00 mm are 100,000 kg mm; the gap is 1 % of the recorded moment at 100,000 / 1.01."""
    near = {
        "weight": inches(1000, "kg"),
        "arm": inches("100.00", "mm"),
        "moment": moment("99010", "kg mm"),
        "lateral_moment": moment(0),
    }
    assert read_empty_weight(twin(**near), BASIS)
    assert [
        code for _, code, _ in told(read_particulars, twin(**near | {"moment": moment("99009", "kg mm")}))
    ] == ["moment-against-arm"]
    exactly = near | {"arm": inches("101.00", "mm"), "moment": moment("100000", "kg mm")}
    assert read_empty_weight(twin(**exactly), BASIS)


def test_half_a_unit_of_the_last_printed_digit_is_always_allowed():
    """1,000 kg at 0.3 mm: the arm may be up to 0.05 mm off, which is 50 kg mm."""
    printed = {
        "weight": inches(1000, "kg"),
        "arm": inches("0.3", "mm"),
        "moment": moment("350", "kg mm"),
        "lateral_moment": moment(0),
    }
    assert read_empty_weight(twin(**printed), BASIS)
    assert [
        code for _, code, _ in told(read_particulars, twin(**printed | {"moment": moment("350.1", "kg mm")}))
    ] == ["moment-against-arm"]
    # 2,000 kg at 4 m may be anything from 3.5 m on: 7,000 kg m.
    whole_metres = {"weight": inches(2000, "kg"), "arm": inches(4, "m"), "moment": moment(7000, "kg m")}
    assert read_empty_weight(twin(**whole_metres), BASIS)
    # A figure below zero is no nearer for its sign, and an arm printed finer allows less.
    mirrored = {"arm": inches("-0.3", "mm"), "moment": moment("-350", "kg mm")}
    assert read_empty_weight(twin(**printed | mirrored), BASIS)
    assert told(read_particulars, twin(**printed | {"arm": inches("0.30", "mm")}))


def test_without_a_moment_or_without_an_arm_there_is_nothing_to_compare():
    assert read_empty_weight(twin(moment=..., arm=inches(1)), BASIS).moment == 3962
    assert read_empty_weight(twin(arm=..., moment=moment(1)), BASIS).moment == 1
    sideways = read_empty_weight(twin(lateral_moment=..., lateral_arm=inches(-2)), BASIS)
    assert (sideways.moment, sideways.lateral_moment) == (624042, -7924)
