"""Runs the manual's own sample loads through a basis.

All must come out as printed before it can be approved.
"""

from dataclasses import dataclass
from fractions import Fraction

from fleet.basis import Basis, Envelope, Phase, SampleLoad
from fleet.sourced import Limit

_LIMIT_OF: dict[Phase, str] = {
    "ramp": "ramp",
    "take-off": "take_off",
    "zero fuel": "zero_fuel",
    "landing": "landing",
    "minimum at landing": "landing",
}


@dataclass(frozen=True, slots=True)
class SampleFailure:
    """One sample load that did not come out as printed: which, a stable code, and both figures in a
    sentence.
    """

    name: str
    code: str
    detail: str


def failures_of(basis: Basis) -> tuple[SampleFailure, ...]:
    """Return every way in which the sample loads of a basis differ from what the manual prints.

    Empty when none does.
    """
    return tuple(failure for sample in basis.sample_loads for failure in _failures(basis, sample))


def _failures(basis: Basis, sample: SampleLoad) -> list[SampleFailure]:
    weight = sum((item.weight for item in sample.weights), Fraction(0))
    moment = sum(
        (
            item.weight * item.arm if printed is None else printed
            for item, printed in zip(sample.weights, sample.moments, strict=True)
        ),
        Fraction(0),
    )
    found = []
    unit = basis.weight_unit.value
    if weight != sample.total_weight:
        found.append(
            SampleFailure(
                sample.name,
                "sample-weight",
                f"weights add up to {float(weight):g} {unit}; printed is {float(sample.total_weight):g}",
            )
        )
    if abs(moment - sample.total_moment) > sample.tolerance_moment:
        found.append(
            SampleFailure(
                sample.name,
                "sample-moment",
                f"the moments add up to {float(moment):.10g} {unit} {basis.length_unit.value}, "
                f"the manual prints {float(sample.total_moment):.10g}",
            )
        )
    envelope = _envelope(basis, sample.phase)
    if envelope is None:
        found.append(
            SampleFailure(
                sample.name,
                "sample-no-envelope",
                f"no longitudinal envelope serves {sample.phase}, so the sample load cannot be judged",
            )
        )
    elif _within(basis, sample.phase, envelope, weight, moment) is not sample.within:
        says, comes = ("within", "outside") if sample.within else ("outside", "within")
        found.append(
            SampleFailure(
                sample.name, "sample-verdict", f"comes out {comes} limits, the manual shows it {says}"
            )
        )
    return found


def _within(basis: Basis, phase: Phase, envelope: Envelope, weight: Fraction, moment: Fraction) -> bool:
    limit: Limit | None = getattr(basis.limits, _LIMIT_OF[phase])
    if limit is not None and limit.value is not None and weight > limit.value:
        return False
    return envelope.shape.holds(weight, moment)


def _envelope(basis: Basis, phase: Phase) -> Envelope | None:
    for envelope in basis.envelopes:
        if envelope.axis == "longitudinal" and phase in envelope.phases:
            return envelope
    return None
