"""What happens in flight between the page and the document: carried or refused, never lost; and the buttons
that add, move and take out an event.
"""

from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from fleet.basis import Basis
from loads.balance.declared import read_load
from loads.web.arranging import arranged
from loads.web.copied import can_carry, typed_of
from loads.web.desk import lay_desk
from loads.web.form import document_of, field_of
from records.refusal import Fault, Invalid
from tests.pure.loads.load_documents import DEPARTURE, SEATS, TANKS
from tests.pure.loads.making import load, twin
from tests.pure.loads.test_sequencing import GEAR, leaving, moving, q, transfer

HOOK = replace(twin().places[-1], id="HOOK", name="cargo hook", external=True)
TWIN = replace(
    twin(),
    positions=(GEAR,),
    places=(*twin().places, HOOK),
    configurations=tuple(replace(one, places=(*one.places, "HOOK")) for one in twin().configurations),
)
COMES = {"name": "V. Lindqvist", "seat": "COCKPIT-R", "at": "HOOK", "weight": q("170"), "how": "declared"}
CRATE = {"kind": "cargo", "what": "crate", "place": "HOOK", "weight": q("90"), "how": "weighed"}
BAGS = {"place": "AFT-HOLD", "what": "checked bags"}
BOX = CRATE | {"what": "box", "place": "AFT-HOLD", "net": {"weight": q("2", "kg")}, "jettisonable": False}
COMING = [COMES | {"position": "other crew", "category": "adult"}, CRATE | {"jettisonable": True}, BOX]
ALL = [
    {"after_burning": q("0"), "position": {"GEAR": "UP"}, "since": "take-off"},
    moving({"seat": "ROW1-L", "to": "AFT-HOLD"}, BAGS | {"to": "NOSE-HOLD"}),
    leaving({"seat": "ROW1-L"}, BAGS | {"weight": q("20", "kg")}, at="60"),
    transfer(TANKS[0], TANKS[1], "3.5", at="70"),
    {"after_burning": {"value": "12", "unit": "US gal"}, "come_aboard": COMING},
    {"after_burning": q("90"), "leave": [{"place": "HOOK", "what": "crate"}]},
    {"after_burning": q("90"), "position": {"GEAR": "DOWN"}},
]


def full(*events: Any) -> dict[str, Any]:
    document = load(sequence=[*events] if events else ALL)
    document["flight"]["departure"] = DEPARTURE
    return document


def again(typed: dict[str, str]) -> tuple[dict[str, Any], dict[str, str]]:
    return document_of(typed, departure=DEPARTURE, seats=SEATS, tanks=TANKS)


def laid(typed: dict[str, str], basis: Basis = TWIN) -> dict[str, Any]:
    return lay_desk(basis, basis.configurations[0], typed=typed, faults={}, zone="UTC")["events"]


def names(events: dict[str, Any]) -> set[str]:
    """This function will return the inputs the page shows of the events."""
    found = set()
    for event in events["events"]:
        rows = [event["when"], event.get("fields", []), *event.get("lines", [])]
        for comer in event.get("comers", []):
            rows += [comer["fields"], comer["more"]]
            found.add(comer["name"])
        found |= {field.name for row in rows for field in row} | {f"{event['name']}:kind"}
    return found


def test_every_kind_of_event_put_on_the_page_and_taken_off_it_is_the_same() -> None:
    document = full()
    read_load(document, TWIN)  # it is a load there can be

    carried = again(typed_of(document))[0]["sequence"]

    assert can_carry(document, seats=SEATS, tanks=TANKS)
    assert [sorted(event) for event in carried[1:4]] == [sorted(event) for event in ALL[1:4]]
    assert carried[1:4] == _as_text(ALL[1:4])
    assert carried[4]["come_aboard"][:2] == _as_text(ALL[4])["come_aboard"][:2]
    assert read_load(document, TWIN).sequence == read_load(full(*carried), TWIN).sequence


def test_whatever_is_put_on_the_page_stands_in_an_input_the_page_shows() -> None:
    typed = {name for name in typed_of(full()) if name.startswith("event:")}

    assert typed <= names(laid(typed_of(full())))


