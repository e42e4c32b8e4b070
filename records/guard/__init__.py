"""The guards of the database, seen from Python: what they refuse, and whether they all stand."""

from records.guard.missing import missing_guards
from records.guard.refusals import (
    ActMisplaced,
    FixedForGood,
    GuardBroken,
    GuardRefused,
    NeverChanged,
    NoOpenAct,
    OtherOperator,
    refusal_in,
)

__all__ = [
    "ActMisplaced",
    "FixedForGood",
    "GuardBroken",
    "GuardRefused",
    "NeverChanged",
    "NoOpenAct",
    "OtherOperator",
    "missing_guards",
    "refusal_in",
]
