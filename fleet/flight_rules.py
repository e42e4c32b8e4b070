"""What the approved data say about limits of an operation, of a certification category, of a modification."""

from dataclasses import dataclass
from typing import Literal

from fleet.sourced import Limit, Source

At = Literal["take-off", "landing"]
PerformanceKind = Literal["field length", "climb", "obstacles", "en-route", "brakes", "tyres"]
PERFORMANCE_KINDS: tuple[PerformanceKind, ...] = (
    "field length",
    "climb",
    "obstacles",
    "en-route",
    "brakes",
    "tyres",
)
NamedLimits = tuple[tuple[str, Limit], ...]  # field of `fleet.basis.Limits`, and its limit


@dataclass(frozen=True, slots=True)
class PerformanceRule:
    """Whether a flight must state the weight its performance allows.

    `operations` are those it holds for, () for all that no other rule names. `required` is False where
    the structural limits are enough; `kinds` then is (). Required without kinds: any stated limit will do.
    """

    at: At
    required: bool
    kinds: tuple[PerformanceKind, ...]
    operations: tuple[str, ...]
    source: Source


@dataclass(frozen=True, slots=True)
class CertificationCategory:
    """A category of certification (normal, utility, ...) with its own limits, each a tightening."""

    id: str
    name: str
    limits: NamedLimits
    source: Source


@dataclass(frozen=True, slots=True)
class Modification:
    """An approved modification or kit: the limits it replaces, in configurations that have it fitted."""

    id: str
    name: str
    limits: NamedLimits
    source: Source
