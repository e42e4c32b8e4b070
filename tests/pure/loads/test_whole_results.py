"""Whole results word by word: every check, every line of the sum sheet and every other part of loads that
between them have everything, as agreed upon in `agreed_texts/whole_results.txt`.

The figures were held against sums by hand: what each line says is weight times arm, and the lines add up to
the totals, which is asked again here.
"""

from collections.abc import Callable
from fractions import Fraction

import pytest

from loads.balance.result import Line, Result
from tests.pure.loads.agreed import agreed, result_told
from tests.pure.loads.whole_loads import WHOLE, no_basis, no_empty_weight, sound

AGREED = agreed("whole_results")
BESIDE = result_told(sound())
CONTAINED = [make for make in WHOLE if make not in (no_basis, no_empty_weight)]


def title(make: Callable[[], Result]) -> str:
    return make.__name__.replace("_", " ")


@pytest.mark.parametrize("make", WHOLE, ids=title)
def test_a_result_is_told_in_full(make: Callable[[], Result]) -> None:
    assert result_told(make(), () if make is sound else BESIDE) == AGREED[title(make)]


def test_every_agreed_result_is_asked_for() -> None:
    assert list(AGREED) == [title(make) for make in WHOLE]


def moments(line: Line) -> tuple[Fraction | None, Fraction | None, Fraction | None]:
    return line.weight, line.moment, line.lateral_moment


@pytest.mark.parametrize("make", CONTAINED, ids=title)
def test_the_lines_above_a_total_add_up_to_it_by_weight_and_both_moments(make: Callable[[], Result]) -> None:
    running = [Fraction(0)] * 3
    for line in make().lines:
        figures = moments(line)
        if line.total:
            assert figures in {tuple(running), (None, None, None)}
        elif None not in figures:
            running = [
                total + figure for total, figure in zip(running, figures, strict=True) if figure is not None
            ]
