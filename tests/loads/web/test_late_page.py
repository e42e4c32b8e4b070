"""Last-minute changes, notes, doubles and stale loads on the pages, without script."""

from datetime import timedelta

import pytest
from django.utils import timezone

from loads.actions.depart_load import depart_load
from loads.models import LateChange, Note
from loads.queries.current import load_of
from loads.tasks import tell_of_stale_loads
from tests.cast import PASSWORD, actor, browser
from tests.loads.late import BAG, bounded, change_of, changed
from tests.loads.making import accepted, load_document, prepared, submitted
from tests.makers import empty_weight_document, make_empty_weight, q
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
TYPED = {
    "change:0": "item-on",
    "where:0": "NOSE-HOLD",
    "who:0": "bag at the door",
    "kind:0": "baggage",
    "amount:0": "20",
    "unit:0": "lb",
    "how:0": "weighed",
    "persons_on_board": "3",
}


def _form(client, load):
    return Page(client.get(f"/loads/{load}/change")).form("")


def _computed(client, load, typed=TYPED):
    form = _form(client, load)
    return client.post(f"/loads/{load}/change", form.filled(typed, press="compute"))


def test_the_load_page_leads_its_pilot_to_a_last_minute_change_within_a_bound(people) -> None:
    current = accepted(people)
    at = f"/loads/{current.load.id}"
    assert "Last-minute change" not in Page(browser(people.pilot).get(at)).links

    bounded(people)

    assert Page(browser(people.pilot).get(at)).links["Last-minute change"] == f"{at}/change"
    assert "Last-minute change" not in Page(browser(people.preparer).get(at)).links


def test_a_change_is_computed_shown_and_accepted_without_script(people) -> None:
    bounded(people)
    load, client = accepted(people).load.id, browser(people.pilot)

    shown = _computed(client, load)
    page = Page(shown)
    assert "Baggage “bag at the door” on, NOSE-HOLD, 20 lb weighed" in page.words
    assert "Added up: 20 lb and 0 persons of 200 lb and 1 person" in page.words
    assert "You sign exactly this: Last-minute change 1, for issue 2 of manifest" in page.words
    assert LateChange.objects.count() == 0

    done = client.post(f"/loads/{load}/change", page.form("").filled({"password": PASSWORD}, press="accept"))
    assert (done.status_code, done["Location"]) == (302, f"/loads/{load}")
    words = Page(client.get(f"/loads/{load}")).words
    assert "Changed at the last minute No." in words
    assert "changed at the last minute and accepted again" in words


def test_lines_edited_after_they_were_computed_are_not_signed(people) -> None:
    bounded(people)
    load, client = accepted(people).load.id, browser(people.pilot)
    form = Page(_computed(client, load)).form("")

    refused = client.post(
        f"/loads/{load}/change",
        form.filled({"password": PASSWORD, "amount:0": "30"}, press="accept"),
    )

    assert refused.status_code == 409
    assert "What was shown is not what would be signed" in Page(refused).alerts[0]
    assert LateChange.objects.count() == 0


def test_a_wrong_password_is_refused_and_not_shown_again(people) -> None:
    bounded(people)
    load, client = accepted(people).load.id, browser(people.pilot)
    form = Page(_computed(client, load)).form("")

    refused = client.post(f"/loads/{load}/change", form.filled({"password": "not-this-one"}, press="accept"))

    assert refused.status_code == 422
    assert b"not-this-one" not in refused.content
    assert LateChange.objects.count() == 0


def test_a_line_that_does_not_fit_is_named_and_what_was_typed_stays(people) -> None:
    bounded(people)
    load, client = accepted(people).load.id, browser(people.pilot)

    refused = _computed(client, load, TYPED | {"change:0": "passenger-off", "where:0": "ROW2-L"})

    page = Page(refused)
    assert refused.status_code == 422
    assert "no passenger is in this seat" in page.alerts[0]
    assert page.form("").values["where:0"] == "ROW2-L"


def test_who_is_not_the_pilot_sees_what_comes_out_and_cannot_sign(people) -> None:
    bounded(people)
    load = accepted(people).load.id

    page = Page(_computed(browser(people.preparer), load))

    assert "Only the load's pilot in command accepts it." in page.words
    assert "password" not in page.form("").values


