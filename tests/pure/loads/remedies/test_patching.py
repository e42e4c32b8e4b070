"""A remedy as a JSON Patch, operation by operation, and the document it makes."""

from dataclasses import replace
from typing import Any

import pytest

from loads.balance.aboard import Item, Person
from loads.balance.prepared import prepared
from loads.balance.remedies.patching import patch_of, patched
from loads.balance.remedies.steps import Ballast, Refit, Refuel, Reseat, Shift, Step, Take
from tests.pure.loads.making import F, seat, twin

BASIS = twin()
READY = prepared(BASIS)
NOSE, REAR, LOCKER = BASIS.places
LEFT, RIGHT, *_ = BASIS.tanks
ODD = replace(LEFT, id="L/1~A")


def q(value: Any, unit: str = "lb") -> dict[str, Any]:
    return {"value": value, "unit": unit}


DOCUMENT: dict[str, Any] = {
    "configuration": "six-seat",
    "passengers": [{"seat": "ROW1-L"}, {"seat": "ROW1-R"}],
    "items": [
        {"place": "AFT-HOLD", "weight": q(120)},
        {"place": "AFT-HOLD", "weight": q("40.5", "kg")},
        {"place": "WING-LOCKER", "weight": q("60.0")},
    ],
    "fuel": {
        "at_engine_start": {
            "LEFT-MAIN": q(50, "US gal"),
            "RIGHT-MAIN": q("190", "l"),
            "L/1~A": q(20, "kg"),
        }
    },
}


def item(number: int, place: Any, weight: Any) -> Item:
    return Item("baggage", "b", place, F(weight), "weighed", removed=False, pointer=f"/items/{number}")


BAGS, KILOS, CRATE = item(0, REAR, 120), item(1, REAR, "89.28721622833643"), item(2, LOCKER, 60)
RIDER = Person(
    "P", "passenger", None, None, None, seat("ROW1-R", 124), F(170), "declared", None, "/passengers/1"
)


def put(path: str, value: Any) -> dict[str, Any]:
    return {"op": "replace", "path": path, "value": value}


def copied(number: int) -> dict[str, Any]:
    return {"op": "copy", "from": f"/items/{number}", "path": "/items/-"}


