"""The inputs of a restriction, a permit and a set of rules, as plain values for the page; no Django here."""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from fleet.rules import NAMES
from fleet.web.typed_document import EFFECT_PARTS, RULE_PARTS, Typed

Choices = tuple[tuple[str, str], ...]
Input = dict[str, Any]
SPARE_ROWS = 2
EFFECTS: Mapping[str, str] = {
    "limit": "limit of weight",
    "maximum": "maximum of a seat, place or zone",
    "seats": "seats blocked",
    "places": "places closed",
    "fuel": "fuel trapped in a tank",
    "envelope": "envelope",
}
OF_A_PERMIT = ("limit", "maximum", "envelope")
LIMITS = ("ramp", "take_off", "zero_fuel", "landing", "minimum_flying")
AMOUNT_UNITS = ("lb", "kg", "US gal", "imp gal", "l")
LENGTHS = ("in", "mm", "cm", "m", "ft")
ACROSS = (*LENGTHS, *(f"{weight} {length}" for weight in ("lb", "kg") for length in LENGTHS))
SAYS: Choices = (("", "choose"), ("every", "every"), ("demanded", "demanded"), ("none", "none"))
INTERVALS = ("calendar months", "months", "days", "years")


@dataclass(frozen=True, slots=True)
class Form:
    """A form: its single inputs, the heads of its rows, and its rows."""

    fields: list[Input]
    heads: tuple[str, ...]
    rows: list[list[Input]]
    caption: str


@dataclass(frozen=True, slots=True)
class Asking:
    """Makes inputs from what was typed and the faults found, by input name."""

    typed: Typed
    faults: Mapping[str, str]

    def one(
        self,
        name: str,
        title: str,
        *,
        choices: Choices = (),
        hint: str = "",
        kind: str = "text",
        figure: bool = False,
    ) -> Input:
        """This function will return one input; a word in no list is added to it."""
        value = self.typed.values.get(name, choices[0][0] if choices else "")
        if choices and value not in {word for word, _ in choices}:
            choices = (*choices, (value, value))
        return {
            "name": name, "label": title, "title": title, "value": value, "hint": hint, "type": kind,
            "choices": choices, "figure": figure, "maximum": 0, "fault": self.faults.get(name, ""),
        }  # fmt: skip

    def rows(self, prefix: str, parts: tuple[str, ...]) -> range:
        """This function will return the rows shown: to the last one typed in, and some to spare."""
        return range(max(self.typed.rows(prefix, parts), default=-1) + 1 + SPARE_ROWS)


def paper_form(typed: Typed, faults: Mapping[str, str], kind: str, zone: str) -> Form:
    """This function will return the inputs of a restriction or a permit."""
    ask = Asking(typed, faults)
    permit = kind == "permit"
    fields = [
        ask.one("number", "Number", hint="as printed on it"),
        ask.one("what", "What it says"),
        *([ask.one("authority", "Authority")] if permit else []),
        ask.one("true_from", "Holds from", kind="datetime-local", hint=zone),
        ask.one(
            "true_until",
            "Until, not included" if permit else "Until",
            kind="datetime-local",
            hint=zone if permit else "or until lifted",
        ),
        ask.one("document_title", "Document it stands in"),
        ask.one("revision", "Revision"),
        ask.one("page", "Page"),
        ask.one("operations", "Only for operations", hint="all if left empty"),
        ask.one("conditions", "Conditions", hint="commas between"),
    ]
    words = OF_A_PERMIT if permit else tuple(EFFECTS)
    rows = [_effect(ask, row, words) for row in ask.rows("effect", EFFECT_PARTS)]
    heads = ("What changes", "Which limit", "Of what", "New figure", "Unit", "Corners", "Unit across")
    caption = (
        "One line a change. Seats and places by their ids, commas between; corners as arm or moment, then "
        "weight: 116 5000; 122 8800."
    )
    return Form(fields, heads, rows, caption)


def _effect(ask: Asking, row: int, words: tuple[str, ...]) -> list[Input]:
    prefix, of = f"effect:{row}", f"change {row + 1}"
    effects = (("", "choose"), *((word, EFFECTS[word]) for word in words))
    limits = (("", "none"), *((word, word.replace("_", " ")) for word in LIMITS))
    return [
        ask.one(f"{prefix}:effect", f"What changes in {of}", choices=effects),
        ask.one(f"{prefix}:limit", f"Which limit in {of}", choices=limits),
        ask.one(f"{prefix}:which", f"Of what in {of}"),
        ask.one(f"{prefix}:amount", f"New figure in {of}", figure=True),
        ask.one(f"{prefix}:unit", f"Unit in {of}", choices=_same(AMOUNT_UNITS)),
        ask.one(f"{prefix}:corners", f"Corners in {of}"),
        ask.one(f"{prefix}:across", f"Unit of the arm or moment in {of}", choices=_same(ACROSS)),
    ]


def rules_form(typed: Typed, faults: Mapping[str, str], zone: str) -> Form:
    """This function will return the inputs of a set of rule values."""
    ask = Asking(typed, faults)
    fields = [
        ask.one("title", "Title"),
        ask.one("true_from", "Holds from", kind="datetime-local", hint=zone),
    ]
    heads = (
        "Rule", "Says", "Count", "Unit", "Number of the rule", "Document", "Page", "Category", "From engines",
        "To engines", "From seats", "To seats", "Operations",
    )  # fmt: skip
    caption = "One line a rule, the narrower of one name first. A rule without bounds applies to all."
    return Form(fields, heads, [_rule(ask, row) for row in ask.rows("rule", RULE_PARTS)], caption)


def _rule(ask: Asking, row: int) -> list[Input]:
    prefix, of = f"rule:{row}", f"in line {row + 1}"
    kinds: Choices = (("", "all"), *_same(("aeroplane", "helicopter")))
    names = (("", "choose"), *((name, words) for name, words in NAMES.items()))
    bounds = [
        ask.one(f"{prefix}:{end}_{what}", f"{end.capitalize()} {what} {of}", figure=True)
        for what in ("engines", "seats")
        for end in ("from", "to")
    ]
    return [
        ask.one(f"{prefix}:rule", f"Rule {of}", choices=names),
        ask.one(f"{prefix}:says", f"What it says {of}", choices=SAYS),
        ask.one(f"{prefix}:count", f"Count {of}", figure=True),
        ask.one(f"{prefix}:unit", f"Unit of the interval {of}", choices=_same(INTERVALS)),
        ask.one(f"{prefix}:number", f"Number of the rule {of}"),
        ask.one(f"{prefix}:document", f"Document {of}"),
        ask.one(f"{prefix}:page", f"Page {of}"),
        ask.one(f"{prefix}:category", f"Category {of}", choices=kinds),
        *bounds,
        ask.one(f"{prefix}:operations", f"Operations {of}"),
    ]


def _same(words: tuple[str, ...]) -> Choices:
    return tuple((word, word) for word in words)
