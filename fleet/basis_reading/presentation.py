"""Reads how moments are shown, and turns what a manual prints in index units, percent of the chord or divided
moments into arms and moments, exactly.
"""

from collections.abc import Callable
from fractions import Fraction
from typing import Any

from fleet.basis_reading.findings import Findings, exact, number
from fleet.conversion import converted
from fleet.presentation import DividedMoment, IndexUnits, Presentation
from fleet.quantities import DIMENSION_OF, Dimension, Unit

PERCENT, INDEX = "% MAC", "index"
Across = Callable[[Fraction, Fraction], Fraction]  # (weight, what is printed) -> arm or moment of the basis


def read_presentation(findings: Findings) -> Presentation | None:
    """Return the presentation of a basis; None when it has none."""
    given = findings.document.get("presentation")
    if not findings.sound("/presentation") or not isinstance(given, dict):
        return None
    divided = None
    if "moment_divisor" in given:
        entry = given["moment_divisor"]
        divisor = number(entry["value"])
        if divisor <= 0:
            findings.fault(
                "/presentation/moment_divisor/value", "not-above-zero", "must be above zero; correct it"
            )
        divided = DividedMoment(divisor, findings.source(entry["source"]))
    index = _index(findings, faults=True)
    return Presentation(index, divided)


def across_of(findings: Findings, at: str, entry: dict[str, Any]) -> Across | None:
    """Return what turns a printed figure of an envelope into its arm or moment; None after a fault."""
    sign, moments = entry["unit"], entry["plane"] == "moment"
    if sign == PERCENT:
        return _percent(findings, at, entry)
    if sign == INDEX:
        return _of_index(findings, at, entry)
    unit = Unit(sign)
    if DIMENSION_OF[unit] is not (Dimension.MOMENT if moments else Dimension.LENGTH):
        findings.fault(
            f"{at}/unit",
            "unit-dimension",
            f"{unit.value} is no unit of {entry['plane']}; correct plane or unit",
        )
        return None
    factor = divided_by(findings, at, entry, moments=moments)
    if factor is None:
        return None
    wanted = findings.moment if moments else findings.length
    return lambda _, value: converted(value * factor, unit, wanted)


def divided_by(findings: Findings, at: str, entry: dict[str, Any], *, moments: bool) -> Fraction | None:
    """Return what printed moments are to be multiplied by; 1 when they are printed whole. None: a fault."""
    if "divided_by" not in entry:
        return Fraction(1)
    factor = number(entry["divided_by"])
    if not moments:
        findings.fault(f"{at}/divided_by", "divided-arms", "only moments are printed divided; leave it out")
        return None
    if factor <= 0:
        findings.fault(f"{at}/divided_by", "not-above-zero", "must be above zero; correct it")
        return None
    return factor


def index_of(findings: Findings, at: str) -> IndexUnits | None:
    """Return the index of the basis for figures printed in it; without one, a fault at this pointer."""
    index = _index(findings, faults=False)
    if index is None:
        findings.fault(
            at, "no-index", "the basis does not say what an index unit is; enter it under presentation"
        )
    return index


def _percent(findings: Findings, at: str, entry: dict[str, Any]) -> Across | None:
    if entry["plane"] != "arm" or entry["axis"] != "longitudinal":
        findings.fault(
            f"{at}/unit",
            "unit-dimension",
            "percent of the chord is an arm along the aircraft; correct plane, axis or unit",
        )
        return None
    if "divided_by" in entry:
        findings.fault(f"{at}/divided_by", "divided-arms", "only moments are printed divided; leave it out")
        return None
    chord = findings.document.get("chord")
    if not findings.sound("/chord") or not isinstance(chord, dict) or "none" in chord:
        findings.fault(
            f"{at}/unit",
            "no-chord",
            "the basis has no chord to reckon percent with; enter the chord",
        )
        return None
    leading, length = exact(chord["leading_edge"], findings.length), exact(chord["length"], findings.length)
    return lambda _, value: leading + length * value / 100


def _of_index(findings: Findings, at: str, entry: dict[str, Any]) -> Across | None:
    if entry["plane"] != "moment" or entry["axis"] != "longitudinal":
        findings.fault(
            f"{at}/unit",
            "unit-dimension",
            "index units are moments along the aircraft; correct plane, axis or unit",
        )
        return None
    if "divided_by" in entry:
        findings.fault(f"{at}/divided_by", "divided-arms", "an index is divided already; leave it out")
        return None
    index = index_of(findings, f"{at}/unit")
    return None if index is None else index.moment


def _index(findings: Findings, *, faults: bool) -> IndexUnits | None:
    presentation = findings.document.get("presentation")
    if not findings.sound("/presentation") or not isinstance(presentation, dict):
        return None
    given = presentation.get("index")
    if given is None:
        return None
    divisor = exact(given["divisor"], findings.moment)
    if divisor <= 0:
        if faults:
            findings.fault(
                "/presentation/index/divisor/value", "not-above-zero", "must be above zero; correct it"
            )
        divisor = Fraction(1)  # the basis is refused all the same; what is printed in index is still read
    return IndexUnits(
        exact(given["reference_arm"], findings.length),
        divisor,
        number(given["constant"]),
        findings.source(given["source"]),
    )
