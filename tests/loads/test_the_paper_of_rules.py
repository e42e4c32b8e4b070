"""What the paper says where a basis has categories, trim, fuel balance and lateral limits against the CG."""

import re

from loads.manifest.printing import html_of
from tests.pure.loads.accepted_loads import accepted, helicopter_load, q, twin_load
from tests.pure.loads.rich_bases import helicopter_with_limits, twin_with_limits


def _words(facts) -> str:
    text = re.sub(r"<[^>]+>", " ", html_of(facts))
    return re.sub(r"\s+", " ", text.replace("\u00a0", " "))


def _twin():
    limit = {"at": "take-off", "weight": q(6150, "lb"), "source": "sheet 12", "kind": "climb"}
    load = twin_load(certification_category="utility", limits=[limit])
    return accepted(load, "twin", change=twin_with_limits)


def test_trim_category_and_the_limit_of_the_category_stand_where_the_pilot_looks_first() -> None:
    words = _words(_twin())
    assert "configuration six-seat, utility category" in words
    assert "Trim setting flaps up: 4.9 units nose up; flaps 10: 5.4 units nose up" in words
    assert "allowable 6100 lb" in words
    assert "fuel balance, main and auxiliary tanks" in words
    assert "take-off weight, climb, sheet 12" in words
    assert "performance-limited take-off weight" in words


def test_the_lateral_limit_has_a_plot_a_row_for_its_worst_point_and_checks_with_sides() -> None:
    facts = accepted(helicopter_load(), "helicopter", change=helicopter_with_limits)
    words = _words(facts)
    assert html_of(facts).count("<svg xmlns") >= 3
    assert "lateral by CG worst, minimum at landing" in words
    assert "lateral CG for its longitudinal CG at take-off L 89.4 R 11.0 R 89.4 mm" in words


def test_a_basis_without_any_of_it_prints_none_of_it() -> None:
    words = _words(accepted(twin_load(), "twin"))
    assert (
        "Trim setting not in the loading basis" in words or "Trim setting none in the approved data" in words
    )
    assert "fuel balance" not in words
