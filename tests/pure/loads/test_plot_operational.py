"""Both envelopes on the plot: the certified one a line, the operational one dots, no colour needed."""

import xml.etree.ElementTree as ET
from dataclasses import replace
from fractions import Fraction

from fleet.curtailment import Amounts, Curtailment, Inset
from fleet.sourced import Source
from loads.plot import plot
from loads.plot_operational import operational
from tests.pure.loads.making import envelope, result_of, twin

F = Fraction
SVG = "{http://www.w3.org/2000/svg}"
IN_FLIGHT = ("ramp", "take-off", "landing", "minimum at landing")


def half_an_inch(*phases, **sides):
    sides = sides or {"forward": Inset(arm=F("0.5")), "aft": Inset(arm=F("0.5"))}
    return Curtailment(
        "SEATING", "seating variation", phases, (Amounts(None, None, **sides),), Source("OM-A", "4", "8-12")
    )


def notched():
    return envelope(
        (110, 4000), (110, 6800), (118, 6800), (118, 6200), (121, 6200), (121, 6800), (128, 6800), (128, 4000)
    )


def test_the_certified_line_is_drawn_as_ever_and_the_operational_one_in_round_dots():
    basis = replace(twin(), curtailments=(half_an_inch(*IN_FLIGHT),))

    drawing = plot(result_of(basis=basis).as_document(), basis.envelopes, curtailments=basis.curtailments)

    tree = ET.fromstring(drawing)  # noqa: S314  # our own drawing
    dots = list(tree.iter(f"{SVG}path"))
    assert len(dots) == 1
    assert (dots[0].get("stroke"), dots[0].get("stroke-linecap")) == ("#000", "round")
    lines = [each for each in tree.iter(f"{SVG}polygon") if each.get("stroke-width") == "1.5"]
    assert [each.get("stroke-dasharray") for each in lines] == ["none"]
    words = [each.text or "" for each in tree.iter(f"{SVG}text")]
    assert "operational: ramp," in words


def test_without_curtailments_the_drawing_is_the_same_bytes():
    result = result_of().as_document()

    assert plot(result, twin().envelopes) == plot(result, twin().envelopes, curtailments=())


def test_by_hand_the_outline_of_a_notched_envelope_moves_in_on_every_side():
    """Half an inch from 110, 118, 121 and 128 in; the floor of the notch stays at its weight, wider."""
    (outline,) = operational([notched()], [half_an_inch(*IN_FLIGHT)])

    points = {point for line in outline.lines for point in line}
    assert {x for x, _ in points} == {110.5, 117.5, 121.5, 127.5}
    level = {tuple(sorted(line)) for line in outline.lines if len({up for _, up in line}) == 1}
    assert ((117.5, 6200.0), (121.5, 6200.0)) in level
    assert outline.far == (127.5, 6800.0)


def test_phases_with_the_same_margins_share_an_outline_and_others_have_their_own():
    outlines = operational(
        [notched()],
        [
            half_an_inch("take-off"),
        ],
    )
    both = operational(
        [notched()],
        [half_an_inch("take-off"), replace(half_an_inch("landing", aft=Inset(moment=F(900))), id="FUEL")],
    )

    assert [each.name for each in outlines] == ["longitudinal-arm operational: take-off"]
    assert len(both) == 2


def test_in_the_moment_plane_the_dots_stand_at_moments():
    arm = envelope((110, 4000), (110, 6800), (128, 6800), (128, 4000))
    moment = replace(arm, plane="moment", points=tuple((x * y, y) for x, y in arm.points))

    (outline,) = operational([moment], [half_an_inch("take-off", aft=Inset(moment=F(4000)))])

    assert outline.far == (128.0 * 6800 - 4000, 6800.0)
