"""Reads the lateral limits that vary with the longitudinal CG."""

from typing import Any

from fleet.basis_reading.applicability import Case, combinations, in_words, read_held
from fleet.basis_reading.envelopes import phases_of
from fleet.basis_reading.findings import Findings, number
from fleet.conversion import converted
from fleet.envelope import NotAnEnvelope
from fleet.lateral import LateralByCg
from fleet.quantities import DIMENSION_OF, Dimension, Unit


def read_lateral_by_cg(findings: Findings) -> tuple[LateralByCg, ...]:
    """Return the limits. One that is no polygon, or serves what another serves already, is a fault."""
    findings.once(("lateral_by_cg",))
    found = []
    taken: set[tuple[str, Case]] = set()
    for at, entry in findings.entries("lateral_by_cg"):
        for row, word in enumerate(entry["phases"]):
            mine = {(word, pair) for pair in combinations(findings, entry)}
            if mine & taken:
                _, pair = min(mine & taken)
                findings.fault(
                    f"{at}/phases/{row}",
                    "envelope-twice",
                    f"another limit already serves {word} in {in_words(pair)}; keep the one that holds",
                )
            taken |= mine
        limit = _limit(findings, at, entry)
        if limit is not None:
            found.append(limit)
    return tuple(found)


def _limit(findings: Findings, at: str, entry: dict[str, Any]) -> LateralByCg | None:
    unit, along = Unit(entry["unit"]), Unit(entry["longitudinal_unit"])
    moments = entry["gives"] == "moment"
    if DIMENSION_OF[unit] is not (Dimension.MOMENT if moments else Dimension.LENGTH):
        findings.fault(
            f"{at}/unit", "unit-dimension", f"{unit.value} is no unit of {entry['gives']}; correct one"
        )
        return None
    across = findings.moment if moments else findings.length
    corners = tuple(
        (converted(number(x), along, findings.length), converted(number(y), unit, across))
        for x, y in entry["points"]
    )
    try:
        return LateralByCg(
            id=entry["id"],
            phases=phases_of(entry["phases"]),
            gives=entry["gives"],
            points=corners,
            source=findings.source(entry["source"]),
            **read_held(findings, at, entry),
        )
    except NotAnEnvelope as refused:
        findings.fault(f"{at}/points", refused.code, str(refused))
        return None
