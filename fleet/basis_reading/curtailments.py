"""Reads the operator's own margins inside the certified envelopes, and refuses those that leave nothing."""

from collections.abc import Iterable
from fractions import Fraction
from typing import Any

from fleet.applicable import holds_for
from fleet.basis import Axis, Envelope, Phase
from fleet.basis_reading.applicability import combinations, read_applicability
from fleet.basis_reading.envelopes import phases_of
from fleet.basis_reading.findings import Findings
from fleet.curtailment import Amounts, CurtailedShape, Curtailment, Inset, holding
from fleet.envelope import Stretch
from fleet.quantities import DIMENSION_OF, Dimension, Unit

SIDES = ("forward", "aft", "left", "right")
Entered = tuple[str, Curtailment]  # JSON pointer


def read_curtailments(findings: Findings, envelopes: tuple[Envelope, ...]) -> tuple[Curtailment, ...]:
    """Return the curtailments; one that serves no envelope, overlaps itself or leaves nothing is a fault."""
    findings.once(("curtailments",))
    entered = [(at, _curtailment(findings, at, entry)) for at, entry in findings.entries("curtailments")]
    # Where an envelope was refused, a margin that seems to serve none is no second fault.
    if findings.sound("/envelopes") and len(envelopes) == len(findings.document["envelopes"]):
        _demand_envelopes(findings, entered, envelopes)
        _demand_something_left(findings, entered, envelopes)
    return tuple(each for _, each in entered)


def _curtailment(findings: Findings, at: str, entry: dict[str, Any]) -> Curtailment:
    rows: list[Amounts] = []
    for number, given in enumerate(entry["amounts"]):
        here = f"{at}/amounts/{number}"
        row = _row(findings, here, given)
        if row.least is not None and row.most is not None and row.least >= row.most:
            findings.fault(
                f"{here}/to", "curtailment-weights", "must lie above the weight it begins at; correct one"
            )
        elif any(_overlap(row, earlier) for earlier in rows):
            findings.fault(
                here,
                "curtailment-overlaps",
                "another row already holds at some of these weights; let them meet at one weight",
            )
        rows.append(row)
    return Curtailment(
        id=entry["id"],
        purpose=entry["for"],
        phases=phases_of(entry["phases"]),
        rows=tuple(rows),
        source=findings.source(entry["source"]),
        **read_applicability(findings, at, entry),
    )


def _row(findings: Findings, at: str, given: dict[str, Any]) -> Amounts:
    least, most = (
        findings.above_zero(given[end], findings.weight, f"{at}/{end}") if end in given else None
        for end in ("from", "to")
    )
    return Amounts(
        least,
        most,
        **{side: _inset(findings, f"{at}/{side}", given[side]) for side in SIDES if side in given},
    )


def _inset(findings: Findings, at: str, given: dict[str, Any]) -> Inset:
    moment = DIMENSION_OF[Unit(given["unit"])] is Dimension.MOMENT
    amount = findings.above_zero(given, findings.moment if moment else findings.length, at)
    return Inset(moment=amount) if moment else Inset(arm=amount)


def _overlap(one: Amounts, other: Amounts) -> bool:
    """Return whether two rows hold at more than one common weight."""
    least = [each.least for each in (one, other) if each.least is not None]
    most = [each.most for each in (one, other) if each.most is not None]
    return not least or not most or max(least) < min(most)


def _demand_envelopes(
    findings: Findings, entered: Iterable[Entered], envelopes: tuple[Envelope, ...]
) -> None:
    """Add a fault for every side and phase no envelope serves: a margin to nothing would be forgotten."""
    served = {(envelope.axis, phase) for envelope in envelopes for phase in envelope.phases}
    axes: tuple[Axis, ...] = ("longitudinal", "lateral")
    for at, each in entered:
        moved = [(axis, phase) for axis in axes for phase in each.phases if holding((each,), phase, axis)]
        for axis, phase in moved:
            if (axis, phase) not in served:
                findings.fault(
                    f"{at}/phases",
                    "curtails-nothing",
                    f"no {axis} envelope serves {phase}; enter it, or leave the phase or side out",
                )
        if "lateral_by_cg" in findings.document and any(axis == "lateral" for axis, _ in moved):
            findings.fault(
                f"{at}/amounts",
                "curtails-not-all",
                "a lateral margin cannot move limits that vary with the CG yet; enter those already moved in",
            )


def _demand_something_left(
    findings: Findings, entered: list[Entered], envelopes: tuple[Envelope, ...]
) -> None:
    pointers = {each.id: at for at, each in entered}
    told: set[tuple[str, str]] = set()
    for envelope in envelopes:
        for phase in envelope.phases:
            for held in _held_together(findings, entered, envelope, phase):
                for weights in CurtailedShape(envelope.shape, held, envelope.axis).used_up():
                    at = pointers[_largest(held, envelope.axis, weights).id]
                    if (at, envelope.id) not in told:
                        told.add((at, envelope.id))
                        words = _words(findings, envelope, phase, weights)
                        findings.fault(f"{at}/amounts", "curtailment-too-large", words)


def _held_together(
    findings: Findings, entered: list[Entered], envelope: Envelope, phase: Phase
) -> list[tuple[Curtailment, ...]]:
    """Return what holds at once in each configuration and category the envelope is for, without repeats."""
    own = {"configurations": envelope.configurations, "categories": envelope.categories}
    found = {}
    for configuration, category, *_ in sorted(combinations(findings, own)):
        held = holding(
            (each for _, each in entered if holds_for(each, configuration, category or None)),
            phase,
            envelope.axis,
        )
        found[tuple(each.id for each in held)] = held
    return [held for held in found.values() if held]


def _largest(held: tuple[Curtailment, ...], axis: Axis, weights: Stretch) -> Curtailment:
    middle = (weights[0] + weights[1]) / 2

    def amount(each: Curtailment) -> Fraction:
        low, high = each.insets(axis, middle)
        return low.at(middle) + high.at(middle)

    return max(held, key=amount)


def _words(findings: Findings, envelope: Envelope, phase: str, weights: Stretch) -> str:
    low, high = (f"{float(weight):g}" for weight in weights)
    where = f"at {low}" if low == high else f"between {low} and {high}"
    return (
        f"nothing of the {envelope.id} envelope would be left at {phase} {where} {findings.weight.value}; "
        "check the amounts and their units"
    )
