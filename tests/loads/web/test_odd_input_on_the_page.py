"""Odd input on the page that declares a load: it stands marked at its own input, with everything else that
was typed, and nothing is stored.
"""

import pytest

from loads.models import Load
from tests.cast import browser
from tests.loads.web.test_declare_page import FIGURES, desk, send, stored
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
WEIGHT = "seat:ROW1-L:weight"
# the thing, the input it is typed in, what is typed
ODD = [
    ("NaN", WEIGHT, "NaN"),
    ("infinity", WEIGHT, "Infinity"),
    ("negative infinity", WEIGHT, "-Infinity"),
    ("negative", WEIGHT, "-176"),
    ("1e3", WEIGHT, "1e3"),
    ("a blank inside a figure", WEIGHT, "17 6"),
    ("a decimal comma", WEIGHT, "176,5"),
    ("digits of another script", WEIGHT, "\u0661\u0667\u0666"),
    ("a person in two seats", "seat:ROW1-R:name", "L. Osei"),
    ("a person in two seats, written otherwise", "seat:ROW1-R:name", "l.  OSEI"),
    ("more fuel than the tank", "tank:LEFT:quantity", "121"),
    ("negative fuel", "tank:LEFT:quantity", "-1"),
    ("a burn greater than the fuel", "trip", "1301"),
    ("taxiing on more than the fuel", "taxi", "1341"),
    ("a place that is none", "item:0:place", "ATTIC"),
]


@pytest.mark.parametrize(("name", "typed"), [each[1:] for each in ODD], ids=[each[0] for each in ODD])
@pytest.mark.parametrize("press", ["compute", "submit"])
def test_it_is_marked_at_its_input_and_nothing_is_stored(people, press, name, typed) -> None:
    before = stored()

    page = Page(send(people, press, **{name: typed}))

    assert page.status == 422
    assert set(page.faults) == {name}
    assert len(page.faults[name].split()) >= 4
    assert page.form("").values[name] == typed
    assert page.form("").values["density"] == FIGURES["density"]
    assert stored() == before


@pytest.mark.parametrize("seat", ["ROW9-L", "AFT-HOLD"])
def test_a_seat_that_is_not_in_this_configuration_is_marked_and_what_was_typed_is_kept(people, seat) -> None:
    client = browser(people.preparer)
    filled = desk(client).form("").filled(FIGURES, press="submit")
    seated = {f"seat:{seat}:name": "T. Orr", f"seat:{seat}:weight": "170", f"seat:{seat}:how": "declared"}
    before = stored()

    page = Page(client.post("/declare", filled | seated | {"persons_on_board": "4"}))

    assert page.status == 422
    assert any(name.startswith(f"seat:{seat}:") for name in page.faults), page.faults
    assert page.form("").values[f"seat:{seat}:name"] == "T. Orr"
    assert stored() == before


def test_blanks_round_what_is_typed_are_taken_off_and_change_nothing(people) -> None:
    answer = send(people, "submit", **{WEIGHT: " 176 ", "reference": "KT-214 "})

    assert answer.status_code == 302
    load = Load.objects.latest("submitted_at")
    assert load.reference == "KT-214"


AFTER = {"event:0:after": "60", "event:0:unit": "lb"}
LEAVES = AFTER | {"event:0:kind": "leave"}
MOVES = AFTER | {"event:0:kind": "move", "event:0:line:0:who": "seat:ROW1-L"}
COMES = AFTER | {
    "event:0:kind": "come_aboard", "event:0:line:0:is": "person", "event:0:line:0:name": "T. Ash",
    "event:0:line:0:weight": "170", "event:0:line:0:unit": "lb", "event:0:line:0:how": "declared",
}  # fmt: skip
TRANSFER = AFTER | {"event:0:kind": "transfer", "event:0:quantity": "1", "event:0:quantity_unit": "US gal"}
# the thing, what is typed of one event, the input it is marked at
EVENTS = [
    (
        "a sequence that burns more than is on board",
        LEAVES | {"event:0:after": "1301", "event:0:line:0:who": "seat:ROW1-L"},
        "event:0:after",
    ),
    ("an event at an unknown seat", LEAVES | {"event:0:line:0:who": "seat:ROW9-L"}, "event:0:line:0:who"),
    ("an event at a seat nobody has", LEAVES | {"event:0:line:0:who": "seat:ROW2-L"}, "event:0:line:0:who"),
    (
        "an event at an unknown place",
        LEAVES | {"event:0:line:0:who": "words:HOOK:drum"},
        "event:0:line:0:who",
    ),
    ("a move to an unknown seat or place", MOVES | {"event:0:line:0:to": "DOOR"}, "event:0:line:0:to"),
    (
        "somebody who comes to an unknown seat",
        COMES | {"event:0:line:0:seat": "ROW9-L"},
        "event:0:line:0:seat",
    ),
    (
        "a transfer from an unknown tank",
        TRANSFER | {"event:0:from": "TIP", "event:0:to": "LEFT"},
        "event:0:from",
    ),
    ("a transfer to an unknown tank", TRANSFER | {"event:0:from": "LEFT", "event:0:to": "TIP"}, "event:0:to"),
]


@pytest.mark.parametrize(("typed", "marked"), [each[1:] for each in EVENTS], ids=[each[0] for each in EVENTS])
def test_what_cannot_happen_in_flight_is_marked_at_its_input(people, typed, marked) -> None:
    client = browser(people.preparer)
    filled = desk(client).form("").filled(FIGURES | {"seat:COCKPIT-L:person": people.pilot.login})
    before = stored()

    page = Page(client.post("/declare", filled | typed | {"do": "submit"}))

    assert page.status == 422
    assert set(page.faults) == {marked}
    assert len(page.faults[marked].split()) >= 4
    assert page.form("").values[marked] == typed[marked]
    assert stored() == before
