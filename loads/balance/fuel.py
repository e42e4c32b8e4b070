"""Fuel along the flight: which tank feeds when, what is left in each tank at each phase, and its moment.

Burned moment is moment before less moment after, so a table that is not straight is used as the manual prints
it. Tanks of one stage feed equally by volume; one that runs dry leaves the rest feeding equally. Volumes in
the volume unit of the basis, weights in its weight unit.
"""

from collections.abc import Mapping
from fractions import Fraction
from math import lcm
from typing import NamedTuple

from fleet.basis import BurnStage, Phase
from fleet.rational import rational
from fleet.tanks import OutsideTable
from loads.balance.aboard import FuelPlan
from loads.balance.exact import Ratio, added, minus, plus, product, quotient, times, total
from loads.balance.prepared import Prepared

Contents = Mapping[str, Fraction]  # usable volume by tank id
NOTHING = Fraction(0)


class Draw(NamedTuple):
    """One step of a burn: the tanks that feed together, and the volume each of them gives."""

    feeding: tuple[str, ...]
    each: Fraction


Known = dict[str, tuple[Fraction, Ratio, Ratio]]  # by tank: a volume, its moment along and across per density
NONE: Ratio = (0, 1)
UNKNOWN: tuple[None, Ratio, Ratio] = (None, NONE, NONE)
Filled = tuple[tuple[Phase, Contents, tuple[Draw, ...]], ...]  # each phase with what leads there


class FuelState(NamedTuple):
    """Fuel in the tanks at one phase. `usable` is by tank; weight and moments count trapped fuel, too.
    `draws` lead here from the phase before it in flight; () at the ramp and at zero fuel, and
    where something happens in between: `loads.balance.sections` has them then.
    """

    phase: Phase
    usable: Contents
    usable_weight: Fraction
    weight: Fraction
    moment: Fraction
    lateral_moment: Fraction
    draws: tuple[Draw, ...] = ()


class FuelOffTable(Exception):
    """A tank holds, at some phase or at an event (its number), a volume its table does not cover; nothing is
    extrapolated.
    """

    def __init__(self, tank: str, at: Phase | int, volume: Fraction, first: Fraction, last: Fraction) -> None:
        super().__init__(f"{tank} at {at}")
        self.tank = tank
        self.at = at
        self.volume = volume
        self.first = first
        self.last = last


def burn(contents: Contents, order: tuple[BurnStage, ...], volume: Fraction) -> tuple[Contents, Fraction]:
    """Return what each tank holds after a volume was taken out in the given order, and the volume that was
    not there.
    """
    left, short, _ = drawn(contents, order, volume)
    return left, short


def drawn(
    contents: Contents, order: tuple[BurnStage, ...], volume: Fraction
) -> tuple[Contents, Fraction, tuple[Draw, ...]]:
    """Return what `burn` returns, and the steps of it in their order; none of them draws nothing.

    Reckoned in whole numbers of one small part of the volume unit; only a last step is parted among tanks.
    """
    if volume.numerator <= 0:
        return dict(contents), NOTHING, ()
    above, below = volume.as_integer_ratio()
    ratios = [held.as_integer_ratio() for held in contents.values()]
    scale = lcm(below, *[per for _, per in ratios])
    whole = {tank: held * (scale // per) for tank, (held, per) in zip(contents, ratios, strict=True)}
    rest = above * (scale // below)
    left = dict(contents)
    draws = []
    for stage in order:
        if not rest:
            break
        feeding = [tank for tank in stage.tanks if whole.get(tank)]
        while feeding and rest:
            least, count = min([whole[tank] for tank in feeding]), len(feeding)
            if rest < least * count:
                draws.append(Draw(tuple(feeding), rational(rest, scale * count)))
                for tank in feeding:
                    left[tank] = rational(whole[tank] * count - rest, scale * count)
                rest = 0
            else:
                draws.append(Draw(tuple(feeding), rational(least, scale)))
                for tank in feeding:
                    whole[tank] -= least
                    left[tank] = rational(whole[tank], scale)
                rest -= least * count
                feeding = [tank for tank in feeding if whole[tank]]
    return left, rational(rest, scale), tuple(draws)


def fuel_states(plan: FuelPlan, ready: Prepared) -> dict[Phase, FuelState]:
    """Return the fuel at each phase. Landing fuel below the minimum leaves that phase as it was at landing.

    At zero fuel what the burn order can feed is gone; trapped fuel, and fuel no stage feeds, stay aboard.
    Raises `FuelOffTable`.
    """
    basis, density = ready.basis, plan.density
    ramp: Contents = {fuel.tank.id: fuel.usable for fuel in plan.tanks}
    take_off, _, taxiing = drawn(ramp, basis.taxi_order, quotient(plan.taxi, density))
    landing, _, flying = drawn(take_off, basis.burn_order, quotient(plan.trip, density))
    spare = minus(added(landing.values()), quotient(plan.minimum_at_landing, density))
    least, _, holding = drawn(landing, basis.burn_order, spare)
    empty = {tank: NOTHING if tank in ready.fed else held for tank, held in take_off.items()}
    contents: Filled = (
        ("ramp", ramp, ()),
        ("take-off", take_off, taxiing),
        ("zero fuel", empty, ()),
        ("landing", landing, flying),
        ("minimum at landing", least, holding),
    )
    return states_of(plan, contents, ready)


def states_of(plan: FuelPlan, contents: Filled, ready: Prepared) -> dict[Phase, FuelState]:
    """Return the fuel at each phase from what the tanks hold there. Raises `FuelOffTable`."""
    known: Known = {}
    return {phase: _state(phase, plan, held, ready, known, draws=draws) for phase, held, draws in contents}


def _state(
    phase: Phase, plan: FuelPlan, usable: Contents, ready: Prepared, known: Known, *, draws: tuple[Draw, ...]
) -> FuelState:
    density = plan.density
    volumes, along, across = [], [], []
    trapped = NOTHING
    for fuel in plan.tanks:
        tank = fuel.tank
        volume = usable[tank.id]
        if fuel.trapped.numerator:
            trapped = plus(trapped, fuel.trapped)
        elif not volume.numerator:
            continue
        volumes.append(volume.as_integer_ratio())
        held, moment, lateral = known.get(tank.id, UNKNOWN)
        # What nothing was drawn from has the very figure it had before, and so its moments.
        if held is not volume:
            full = plus(volume, fuel.trapped) if fuel.trapped.numerator else volume
            moment = _moment(tank.id, full, phase, ready)
            lateral = product(full, tank.lateral_arm) if tank.lateral_arm.numerator else NONE
            known[tank.id] = volume, moment, lateral
        along.append(moment)
        if lateral is not NONE:
            across.append(lateral)
    if not volumes:
        return FuelState(phase, usable, NOTHING, NOTHING, NOTHING, NOTHING, draws)
    each = density.as_integer_ratio()
    usable_weight = total(volumes, each)
    return FuelState(
        phase,
        usable,
        usable_weight,
        plus(usable_weight, times(trapped, density)) if trapped.numerator else usable_weight,
        total(along, each),
        total(across, each) if across else NOTHING,
        draws,
    )


def _moment(tank: str, volume: Fraction, phase: Phase, ready: Prepared) -> Ratio:
    try:
        return ready.volume_moment(tank, volume)
    except OutsideTable as outside:
        raise FuelOffTable(tank, phase, volume, outside.first, outside.last) from None