def test_what_a_basis_of_today_no_longer_has_stays_on_the_page_to_be_refused() -> None:
    typed = {name for name, value in typed_of(full()).items() if name.startswith("event:") and value}

    assert typed - names(laid(typed_of(full()), twin())) == set()


def test_a_plain_load_has_no_event_and_no_input_of_one() -> None:
    events = laid(typed_of(load()))

    assert "sequence" not in again(typed_of(load()))[0]
    assert (events["open"], events["count"], events["events"]) == (False, 0, [])
    assert [value for value, _ in laid({}, twin())["adds"]] == [
        "add leave", "add move", "add person", "add item", "add transfer",
    ]  # fmt: skip


def test_an_item_typed_anew_is_still_the_item_that_leaves() -> None:
    typed = typed_of(full(leaving({"place": "AFT-HOLD", "what": "checked bags"})))

    document, _ = again(typed | {"item:0:what": "mail", "item:0:place": "NOSE-HOLD"})

    assert document["sequence"][0]["leave"] == [{"place": "NOSE-HOLD", "what": "mail"}]


@pytest.mark.parametrize(
    ("pointer", "name"),
    [
        ("/sequence/1/after_burning/value", "event:1:after"),
        ("/sequence/1/move/1/to", "event:1:line:1:to"),
        ("/sequence/1/move/0/seat", "event:1:line:0:who"),
        ("/sequence/2/leave/1/weight/value", "event:2:line:1:weight"),
        ("/sequence/2/leave/1/what", "event:2:line:1:who"),
        ("/sequence/3/transfer/quantity", "event:3:quantity"),
        ("/sequence/3/transfer/from", "event:3:from"),
        ("/sequence/4/come_aboard/0/seat", "event:4:line:0:seat"),
        ("/sequence/4/come_aboard/0/weight", "event:4:line:0:weight"),
        ("/sequence/4/come_aboard/1/place", "event:4:line:1:place"),
        ("/sequence/0/position/GEAR", "event:0:part:GEAR"),
        ("/sequence/0/since", "event:0:since"),
        ("/sequence/5", "event:5:after"),
    ],
)
def test_a_fault_finds_its_input(pointer: str, name: str) -> None:
    assert field_of(pointer, again(typed_of(full()))[1]) == name


def faults_of(typed: dict[str, str]) -> dict[str, str]:
    """The inputs at which the reader's faults end up, with the code."""
    document, fields = again(typed)
    with pytest.raises(Invalid) as refused:
        read_load(document, TWIN)
    return {field_of(fault.pointer, fields): fault.code for fault in refused.value.faults}


@pytest.mark.parametrize(
    ("changes", "name", "code"),
    [
        ({"event:2:after": ""}, "event:2:after", "missing"),
        ({"event:2:after": "1e3"}, "event:2:after", "number-form"),
        ({"event:2:after": "5"}, "event:2:after", "out-of-order"),
        ({"event:1:line:0:who": ""}, "event:1:line:0:who", "one-of"),
        ({"event:1:line:0:who": "seat:ROW2-R"}, "event:1:line:0:who", "nobody-there"),
        ({"event:1:line:0:to": ""}, "event:1:line:0:to", "missing"),
        ({"event:2:line:1:weight": "900"}, "event:2:line:1:weight", "below-zero"),
        ({"event:5:line:0:who": ""}, "event:5:line:0:who", "empty"),
        ({"event:3:from": ""}, "event:3:from", "missing"),
        ({"event:3:quantity": ""}, "event:3:quantity", "missing"),
        ({"event:6:part:GEAR": ""}, "event:6:part:GEAR", "empty"),
        ({"event:4:line:0:name": ""}, "event:4:line:0:name", "empty"),
        ({"event:4:line:0:seat": "ROW1-R"}, "event:4:line:0:seat", "seat-taken"),
        ({"event:4:line:1:how": ""}, "event:4:line:1:how", "choice"),
        ({"event:4:kind": "vanish"}, "event:4:after", "one-of"),
    ],
)  # fmt: skip
def test_what_is_typed_in_half_is_refused_at_its_own_input(
    changes: dict[str, str], name: str, code: str
) -> None:
    assert faults_of(typed_of(full()) | changes)[name] == code


