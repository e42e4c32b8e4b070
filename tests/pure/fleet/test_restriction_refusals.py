"""Every refusal of a restriction or permit word by word, and the whole of one that is read."""

from datetime import UTC, datetime
from decimal import Decimal

import pytest

from fleet.quantities import Quantity, Unit
from fleet.restriction_reading import paper_from_text, read_entered, read_paper
from fleet.restrictions import (
    Effect,
    Paper,
)
from fleet.sourced import Source
from records.canonical import canonical
from tests.pure.fleet.documents import changed, told
from tests.pure.fleet.effects import CORNERS, envelope, fuel, limit_of, maximum_of
from tests.pure.loads.making import twin
from tests.pure.loads.papers import lb, permit_document, restriction_document


def test_everything_a_paper_says_is_read():
    effects = [
        {"effect": "seats", "ids": ["ROW1-L", "ROW1-R"]},
        {"effect": "places", "ids": ["AFT-HOLD"]},
        limit_of("landing", "6000"),
        maximum_of("ROW2-L", "200.5"),
        fuel("LEFT-AUX", "30", "l"),
        envelope(),
    ]
    document = restriction_document(*effects)
    wanted = Paper(
        kind="restriction",
        number="DD-14",
        what="item inoperative",
        authority="",
        since=datetime(2026, 11, 30, tzinfo=UTC),
        until=None,
        source=Source("MEL", "7", "25-3"),
        effects=(
            Effect("seats", ("ROW1-L", "ROW1-R")),
            Effect("places", ("AFT-HOLD",)),
            Effect("limit", ("landing",), Quantity(Decimal(6000), Unit.LB)),
            Effect("maximum", ("ROW2-L",), Quantity(Decimal("200.5"), Unit.LB)),
            Effect("fuel", ("LEFT-AUX",), Quantity(Decimal(30), Unit.L)),
            Effect(
                "envelope",
                (twin().envelopes[0].id,),
                None,
                tuple((Decimal(arm), Decimal(weight)) for arm, weight in CORNERS),
                (Unit.IN, Unit.LB),
            ),
        ),
    )

    assert read_paper(document, "restriction") == wanted
    assert paper_from_text(canonical(document).decode(), "restriction") == wanted
    assert read_entered(document, "restriction", twin()) == wanted
    assert read_entered(document, "restriction", None) == wanted
    assert wanted.title == "restriction DD-14"


def test_a_permit_says_besides_until_when_by_whom_for_what_and_on_which_conditions():
    document = permit_document(
        limit_of("take_off", "7000"), operations=["ferry"], conditions=["day VFR", "crew only"]
    )
    assert read_paper(document, "permit") == Paper(
        kind="permit",
        number="SFP-88",
        what="ferry overweight to base",
        authority="Civil Aviation Office, Nalden",
        since=datetime(2026, 11, 30, tzinfo=UTC),
        until=datetime(2026, 12, 3, tzinfo=UTC),
        source=Source("Permit SFP-88", "", "1"),
        effects=(Effect("limit", ("take_off",), Quantity(Decimal(7000), Unit.LB)),),
        operations=("ferry",),
        conditions=("day VFR", "crew only"),
    )


SEATS = {"effect": "seats", "ids": ["ROW1-L"]}


@pytest.mark.parametrize(
    ("effect", "changes", "faults"),
    [
        (
            SEATS,
            {"true_until": "2026-11-30T00:00:00Z"},
            [("/true_until", "out-of-order", "must be after true_from; correct one of them")],
        ),
        (
            {"effect": "seats", "of": "ROW1-L"},
            {},
            [
                ("/effects/0/ids", "missing", "the effect seats needs its ids; give it"),
                ("/effects/0/of", "unknown-field", "the effect seats has no of; remove it"),
            ],
        ),
        (
            {"effect": "limit", "limit": "landing"},
            {},
            [("/effects/0/weight", "missing", "the effect limit needs its weight; give it")],
        ),
        (
            {"effect": "maximum", "weight": lb("1")},
            {},
            [("/effects/0/of", "missing", "the effect maximum needs its of; give it")],
        ),
        (
            SEATS | {"weight": lb("1")},
            {},
            [("/effects/0/weight", "unknown-field", "the effect seats has no weight; remove it")],
        ),
        (
            limit_of("landing", "0"),
            {},
            [("/effects/0/weight/value", "not-above-zero", "must be above zero; correct it")],
        ),
        (
            fuel("LEFT-AUX", "-1"),
            {},
            [("/effects/0/volume/value", "not-above-zero", "must be above zero; correct it")],
        ),
        (
            {"effect": "seats", "ids": ["ROW7-L", "ROW1-L", "AFT-HOLD"]},
            {},
            [
                (
                    "/effects/0/ids",
                    "unknown-id",
                    "ROW7-L, AFT-HOLD: not in the loading basis in force then; correct it",
                )
            ],
        ),
        (
            fuel("CENTRE", "1"),
            {},
            [("/effects/0/of", "unknown-id", "CENTRE: not in the loading basis in force then; correct it")],
        ),
        (
            limit_of("with_external_load", "6000"),
            {},
            [
                (
                    "/effects/0/limit",
                    "unknown-id",
                    "with_external_load: not in the loading basis in force then; correct it",
                )
            ],
        ),
        (
            envelope(unit="lb in"),
            {},
            [
                (
                    "/effects/0/unit",
                    "unit-dimension",
                    "the envelope is straight in the arm plane; give its corners in a unit of arm",
                )
            ],
        ),
        (
            envelope(CORNERS[:1] + CORNERS),
            {},
            [
                (
                    "/effects/0/points",
                    "envelope-repeated-point",
                    "a point stands twice; leave the repetition out, the envelope closes by itself",
                )
            ],
        ),
        (
            envelope(unit="mm"),
            {},
            [
                (
                    "/effects/0/points",
                    "envelope-elsewhere",
                    f"nothing of it lies inside envelope {twin().envelopes[0].id}; give each corner as "
                    "[arm, weight] and check both units",
                )
            ],
        ),
        (
            SEATS,
            {"number": ...},
            [("/number", "missing", "number is missing; give it")],
        ),
    ],
)
def test_a_refusal_says_where_and_what_to_do(effect, changes, faults):
    document = restriction_document(effect)
    for field, value in changes.items():
        document = changed(document, f"/{field}", value)
    assert told(lambda one: read_entered(one, "restriction", twin()), document) == faults


def test_faults_of_several_effects_are_told_at_once_each_at_its_own():
    document = restriction_document(SEATS, fuel("CENTRE", "1"), {"effect": "places", "ids": ["ATTIC"]})
    assert [at for at, _, _ in told(lambda one: read_entered(one, "restriction", twin()), document)] == [
        "/effects/1/of",
        "/effects/2/ids",
    ]
