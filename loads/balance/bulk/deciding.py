r"""Many loads decided at once in binary floats, with a proven bound on every error.

What lies within the bound of a limit is not decided here: it is computed exactly, one by one. So the bulk
sums and the exact assessment agree on every load.

The bound. Let u = 2**-53, the unit round-off of the floats (IEEE 754 binary64, to nearest). Of a batch let

    W  be the greatest sum of |weights| of one load: base, seats and places, fuel at engine start,
    A  the greatest |arm| there is, along or across: of spots, of tables and of their slopes, of the base,
    N  the number of roundings behind any one figure, counted in `_roundings`.

Every input is an exact rational rounded once (relative error u at most), limits and arms, too. A weight is a
sum of at most N terms and products, every partial result at most 2 * W, so it is off by 2 * N * u * W at
most. Volumes are taken out of tanks by min, max, sums and differences, none of which enlarges the errors of
its inputs beyond their sum; as weights they are parts of W, so the same bound holds. A moment is a sum of
weights times arms: each term errs by the error of the weight times A, by that of the arm, u * A, times the
weight, and by its own roundings. A tank's moment is read from a continuous curve in straight or square pieces
whose steepest part is A at most, so an error in volume shifts it no further than A times that error; reading
it takes 8 roundings at most. So

    error of a weight  <=  E = 4 * N * u * W            error of a moment  <=  4 * A * E

with a factor of two to spare for terms in u**2, since N * u < 2**-40. A margin to an edge of an envelope is
M - (e0 + e1 * V + e2 * V**2) at the weight V; with S >= |e1| + 2 * |e2| * V and T the sum of the |parts| the
edge errs by S * E for the weight and by 8 * u * T for its own roundings. `Errors` holds twice these bounds.

The burn. Between two phases the exact path leaves the straight line between their moments by at most
(a - s) * (s - b) / (a - b) * h, where h is the weight burned, s the mean arm of what was burned, a and b the
greatest and the least arm that any fuel there can have: no curve of those slopes between those two ends goes
further. The margin along such a line bends downwards by `bent` * h**2 at most. So the least margin of a leg
is no less than the least of its margins at both phases and at each corner's weight in between, less both.
When that is above the errors the leg is inside; else the load is computed exactly.
"""

from dataclasses import dataclass
from typing import Final

import numpy as np
from numpy.typing import NDArray

from fleet.basis import Phase
from loads.balance.bulk.drawing import Volumes, drawn, moments, tanks_in, total
from loads.balance.bulk.judging import Errors, Judge, Marks, State
from loads.balance.bulk.known import Bounds, Floats, Known
from loads.balance.bulk.reading import NO_LIMIT, Batch

WITHIN, OUTSIDE, UNDECIDED = 0, 1, 2
_UNIT_ROUNDOFF: Final = 2.0**-53
_ROWS_AT_ONCE: Final = 4096  # their columns stay in the cache of one core


@dataclass(frozen=True, slots=True)
class Decision:
    """One verdict a load: WITHIN, OUTSIDE or UNDECIDED. Of a load outside `limit` is the code of the first
    limit found broken and `excess` by how much, in the limit's unit (a moment, for an envelope); else ""
    and 0.
    """

    verdict: NDArray[np.int8]
    limit: list[str]
    excess: Floats


def decide(known: Known, batch: Batch) -> Decision:
    """Return the verdict of each load of a batch."""
    verdict = np.empty(len(batch), dtype=np.int8)
    limit = [""] * len(batch)
    excess = np.zeros(len(batch))
    for start in range(0, len(batch), _ROWS_AT_ONCE):
        rows = slice(start, start + _ROWS_AT_ONCE)
        judge = _judged(known, batch.part(rows))
        found = np.where(judge.outside, OUTSIDE, np.where(judge.unsure, UNDECIDED, WITHIN))
        verdict[rows] = np.where(judge.refused, UNDECIDED, found)
        for code, fails, over in reversed(judge.broken):  # of several the first one stands
            for row in np.flatnonzero(fails):
                limit[start + row] = code
                excess[start + row] = over[row]
    return Decision(verdict, limit, excess)


