"""Reads the weight limits and refuses those that contradict each other."""

from collections.abc import Iterator
from collections.abc import Set as AbstractSet
from typing import Any

from fleet.basis import Limits
from fleet.basis_reading.findings import Findings
from fleet.sourced import Limit

FIELDS = ("ramp", "take_off", "zero_fuel", "landing", "minimum_flying", "with_external_load")
# The first may not lie above the second: nothing loaded to the first could ever be within the second.
_NOT_ABOVE = (
    ("zero_fuel", "take_off"),
    ("zero_fuel", "ramp"),
    ("landing", "take_off"),
    ("landing", "ramp"),
    ("take_off", "ramp"),
    ("take_off", "with_external_load"),
)


def read_limits(findings: Findings) -> Limits:
    """Return the limits of the basis; what was not entered is None."""
    limits = given_limits(findings, findings.document.get("limits"), "/limits")
    demand_consistent(findings, limits, set(FIELDS), "/limits")
    return limits


def tightened(findings: Findings, own: dict[str, Any] | None, at: str, of_basis: Limits) -> Limits:
    """Return the limits of a configuration: its own where it gives one, which may not be looser than the
    basis's, nor contradict another.
    """
    if own is None:
        return of_basis
    limits = tighter(findings, own, at, of_basis)
    demand_consistent(findings, limits, own.keys(), at)
    return limits


def tighter(findings: Findings, own: dict[str, Any], at: str, of_basis: Limits) -> Limits:
    """Return limits with others in their place; one that is looser is a fault."""
    given = given_limits(findings, own, at)
    found = {}
    for field in FIELDS:
        mine: Limit | None = getattr(given, field)
        theirs: Limit | None = getattr(of_basis, field)
        if mine and theirs and _looser(mine, theirs, least=field == "minimum_flying"):
            findings.fault(
                f"{at}/{field}",
                "limit-looser",
                "looser than the limit of the basis; a configuration or category may only tighten it",
            )
        found[field] = mine or theirs
    return Limits(**found)


def demand_consistent(findings: Findings, limits: Limits, own: AbstractSet[str], at: str) -> None:
    """Add a fault for every pair of limits that cannot both hold, at the first of the pair.

    `own` are the fields given here: a pair of which neither is has its fault elsewhere.
    """
    for field, detail in contradictions(limits, own):
        findings.fault(f"{at}/{field}", "limits-contradict", detail)


def contradictions(limits: Limits, own: AbstractSet[str]) -> Iterator[tuple[str, str]]:
    """Yield the first of every pair of limits that cannot both hold, one of them own, and what to do."""
    values = {field: limit.value for field in FIELDS if (limit := getattr(limits, field)) is not None}
    for lower, upper in _NOT_ABOVE:
        low, high = values.get(lower), values.get(upper)
        if low is not None and high is not None and low > high and own & {lower, upper}:
            yield lower, f"the {_words(lower)} lies above the {_words(upper)}; check both figures"
    least = values.get("minimum_flying")
    for field in ("take_off", "landing"):
        most = values.get(field)
        if least is not None and most is not None and least >= most and own & {"minimum_flying", field}:
            detail = f"the minimum flying weight leaves nothing below the {_words(field)}; check both"
            yield "minimum_flying", detail


def given_limits(findings: Findings, given: Any, at: str) -> Limits:
    """Return the limits that are sound.

    One with a fault of form counts as not entered while the rest is read.
    """
    entries = given if isinstance(given, dict) else {}
    return Limits(
        **{
            field: findings.limit(entries.get(field), f"{at}/{field}")
            if findings.sound(f"{at}/{field}")
            else None
            for field in FIELDS
        }
    )


def _looser(mine: Limit, theirs: Limit, *, least: bool) -> bool:
    if theirs.value is None:
        return False
    if mine.value is None:
        return True
    return mine.value < theirs.value if least else mine.value > theirs.value


def _words(field: str) -> str:
    if field == "with_external_load":
        return "limit with an external load"
    return f"{field.replace('_', ' ')} limit"
