"""The operator's margins and the presentation of moments, as rows of the aircraft's page."""

from fleet.web.margins import margin_rows, presentation_rows

DOCUMENT = {
    "document": {"title": "Flight manual", "number": "VP2-FM", "revision": "B"},
    "curtailments": [
        {
            "id": "SEATING",
            "for": "seating variation",
            "phases": ["take-off", "landing"],
            "amounts": [
                {"to": {"value": 5000, "unit": "lb"}, "forward": {"value": 900, "unit": "lb in"}},
                {"from": {"value": 5000, "unit": "lb"}, "aft": {"value": "0.6", "unit": "in"}},
            ],
            "source": {"document": "OM-A", "revision": "4", "page": "8-12"},
        }
    ],
    "presentation": {
        "index": {
            "reference_arm": {"value": 155, "unit": "in"},
            "divisor": {"value": 1000, "unit": "lb in"},
            "constant": 40,
            "source": {"page": "6-20"},
        },
        "moment_divisor": {"value": 100, "source": {"page": "6-21"}},
    },
}


def test_a_margin_shows_what_it_is_for_where_it_holds_and_how_much_as_typed():
    assert list(margin_rows(DOCUMENT)) == [
        {
            "title": "Operator's margin SEATING: seating variation, at take-off, landing",
            "value": "to 5000 lb: forward 900 lb in; from 5000 lb: aft 0.6 in",
            "source": "OM-A rev 4 p. 8-12",
        }
    ]


def test_a_presentation_shows_its_formula_and_its_page():
    assert list(presentation_rows(DOCUMENT)) == [
        {
            "title": "Index units",
            "value": "weight x (arm - 155 in) / 1000 lb in + 40",
            "source": "VP2-FM rev B p. 6-20",
        },
        {"title": "Moments shown divided by", "value": "100", "source": "VP2-FM rev B p. 6-21"},
    ]


def test_a_basis_without_either_has_no_such_row():
    bare = {"document": DOCUMENT["document"]}

    assert [*margin_rows(bare), *presentation_rows(bare)] == []
