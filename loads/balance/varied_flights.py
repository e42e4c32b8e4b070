"""Flights of a load that varies by one figure x as parts that vary, and where these touch a limit."""

from collections.abc import Iterator, Sequence
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Axis, Phase
from loads.balance.checks_lateral import HOLDS
from loads.balance.path import Knot, Path, Stretch, Turn
from loads.balance.path_across import moved
from loads.balance.path_course import Moved, burned
from loads.balance.polynomial import ONE, ZERO, Poly, Root, add, multiply, scale, value
from loads.balance.prepared import Prepared
from loads.balance.result import State
from loads.balance.touching import Ends, Varied, touching_across, touching_envelope

AXES: tuple[Axis, ...] = ("longitudinal", "lateral")


class Sample(NamedTuple):
    """One flight: its phases, and its path where it is known."""

    states: Sequence[State]
    path: Path | None


class Fit:
    """What makes polynomials of figures at some x, of a degree one less than these."""

    def __init__(self, at: Sequence[Fraction]) -> None:
        self.at = tuple(at)
        self.parts = []
        for one in self.at:
            part: Poly = (ONE,)
            for other in self.at:
                if other != one:
                    part = scale(multiply(part, (-other, ONE)), 1 / (one - other))
            self.parts.append(part)

    def through(self, figures: Sequence[Fraction]) -> Poly:
        """Return the polynomial that has these figures."""
        if all(each == figures[0] for each in figures[1:]):
            return (figures[0],)
        found = list(add(*(scale(part, each) for part, each in zip(self.parts, figures, strict=True))))
        while len(found) > 1 and not found[-1]:
            found.pop()
        return tuple(found)


class Flights:
    """Three flights of a load as parts that vary."""

    def __init__(self, ready: Prepared, over: Poly, fit: Fit, samples: Sequence[Sample]) -> None:
        self.ready, self.fit, self.samples, self.over = ready, fit, samples, over
        self.per = [value(over, at) for at in fit.at]

    def touches(self, ends: Ends) -> Iterator[Root]:
        """Yield where a phase or a part of the path may touch an envelope or a lateral limit."""
        yield from self.touches_across(ends)
        for part, phases in self.parts():
            for axis in AXES:
                bounds = {id(each): each for phase in phases for each in self.ready.bounds(axis, phase)}
                for _, shape in bounds.values():
                    yield from touching_envelope(part, shape, axis, ends)

    def touches_across(self, ends: Ends) -> Iterator[Root]:
        """Yield where one of them may touch a lateral limit against the longitudinal CG."""
        limits = self.ready.basis.lateral_by_cg
        for part, phases in self.parts() if limits else ():
            for limit in limits:
                if set(limit.phases) & set(phases):
                    yield from touching_across(part, limit, ends)

    def parts(self) -> Iterator[tuple[Varied, Sequence[Phase]]]:
        """Yield phases and parts of the path, each with the phases whose limits hold there."""
        for states in zip(*(each.states for each in self.samples), strict=True):
            yield self.point(states), (states[0].phase,)
        paths = [each.path for each in self.samples if each.path is not None]
        if len(paths) < len(self.samples):
            return
        for stretches in zip(*(each.stretches + each.settings for each in paths), strict=True):
            yield self.stretch(stretches), HOLDS[stretches[0].leg]
        for turns in zip(*(each.turns for each in paths), strict=True):
            for part in self.turn(turns):
                yield part, HOLDS[turns[0].leg]
        for turns in zip(*(each.zero_fuel for each in paths), strict=True):
            for part in self.turn(turns):
                yield part, ("zero fuel",)

    def point(self, knots: Sequence[Knot | State]) -> Varied:
        """Return one point of the flight."""
        moments = [each.moment * per for each, per in zip(knots, self.per, strict=True)]
        return Varied(
            (ZERO,),
            (ZERO,),
            (self.fit.through([each.weight for each in knots]),),
            (self.fit.through(moments),),
            (self.fit.through([each.lateral_moment for each in knots]),),
            self.over,
        )

    def stretch(self, stretches: Sequence[Stretch]) -> Varied:
        """Return a stretch of the burn."""
        through = self.fit.through
        found = [burned(each) for each in stretches]
        moments = [
            through([figure * per for figure, per in zip(figures, self.per, strict=True)])
            for figures in zip(*((each.u0, each.u1, each.u2) for each in found), strict=True)
        ]
        return Varied(
            through([each.end.weight for each in stretches]),
            through([each.start.weight for each in stretches]),
            ((ZERO,), (ONE,)),
            tuple(moments),
            (through([each.v0 for each in found]), through([each.v1 for each in found])),
            self.over,
        )

    def turn(self, turns: Sequence[Turn]) -> Iterator[Varied]:
        """Yield an event: its points, and what lies between them in a transfer."""
        for knots in zip(*([knot for knot, _ in each.knots] for each in turns), strict=False):
            yield self.point(knots)
        if turns[0].swept:
            for parts in zip(*(moved(each) for each in turns), strict=False):
                yield self.transfer([each for each in parts if isinstance(each, Moved)])

    def transfer(self, parts: Sequence[Moved]) -> Varied:
        """Return a part of a transfer."""
        through = self.fit.through
        moments = [
            through([each * per for each, per in zip(figures, self.per, strict=True)])
            for figures in zip(*((each.m0, each.m1, each.m2) for each in parts), strict=True)
        ]
        across = [through(each) for each in zip(*((each.v0, each.v1) for each in parts), strict=True)]
        weight = through([each.weight for each in parts])
        return Varied((ZERO,), (ONE,), (weight,), tuple(moments), tuple(across), self.over)
