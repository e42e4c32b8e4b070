"""Changes between weighings add up; when the sum may no longer be passed over is a rule that is handed in."""

from fractions import Fraction

import pytest

from fleet.weight_changes import Bracket, must_revise, negligible_weight, part_of, running
from fleet.worksheet import SignedLine, Sums

F = Fraction
EMPTY = Sums(F(2400), F(237_100), F(-500))


def line(what, weight, arm, lateral=0):
    return SignedLine(what, F(weight), F(arm), F(lateral))


def test_by_hand_the_running_sum_of_two_changes():
    """A radio of 12 lb in at 60 in: 2,412 lb, 237,820 lb in. An older one of 7 lb out at 62 in: 2,405 lb,
    237,386 lb in; together 5 lb and 286 lb in. The CG went from 98.7917 to 98.7052 in.
    """
    first, second = running(EMPTY, [line("radio in", 12, 60), line("radio out", -7, 62)])

    assert first.empty == Sums(F(2412), F(237_820), F(-500))
    assert second.changed == Sums(F(5), F(286), F(0))
    assert second.empty == Sums(F(2405), F(237_386), F(-500))
    assert second.before == EMPTY
    assert second.shift == F(237_386, 2405) - F(237_100, 2400)


def test_small_changes_are_summed_and_not_each_compared_alone():
    """Four changes of 0.9 lb are each below a pound, and 3.6 lb together."""
    steps = running(EMPTY, [line(f"bracket {number}", "0.9", 100) for number in range(4)])

    assert not must_revise(F("0.9"), F(0), most_weight=F(1), most_shift=None)
    assert steps[-1].changed.weight == F("3.6")
    assert must_revise(steps[-1].changed.weight, steps[-1].shift, most_weight=F(1), most_shift=None)


def test_as_much_as_the_threshold_is_not_more_and_down_counts_like_up():
    for weight in (F(1), F(-1)):
        assert not must_revise(weight, F(0), most_weight=F(1), most_shift=F(1))
        assert must_revise(weight * F("1.001"), F(0), most_weight=F(1), most_shift=F(1))
    assert must_revise(F(0), F("-1.001"), most_weight=F(1), most_shift=F(1))
    assert not must_revise(F(0), F("-1.001"), most_weight=F(1), most_shift=None)


def test_taking_off_more_than_there_is_is_refused():
    with pytest.raises(ValueError, match="wing out"):
        running(EMPTY, [line("wing out", -2400, 100)])


def test_a_bracket_ends_below_its_weight_or_with_it():
    brackets = [Bracket(F(5000), False, F(1)), Bracket(F(50_000), True, F(2)), Bracket(None, False, F(5))]

    assert [negligible_weight(brackets, F(weight)) for weight in (4999, 5000, 50_000, 50_001)] == [1, 2, 2, 5]
    with pytest.raises(LookupError):
        negligible_weight(brackets[:1], F(6000))


def test_a_threshold_in_percent():
    assert part_of(F("0.5"), F(5700)) == F("28.5")
