"""Remedies word by word: what a reject is offered, all of it, as agreed upon in `agreed_texts/remedies.txt`.

Each reject was reckoned by hand (the sums stand beside it in `rejects`), and each amount offered is the least
that these sums leave. The clock stands, so that no answer depends on how long it takes.
"""

import json
from collections.abc import Callable, Mapping
from typing import Any

import pytest

from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.remedies.finding import find_remedies
from tests.pure.loads.agreed import agreed
from tests.pure.loads.remedies.rejects import EMPTY, REJECTS, Asked, question_of

AGREED = agreed("remedies")


def title(make: Callable[[], Asked]) -> str:
    return make.__name__.replace("_", " ")


def remedies_told(asked: Asked) -> list[str]:
    document, basis = asked
    found = find_remedies(
        question_of(asked),
        document,
        lambda changed: assess(read_load(changed, basis), basis, EMPTY, advised=False),
    )
    return [line for offer in found.offers for line in offer_told(offer)] + [found.said or "nothing besides"]


def offer_told(offer: Mapping[str, Any]) -> list[str]:
    """An offer in full, a line for each figure, limit and operation."""
    told = [f"{offer['kind']}, {offer['found']}: {offer['sentence']}"]
    told += [f"  {one['title']}: {one['before']} -> {one['after']} {one['unit']}" for one in offer["figures"]]
    told += [f"  {one['code']}, {one['title']}: {one['before']} -> {one['after']}" for one in offer["mended"]]
    told += [f"  next, {name}: {text}" for name, text in offer["next"].items()]
    told += [f"  {json.dumps(one)}" for one in offer["change"]]
    known = {"kind", "found", "sentence", "figures", "mended", "next", "change"}
    assert set(offer) == known
    return told


@pytest.mark.parametrize("make", REJECTS, ids=title)
def test_a_reject_is_offered_what_was_agreed_upon(make: Callable[[], Asked]) -> None:
    assert remedies_told(make()) == AGREED[title(make)]


def test_every_agreed_reject_is_asked_for() -> None:
    assert list(AGREED) == [title(make) for make in REJECTS]
