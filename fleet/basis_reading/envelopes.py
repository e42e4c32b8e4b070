"""Reads envelopes and checks them against the weight limits they serve."""

from fractions import Fraction
from typing import Any

from fleet.basis import Envelope, Limits, Phase
from fleet.basis_reading.applicability import combinations, everything, in_words, read_held
from fleet.basis_reading.findings import Findings, number
from fleet.basis_reading.presentation import across_of
from fleet.basis_reading.variants import Variants
from fleet.conversion import converted
from fleet.envelope import NotAnEnvelope
from fleet.positions import CARRIED, EXTERNAL_LOAD
from fleet.quantities import Unit

# An envelope that holds at landing holds on down to the minimum at landing, which is flown through to reach.
_PHASES: dict[str, tuple[Phase, ...]] = {
    "ramp": ("ramp",),
    "take-off": ("take-off",),
    "landing": ("landing", "minimum at landing"),
    "zero-fuel": ("zero fuel",),
}
_LIMIT_OF: dict[str, str] = {
    "ramp": "ramp",
    "take-off": "take_off",
    "landing": "landing",
    "zero-fuel": "zero_fuel",
}
# Above the greatest weight limit by more than this an envelope is taken for one in another unit, or of
# another type.
_MOST_ABOVE = Fraction(5, 4)
Served = tuple[str, ...]  # axis, phase, then the case


def phases_of(words: list[str]) -> tuple[Phase, ...]:
    """Return the phases that the words of a document name."""
    return tuple(phase for word in words for phase in _PHASES[word])


def read_envelopes(findings: Findings, variants: Variants) -> tuple[Envelope, ...]:
    """Return the envelopes.

    One that is no polygon, or contradicts a limit or another envelope, is a fault.
    """
    findings.once(("envelopes",))
    envelopes = []
    taken: set[Served] = set()
    for at, entry in findings.entries("envelopes"):
        pairs = combinations(findings, entry)
        for row, word in enumerate(entry["phases"]):
            mine = {(entry["axis"], word, *pair) for pair in pairs}
            if mine & taken:
                where = _where(findings, mine & taken)
                findings.fault(
                    f"{at}/phases/{row}",
                    "envelope-twice",
                    f"another {entry['axis']} envelope already serves {word}{where}; keep the one that holds",
                )
            taken |= mine
        envelope = _envelope(findings, at, entry)
        if envelope is not None:
            for limits in variants.served(findings, entry):
                _demand_reach(findings, at, entry["phases"], envelope, limits)
            envelopes.append(envelope)
    if findings.sound("/envelopes"):
        _demand_all(findings, taken)
    return tuple(envelopes)


def _demand_all(findings: Findings, taken: set[Served]) -> None:
    """Add a fault where a configuration, in a category, has no longitudinal envelope it is flown with. Nobody
    need land with an external load: without an envelope for that, such a landing is unresolved.
    """
    for word in ("take-off", "landing"):
        cases = everything(findings)
        if word == "landing":
            cases = {case for case in cases if f"{EXTERNAL_LOAD} {CARRIED}" not in case}
        wanted = {("longitudinal", word, *pair) for pair in cases}
        missing = wanted - taken
        if missing:
            where = "" if missing == wanted else _where(findings, missing)
            findings.fault(
                "/envelopes",
                "envelope-missing",
                f"no longitudinal envelope serves {word}{where}; enter the manual's",
            )


def _where(findings: Findings, served: set[Served]) -> str:
    """Return the first pair a fault is about, in words; nothing where it is about all there are."""
    cases = {tuple(each[2:]) for each in served}
    return "" if cases == everything(findings) else f" in {in_words(min(cases))}"


def lateral_limits_entered(findings: Findings, envelopes: tuple[Envelope, ...]) -> bool:
    """Return whether lateral limits are known: by an envelope, or by a page that shows there are none."""
    lateral = "lateral_by_cg" in findings.document or any(one.axis == "lateral" for one in envelopes)
    stated_none = "lateral_limits" in findings.document
    if lateral and stated_none:
        findings.fault(
            "/lateral_limits",
            "limits-contradict",
            "there are lateral limits; remove one of the two",
        )
    return lateral or stated_none


def _envelope(findings: Findings, at: str, entry: dict[str, Any]) -> Envelope | None:
    across, weight_unit = across_of(findings, at, entry), Unit(entry["weight_unit"])
    if across is None:
        return None
    points = [
        (converted(number(weight), weight_unit, findings.weight), number(value))
        for weight, value in entry["points"]
    ]
    try:
        return Envelope(
            id=entry["id"],
            axis=entry["axis"],
            phases=phases_of(entry["phases"]),
            plane=entry["plane"],
            points=tuple((across(weight, value), weight) for weight, value in points),
            source=findings.source(entry["source"]),
            **read_held(findings, at, entry),
        )
    except NotAnEnvelope as refused:
        findings.fault(f"{at}/points", refused.code, str(refused))
        return None


def _demand_reach(findings: Findings, at: str, words: list[str], envelope: Envelope, limits: Limits) -> None:
    """Add a fault when an envelope ends below the limit of a phase it serves, or lies above one."""
    lowest, highest = envelope.shape.lowest, envelope.shape.highest
    greatest = Fraction(0)
    for row, word in enumerate(words):
        limit = getattr(limits, _LIMIT_OF[word])
        if limit is None or limit.value is None:
            continue
        greatest = max(greatest, limit.value)
        if lowest >= limit.value:
            findings.fault(
                f"{at}/phases/{row}",
                "envelope-outside-limits",
                f"the envelope begins at or above the {word} limit; check its weights and their unit",
            )
        elif highest < limit.value:
            findings.fault(
                f"{at}/phases/{row}",
                "envelope-below-limit",
                f"the envelope ends below the {word} limit; enter its upper points, or the lower limit",
            )
    structural = [
        limit.value for limit in (limits.ramp, limits.take_off) if limit and limit.value is not None
    ]
    if structural and highest > max(*structural, greatest) * _MOST_ABOVE:
        findings.fault(
            f"{at}/points",
            "envelope-above-limits",
            "reaches far above every weight limit; check weights and unit",
        )
