"""Checks of the centre of gravity along the burn: the one worst point of the whole path, for each axis."""

from collections.abc import Callable, Iterable, Mapping
from fractions import Fraction

from fleet.basis import Axis, Phase
from fleet.positions import CARRIED, EXTERNAL_LOAD
from loads.balance.checks_balance import SIDES
from loads.balance.checks_lateral import AT, PATH_CODE, lateral_by_cg_path
from loads.balance.exact import minus, plus, quotient
from loads.balance.operator_margins import told
from loads.balance.path import Gap, Knot, Leg, Path, Stretch, Turn
from loads.balance.path_across import WorstAcross
from loads.balance.path_worst import AXES, Burn, Worst, worst_at_zero_fuel
from loads.balance.prepared import Prepared
from loads.balance.presented import presented
from loads.balance.result import Check, Json, State
from loads.balance.rounding import CHORD_PLACES, VOLUME_PLACES, WEIGHT_PLACES, between, printed, room

TITLES: dict[Axis, str] = {
    "longitudinal": "centre of gravity along the burn",
    "lateral": "lateral centre of gravity along the burn",
}
ZERO_FUEL: dict[Axis, tuple[str, str]] = {
    "longitudinal": ("path.zero-fuel", "centre of gravity at zero fuel over the flight"),
    "lateral": ("path.zero-fuel-lateral", "lateral centre of gravity at zero fuel over the flight"),
}
WHERE: dict[Leg, str] = {
    "taxi": "while taxiing",
    "flight": "between take-off and landing",
    "reserve": "between landing and the least fuel at landing",
}

Fix = Callable[[], str]


def path_checks(burn: Burn, states: Mapping[Phase, State], ready: Prepared, fix: Fix) -> list[Check]:
    """Return the check of each axis that has an envelope; `fix` is asked only when one of them fails."""
    found = [
        _check(burn, axis, states, ready, fix)
        for axis in AXES
        if axis == "longitudinal" or axis in burn.worst or ready.bounds(axis, "take-off")
    ]
    if burn.path.zero_fuel:
        found += _zero_fuel_checks(burn, states, ready, fix)
    if not ready.basis.lateral_by_cg:
        return found

    def where(worst: WorstAcross) -> tuple[Json, str]:
        at = _at(worst, burn.path, states, ready)
        return at, _place(worst, at, ready)

    return found + [
        _with_gaps(check, burn.path, ready) for check in lateral_by_cg_path(burn.path, ready, fix, where)
    ]


def path_document(burn: Burn, checks: Iterable[Check], ready: Prepared) -> Json:
    """Return the path for the plot and the paper: its kinks between phases, and its worst points as the
    checks name them. In a stretch that is bent its middle is told, too. With a sequence `runs` has the kinks
    in the order of flight, from jump to jump.
    """
    kinks = []
    for stretch in burn.path.stretches:
        if stretch.bend:
            kinks.append(stretch.at((stretch.start.weight + stretch.end.weight) / 2))
        if stretch.end.phase is None:
            kinks.append(stretch.end)
    # Copied, so that a document holds nothing twice: whoever changes one place of it changes that one alone.
    at = {check.code: _own(check.at) for check in checks if check.at is not None}
    worst: list[Json] = [{"axis": axis, **at[f"path.{axis}"]} for axis in burn.worst if f"path.{axis}" in at]
    if PATH_CODE in at:
        worst.append({"axis": "lateral by CG", **at[PATH_CODE]})
    told: Json = {"points": [_figures(knot, _arms(knot), ready) for knot in kinks], "worst": worst}
    if burn.path.turns:
        told["runs"] = [
            [_figures(knot, _arms(knot), ready) for knot in run] for run in _runs(burn.path.stretches)
        ]
    return told


def _own(at: Json) -> Json:
    return {name: part.copy() if isinstance(part, dict | list) else part for name, part in at.items()}


