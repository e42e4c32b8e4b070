"""The placing of versions against a naive evaluation of the whole history."""

from datetime import UTC, datetime, timedelta
from uuid import UUID

from hypothesis import given
from hypothesis import strategies as st

from fleet.timeline import Span, place

DAY_ZERO = datetime(2026, 3, 1, tzinfo=UTC)


def day(number: int) -> datetime:
    return DAY_ZERO + timedelta(days=number)


def naive(history: list[int], at: datetime) -> UUID | None:
    """The version with the latest beginning that is not after `at`; of equals, the one approved last."""
    begun = [(start, order) for order, start in enumerate(history) if day(start) <= at]
    return UUID(int=max(begun)[1]) if begun else None


@given(st.lists(st.integers(0, 9), max_size=12))
def test_any_history_of_approvals_reads_as_the_naive_evaluation_does(history: list[int]) -> None:
    spans: tuple[Span, ...] = ()

    for order, start in enumerate(history):
        placing = place(spans, UUID(int=order), day(start))
        spans = (*(span for span in spans if span != placing.ended), *placing.begun)

        for number in range(-1, 11):
            for at in (day(number), day(number) - timedelta(microseconds=1)):
                holding = [span.version for span in spans if span.holds(at)]
                expected = naive(history[: order + 1], at)
                assert holding == ([] if expected is None else [expected])


def test_a_back_dated_version_holds_until_the_next_one_begins() -> None:
    a, b, c = UUID(int=1), UUID(int=2), UUID(int=3)
    current = (Span(a, day(0), day(10)), Span(b, day(10), None))

    placing = place(current, c, day(4))

    assert placing.ended == current[0]
    assert placing.begun == (Span(a, day(0), day(4)), Span(c, day(4), day(10)))


def test_a_version_before_all_others_ends_none_of_them() -> None:
    current = (Span(UUID(int=1), day(5), None),)

    placing = place(current, UUID(int=2), day(2))

    assert placing.ended is None
    assert placing.begun == (Span(UUID(int=2), day(2), day(5)),)


def test_a_correction_with_the_same_beginning_takes_the_whole_span() -> None:
    current = (Span(UUID(int=1), day(5), day(9)), Span(UUID(int=2), day(9), None))

    placing = place(current, UUID(int=3), day(5))

    assert placing.ended == current[0]
    assert placing.begun == (Span(UUID(int=3), day(5), day(9)),)
