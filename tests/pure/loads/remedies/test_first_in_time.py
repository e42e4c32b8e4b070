"""The search for the least count ends when its time does, however wide what cannot be told apart is."""

from fractions import Fraction
from types import SimpleNamespace
from typing import Any, cast

from loads.balance.polynomial import Root
from loads.balance.remedies.first import first_that_holds


class _Slow:
    """Ranges that nobody could part in time, and a load that none of ten million counts brings within."""

    def __init__(self, tries: int) -> None:
        self.tried = 0
        self.question = SimpleNamespace(left=lambda: max(tries - self.tried, 0))

    def turns(self, low: Fraction, high: Fraction) -> list[Root]:
        return [Root(low, high)]

    def result(self, at: Fraction) -> None:  # noqa: ARG002  # whatever the count
        self.tried += 1


def test_when_the_time_is_over_no_further_count_is_tried() -> None:
    slow = _Slow(tries=5)

    assert first_that_holds(cast("Any", slow), 1, 10_000_000) is None
    assert slow.tried == 5