def _runs(stretches: Iterable[Stretch]) -> list[list[Knot]]:
    """Return the kinks of a path that jumps at events, in the order of flight: a list from jump to jump."""
    runs: list[list[Knot]] = []
    for stretch in stretches:
        if not runs or runs[-1][-1][:3] != stretch.start[:3]:
            runs.append([stretch.start])
        if stretch.bend:
            runs[-1].append(stretch.at((stretch.start.weight + stretch.end.weight) / 2))
        runs[-1].append(stretch.end)
    return runs


def _check(burn: Burn, axis: Axis, states: Mapping[Phase, State], ready: Prepared, fix: Fix) -> Check:
    code, title = f"path.{axis}", TITLES[axis]
    worst = burn.worst.get(axis)
    broken = worst is not None and (worst.room is None or worst.room.numerator < 0)
    if not broken:
        unknown = _unknown(burn.path, axis, ready)
        if unknown is not None:
            text, what_next = unknown
            return Check(code, title, "unresolved", margin_text=text, what_next=what_next)
    if worst is None:
        return Check(code, title, "pass", margin_text="nothing is burned in flight")
    return worst_check((code, title), axis, worst, _at(worst, burn.path, states, ready), ready, fix=fix)


def _zero_fuel_checks(burn: Burn, states: Mapping[Phase, State], ready: Prepared, fix: Fix) -> list[Check]:
    """Return the check of zero fuel over the flight, for each axis that has an envelope for it."""
    return [
        worst_check(ZERO_FUEL[axis], axis, worst, _at(worst, burn.path, states, ready), ready, fix=fix)
        for axis in AXES
        for worst in worst_at_zero_fuel(burn.path, axis, ready)
    ]


def worst_check(
    named: tuple[str, str], axis: Axis, worst: Worst, at: Json, ready: Prepared, *, fix: Fix
) -> Check:
    """Return the check of a worst point, which is `at`; `named` are its code and title."""
    broken = worst.room is None or worst.room.numerator < 0
    places = ready.length_places
    if worst.low is None or worst.high is None or worst.room is None:
        actual, low, high, margin, edge = printed(worst.arm, places), None, None, None, None
        words = "no part of the envelope lies at this weight"
    else:
        actual, low, high, digits = between(worst.arm, worst.low, worst.high, places)
        margin, edge = printed(worst.room, digits, "down"), SIDES[axis][worst.aft]
        figure = f"{room(worst.room, digits)} {ready.length}"
        side = "beyond" if broken else "from"
        words = f"on the {edge} limit" if not worst.room else f"{figure} {side} the {edge} limit"
    check = Check(
        *named,
        "fail" if broken else "pass",
        worst.knot.phase,
        actual,
        high,
        low,
        ready.length,
        margin,
        f"{words}, {_place(worst, at, ready)}",
        str(worst.bound[0].source),
        fix() if broken else "",
        worst.room,
        None,
        edge,
        at,
    )
    moment = worst.knot.moment if axis == "longitudinal" else worst.knot.lateral_moment
    return told(check, worst.knot.weight, moment, worst.bound, ready)


def _unknown(path: Path, axis: Axis, ready: Prepared) -> tuple[str, str] | None:
    """Return what of a path cannot be judged, and what would mend it; None when all of it can."""
    if not ready.bounds(axis, "take-off") and not (axis == "lateral" and ready.across("take-off")):
        return "no envelope is entered for take-off", "Enter the envelope of this phase in the loading basis."
    if path.gaps:
        return _gap_words(path.gaps[0], ready)
    return _unfit(path, axis, ready) if ready.outside else None


def _unfit(path: Path, axis: Axis, ready: Prepared) -> tuple[str, str] | None:
    """Return where no envelope holds with the external load there is, and what would mend it."""
    bounds = ready.bounds(axis, "take-off")
    flown: list[Stretch | Turn] = [*path.stretches, *path.turns]
    for each in flown:
        fits = each.leg == "taxi" or any(ready.outside_fits(one, each.parts) for one, _ in bounds)
        if bounds and not fits:
            carried = "with" if (EXTERNAL_LOAD, CARRIED) in each.parts else "without"
            where = each.where if isinstance(each, Turn) else WHERE[each.leg]
            text = f"{where} no envelope is entered for a flight {carried} an external load"
            return text, "Enter this envelope in the loading basis."
    return None


