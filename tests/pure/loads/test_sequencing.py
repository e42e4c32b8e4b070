"""Bad input of a sequence: which field is named, which code; and what may be left out.

Sources: common practice for what people mistype, and what cannot be: nobody leaves twice, nothing is burned
that is not aboard.
"""

from copy import deepcopy
from dataclasses import replace
from typing import Any

import pytest

from fleet.positions import MovingPart, PartState
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.over_flight import held_over_flight, over_flight
from loads.balance.shape import check_shape
from records.refusal import Invalid
from tests.pure.loads.making import SOURCE, F, load, twin, twin_empty


def q(value: Any, unit: str = "lb") -> dict[str, Any]:
    return {"value": value, "unit": unit}


GEAR = MovingPart(
    "GEAR",
    "landing gear",
    "DOWN",
    (
        PartState("DOWN", "down", F(0), ("ground", "flight"), SOURCE),
        PartState("UP", "up", F(-1500), ("flight",), SOURCE),
    ),
)
TWIN = replace(twin(), positions=(GEAR,))
E0, E1 = "/sequence/0", "/sequence/1"
OFF, BAGS = {"seat": "ROW1-L"}, {"place": "AFT-HOLD", "what": "checked bags"}


def leaving(*who: Any, at: Any = 60) -> dict[str, Any]:
    return {"after_burning": q(at), "leave": list(who)}


def moving(*who: Any, at: Any = 60) -> dict[str, Any]:
    return {"after_burning": q(at), "move": list(who)}


def transfer(source: str, target: str, volume: Any, at: Any = 60) -> dict[str, Any]:
    moved = {"from": source, "to": target, "quantity": q(volume, "US gal")}
    return {"after_burning": q(at), "transfer": moved}


def position(state: str, at: Any = 60, **more: Any) -> dict[str, Any]:
    return {"after_burning": q(at), "position": {"GEAR": state}, **more}


def refused(*events: Any, **changes: Any) -> set[tuple[str, str]]:
    with pytest.raises(Invalid) as error:
        read_load(load(sequence=list(events), **changes), TWIN)
    for fault in error.value.faults:
        assert len(fault.detail.split()) >= 4
    return {(fault.pointer, fault.code) for fault in error.value.faults}


