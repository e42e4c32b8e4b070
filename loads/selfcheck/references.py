"""The reference loads as they stand in `references.json`: published loads with published answers.

The digest is that of the whole set in canonical form (RFC 8785), so a result that names it can be tied to
exactly these figures for good.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction
from functools import cache
from pathlib import Path
from types import MappingProxyType
from typing import Any

from records.canonical import digest
from records.strict_json import read

_FILE = Path(__file__).with_name("references.json")


@dataclass(frozen=True, slots=True)
class Answer:
    """A published figure, and how far its print may be from it; both in lb and in."""

    figure: Fraction
    off: Fraction


@dataclass(frozen=True, slots=True)
class Reference:
    """One load with its answers. `figures_are`: "read", "computed" or "remembered". `failing` is the code of
    a check that must fail, "" where none may.
    """

    id: str
    source: str
    figures_are: str
    verdict: str
    failing: str
    answers: Mapping[str, Answer]
    given: Mapping[str, Any]


@dataclass(frozen=True, slots=True)
class ReferenceSet:
    """All reference loads, with the digest of the set."""

    loads: tuple[Reference, ...]
    digest: str


@cache
def reference_set() -> ReferenceSet:
    """Return the built-in reference loads."""
    document = read(_FILE.read_bytes())
    if not isinstance(document, dict) or not isinstance(document["cases"], list):
        raise TypeError("the built-in reference loads are an object with cases")
    return ReferenceSet(tuple(_reference(case) for case in document["cases"]), digest(document))


def _reference(case: Any) -> Reference:
    expected = dict(case["expected"])
    verdict, failing = expected.pop("verdict"), expected.pop("failing", "")
    answers = {name: Answer(Fraction(one["is"]), Fraction(one["off"])) for name, one in expected.items()}
    return Reference(
        case["id"], case["source"], case["figures_are"], verdict, failing, MappingProxyType(answers), case
    )