@pytest.mark.parametrize(
    ("steps", "operations"),
    [
        ([Reseat(RIDER, seat("ROW2-L", 155))], [put("/passengers/1/seat", "ROW2-L")]),
        ([Shift(BAGS, NOSE, F(120))], [put("/items/0/place", "NOSE-HOLD")]),
        (
            [Shift(BAGS, NOSE, F("44.5"))],
            [
                put("/items/0/weight", q("75.5")),
                copied(0),
                put("/items/3/place", "NOSE-HOLD"),
                put("/items/3/weight", q("44.5")),
            ],
        ),
        (  # 44.5 lb are 20.18... kg, rounded up; 40.5 less 20.2 are left
            [Shift(KILOS, NOSE, F("44.5"))],
            [
                put("/items/1/weight", q("20.3", "kg")),
                copied(1),
                put("/items/3/place", "NOSE-HOLD"),
                put("/items/3/weight", q("20.2", "kg")),
            ],
        ),
        (  # two parts of one line, to two places
            [Shift(BAGS, NOSE, F(50)), Shift(BAGS, LOCKER, F(30))],
            [
                put("/items/0/weight", q("70")),
                copied(0),
                put("/items/3/place", "NOSE-HOLD"),
                put("/items/3/weight", q("50")),
                put("/items/0/weight", q("40")),
                copied(0),
                put("/items/4/place", "WING-LOCKER"),
                put("/items/4/weight", q("30")),
            ],
        ),
        ([Take(CRATE, F("0.1"))], [put("/items/2/weight", q("59.9"))]),
        (  # lines that go come last, and the last of them first
            [Take(BAGS, F(120)), Take(CRATE, F(60)), Take(KILOS, F(2))],
            [
                put("/items/1/weight", q("39.5", "kg")),
                {"op": "remove", "path": "/items/2"},
                {"op": "remove", "path": "/items/0"},
            ],
        ),
        (  # a line of ballast is a line more
            [Ballast(NOSE, F("12.5")), Shift(BAGS, NOSE, F(20))],
            [
                {
                    "op": "add",
                    "path": "/items/-",
                    "value": {
                        "kind": "ballast",
                        "what": "ballast",
                        "place": "NOSE-HOLD",
                        "how": "weighed",
                        "weight": q("12.5"),
                    },
                },
                put("/items/0/weight", q("100")),
                copied(0),
                put("/items/4/place", "NOSE-HOLD"),
                put("/items/4/weight", q("20")),
            ],
        ),
        (
            [
                Refuel(LEFT, F("-4.7")),
                Refuel(RIGHT, F("4.7")),
            ],  # 4.7 US gal are 17.79 l: more is rounded down
            [
                put("/fuel/at_engine_start/LEFT-MAIN", q("45.3", "US gal")),
                put("/fuel/at_engine_start/RIGHT-MAIN", q("207.7", "l")),
            ],
        ),
        (  # 4.7 US gal are 17.79 l: less is rounded to less
            [Refuel(RIGHT, F("-4.7"))],
            [put("/fuel/at_engine_start/RIGHT-MAIN", q("172.2", "l"))],
        ),
        (  # 4.7 US gal at 6 lb are 28.2 lb, 12.79 kg
            [Refuel(ODD, F("-4.7"))],
            [put("/fuel/at_engine_start/L~11~0A", q("7.2", "kg"))],
        ),
        ([Refuel(LEFT, F("-50.04"))], [put("/fuel/at_engine_start/LEFT-MAIN", q("0", "US gal"))]),
        ([Refit(BASIS.configurations[1])], [put("/configuration", "freight")]),
    ],
)
def test_a_step_is_these_operations(steps: list[Step], operations: list[dict[str, Any]]) -> None:
    assert patch_of(steps, DOCUMENT, F(6), READY) == operations


def test_a_document_without_items_gets_its_first_line_of_ballast() -> None:
    (one,) = patch_of([Ballast(NOSE, F(5))], {"fuel": {}}, F(6), READY)
    assert one["path"] == "/items/-"
    assert patched({"items": []}, [one])["items"] == [one["value"]]


def test_operations_make_the_document_they_say_and_leave_the_first_as_it_was() -> None:
    before = repr(DOCUMENT)
    steps: list[Step] = [
        Reseat(RIDER, seat("ROW2-L", 155)),
        Shift(BAGS, NOSE, F(50)),
        Take(CRATE, F(60)),
        Refuel(ODD, F("-4.7")),
        Refit(BASIS.configurations[1]),
    ]
    changed = patched(DOCUMENT, patch_of(steps, DOCUMENT, F(6), READY))
    assert changed == {
        "configuration": "freight",
        "passengers": [{"seat": "ROW1-L"}, {"seat": "ROW2-L"}],
        "items": [
            {"place": "AFT-HOLD", "weight": q("70")},
            {"place": "AFT-HOLD", "weight": q("40.5", "kg")},
            {"place": "NOSE-HOLD", "weight": q("50")},
        ],
        "fuel": {
            "at_engine_start": {
                "LEFT-MAIN": q(50, "US gal"),
                "RIGHT-MAIN": q("190", "l"),
                "L/1~A": q("7.2", "kg"),
            }
        },
    }
    assert repr(DOCUMENT) == before


def test_a_copied_line_is_a_line_of_its_own() -> None:
    once = patched(DOCUMENT, [copied(0), put("/items/3/weight/value", 7)])
    assert once["items"][0]["weight"] == q(120)
    assert once["items"][3]["weight"] == q(7)


def test_an_element_of_a_list_may_be_replaced_itself() -> None:
    assert patched({"items": [1, 2, 3]}, [put("/items/1", 5)]) == {"items": [1, 5, 3]}