TAXIING = {"since": "engine start"}
BEFORE = moving(BAGS | {"to": "NOSE-HOLD"}, at=0) | TAXIING
SOME = BAGS | {"weight": q(21)}
# The trip burns 420 lb of 756 lb usable at take-off, taxiing 24 lb; the auxiliary tanks burn first.
ROWS: list[tuple[list[Any], str, str]] = [
    ([leaving(OFF, at=421)], f"{E0}/after_burning", "event-after-landing"),
    ([leaving(OFF, at=757)], f"{E0}/after_burning", "burn-exceeds-fuel"),
    ([leaving(OFF), leaving(BAGS, at=59)], f"{E1}/after_burning", "out-of-order"),
    ([leaving(OFF), BEFORE], f"{E1}/since", "out-of-order"),
    ([position("DOWN", at=25, since="engine start")], f"{E0}/after_burning", "event-after-take-off"),
    ([{"after_burning": q(60)}], f"{E0}/leave", "one-of"),
    ([leaving(OFF) | {"move": [BAGS | {"to": "NOSE-HOLD"}]}], f"{E0}/move", "one-of"),
    ([leaving(OFF, at=0) | TAXIING], f"{E0}/leave", "leaves-before-take-off"),
    ([leaving()], f"{E0}/leave", "empty"),
    ([moving()], f"{E0}/move", "empty"),
    ([leaving(OFF) | {"why": "jump"}], f"{E0}/why", "unknown-field"),
    ([{"leave": [OFF]}], f"{E0}/after_burning", "missing"),
    ([leaving(OFF, at=-1)], f"{E0}/after_burning/value", "negative"),
    ([leaving(OFF) | {"since": "landing"}], f"{E0}/since", "choice"),
    # people
    ([leaving({"seat": "ROW9"})], f"{E0}/leave/0/seat", "unknown-seat"),
    ([leaving({"seat": "ROW2-R"})], f"{E0}/leave/0/seat", "nobody-there"),
    ([leaving({"seat": "COCKPIT-L"})], f"{E0}/leave/0/seat", "pilot-in-command-stays"),
    ([leaving(OFF, OFF)], f"{E0}/leave/1/seat", "already-left"),
    ([leaving(OFF), leaving(OFF)], f"{E1}/leave/0/seat", "already-left"),
    ([leaving(OFF), moving(OFF | {"to": "ROW2-L"})], f"{E1}/move/0/seat", "already-left"),
    ([leaving(OFF | {"weight": q(10)})], f"{E0}/leave/0/weight", "unknown-field"),
    ([leaving(OFF | BAGS)], f"{E0}/leave/0/seat", "one-of"),
    ([moving(OFF | {"to": "ROW9"})], f"{E0}/move/0/to", "unknown-place"),
    ([moving(OFF | {"to": "ROW1-R"})], f"{E0}/move/0/to", "seat-taken"),
    ([moving(OFF | {"to": "COCKPIT-L"})], f"{E0}/move/0/to", "seat-serves-others"),
    ([moving({"seat": "COCKPIT-L", "to": "COCKPIT-R"})], f"{E0}/move/0/seat", "pilot-in-command-stays"),
    ([moving(OFF | {"to": "ROW2-L"}, OFF | {"to": "ROW2-R"})], f"{E0}/move/1/to", "moves-twice"),
    # items
    ([leaving({"place": "AFT-HOLD"})], f"{E0}/leave/0/what", "missing"),
    ([leaving({"place": "HOOK", "what": "drum"})], f"{E0}/leave/0/place", "unknown-place"),
    ([leaving({"place": "NOSE-HOLD", "what": "checked bags"})], f"{E0}/leave/0/what", "no-such-item"),
    ([leaving(BAGS, BAGS)], f"{E0}/leave/1/what", "already-left"),
    ([leaving(BAGS | {"weight": q(121)})], f"{E0}/leave/0/weight", "below-zero"),
    ([leaving(BAGS | {"weight": q(20)}, BAGS | {"weight": q(20)})], f"{E0}/leave/1/what", "duplicate"),
    ([leaving(SOME | {"weight": q(100)}), leaving(SOME)], f"{E1}/leave/0/weight", "below-zero"),
    ([moving(BAGS | {"to": "ROW2-L"})], f"{E0}/move/0/to", "unknown-place"),
    # fuel: 15 US gal in each auxiliary tank, 10 of them burned by 60 lb
    ([transfer("TIP", "LEFT-MAIN", 1)], f"{E0}/transfer/from", "unknown-tank"),
    ([transfer("LEFT-AUX", "TIP", 1)], f"{E0}/transfer/to", "unknown-tank"),
    ([transfer("LEFT-AUX", "LEFT-AUX", 1)], f"{E0}/transfer/to", "transfer-to-itself"),
    ([transfer("LEFT-AUX", "LEFT-MAIN", "10.1")], f"{E0}/transfer/quantity", "transfer-exceeds-fuel"),
    ([transfer("RIGHT-MAIN", "LEFT-MAIN", "12.1")], f"{E0}/transfer/quantity", "transfer-over-capacity"),
    ([transfer("LEFT-AUX", "LEFT-MAIN", 0)], f"{E0}/transfer/quantity/value", "zero"),
    # gear and flaps
    ([{"after_burning": q(0), "position": {"FLAPS": "UP"}}], f"{E0}/position/FLAPS", "unknown-position"),
    ([position("HALF")], f"{E0}/position/GEAR", "choice"),
    ([{"after_burning": q(0), "position": {}}], f"{E0}/position", "empty"),
    ([position("UP", at=0, since="engine start")], f"{E0}/position/GEAR", "position-not-held"),
    ([position("UP")], f"{E0}/position/GEAR", "position-at-landing"),
]  # fmt: skip


@pytest.mark.parametrize(("events", "pointer", "code"), ROWS)
def test_what_cannot_be_is_refused_by_its_field(events: list[Any], pointer: str, code: str) -> None:
    assert (pointer, code) in refused(*events)


