"""What was typed on a page of a restriction, permit or set of rules, made a document as the API takes it; no
Django here. Nothing typed is dropped: the reader of the document refuses what does not fit, at its input.
"""

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import datetime
from typing import Any
from zoneinfo import ZoneInfo

MOST_ROWS = 100
LONGEST_COUNT = 4  # digits; a longer count stays text and is refused as one


@dataclass(slots=True)
class Typed:
    """What was typed, on the operator's clock, and the input behind each pointer of the document made."""

    values: Mapping[str, str]
    zone: ZoneInfo
    field_of: dict[str, str] = field(default_factory=dict)

    def word(self, name: str) -> str:
        """This function will return what was typed in an input, without blanks at its ends."""
        return self.values.get(name, "").strip()

    def words(self, at: str, **inputs: str) -> dict[str, Any]:
        """This function will return what was typed, by field of the object at the pointer `at`; a field with
        nothing typed is left out.
        """
        self.field_of |= {f"{at}/{part}": name for part, name in inputs.items()}
        return {part: self.word(name) for part, name in inputs.items() if self.word(name)}

    def listed(self, at: str, name: str) -> list[str]:
        """This function will return the words of one input, which commas part."""
        self.field_of[at] = name
        return [word.strip() for word in self.word(name).split(",") if word.strip()]

    def instant(self, at: str, name: str) -> str:
        """This function will return a date and time with the operator's offset; as typed where it is none."""
        self.field_of[at] = name
        try:
            local = datetime.fromisoformat(self.word(name))
        except ValueError:
            return self.word(name)
        return (local if local.tzinfo else local.replace(tzinfo=self.zone)).isoformat()

    def count(self, name: str) -> int | str:
        """This function will return a whole number, or what was typed in its stead."""
        typed = self.word(name)
        whole = typed.isascii() and typed.isdigit() and len(typed) <= LONGEST_COUNT
        return int(typed) if whole else typed

    def rows(self, prefix: str, parts: tuple[str, ...]) -> list[int]:
        """This function will return the rows in which something of `parts` was typed."""
        return [row for row in range(MOST_ROWS) if any(self.word(f"{prefix}:{row}:{part}") for part in parts)]

    def input_at(self, pointer: str) -> str:
        """This function will return the input that a fault belongs to: its own, or that of its parent."""
        while pointer:
            if pointer in self.field_of:
                return self.field_of[pointer]
            pointer = pointer.rpartition("/")[0]
        return ""


EFFECT_PARTS = ("effect", "limit", "which", "amount", "corners")


def paper_in(typed: Typed, kind: str) -> dict[str, Any]:
    """This function will return the restriction or permit typed."""
    head = {"number": "number", "what": "what"} | ({"authority": "authority"} if kind == "permit" else {})
    document: dict[str, Any] = {"schema": f"tarebook.{kind}/1", **typed.words("", **head)}
    for part in ("true_from", "true_until"):
        if typed.word(part):
            document[part] = typed.instant(f"/{part}", part)
        typed.field_of[f"/{part}"] = part
    source = typed.words("/source", document="document_title", revision="revision", page="page")
    typed.field_of["/source"] = "document_title"
    for part in ("operations", "conditions"):
        if listed := typed.listed(f"/{part}", part):
            document[part] = listed
    typed.field_of["/effects"] = "effect:0:effect"
    rows = typed.rows("effect", EFFECT_PARTS)
    effects = [_effect(typed, f"effect:{row}", f"/effects/{place}") for place, row in enumerate(rows)]
    return document | {"source": source, "effects": effects}


def _effect(typed: Typed, row: str, at: str) -> dict[str, Any]:
    word = typed.word(f"{row}:effect")
    found = typed.words(at, effect=f"{row}:effect", limit=f"{row}:limit")
    names = "ids" if word in {"seats", "places"} else "of"
    amount = "volume" if word == "fuel" else "weight"
    typed.field_of |= {at: f"{row}:effect", f"{at}/of": f"{row}:which", f"{at}/ids": f"{row}:which"}
    typed.field_of |= {f"{at}/{part}": f"{row}:amount" for part in ("weight", "volume")}
    typed.field_of |= {f"{at}/{part}": f"{row}:corners" for part in ("points", "unit", "weight_unit")}
    if typed.word(f"{row}:which"):
        listed = typed.listed(f"{at}/{names}", f"{row}:which")
        found[names] = listed if names == "ids" else typed.word(f"{row}:which")
    if typed.word(f"{row}:amount"):
        found[amount] = {"value": typed.word(f"{row}:amount"), "unit": typed.word(f"{row}:unit")}
    if typed.word(f"{row}:corners"):
        corners = typed.word(f"{row}:corners").split(";")
        found |= {
            "points": [corner.split() for corner in corners if corner.strip()],
            "unit": typed.word(f"{row}:across"),
            "weight_unit": typed.word(f"{row}:unit"),
        }
    return found


BOUNDS = ("from_engines", "to_engines", "from_seats", "to_seats")
RULE_PARTS = ("rule", "says", "count", "number", "document", "page", "category", "operations", *BOUNDS)


def rules_in(typed: Typed) -> dict[str, Any]:
    """This function will return the set of rule values typed."""
    document: dict[str, Any] = {"schema": "tarebook.rules/1", **typed.words("", title="title")}
    typed.field_of |= {"/true_from": "true_from", "/rules": "rule:0:rule"}
    if typed.word("true_from"):
        document["true_from"] = typed.instant("/true_from", "true_from")
    rows = typed.rows("rule", RULE_PARTS)
    return document | {
        "rules": [_rule(typed, f"rule:{row}", f"/rules/{place}") for place, row in enumerate(rows)]
    }


def _rule(typed: Typed, row: str, at: str) -> dict[str, Any]:
    found = typed.words(at, rule=f"{row}:rule")
    typed.field_of |= {at: f"{row}:says", f"{at}/interval": f"{row}:count"}
    says = typed.word(f"{row}:says")
    if says in {"none", "demanded"}:
        found[says] = True
        typed.field_of[f"{at}/{says}"] = f"{row}:says"
    if says == "every" or typed.word(f"{row}:count"):
        found["interval"] = {"count": typed.count(f"{row}:count"), "unit": typed.word(f"{row}:unit")}
    found["source"] = typed.words(
        f"{at}/source", rule=f"{row}:number", document=f"{row}:document", page=f"{row}:page"
    )
    applies: dict[str, Any] = typed.words(f"{at}/applies_to", category=f"{row}:category")
    for bound in BOUNDS:
        typed.field_of[f"{at}/applies_to/{bound}"] = f"{row}:{bound}"
        if typed.word(f"{row}:{bound}"):
            applies[bound] = typed.count(f"{row}:{bound}")
    if operations := typed.listed(f"{at}/applies_to/operations", f"{row}:operations"):
        applies["operations"] = operations
    return found | ({"applies_to": applies} if applies else {})
