"""What is agreed upon word by word, as texts of their own: beside a title what is told then, line by line.

A text is read and agreed by a person before it is kept; nothing writes it anew. Titles begin with `## `.
"""

import json
from collections.abc import Mapping, Sequence
from pathlib import Path
from typing import Any

from loads.balance.result import Check, Result
from records.refusal import Fault

HERE = Path(__file__).parent / "agreed_texts"
LONGEST_ROOM = 16  # letters: beyond it no person reads an exact room


def agreed(name: str) -> dict[str, list[str]]:
    """The lines of a text by their titles."""
    found: dict[str, list[str]] = {}
    title = ""
    for line in (HERE / f"{name}.txt").read_text("utf-8").splitlines():
        if line.startswith("## "):
            title = line.removeprefix("## ")
            assert title not in found, f"{title} stands twice"
            found[title] = []
        elif line:
            found[title].append(line)
    return found


def faults_told(faults: tuple[Fault, ...]) -> list[str]:
    """Every fault on a line: where, its code, and what is said."""
    return [f"{fault.pointer or '(the document)'} {fault.code}: {fault.detail}" for fault in faults]


def result_told(result: Result, beside: Sequence[str] = ()) -> list[str]:
    """A result in full: the verdict, each check and each line of the sum sheet, and all other parts.

    What stands word by word in the result `beside` is only counted, so that what is peculiar can be read.
    """
    document: dict[str, Any] = dict(result.document)
    told = [f"verdict: {result.verdict}", *map(check_told, result.checks)]
    for name, part in document.items():
        if name == "sumsheet":
            told += [_line_told(line) for line in part]
        elif isinstance(part, list) and part and isinstance(part[0], dict):
            told += [f"{name}: {_fields_told(row)}" for row in part]
        else:
            told.append(f"{name}: {json.dumps(part, ensure_ascii=False)}")
    known = set(beside)
    peculiar = [line for line in told if line not in known]
    return peculiar if not beside else [*peculiar, f"besides: {len(told) - len(peculiar)} lines as there"]


def check_told(check: Check) -> str:
    """A check with all it says: `outcome code, title, phase: actual (low to limit) unit, margin | words`."""
    at = f", {check.phase}" if check.phase else ""
    figures = f"{check.actual} ({check.low} to {check.limit}) {check.unit}, {check.margin}"
    known = {"code", "title", "phase", "actual", "low", "limit", "unit", "margin", "margin_text"}
    rest = {
        name: value
        for name, value in check.as_document().items()
        if name not in {*known, "source", "result", "what_next"}
    }
    room = "" if check.room is None or len(str(check.room)) > LONGEST_ROOM else f"room {check.room}"
    words = [check.margin_text, check.source, check.what_next, _fields_told(rest), room]
    return f"{check.outcome} {check.code}, {check.title}{at}: {figures} | {' | '.join(filter(None, words))}"


def _line_told(line: Mapping[str, Any]) -> str:
    """A line of the sum sheet: number, group, what; weight at arm = moment, lateral moment; the rest."""
    number, group, what, how, weight, arm, moment, across, total, pointer, *_ = line.values()
    shown = _fields_told(dict(list(line.items())[10:]))
    figures = f"{weight} at {arm} = {moment}, across {across}"
    rest = [how, pointer, shown, "a total" if total else ""]
    return f"{number}. {group}: {what}; {figures} | {' | '.join(filter(None, rest))}"


def _fields_told(fields: Mapping[str, Any]) -> str:
    kept = {name: value for name, value in fields.items() if value not in (None, "")}
    return ", ".join(
        f"{name}={value if isinstance(value, str) else json.dumps(value, ensure_ascii=False)}"
        for name, value in kept.items()
    )
