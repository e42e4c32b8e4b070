"""The least count that holds, with loads written down by hand: which limits are broken at each count."""

from collections.abc import Mapping
from fractions import Fraction
from types import SimpleNamespace
from typing import Any, cast

import pytest

from loads.balance.polynomial import Root
from loads.balance.remedies.first import first_that_holds

Broken = tuple[str, ...] | None


class _Written:
    """Counts with the limits that are broken from there on (None: there is no such load), and turns."""

    def __init__(
        self, written: Mapping[int, Broken], turns: tuple[Any, ...] = (), *, tries: int = 99
    ) -> None:
        self.written, self.tries = dict(written), tries
        self.marks = [
            turn if isinstance(turn, Root) else Root(Fraction(turn), Fraction(turn)) for turn in turns
        ]
        self.looked: list[int] = []
        self.asked: list[tuple[Fraction, Fraction]] = []
        self.question = SimpleNamespace(left=lambda: max(self.tries - len(self.looked), 0))

    def turns(self, low: Fraction, high: Fraction) -> list[Root]:
        self.asked.append((low, high))
        return self.marks

    def result(self, at: Fraction) -> Any:
        self.looked.append(int(at))
        codes = self.written[max(count for count in self.written if count <= at)]
        if codes is None:
            return None
        return SimpleNamespace(
            checks=[SimpleNamespace(code=code, outcome="fail") for code in codes],
            verdict="outside" if codes else "within",
        )


HEAVY = ("weight.take-off",)
FULL = ("tank.LEFT",)
AFT = ("cg.landing",)
HALF = Fraction(1, 2)


@pytest.mark.parametrize(
    ("written", "turns", "reach", "first"),
    [
        ({0: HEAVY, 7: ()}, (), (1, 20), 7),
        ({0: HEAVY, 7: ()}, (), (7, 7), 7),
        ({0: HEAVY, 7: ()}, (), (1, 7), 7),
        ({0: HEAVY, 7: ()}, (), (1, 6), None),
        ({0: HEAVY, 7: ()}, (), (9, 20), 9),
        ({0: HEAVY, 2: ()}, (), (1, 2), 2),
        ({0: ()}, (), (1, 5), 1),
        ({0: ()}, (), (6, 5), None),
        ({0: HEAVY, 7: (), 9: FULL}, (), (1, 8), 7),
        ({0: HEAVY, 7: FULL}, (), (1, 20), None),  # before one ends another begins
        ({0: (*HEAVY, *FULL), 5: HEAVY, 8: ()}, (), (1, 20), 8),
        ({0: AFT, 7: ()}, (7,), (1, 20), 7),  # a turn at a whole count is a count by itself
        ({0: AFT, 7: ()}, (6 + HALF,), (1, 20), 7),
        ({0: AFT, 7: (), 8: AFT}, (7,), (1, 20), 7),
        ({0: AFT, 7: (), 8: AFT}, (6 + HALF, 7 + HALF), (1, 20), 7),
        ({0: AFT, 7: (), 8: AFT, 12: ()}, (7, 12), (8, 20), 12),
        ({0: AFT, 7: HEAVY, 11: (), 15: AFT}, (6 + HALF, 14 + HALF), (1, 20), 11),
        ({0: AFT, 5: HEAVY, 9: ()}, (Root(Fraction(4), Fraction(6)),), (1, 20), 9),
        ({0: AFT, 5: ()}, (Root(Fraction(4), Fraction(6)),), (1, 20), 5),
        ({0: None, 4: HEAVY, 9: ()}, (HALF + 3,), (1, 20), 9),
        ({0: None, 4: None}, (4,), (1, 20), None),
        ({0: ("tank-table.LEFT",), 4: ()}, (3,), (1, 20), 4),
        ({0: AFT, 20: ()}, (20,), (1, 20), 20),
        ({0: AFT, 2: ()}, (1, 1 + HALF), (1, 20), 2),
    ],
)
def test_the_least_count_that_holds(
    written: dict[int, Broken], turns: tuple[Any, ...], reach: tuple[int, int], first: int | None
) -> None:
    varying = _Written(written, turns)
    found = first_that_holds(cast("Any", varying), *reach)
    if first is None:
        assert found is None
    else:
        assert found is not None
        count, result = found
        assert (count, result.verdict) == (first, "within")
    assert varying.asked == ([] if reach[0] > reach[1] else [reach])


@pytest.mark.parametrize(
    "code", ["cg.ramp", "lateral.ramp", "path.lateral", "trim.take-off", "fuel-balance.W"]
)
def test_what_turns_only_at_a_turn_is_looked_at_once_between_two(code: str) -> None:
    varying = _Written({0: (code,)}, (10 + HALF,))
    assert first_that_holds(cast("Any", varying), 1, 20) is None
    assert varying.looked == [1, 11]


def test_between_two_turns_it_is_halved() -> None:
    varying = _Written({0: HEAVY, 700: ()})
    assert first_that_holds(cast("Any", varying), 1, 1000) is not None
    assert len(varying.looked) < 16


def test_where_the_time_runs_out_while_halving_one_that_may_not_be_the_least_is_told() -> None:
    varying = _Written({0: HEAVY, 700: ()}, tries=4)
    found = first_that_holds(cast("Any", varying), 1, 1000)
    assert found is not None
    assert 700 <= found[0] <= 1000