def _judged(known: Known, batch: Batch) -> Judge:
    aboard, fuel = batch.held.sum(axis=1), batch.usable.sum(axis=1)
    judge = Judge(known, batch, _errors(known, aboard, fuel, batch.density))
    contents = _contents(judge)
    states = _states(judge, contents, aboard)
    _weights(judge, states)
    for bounds in known.bounds:
        _envelope(judge, bounds, states)
    staying = total(contents["zero fuel"])
    landing = total(contents["landing"]) - staying
    judge.left("fuel.minimum-at-landing", (landing - batch.least) * batch.density, judge.errors.weight)
    _spots(judge)
    return judge


def _errors(known: Known, aboard: Floats, fuel: Floats, density: Floats) -> Errors:
    greatest = abs(known.base[0]) + float((aboard + fuel * density).max(initial=0.0))
    weight = 8 * _roundings(known) * _UNIT_ROUNDOFF * greatest
    lightest = float(density.min(initial=NO_LIMIT))
    return Errors(weight, weight / lightest, 4 * known.reach * weight)


def _roundings(known: Known) -> int:
    """Return N: a sum over the spots, and what the tanks take at each stage of three legs."""
    stages = len(known.taxi_order) + 2 * len(known.burn_order)
    return len(known.spots) + 16 * (len(known.tanks) + 1) * (stages + 1) + 64


def _contents(judge: Judge) -> dict[Phase, Volumes]:
    """Return the usable volume in each tank at each phase.

    A load whose tanks may not hold what it burns is refused by the exact reading, or nearly.
    """
    known, batch, errors = judge.known, judge.batch, judge.errors
    ramp = list(batch.usable.T)
    take_off = drawn(ramp, known.taxi_order, batch.taxi)
    landing = drawn(take_off, known.burn_order, batch.trip)
    for held, order, volume in (
        (ramp, known.taxi_order, batch.taxi),
        (take_off, known.burn_order, batch.trip),
    ):
        feeding = total([held[tank] for tank in tanks_in(order)])
        judge.refused |= (feeding - volume <= errors.volume) & (volume > 0)
    least = drawn(landing, known.burn_order, total(landing) - batch.least)
    fed = set(tanks_in(known.burn_order))
    nothing = np.zeros(len(batch))
    return {
        "ramp": ramp,
        "take-off": take_off,
        "zero fuel": [nothing if tank in fed else one for tank, one in enumerate(take_off)],
        "landing": landing,
        "minimum at landing": least,
    }


def _states(judge: Judge, contents: dict[Phase, Volumes], aboard: Floats) -> dict[Phase, State]:
    known, batch = judge.known, judge.batch
    weight = aboard + known.base[0]
    along = batch.held @ known.arms + known.base[1]
    across = batch.held @ known.laterals + known.base[2]
    states = {}
    for phase, volumes in contents.items():
        moment, lateral = moments(known.tanks, volumes)
        states[phase] = State(
            weight + total(volumes) * batch.density,
            along + moment * batch.density,
            across + lateral * batch.density,
        )
    # More is taken out than there is: for the exact sum to say.
    judge.refused |= states["zero fuel"].weight <= judge.errors.weight
    return states


def _weights(judge: Judge, states: dict[Phase, State]) -> None:
    """Judge every limit of weight, and those stated with the load."""
    known, batch, error = judge.known, judge.batch, judge.errors.weight
    for phase, most in known.limits.items():
        if most != NO_LIMIT:
            judge.left(f"weight.{phase.replace(' ', '-')}", most - states[phase].weight, error)
    if known.minimum_flying is not None:
        lightest = np.minimum(states["landing"].weight, states["minimum at landing"].weight)
        lightest = np.minimum(lightest, states["take-off"].weight)
        judge.left("weight.minimum-flying", lightest - known.minimum_flying, error)
    judge.left("performance.take-off", batch.take_off - states["take-off"].weight, error)
    judge.left("performance.landing", batch.landing - states["landing"].weight, error)


def _spots(judge: Judge) -> None:
    """Judge what seats, places and zones hold; a limit of an empty one has nothing to test."""
    known, held, error = judge.known, judge.batch.held, judge.errors.weight
    room = known.caps - held
    if room.min(initial=NO_LIMIT) <= error:
        for name, column in known.spots.items():
            kind = "seat" if column < len(known.basis.seats) else "place"
            here = np.where(held[:, column] > 0, room[:, column], NO_LIMIT)
            judge.left(f"{kind}.{name}", here, error)
    for column in known.unknown:
        judge.unsure |= held[:, column] > 0
    if known.zone_caps.size:
        sums = held @ known.zones
        for number, code in enumerate(known.zone_codes):
            here = np.where(sums[:, number] > 0, known.zone_caps[number] - sums[:, number], NO_LIMIT)
            judge.left(code, here, error)
    for members in known.unknown_zones:
        judge.unsure |= (held[:, list(members)] > 0).any(axis=1)


