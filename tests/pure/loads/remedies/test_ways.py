"""How far a path may shift, and the rows that keep its points inside, reckoned by hand in round figures.

Moments are counted from the datum here: at 2,600 lb the limits of 98 and 102 in are 254,800 and 265,200.
"""

from dataclasses import replace
from fractions import Fraction
from typing import Any

import pytest

from fleet.basis import Basis, Phase, TankTable
from loads.balance.remedies.points import Spot, rows_inside, spots_of
from loads.balance.remedies.question import Question
from loads.balance.remedies.reach import Ways, flown, shapes_on, ways_of
from tests.pure.loads.making import F, envelope
from tests.pure.loads.remedies.rejects import (
    NARROW,
    Asked,
    a_hump_between_two_points,
    a_notch_between,
    aircraft,
    gallons,
    loaded,
    question_of,
    too_far_aft,
    too_far_left,
)


def ways(asked: Asked) -> Ways:
    question = question_of(asked)
    return ways_of(question.result, question.ready)


def with_envelopes(*envelopes: Any) -> Basis:
    return aircraft(envelopes=envelopes)


def test_the_lightest_point_decides_of_a_box_how_far_either_way() -> None:
    # At zero fuel 9,000 lb in where 5,200 are all: at least 3,800 forward, at most 9,000 + 5,200.
    assert ways(too_far_aft()) == ((((F(-14_200), F(-3800)),)), None)


def test_across_the_burn_decides_where_it_is_worst() -> None:
    # Left limit -1.5 in. The right tank runs dry at 40 US gal burned of 58: -2,000 - 6,000 there, 2,520 lb.
    # The right limit is nearest at zero fuel: 3,600 and the 2,000 of the passenger.
    along, across = ways(too_far_left())
    assert along == ((F(-2800), F(6800)),)  # 2,400 lb at zero fuel, -2,000 lb in, limits of 4,800 either way
    assert across == ((F(8000) - F(3, 2) * 2520, F(3, 2) * 2400 + 2000),)


def test_where_the_burn_bends_its_worst_point_decides() -> None:
    # With v US gal 120 v - 2 v**2 and 4,000 besides, where 5,040 + 12 v are all: worst with 27, by 418.
    document, basis = a_hump_between_two_points()
    assert ways((document, basis)).along == ((F(-9040), F(-418)),)
    # The same forward of 100 in: -120 v + 2 v**2, the forward limit -5,040 - 12 v: nearest with 27, too.
    table = TankTable("volume", "arm", "arm", None, ((F(0), F(80)), (F(60), F(100))))
    tanks = (replace(basis.tanks[0], table=table),)
    assert ways((document, replace(basis, tanks=tanks))).along == ((F(-9040 + 1458), F(1040)),)


def test_a_notch_leaves_a_way_to_either_side() -> None:
    (low, high), (low2, high2) = ways(a_notch_between()).along or ()
    # 900 lb in at the ramp, 2,968 lb, where the notch reaches from 100.3 - 0.8 * 468 / 2,500 in on.
    assert high == (F(3, 10) - F(8, 10) * F(468, 2500)) * 2968 - 900
    assert low2 == (F(3, 10) + F(12, 10) * F(468, 2500)) * 2968 - 900
    assert low == -3 * 2608 - 900
    assert high2 == 3 * 2608 - 900


def test_above_an_envelope_there_is_no_way_at_all() -> None:
    low = envelope((98, 1000), (98, 2849), (102, 2849), (102, 1000))  # 2,850 lb at the ramp
    assert ways((loaded({"S1": 200}, ("REAR", 90)), with_envelopes(low))) == ((), None)
    high = envelope((98, 2500), (98, 5000), (102, 5000), (102, 2500))
    assert ways((loaded({"S1": 200}, ("REAR", 90)), with_envelopes(high))) == ((), None)  # 2,490 at zero fuel


def test_two_envelopes_leave_what_both_leave() -> None:
    # 2,490 lb at zero fuel, 2,500 lb in: from 99 to 102 in and from 98 to 101.
    forward = envelope((98, 1000), (98, 5000), (101, 5000), (101, 1000))
    aft = envelope((99, 1000), (99, 5000), (102, 5000), (102, 1000))
    document = loaded({"S1": 200}, ("REAR", 90))
    assert ways((document, with_envelopes(forward, aft))) == ((((F(-4990), F(-10)),)), None)
    apart = envelope((F("101.5"), 1000), (F("101.5"), 5000), (102, 5000), (102, 1000))
    assert ways((document, with_envelopes(forward, apart))) == ((), None)


def test_without_an_envelope_any_moment_may_be_added() -> None:
    assert ways((loaded({"S1": 200}), with_envelopes(NARROW))).along is None


def sides(p: Any, a: Any, b: Any, c: Any) -> Any:
    """A side of these figures, and one that nothing comes near."""
    return (p, a, b, c, 0, 1, 0, 0)


