"""Reads what the floor of a place bears: on an area, and along its length."""

from typing import Any

from fleet.basis_reading.findings import Findings, exact
from fleet.conversion import converted
from fleet.quantities import AREA_LOAD_OF, LINE_LOAD_OF, Unit
from fleet.stations import Floor, FloorLimit


def read_floor(findings: Findings, at: str, given: dict[str, Any] | None) -> Floor | None:
    """Return the floor of a place; None when nothing is stated of it."""
    if given is None:
        return None
    free = given.get("no_footprint", {})
    weight, length = findings.weight, findings.length
    return Floor(
        runs=given["runs"],
        per_area=_limit(findings, f"{at}/per_area", given.get("per_area"), AREA_LOAD_OF[weight, length]),
        per_length=_limit(
            findings, f"{at}/per_length", given.get("per_length"), LINE_LOAD_OF[weight, length]
        ),
        free_up_to=findings.above_zero(free["up_to"], weight, f"{at}/no_footprint/up_to")
        if "up_to" in free
        else None,
        free_kinds=tuple(free.get("kinds", ())),
        length=findings.above_zero(given["length"], length, f"{at}/length") if "length" in given else None,
    )


def _limit(findings: Findings, at: str, given: dict[str, Any] | None, unit: Unit) -> FloorLimit | None:
    if given is None:
        return None
    source = findings.source(given["source"])
    if "none" in given:
        return FloorLimit(None, None, source)
    value = exact(given, Unit(given["unit"]))
    if value <= 0:
        findings.fault(f"{at}/value", "not-above-zero", "must be above zero; correct it")
    return FloorLimit(converted(value, Unit(given["unit"]), unit), Unit(given["unit"]), source)