def _envelope(judge: Judge, bounds: Bounds, states: dict[Phase, State]) -> None:
    """Judge one envelope at its phases and along its legs."""
    errors, outline = judge.errors, bounds.outline
    error = 2 * (errors.moment + outline.steep * errors.weight + 8 * _UNIT_ROUNDOFF * outline.size)
    least: dict[Phase, Floats] = {}
    for phase in (*bounds.phases, *(phase for leg in bounds.legs for phase in leg)):
        if phase in least:
            continue
        margin, near = _margin(bounds, states[phase], errors)
        judge.unsure |= near
        least[phase] = margin
        if phase in bounds.phases:
            code = bounds.codes[bounds.phases.index(phase)]
            judge.left(code, np.where(near, NO_LIMIT, margin), error)
    for leg in bounds.legs:
        below, corners = _below(judge, bounds, (states[leg[0]], states[leg[1]]), leg)
        lowest = np.minimum(np.minimum(least[leg[0]], least[leg[1]]), corners) - below
        burns = judge.batch.taxi > 0 if leg[0] == "ramp" else True
        judge.unsure |= (lowest <= 4 * error) & burns


def _moment(bounds: Bounds, state: State) -> Floats:
    return state.along if bounds.axis == "longitudinal" else state.across


def _margin(bounds: Bounds, state: State, errors: Errors) -> tuple[Floats, Marks]:
    """Return the margin in moment to the nearer edge, minus infinity above or below the whole envelope, and
    the loads so near the weight of a corner that their edges are not sure.
    """
    outline, weight, moment = bounds.outline, state.weight, _moment(bounds, state)
    levels = outline.levels
    index = np.searchsorted(levels, weight, side="right") - 1
    beyond = (index < 0) | (index >= len(levels) - 1)
    np.clip(index, 0, len(levels) - 2, out=index)
    near = (np.abs(weight - levels[index]) <= errors.weight) | (
        np.abs(weight - levels[index + 1]) <= errors.weight
    )
    low, high = outline.low[index], outline.high[index]
    first = low[:, 0] + (low[:, 1] + low[:, 2] * weight) * weight
    last = high[:, 0] + (high[:, 1] + high[:, 2] * weight) * weight
    margin = np.minimum(moment - first, last - moment)
    return np.where(beyond, -NO_LIMIT, margin), near


def _below(
    judge: Judge, bounds: Bounds, states: tuple[State, State], leg: tuple[Phase, Phase]
) -> tuple[Floats, Floats]:
    """Return how far the margin along a leg can fall below those at its ends and corners, but for twice the
    error; and the least margin at the corners' weights it crosses, of the straight line between the ends.
    """
    known, small = judge.known, judge.errors.weight
    before, after = states
    start, end = _moment(bounds, before), _moment(bounds, after)
    burned = before.weight - after.weight
    some = np.maximum(burned, small)
    order = known.taxi_order if leg[0] == "ramp" else known.burn_order
    along = bounds.axis == "longitudinal"
    tanks = [known.tanks[tank] for tank in tanks_in(order)]
    slopes = [each for tank in tanks for each in (tank.slopes if along else (tank.lateral,))]
    steepest, flattest = max(slopes), min(slopes)
    below = bounds.outline.bent * burned * burned
    if steepest > flattest:
        change = start - end
        over = (steepest * burned - change) * (change - flattest * burned)
        below = below + np.maximum(over, 0.0) / (some * (steepest - flattest))
    corners = np.full_like(burned, NO_LIMIT)
    for level, first, last in bounds.outline.at_levels:
        crosses = (after.weight - small <= level) & (level <= before.weight + small)
        if crosses.any():
            there = end + np.clip((level - after.weight) / some, 0.0, 1.0) * (start - end)
            here = np.minimum(there - first, last - there)
            corners = np.where(crosses, np.minimum(corners, here), corners)
    return below, corners
