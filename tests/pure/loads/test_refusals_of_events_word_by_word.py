"""Every refusal of events on a flight in full: which fields are named, in which order, and what is said.

What each sentence says was read against what the user must do next; `agreed_texts/` has them. The aircraft is
the invented twin with a landing gear, or the one of `round_figures`.
"""

from dataclasses import replace
from typing import Any

import pytest

from fleet.basis import Basis
from loads.balance.declared import read_load
from loads.balance.shape import check_shape
from records.refusal import Invalid
from tests.pure.loads.agreed import agreed, faults_told
from tests.pure.loads.cases.test_hoist import CRATE, FOUND
from tests.pure.loads.cases.test_loads_that_leave_or_move import event
from tests.pure.loads.making import load
from tests.pure.loads.round_figures import q, round_basis, round_load
from tests.pure.loads.test_sequencing import (
    BAGS,
    OFF,
    ROWS,
    TWIN,
    leaving,
    moving,
    position,
    transfer,
)

AGREED = agreed("refusals_of_events")
HERE = {"place": "HOLD", "what": "crate"}
WITHOUT = replace(round_basis().configurations[0], seats=("P", "S1", "S2", "S3"), places=("DOOR", "HOOK"))
BLOCKED = replace(
    round_basis(),
    configurations=(WITHOUT,),
    closed=(("S4", "DD-14, seat torn"), ("HOLD", "DD-15, lining loose")),
)
TWO_PILOTS = replace(
    round_basis(), configurations=(replace(round_basis().configurations[0], minimum_crew=2),)
)
NO_PLACES = replace(round_basis(), configurations=(replace(round_basis().configurations[0], places=()),))
# what happens, jumpers from the start, the basis
CAME: list[tuple[str, int, Basis, list[dict[str, Any]]]] = [
    ("named before they come", 0, round_basis(), [
        event(10, leave=[{"seat": "S2"}, HERE] ),
        event(20, come_aboard=[FOUND, CRATE]),
    ]),
    ("somebody moves before they come", 0, round_basis(), [
        event(10, move=[{"seat": "S2", "to": "DOOR"}]),
        event(20, come_aboard=[FOUND]),
    ]),
    ("no seat, no name, the same name twice", 1, round_basis(), [
        event(10, come_aboard=[FOUND | {"seat": "S9"}]),
        event(20, come_aboard=[FOUND, FOUND | {"name": " t.  brisk".strip(), "seat": "S3"}]),
        event(30, come_aboard=[FOUND | {"name": "n. s1", "seat": "S4"}]),
    ]),
    ("an infant's name counts, too", 0, round_basis(), [
        event(10, come_aboard=[FOUND | {
            "lap_infant": {"name": "B. Brisk", "weight": q(18), "how": "weighed"}}]),
        event(20, come_aboard=[FOUND | {"name": "B. Brisk", "seat": "S3"}]),
    ]),
    ("a seat whose person is aboard", 1, round_basis(), [
        event(10, come_aboard=[FOUND | {"seat": "S1"}]),
    ]),
    ("a seat another moved to", 1, round_basis(), [
        event(10, move=[{"seat": "S1", "to": "S2"}]),
        event(20, come_aboard=[FOUND]),
    ]),
    ("the same words in the same place", 0, round_basis(), [
        event(10, come_aboard=[CRATE, CRATE]),
        event(20, come_aboard=[CRATE | {"what": "chest"}]),
    ]),
    ("something unknown there", 0, round_basis(), [
        event(10, come_aboard=[CRATE | {"place": "LOFT"}]),
        event(20, come_aboard=[FOUND | {"place": "HOLD"}]),
        event(30, come_aboard=[FOUND | {"at": "LOFT"}]),
        event(40, come_aboard=[]),
    ]),
    ("no places at all", 0, NO_PLACES, [
        event(10, come_aboard=[FOUND | {"at": "DOOR"}]),
        event(20, come_aboard=[CRATE]),
        event(30, leave=[HERE]),
    ]),
    ("closed places and blocked seats", 0, BLOCKED, [
        event(10, come_aboard=[FOUND | {"seat": "S4"}]),
        event(20, come_aboard=[FOUND | {"at": "HOLD"}]),
        event(30, come_aboard=[CRATE]),
    ]),
    ("a second pilot in command, and crew with an infant", 0, round_basis(), [
        event(10, come_aboard=[FOUND | {"position": "pilot in command"}]),
        event(20, come_aboard=[FOUND | {"name": "M. Ash", "seat": "S3", "position": "medic",
                                        "restraint": q(5), "lap_infant": {"name": "B. Ash"}}]),
    ]),
    ("before take-off", 0, round_basis(), [event(0, since="engine start", come_aboard=[FOUND])]),
    ("what lies on a pallet leaves with it", 0, round_basis(), [
        event(10, come_aboard=[CRATE | {"pallet": {"weight": q(20)}}]),
        event(20, leave=[HERE | {"weight": q(10)}]),
    ]),
    ("how heavy it is was not declared", 0, round_basis(), [
        event(10, come_aboard=[{"kind": "cargo", "what": "crate", "place": "HOLD", "how": "standard"}]),
        event(20, leave=[HERE | {"weight": q(10)}]),
    ]),
    ("several of the same words", 0, round_basis(), [event(20, leave=[{"place": "DOOR", "what": "chute"}])]),
    ("somebody gone, and something gone, again", 2, round_basis(), [
        event(10, leave=[{"seat": "S1"}, {"place": "HOLD", "what": "bag"}]),
        event(20, leave=[{"seat": "S1"}]),
        event(30, move=[{"place": "HOLD", "what": "bag", "to": "DOOR"}]),
        event(40, move=[{"seat": "S1", "to": "DOOR"}]),
    ]),
    ("too few of the crew", 0, TWO_PILOTS, [
        event(10, come_aboard=[FOUND | {"position": "medic"}]),
        event(20, leave=[{"seat": "S2"}]),
    ]),
    ("a place for a person who is not named", 0, round_basis(), [
        event(10, move=[{"seat": "S9", "to": "LOFT"}]),
        event(20, move=[{"place": "HOLD", "what": "bag", "to": "S1"}]),
        event(30, move=[{"place": "HOLD", "what": "bag"}]),
        event(40, move=[{"to": "DOOR"}]),
    ]),
]  # fmt: skip
MORE: list[tuple[str, list[Any]]] = [
    ("several things in one event", [leaving(OFF) | position("DOWN") | transfer("LEFT-AUX", "TIP", 1)]),
    ("a transfer without its quantity", [{"after_burning": q(0), "transfer": {"from": "TIP", "to": 7}}]),
    ("more than is there, in pounds", [transfer("LEFT-AUX", "LEFT-MAIN", "10.0001")]),
    ("an item without its words", [moving({"place": "AFT-HOLD", "to": "NOSE-HOLD"})]),
    ("words without a place", [leaving({"what": "checked bags"})]),
    ("a person with a weight and words", [leaving(OFF | {"what": "L. Osei", "weight": q(10)})]),
    ("a third of it twice", [leaving(BAGS | {"weight": q(80)}), leaving(BAGS | {"weight": q(41)})]),
    ("no list", [{"after_burning": q(0), "leave": OFF}]),
    ("more lines than are read", [leaving(*[OFF] * 201)]),
    ("in kilograms, behind the landing", [leaving(OFF, at=0) | {"after_burning": q(191, "kg")}]),
    ("by volume, behind the landing", [leaving(OFF, at=0) | {"after_burning": q("70.1", "US gal")}]),
    ("taxiing, behind the take-off", [
        position("DOWN", at=0) | {"after_burning": q("4.1", "US gal"), "since": "engine start"}]),
    ("taxiing, more than is there", [
        position("DOWN", at=781) | {"since": "engine start"}]),
]  # fmt: skip


