"""Reads the manual's sample loads."""

from fractions import Fraction
from typing import Any

from fleet.basis import FixedItem, SampleLoad
from fleet.basis_reading.envelopes import phases_of
from fleet.basis_reading.findings import Findings, exact

# A looser tolerance would let a wrong arm pass. Printed totals are rounded far more finely than this.
_MOST_TOLERANCE = Fraction(1, 100)


def read_sample_loads(findings: Findings) -> tuple[SampleLoad, ...]:
    """Return the sample loads; none when the source shows that the manual has none."""
    return tuple(_sample(findings, at, entry) for at, entry in findings.entries("sample_loads"))


def _sample(findings: Findings, at: str, entry: dict[str, Any]) -> SampleLoad:
    items, moments = [], []
    for number, given in enumerate(entry["weights"]):
        weight = exact(given["weight"], findings.weight)
        moment = exact(given["moment"], findings.moment) if "moment" in given else None
        if weight == 0:
            findings.fault(
                f"{at}/weights/{number}/weight",
                "weight-zero",
                "an item that weighs nothing; remove or correct it",
            )
            continue
        arm = exact(given["arm"], findings.length) if moment is None else moment / weight
        items.append(FixedItem(given["what"], weight, arm, Fraction(0)))
        moments.append(moment)
    tolerance = exact(entry["tolerance_moment"], findings.moment)
    if tolerance < 0 or tolerance > _MOST_TOLERANCE * sum(abs(item.weight * item.arm) for item in items):
        findings.fault(
            f"{at}/tolerance_moment",
            "tolerance",
            "must lie between zero and one hundredth of the moments; enter how finely the source prints",
        )
    return SampleLoad(
        name=entry["name"],
        weights=tuple(items),
        moments=tuple(moments),
        phase=phases_of([entry["phase"]])[0],
        total_weight=findings.above_zero(entry["total_weight"], findings.weight, f"{at}/total_weight"),
        total_moment=exact(entry["total_moment"], findings.moment),
        tolerance_moment=tolerance,
        within=entry["within"],
        source=findings.source(entry["source"]),
    )
