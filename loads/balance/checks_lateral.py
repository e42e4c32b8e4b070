r"""Checks of lateral limits that vary with the longitudinal centre of gravity: at each phase and on the burn.

lateral ^   _______
(right) |  /   |   \      The point x is judged along the line of its own longitudinal CG: the way to
        | |    x    |      the nearer end of what lies inside on that line, as an arm or as a moment,
        |  \___|___/       whichever the manual gives. A point on an edge is inside.
        +-------------> longitudinal arm
"""

from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import replace
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Phase
from fleet.lateral import LateralByCg
from loads.balance.path import Leg, Path
from loads.balance.path_across import (
    WorstAcross,
    courses_of,
    lateral_figure,
    moved,
    stays_across,
    worst_across,
)
from loads.balance.path_course import Course
from loads.balance.path_worst import shifted
from loads.balance.prepared import Prepared
from loads.balance.result import Check, Json, State
from loads.balance.rounding import between, printed, room

AT: dict[Phase, str] = {
    "ramp": " at the ramp",
    "take-off": " at take-off",
    "zero fuel": " at zero fuel",
    "landing": " at landing",
    "minimum at landing": " with the least fuel at landing",
}
HOLDS: dict[Leg, tuple[Phase, ...]] = {
    "taxi": ("ramp",),
    "flight": ("take-off",),
    "reserve": ("take-off", "landing"),
}
CODE, PATH_CODE = "lateral-by-cg", "path.lateral-by-cg"
TITLE = "lateral CG for its longitudinal CG"
OFF = "no lateral limit is given for a longitudinal CG of"
OFF_FIX = "Bring the longitudinal CG to where a lateral limit is given, then assess again."
Fix = Callable[[], str]
Told = Callable[[WorstAcross], tuple[Json, str]]  # where a point of the path is: for the document, in words


class Figures(NamedTuple):
    """What is printed of a lateral figure against its limits."""

    actual: str
    low: str | None
    high: str | None
    unit: str
    margin: str | None
    words: str
    edge: str | None


def lateral_by_cg_checks(states: Mapping[Phase, State], ready: Prepared, fix: Fix) -> list[Check]:
    """Return the check of each phase that has such a limit; `fix` is asked only when one fails."""
    return [
        _at(state, limit, ready, fix)
        for state in states.values()
        for limit in ready.across(state.phase)
        if ready.holds_in(limit, state.parts)
    ]


def lateral_by_cg_path(path: Path, ready: Prepared, fix: Fix, told: Told) -> list[Check]:
    """Return the check of the worst point of the whole path; [] where no limit holds on any of it."""
    found = [worst for limit, held in held_along(path, ready) if (worst := worst_across(held, limit))]
    if not found:
        return []
    worst = min(found, key=lambda each: (each.room is not None, each.room or Fraction(0)))
    at, place = told(worst)
    broken = worst.room is None or worst.room < 0
    knot = worst.knot
    shown = _figures(worst.figure, knot.moment / knot.weight, _ends(worst), worst.limit, ready)
    return [
        Check(
            PATH_CODE,
            f"{TITLE} along the burn",
            "fail" if broken else "pass",
            knot.phase,
            shown.actual,
            shown.high,
            shown.low,
            shown.unit,
            shown.margin,
            f"{shown.words}, {place}",
            str(worst.limit.source),
            (OFF_FIX if worst.room is None else fix()) if broken else "",
            worst.room,
            None,
            shown.edge,
            at,
        )
    ]


def stays_within_lateral(
    states: Mapping[Phase, State], path: Path, ready: Prepared, added: tuple[Fraction, Fraction]
) -> bool:
    """Return whether every phase and the whole path stay inside once moments along and across are added."""
    along, across = added
    return all(
        limit.shape.holds(
            (state.moment + along) / state.weight,
            lateral_figure(limit, state.weight, state.lateral_moment + across),
        )
        for state in states.values()
        for limit in ready.across(state.phase)
    ) and all(stays_across(held, limit) for limit, held in held_along(shifted(path, along, across), ready))


def held_along(path: Path, ready: Prepared) -> Iterable[tuple[LateralByCg, Sequence[Course]]]:
    """Yield each limit with the parts of the flight it holds on: as envelopes do, from engine start to
    take-off those of the ramp, in flight those of take-off, from the planned landing on those of landing
    as well.
    """
    for limit in ready.basis.lateral_by_cg:
        part = replace(
            path,
            stretches=tuple(each for each in path.stretches if ready.holds_in(limit, each.parts)),
            settings=tuple(each for each in path.settings if ready.holds_in(limit, each.parts)),
            turns=tuple(each for each in path.turns if ready.holds_in(limit, each.parts)),
        )
        held = courses_of(part, [leg for leg, phases in HOLDS.items() if set(phases) & set(limit.phases)])
        if "zero fuel" in limit.phases:
            for turn in path.zero_fuel:
                if ready.holds_in(limit, turn.parts):
                    held += moved(turn)
        if held:
            yield limit, held


def _at(state: State, limit: LateralByCg, ready: Prepared, fix: Fix) -> Check:
    actual = lateral_figure(limit, state.weight, state.lateral_moment)
    section = limit.shape.section(state.arm, actual)
    ends = None if section is None else (section.low, section.high, section.margin, section.edge == "high")
    shown = _figures(actual, state.arm, ends, limit, ready)
    inside = limit.shape.holds(state.arm, actual)
    return Check(
        f"{CODE}.{state.phase.replace(' ', '-')}",
        f"{TITLE}{AT[state.phase]}",
        "pass" if inside else "fail",
        state.phase,
        shown.actual,
        shown.high,
        shown.low,
        shown.unit,
        shown.margin,
        shown.words,
        str(limit.source),
        "" if inside else OFF_FIX if section is None else fix(),
        None if section is None else section.margin,
        None,
        shown.edge,
    )


def _ends(worst: WorstAcross) -> tuple[Fraction, Fraction, Fraction, bool] | None:
    if worst.low is None or worst.high is None or worst.room is None:
        return None
    return worst.low, worst.high, worst.room, worst.right


def _figures(
    actual: Fraction,
    along: Fraction,
    ends: tuple[Fraction, Fraction, Fraction, bool] | None,
    limit: LateralByCg,
    ready: Prepared,
) -> Figures:
    moments = limit.gives == "moment"
    unit, places = (ready.moment, ready.moment_places) if moments else (ready.length, ready.length_places)
    if ends is None:
        words = f"{OFF} {printed(along, ready.length_places)} {ready.length}"
        return Figures(printed(actual, places), None, None, unit, None, words, None)
    low, high, margin, right = ends
    shown, least, most, digits = between(actual, low, high, places)
    edge = "right" if right else "left"
    if not margin:
        words = f"on the {edge} limit"
    else:
        words = f"{room(margin, digits)} {unit} {'from' if margin > 0 else 'beyond'} the {edge} limit"
    return Figures(shown, least, most, unit, printed(margin, digits, "down"), words, edge)