def test_an_event_added_and_left_empty_is_left_out() -> None:
    typed = arranged(typed_of(load()) | {"arrange": "add leave"})

    assert "sequence" not in again(typed)[0]
    assert names(laid(typed)) == {
        "event:0:kind", "event:0:after", "event:0:unit", "event:0:since",
        *(f"event:0:line:{row}:{part}" for row in (0, 1) for part in ("who", "weight", "unit")),
    }  # fmt: skip


def test_a_button_changes_the_events_and_nothing_else() -> None:
    typed = typed_of(full())
    others = {name: value for name, value in typed.items() if not name.startswith("event:")}

    for press in ("add move", "up 2", "drop 0", "more 1", "person 4", "nonsense", "drop 99", "add vanish"):
        after = arranged(typed | {"arrange": press})
        assert others.items() <= after.items()


def test_up_puts_an_event_one_place_earlier_and_drop_takes_it_out() -> None:
    typed = typed_of(full())

    up, _ = again(arranged(typed | {"arrange": "up 2"}))
    dropped, _ = again(arranged(typed | {"arrange": "drop 1"}))
    kept, _ = again(arranged(typed | {"arrange": "up 0"}))

    def kinds(document: dict[str, Any]) -> list[str]:
        return [next(iter(event.keys() - {"after_burning", "since"})) for event in document["sequence"]]

    assert kinds(up)[:3] == ["position", "leave", "move"]
    assert kinds(dropped)[:3] == ["position", "leave", "transfer"]
    assert kinds(kept) == kinds(full())


def test_a_line_added_is_where_the_page_begins() -> None:
    typed = arranged(typed_of(full()) | {"arrange": "item 4"})

    event = laid(typed)["events"][4]

    assert [comer["is"] for comer in event["comers"]] == ["person", "item", "item", "item"]
    assert [field.name for field in event["comers"][3]["fields"] if field.focus] == ["event:4:line:3:what"]
    more = laid(arranged(typed_of(full()) | {"arrange": "more 1"}))["events"][1]
    assert len(more["lines"]) == len(laid(typed_of(full()))["events"][1]["lines"]) + 3


def test_who_and_what_can_be_chosen_goes_by_name() -> None:
    offered = dict(laid(typed_of(full()))["events"][1]["lines"][0][0].choices)

    assert offered["seat:ROW1-L"].endswith(full()["passengers"][0]["name"])
    assert offered["item:0"] == "item 1: checked bags, aft hold"
    assert offered["words:HOOK:crate"] == "crate, cargo hook, comes aboard"
    assert offered["seat:COCKPIT-R"].endswith("V. Lindqvist")


inputs = st.sampled_from((*typed_of(full()), "event:9:kind", "event::", "event:0:line:x:who", "arrange"))
words = st.sampled_from(
    ("add leave", "up 1", "drop 0", "person 4", "leave", "position", "seat:", "item:", "words:", "9" * 5000)
) | st.text(max_size=9)


@settings(max_examples=80, deadline=None, derandomize=True)
@given(st.dictionaries(inputs, words, max_size=10))
def test_whatever_is_typed_and_pressed_becomes_a_document_that_is_read_or_refused(
    changes: dict[str, str],
) -> None:
    typed = arranged(typed_of(full()) | changes)
    laid(typed)

    faults: tuple[Fault, ...] = ()
    try:
        read = read_load(again(typed)[0], TWIN)
    except Invalid as refused:
        faults = refused.faults

    assert faults or len(read.sequence) == len(again(typed)[0].get("sequence", ()))


def _as_text(part: Any) -> Any:
    if isinstance(part, dict):
        return {name: _as_text(value) for name, value in part.items()}
    return [_as_text(one) for one in part] if isinstance(part, list) else part if part is True else str(part)
