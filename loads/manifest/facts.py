"""Everything a manifest says, as plain values. What stands here decides the paper's bytes, and nothing else
does.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime
from typing import Any, Literal, Protocol

from fleet.basis import Chord, Envelope
from fleet.curtailment import Curtailment
from fleet.lateral import LateralByCg

RuleSet = Literal["US", "EU-UK"]


class Computed(Protocol):
    """What was declared and what came out: all that most tables need, on paper and on a page alike."""

    @property
    def inputs(self) -> Mapping[str, Any]:
        """The document `tarebook.load/1` as typed."""

    @property
    def result(self) -> Mapping[str, Any]:
        """The result document."""


@dataclass(frozen=True, slots=True)
class OperatorFacts:
    """The certificate holder as entered; `time_zone` is a name of the IANA database."""

    code: str
    name: str
    certificate: str
    base: str
    time_zone: str
    rule_set: RuleSet
    procedure: str
    weight_method: str
    invented: bool


@dataclass(frozen=True, slots=True)
class AircraftFacts:
    """The airframe and the registration it carries."""

    registration: str
    serial_number: str
    type: str
    category: str
    engines: int


@dataclass(frozen=True, slots=True)
class BasisFacts:
    """The revision of the loading basis that was used; envelopes and chord in the units of the result.

    `document` is the document `tarebook.loading-basis/1` as entered.
    """

    revision: int
    digest: str
    known_from: datetime | None
    document: Mapping[str, Any]
    envelopes: tuple[Envelope, ...]  # those that hold for the load's configuration and category
    chord: Chord | None
    curtailments: tuple[Curtailment, ...] = ()
    lateral_by_cg: tuple[LateralByCg, ...] = ()


@dataclass(frozen=True, slots=True)
class EmptyWeightFacts:
    """The empty-weight version that was used; `document` is `tarebook.empty-weight/1` as entered."""

    digest: str
    true_from: datetime
    known_from: datetime | None
    document: Mapping[str, Any]


@dataclass(frozen=True, slots=True)
class SignatureFacts:
    """One signature: who, in which capacity, meaning what, in which words, when, by which means."""

    name: str
    capacity: str
    meaning: str
    statement: str
    signed_at: datetime
    means: str


@dataclass(frozen=True, slots=True)
class SealFacts:
    """The seal of the act of acceptance: its number on the operator's chain, its digest, the act's time."""

    position: int
    digest: str
    at: datetime


@dataclass(frozen=True, slots=True)
class ChangeFacts:
    """One last-minute change: its lines in words (with names), who accepted it, when, and what all changes
    came to with it, beside the bound.
    """

    number: int
    lines: tuple[str, ...]
    by: str
    at: datetime
    moved: str
    bound: str


@dataclass(frozen=True, slots=True)
class ProvisionFacts:
    """One version of what the operator laid down that the load used: what it is, in words."""

    what: str
    words: str
    digest: str


@dataclass(frozen=True, slots=True)
class Facts:
    """One accepted load. `inputs` is the document `tarebook.load/1` as typed, `result` the result document.

    `statement` is what was signed, as canonical bytes; `digest` is its SHA-256. `number` is the manifest's.
    `changes` are those at the last minute, the first one first: each reissued the manifest, so the issue is
    one more than there are. `earlier` are the signatures under the issues before.
    """

    operator: OperatorFacts
    aircraft: AircraftFacts
    load: str
    replaces: str
    number: int
    inputs: Mapping[str, Any]
    result: Mapping[str, Any]
    basis: BasisFacts
    empty_weight: EmptyWeightFacts
    engine: str
    signatures: tuple[SignatureFacts, ...]
    seal: SealFacts
    statement: bytes
    digest: str
    changes: tuple[ChangeFacts, ...] = ()
    earlier: tuple[SignatureFacts, ...] = ()
    provisions: tuple[ProvisionFacts, ...] = ()
    legs: tuple[str, ...] = ()
    uplift: str = ""  # since the leg before, in words

    @property
    def issue(self) -> int:
        """The issue of the manifest, 1 as long as nothing was changed at the last minute."""
        return len(self.changes) + 1


def typed_sources(facts: Computed) -> tuple[str, ...]:
    """This function will return the sources of stated limits, as typed: they stand inside our sentences."""
    return tuple(limit["source"] for limit in facts.inputs.get("limits", ()))
