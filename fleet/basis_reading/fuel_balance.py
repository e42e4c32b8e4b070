"""Reads how far the fuel on the left may differ from the fuel on the right."""

from decimal import Decimal
from fractions import Fraction
from itertools import pairwise
from typing import Any

from fleet.basis_reading.findings import Findings, number
from fleet.conversion import converted
from fleet.fuel_balance import FuelBalance
from fleet.quantities import DIMENSION_OF, Dimension, Unit

ALL_PHASES = ("ramp", "take-off", "landing")


def read_fuel_balance(findings: Findings) -> tuple[FuelBalance, ...]:
    """Return the limits; unknown tanks, one tank on both sides and a table that falls back are faults."""
    findings.once(("fuel_balance",))
    tanks = findings.named("tanks")
    found = []
    for at, entry in findings.entries("fuel_balance"):
        findings.known(entry["left"], tanks, f"{at}/left", "tank")
        findings.known(entry["right"], tanks, f"{at}/right", "tank")
        for row, tank in enumerate(entry["right"]):
            if tank in entry["left"]:
                findings.fault(
                    f"{at}/right/{row}",
                    "tank-on-both-sides",
                    f"{tank} stands on the left, too; leave it where it lies",
                )
        unit = Unit(entry["maximum"]["unit"] if "maximum" in entry else entry["table"]["unit"])
        by_volume = DIMENSION_OF[unit] is Dimension.VOLUME
        own = findings.volume if by_volume else findings.weight
        found.append(
            FuelBalance(
                id=entry["id"],
                name=entry["name"],
                left=tuple(entry["left"]),
                right=tuple(entry["right"]),
                by="volume" if by_volume else "weight",
                maximum=_maximum(findings, at, entry, unit, own),
                points=_points(findings, at, entry, unit, own),
                phases=tuple(entry.get("phases", ALL_PHASES)),
                source=findings.source(entry["source"]),
            )
        )
    return tuple(found)


def _maximum(findings: Findings, at: str, entry: dict[str, Any], unit: Unit, own: Unit) -> Fraction | None:
    if "maximum" not in entry:
        return None
    value = converted(Fraction(Decimal(entry["maximum"]["value"])), unit, own)
    if value < 0:
        findings.fault(f"{at}/maximum/value", "negative", "below zero; write a positive difference")
    return value


def _points(
    findings: Findings, at: str, entry: dict[str, Any], unit: Unit, own: Unit
) -> tuple[tuple[Fraction, Fraction], ...]:
    if "table" not in entry:
        return ()
    points = tuple(
        (converted(number(aboard), unit, own), converted(number(most), unit, own))
        for aboard, most in entry["table"]["points"]
    )
    for row, (aboard, most) in enumerate(points):
        if aboard < 0 or most < 0:
            findings.fault(f"{at}/table/points/{row}", "negative", "below zero; correct the point")
    for row, (before, after) in enumerate(pairwise(points), 1):
        if after[0] <= before[0]:
            findings.fault(
                f"{at}/table/points/{row}", "not-rising", "the fuel aboard does not rise here; correct it"
            )
    return points
