"""A second way along the burn, slow and plain: many points, each computed from nothing but the tables.

It shares nothing with the engine. How much each tank has given is found from the level to which a stage was
drawn; a table is read between two of its rows; the margin is measured along a horizontal line that is cut
with every side of the polygon. All in fractions.
"""

from bisect import bisect_right
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise

from tests.pure.loads.oracle import load_inside

F = Fraction


@dataclass(frozen=True)
class Point:
    """The aircraft somewhere on the burn; `moment` is None where a table tells nothing."""

    leg: str
    weight: F
    moment: F | None
    lateral_moment: F


def drawn_down(contents, stages, volume):
    """What each tank holds after a volume was burned: stage by stage, each tank of one giving the same."""
    left = dict(contents)
    for stage in stages:
        held = sorted(left[tank] for tank in stage.tanks)
        gives = min(volume, sum(held))
        volume -= gives
        each, rest = F(0), gives
        for number, amount in enumerate(held):
            share = rest / (len(held) - number)
            each = min(amount, share)
            rest -= each
            if share <= amount:
                each = share
                break
        for tank in stage.tanks:
            left[tank] -= min(left[tank], each)
    return left


def tank_moment(table, volume, density):
    """The moment of a volume, from the two rows it lies between; None where there are none."""
    if not volume:
        return F(0)
    rows = []
    for quantity, value in table.points:
        at = quantity / table.density if table.against == "weight" else quantity
        arm = value
        if table.gives == "moment" and at:
            arm = value / table.density / at
        rows.append((at, arm))
    if not rows[0][0] <= volume <= rows[-1][0]:
        return None
    right = min(bisect_right([at for at, _ in rows], volume), len(rows) - 1)
    (v1, a1), (v2, a2) = rows[right - 1], rows[right]
    part = (volume - v1) / (v2 - v1)
    if table.straight_in == "arm":
        return density * volume * (a1 + part * (a2 - a1))
    first = F(0) if not v1 else v1 * a1
    return density * (first + part * (v2 * a2 - first))


def points_along(declared, basis, dry, samples):
    """Points from engine start to the least fuel, `samples` to a leg, both ends of each among them.

    `dry` is (weight, moment, lateral moment) without any fuel.
    """
    plan = declared.fuel
    ramp = {fuel.tank.id: fuel.usable for fuel in plan.tanks}
    take_off = drawn_down(ramp, basis.taxi_order, plan.taxi / plan.density)
    landing = drawn_down(take_off, basis.burn_order, plan.trip / plan.density)
    spare = max(F(0), sum(landing.values(), F(0)) - plan.minimum_at_landing / plan.density)
    legs = (
        ("taxi", ramp, basis.taxi_order, plan.taxi / plan.density),
        ("flight", take_off, basis.burn_order, plan.trip / plan.density),
        ("reserve", landing, basis.burn_order, spare),
    )
    for leg, contents, stages, burned in legs:
        for number in range(samples + 1):
            yield _point(leg, plan, drawn_down(contents, stages, burned * number / samples), dry)


def _point(leg, plan, contents, dry):
    weight, moment, across = dry
    for fuel in plan.tanks:
        volume = contents[fuel.tank.id] + fuel.trapped
        weight += volume * plan.density
        across += volume * plan.density * fuel.tank.lateral_arm
        of_tank = tank_moment(fuel.tank.table, volume, plan.density)
        moment = None if moment is None or of_tank is None else moment + of_tank
    return Point(leg, weight, moment, across)


def margin(weight, moment, polygon, plane):
    """The way along the arm to the nearer edge, below 0 outside; None where the polygon has no part.

    At the very weight of a corner it is None, too: there the line would touch, not cut.
    """
    if any(y == weight for _, y in polygon):
        return None
    crossed = []
    for (x1, y1), (x2, y2) in zip(polygon, (*polygon[1:], polygon[0]), strict=True):
        if (y1 - weight) * (y2 - weight) < 0:
            x = x1 + (x2 - x1) * (weight - y1) / (y2 - y1)
            crossed.append(x if plane == "arm" else x / weight)
    crossed.sort()
    arm = moment / weight
    ways = [min(arm - low, high - arm) for low, high in zip(crossed[::2], crossed[1::2], strict=True)]
    return max(ways, default=None)


def holds(point, moment, polygon, plane):
    return load_inside(point.weight, moment, polygon, plane)


# Which envelopes hold on which leg, written down once more.
PHASES_OF = {"taxi": ("ramp",), "flight": ("take-off",), "reserve": ("take-off", "landing")}


def sampled(declared, basis, dry, axis, samples):
    """All samples of one axis: (inside, margin or None), per envelope and leg in the order of flight."""
    runs = []
    points = list(points_along(declared, basis, dry, samples))
    for envelope in basis.envelopes:
        if envelope.axis != axis:
            continue
        for leg, phases in PHASES_OF.items():
            if not set(phases) & set(envelope.phases):
                continue
            run = []
            for point in points:
                moment = point.moment if axis == "longitudinal" else point.lateral_moment
                if point.leg == leg and moment is not None:
                    inside = holds(point, moment, envelope.points, envelope.plane)
                    run.append((inside, margin(point.weight, moment, envelope.points, envelope.plane)))
            runs.append(run)
    return runs


def assert_as_sampled(check, runs):
    """No sample is worse than the check, one is as bad within the steps of sampling, outside is outside."""
    samples = [sample for run in runs for sample in run]
    if not all(inside for inside, _ in samples):
        assert check.outcome == "fail"
    if check.outcome in ("pass", "unresolved"):
        assert all(inside for inside, _ in samples)
    margins = [margin for _, margin in samples if margin is not None]
    if check.room is None or not margins:
        return
    assert min(margins) >= check.room
    steps = [
        abs(one[1] - other[1])
        for run in runs
        for one, other in pairwise(run)
        if one[1] is not None and other[1] is not None
    ]
    assert min(margins) - check.room <= 2 * max(steps, default=F(0)) + F(1, 1000)
