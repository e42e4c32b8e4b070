"""Gear and flaps: a moment change per position, and every position that may hold is checked.

Common practice of flight manuals that print a moment change for a retracted gear; every figure is reckoned by
hand on the invented aircraft of `round_figures`, alone aboard: 2560 lb and 254000 lb in at take-off, so that
with the moment change c the arm at the weight W is 100 - (2000 - c) / W.
"""

from typing import Any

import pytest

from fleet.positions import MovingPart, PartState
from loads.balance.result import Result
from tests.pure.loads.making import SOURCE, F, envelope
from tests.pure.loads.round_figures import at, box, flown, q, round_basis, round_load

BOTH, FLIGHT, GROUND = ("ground", "flight"), ("flight",), ("ground",)


def part(name: str, *states: tuple[str, int, Any]) -> MovingPart:
    """A part; its first state is as weighed."""
    made = tuple(PartState(each, each.lower(), F(change), holds, SOURCE) for each, change, holds in states)
    return MovingPart(name, name.lower(), states[0][0], made)


GEAR = part("GEAR", ("DOWN", 0, BOTH), ("UP", -2560, FLIGHT))
FLAPS = part("FLAPS", ("IN", 0, BOTH), ("OUT", 1280, BOTH))


def air(forward: Any) -> Any:
    return box(forward, 110, phases=("take-off", "landing"))


def alone(*envelopes: Any, parts: Any = (GEAR,), least: Any = 80, sequence: Any = None) -> Result:
    more = {} if sequence is None else {"sequence": sequence}
    document = round_load(fuel={"minimum_at_landing": q(least)}, **more)
    return flown(document, round_basis(*envelopes, positions=parts))


def test_gear_up_is_checked_along_the_whole_flight_though_nobody_asked() -> None:
    # gear up: 100 - 4560 / W. Least fuel 80 lb leaves 2280 lb: exactly 98 in, on the line.
    on_the_line = alone(air(98)).check("path.longitudinal")
    assert (on_the_line.outcome, on_the_line.room) == ("pass", 0)
    words = "between landing and the least fuel at landing, with gear up"
    assert on_the_line.margin_text == f"on the forward limit, {words}, at 2280 lb with 80 lb of fuel"

    # One pound less fuel: 100 - 4560 / 2279, a hair beyond.
    beyond = alone(air(98), least=79)
    assert beyond.check("path.longitudinal").room == 2 - F(4560, 2279)
    assert beyond.verdict == "outside"
    assert beyond.check("cg.minimum-at-landing").outcome == "pass"


def test_phases_are_as_weighed_and_taxiing_is_with_what_holds_on_the_ground() -> None:
    result = alone(air(98))
    assert at(result, "take-off") == (2560, 254_000)
    # 100 - 4560 / 2560 = 98.22 at engine start with the gear up, which it never is there
    ramp = box("99.1", 110, phases=("ramp",))
    assert alone(ramp, air(97)).verdict == "within"


def test_every_way_the_positions_go_together_is_checked() -> None:
    # gear up alone -2560, flaps out alone +1280, both -1280: at 2560 lb 98.22, 99.72, 98.72 in
    forward = alone(box("98.5", 110), parts=(GEAR, FLAPS)).check("path.longitudinal")
    assert "with gear up, at" in forward.margin_text
    # aft: flaps out alone is the farthest, 100 - 720 / 2560 = 99.71875 in at take-off
    aft = alone(box(90, "99.71875"), parts=(GEAR, FLAPS)).check("path.longitudinal")
    assert (aft.outcome, aft.room) == ("pass", 0)
    assert aft.margin_text.startswith("on the aft limit, between take-off and landing, with flaps out")


def test_a_position_the_sequence_states_holds_from_there_and_no_other() -> None:
    # Up at once, down again before the landing: 2440 lb is the least with the gear up, 100 - 4560 / 2440.
    up_and_down = [
        {"after_burning": q(0), "position": {"GEAR": "UP"}},
        {"after_burning": q(120), "position": {"GEAR": "DOWN"}},
    ]
    result = alone(air(98), least=79, sequence=up_and_down)
    assert result.verdict == "within"
    worst = result.check("path.longitudinal")
    assert worst.room == 2 - F(4560, 2440)
    assert worst.margin_text.endswith("just before event 2, at 2440 lb with 240 lb of fuel")
    assert [line.moment for line in result.lines if line.group == "sequence"] == [-2560, 2560]


def test_flaps_set_before_take_off_and_for_the_landing_are_in_the_phases() -> None:
    steps = [
        {"since": "engine start", "after_burning": q(0), "position": {"FLAPS": "OUT"}},
        {"after_burning": q(0), "position": {"FLAPS": "IN"}},
        {"after_burning": q(120), "position": {"FLAPS": "OUT"}},
    ]
    result = alone(parts=(FLAPS,), sequence=steps)
    assert at(result, "ramp") == (2560, 254_000)
    assert at(result, "take-off") == (2560, 255_280)
    assert at(result, "landing") == (2440, 242_000 + 1280)


def test_between_two_parts_of_an_envelope_no_setting_is_taken_for_inside() -> None:
    # A notch from 98.3 to 99.1 in reaches up through all these weights: gear down (99.2 in) right of it, gear
    # up (98.2 in) left of it, and half way in it.
    notched = envelope(
        (97, 2000), (97, 4000), (110, 4000), (110, 2000), ("99.1", 2000), ("98.7", 3000), ("98.3", 2000)
    )
    half = part("GEAR", ("DOWN", 0, BOTH), ("UP", -2560, FLIGHT), ("HALF", -1280, FLIGHT))
    assert alone(notched, least=230).check("cg.take-off").outcome == "pass"
    assert alone(notched, parts=(half,), least=230).check("path.longitudinal").outcome == "fail"


def test_zero_fuel_is_checked_in_every_setting_where_the_manual_limits_it() -> None:
    # 2200 lb, 218000 - 2560: 97.93 in
    zero = box(98, 110, phases=("zero fuel",))
    result = alone(box(90, 110, phases=("take-off", "landing")), zero)
    check = result.check("path.zero-fuel")
    assert (check.outcome, check.room) == ("fail", F(215_440, 2200) - 98)
    assert "at zero fuel, with gear up" in check.margin_text
    assert result.check("cg.zero-fuel").outcome == "pass"


@pytest.mark.parametrize("parts", [(), (part("GEAR", ("DOWN", 0, BOTH), ("UP", 0, FLIGHT)),)])
def test_without_positions_or_with_one_that_shifts_nothing_the_path_is_as_it_was(parts: Any) -> None:
    plain = flown(round_load(), round_basis())
    result = flown(round_load(), round_basis(positions=parts))
    assert result.as_document() == plain.as_document()