SPOT = Spot("longitudinal", question_of(too_far_aft()).ready.basis.envelopes[0].shape, F(1000), F(500))
ENDS = (F(10), F(30))
WEIGHT: dict[int, Any] = {0: 1, 1: 2}
MOMENTS: dict[int, Any] = {0: 7, 1: -3}


def rows(side: Any) -> list[Any]:
    return list(rows_inside(SPOT, side, WEIGHT, MOMENTS, ENDS))[:-1]


def test_a_straight_side_is_one_row() -> None:
    # 3 * (500 + m) - 40 + 2 * (1000 + w) is at least 0: 3 m + 2 w is at least -3,460.
    assert rows(sides(3, -40, 2, 0)) == [({0: 3 * 7 + 2, 1: -3 * 3 + 4}, F(-3460))]


def test_a_side_that_bends_up_is_its_chord() -> None:
    # 3 * 500 - 40 + 2 * 1,000 + 5 * 1,000**2 = 5,003,460; the slope is 2 + 2 * 5 * 1,000 = 10,002, and of
    # 5 * w**2 from 10 to 30 the chord is 200 w - 1,500.
    assert rows(sides(3, -40, 2, 5)) == [({0: 21 + 10_202, 1: -9 + 20_404}, F(-5_003_460 + 1500))]


def test_a_side_that_bends_down_is_three_tangents() -> None:
    # 3 * 500 - 40 + 2 * 1,000 - 5 * 1,000**2 = -4,996,540; slope 2 - 10,000; of -5 w**2 the tangent at t is
    # -10 t w + 5 t**2, at 10, 20 and 30.
    assert rows(sides(3, -40, 2, -5)) == [
        ({0: 21 - 9998 - 10 * t, 1: -9 + 2 * (-9998 - 10 * t)}, F(4_996_540 - 5 * t * t))
        for t in (10, 20, 30)
    ]


def test_both_sides_have_their_rows() -> None:
    both = (3, -40, 2, 0, -1, 600, 0, 0)
    assert list(rows_inside(SPOT, both, {0: 1}, {0: 7}, ENDS)) == [
        ({0: Fraction(23)}, F(-3460)),
        ({0: Fraction(-7)}, F(-100)),
    ]


def points(question: Question) -> list[tuple[str, Fraction, Fraction]]:
    return [(spot.axis, spot.weight, spot.moment) for spot in spots_of(question)]


def test_each_point_that_is_judged_is_told_once() -> None:
    # -2,000 lb in, 200 lb of crew: ramp 2,560, take-off 2,548, landing 2,428, least fuel 2,260, and halfway.
    document = loaded({})
    question = question_of((document, aircraft()))
    weights = [weight for axis, weight, _ in points(question)]
    assert {axis for axis, _, _ in points(question)} == {"longitudinal"}
    assert {moment - 100 * weight for _, weight, moment in points(question)} == {F(-2000)}
    assert len(weights) == len(set(weights))
    assert set(weights) == {2560, 2548, 2200, 2428, 2260, 2554, 2488, 2344}


def test_across_points_have_their_lateral_moments() -> None:
    # 10 US gal more on the left: -3,000 lb in, at zero fuel 0; taxi and flight burn alike from either.
    document = loaded({}, at_engine_start=gallons(35, 25), minimum_at_landing={"value": 240, "unit": "lb"})
    base = aircraft()
    question = question_of((document, replace(base, envelopes=(NARROW,))))
    found = points(question)
    assert {axis for axis, _, _ in found} == {"lateral"}
    assert {(weight, moment) for _, weight, moment in found if weight in (2200, 2560, 2548)} == {
        (F(2200), F(0)),
        (F(2560), F(-3000)),
        (F(2548), F(-3000)),
    }


def test_gear_and_flaps_count_along_the_aircraft_alone() -> None:
    result = question_of(too_far_left()).result
    assert result.burn is not None
    path = result.burn.path
    assert flown(result, "longitudinal") == path.stretches + path.settings
    assert flown(result, "lateral") == path.stretches
    assert flown(replace(result, burn=None), "longitudinal") == ()


@pytest.mark.parametrize(
    ("leg", "held"), [("taxi", {"ramp"}), ("flight", {"take-off"}), ("reserve", {"take-off", "landing"})]
)
def test_on_each_leg_the_envelopes_of_its_phases_hold(leg: str, held: set[str]) -> None:
    phases: tuple[Phase, ...] = ("ramp", "take-off", "zero fuel", "landing")
    each = {
        phase: envelope((98, 1000), (98, 5000), (aft, 5000), (aft, 1000), phases=(phase,))
        for aft, phase in enumerate(phases, 102)
    }
    question = question_of((loaded({"S1": 200}), with_envelopes(*each.values())))
    assert question.result.burn is not None
    (stretch, *_) = [one for one in question.result.burn.path.stretches if one.leg == leg]
    shapes = shapes_on(stretch, "longitudinal", question.ready)
    aft = {shape.arms_at(F(2000))[0][1] for shape in shapes}
    assert {phase for phase, one in each.items() if one.points[2][0] in aft} == held
    assert len(shapes) == len(held)
