"""A margin for seating worked out from the cabin. The method is that of FAA AC 120-27 (remembered); every
figure here is computed by hand, the cabins are invented.
"""

from fractions import Fraction
from itertools import pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st

from fleet.quantities import Unit
from fleet.seating import CHOICES, CabinRow, centroid, seating_variation
from fleet.seating_reading import read_cabin
from records.refusal import Invalid
from tests.pure.fleet.cabins import cabin
from tests.pure.fleet.documents import changed, found_in, is_a_sentence_with_a_next_step

F = Fraction


def row(name, arm, window=2, aisle=0, remaining=0, *, section=""):
    return CabinRow(name, F(arm), window, aisle, remaining, section)


def test_by_hand_three_rows_of_two():
    """Rows at 200, 230, 260 in, two seats each, 100 lb a person: the centroid is 230.

    From the front: 1st at 200: 20,000 less 23,000 is -3,000; 2nd -6,000; 3rd and 4th at 230 change nothing;
    5th at 260: -3,000; 6th: 0. So 6,000 lb in forward, after the 2nd. From the rear the same aft.
    """
    found = seating_variation([row("1", 200), row("2", 230), row("3", 260)], F(100))

    front, rear = found.fillings
    assert [line.difference for line in front.lines] == [-3000, -6000, -6000, -6000, -3000, 0]
    assert [line.difference for line in rear.lines] == [3000, 6000, 6000, 6000, 3000, 0]
    assert (found.forward, found.aft) == (6000, 6000)
    assert front.forward is not None
    assert front.forward.number == 2
    assert front.aft is None


def test_by_hand_windows_are_taken_before_aisles_and_those_before_the_rest():
    """Two rows at 200 and 260, of 1 window, 1 aisle, 1 other: from the front W200 W260 A200 A260 R200 R260.

    The centroid is 230, a person 100 lb: -3,000, 0, -3,000, 0, -3,000, 0. So 3,000, where filling row by row
    would have made 9,000.
    """
    found = seating_variation([row("1", 200, 1, 1, 1), row("2", 260, 1, 1, 1)], F(100))

    front = found.fillings[0]
    assert [(line.row, line.choice) for line in front.lines] == [
        (name, choice) for choice in CHOICES for name in ("1", "2")
    ]
    assert [line.difference for line in front.lines] == [-3000, 0, -3000, 0, -3000, 0]
    assert found.forward == 3000


def test_by_hand_a_cabin_of_nineteen_seats():
    """Nine rows 30 in apart from 200 in, one window seat on either side, and one seat more between those of
    the last row. 190 lb a person, so each of 19 weighs 190.

    The centroid: (2 * (200 + 230 + ... + 440) + 440) / 19 = (5760 + 440) / 19 = 6200 / 19 = 326.32 in.
    From the front rows 1 to 5 (200 to 320) lie ahead of it: 10 people, 2 * (200 + ... + 320) = 2,600, less
    10 * 6200 / 19 = 3263.16, is -663.16 in times 190 lb: -126,000 lb in exactly, since 190 * 62000 / 19 =
    620,000 and 190 * 2600 = 494,000.
    From the rear rows 9 to 6 (440 to 350) lie behind: 8 people, 2 * (440 + 410 + 380 + 350) = 3,160 less
    8 * 6200 / 19, times 190: 600,400 - 496,000 = 104,400. The seat in between is taken last, at 440 in.
    """
    rows = [row(str(n), 170 + 30 * n) for n in range(1, 9)] + [row("9", 440, 2, 0, 1)]

    found = seating_variation(rows, F(190))

    assert centroid(rows) == F(6200, 19)
    assert found.forward == 126_000
    assert found.fillings[0].forward is not None
    assert found.fillings[0].forward.number == 10
    assert found.aft == 104_400
    assert found.fillings[1].aft is not None
    assert found.fillings[1].aft.number == 8


def test_sections_have_a_centroid_each_and_their_differences_add_up():
    """Sections A (200, 230) and B (260, 290), two seats a row, 100 lb: each can be off by 3,000 at most."""
    rows = [row("1", 200, section="A"), row("2", 230, section="A"), row("3", 260, section="B")]
    rows.append(row("4", 290, section="B"))

    found = seating_variation(rows, F(100))

    assert [filling.assumed_arm for filling in found.fillings] == [215, 215, 275, 275]
    assert (found.forward, found.aft) == (6000, 6000)


