"""The operational envelopes: what an operator's curtailments leave of the certified ones, phase by phase."""

from collections.abc import Sequence

from fleet.basis import Axis, Envelope, Phase
from fleet.curtailment import CurtailedShape, Curtailment, holding
from fleet.envelope import Shape

Bound = tuple[Envelope, Shape]


class Operational:
    """Curtails bounds: one envelope under the same curtailments is one bound, whatever the phase."""

    __slots__ = ("_curtailments", "_kept")

    def __init__(self, curtailments: Sequence[Curtailment]) -> None:
        self._curtailments = tuple(curtailments)
        self._kept: dict[tuple[int, tuple[str, ...]], Bound] = {}

    def bounds(self, certified: tuple[Bound, ...], axis: Axis, phase: Phase) -> tuple[Bound, ...]:
        """Return the bounds of a phase with what is left inside the margins that hold there."""
        held = holding(self._curtailments, phase, axis)
        if not held:
            return certified
        return tuple(self._one(bound, held, axis) for bound in certified)

    def _one(self, bound: Bound, held: tuple[Curtailment, ...], axis: Axis) -> Bound:
        key = id(bound[1]), tuple(each.id for each in held)
        if key not in self._kept:
            self._kept[key] = bound[0], CurtailedShape(bound[1], held, axis)
        return self._kept[key]
