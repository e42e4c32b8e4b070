"""An operator's own margins inside the certified envelope: the load must lie inside what is left.

Common practice (operators' manuals keep a margin for seating, fuel and movement); the method of FAA AC 120-27
is the same: the certified envelope is curtailed by the moment each variation can make. Figures are invented
and worked by hand beside each case.
"""

from copy import deepcopy
from dataclasses import replace
from fractions import Fraction

from hypothesis import given
from hypothesis import strategies as st

from fleet.curtailment import Amounts, Curtailment, Inset
from fleet.sourced import Source
from loads.balance.assess import assess
from loads.balance.remedies.finding import find_remedies
from tests.drawing import drawn
from tests.pure.loads.making import envelope, load, result_of, twin, twin_empty
from tests.pure.loads.naive_path import points_along
from tests.pure.loads.remedies.cabins import asked
from tests.pure.loads.test_path_against_sampling import DECLARED, DRY, envelopes, flights

F = Fraction
OURS = Source("OM-A", "4", "8-12")


def margin(name="SEATING", purpose="seating variation", phases=("take-off",), rows=None, **sides):
    rows = rows or (Amounts(None, None, **sides),)
    return Curtailment(name, purpose, phases, rows, OURS)


def curtailed(*margins, **changes):
    return replace(twin(), curtailments=margins, **changes)


def take_off():
    """The sound load of the twin at take-off: 5,760.5 lb at 118.77 in, the aft limit at 128 in."""
    return result_of().state("take-off")


def test_a_load_inside_the_operational_envelope_is_within_and_the_room_is_to_the_moved_edge():
    """A moment of 23,041.9 lb in at 5,760.5 lb moves the aft limit from 128 in to about 124 in: 5.23 in are
    left, less than the 6.66 in to the forward limit.
    """
    check = result_of(basis=curtailed(margin(aft=Inset(moment=F("23041.9"))))).check("cg.take-off")

    state = take_off()
    assert (check.outcome, check.edge, check.margin) == ("pass", "aft", "5.23")
    assert check.room == 128 - F("23041.9") / state.weight - state.arm
    assert check.margin_text.endswith(
        "certified aft limit 9.23 in away; operator's aft margin: seating variation 4 in"
    )


def test_a_load_between_the_two_envelopes_is_outside_and_is_told_to_be_inside_the_certified_one():
    """The aft limit is put 0.5 in behind the load by the certified envelope, and 1.0 in is kept free."""
    arm = take_off().arm
    certified = envelope((100, 4000), (100, 6800), (arm + F("0.5"), 6800), (arm + F("0.5"), 4000))
    basis = curtailed(margin(aft=Inset(arm=F(1))), envelopes=(certified,))

    result = result_of(basis=basis)
    check = result.check("cg.take-off")

    assert result.verdict == "outside"
    assert (check.outcome, check.edge, check.room) == ("fail", "aft", F("-0.5"))
    assert "outside the operator's margin, inside the certified envelope by 0.5 in" in check.margin_text
    assert "operator's aft margin: seating variation 1 in" in check.margin_text
    assert check.source == "VP2-FM rev B p. 6-4; OM-A rev 4 p. 8-12"
    assert check.curtailed["certified"]["within"] is True
    assert check.curtailed["certified"]["margin"] == "0.5"
    assert check.curtailed["margins"][0]["source"] == "OM-A rev 4 p. 8-12"


def test_exactly_on_the_operational_edge_is_inside():
    """The certified edge lies 1 in behind the load, and the margin is the moment of 1 in at this weight."""
    state = take_off()
    certified = envelope((100, 4000), (100, 6800), (state.arm + 1, 6800), (state.arm + 1, 4000))

    on = curtailed(margin(aft=Inset(moment=state.weight)), envelopes=(certified,))
    beyond = curtailed(margin(aft=Inset(moment=state.weight + F(1, 1000))), envelopes=(certified,))

    assert result_of(basis=on).check("cg.take-off").outcome == "pass"
    assert result_of(basis=beyond).check("cg.take-off").outcome == "fail"


def test_several_margins_add_up_and_their_sum_is_told():
    """0.4 in and a moment of 0.6 in at this weight are 1 in together; the load lies 0.9 in from the edge."""
    state = take_off()
    certified = envelope((100, 4000), (100, 6800), (state.arm + F("0.9"), 6800), (state.arm + F("0.9"), 4000))
    margins = (
        margin(aft=Inset(arm=F("0.4"))),
        margin("FUEL", "fuel", aft=Inset(moment=state.weight * F("0.6"))),
        margin("CREW", "crew and passenger movement", forward=Inset(arm=F(1))),
    )

    check = result_of(basis=curtailed(*margins, envelopes=(certified,))).check("cg.take-off")

    assert check.outcome == "fail"
    assert check.room == F("-0.1")
    assert "operator's aft margins: seating variation 0.4, fuel 0.6, together 1 in" in check.margin_text
    assert [each["id"] for each in check.curtailed["margins"]] == ["SEATING", "FUEL"]
    assert check.curtailed["together"] == "1"


