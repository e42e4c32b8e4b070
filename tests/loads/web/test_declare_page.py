"""Declaring a load on the page: the aircraft and departure, then the table; computed, then submitted."""

import json

import pytest

from loads.models import Assessment, Declaration, Load
from loads.queries.current import declared_in
from records.models import Act
from tests.cast import browser
from tests.loads.making import load_document, outside_document
from tests.makers import make_aircraft, make_basis
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
CHOSEN = {"aircraft": "Q9-KTB", "date": "2026-12-01", "time": "07:30"}
FITTED = CHOSEN | {"configuration": "four-seat"}

FIGURES = {
    "reference": "KT-214", "origin": "XNAL", "destination": "XKOR", "operation": "passenger-charter",
    "persons_on_board": "3",
    "seat:COCKPIT-L:name": "R. Amani", "seat:COCKPIT-L:position": "pilot in command",
    "seat:COCKPIT-L:weight": "181", "seat:COCKPIT-L:how": "weighed",
    "seat:ROW1-L:name": "L. Osei", "seat:ROW1-L:weight": "176", "seat:ROW1-L:how": "declared",
    "seat:ROW1-R:name": "M. Dravo", "seat:ROW1-R:weight": "190", "seat:ROW1-R:how": "declared",
    "item:0:kind": "baggage", "item:0:what": "checked bags", "item:0:place": "AFT-HOLD",
    "item:0:weight": "120", "item:0:how": "weighed",
    "density": "6.7", "density:source": "delivery note 4471",
    "tank:LEFT:quantity": "100", "tank:RIGHT:quantity": "100",
    "taxi": "40", "trip": "640", "minimum_at_landing": "420",
    "limit:0:weight": "8750", "limit:0:source": "performance sheet 12",
}  # fmt: skip


def desk(client):
    """The table of inputs, come to as a person does: aircraft and departure, then what is fitted."""
    first = Page(client.get("/declare", CHOSEN))
    return Page(client.get("/declare", first.form("").filled({"configuration": "four-seat"})))


def send(people, press, /, who="preparer", **changes):
    client = browser(getattr(people, who))
    figures = FIGURES | {"seat:COCKPIT-L:person": people.pilot.login}
    form = desk(client).form("")
    return client.post("/declare", form.filled(figures | changes, press=press))


def stored():
    return tuple(model.objects.count() for model in (Load, Declaration, Assessment, Act))


def test_first_the_aircraft_and_the_departure_are_asked_for_then_what_is_fitted(people) -> None:
    client = browser(people.preparer)

    empty = Page(client.get("/declare"))
    chosen = Page(client.get("/declare", CHOSEN))

    assert empty.form("").values == {"aircraft": "", "date": "", "time": ""}
    assert chosen.form("").values == CHOSEN | {"configuration": ""}
    assert desk(client).h1 == "Q9-KTB"


def test_the_table_holds_no_figure_and_its_units_are_those_of_the_manual(people) -> None:
    values = desk(browser(people.preparer)).form("").values
    filled = {name: value for name, value in values.items() if value}

    assert {value for name, value in filled.items() if name.endswith(":unit")} == {
        "lb",
        "US gal",
        "lb/US gal",
    }
    kept = {name for name in filled if not name.endswith((":unit", ":at"))}
    assert kept == {"csrfmiddlewaretoken", "aircraft", "configuration", "date", "time"}


def test_computing_shows_the_verdict_and_stores_nothing(people) -> None:
    before = stored()

    page = Page(send(people, "compute"))

    assert page.status == 200
    assert "Computed, nothing stored" in page.words
    assert "within" in page.words.lower()
    assert page.form("").values["seat:ROW1-R:weight"] == "190"
    assert stored() == before


def test_computing_an_outside_load_says_what_is_in_the_way(people) -> None:
    heavy = {
        "seat:ROW2-L:name": "T. Orr", "seat:ROW2-L:weight": "299", "seat:ROW2-L:how": "declared",
        "seat:ROW2-R:name": "U. Pell", "seat:ROW2-R:weight": "299", "seat:ROW2-R:how": "declared",
        "persons_on_board": "5", "item:0:weight": "250",
    }  # fmt: skip
    page = Page(send(people, "compute", **heavy))

    assert page.status == 200
    assert "outside" in page.words.lower()
    assert "row 2 and aft hold together" in page.words.lower()


def test_submitting_stores_one_load_as_it_was_typed(people) -> None:
    loads, declarations, assessments, acts = stored()

    answer = send(people, "submit")

    load = Load.objects.latest("submitted_at")
    assert (answer.status_code, answer["Location"]) == (302, f"/loads/{load.id}")
    assert stored() == (loads + 1, declarations + 1, assessments + 1, acts + 1)
    expected = json.loads(json.dumps(load_document(people)))
    expected["flight"]["departure"] = "2026-12-01T07:30:00-07:00"
    assert declared_in(load) == expected
    assert load.pilot == people.pilot


