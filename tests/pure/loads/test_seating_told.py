"""The working of a seating variation in printed figures, in full, for a cabin worked by hand."""

from fractions import Fraction

from fleet.quantities import Unit
from fleet.seating import CabinRow, seating_variation
from loads.balance.seating_told import METHOD, seating_document

F = Fraction


def test_two_rows_of_one_seat_are_told_line_by_line_and_the_margin_is_rounded_up() -> None:
    """Rows at 200 and 201 in, one window seat each, 100 1/3 lb a person: the centroid is 200.5 in.

    From the front the first sits half an inch forward: 100 1/3 * -0.5 = -50.1666... lb in, printed -50.2 and
    kept as 50.2, rounded up; the second makes it 0. The same aft from the rear.
    """
    rows = [CabinRow("1", F(200), 1, 0, 0, "A"), CabinRow("2", F(201), 1, 0, 0, "A")]
    found = seating_variation(rows, F(301, 3))

    told = seating_document(found, Unit.LB, Unit.IN)

    first = {"passenger": 1, "row": "1", "seat": "window", "arm": "200", "moment": "20066.7"}
    last = {"passenger": 1, "row": "2", "seat": "window", "arm": "201", "moment": "20167"}
    both = {"moment": "40233.7", "assumed": "40233.7", "difference": "0", "passenger": 2, "seat": "window"}
    assert told == {
        "schema": "tarebook.seating-variation-found/1",
        "method": METHOD,
        "units": {"weight": "lb", "length": "in", "moment": "lb in"},
        "weight": "100.3",
        "amounts": {
            "forward": {"value": "50.2", "unit": "lb in"},
            "aft": {"value": "50.2", "unit": "lb in"},
        },
        "working": [
            {
                "section": "A",
                "order": "from the front",
                "assumed_arm": "200.5",
                "forward_at": 1,
                "aft_at": None,
                "lines": [
                    first | {"assumed": "20116.8", "difference": "-50.2"},
                    both | {"row": "2", "arm": "201"},
                ],
            },
            {
                "section": "A",
                "order": "from the rear",
                "assumed_arm": "200.5",
                "forward_at": None,
                "aft_at": 1,
                "lines": [
                    last | {"assumed": "20116.8", "difference": "50.2"},
                    both | {"row": "1", "arm": "200"},
                ],
            },
        ],
    }


def test_a_cabin_of_one_row_has_no_margin_to_tell() -> None:
    told = seating_document(seating_variation([CabinRow("1", F(200), 1, 0, 0, "")], F(100)), Unit.LB, Unit.IN)
    assert told["amounts"] == {}