def test_crew_leaves_only_while_enough_of_it_stays() -> None:
    second = {"name": "J. Sorrel", "position": "jump master", "seat": "COCKPIT-R"}
    second |= {"weight": q(170), "how": "weighed"}
    document = load(persons_on_board=5, sequence=[leaving({"seat": "COCKPIT-R"})])
    document["crew"].append(second)
    assert read_load(document, TWIN).sequence[0].leaving

    strict = replace(TWIN, configurations=(replace(TWIN.configurations[0], minimum_crew=2),))
    with pytest.raises(Invalid) as error:
        read_load(document, strict)
    assert [(one.pointer, one.code) for one in error.value.faults] == [(f"{E0}/leave/0/seat", "too-few-crew")]


def test_all_who_move_in_one_event_move_at_once_so_two_may_change_seats() -> None:
    events = [moving({"seat": "ROW1-L", "to": "ROW1-R"}, {"seat": "ROW1-R", "to": "ROW1-L"})]
    declared = read_load(load(sequence=events), TWIN)
    before, after = over_flight(declared)
    assert [person.seat.id for person in before.passengers] == ["ROW1-L", "ROW1-R"]
    assert [person.seat.id for person in after.passengers] == ["ROW1-R", "ROW1-L"]


def test_a_seat_somebody_left_is_free_and_one_person_is_named_by_the_seat_of_the_load() -> None:
    events = [leaving({"seat": "ROW1-R"}), moving(OFF | {"to": "ROW1-R"}), moving(OFF | {"to": "ROW2-L"})]
    aboard = over_flight(read_load(load(sequence=events), TWIN))
    assert [[person.seat.id for person in each.passengers] for each in aboard] == [
        ["ROW1-L", "ROW1-R"],
        ["ROW1-L"],
        ["ROW1-R"],
        ["ROW2-L"],
    ]


def test_what_each_place_holds_is_told_for_every_state_of_the_flight() -> None:
    events = [moving(BAGS | {"to": "NOSE-HOLD"}), leaving(BAGS | {"weight": q(50)}), position("DOWN")]
    held = held_over_flight(read_load(load(sequence=events), TWIN))
    spots = [{spot: weight for spot, weight in each.items() if spot.endswith("HOLD")} for each in held]
    assert spots == [{"AFT-HOLD": 120}, {"NOSE-HOLD": 120}, {"NOSE-HOLD": 70}]


def test_without_a_basis_the_shape_of_a_sequence_is_still_looked_at() -> None:
    check_shape(load(sequence=[leaving(OFF), transfer("A", "B", 5)]))
    with pytest.raises(Invalid) as error:
        check_shape(load(sequence=[{"after_burning": q(1, "in")}]))
    assert {one.pointer for one in error.value.faults} == {f"{E0}/after_burning/unit", f"{E0}/leave"}


JUNK: tuple[Any, ...] = (
    None, True, 0, -1, 10**16, "", " ", "x", "ROW1-R", "1e3", "NaN", [], [None], {}, {"value": 1}, {"a": {}},
)  # fmt: skip


def places_in(node: Any, path: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    """The path of every node of a document."""
    inner = node.items() if isinstance(node, dict) else enumerate(node) if isinstance(node, list) else ()
    return [path, *(each for key, value in inner for each in places_in(value, (*path, key)))]


def spoiled(document: Any, path: tuple[Any, ...], junk: Any) -> Any:
    """A copy with another value at a path."""
    copied = deepcopy(document)
    inner = copied
    for key in path[:-1]:
        inner = inner[key]
    inner[path[-1]] = junk
    return copied


def test_whatever_is_written_in_a_sequence_is_refused_by_a_field_or_assessed() -> None:
    events = [
        moving(OFF | {"to": "ROW2-L"}) | TAXIING | {"after_burning": q(12)},
        leaving(OFF, SOME, at=30),
        transfer("LEFT-AUX", "LEFT-MAIN", 2),
        position("UP", at=90),
        position("DOWN", at=100),
    ]
    sound = load(sequence=events)
    named: list[str] = []
    for path in places_in(sound["sequence"])[1:]:
        for junk in JUNK:
            document = spoiled(sound, ("sequence", *path), junk)
            try:
                declared = read_load(document, TWIN)
            except Invalid as error:
                named += [fault.pointer for fault in error.faults]
            else:
                assert assess(declared, TWIN, twin_empty(), advised=False).verdict
    assert len(named) > 500
    assert all(pointer.startswith("/sequence/") for pointer in named)
