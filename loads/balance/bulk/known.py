"""What of a loading basis the bulk sums know, as binary floats; and when they do not know enough.

The filter knows weights in seats and places, tanks that feed in the manual's order, weight limits, limits of
seats, places and zones, and envelopes that have one piece at every weight. A basis that asks for anything
else is not known to it, and its loads are computed one by one.
"""

from collections.abc import Mapping
from dataclasses import dataclass, field
from fractions import Fraction
from typing import Final

import numpy as np
from numpy.typing import NDArray

from fleet.basis import (
    PHASES,
    Axis,
    Basis,
    Configuration,
    FixedItem,
    Phase,
    Place,
    Seat,
    Tank,
)
from fleet.sourced import Limit
from fleet.weighing import EmptyFigures
from loads.balance.bulk.features import asks_for_more
from loads.balance.bulk.outline import Outline, outline_of
from loads.balance.checks_balance import NEEDED
from loads.balance.checks_known import empty_weight_check
from loads.balance.prepared import Prepared, prepared

Floats = NDArray[np.float64]
AXES: Final[tuple[Axis, ...]] = ("longitudinal", "lateral")


@dataclass(frozen=True, slots=True)
class TankSums:
    """One tank: its table as volumes against arms, or against moments per unit of density; `slopes` are the
    least and the greatest moment that one more unit of weight brings, `steady` is its arm where it has one.
    """

    volumes: Floats
    values: Floats
    of_arms: bool
    steady: float | None
    slopes: tuple[float, float]
    lateral: float


@dataclass(frozen=True, slots=True)
class Bounds:
    """One envelope, the phases at which it holds, and the legs between two phases along which it does."""

    axis: Axis
    outline: Outline
    phases: tuple[Phase, ...]
    legs: tuple[tuple[Phase, Phase], ...]
    codes: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Known:
    """A basis in one configuration with one empty weight, ready for bulk sums.

    `kept` remembers figures as typed, each with what it comes to: they are typed again and again.
    """

    basis: Basis
    configuration: Configuration
    spots: Mapping[str, int]  # the column of each seat and place
    arms: Floats
    laterals: Floats
    caps: Floats  # what a spot takes; infinite where its page shows no limit
    unknown: tuple[int, ...]  # spots whose limit was not entered
    zones: Floats  # a row a spot, a column a zone with a limit: 1 where the spot is of the zone
    zone_caps: Floats
    zone_codes: tuple[str, ...]
    unknown_zones: tuple[tuple[int, ...], ...]
    tanks: tuple[TankSums, ...]
    taxi_order: tuple[tuple[int, ...], ...]
    burn_order: tuple[tuple[int, ...], ...]
    base: tuple[float, float, float]  # weight and moments of the empty aircraft with its fixed items
    limits: Mapping[Phase, float]
    minimum_flying: float | None
    bounds: tuple[Bounds, ...]
    reach: float  # the greatest arm, along or across, that anything here has
    kept: dict[tuple[object, ...], float] = field(default_factory=dict, compare=False, repr=False)


def known_of(basis: Basis, configuration: str, empty: EmptyFigures | None) -> Known | None:
    """Return what the bulk sums know of a basis, or None when they do not know enough to decide a load."""
    found = next((one for one in basis.configurations if one.id == configuration), None)
    if found is None or empty is None or asks_for_more(basis, found):
        return None
    if empty_weight_check(empty, basis, found.fit).outcome != "pass":
        return None
    limits = _limits(found)
    bounds = _bounds(prepared(basis))
    if limits is None or bounds is None or found.limits.minimum_flying is None:
        return None
    curves = [(tank.table.curve, tank.capacity) for tank in basis.tanks]
    if not curves or any(curve.first or curve.last < capacity for curve, capacity in curves):
        return None
    return _known(basis, found, empty, limits, bounds)


def _limits(configuration: Configuration) -> dict[Phase, float] | None:
    """Return the weight limit of each phase, infinite where there is none; None when one was not entered."""
    limits = configuration.limits
    entered: dict[Phase, Limit | None] = {
        "ramp": limits.ramp,
        "take-off": limits.take_off,
        "zero fuel": limits.zero_fuel,
        "landing": limits.landing,
        "minimum at landing": limits.landing,
    }
    found = {}
    for phase, limit in entered.items():
        if limit is None:
            return None
        found[phase] = _cap(limit)
    return found


def _bounds(ready: Prepared) -> tuple[Bounds, ...] | None:
    """Return the envelopes with what they bind; None when one is missing, or not of a form that is known."""
    if any(not ready.bounds("longitudinal", phase) for phase in NEEDED):
        return None
    lateral = any(ready.bounds("lateral", phase) for phase in PHASES)
    if lateral and any(not ready.bounds("lateral", phase) for phase in NEEDED):
        return None
    if not lateral and not ready.basis.lateral_limits_entered:
        return None
    found = []
    for axis in AXES:
        at = {phase: ready.bounds(axis, phase) for phase in PHASES}
        for bound in {id(one): one for held in at.values() for one in held}.values():
            outline = outline_of(bound[1].slabs)
            if outline is None:
                return None
            phases = tuple(phase for phase in PHASES if any(bound is one for one in at[phase]))
            code = "cg" if axis == "longitudinal" else "lateral"
            codes = tuple(f"{code}.{phase.replace(' ', '-')}" for phase in phases)
            found.append(Bounds(axis, outline, phases, _legs(phases), codes))
    return tuple(found)


