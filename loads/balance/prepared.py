"""A loading basis made ready for exact decisions: shapes of envelopes, curves of tanks, words and digits of
its units.
"""

from collections import OrderedDict
from collections.abc import Iterable, Sequence
from fractions import Fraction

from fleet.basis import PHASES, Axis, Basis, Envelope, Phase, TankTable
from fleet.conversion import density_unit
from fleet.envelope import Shape
from fleet.lateral import LateralByCg
from fleet.positions import CARRIED, EXTERNAL_LOAD, NOT_CARRIED
from fleet.rational import rational
from fleet.tanks import TankCurve
from loads.balance.exact import Ratio, minus, times
from loads.balance.operational import Bound, Operational
from loads.balance.rounding import LENGTH_PLACES, MOMENT_PLACES

__all__ = ["Bound", "Prepared", "prepared"]

MOST_KEPT = 64


class Prepared:
    """What is derived from a basis once and used for every load of it. Unchanging once made."""

    __slots__ = (
        "_across",
        "_as_weighed",
        "_bounds",
        "_chord_factor",
        "_curves",
        "_steady",
        "basis",
        "deciding",
        "density",
        "external",
        "fed",
        "length",
        "length_places",
        "moment",
        "moment_places",
        "outside",
        "volume",
        "weight",
    )

    def __init__(self, basis: Basis) -> None:
        self.basis = basis
        self.weight = basis.weight_unit.value
        self.length = basis.length_unit.value
        self.volume = basis.volume_unit.value
        self.moment = f"{self.weight} {self.length}"
        self.density = density_unit(basis.weight_unit, basis.volume_unit).value
        self.length_places = LENGTH_PLACES[basis.length_unit]
        self.moment_places = MOMENT_PLACES[basis.length_unit]
        self._curves = {
            tank.id: TankCurve(
                against=tank.table.against,
                gives=tank.table.gives,
                straight_in=tank.table.straight_in,
                density=tank.table.density,
                points=tank.table.points,
            )
            for tank in basis.tanks
        }
        self._chord_factor = None if basis.chord is None else 100 / basis.chord.length
        self.fed = frozenset(tank for stage in basis.burn_order for tank in stage.tanks)
        self.external = any(place.external for place in basis.places)
        self._steady = {tank.id: _steady(tank.table) for tank in basis.tanks}
        shapes = [(envelope, Shape(envelope.plane, envelope.points)) for envelope in basis.envelopes]
        axes: tuple[Axis, ...] = ("longitudinal", "lateral")
        left = Operational(basis.curtailments)
        self._bounds = {
            (axis, phase): left.bounds(_covering(shapes, axis, phase), axis, phase)
            for axis in axes
            for phase in PHASES
        }
        self._as_weighed = {part.id: part.as_weighed for part in basis.positions}
        self._as_weighed[EXTERNAL_LOAD] = NOT_CARRIED
        # The moving parts whose state decides which envelope holds; an external load counts as one.
        positions = [
            *(one.positions for one in basis.envelopes),
            *(one.positions for one in basis.lateral_by_cg),
        ]
        self.deciding = frozenset(part for each in positions for part, _ in each)
        asked = EXTERNAL_LOAD in self.deciding
        # The external places, where what is carried there decides which envelope holds.
        self.outside = frozenset(place.id for place in basis.places if place.external and asked)
        self._across = {
            phase: tuple(limit for limit in basis.lateral_by_cg if phase in limit.phases) for phase in PHASES
        }

    def bounds(self, axis: Axis, phase: Phase) -> tuple[Bound, ...]:
        """Return the envelopes that hold at a phase; all of them must hold the load. () when there is
        none.
        """
        return self._bounds[axis, phase]

    def holds_in(self, limit: Envelope | LateralByCg, parts: Iterable[tuple[str, str]]) -> bool:
        """Return whether a limit holds with these parts in these states, all others as weighed."""
        if not limit.positions:
            return True
        states = self._as_weighed | dict(parts)
        return all(states[part] in allowed for part, allowed in limit.positions)

    def shapes_at(self, axis: Axis, phase: Phase, parts: Sequence[tuple[str, str]]) -> list[Shape]:
        """Return the shapes of the envelopes that hold at a phase with these parts in these states."""
        return [shape for limit, shape in self._bounds[axis, phase] if self.holds_in(limit, parts)]

    def outside_fits(self, limit: Envelope | LateralByCg, parts: Iterable[tuple[str, str]]) -> bool:
        """Return whether a limit holds with the external load there is, whatever moving parts are in."""
        carried = (EXTERNAL_LOAD, CARRIED) in parts
        wanted = dict(limit.positions).get(EXTERNAL_LOAD)
        return wanted is None or (CARRIED if carried else NOT_CARRIED) in wanted

    def across(self, phase: Phase) -> tuple[LateralByCg, ...]:
        """Return the lateral limits against the longitudinal CG that hold at a phase; () without any."""
        return self._across[phase]

    def fuel_moment(self, tank: str, volume: Fraction, density: Fraction) -> Fraction:
        """Return the moment of a volume of fuel in a tank. Raises `fleet.tanks.OutsideTable`."""
        above, below = self.volume_moment(tank, volume)
        weight, each = density.as_integer_ratio()
        return rational(above * weight, below * each)

    def volume_moment(self, tank: str, volume: Fraction) -> Ratio:
        """Return that moment for each unit of density. Raises `fleet.tanks.OutsideTable`."""
        steady = self._steady[tank]
        if steady is not None:
            (arm, of), (first, under), (last, over) = steady
            held, per = volume.as_integer_ratio()
            if held and first * per <= held * under and held * over <= last * per:
                return held * arm, per * of
        return self._curves[tank].volume_moment(volume).as_integer_ratio()

    def chord_percent(self, arm: Fraction) -> Fraction | None:
        """Return an arm in percent of the mean aerodynamic chord, or None without a chord."""
        chord, factor = self.basis.chord, self._chord_factor
        return None if chord is None or factor is None else times(minus(arm, chord.leading_edge), factor)


def _steady(table: TankTable) -> tuple[Ratio, Ratio, Ratio] | None:
    """Return the arm of a table that gives the same arm at every quantity, where nothing is interpolated, and
    the volumes it begins and ends at.
    """
    arms = {arm for _, arm in table.points}
    if table.gives != "arm" or len(arms) > 1:
        return None
    ends = table.curve.first, table.curve.last
    return arms.pop().as_integer_ratio(), ends[0].as_integer_ratio(), ends[1].as_integer_ratio()


def _covering(shapes: list[Bound], axis: Axis, phase: Phase) -> tuple[Bound, ...]:
    """Return the bounds of a phase; what holds at landing holds with the least fuel at landing, too."""
    here = [bound for bound in shapes if bound[0].axis == axis]
    found = [bound for bound in here if phase in bound[0].phases]
    if not found and phase == "minimum at landing":
        found = [bound for bound in here if "landing" in bound[0].phases]
    return tuple(found)


_KEPT: "OrderedDict[int, Prepared]" = OrderedDict()


def prepared(basis: Basis) -> Prepared:
    """Return the basis made ready; the latest ones are kept, each together with the very basis it was made
    from.
    """
    found = _KEPT.get(id(basis))
    if found is None or found.basis is not basis:
        found = Prepared(basis)
        _KEPT[id(basis)] = found
        while len(_KEPT) > MOST_KEPT:
            _KEPT.popitem(last=False)
    return found
