"""Which plane is straight: edges straight in moment bulge in arm, and the verdict between the two differs.

FAA-H-8083-25C figure 10-9 (read): its table of moment limits is made from arms at 2,525 lb (77.5 in) and
2,950 lb (82.1 in). Halfway, at 2,737.5 lb, a line straight in arm is at 79.8 in; straight in moment
(77.5 * 2,525 + 82.1 * 2,950) / 2 / 2,737.5 = 79.979 in (computed).
"""

from dataclasses import replace
from fractions import Fraction

from fleet.basis import Envelope
from tests.pure.loads.hand import PAGE, plain, result_with

F = Fraction
PHASES = ("ramp", "take-off", "landing")
FORWARD = ((F("77.5"), F(2525)), (F("82.1"), F(2950)))
HALFWAY = F("2737.5")


def envelope(plane):
    corners = (*FORWARD, (F(90), F(2950)), (F(90), F(2525)))
    points = tuple((x if plane == "arm" else x * y, y) for x, y in corners)
    return Envelope(plane, "longitudinal", PHASES, plane, points, PAGE)


def check_at(arm, plane):
    made = plain(left=0, right=0, weight=HALFWAY, arm=arm)
    return result_with(made, lambda basis: replace(basis, envelopes=(envelope(plane),))).check("cg.take-off")


def test_the_same_corners_give_two_limits_between_them():
    in_moment = (F("77.5") * 2525 + F("82.1") * 2950) / 2 / HALFWAY
    assert check_at(F("79.8"), "arm").room == 0
    assert check_at(in_moment, "moment").room == 0
    assert round(float(in_moment), 3) == 79.979


def test_a_load_between_the_two_is_inside_in_one_plane_and_outside_in_the_other():
    assert check_at(F("79.9"), "arm").outcome == "pass"
    outside = check_at(F("79.9"), "moment")
    assert (outside.outcome, outside.edge) == ("fail", "forward")


def test_at_a_corner_both_agree():
    for plane in ("arm", "moment"):
        made = plain(left=0, right=0, weight=2525, arm=F("77.5"))
        check = result_with(
            made, lambda basis, plane=plane: replace(basis, envelopes=(envelope(plane),))
        ).check("cg.take-off")
        assert (check.outcome, check.room) == ("pass", 0)
