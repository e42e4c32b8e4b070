"""The result of an assessment: exact inside, decimal texts in the document that the API, the pages and the
paper read.

Signs: arms aft of the datum and right of the centreline are positive. Weights in the weight unit of the
basis, arms in its length unit, moments in their product. A field that cannot be known is None, never zero. No
personal name stands in a result: its lines name seats and places.
"""

from dataclasses import dataclass
from fractions import Fraction
from typing import TYPE_CHECKING, Literal, NamedTuple

from fleet.basis import Phase

if TYPE_CHECKING:  # the path is made of states, so it cannot be imported before them
    from loads.balance.path_worst import Burn

Verdict = Literal["within", "outside", "unresolved"]
Outcome = Literal["pass", "fail", "unresolved", "advisory"]
Json = dict[str, object]


class Check(NamedTuple):
    """One limit tested at one phase. Texts are printed figures; `room` is the exact margin (below 0:
    outside).

    `limit` is the upper and `low` the lower bound. A check of a centre of gravity also carries
    `margin_weight`, the room in weight at the same arm, and `edge`, the nearest bound along the arm. One
    along the burn carries `edge`, and `at`: where its worst point is, in printed figures; a running sum has
    each of its stations there. `curtailed` tells the operator's margins where an envelope is curtailed, and
    how the certified one stands.
    """

    code: str
    title: str
    outcome: Outcome
    phase: str | None = None
    actual: str | None = None
    limit: str | None = None
    low: str | None = None
    unit: str | None = None
    margin: str | None = None
    margin_text: str = ""
    source: str = ""
    what_next: str = ""
    room: Fraction | None = None
    margin_weight: str | None = None
    edge: str | None = None
    at: Json | None = None
    curtailed: Json | None = None

    def as_document(self) -> Json:
        """Return the check as it stands in the result document."""
        found: Json = {
            "code": self.code,
            "title": self.title,
            "phase": self.phase,
            "actual": self.actual,
            "limit": self.limit,
            "low": self.low,
            "unit": self.unit,
            "margin": self.margin,
            "margin_text": self.margin_text,
            "source": self.source,
            "result": self.outcome,
            "what_next": self.what_next,
        }
        if self.code.startswith(("cg.", "lateral.", "lateral-by-cg.")):
            found["margin_weight"] = self.margin_weight
            found["edge"] = self.edge
        elif self.code.startswith("path."):
            found["edge"] = self.edge
            found["at"] = self.at
        elif self.at is not None:
            found["at"] = self.at
        if self.curtailed is not None:
            found["curtailed"] = self.curtailed
        return found


class State(NamedTuple):
    """The aircraft at one phase, exact. `fuel` is the usable fuel aboard, as weight."""

    phase: Phase
    weight: Fraction
    moment: Fraction
    lateral_moment: Fraction
    arm: Fraction
    lateral_arm: Fraction
    fuel: Fraction
    parts: tuple[tuple[str, str], ...] = ()  # (part, state) a sequence has set until then


class Line(NamedTuple):
    """One line of the loading computation. A weight of None is not known; a total then is not known
    either.
    """

    group: str
    what: str
    how: str | None
    weight: Fraction | None
    arm: Fraction | None
    moment: Fraction | None
    lateral_moment: Fraction | None
    total: bool = False
    pointer: str | None = None


@dataclass(frozen=True, slots=True)
class Result:
    """What an assessment found. `states`, `lines` and `burn` are exact (`burn`: None where not known);
    `document` holds the printed parts, ready made.
    """

    verdict: Verdict
    checks: tuple[Check, ...]
    states: tuple[State, ...]
    lines: tuple[Line, ...]
    document: Json
    burn: "Burn | None" = None

    def state(self, phase: Phase) -> State:
        """Return the aircraft at a phase. Raises `KeyError` when it was not computed."""
        for state in self.states:
            if state.phase == phase:
                return state
        raise KeyError(phase)

    def check(self, code: str) -> Check:
        """Return the check of a code. Raises `KeyError` when there is none."""
        for check in self.checks:
            if check.code == code:
                return check
        raise KeyError(code)

    def as_document(self) -> Json:
        """Return the result document: texts, whole numbers, truth values, lists and objects only."""
        return {
            "verdict": self.verdict,
            "checks": [check.as_document() for check in self.checks],
            **self.document,
        }


def verdict_of(checks: tuple[Check, ...]) -> Verdict:
    """Return `outside` when any limit is broken, else `unresolved` when any could not be checked, else
    `within`.
    """
    outcomes = {check.outcome for check in checks}
    if "fail" in outcomes:
        return "outside"
    return "unresolved" if "unresolved" in outcomes else "within"
