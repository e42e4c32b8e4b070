"""What happens in flight on the pages: told on the load's own, declared and revised on the desk, lost
nowhere; and which leg a load follows.
"""

import pytest

from loads.actions.submit_load import submit_load
from loads.models import Assessment, Load
from loads.queries.current import declared_in
from records.models import Act
from tests.cast import actor, browser
from tests.loads.making import load_document, outside_document, submitted
from tests.makers import q
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db

JUMP = [
    {"after_burning": q("100", "lb"), "move": [{"seat": "ROW1-L", "to": "AFT-HOLD"}]},
    {"after_burning": q("100", "lb"), "leave": [{"seat": "ROW1-L"}]},
]


def test_the_computation_has_a_line_for_every_event_with_the_name_beside_it(people) -> None:
    load = submit_load(load_document(people, sequence=JUMP), by=actor(people.preparer)).load

    answer = browser(people.pilot).get(f"/loads/{load.id}")
    page = Page(answer)

    assert page.status == 200
    assert "event 2, leaves: aft hold, passenger" in page.words
    # in the seat, on the way to the door, and gone
    assert page.words.count("L. Osei") >= len(("seat", "door", "gone"))
    assert "2 events on the flight: landing is as after all of them, zero fuel as before any" in page.words
    assert 'stroke-dasharray="1.5 1.5"' in answer.content.decode()


def test_who_comes_aboard_is_on_the_page_by_name_and_the_greatest_number_is_told(people) -> None:
    comes = {"name": "V. Lindqvist", "seat": "ROW2-L", "weight": q("170", "lb"), "how": "declared"}
    hoisted = [{"after_burning": q("100", "lb"), "come_aboard": [comes]}]
    document = load_document(people, sequence=hoisted)
    load = submit_load(document, by=actor(people.preparer)).load

    page = Page(browser(people.pilot).get(f"/loads/{load.id}"))

    assert page.status == 200
    assert "event 1, comes aboard:" in page.words
    assert "V. Lindqvist" in page.words
    assert f"at most {document['persons_on_board'] + 1} in flight" in page.words
    assert "Greatest number of persons in flight" in page.words


def test_a_leg_before_is_told_on_both_loads_and_a_revision_keeps_it(people) -> None:
    first = submitted(people)
    back = load_document(people)
    back["flight"] |= {"departure": "2026-12-01T11:00:00-06:00", "origin": "XKOR", "destination": "XNAL"}
    linked = submit_load(
        back | {"flight": back["flight"] | {"leg": 2, "follows": str(first.load.id)}},
        by=actor(people.preparer),
    )

    fresh = revised(people, linked)

    page = Page(browser(people.pilot).get(f"/loads/{fresh.id}"))
    assert "Follows KT-214 leg 1, XNAL to XKOR" in page.words
    assert "planned uplift 680 lb" in page.words
    other = Page(browser(people.pilot).get(f"/loads/{first.load.id}"))
    assert "Followed by KT-214 leg 2, XKOR to XNAL" in other.words


def test_the_next_leg_is_declared_from_the_page_of_the_one_before(people) -> None:
    first = submitted(people)
    client = browser(people.preparer)
    way = Page(client.get(f"/loads/{first.load.id}")).links["Declare the next leg"]
    chosen = Page(client.get(way)).form("").filled({"date": "2026-12-01", "time": "10:00"})
    fitted = Page(client.get("/declare", chosen)).form("").filled({"configuration": "four-seat"})

    values = Page(client.get("/declare", fitted)).form("").values

    assert (values["follows"], values["leg"], values["origin"]) == (str(first.load.id), "2", "XKOR")
    assert (values["reference"], values["aircraft"], values["destination"]) == ("KT-214", "Q9-KTB", "")
    assert "Declare the next leg" not in Page(browser(people.auditor).get(f"/loads/{first.load.id}")).links


def test_a_load_that_cannot_depart_leads_to_no_next_leg(people) -> None:
    current = submit_load(outside_document(people), by=actor(people.preparer))

    links = Page(browser(people.preparer).get(f"/loads/{current.load.id}")).links

    assert "Revise" in links
    assert "Declare the next leg" not in links


def revised(people, current, **changes):
    """This function will revise a load on the page as it stands, with inputs changed, and return the new
    one.
    """
    client = browser(people.preparer)
    form = Page(client.get(f"/loads/{current.load.id}/revise")).form("")
    confirmed = {"checked": "yes", "reason": "another door"} | changes
    answer = client.post(f"/loads/{current.load.id}/revise", form.filled(confirmed, press="submit"))
    assert answer.status_code == 302, Page(answer).alerts
    return Load.objects.get(replaces=current.load)