@pytest.mark.parametrize(
    ("typed", "line"),
    [
        (
            {"change:0": "passenger-off", "where:0": "ROW1-R", "persons_on_board": "2"},
            "passenger M. Dravo off",
        ),
        (
            {
                "change:0": "passenger-on",
                "where:0": "ROW2-L",
                "who:0": "N. Fell",
                "amount:0": "150",
                "how:0": "declared",
                "persons_on_board": "4",
            },
            "passenger N. Fell on, ROW2-L, 150 lb declared",
        ),
        (
            {"change:0": "item-off", "where:0": "AFT-HOLD", "who:0": "checked bags", "amount:0": "50"},
            "baggage “checked bags” off, AFT-HOLD, 50 lb weighed",
        ),
        (
            {"change:0": "fuel-on", "where:0": "LEFT", "amount:0": "5", "unit:0": "US gal"},
            "fuel up, LEFT, 5 US gal",
        ),
        (
            {"change:0": "fuel-off", "where:0": "RIGHT", "amount:0": "5", "unit:0": "US gal"},
            "fuel down, RIGHT, 5 US gal",
        ),
    ],
)
def test_each_kind_of_line_is_read_from_its_row(people, typed, line) -> None:
    bounded(people, persons=2)

    shown = _computed(browser(people.pilot), accepted(people).load.id, {"persons_on_board": "3"} | typed)

    assert shown.status_code == 200
    assert line.lower() in Page(shown).words.lower()


def test_each_issue_is_linked_and_served(people) -> None:
    bounded(people)
    current = accepted(people)
    changed(people, current, change_of(BAG))
    client = browser(people.auditor)
    links = Page(client.get(f"/loads/{current.load.id}")).links

    first, second = (client.get(links[f"issue {issue}"]).content for issue in (1, 2))

    assert first.startswith(b"%PDF-")
    assert second.startswith(b"%PDF-")
    assert first != second


def test_a_note_is_written_on_a_departed_load_only(people) -> None:
    current = accepted(people)
    at, client = f"/loads/{current.load.id}", browser(people.pilot)
    assert not [form for form in Page(client.get(at)).forms if form.action.endswith("/note")]
    depart_load(current.load.id, at=timezone.now(), seen=str(current.step.number), by=actor(people.pilot))

    form = Page(client.get(at)).form("/note")
    done = client.post(form.action, form.filled({"text": "M. Dravo sat in row 2."}))

    assert done.status_code == 302
    assert "R. Amani: M. Dravo sat in row 2." in Page(client.get(at)).words
    assert Note.objects.count() == 1
    assert not [form for form in Page(browser(people.auditor).get(at)).forms if form.action.endswith("/note")]


def test_an_empty_note_is_refused_on_the_page(people) -> None:
    current = accepted(people)
    depart_load(current.load.id, at=timezone.now(), seen=str(current.step.number), by=actor(people.pilot))

    refused = browser(people.pilot).post(f"/loads/{current.load.id}/note", {"text": "  "})

    assert refused.status_code == 422
    assert Note.objects.count() == 0


def test_an_accepted_load_that_went_stale_is_marked_on_its_page_and_in_the_day(people) -> None:
    departure = (timezone.now() + timedelta(hours=1)).replace(microsecond=0)
    flight = load_document(people)["flight"] | {"departure": departure.isoformat()}
    current = accepted(people, prepared(people, submitted(people, flight=flight)))
    weight = make_empty_weight(people, current.load.aircraft, empty_weight_document(weight=q("5210", "lb")))
    tell_of_stale_loads(str(weight.approval.id))
    client = browser(people.pilot)

    words = Page(client.get(f"/loads/{current.load.id}")).words
    day = Page(client.get("/", {"day": f"{departure.astimezone():%Y-%m-%d}"})).words

    assert "Changed since it was assessed: empty weight. It was accepted on the earlier figures" in words
    assert "that the empty weight changed after acceptance; no mail" in words
    assert "stale: revise" in day or "stale: revise" in Page(client.get("/")).words


def test_a_double_is_shown_on_both_pages_with_a_link_to_the_other(people) -> None:
    first, second = submitted(people), submitted(people)
    client = browser(people.preparer)

    for one, other in ((first, second), (second, first)):
        page = Page(client.get(f"/loads/{one.load.id}"))
        assert "The same aircraft stands on another load: Q9-KTB KT-214" in page.words
        assert page.links["Open that load"] == f"/loads/{other.load.id}"


def test_strangers_find_no_page_to_change_a_load(people) -> None:
    current = accepted(people)

    assert browser(people.idle).get(f"/loads/{current.load.id}/change").status_code == 403
    assert load_of(people.operator.code, current.load.id).state == "accepted"