def told(document: dict[str, Any], basis: Basis) -> list[str]:
    with pytest.raises(Invalid) as refused:
        read_load(document, basis)
    return faults_told(refused.value.faults)


def asked() -> dict[str, tuple[dict[str, Any], Basis]]:
    """Every document by its title."""
    found = {
        f"{number}. {pointer} {code}": (load(sequence=events), TWIN)
        for number, (events, pointer, code) in enumerate(ROWS, 1)
    }
    found |= {title: (load(sequence=events), TWIN) for title, events in MORE}
    items = [("bag", "HOLD", 30), ("chest", "HOLD", 30), ("chute", "DOOR", 20), ("chute", "DOOR", 20)]
    for title, jumpers, basis, events in CAME:
        has = [] if basis in (BLOCKED, NO_PLACES) else items
        found[title] = (round_load(jumpers, items=has, sequence=events), basis)
    return found


ASKED = asked()


@pytest.mark.parametrize("title", ASKED)
def test_what_is_said_of_events_that_cannot_be(title: str) -> None:
    assert told(*ASKED[title]) == AGREED[title]


def test_every_agreed_refusal_of_events_is_asked_for() -> None:
    assert list(AGREED) == list(ASKED)


def test_without_a_basis_the_form_of_events_is_refused_in_the_same_words() -> None:
    run = [
        {"after_burning": q(1, "in"), "since": "landing", "leave": [OFF] * 201},
        {"after_burning": q(-1), "move": [{"deck": 1}]},
        {"after_burning": q(0), "transfer": {"from": "TIP", "quantity": q(0)}},
        {"after_burning": q(0)},
    ]
    with pytest.raises(Invalid) as refused:
        check_shape(load(sequence=run))

    assert faults_told(refused.value.faults) == [
        "/sequence/0/after_burning/unit unit-dimension: in is no unit of weight or volume; "
        "use one of kg, lb, l, US gal, imp gal",
        "/sequence/0/since choice: not one of the words used here; write engine start or take-off",
        "/sequence/0/leave too-many: 201 lines; at most 200 are read, so put lines together",
        "/sequence/1/after_burning/value negative: below zero; write a positive figure",
        "/sequence/1/move/0/deck unknown-field: no such field here; "
        "the fields are seat, place, what, weight, to",
        "/sequence/2/transfer/to missing: this field is needed and nothing is assumed; state it",
        "/sequence/2/transfer/quantity/value zero: zero makes no sense here; write the true figure, or leave "
        "the line out",
        "/sequence/3/leave one-of: an event is exactly one of leave, move, transfer, position, come_aboard; "
        "write one event for each",
    ]