INFANT = {"name": "I. Lind", "weight": q("8", "kg"), "how": "weighed"}
COMES = {
    "name": "V. Lindqvist",
    "seat": "ROW2-L",
    "weight": q("170", "lb"),
    "how": "declared",
    "category": "adult",
    "lap_infant": INFANT,
}
CRATE = {
    "kind": "cargo",
    "what": "crate",
    "place": "AFT-HOLD",
    "weight": q("12.5", "kg"),
    "how": "weighed",
}
BAGS = {"place": "AFT-HOLD", "what": "checked bags", "weight": q("20", "lb")}
TRANSFER = {"from": "LEFT", "to": "RIGHT", "quantity": q("2", "US gal")}
EVENTS = [
    *JUMP,
    {"after_burning": q("20", "US gal"), "come_aboard": [COMES, CRATE]},
    {"after_burning": q("140", "lb"), "leave": [BAGS]},
    {"after_burning": q("150", "lb"), "transfer": TRANSFER},
]


def test_a_load_with_every_kind_of_event_is_revised_on_the_page_and_loses_nothing(people) -> None:
    current = submit_load(load_document(people, sequence=EVENTS), by=actor(people.preparer))
    itself = Page(browser(people.preparer).get(f"/loads/{current.load.id}"))
    assert itself.links["Revise"] == f"/loads/{current.load.id}/revise"

    fresh = revised(people, current)

    again, before = declared_in(fresh), declared_in(current.load)
    again["flight"]["departure"] = before["flight"]["departure"]  # the same instant in the operator's zone
    assert again == before
    verdicts = [Assessment.objects.get(load=load).verdict for load in (current.load, fresh)]
    assert verdicts[0] == verdicts[1]


def test_an_event_is_changed_on_the_page_and_nothing_else_is(people) -> None:
    current = submit_load(load_document(people, sequence=EVENTS), by=actor(people.preparer))

    fresh = revised(people, current, **{"event:3:line:0:weight": "30"})

    again, before = declared_in(fresh)["sequence"], declared_in(current.load)["sequence"]
    assert again[3]["leave"][0]["weight"] == q("30", "lb")
    assert again[:3] + again[4:] == before[:3] + before[4:]


CHOSEN = {"aircraft": "Q9-KTB", "date": "2026-12-01", "time": "07:30", "configuration": "four-seat"}


def test_a_simple_load_has_one_closed_part_without_an_input(people) -> None:
    answer = browser(people.preparer).get("/declare", CHOSEN)

    assert "What happens in flight nothing stated" in Page(answer).words
    assert not [name for name in Page(answer).form("").values if name.startswith("event")]
    assert '<details>\n  <summary id="in-flight">' in answer.content.decode()


def test_an_event_is_added_by_a_button_that_stores_nothing_and_keeps_what_was_typed(people) -> None:
    client = browser(people.preparer)
    form = Page(client.get("/declare", CHOSEN)).form("")
    before = Act.objects.count(), Load.objects.count()

    answer = client.post("/declare", form.filled({"seat:ROW1-L:name": "L. Osei"}, press="add leave"))
    page = Page(answer)

    assert (page.status, page.faults, page.alerts) == (200, {}, [])
    assert page.form("").values["seat:ROW1-L:name"] == "L. Osei"
    assert page.form("").values["event:0:kind"] == "leave"
    assert "row1 l: L. Osei" in page.words
    assert 'id="event:0:after" name="event:0:after" type="text" value="" ' in answer.content.decode()
    assert (Act.objects.count(), Load.objects.count()) == before
    assert "autofocus" in answer.content.decode()


@pytest.mark.parametrize(
    ("changes", "name", "words"),
    [
        ({"event:1:after": ""}, "event:1:after", "needed"),
        ({"event:1:after": "9000"}, "event:1:after", "more fuel than is on board"),
        ({"event:1:line:0:who": "seat:ROW2-R"}, "event:1:line:0:who", "nobody is declared in this seat"),
        ({"event:0:line:0:to": "NOWHERE"}, "event:0:line:0:to", "no such seat or place"),
        ({"event:3:line:0:weight": "500"}, "event:3:line:0:weight", "no more can leave"),
        ({"event:4:to": "LEFT"}, "event:4:to", "name another tank"),
        ({"event:2:line:0:seat": "ROW1-R"}, "event:2:line:0:seat", "choose another seat"),
    ],
)
def test_a_fault_of_an_event_stands_next_to_its_input_as_the_api_names_it(
    people, changes, name, words
) -> None:
    current = submit_load(load_document(people, sequence=EVENTS), by=actor(people.preparer))
    client = browser(people.preparer)
    form = Page(client.get(f"/loads/{current.load.id}/revise")).form("")
    confirmed = {"checked": "yes", "reason": "x"} | changes

    page = Page(client.post(f"/loads/{current.load.id}/revise", form.filled(confirmed, press="submit")))

    assert page.status == 422
    assert words in page.faults[name]
    assert f"#{name}" in page.links.values()
    assert not Load.objects.filter(replaces=current.load).exists()
