"""What an operator's margins leave of an envelope, against a second opinion that cuts the polygon along a
line of one weight and moves each end in by hand.
"""

import random
from fractions import Fraction
from itertools import pairwise

import pytest

from fleet.curtailment import NONE, Amounts, CurtailedShape, Curtailment, Inset, holding
from fleet.envelope import Shape
from fleet.sourced import Source
from tests.pure.fleet.outlines import NAMES, PLANES, outline

F = Fraction
OURS = Source("OM-A", "4", "8-12")
ONE_UNIT = F(1, 10**9)


def curtailment(*rows, name="SEATING", purpose="seating variation", phases=("take-off",)):
    return Curtailment(name, purpose, phases, rows, OURS)


def drawn(chance, low, high):
    """One to three curtailments with moments and arms, some between weights of their own."""
    found = []
    for number in range(chance.randint(1, 3)):
        cuts = sorted(F(chance.randint(int(low), int(high))) for _ in range(chance.randint(0, 2)))
        ends = [None, *dict.fromkeys(cuts), None]
        rows = [
            Amounts(least, most, *(some_inset(chance) for _ in range(2))) for least, most in pairwise(ends)
        ]
        found.append(curtailment(*rows, name=f"C{number}"))
    return found


def some_inset(chance):
    kind = chance.randint(0, 2)
    if kind == 0:
        return NONE
    return Inset(arm=F(chance.randint(1, 30), 100)) if kind == 1 else Inset(moment=F(chance.randint(10, 900)))


def stretches(points, plane, weight, held, slightly):
    """The stretches of arm left at a weight; a corner is taken `slightly` above or below."""
    at = weight + slightly
    crossed = []
    for (x1, y1), (x2, y2) in zip(points, [*points[1:], points[0]], strict=True):
        if min(y1, y2) < at < max(y1, y2):
            x = x1 + (x2 - x1) * (weight - y1) / (y2 - y1)
            crossed.append((x1 + (x2 - x1) * (at - y1) / (y2 - y1), x if plane == "arm" else x / weight))
    crossed = [x for _, x in sorted(crossed)]
    low = high = F(0)
    for each in held:
        rows = [row for row in each.rows if row.hold(weight)]
        low += max(row.forward.arm + row.forward.moment / weight for row in rows)
        high += max(row.aft.arm + row.aft.moment / weight for row in rows)
    return [(start + low, end - high) for start, end in zip(crossed[::2], crossed[1::2], strict=True)]


@pytest.mark.parametrize("name", NAMES)
@pytest.mark.parametrize("plane", PLANES)
def test_points_on_the_moved_edges_are_inside_and_one_unit_beyond_is_outside(name, plane):
    points = outline(name, plane)
    weights = [weight for _, weight in points]
    chance = random.Random(f"{name} {plane}")
    judged = 0
    for _ in range(60):
        held = drawn(chance, min(weights), max(weights))
        shape = CurtailedShape(Shape(plane, points), held, "longitudinal")
        at = [F(chance.randint(int(min(weights)) + 1, int(max(weights)) - 1)) + F(1, 7) for _ in range(12)]
        at += [end for each in held for row in each.rows for end in (row.least, row.most) if end is not None]
        for weight in at:
            if not min(weights) < weight < max(weights):
                continue
            # At a corner's weight both sides count, and a row's end is where the greater of two counts.
            left = {
                stretch
                for slightly in ((F(0),) if weight not in weights else (-ONE_UNIT, ONE_UNIT))
                for stretch in stretches(points, plane, weight, held, slightly)
                if stretch[0] <= stretch[1]
            }
            for arm in {
                end + step for stretch in left for end in stretch for step in (-ONE_UNIT, 0, ONE_UNIT)
            }:
                wanted = any(low <= arm <= high for low, high in left)
                assert shape.holds(weight, arm * weight) is wanted
                judged += 1
            assert all(
                any(low <= one and two <= high for low, high in shape.arms_at(weight)) for one, two in left
            )
    assert judged > 2000


@pytest.mark.parametrize("plane", PLANES)
def test_the_room_in_weight_ends_where_the_load_would_leave_the_moved_edge(plane):
    """Ends may be irrational, since a moment moves an edge along a curve: then they lie a hair inside."""
    points = outline("sloping", plane)
    held = [curtailment(Amounts(None, None, Inset(moment=F(700)), Inset(arm=F("0.2"))))]
    shape = CurtailedShape(Shape(plane, points), held, "longitudinal")
    seen = 0
    for tenth in range(720, 810):
        arm = F(tenth, 10)
        for low, high in shape.weights_at(arm):
            for weight in (low, (low + high) / 2, high):
                assert shape.holds(weight, arm * weight)
            for beyond in (low - ONE_UNIT, high + ONE_UNIT):
                assert not shape.holds(beyond, arm * beyond)
            seen += 1
    assert seen > 40