def test_outside_both_says_so():
    arm = take_off().arm
    certified = envelope((100, 4000), (100, 6800), (arm - F("0.25"), 6800), (arm - F("0.25"), 4000))

    check = result_of(basis=curtailed(margin(aft=Inset(arm=F(1))), envelopes=(certified,))).check(
        "cg.take-off"
    )

    assert "outside the certified envelope, too, by 0.25 in" in check.margin_text
    assert check.curtailed["certified"]["within"] is False


def test_a_margin_for_landing_does_not_bind_at_take_off():
    basis = curtailed(margin(phases=("landing", "minimum at landing"), aft=Inset(arm=F(8))))

    result = result_of(basis=basis)

    assert result.check("cg.take-off").curtailed is None
    assert result.check("cg.landing").curtailed is not None


def test_a_margin_for_seating_holds_only_in_the_configurations_it_names():
    """The freight fit carries nobody in the cabin, so the operator keeps no margin for seats there."""
    seating = replace(margin(aft=Inset(arm=F(1))), configurations=("six-seat",))
    freight = load(configuration="freight", passengers=[], persons_on_board=1)

    assert result_of(basis=curtailed(seating)).check("cg.take-off").curtailed is not None
    assert result_of(freight, curtailed(seating)).check("cg.take-off").curtailed is None


def test_a_basis_without_curtailments_answers_as_before():
    documents = [check.as_document() for check in result_of().checks]

    assert not any("curtailed" in document for document in documents)


def test_lateral_margins_move_the_sides_in():
    """The lateral limit is 5 in to each side: 5 in less 4.9 in leaves 0.1 in."""
    across = envelope((-5, 4000), (-5, 6900), (5, 6900), (5, 4000), axis="lateral")
    whole = twin().envelopes
    lateral = result_of(basis=replace(twin(), envelopes=(*whole, across))).state("take-off").lateral_arm
    side = "right" if lateral > 0 else "left"
    basis = curtailed(margin(**{side: Inset(arm=F("4.9"))}), envelopes=(*whole, across))

    check = result_of(basis=basis).check("lateral.take-off")

    assert check.outcome == ("pass" if abs(lateral) <= F("0.1") else "fail")
    assert check.room == F("0.1") - abs(lateral)


def test_the_burn_is_judged_by_the_operational_envelope_too():
    """The margin is a hundredth of an inch more than the least room anywhere between ramp and landing."""
    worst = result_of().check("path.longitudinal")
    basis = curtailed(margin(phases=("ramp", "take-off"), **{worst.edge: Inset(arm=worst.room + F(1, 100))}))

    check = result_of(basis=basis).check("path.longitudinal")

    assert check.outcome == "fail"
    assert check.room == F(-1, 100)
    assert "inside the certified envelope" in check.margin_text
    assert check.curtailed["certified"]["within"] is True


def test_a_remedy_brings_the_load_within_the_operational_envelope_not_only_the_certified_one():
    """Half an inch too far aft at 5,760.5 lb are 2,880.3 lb in. From the aft hold at 190 in to the nose hold
    at 30 in each pound makes 160 lb in: 18.1 lb would do at take-off, and the ramp, heavier, asks for more.
    """
    arm = take_off().arm
    certified = envelope((100, 4000), (100, 6800), (arm + F("0.5"), 6800), (arm + F("0.5"), 4000))
    whole = ("ramp", "take-off", "landing", "minimum at landing")
    basis = curtailed(margin(phases=whole, aft=Inset(arm=F(1))), envelopes=(certified,))
    document = load()
    question = asked(document, basis, twin_empty())

    found = find_remedies(question, document, lambda changed: result_of(changed, basis))

    offered = {offer["kind"]: offer for offer in found.offers}
    assert offered["move-items"]["sentence"] == "Move 18.5 lb of the baggage from aft hold to nose hold."
    moved = deepcopy(document)
    (bags,) = moved["items"]
    moved["items"] = [
        bags | {"weight": {"value": "101.5", "unit": "lb"}},
        bags | {"what": "moved", "place": "NOSE-HOLD", "weight": {"value": "18.5", "unit": "lb"}},
    ]
    assert result_of(moved, basis).verdict == "within"
    moved["items"][0]["weight"]["value"], moved["items"][1]["weight"]["value"] = "101.6", "18.4"
    assert result_of(moved, basis).verdict == "outside"


