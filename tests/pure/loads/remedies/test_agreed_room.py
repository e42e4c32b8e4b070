"""Room word by word: how much more can go where, and how wrong weights may be, as agreed upon in
`agreed_texts/room.txt`. What stops each was reckoned by hand from the sums beside it in `roomy`.
"""

from collections.abc import Callable, Mapping
from typing import Any

import pytest

from loads.balance.remedies.error import room_for_error
from loads.balance.remedies.more import how_much_more
from tests.pure.loads.agreed import agreed
from tests.pure.loads.remedies.rejects import Asked, question_of
from tests.pure.loads.remedies.roomy import ROOMY_LOADS

AGREED = agreed("room")


def title(make: Callable[[], Asked]) -> str:
    return make.__name__.replace("_", " ")


def room_told(asked: Asked) -> list[str]:
    question = question_of(asked)
    more = [f"more {told_of(one)}: {one.pop('amount')} {rest(one)}" for one in how_much_more(question)]
    wrong = [
        f"wrong {told_of(one)}: {one.pop('percent')} %, {one.pop('each')} {rest(one)}"
        for one in room_for_error(question)
    ]
    return [f"verdict: {question.result.verdict}", *more, *wrong]


def told_of(one: dict[str, Any]) -> str:
    return f"{one.pop('kind')} {one.pop('id') or '(all)'}, {one.pop('name')}"


def rest(one: Mapping[str, Any]) -> str:
    assert set(one) == {"unit", "stopped_by"}
    return f"{one['unit']}, {one['stopped_by'] or 'nothing stops it'}"


@pytest.mark.parametrize("make", ROOMY_LOADS, ids=title)
def test_room_is_told_as_agreed_upon(make: Callable[[], Asked]) -> None:
    assert room_told(make()) == AGREED[title(make)]


def test_every_agreed_room_is_asked_for() -> None:
    assert list(AGREED) == [title(make) for make in ROOMY_LOADS]