def test_by_hand_a_moment_counts_for_less_the_heavier_the_aircraft():
    """Square 100 to 110 in, 2,000 to 4,000 lb. Forward 1,000 lb in: at 2,000 lb the front edge stands at
    100 + 1000/2000 = 100.5 in, at 4,000 lb at 100.25. Aft 0.4 in: 109.6 in all the way.
    """
    square = Shape("arm", [(F(100), F(2000)), (F(100), F(4000)), (F(110), F(4000)), (F(110), F(2000))])
    rows = Amounts(None, None, forward=Inset(moment=F(1000)), aft=Inset(arm=F("0.4")))

    shape = CurtailedShape(square, [curtailment(rows)], "longitudinal")

    assert shape.arms_at(F(2000)) == ((F("100.5"), F("109.6")),)
    assert shape.arms_at(F(4000)) == ((F("100.25"), F("109.6")),)
    assert shape.holds(F(2000), F(2000) * F("100.5"))
    assert not shape.holds(F(2000), F(2000) * F("100.5") - F(1, 1000))


def test_both_sides_of_a_notch_move_in():
    """A square with a notch from above, 104 to 106 in: at 3,500 lb 0.5 in from each edge leaves 100.5 to
    103.5 and 106.5 to 109.5.
    """
    corners = (
        (100, 2000),
        (100, 4000),
        (104, 4000),
        (104, 3000),
        (106, 3000),
        (106, 4000),
        (110, 4000),
        (110, 2000),
    )
    half = Inset(arm=F("0.5"))

    shape = CurtailedShape(
        Shape("arm", [(F(x), F(y)) for x, y in corners]),
        [curtailment(Amounts(None, None, half, half))],
        "longitudinal",
    )

    assert shape.arms_at(F(3500)) == ((F("100.5"), F("103.5")), (F("106.5"), F("109.5")))
    assert shape.arms_at(F(2500)) == ((F("100.5"), F("109.5")),)


def test_where_two_rows_meet_the_greater_amount_counts():
    square = Shape("arm", [(F(100), F(2000)), (F(100), F(4000)), (F(110), F(4000)), (F(110), F(2000))])
    rows = (Amounts(None, F(3000), aft=Inset(arm=F(1))), Amounts(F(3000), None, aft=Inset(arm=F(2))))

    shape = CurtailedShape(square, [curtailment(*rows)], "longitudinal")

    assert shape.arms_at(F(2999))[0][1] == 109
    assert shape.arms_at(F(3000))[0][1] == 108
    assert not shape.holds(F(3000), F(3000) * F("108.5"))
    assert shape.holds(F(2999), F(2999) * F("108.5"))


def test_a_curtailment_that_leaves_nothing_says_between_which_weights():
    """At 2,000 lb 9,000 lb in are 4.5 in from either side: 1 in is left of 10. At 1,700 lb nothing."""
    tall = Shape("arm", [(F(100), F(1500)), (F(100), F(4000)), (F(110), F(4000)), (F(110), F(1500))])
    both = Inset(moment=F(9000))

    assert (
        list(
            CurtailedShape(tall, [curtailment(Amounts(F(2000), None, both, both))], "longitudinal").used_up()
        )
        == []
    )
    assert list(
        CurtailedShape(tall, [curtailment(Amounts(None, None, both, both))], "longitudinal").used_up()
    ) == [(F(1500), F(4000))]


def test_an_envelope_that_runs_to_a_point_loses_only_its_tip():
    tent = Shape("arm", [(F(100), F(2000)), (F(105), F(4000)), (F(110), F(2000))])
    half = Inset(arm=F("0.5"))

    shape = CurtailedShape(tent, [curtailment(Amounts(None, None, half, half))], "longitudinal")

    assert list(shape.used_up()) == []
    assert shape.arms_at(F(4000)) == ()
    assert shape.arms_at(F(3800)) == ((F(105), F(105)),)  # 1 in wide there, and half an inch from each side
    assert not shape.holds(F(3900), F(3900) * 105)


def test_only_those_of_the_phase_and_axis_hold():
    along = curtailment(Amounts(None, None, forward=Inset(arm=F(1))), phases=("take-off",))
    across = curtailment(Amounts(None, None, left=Inset(arm=F(1))), phases=("landing",))

    assert holding((along, across), "take-off", "longitudinal") == (along,)
    assert holding((along, across), "take-off", "lateral") == ()
    assert holding((along, across), "landing", "lateral") == (across,)
