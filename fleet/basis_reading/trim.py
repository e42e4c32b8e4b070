"""Reads the table of take-off trim settings."""

from fractions import Fraction
from itertools import pairwise
from typing import Any, Literal

from fleet.basis_reading.findings import Findings, exact, number
from fleet.basis_reading.presentation import index_of
from fleet.conversion import converted
from fleet.presentation import IndexUnits
from fleet.quantities import Unit
from fleet.trim import Trim, TrimLine, TrimTable


def read_trim(findings: Findings) -> Trim | None:
    """Return the trim tables; None when they were not entered, or a page shows there are none."""
    given = findings.document.get("trim")
    if not findings.sound("/trim") or not isinstance(given, dict) or "none" in given:
        return None
    lines = _lines(findings, given)
    flaps = list(dict.fromkeys(flap for flap, _, _ in lines))
    tables = tuple(_table(findings, flap, lines) for flap in flaps)
    if None in flaps and len(flaps) > 1:
        findings.fault(
            "/trim/tables", "flap-missing", "some tables name a flap setting and some do not; name it in all"
        )
    step = number(given["step"])
    if step <= 0:
        findings.fault("/trim/step", "not-above-zero", "must be above zero; enter how finely it is printed")
    low, high, source = _range(findings, given)
    against: Literal["arm", "chord"] = "chord" if given["against"] == "chord" else "arm"
    return Trim(against, given["unit"], step, low, high, source, tables)


def _lines(findings: Findings, given: dict[str, Any]) -> list[tuple[str | None, TrimLine, str]]:
    """Return every table as (flap, line, pointer), its CG in the units of the basis."""
    unit: Unit | None = None
    if given["against"] == "arm":
        if "against_unit" in given:
            unit = Unit(given["against_unit"])
        else:
            findings.fault(
                "/trim/against_unit",
                "unit-missing",
                "the unit of the arms is missing, and none is inferred; state it",
            )
    elif "against_unit" in given:
        findings.fault(
            "/trim/against_unit",
            "unit-dimension",
            "percent of the chord and index units need no further unit; leave it out",
        )
    elif given["against"] == "chord" and "none" in findings.document.get("chord", {}):
        findings.fault(
            "/trim/against", "no-chord", "the basis has no chord to reckon percent with; enter the chord"
        )
    index = index_of(findings, "/trim/against") if given["against"] == "index" else None
    found = []
    for row, entry in enumerate(given["tables"]):
        at = f"/trim/tables/{row}"
        weight = exact(entry["weight"], findings.weight) if "weight" in entry else None
        if index is not None and (weight is None or weight <= 0):
            findings.fault(
                f"{at}/weight", "weight-missing", "an index has an arm at one weight only; state the weight"
            )
        points = tuple(
            (_cg(findings, number(cg), weight, unit, index), number(setting))
            for cg, setting in entry["points"]
        )
        for place, (before, after) in enumerate(pairwise(points), 1):
            if after[0] <= before[0]:
                findings.fault(
                    f"{at}/points/{place}", "not-rising", "the CG does not rise here; correct point or order"
                )
        found.append((entry.get("flap"), TrimLine(weight, points, findings.source(entry["source"])), at))
    return found


def _cg(
    findings: Findings, given: Fraction, weight: Fraction | None, unit: Unit | None, index: IndexUnits | None
) -> Fraction:
    """Return a CG as the tables keep it: an arm in the unit of the basis, or percent of the chord."""
    if unit is not None:
        return converted(given, unit, findings.length)
    if index is not None and weight is not None and weight > 0:
        return index.arm(weight, given)
    return given


def _table(findings: Findings, flap: str | None, lines: list[tuple[str | None, TrimLine, str]]) -> TrimTable:
    """Return the table of one flap setting: one line for all weights, or one each for several."""
    mine = [(line, at) for each, line, at in lines if each == flap]
    seen: set[Fraction] = set()
    for line, at in mine:
        if line.weight is None:
            if len(mine) > 1:
                findings.fault(
                    at, "weight-missing", "several tables are for this setting; state the weight of each"
                )
        elif line.weight in seen:
            findings.fault(f"{at}/weight", "duplicate", "a table for this weight is there; remove one")
        else:
            seen.add(line.weight)
    rising = sorted((line for line, _ in mine), key=lambda line: line.weight or Fraction(0))
    return TrimTable(flap, tuple(rising))


def _range(findings: Findings, given: dict[str, Any]) -> tuple[Any, Any, Any]:
    if "range" not in given:
        return None, None, None
    low, high = number(given["range"]["low"]), number(given["range"]["high"])
    if low >= high:
        findings.fault("/trim/range/high", "range-empty", "must be above where the range begins; correct one")
    return low, high, findings.source(given["range"]["source"])
