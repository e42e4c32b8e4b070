"""Checks of the centre of gravity, along the aircraft and across it, at each phase.

A margin is two figures, both from the one point x: the way along the arm at the same weight, and the
way in weight at the same arm. Both are decided exactly, in the plane in which the envelope's edges are
straight; a point on an edge is inside.

    weight ^   ____________
           |  /      |     |
           | /       x<--->|
           |/________|_____|
           +-------------------> arm

Without an envelope at take-off or landing a load is unresolved. Without one at the ramp or at zero fuel
the centre of gravity there is only told (an advisory).
"""

from collections.abc import Callable, Mapping
from fractions import Fraction

from fleet.basis import PHASES, Axis, Phase
from fleet.envelope import Section
from loads.balance.checks_lateral import AT, lateral_by_cg_checks
from loads.balance.operator_margins import told
from loads.balance.prepared import Bound, Prepared
from loads.balance.result import Check, State
from loads.balance.rounding import WEIGHT_PLACES, between, printed, room

NEEDED: tuple[Phase, ...] = ("take-off", "landing", "minimum at landing")
SIDES: dict[Axis, tuple[str, str]] = {"longitudinal": ("forward", "aft"), "lateral": ("left", "right")}
CODES: dict[Axis, str] = {"longitudinal": "cg", "lateral": "lateral"}
TITLES: dict[Axis, str] = {"longitudinal": "CG", "lateral": "lateral CG"}

CgFix = Callable[[], str]


def balance_checks(states: Mapping[Phase, State], ready: Prepared, fix: CgFix) -> list[Check]:
    """Return the checks of both axes at every phase; `fix` is asked only when one of them fails."""
    found = [_at(state, "longitudinal", ready, fix) for state in states.values()]
    by_cg = ready.basis.lateral_by_cg
    if not by_cg and not any(ready.bounds("lateral", phase) for phase in PHASES):
        return [*found, _no_lateral(states, ready)]
    across = [
        _at(state, "lateral", ready, fix)
        for state in states.values()
        if ready.bounds("lateral", state.phase) or not ready.across(state.phase)
    ]
    return found + across + (lateral_by_cg_checks(states, ready, fix) if by_cg else [])


def _at(state: State, axis: Axis, ready: Prepared, fix: CgFix) -> Check:
    """Return the check at one phase: of several envelopes the one with the least room stands for all."""
    bounds = ready.bounds(axis, state.phase)
    if ready.deciding:
        bounds = tuple(bound for bound in bounds if ready.holds_in(bound[0], state.parts))
    if not bounds:
        return _without_envelope(state, axis, ready)
    checks = [_within(state, axis, bound, ready, fix) for bound in bounds]
    if len(checks) == 1:
        return checks[0]
    failing = [check for check in checks if check.outcome == "fail"]
    return min(failing or checks, key=lambda check: (check.room is not None, check.room or Fraction(0)))


def _within(state: State, axis: Axis, bound: Bound, ready: Prepared, fix: CgFix) -> Check:
    envelope, shape = bound
    moment = state.moment if axis == "longitudinal" else state.lateral_moment
    arm = state.arm if axis == "longitudinal" else state.lateral_arm
    inside = shape.holds(state.weight, moment)
    along = shape.arm_section(state.weight, moment)
    upward = shape.weight_section(state.weight, moment)
    places = ready.length_places
    if along is None:
        actual, low, high, margin = printed(arm, places), None, None, None
        digits = places
    else:
        actual, low, high, digits = between(arm, along.low, along.high, places)
        margin = printed(along.margin, digits, "down")
    edge = None if along is None else SIDES[axis][along.edge == "high"]
    check = Check(
        f"{CODES[axis]}.{state.phase.replace(' ', '-')}",
        _title(axis, state.phase),
        "pass" if inside else "fail",
        state.phase,
        actual,
        high,
        low,
        ready.length,
        margin,
        _words(along, upward, edge, digits, ready),
        str(envelope.source),
        "" if inside else fix(),
        None if along is None else along.margin,
        None if upward is None else printed(upward.margin, WEIGHT_PLACES, "down"),
        edge,
    )
    return told(check, state.weight, moment, bound, ready)


def _words(
    along: Section | None, upward: Section | None, edge: str | None, digits: int, ready: Prepared
) -> str:
    """Return both margins in words, such as `1.22 in from the aft limit, 40 lb at the same arm`."""
    if along is None and upward is None:
        return "no part of the envelope lies at this weight or at this arm"
    parts = []
    if along is None:
        parts.append("no part of the envelope lies at this weight")
    elif along.margin.numerator < 0:
        parts.append(f"{room(along.margin, digits)} {ready.length} beyond the {edge} limit")
    elif along.margin.numerator == 0:
        parts.append(f"on the {edge} limit")
    else:
        parts.append(f"{room(along.margin, digits)} {ready.length} from the {edge} limit")
    if upward is not None:
        figure = f"{room(upward.margin, WEIGHT_PLACES)} {ready.weight}"
        if upward.margin.numerator < 0:
            side = "above" if upward.edge == "high" else "below"
            parts.append(f"{figure} {side} the envelope at the same arm")
        else:
            parts.append(f"{figure} at the same arm")
    return ", ".join(parts)


def _without_envelope(state: State, axis: Axis, ready: Prepared) -> Check:
    arm = state.arm if axis == "longitudinal" else state.lateral_arm
    code = f"{CODES[axis]}.{state.phase.replace(' ', '-')}"
    title = _title(axis, state.phase)
    shown = printed(arm, ready.length_places)
    text = f"no envelope is entered for {state.phase}"
    if state.phase not in NEEDED:
        text = f"{text}; the figure is told, not judged"
        return Check(code, title, "advisory", state.phase, shown, unit=ready.length, margin_text=text)
    fix = "Enter the envelope of this phase in the loading basis."
    return Check(
        code, title, "unresolved", state.phase, shown, unit=ready.length, margin_text=text, what_next=fix
    )


def _title(axis: Axis, phase: Phase) -> str:
    return f"{TITLES[axis]}{AT[phase]}"


def _no_lateral(states: Mapping[Phase, State], ready: Prepared) -> Check:
    """Return the one line for an aircraft without lateral envelopes: shown to have none, or not entered."""
    shown = printed(states["take-off"].lateral_arm, ready.length_places)
    code, title = "lateral.take-off", "lateral CG"
    if ready.basis.lateral_limits_entered:
        text = "no lateral limit"
        return Check(code, title, "pass", "take-off", shown, unit=ready.length, margin_text=text)
    return Check(
        code,
        title,
        "unresolved",
        "take-off",
        shown,
        unit=ready.length,
        margin_text="lateral limits were not entered",
        what_next="Enter the lateral limits in the loading basis, or the page that shows there are none.",
    )