def _legs(phases: tuple[Phase, ...]) -> tuple[tuple[Phase, Phase], ...]:
    """Return the legs along which an envelope of these phases holds, as `path_worst` has it."""
    legs: list[tuple[Phase, Phase]] = []
    if "ramp" in phases:
        legs.append(("ramp", "take-off"))
    if "take-off" in phases:
        legs.append(("take-off", "landing"))
    if "take-off" in phases or "landing" in phases:
        legs.append(("landing", "minimum at landing"))
    return tuple(legs)


def _known(
    basis: Basis,
    configuration: Configuration,
    empty: EmptyFigures,
    limits: dict[Phase, float],
    bounds: tuple[Bounds, ...],
) -> Known:
    spots: tuple[Seat | Place, ...] = (*basis.seats, *basis.places)
    column = {spot.id: number for number, spot in enumerate(spots)}
    zones = [zone for zone in basis.zones if zone.maximum is not None and zone.maximum.value is not None]
    inside = np.array(
        [[float(spot.id in zone.members) for zone in zones] for spot in spots], dtype=np.float64
    ).reshape(len(spots), len(zones))
    tanks = tuple(_tank(tank) for tank in basis.tanks)
    number = {tank.id: place for place, tank in enumerate(basis.tanks)}
    base = _base(empty, (*configuration.equipment, *configuration.operating_items))
    reach = max(
        *(abs(float(each)) for spot in spots for each in (spot.arm, spot.lateral_arm)),
        *(abs(each) for tank in tanks for each in (*tank.slopes, tank.lateral)),
        *(float(np.abs(tank.values).max()) if tank.of_arms else 0.0 for tank in tanks),
        *(abs(moment) / abs(base[0]) if base[0] else 0.0 for moment in base[1:]),
        1.0,
    )
    lightest = configuration.limits.minimum_flying
    return Known(
        basis=basis,
        configuration=configuration,
        spots=column,
        arms=np.array([float(spot.arm) for spot in spots]),
        laterals=np.array([float(spot.lateral_arm) for spot in spots]),
        caps=np.array([_cap(spot.maximum) for spot in spots]),
        unknown=tuple(number for number, spot in enumerate(spots) if spot.maximum is None),
        zones=inside,
        zone_caps=np.array([_cap(zone.maximum) for zone in zones]),
        zone_codes=tuple(f"zone.{zone.id}" for zone in zones),
        unknown_zones=tuple(
            tuple(column[member] for member in zone.members if member in column)
            for zone in basis.zones
            if zone.maximum is None
        ),
        tanks=tanks,
        taxi_order=tuple(tuple(number[tank] for tank in stage.tanks) for stage in basis.taxi_order),
        burn_order=tuple(tuple(number[tank] for tank in stage.tanks) for stage in basis.burn_order),
        base=base,
        limits=limits,
        minimum_flying=None if lightest is None or lightest.value is None else float(lightest.value),
        bounds=bounds,
        reach=reach,
    )


def _base(empty: EmptyFigures, items: tuple[FixedItem, ...]) -> tuple[float, float, float]:
    """Return the exact sums of what never changes, rounded once."""
    nothing = Fraction(0)
    return (
        float(empty.weight + sum((one.weight for one in items), nothing)),
        float(empty.moment + sum((one.weight * one.arm for one in items), nothing)),
        float(empty.lateral_moment + sum((one.weight * one.lateral_arm for one in items), nothing)),
    )


def _tank(tank: Tank) -> TankSums:
    pieces = tank.table.curve.pieces
    slopes = [piece.slope + 2 * piece.bend * end for piece in pieces for end in (piece.first, piece.last)]
    of_arms = tank.table.straight_in == "arm"
    ends = (*(piece.first for piece in pieces), pieces[-1].last)
    steady = len(pieces) == 1 and not pieces[0].bend and not pieces[0].steady
    if of_arms:  # moment / (density * volume) = slope + bend * volume, continuous from nothing on
        values = [pieces[0].slope + pieces[0].bend * pieces[0].first]
        values += [piece.slope + piece.bend * piece.last for piece in pieces]
    else:
        values = [pieces[0].steady + pieces[0].slope * pieces[0].first]
        values += [piece.steady + piece.slope * piece.last for piece in pieces]
    return TankSums(
        np.array([float(end) for end in ends]),
        np.array([float(value) for value in values]),
        of_arms,
        float(pieces[0].slope) if steady else None,
        (float(min(slopes)), float(max(slopes))),
        float(tank.lateral_arm),
    )


def _cap(limit: Limit | None) -> float:
    return float("inf") if limit is None or limit.value is None else float(limit.value)
