r"""The burn of one flight as a path: weight and moments from engine start to the least fuel at landing.

    moment ^  R---T                     kinks: a tank runs dry, another stage feeds,
           |       \__                  a point of a tank's table, another phase
           |          \____
           |                L----M      R ramp, T take-off, L landing, M minimum at landing
           +------------------------> fuel burned

Between two kinks weight and lateral moment are linear in the volume burned, and the moment is, too, or else
quadratic where a table is straight in arm. So over weight the moment is the straight line between the two
kinks plus bend * (weight - start) * (weight - end). Weight falls strictly along the path.

A tank's table may begin above zero. What lies between nothing and its first quantity is a gap: there the
moment is not known, and nothing is extrapolated.
"""

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise
from typing import Literal, NamedTuple

from fleet.basis import Phase
from fleet.tanks import TankPiece
from loads.balance.aboard import FuelPlan, TankFuel
from loads.balance.exact import added, minus, plus, times
from loads.balance.fuel import Contents, Draw, FuelState
from loads.balance.result import State

Leg = Literal["taxi", "flight", "reserve"]
LEGS: tuple[tuple[Leg, Phase, Phase], ...] = (
    ("taxi", "ramp", "take-off"),
    ("flight", "take-off", "landing"),
    ("reserve", "landing", "minimum at landing"),
)
NOTHING = Fraction(0)


class Knot(NamedTuple):
    """The aircraft at a kink, exact; the phase it is, or None between phases."""

    weight: Fraction
    moment: Fraction
    lateral_moment: Fraction
    phase: Phase | None = None


class Stretch(NamedTuple):
    """The path between two kinks; `bend` is the square part of moment over weight, in length / weight.

    `held` is what the tanks hold where the draw begins, with what each feeding one has given before `start`.
    `dry` is the aircraft without usable fuel, None where that is the same all along; `setting` is in words
    what gear and flaps are in, "" where they are as the sequence or the weighing has them; `parts` are the
    (part, state) that may differ from the weighing, of those that decide which envelope holds.
    """

    leg: Leg
    feeding: tuple[str, ...]
    start: Knot
    end: Knot
    bend: Fraction
    held: tuple[Contents, Fraction] = ({}, NOTHING)
    dry: Fraction | None = None
    setting: str = ""
    parts: tuple[tuple[str, str], ...] = ()

    def at(self, weight: Fraction) -> Knot:
        """Return the aircraft at a weight of this stretch."""
        start, end = self.start, self.end
        if weight == start.weight:
            return start
        if weight == end.weight:
            return end
        share = (start.weight - weight) / (start.weight - end.weight)
        bent = self.bend * (weight - start.weight) * (weight - end.weight)
        return Knot(
            weight,
            start.moment + share * (end.moment - start.moment) + bent,
            start.lateral_moment + share * (end.lateral_moment - start.lateral_moment),
        )


class Gap(NamedTuple):
    """Where on the path a tank holds less than the first quantity of its table, without being empty."""

    leg: Leg
    tank: str
    first: Fraction


class Found(NamedTuple):
    """What was found of a path so far, in the order of flight."""

    stretches: list[Stretch]
    gaps: list[Gap]


class Turn(NamedTuple):
    """A moment of the flight at which nothing is burned: one side of an event, or a transfer.

    Its knots have one weight, each with what the tanks hold. Where it is `swept` the moments run from the
    first knot to the last through all between their least and their greatest.
    """

    leg: Leg
    where: str
    knots: tuple[tuple[Knot, Contents], ...]
    swept: bool
    dry: Fraction
    setting: str = ""
    parts: tuple[tuple[str, str], ...] = ()


@dataclass(frozen=True, slots=True)
class Path:
    """The path in the order of flight, and what of it is not known. `density` is that of the fuel.

    `turns` are the events. `settings` are the same stretches once more, for every setting of gear and flaps
    that may hold there beside the one they are flown in; nothing of these is across the aircraft. `zero_fuel`
    is the aircraft without usable fuel after each event and in each setting, where there is more than one.
    """

    stretches: tuple[Stretch, ...]
    gaps: tuple[Gap, ...]
    density: Fraction
    turns: tuple[Turn, ...] = ()
    settings: tuple[Stretch, ...] = ()
    zero_fuel: tuple[Turn, ...] = ()


def burn_path(plan: FuelPlan, fuel: Mapping[Phase, FuelState], states: Mapping[Phase, State]) -> Path:
    """Return the path of a load whose phases are known; a leg that burns nothing has no stretch."""
    start = knot_of(states["ramp"])
    tanks = FlownTanks(plan, fuel["ramp"], start)
    found = Found([], [])
    for leg, before, after in LEGS:
        end = knot_of(states[after])
        tanks.fly(leg, fuel[before].usable, fuel[after].draws, (start, end), found)
        start = end
    return Path(tuple(found.stretches), tuple(found.gaps), plan.density)


