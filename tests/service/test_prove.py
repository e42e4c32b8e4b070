"""The long forms run one after the other, each by its name, and one that does not hold is told."""

import pytest

from service.bootstrap.environment import ROOT
from service.prove.command import prove
from service.prove.items import ITEMS, Item

RIGHT = Item("right", "it comes out right", ("-c", "print('7 counted')"))
WRONG = Item("wrong", "it comes out wrong", ("-c", "print('1 lost'); raise SystemExit(1)"))


def test_what_was_counted_is_told_at_the_end(capfd):
    assert prove([], (RIGHT,)) == 0

    told = capfd.readouterr().out
    assert "=== right: it comes out right" in told
    assert told.splitlines()[-1].split() == ["held", "right", "0", "s", "7", "counted"]


def test_one_that_does_not_hold_is_told_and_the_others_run(capfd):
    assert prove([], (WRONG, RIGHT)) == 1

    told = capfd.readouterr().out
    assert "DID NOT HOLD" in told
    assert "7 counted" in told


def test_one_alone_can_be_asked_for(capfd):
    assert prove(["--only", "right"], (WRONG, RIGHT)) == 0
    assert "1 lost" not in capfd.readouterr().out


def test_an_unknown_name_is_refused_with_those_there_are(capfd):
    assert prove(["--only", "nonsense"]) == 2
    assert all(item.name in capfd.readouterr().err for item in ITEMS[:1])


def test_a_list_runs_nothing(capfd):
    assert prove(["--list"]) == 0
    assert [line.split()[0] for line in capfd.readouterr().out.splitlines()] == [item.name for item in ITEMS]


@pytest.mark.parametrize("item", ITEMS, ids=lambda item: item.name)
def test_each_names_what_there_is(item):
    places = [word for word in item.words if word.startswith("tests")]

    assert places
    for place in places:
        path = place if "/" in place else f"{place.replace('.', '/')}.py"
        assert (ROOT / path).exists(), path
