"""What would bring a load within, on its page, on the rejects desk and in a revision begun from it."""

import re

import pytest

from loads.actions.submit_load import submit_load
from tests.cast import actor, browser, cast
from tests.loads.making import outside_document, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


def typed(page: str) -> dict[str, str]:
    """What stands in the inputs of a page, as its browser would send it."""
    found = dict(re.findall(r'<input[^>]*?name="([^"]+)"[^>]*?value="([^"]*)"', page))
    for name, inside in re.findall(r'<select[^>]*?name="([^"]+)"[^>]*>(.*?)</select>', page, re.DOTALL):
        options = re.findall(r"<option([^>]*)>([^<]*)", inside)
        chosen = [(marks, words) for marks, words in options if " selected" in marks] or options[:1]
        for marks, words in chosen:
            value = re.search(r'value="([^"]*)"', marks)
            found[name] = value[1] if value else words
    return found


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def text_of(response) -> str:
    return re.sub(r"\s+", " ", re.sub(r"<[^>]+>", " ", response.content.decode()))


def test_the_page_of_a_reject_says_what_would_bring_it_within_with_figures_before_and_after(people) -> None:
    load = submit_load(outside_document(people), by=actor(people.preparer)).load

    response = browser(people.preparer).get(f"/loads/{load.id}")

    shown = text_of(response)
    assert response.status_code == 200
    assert "What would bring it within" in shown
    assert "What would break next" in shown
    assert "Revise with this put in" in shown
    assert "What room there is" not in shown


def test_a_revision_can_begin_with_a_remedy_put_in_and_is_within_when_it_is_sent(people) -> None:
    load = submit_load(outside_document(people), by=actor(people.preparer)).load
    visitor = browser(people.preparer)
    plain = visitor.get(f"/loads/{load.id}/revise").content.decode()
    begun = visitor.get(f"/loads/{load.id}/revise?remedy=1").content.decode()

    assert begun != plain
    preview = visitor.post(f"/loads/{load.id}/revise", {**typed(begun), "do": "preview"})
    assert "verdict--within" in preview.content.decode()


@pytest.mark.parametrize("asked", ["0", "99", "x", "-1", "1 "])
def test_a_remedy_that_is_not_offered_begins_the_revision_with_what_was_declared(people, asked) -> None:
    load = submit_load(outside_document(people), by=actor(people.preparer)).load
    visitor = browser(people.preparer)
    plain = re.sub(r"csrf[^>]*>", "", visitor.get(f"/loads/{load.id}/revise").content.decode())
    other = visitor.get(f"/loads/{load.id}/revise", {"remedy": asked}).content.decode()
    assert re.sub(r"csrf[^>]*>", "", other) == plain


def test_the_page_of_a_load_within_says_what_room_there_is(people) -> None:
    load = submitted(people).load

    shown = text_of(browser(people.preparer).get(f"/loads/{load.id}"))

    assert "What room there is" in shown
    assert "Room for error" in shown
    assert "What would bring it within" not in shown


def test_somebody_who_may_not_revise_reads_the_remedies_and_is_offered_no_form(people) -> None:
    load = submit_load(outside_document(people), by=actor(people.preparer)).load

    shown = text_of(browser(people.auditor).get(f"/loads/{load.id}"))

    assert "What would bring it within" in shown
    assert "Revise with this put in" not in shown


def test_the_rejects_desk_shows_the_first_remedy(people) -> None:
    submit_load(outside_document(people), by=actor(people.preparer))

    assert "Would bring it within:" in text_of(browser(people.preparer).get("/rejects"))
