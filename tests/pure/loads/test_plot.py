"""The plot: what is on it, that it tells things apart without colour, that names in it stay text."""

import xml.etree.ElementTree as ET
from dataclasses import replace

import pytest

from loads.plot import broken, plot
from loads.plot_marks import MARKS, Mark, drawn_marks
from loads.plot_scale import Scale, ticks
from tests.pure.loads.accepted_loads import helicopter, turboprop, twin

SVG = "{http://www.w3.org/2000/svg}"


def _tree(drawing: str) -> ET.Element:
    return ET.fromstring(drawing)  # noqa: S314  # our own drawing


def _texts(drawing: str) -> list[str]:
    return [each.text or "" for each in _tree(drawing).iter(f"{SVG}text")]


def _drawn(facts, **more) -> str:
    return plot(facts.result, facts.basis.envelopes, **more)


@pytest.mark.parametrize("make", [twin, turboprop, helicopter])
def test_every_phase_is_marked_by_its_letter_and_a_shape_of_its_own(make) -> None:
    drawing = _drawn(make())

    assert {letter for letter in MARKS.values() if letter in _texts(drawing)} == set("RTZLM")
    shapes = [each for each in _tree(drawing) if each.get("stroke-width") == "1.2"]
    assert len(shapes) == 5


def test_the_burn_is_a_thin_line_through_its_phases_and_its_worst_point_is_marked() -> None:
    facts = twin()
    drawing = _drawn(facts)
    worst = facts.result["path"]["worst"][0]

    burn = [each for each in _tree(drawing).iter(f"{SVG}polyline") if each.get("stroke-width") == "0.4"]
    assert len(burn) == 1
    heights = [float(point.split(",")[1]) for point in (burn[0].get("points") or "").split()]
    assert heights == sorted(heights)
    assert "W" in _texts(drawing)
    assert f"worst point, {worst['point']}: " in (_tree(drawing).get("aria-label") or "")
    cross = [each for each in _tree(drawing).iter(f"{SVG}line") if each.get("stroke-width") == "1"]
    assert len(cross) == 2


def test_a_result_that_holds_no_path_is_drawn_as_it_was() -> None:
    facts = twin()
    older = {name: part for name, part in facts.result.items() if name != "path"}

    drawing = plot(older, facts.basis.envelopes)

    assert "W" not in _texts(drawing)
    assert set("RTZLM") <= set(_texts(drawing))


def test_axes_carry_their_units_and_the_word_of_the_rule_set() -> None:
    assert {"centre of gravity, arm, in", "weight, lb"} <= set(_texts(_drawn(twin())))
    assert {"moment, kg mm", "mass, kg"} <= set(_texts(_drawn(turboprop(), weight_word="mass")))


def test_limits_and_envelopes_are_named_beside_their_lines() -> None:
    words = " ".join(_texts(_drawn(twin())))

    for name in (
        "take-off limit 6200 lb",
        "performance sheet 12 limit 6150 lb",
        "zero fuel limit 5500 lb",
        "normal",
    ):
        assert name in words


def test_lateral_figures_show_a_side_and_no_bare_sign() -> None:
    words = _texts(_drawn(helicopter(), axis="lateral"))

    assert {"L 50", "R 50"} <= set(words)
    assert not [word for word in words if word.startswith(("-", "\u2212"))]


def test_nothing_on_it_is_coloured() -> None:
    allowed = {"#000", "#fff", "#ccc", "none", None}

    for each in _tree(_drawn(twin())).iter():
        assert each.get("fill") in allowed
        assert each.get("stroke") in allowed
        assert each.get("style") is None


def test_without_an_envelope_or_without_phases_nothing_is_drawn() -> None:
    facts = twin()

    assert plot(facts.result, (), axis="longitudinal") == ""
    assert _drawn(facts, axis="lateral") == ""
    assert plot({**facts.result, "phases": []}, facts.basis.envelopes) == ""


def test_hostile_names_stay_text() -> None:
    facts = twin()
    envelope = replace(facts.basis.envelopes[0], id='<script src="http://x.invalid">&')
    checks = [{**check, "source": "</text><image href='file:///x'/>"} for check in facts.result["checks"]]

    drawing = plot({**facts.result, "checks": checks}, (envelope,))

    tags = {each.tag.removeprefix(SVG) for each in _tree(drawing).iter()}
    assert tags <= {"svg", "g", "line", "text", "rect", "polygon", "polyline", "circle"}


def test_marks_on_one_spot_get_letters_that_do_not_cover_each_other() -> None:
    marks = [Mark(letter, phase, 5.0, 5.0) for phase, letter in MARKS.items()]
    scale = Scale(0.0, 10.0, 0.0, 400.0)

    written = [_tree(part) for part in drawn_marks(marks, scale, scale, 400.0)]

    places = [(float(e.get("x")), float(e.get("y"))) for e in written if e.tag == "text"]
    assert len(places) == 5
    for number, (x, y) in enumerate(places):
        assert all(abs(x - a) >= 10 or abs(y - b) >= 10 for a, b in places[number + 1 :])


@pytest.mark.parametrize("span", [(0.0, 1.0), (150.5, 163.0), (-95.0, 105.0), (1e7, 2e7), (0.001, 0.0012)])
def test_axis_figures_are_round_and_within_the_scale(span) -> None:
    marks = ticks(Scale(*span, 0.0, 1.0))

    assert 2 <= len(marks) <= 8
    assert all(span[0] <= mark <= span[1] for mark in marks)


def test_a_long_label_is_broken_and_a_long_word_is_cut() -> None:
    assert broken("ramp, take-off, landing limit 5900 lb") == ("ramp, take-off, landing", "limit 5900 lb")
    assert all(len(line) <= 25 for line in broken("x" * 300))
