"""The computer proves itself: every reference load computed from its documents, compared with its answers.

EU-OPS Appendix 1 to 1.625 and AMC1 SPO.POL.115 ask that the integrity of what a computer puts out is verified
at intervals not over six months (read).
"""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from fractions import Fraction

from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import read_empty_weight
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.engine import ENGINE_VERSION
from loads.balance.result import Result
from loads.balance.rounding import printed
from loads.selfcheck.documents import basis_document, empty_weight_document, load_document
from loads.selfcheck.references import Reference, ReferenceSet, reference_set

_SHOWN = 4


@dataclass(frozen=True, slots=True)
class Finding:
    """One answer compared: what was wanted and what came out, as printed, and whether they agree."""

    what: str
    wanted: str
    found: str
    right: bool


@dataclass(frozen=True, slots=True)
class Proved:
    """One reference load with its findings; one that could not be computed has a single wrong finding."""

    reference: Reference
    findings: tuple[Finding, ...]

    @property
    def right(self) -> bool:
        """Whether every answer came out."""
        return bool(self.findings) and all(one.right for one in self.findings)


@dataclass(frozen=True, slots=True)
class Proof:
    """What one self-check found, with the engine and the set of reference loads it was made with."""

    engine: str
    references: str
    loads: tuple[Proved, ...]

    @property
    def passed(self) -> bool:
        """Whether every reference load came out right."""
        return bool(self.loads) and all(one.right for one in self.loads)

    def as_document(self) -> dict[str, object]:
        """Return the proof as it is filed: texts, truth values, lists and objects only."""
        return {
            "schema": "tarebook.self-check/1",
            "engine": self.engine,
            "references": self.references,
            "passed": self.passed,
            "loads": [_as_filed(one) for one in self.loads],
        }


def prove(references: ReferenceSet | None = None) -> Proof:
    """Return what comes out for every reference load. Whatever the engine fails with is a finding."""
    chosen = references or reference_set()
    return Proof(ENGINE_VERSION, chosen.digest, tuple(_proved(one) for one in chosen.loads))


def _proved(reference: Reference) -> Proved:
    try:
        return Proved(reference, tuple(_findings(reference, _computed(reference))))
    except Exception as problem:  # noqa: BLE001  # an engine that fails is what is looked for
        return Proved(reference, (Finding("computation", "an answer", type(problem).__name__, False),))


def _computed(reference: Reference) -> Result:
    given = reference.given
    basis = read_basis(basis_document(given))
    empty = read_empty_weight(empty_weight_document(given), basis)
    return assess(read_load(load_document(given), basis), basis, empty)


def _findings(reference: Reference, result: Result) -> Iterator[Finding]:
    document = result.as_document()
    yield _compared("verdict", reference.verdict, str(document["verdict"]))
    failing = {check.code for check in result.checks if check.outcome == "fail"}
    if reference.failing:
        named = reference.failing if reference.failing in failing else ", ".join(sorted(failing))
        yield _compared("limit that is broken", reference.failing, named or "none")
    found = _figures(result)
    for name, answer in reference.answers.items():
        figure = found[name]
        right = abs(figure - answer.figure) <= answer.off
        yield Finding(name, _said(answer.figure, answer.off), printed(figure, _SHOWN), right)


def _compared(what: str, wanted: str, found: str) -> Finding:
    return Finding(what, wanted, found, wanted == found)


def _figures(result: Result) -> Mapping[str, Fraction]:
    """Return what a reference may ask for. Percentages and bounds are those a person would read."""
    take_off, landing = result.state("take-off"), result.state("landing")
    check = result.check("cg.take-off")
    figures = {
        "take-off weight": take_off.weight,
        "take-off moment": take_off.moment,
        "take-off arm": take_off.arm,
        "landing arm": landing.arm,
        "burned weight": take_off.weight - landing.weight,
        "burned moment": take_off.moment - landing.moment,
    }
    if check.low is not None and check.limit is not None:
        figures["least moment at take-off"] = Fraction(check.low) * take_off.weight
        figures["greatest moment at take-off"] = Fraction(check.limit) * take_off.weight
    phases = result.document["phases"]
    shown = next(one for one in phases if one["phase"] == "take-off") if isinstance(phases, list) else {}
    if shown.get("percent_chord") is not None:
        figures["percent of the mean chord"] = Fraction(shown["percent_chord"])
    return figures


def _said(figure: Fraction, off: Fraction) -> str:
    wanted = printed(figure, _SHOWN)
    return f"{wanted} (print to {printed(off, 6)})" if off else wanted


def _as_filed(one: Proved) -> dict[str, object]:
    return {
        "id": one.reference.id,
        "source": one.reference.source,
        "figures_are": one.reference.figures_are,
        "right": one.right,
        "findings": [
            {"what": each.what, "wanted": each.wanted, "found": each.found, "right": each.right}
            for each in one.findings
        ],
    }
