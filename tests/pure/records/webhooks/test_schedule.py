"""The example schedule of the Standard Webhooks specification 1.0.0 (its table was read)."""

from datetime import UTC, datetime, timedelta

from hypothesis import given
from hypothesis import strategies as st

from records.webhooks.schedule import JITTER, LONGEST_ASKED, WAITS, next_try

START = datetime(2026, 12, 1, tzinfo=UTC)
# "Time since start" of the specification's table.
SINCE_START = [
    "00:00:00", "00:00:05", "00:05:05", "00:35:05", "02:35:05", "07:35:05", "17:35:05", "31:35:05",
    "51:35:05", "75:35:05",
]  # fmt: skip


def _seconds(clock: str) -> int:
    hours, minutes, seconds = (int(part) for part in clock.split(":"))
    return hours * 3600 + minutes * 60 + seconds


def test_ten_tries_stand_where_the_specification_puts_them():
    at, seen = START, [0]
    for failed in range(1, 11):
        following = next_try(failed, at, chance=0)
        if following is None:
            break
        at = following
        seen.append(int((at - START).total_seconds()))

    assert seen == [_seconds(clock) for clock in SINCE_START]
    assert next_try(10, at, chance=0) is None


@given(st.integers(1, 9), st.floats(0, 1))
def test_chance_only_lengthens_and_by_a_tenth_at_most(failed, chance):
    wait = next_try(failed, START, chance=chance) - START

    assert WAITS[failed] <= wait <= WAITS[failed] * (1 + JITTER)


def test_a_receiver_may_ask_for_a_longer_wait_but_neither_a_shorter_nor_an_endless_one():
    def asking(asked: timedelta) -> timedelta:
        return next_try(1, START, chance=0, asked=asked) - START

    assert asking(timedelta(minutes=7)) == timedelta(minutes=7)
    assert asking(timedelta(seconds=1)) == timedelta(seconds=5)
    assert asking(timedelta(days=40)) == LONGEST_ASKED
