"""Zero fuel: everything aboard at take-off less the fuel burnable on this flight. Trapped fuel stays in;
weight is checked where the manual limits it; CG decides only where the manual gives an envelope for it.

14 CFR 110.2, "maximum zero fuel weight": no disposable fuel or oil (read). Reckoned by hand on the aircraft
of `round_figures`: 2200 lb and 218000 lb in without fuel.
"""

from typing import Any

import pytest

from tests.pure.loads.making import F
from tests.pure.loads.round_figures import at, box, flown, q, round_basis, round_load

AIR = box(80, 120, phases=("ramp", "take-off", "landing"))


def test_trapped_fuel_stays_in() -> None:
    # 10 US gal cannot be used: 60 lb at 100 in
    document = round_load(fuel={"not_usable": {"MAIN": q(10, "US gal")}})
    assert at(flown(document), "zero fuel") == (2260, 224_000)


@pytest.mark.parametrize(("limit", "words"), [(2200, "on the limit"), (2199, "1 lb above the limit")])
def test_the_weight_is_checked_where_the_manual_limits_it(limit: int, words: str) -> None:
    assert (
        flown(round_load(), round_basis(weights={"zero_fuel": limit})).check("weight.zero-fuel").margin_text
        == words
    )


def test_without_an_envelope_the_cg_is_told_and_never_decides() -> None:
    result = flown(round_load(), round_basis(AIR))
    check = result.check("cg.zero-fuel")
    assert (check.outcome, check.actual) == ("advisory", "99.09")
    assert result.verdict == "within"
    told = "CG at zero fuel: no envelope is entered for zero fuel; the figure is told, not judged"
    assert told in result.as_document()["not_assessed"]


@pytest.mark.parametrize(("forward", "verdict"), [("99.09", "within"), ("99.1", "outside")])
def test_with_an_envelope_the_cg_decides(forward: str, verdict: str) -> None:
    # 218000 / 2200 = 99.0909 in
    zero = box(forward, 120, phases=("zero fuel",))
    assert flown(round_load(), round_basis(AIR, zero)).verdict == verdict


def test_weight_is_with_everybody_who_takes_off_though_some_leave_before_the_fuel_is_gone() -> None:
    off: list[dict[str, Any]] = [{"after_burning": q(0), "leave": [{"seat": "S1"}, {"seat": "S2"}]}]
    result = flown(round_load(2, sequence=off), round_basis(weights={"zero_fuel": 2600}))
    assert at(result, "zero fuel") == (2600, 262_000)
    assert result.check("weight.zero-fuel").margin_text == "on the limit"


def test_the_cg_at_zero_fuel_is_checked_as_loaded_and_after_every_event() -> None:
    # 2600 lb at 262000: 100.77 in; with both gone 2200 lb at 218000: 99.09 in
    off: list[dict[str, Any]] = [{"after_burning": q(0), "leave": [{"seat": "S1"}, {"seat": "S2"}]}]
    zero = box("99.5", 120, phases=("zero fuel",))
    result = flown(round_load(2, sequence=off), round_basis(AIR, zero))
    assert result.check("cg.zero-fuel").outcome == "pass"
    check = result.check("path.zero-fuel")
    assert (check.outcome, check.room) == ("fail", F(218_000, 2200) - F("99.5"))
    assert "at zero fuel after event 1" in check.margin_text