def test_an_assumed_arm_of_the_operator_takes_the_place_of_the_centroid():
    """Assumed at 235 in instead of 230: six people of 100 lb are 3,000 lb in forward at the end."""
    found = seating_variation([row("1", 200), row("2", 230), row("3", 260)], F(100), {"": F(235)})

    assert [line.difference for line in found.fillings[0].lines] == [-3500, -7000, -7500, -8000, -5500, -3000]
    assert found.forward == 8000
    assert found.aft == 5000


def test_a_cabin_of_one_row_needs_no_margin_and_no_line_is_named():
    found = seating_variation([row("1", 200, 2)], F(190))

    assert (found.forward, found.aft) == (0, 0)
    assert [(filling.forward, filling.aft) for filling in found.fillings] == [(None, None), (None, None)]


def test_a_difference_of_less_than_one_counts_too():
    """Two rows a tenth of an inch apart, one seat each, of 1 lb: a twentieth of a pound inch either way."""
    found = seating_variation([row("1", 200, 1), row("2", "200.1", 1)], F(1))

    assert (found.forward, found.aft) == (F(1, 20), F(1, 20))


cabins = st.lists(
    st.tuples(st.integers(100, 900), *(st.integers(0, 3) for _ in range(3))).filter(
        lambda each: any(each[1:])
    ),
    min_size=1,
    max_size=9,
)


@given(cabins, st.integers(50, 250))
def test_no_number_of_passengers_seated_in_that_order_goes_beyond_the_margin(drawn, weight):
    """Counted over once more, with lists of seats and plain sums."""
    rows = [row(str(n), *each) for n, each in enumerate(drawn)]
    found = seating_variation(rows, F(weight))
    mean = centroid(rows)

    differences = [F(0)]
    for backwards in (False, True):
        seats = [
            arm
            for kind in (1, 2, 3)
            for arm, *counts in sorted(drawn, key=lambda each: each[0], reverse=backwards)
            for _ in range(counts[kind - 1])
        ]
        differences += [weight * (sum(seats[:number]) - number * mean) for number in range(1, len(seats) + 1)]
    assert found.forward == -min(differences)
    assert found.aft == max(differences)
    for filling in found.fillings:
        assert filling.lines[-1].difference == 0
        assert [line.number for line in filling.lines] == list(range(1, len(filling.lines) + 1))
        for one, other in pairwise(filling.lines):
            assert other.moment - one.moment == weight * other.arm


def test_a_document_is_read_exactly_with_arms_in_the_unit_of_its_first_row():
    """254 cm are 100 in."""
    document = changed(cabin(), "/rows/1/arm", {"value": 254, "unit": "cm"})

    found = read_cabin(document)

    assert found.rows[1].arm == 100
    assert (found.unit, found.length, found.weight) == (Unit.LB, Unit.IN, 190)
    assert found.assumed == {"cabin": 230}


@pytest.mark.parametrize(
    ("pointer", "value", "at", "code"),
    [
        ("/weight/value", 0, "/weight/value", "not-above-zero"),
        ("/rows/1/row", "1", "/rows/1/row", "duplicate"),
        ("/assumed/0/section", "attic", "/assumed/0/section", "unknown-id"),
        ("/rows/0/window", -1, "/rows/0/window", "too-small"),
        ("/rows", [], "/rows", "too-few"),
        ("/rows/0/arm", ..., "/rows/0/arm", "missing"),
        ("/weight/unit", "stone", "/weight/unit", "unit-unknown"),
    ],
)
def test_what_is_wrong_is_named(pointer, value, at, code):
    with pytest.raises(Invalid) as refused:
        read_cabin(changed(cabin(), pointer, value))

    assert at in {pointer for pointer, _ in found_in(refused.value)}
    assert all(is_a_sentence_with_a_next_step(fault) for fault in refused.value.faults)


def test_a_row_without_seats_is_refused():
    empty = changed(changed(cabin(), "/rows/0/window", 0), "/rows/0/aisle", 0)

    with pytest.raises(Invalid) as refused:
        read_cabin(empty)

    assert found_in(refused.value) == {("/rows/0", "row-without-seats")}
