"""The reference loads come out as published, and an engine broken in any of these places is found."""

import json
from dataclasses import replace
from datetime import UTC, datetime, timedelta
from fractions import Fraction
from pathlib import Path

import pytest

from fleet import conversion
from fleet.envelope import Shape
from fleet.quantities import Unit
from fleet.rules import Applies, Interval, Rule, Rules
from loads.balance import checks_weight, fuel
from loads.balance.assess import assess
from loads.selfcheck import proving
from loads.selfcheck.interval import interval_in, is_overdue
from loads.selfcheck.proving import prove
from loads.selfcheck.references import reference_set

PUBLISHED = Path(__file__).parents[3] / "reference" / "worked_examples.json"


def test_every_reference_load_gives_its_published_answers():
    proof = prove()

    assert [(one.reference.id, one.findings) for one in proof.loads if not one.right] == []
    assert proof.passed
    assert len(proof.loads) == 15
    assert sum(len(one.findings) for one in proof.loads) > 40


def test_every_reference_names_its_source_and_how_its_figures_are_known():
    assert all(
        one.source and one.figures_are in {"read", "computed", "remembered"} for one in reference_set().loads
    )
    assert {one.verdict for one in reference_set().loads} == {"within", "outside"}


def test_the_built_in_figures_are_those_of_the_published_examples():
    """Two hands wrote the figures down: the tests' file of worked examples, and the built-in set."""
    examples = {one["id"]: one for one in json.loads(PUBLISHED.read_text(), parse_float=str)}
    pairs = (
        ("light-single", "PHAK-10-5", "cg_in", "take-off arm"),
        ("light-single", "PHAK-10-5", "moment_lb_in", "take-off moment"),
        ("recorded-moment", "PHAK-10-10", "moment_lb_in", "take-off moment"),
        ("recorded-moment", "PHAK-10-10", "cg_in", "take-off arm"),
        ("forward-extreme", "AC43-10-10", "moment_lb_in", "take-off moment"),
        ("on-the-weight-limit", "AC43-10-13", "moment_lb_in", "take-off moment"),
        ("weight-removed", "PHAK-REMOVE", "new_cg_in", "take-off arm"),
        ("bent-tank", "AH64-BURN", "burned_moment", "burned moment"),
        ("mean-chord", "MAC-2", "percent", "percent of the mean chord"),
        ("ballast-reaches-the-limit", "WBH-BALLAST", "new_cg_in", "take-off arm"),
    )
    built_in = {one.id: one.answers for one in reference_set().loads}

    for ours, theirs, field, name in pairs:
        assert built_in[ours][name].figure == Fraction(examples[theirs]["expected"][field]), (ours, field)


def _everything_inside(monkeypatch):
    monkeypatch.setattr(Shape, "holds", lambda *_: True)
    monkeypatch.setattr(Shape, "holds_whole", lambda *_: True)


def _no_weight_is_too_much(monkeypatch):
    real = checks_weight.at_most
    monkeypatch.setattr(
        checks_weight,
        "at_most",
        lambda figure, limit, fix: real(figure._replace(actual=Fraction(1)), limit, fix),
    )


def _pounds_read_as_kilograms(monkeypatch):
    monkeypatch.setitem(conversion._RATIO, (Unit.KG, Unit.LB), Fraction(1))


def _fuel_lies_at_the_datum(monkeypatch):
    monkeypatch.setattr(fuel, "_moment", lambda *_: Fraction(0))


def _it_stops(monkeypatch):
    def broken(*_):
        raise ZeroDivisionError

    monkeypatch.setattr(proving, "assess", broken)


def _a_millionth_too_heavy(monkeypatch):
    def slightly_off(declared, basis, empty):
        return assess(declared, basis, replace(empty, weight=empty.weight + Fraction(1, 10**6)))

    monkeypatch.setattr(proving, "assess", slightly_off)


@pytest.mark.parametrize(
    "broken",
    [
        _everything_inside,
        _no_weight_is_too_much,
        _pounds_read_as_kilograms,
        _fuel_lies_at_the_datum,
        _it_stops,
        _a_millionth_too_heavy,
    ],
)
def test_a_broken_engine_is_found(broken, monkeypatch):
    broken(monkeypatch)

    assert not prove().passed


def test_a_set_without_a_load_proves_nothing():
    assert not prove(replace(reference_set(), loads=())).passed


def test_the_same_engine_gives_the_same_proof():
    assert prove().as_document() == prove().as_document()


@pytest.mark.parametrize(
    ("checked", "last_good_day"),
    [("2026-01-15", "2026-07-15"), ("2026-08-31", "2027-02-28"), ("2027-08-31", "2028-02-29")],
)
def test_it_counts_six_months_where_the_rules_say_nothing(checked, last_good_day):
    at = datetime.fromisoformat(f"{checked}T10:00:00+00:00")
    last = datetime.fromisoformat(f"{last_good_day}T23:59:59+00:00")

    assert not is_overdue(at, last, interval_in(None, at))
    assert is_overdue(at, last + timedelta(seconds=1), interval_in(None, at))


def test_of_several_rules_the_shortest_interval_counts_and_none_is_a_value():
    now = datetime(2026, 12, 1, tzinfo=UTC)

    def rules(*intervals):
        made = (Rule("computer-check-interval", one, False, "manual 8.1", Applies()) for one in intervals)
        return Rules("rules", tuple(made))

    assert interval_in(rules(Interval(1, "years"), Interval(90, "days")), now) == Interval(90, "days")
    assert interval_in(rules(None), now) is None
    assert not is_overdue(now - timedelta(days=9000), now, None)
    assert interval_in(rules(), now) == Interval(6, "months")