def test_an_outside_load_is_stored_as_a_reject(people) -> None:
    document = outside_document(people)
    seats = {"seat:ROW1-L", "seat:ROW1-R"}
    emptied = {f"{seat}:{part}": "" for seat in seats for part in ("name", "weight", "how")}
    heavy = {
        f"seat:{one['seat']}:{part}": value
        for one in document["passengers"]
        for part, value in (("name", one["name"]), ("weight", "299"), ("how", "declared"))
    }

    answer = send(people, "submit", **emptied, **heavy, **{"item:0:weight": "250"})

    assert answer.status_code == 302
    assert Assessment.objects.latest("assessed_at").verdict == "outside"


@pytest.mark.parametrize("press", ["compute", "submit"])
@pytest.mark.parametrize(
    ("name", "typed"),
    [
        ("seat:ROW1-L:weight", ""),
        ("seat:ROW1-L:weight", "1e3"),
        ("seat:ROW1-L:weight", "1760"),
        ("seat:ROW1-L:how", ""),
        ("seat:ROW1-R:name", "L. Osei"),
        ("seat:COCKPIT-L:person", "nobody.here"),
        ("persons_on_board", "4"),
        ("persons_on_board", ""),
        ("item:0:place", ""),
        ("item:0:kind", ""),
        ("tank:LEFT:quantity", ""),
        ("tank:LEFT:quantity", "121"),
        ("density", "67"),
        ("density:source", ""),
        ("trip", "6400"),
        ("limit:0:source", ""),
        ("reference", ""),
        ("operation", ""),
        ("leg", "0"),
        ("date", ""),
        ("time", ""),
        ("time", "25:99"),
    ],
)
def test_a_fault_stands_next_to_its_input_and_everything_typed_is_still_there(
    people, press, name, typed
) -> None:
    before = stored()

    page = Page(send(people, press, **{name: typed}))

    assert page.status == 422
    assert set(page.faults) == {name}
    assert page.form("").values["seat:ROW1-R:weight"] == "190"
    assert page.form("").values[name] == typed
    assert f"#{name}" in page.links.values()
    assert stored() == before


def test_several_faults_are_all_shown_at_once_and_listed_on_top(people) -> None:
    page = Page(send(people, "submit", **{"trip": "NaN", "item:0:weight": "-3", "seat:ROW1-L:weight": ""}))

    assert set(page.faults) == {"trip", "item:0:weight", "seat:ROW1-L:weight"}
    assert {page.links[words] for words in page.faults.values()} == {f"#{name}" for name in page.faults}


@pytest.mark.parametrize("who", ["auditor", "maintenance", "approver"])
def test_who_may_not_submit_is_refused_and_nothing_is_stored(people, who) -> None:
    before = stored()

    page = Page(send(people, "submit", who))

    assert page.status == 403
    assert page.form("").values["seat:ROW1-R:weight"] == "190"
    assert stored() == before


def test_pressing_twice_is_two_loads_only_if_two_forms_were_sent(people) -> None:
    send(people, "submit")
    send(people, "submit")

    assert Load.objects.filter(reference="KT-214").count() == 2


def test_an_aircraft_without_a_basis_in_force_then_leads_to_the_next_step(people) -> None:
    make_aircraft(people, "Q9-NEW")

    page = Page(browser(people.preparer).get("/declare", CHOSEN | {"aircraft": "Q9-NEW"}))

    assert "No loading basis is in force for Q9-NEW at that time." in page.words
    assert "Have one entered and approved" in page.words


def test_an_aircraft_without_an_empty_weight_is_unresolved_and_can_be_submitted(people) -> None:
    make_basis(people, make_aircraft(people, "Q9-KTC"))
    client = browser(people.preparer)
    form = Page(client.get("/declare", FITTED | {"aircraft": "Q9-KTC"})).form("")

    computed = Page(client.post("/declare", form.filled(FIGURES, press="compute")))
    submitted = client.post("/declare", form.filled(FIGURES, press="submit"))

    assert "unresolved" in computed.words.lower()
    assert submitted.status_code == 302
    assert Assessment.objects.latest("assessed_at").verdict == "unresolved"


def test_another_operators_aircraft_is_as_one_that_does_not_exist(people) -> None:
    page = Page(browser(people.preparer).get("/declare", FITTED | {"aircraft": "Q9-ELSE"}))

    assert page.status == 200
    assert page.h1 == "Declare a load"
