"""Every refusal of a load document in full: which fields are named, in which order, and what is said.

What each sentence says was read against what the user must do next; `agreed_texts/` has them.
"""

from typing import Any

import pytest

from fleet.basis import Basis
from loads.balance.declared import read_load
from records.refusal import Invalid
from tests.pure.loads.agreed import agreed, faults_told
from tests.pure.loads.making import twin
from tests.pure.loads.test_declared_refuses import GONE, ROWS, written


def told(document: Any, basis: Basis) -> list[str]:
    with pytest.raises(Invalid) as refused:
        read_load(document, basis)
    return faults_told(refused.value.faults)


def title(path: str, value: Any) -> str:
    words = "taken out" if value is GONE else ascii(value)
    return f"{path} {words if len(words) <= 80 else f'{words[:60]}... ({len(words)})'}"


DECLARED = agreed("refusals_of_a_load")


@pytest.mark.parametrize(("path", "value"), [(path, value) for path, value, *_ in ROWS])
def test_what_is_said_of_a_spoiled_load(path: str, value: Any) -> None:
    assert told(written(path, value), twin()) == DECLARED[title(path, value)]


def test_every_agreed_refusal_is_asked_for() -> None:
    assert set(DECLARED) == {title(path, value) for path, value, *_ in ROWS}
