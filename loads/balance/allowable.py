"""The allowable take-off weight: the least of every limit that bears on it, and which one governs.

Structural take-off; stated limits at take-off; landing limit, structural or stated, plus the fuel burned
until then; zero-fuel limit plus the fuel burnable at take-off; ramp limit less taxi fuel (rule: the maximum
allowable take-off weight of 14 CFR 135.63(c)(3), the limiting mass of CAT.POL.MAB.105(a)).
"""

from collections.abc import Mapping
from fractions import Fraction
from typing import NamedTuple

from fleet.basis import Phase
from fleet.sourced import Limit
from loads.balance.aboard import Declared
from loads.balance.result import Json, State
from loads.balance.rounding import WEIGHT_PLACES, printed


class Candidate(NamedTuple):
    """One bound on the take-off weight, and where it comes from."""

    name: str
    weight: Fraction


class Allowable(NamedTuple):
    """The candidates with the least one (None: no limit at all), and the limits that were not entered."""

    candidates: tuple[Candidate, ...]
    least: Candidate | None
    not_entered: tuple[str, ...]

    def as_document(self) -> Json:
        """Return the block of the result document; weights are rounded down."""
        return {
            "weight": None if self.least is None else printed(self.least.weight, WEIGHT_PLACES, "down"),
            "governed_by": "no limit" if self.least is None else self.least.name,
            "candidates": [
                {"name": one.name, "weight": printed(one.weight, WEIGHT_PLACES, "down")}
                for one in self.candidates
            ],
            "not_entered": list(self.not_entered),
        }


def allowable_take_off(declared: Declared, states: Mapping[Phase, State]) -> Allowable:
    """Return the allowable take-off weight of this load with its fuel plan; of equal bounds the first named
    governs.
    """
    limits = declared.configuration.limits
    at = {phase: state.weight for phase, state in states.items()}
    take_off = at["take-off"]
    # What leaves in flight is no more aboard at landing than the fuel that burned.
    trip = "trip fuel and what leaves" if any(e.leaving for e in declared.sequence) else "trip fuel"
    entered: list[tuple[str, Limit | None, Fraction]] = [
        ("structural take-off", limits.take_off, Fraction(0)),
        (f"landing limit + {trip}", limits.landing, take_off - at["landing"]),
        ("zero-fuel limit + take-off fuel", limits.zero_fuel, take_off - at["zero fuel"]),
        ("ramp limit - taxi fuel", limits.ramp, take_off - at["ramp"]),
    ]
    found = [
        Candidate(name, limit.value + added)
        for name, limit, added in entered
        if limit is not None and limit.value is not None
    ]
    for stated in declared.limits:
        if stated.at == "take-off":
            found.append(Candidate(stated.named, stated.weight))
        else:
            found.append(Candidate(f"{stated.named} + {trip}", stated.weight + take_off - at["landing"]))
    missing = tuple(name for name, limit, _ in entered if limit is None)
    return Allowable(tuple(found), min(found, key=lambda one: one.weight, default=None), missing)
