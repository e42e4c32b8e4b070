"""Fuel that a restriction makes unusable: it weighs, at its arm, and burns nowhere."""

from dataclasses import replace

from fleet.restrictions import Ruled
from loads.balance.aboard import Declared
from loads.balance.rounding import VOLUME_PLACES, printed
from records.refusal import Fault, Invalid


def with_trapped(declared: Declared, ruled: Ruled) -> Declared:
    """Return the load with what restrictions trap in its tanks; where it declares more itself, that counts.

    Raises `Invalid` for a tank that cannot hold that besides its usable fuel.
    """
    faults, tanks = [], []
    for held in declared.fuel.tanks:
        trapped = max(held.trapped, ruled.trapped.get(held.tank.id, held.trapped))
        if held.usable + trapped > held.tank.capacity:
            unit = ruled.basis.volume_unit.value
            holds = f"{printed(held.tank.capacity, VOLUME_PLACES, 'down')} {unit}"
            stuck = f"{printed(trapped, VOLUME_PLACES)} {unit}"
            detail = (
                f"with {stuck} that a restriction makes unusable, more than {held.tank.name} holds, "
                f"which is {holds}; correct it"
            )
            faults.append(Fault(f"/fuel/at_engine_start/{held.tank.id}", "over-capacity", detail))
        tanks.append(replace(held, trapped=trapped))
    if faults:
        raise Invalid(*faults)
    return replace(declared, fuel=replace(declared.fuel, tanks=tuple(tanks)))
