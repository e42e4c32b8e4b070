"""The plot of lateral limits against the longitudinal CG: marks, sides in letters, the worst point."""

import xml.etree.ElementTree as ET
from dataclasses import replace

from loads.plot_across import plot_across
from tests.pure.loads.accepted_loads import accepted, helicopter, helicopter_load
from tests.pure.loads.rich_bases import helicopter_with_limits

SVG = "{http://www.w3.org/2000/svg}"


def _facts():
    return accepted(helicopter_load(), "helicopter", change=helicopter_with_limits)


def _texts(drawing):
    tree = ET.fromstring(drawing)  # noqa: S314  # our own drawing
    return [each.text or "" for each in tree.iter(f"{SVG}text")]


def test_every_phase_and_the_worst_point_is_marked_and_sides_are_letters():
    facts = _facts()
    texts = _texts(plot_across(facts.result, facts.basis.lateral_by_cg))
    assert set("RTZLMW") <= set(texts)
    assert {"R 50", "L 50"} <= set(texts)
    assert "lateral arm, mm" in texts
    assert "hover lateral limit:" in texts


def test_it_is_told_in_words_for_those_who_do_not_see_it():
    facts = _facts()
    tree = ET.fromstring(plot_across(facts.result, facts.basis.lateral_by_cg))  # noqa: S314  # our own drawing
    assert "take-off: R 11 mm at 2351.6 mm" in (tree.get("aria-label") or "")


def test_a_limit_of_moments_is_drawn_in_moments():
    facts = _facts()
    limit = facts.basis.lateral_by_cg[0]
    moments = tuple((x, y * 1000) for x, y in limit.points)
    texts = _texts(plot_across(facts.result, (replace(limit, gives="moment", points=moments),)))
    assert "lateral moment, kg mm" in texts


def test_a_burn_that_jumps_at_events_is_drawn_run_by_run():
    facts = _facts()
    phases = [row for row in facts.result["phases"] if row["phase"] != "zero fuel"]
    path = {**facts.result["path"], "runs": [phases[:2], phases[2:]]}
    tree = ET.fromstring(plot_across({**facts.result, "path": path}, facts.basis.lateral_by_cg))  # noqa: S314  # our own drawing
    assert len(list(tree.iter(f"{SVG}polyline"))) == 2


def test_there_is_nothing_to_draw_without_a_limit_or_phases():
    facts = helicopter()
    assert plot_across(facts.result, ()) == ""
    assert plot_across({**facts.result, "phases": []}, _facts().basis.lateral_by_cg) == ""