def _with_gaps(check: Check, path: Path, ready: Prepared) -> Check:
    """Return a check that is kept as unresolved, where a part of the path is not known."""
    if check.outcome == "fail" or not path.gaps:
        return check
    text, what_next = _gap_words(path.gaps[0], ready)
    return Check(check.code, check.title, "unresolved", margin_text=text, what_next=what_next)


def _gap_words(gap: Gap, ready: Prepared) -> tuple[str, str]:
    name = next(tank.name for tank in ready.basis.tanks if tank.id == gap.tank)
    first = f"{printed(gap.first, VOLUME_PLACES)} {ready.volume}"
    return (
        f"{WHERE[gap.leg]} {name} holds less than {first}, where its table begins",
        f"Change the fuel of {name}, or enter the rest of its table in the loading basis.",
    )


def _place(worst: Worst | WorstAcross, at: Json, ready: Prepared) -> str:
    if worst.knot.phase is not None:
        return AT[worst.knot.phase].strip()
    return f"{at['point']}, at {at['weight']} {ready.weight} with {at['fuel']} {ready.weight} of fuel"


def _at(worst: Worst | WorstAcross, path: Path, states: Mapping[Phase, State], ready: Prepared) -> Json:
    """Return where the worst point is, as it stands in the document: in words, in figures, and with what
    each tank holds.
    """
    knot, phase, stretch = worst.knot, worst.knot.phase, worst.stretch
    dry = states["zero fuel"].weight if stretch.dry is None else stretch.dry
    arms = (states[phase].arm, states[phase].lateral_arm) if phase is not None else _arms(knot)
    percent = ready.chord_percent(arms[0])
    return {
        "point": phase or where_words(stretch),
        **_figures(knot, arms, ready),
        **presented(knot.weight, knot.moment, ready),
        "percent_chord": None if percent is None else printed(percent, CHORD_PLACES),
        "fuel": printed(minus(knot.weight, dry), WEIGHT_PLACES),
        "feeding": list(stretch.feeding),
        "tanks": {
            tank: printed(held, VOLUME_PLACES) for tank, held in held_at(stretch, knot, path.density).items()
        },
    }


def where_words(stretch: Stretch) -> str:
    """Return where on the flight a point of a stretch is; an event and its side, or the leg and what gear and
    flaps are in.
    """
    if not stretch.feeding and stretch.setting:
        return stretch.setting
    return f"{WHERE[stretch.leg]}, with {stretch.setting}" if stretch.setting else WHERE[stretch.leg]


def held_at(stretch: Stretch, knot: Knot, density: Fraction) -> Mapping[str, Fraction]:
    """Return the usable volume in each tank at a point of a stretch; {} where it is not told."""
    contents, before = stretch.held
    if not stretch.feeding:
        return contents
    burned = quotient(minus(stretch.start.weight, knot.weight), density)
    each = plus(before, Fraction(burned.numerator, burned.denominator * len(stretch.feeding)))
    return {tank: minus(held, each) if tank in stretch.feeding else held for tank, held in contents.items()}


def _arms(knot: Knot) -> tuple[Fraction, Fraction]:
    return quotient(knot.moment, knot.weight), quotient(knot.lateral_moment, knot.weight)


def _figures(knot: Knot, arms: tuple[Fraction, Fraction], ready: Prepared) -> dict[str, str]:
    return {
        "weight": printed(knot.weight, WEIGHT_PLACES),
        "moment": printed(knot.moment, ready.moment_places),
        "arm": printed(arms[0], ready.length_places),
        "lateral_arm": printed(arms[1], ready.length_places),
    }
