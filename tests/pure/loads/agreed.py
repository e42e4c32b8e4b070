"""What is agreed upon word by word, as texts of their own: beside a title what is told then, line by line.

A text is read and agreed by a person before it is kept; nothing writes it anew. Titles begin with `## `.
"""

import json
from collections.abc import Mapping
from pathlib import Path
from typing import Any

from loads.balance.result import Check, Result
from records.refusal import Fault

HERE = Path(__file__).parent / "agreed_texts"


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


def result_told(result: Result) -> list[str]:
    """A result in full: the verdict, each check and each line of the sum sheet, and all other parts."""
    document: dict[str, Any] = dict(result.document)
    told = [f"verdict {result.verdict}", *map(check_told, result.checks)]
    for name, part in document.items():
        if isinstance(part, list) and part and isinstance(part[0], dict):
            told += [f"{name}: {_fields_told(row)}" for row in part]
        else:
            told.append(f"{name}: {json.dumps(part, ensure_ascii=False)}")
    return told


def check_told(check: Check) -> str:
    """A check with all it says; what it does not have is left out. Its exact room is told, too."""
    document = check.as_document()
    room = "" if check.room is None else f" | room={check.room}"
    return (
        f"check: {check.outcome} {_fields_told({k: v for k, v in document.items() if k != 'result'})}{room}"
    )


def _fields_told(fields: Mapping[str, Any]) -> str:
    kept = {name: value for name, value in fields.items() if value not in (None, "")}
    return " | ".join(
        f"{name}={value if isinstance(value, str) else json.dumps(value, ensure_ascii=False)}"
        for name, value in kept.items()
    )
