"""What tanks hold after a volume was taken out in the manual's order, for many loads at once."""

from collections.abc import Sequence

import numpy as np

from loads.balance.bulk.known import Floats, TankSums

Volumes = list[Floats]  # one a tank, a row a load
_PAIR = 2


def drawn(contents: Volumes, order: Sequence[tuple[int, ...]], volume: Floats) -> Volumes:
    """Return what each tank holds after a volume was taken out stage by stage; a negative one takes nothing.

    Tanks of one stage feed equally; one that runs dry leaves the rest feeding equally.
    """
    left = list(contents)
    wanted = np.maximum(volume, 0.0)
    for stage in order:
        if len(stage) == 1:
            (tank,) = stage
            taken = np.minimum(left[tank], wanted)
            left[tank] = left[tank] - taken
            wanted = wanted - taken
        elif len(stage) == _PAIR:
            one, other = stage
            half, first, second = wanted / 2, left[one], left[other]
            from_one = np.minimum(first, np.maximum(half, wanted - second))
            from_other = np.minimum(second, np.maximum(half, wanted - first))
            left[one], left[other] = first - from_one, second - from_other
            wanted = wanted - from_one - from_other
        else:
            wanted = _evenly(left, stage, wanted)
    return left


def _evenly(left: Volumes, stage: tuple[int, ...], wanted: Floats) -> Floats:
    """Draw from several tanks equally until each runs dry, in place; return what is still wanted.

    Each gives its all or one common volume, which is found from the emptiest tank on.
    """
    held = np.stack([left[tank] for tank in stage])
    common, rest, below = np.zeros_like(wanted), wanted, np.zeros_like(wanted)
    for place, rising in enumerate(np.sort(held, axis=0)):
        feeding = len(stage) - place
        taken = np.minimum(rest, (rising - below) * feeding)
        common = common + taken / feeding
        rest, below = rest - taken, rising
    for number, tank in enumerate(stage):
        left[tank] = held[number] - np.minimum(held[number], common)
    return rest


def tanks_in(order: Sequence[tuple[int, ...]]) -> list[int]:
    """Return the tanks an order names."""
    return sorted({tank for stage in order for tank in stage})


def total(volumes: Sequence[Floats]) -> Floats:
    """Return the sum of all tanks."""
    found = volumes[0]
    for one in volumes[1:]:
        found = found + one
    return found


def moments(tanks: Sequence[TankSums], volumes: Volumes) -> tuple[Floats, Floats]:
    """Return the moments of fuel per unit of density, along and across."""
    along, across = np.zeros_like(volumes[0]), np.zeros_like(volumes[0])
    for tank, volume in zip(tanks, volumes, strict=True):
        if tank.steady is not None:
            along += volume * tank.steady
        else:
            read = np.interp(volume, tank.volumes, tank.values)
            along += read * volume if tank.of_arms else read
        if tank.lateral:
            across += volume * tank.lateral
    return along, across
