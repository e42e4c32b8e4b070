"""Every refusal of a loading basis, word by word, as the files in `refusals` tell them.

A case is a few changes to the basis that has one of everything, `pointer = value` or `pointer gone`, and
beneath them, indented, all faults in their order: `pointer code: sentence`; or `is read`.
"""

import json
from pathlib import Path

import pytest

from fleet.basis_reading import read_basis
from tests.pure.fleet.documents import changed, told
from tests.pure.fleet.everything import everything

FILES = sorted((Path(__file__).parent / "refusals").glob("*.txt"))


def cases(path):
    blocks = path.read_text("utf-8").split("\n\n")
    return [pytest.param(block, id=block.split("\n")[0]) for block in blocks if block.startswith("/")]


def spoiled(lines):
    document = everything()
    for line in lines:
        pointer, _, value = line.partition(" = ")
        gone = pointer.endswith(" gone")
        document = changed(document, pointer.removesuffix(" gone"), ... if gone else json.loads(value))
    return document


@pytest.mark.parametrize("case", [case for path in FILES for case in cases(path)])
def test_a_basis_is_refused_by_field_code_and_sentence_or_read(case):
    lines = case.rstrip().split("\n")
    document = spoiled(line for line in lines if line.startswith("/"))
    wanted = [line.removeprefix("    ") for line in lines if not line.startswith("/")]

    if wanted == ["is read"]:
        assert read_basis(document)
    else:
        assert [f"{at} {code}: {detail}" for at, code, detail in told(read_basis, document)] == wanted


def test_the_basis_that_has_everything_is_sound():
    assert read_basis(everything())