def test_a_load_in_the_tip_that_the_margins_cut_off_is_outside_them_and_inside_the_certified_envelope():
    """The envelope runs to a point at 118.76 in and 5,800 lb: at 5,760.5 lb 0.45 in of it are left, less than
    half an inch from either side.
    """
    tent = envelope((108, 4000), (F("118.76"), 5800), (129, 4000))
    half = margin(aft=Inset(arm=F("0.5")), forward=Inset(arm=F("0.5")))

    result = result_of(basis=curtailed(half, envelopes=(tent,)))
    check = result.check("cg.take-off")

    assert (check.outcome, check.low, check.limit) == ("fail", None, None)
    assert check.margin_text.startswith("no part of the envelope lies at this weight, 49.8 lb above")
    assert "outside the operator's margin, inside the certified envelope by 0.21 in" in check.margin_text
    assert result_of(basis=curtailed(envelopes=(tent,))).check("cg.take-off").outcome == "pass"
    assert result.check("path.longitudinal").outcome == "fail"


insets = st.one_of(
    st.just(Inset()),
    st.integers(1, 120).map(lambda number: Inset(arm=F(number, 100))),
    st.integers(1, 9000).map(lambda number: Inset(moment=F(number))),
)


@st.composite
def margins(draw, axis):
    low, high = ("forward", "aft") if axis == "longitudinal" else ("left", "right")
    found = []
    for number in range(draw(st.integers(1, 2))):
        cut = draw(st.one_of(st.none(), st.integers(4900, 6300).map(F)))
        rows = [Amounts(None, cut, **{low: draw(insets), high: draw(insets)})]
        if cut is not None:
            rows.append(Amounts(cut, None, **{low: draw(insets), high: draw(insets)}))
        phases = draw(
            st.sampled_from((("take-off",), ("ramp", "take-off"), ("landing", "minimum at landing")))
        )
        found.append(margin(f"{axis[:3]}{number}", phases=phases, rows=tuple(rows)))
    return found


def cut_by_hand(polygon, plane, weight):
    """The ends of the polygon along one weight, in arm."""
    crossed = []
    for (x1, y1), (x2, y2) in zip(polygon, (*polygon[1:], polygon[0]), strict=True):
        if (y1 - weight) * (y2 - weight) < 0:
            x = x1 + (x2 - x1) * (weight - y1) / (y2 - y1)
            crossed.append(x if plane == "arm" else x / weight)
    crossed.sort()
    return list(zip(crossed[::2], crossed[1::2], strict=True))


PHASES_OF = {"taxi": ("ramp",), "flight": ("take-off",), "reserve": ("take-off", "landing")}


def rooms_by_hand(declared, basis, axis, samples):
    """The room at every sample of the flight, None where a corner or a row's end is met."""
    low_side, high_side = ("forward", "aft") if axis == "longitudinal" else ("left", "right")
    for point in points_along(declared, basis, (DRY.weight, DRY.moment, DRY.lateral_moment), samples):
        moment = point.moment if axis == "longitudinal" else point.lateral_moment
        if moment is None:
            continue
        for outline in basis.envelopes:
            for phase in PHASES_OF[point.leg]:
                if outline.axis != axis or phase not in outline.phases:
                    continue
                if any(y == point.weight for _, y in outline.points):
                    continue
                low = high = F(0)
                for each in basis.curtailments:
                    for row in each.rows:
                        if phase in each.phases and row.hold(point.weight):
                            one, two = getattr(row, low_side), getattr(row, high_side)
                            low += one.arm + one.moment / point.weight
                            high += two.arm + two.moment / point.weight
                ends = cut_by_hand(outline.points, outline.plane, point.weight)
                left = [(start + low, end - high) for start, end in ends if start + low <= end - high]
                arm = moment / point.weight
                yield max((min(arm - start, end - arm) for start, end in left), default=None)


@drawn(50, 600)
@given(flights(), st.data())
def test_no_sample_of_the_flight_is_worse_than_the_worst_point_named(flight, data):
    basis, plan = flight
    drawn = (data.draw(envelopes("longitudinal", F(117))), data.draw(envelopes("lateral", F(0))))
    held = [each for axis in ("longitudinal", "lateral") for each in data.draw(margins(axis))]
    basis = replace(basis, envelopes=drawn, curtailments=tuple(held))
    declared = replace(DECLARED, fuel=plan)

    result = assess(declared, basis, twin_empty())

    for axis in ("longitudinal", "lateral"):
        found = [check for check in result.checks if check.code == f"path.{axis}"]
        if not found:
            continue
        rooms = list(rooms_by_hand(declared, basis, axis, 40))
        if any(room is None or room < 0 for room in rooms):
            assert found[0].outcome == "fail"
        if found[0].outcome in ("pass", "unresolved"):
            assert all(room is not None and room >= 0 for room in rooms)
        known = [room for room in rooms if room is not None]
        if found[0].room is not None and known and len(known) == len(rooms):
            assert min(known) >= found[0].room
