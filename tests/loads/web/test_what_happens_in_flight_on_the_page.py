"""The page of a load that states what happens in flight, and which leg it follows; and that the page which
revises loads refuses to lose either.
"""

import pytest

from loads.actions.submit_load import submit_load
from tests.cast import actor, browser
from tests.loads.making import load_document, submitted
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


def test_a_load_with_events_or_a_leg_before_is_not_revised_where_they_would_be_lost(people) -> None:
    first = submitted(people)
    back = load_document(people)
    back["flight"] |= {"departure": "2026-12-01T11:00:00-06:00", "origin": "XKOR", "destination": "XNAL"}
    linked = submit_load(
        back | {"flight": back["flight"] | {"leg": 2, "follows": str(first.load.id)}},
        by=actor(people.preparer),
    )
    with_events = submit_load(load_document(people, sequence=JUMP), by=actor(people.preparer))

    for current in (linked, with_events):
        answer = browser(people.preparer).get(f"/loads/{current.load.id}/revise")
        assert answer.status_code == 409
        assert "Revise it through the API." in answer.content.decode()
        itself = Page(browser(people.preparer).get(f"/loads/{current.load.id}"))
        assert "revise it through the API" in itself.words
        assert "Revise" not in itself.links
    page = Page(browser(people.pilot).get(f"/loads/{linked.load.id}"))
    assert "Follows KT-214 leg 1, XNAL to XKOR" in page.words
    assert "planned uplift 680 lb" in page.words
    other = Page(browser(people.pilot).get(f"/loads/{first.load.id}"))
    assert "Followed by KT-214 leg 2, XKOR to XNAL" in other.words
