"""The two lines a pilot looks for first: which limit of weight governs, and where the CG comes nearest to an
edge.
"""

from collections.abc import Mapping
from fractions import Fraction

from fleet.basis import Phase
from loads.balance.aboard import Declared
from loads.balance.allowable import Allowable
from loads.balance.prepared import Prepared
from loads.balance.result import Check, State
from loads.balance.rounding import VOLUME_PLACES, WEIGHT_PLACES, against_maximum, printed, room

NOT_KNOWN = "not known"
LONGITUDINAL_PATH = "path.longitudinal"


def weight_line(allowable: Allowable, take_off: State, ready: Prepared) -> str:
    """Return the least allowable take-off weight, what governs it, and the room or the excess."""
    if allowable.least is None:
        return "no limit bears on the take-off weight"
    name, limit = allowable.least
    shown, bound, digits = against_maximum(take_off.weight, limit, WEIGHT_PLACES)
    left = limit - take_off.weight
    figure = f"{room(left, digits)} {ready.weight}"
    words = "on the limit" if left == 0 else f"{figure} left" if left > 0 else f"{figure} too much"
    open_ends = f"; not entered: {', '.join(allowable.not_entered)}" if allowable.not_entered else ""
    return (
        f"take-off weight {shown} of {bound} {ready.weight} allowed, governed by {name}: {words}{open_ends}"
    )


def cg_line(checks: tuple[Check, ...]) -> str:
    """Return the least distance to an edge along the arm at the same weight, and where on the flight it is.

    At a phase the room in weight at the same arm is told, too.
    """
    judged = [
        check
        for check in checks
        if (check.code.startswith("cg.") or (check.code == LONGITUDINAL_PATH and check.actual))
        and check.outcome in ("pass", "fail")
    ]
    if not judged:
        return NOT_KNOWN
    nearest = min(judged, key=lambda check: (check.room is not None, check.room or Fraction(0)))
    if nearest.code == LONGITUDINAL_PATH:
        return f"along the burn: {nearest.margin_text}"
    return f"{nearest.title.removeprefix('CG ')}: {nearest.margin_text}"


def return_advisory(declared: Declared, states: Mapping[Phase, State], ready: Prepared) -> list[str]:
    """Return the line on a landing straight after take-off above the landing weight: lawful, so never a
    verdict.
    """
    limit = declared.configuration.limits.landing
    take_off = states["take-off"]
    if limit is None or limit.value is None or take_off.weight <= limit.value:
        return []
    over = take_off.weight - limit.value
    if over > take_off.fuel:
        return ["overweight for landing after take-off, whatever fuel is burned"]
    volume = f"{printed(over / declared.fuel.density, VOLUME_PLACES, 'up')} {ready.volume}"
    weight = f"{printed(over, WEIGHT_PLACES, 'up')} {ready.weight}"
    return [f"overweight for landing until {volume} ({weight}) are burned"]
