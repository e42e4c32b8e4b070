"""The invented documents of the demonstration, read afresh for every test, and published worked examples."""

import json
from collections.abc import Callable
from copy import deepcopy
from pathlib import Path
from typing import Any

import pytest

from records.refusal import Fault, Invalid
from records.strict_json import read

ROOT = Path(__file__).parents[3]
NAMES = ("twin", "turboprop", "helicopter", "commuter")


def basis_document(name: str) -> Any:
    return read((ROOT / f"service/demo/data/{name}.loading-basis.json").read_bytes())


def empty_weight_document(name: str) -> Any:
    return read((ROOT / f"service/demo/data/{name}.empty-weight.json").read_bytes())


def example(identity: str) -> Any:
    """This function will return one published example, its numbers as text so that they stay exact."""
    examples = json.loads((ROOT / "tests/reference/worked_examples.json").read_text(), parse_float=str)
    return next(each for each in examples if each["id"] == identity)


def changed(document: Any, pointer: str, value: Any) -> Any:
    """This function will return a copy with the value at a JSON pointer set; `...` takes the field away."""
    document = deepcopy(document)
    *steps, last = pointer.strip("/").split("/")
    inner = document
    for step in steps:
        inner = inner[int(step)] if isinstance(inner, list) else inner[step]
    key = int(last) if isinstance(inner, list) else last
    if value is ...:
        del inner[key]
    elif isinstance(inner, list) and key == len(inner):
        inner.append(value)
    else:
        inner[key] = value
    return document


def found_in(refused: Invalid) -> set[tuple[str, str]]:
    return {(fault.pointer, fault.code) for fault in refused.faults}


def is_a_sentence_with_a_next_step(fault: Fault) -> bool:
    return len(fault.detail.split()) >= 4 and not fault.detail.endswith(".")


def told(read_document: Callable[[Any], object], document: Any) -> list[tuple[str, str, str]]:
    """This function will return what a reader tells whoever sent a document, in its order and word by word:
    pointer, code and sentence of each fault.
    """
    with pytest.raises(Invalid) as refused:
        read_document(document)
    return [(fault.pointer, fault.code, fault.detail) for fault in refused.value.faults]