class FlownTanks:
    """The tanks of one load with the aircraft around them: a state of the fuel, and the aircraft there."""

    __slots__ = ("density", "held", "loaded")

    def __init__(self, plan: FuelPlan, fuel: FuelState, loaded: Knot) -> None:
        self.density = plan.density
        self.held: dict[str, TankFuel] = {held.tank.id: held for held in plan.tanks}
        self.loaded = (fuel, loaded)

    def fly(
        self,
        leg: Leg,
        contents: Contents,
        draws: Sequence[Draw],
        ends: tuple[Knot | None, Knot | None],
        found: Found,
    ) -> None:
        """Add the path through draws that follow each other; the aircraft at both ends is known, or in a
        gap.
        """
        here, landed = ends
        for number, draw in enumerate(draws, 1):
            last = number == len(draws)
            left = contents if last else _less(contents, draw)
            if here is not None and self.of_one_arm(draw) and not (last and landed is None):
                there = landed if last else self.burned(here, draw)
                if there is not None:
                    held = (contents, NOTHING)
                    found.stretches.append(Stretch(leg, draw.feeding, here, there, NOTHING, held))
                here = there
            else:
                there = landed if last else self.knot(left)
                for part in self.parts(leg, draw, contents, here, there):
                    if isinstance(part, Stretch):
                        found.stretches.append(part)
                    else:
                        found.gaps.append(part)
                here = there
            contents = left

    def of_one_arm(self, draw: Draw) -> bool:
        """Return whether each tank that feeds has one arm at every quantity down to nothing."""
        return all(self.held[tank].tank.table.curve.one_arm is not None for tank in draw.feeding)

    def burned(self, before: Knot, draw: Draw) -> Knot:
        """Return the aircraft after a draw from tanks of one arm."""
        weight = times(draw.each, self.density)
        tanks = [self.held[tank].tank for tank in draw.feeding]
        arm = added(tank.table.curve.pieces[0].slope for tank in tanks)
        across = added(tank.lateral_arm for tank in tanks)
        return Knot(
            minus(before.weight, weight * len(tanks)),
            minus(before.moment, times(weight, arm)),
            minus(before.lateral_moment, times(weight, across)) if across else before.lateral_moment,
        )

    def knot(self, contents: Contents) -> Knot | None:
        """Return the aircraft with these usable volumes, or None where a table tells no moment for one."""
        fuel, state = self.loaded
        volumes, along, across = [], [], []
        for tank, held in self.held.items():
            volume = plus(contents[tank], held.trapped)
            curve = held.tank.table.curve
            if volume and volume < curve.first:
                return None
            volumes.append(volume)
            along.append(curve.moment(volume, self.density))
            across.append(held.tank.lateral_moment(volume, self.density))
        return Knot(
            plus(minus(state.weight, fuel.weight), times(added(volumes), self.density)),
            plus(minus(state.moment, fuel.moment), added(along)),
            plus(minus(state.lateral_moment, fuel.lateral_moment), added(across)),
        )

    def gap(self, leg: Leg, contents: Contents) -> Gap:
        """Return the gap these usable volumes lie in."""
        for tank, held in self.held.items():
            volume, first = contents[tank] + held.trapped, held.tank.table.curve.first
            if volume and volume < first:
                return Gap(leg, tank, first)
        raise ValueError("every tank's table tells its moment")

    def parts(
        self, leg: Leg, draw: Draw, contents: Contents, start: Knot | None, end: Knot | None
    ) -> Iterator[Stretch | Gap]:
        """Yield a draw cut at the points of the tables of the tanks that feed."""
        full = {tank: contents[tank] + self.held[tank].trapped for tank in draw.feeding}
        marks = {NOTHING, draw.each}
        for tank, volume in full.items():
            firsts = [piece.first for piece in self.held[tank].tank.table.curve.pieces]
            marks.update(volume - first for first in firsts if NOTHING < volume - first < draw.each)
        rising = sorted(marks)
        here = start
        for drawn, more in pairwise(rising):
            there = end if more == draw.each else self.knot(_less(contents, Draw(draw.feeding, more)))
            pieces = {tank: self._piece(tank, volume - drawn, volume - more) for tank, volume in full.items()}
            unknown = [tank for tank, piece in pieces.items() if piece is None]
            if here is None or there is None or unknown:
                for tank in unknown:
                    yield Gap(leg, tank, self.held[tank].tank.table.curve.first)
            else:
                square = added(piece.bend for piece in pieces.values() if piece is not None)
                bend = square / (len(pieces) ** 2 * self.density)
                yield Stretch(leg, draw.feeding, here, there, bend, (contents, drawn))
            here = there

    def _piece(self, tank: str, above: Fraction, below: Fraction) -> TankPiece | None:
        """Return the part of a tank's table between two volumes no kink lies between; None in its gap."""
        pieces = self.held[tank].tank.table.curve.pieces
        return next((piece for piece in pieces if piece.first <= below and above <= piece.last), None)


def knot_of(state: State) -> Knot:
    """Return the aircraft at a phase as a kink of the path."""
    return Knot(state.weight, state.moment, state.lateral_moment, state.phase)


def _less(contents: Contents, draw: Draw) -> Contents:
    """Return the contents after a draw."""
    left = dict(contents)
    for tank in draw.feeding:
        left[tank] = minus(left[tank], draw.each)
    return left
