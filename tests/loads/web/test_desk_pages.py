"""The rejects desk, the documents, the trail and the inspector's screen, read without script."""

from datetime import datetime, timedelta
from zoneinfo import ZoneInfo

import pytest
from django.utils import timezone

from loads.actions.file_manifest import manifest_bytes
from loads.actions.revise_load import revise_load
from loads.actions.submit_load import submit_load
from loads.models import Remark
from tests.cast import actor, browser, strangers
from tests.loads.making import accepted, load_document, outside_document, prepared, submitted
from tests.makers import empty_weight_document, make_empty_weight, q
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
PAGES = ("/rejects", "/documents", "/trail", "/inspect", "/settings")
HOSTILE = [
    "%00",
    "'; DROP TABLE loads_load; --",
    "<script>alert(1)</script>",
    "\x00",
    "9" * 5000,
    "🛩",
    "%",
    "\u202e",
]


def shown(person, path, **query):
    return Page(browser(person).get(path, query))


def rejected(people):
    return submit_load(outside_document(people), by=actor(people.preparer))


def flown(people):
    return accepted(people, prepared(people, submitted(people)))


@pytest.mark.parametrize("path", PAGES)
def test_who_is_not_signed_in_is_asked_to_and_who_has_no_duty_is_refused(people, client, path) -> None:
    away, refused = client.get(path), browser(people.idle).get(path)

    assert away.status_code == 302
    assert away["Location"].startswith("/sign-in?next=")
    assert refused.status_code == 403
    assert "Inspection" not in Page(refused).links


@pytest.mark.parametrize("path", PAGES)
def test_every_page_carries_the_cautions_and_the_way_to_the_others(people, path) -> None:
    page = shown(people.auditor, path)

    assert page.status == 200
    assert {"Rejects", "Documents", "Trail", "Inspection", "Settings"} <= set(page.links)
    assert "INVENTED DATA, NOT FOR FLIGHT" in page.words
    assert "Nothing that was not assessed is shown as passed" in page.words


@pytest.mark.parametrize("value", HOSTILE)
@pytest.mark.parametrize(
    ("path", "names"),
    [
        ("/documents", ("number", "registration", "reference", "from", "to", "after")),
        ("/trail", ("about", "actor", "kind", "from", "to", "after")),
        ("/inspect", ("aircraft", "day")),
    ],
)
def test_hostile_queries_find_nothing_and_break_nothing(people, path, names, value) -> None:
    flown(people)

    for name in names:
        response = browser(people.auditor).get(path, {name: value})

        assert response.status_code in {200, 422}, (name, value)
        assert b"<script>alert" not in response.content


def test_the_desk_says_why_with_whom_and_what_would_help(people) -> None:
    rejected(people)

    page = shown(people.auditor, "/rejects")

    assert "1 load cannot depart as declared" in page.words
    assert "With R. Amani" in page.words
    assert "Q9-KTB" in page.links
    assert "above the limit" in page.words
    assert page.actions() == set()  # an auditor only reads


def test_a_remark_is_typed_on_the_desk_and_hands_the_load_over(people) -> None:
    current = rejected(people)
    form = shown(people.manager, "/rejects").form("/remarks")

    sent = browser(people.manager).post(
        form.action, form.filled({"words": "leave one casting", "holder": people.preparer.login})
    )
    page = shown(people.auditor, "/rejects")

    assert sent.status_code == 302
    assert sent["Location"] == f"/rejects#load-{current.load.id}"
    assert "leave one casting" in page.words
    assert "With D. Lorn" in page.words


def test_a_remark_that_is_refused_keeps_what_was_typed(people) -> None:
    rejected(people)
    form = shown(people.manager, "/rejects").form("/remarks")

    page = Page(browser(people.manager).post(form.action, {"words": "kept words", "holder": "nobody.here"}))

    assert page.status == 422
    assert page.alerts
    assert page.form("/remarks").values["words"] == "kept words"
    assert not Remark.objects.exists()


def test_nobody_remarks_on_another_operators_load(people) -> None:
    current = rejected(people)

    page = Page(browser(strangers().manager).post(f"/rejects/{current.load.id}/remarks", {"words": "mine"}))

    assert page.status == 404
    assert not Remark.objects.exists()
    assert "KT-214" not in shown(strangers("third-test").manager, "/rejects").words


def test_what_became_of_a_reject_and_the_trend_are_told(people) -> None:
    zone = ZoneInfo(people.operator.time_zone)
    departure = datetime.now(zone).replace(microsecond=0).isoformat()
    flight = load_document(people)["flight"] | {"departure": departure}
    first = submit_load(outside_document(people) | {"flight": flight}, by=actor(people.preparer))
    document = load_document(people, flight=flight)
    revise_load(first.load.id, document, reason="lighter", seen="1", by=actor(people.preparer))

    page = shown(people.auditor, "/rejects")

    assert "Every load that stands is within limits." in page.words
    assert "Replaced by a revision: within, open" in page.links
    assert "Q9-KTB 2 1 50 %" in page.words


def test_documents_are_listed_with_their_digest_and_found_by_number(people) -> None:
    current = flown(people)
    manifest_bytes(people.operator.code, current.load.id)

    page, other = (
        shown(people.auditor, "/documents", number="1"),
        shown(people.auditor, "/documents", number="2"),
    )

    assert page.links["1 (PDF)"] == f"/loads/{current.load.id}/manifest"
    assert "No manifest fits this search." in other.words
    assert "1 (PDF)" not in shown(strangers().manager, "/documents").links


def test_a_day_that_is_none_is_named_beside_its_field(people) -> None:
    page = shown(people.auditor, "/documents", **{"from": "yesterday"})

    assert page.status == 422
    assert page.faults["from"] == "Write a day like 2026-12-01."


def test_the_trail_of_a_load_tells_its_life_in_sentences(people) -> None:
    current = flown(people)

    page = shown(people.auditor, "/trail", about=f"load:{current.load.id}")

    told = [
        page.words.index(sentence)
        for sentence in (
            "R. Amani accepted a load.",
            "D. Lorn signed a load as prepared.",
            "D. Lorn submitted a load.",
        )
    ]
    assert page.h1 == "Trail of Q9-KTB"
    assert told == sorted(told)
    assert "approved an empty weight." not in page.words


def test_one_act_shows_its_rows_and_that_the_digest_fits(people) -> None:
    flown(people)
    page = shown(people.auditor, "/trail")
    address = next(href for words, href in page.links.items() if words.startswith("entry "))

    act = shown(people.auditor, address)

    assert "What was written" in act.words
    assert "the entry below gives exactly this" in act.words
    assert Page(browser(strangers().manager).get(address)).status == 404


def test_another_operators_trail_is_empty_even_when_asked_by_key(people) -> None:
    current = flown(people)

    page = shown(strangers().manager, "/trail", about=f"load:{current.load.id}")

    assert "No act fits." in page.words
    assert "KT-214" not in page.words


def test_the_inspector_sees_manifest_figures_report_and_signers(people) -> None:
    current = flown(people)

    page = shown(people.auditor, "/inspect", aircraft="Q9-KTB", day="2026-12-01")

    assert page.h1 == "Q9-KTB"
    for words in (
        "Manifest No. 1: KT-214",
        "5214 lb",
        "W-2025-31",
        "entered by N. Tarrow",
        "approved by E. Quill",
        "R. Amani, pilot in command",
        "survival kit",
        "Unbroken: 1 to 1, none missing, none twice.",
    ):
        assert words in page.words, words
    assert page.links["the manifest (PDF)"] == f"/loads/{current.load.id}/manifest"
    assert {form.method for form in page.forms if not form.action.endswith("sign-out")} == {"get"}


def test_who_could_sign_is_asked_for_the_last_departure_of_the_day_or_now(people) -> None:
    # duties were granted today: nobody could sign at the first departure, and its manifest was signed later
    day = timezone.now().astimezone(ZoneInfo(people.operator.time_zone)).replace(hour=0, minute=1)
    for leg, hour in ((1, 0), (2, 23)):
        document = load_document(people)
        document["flight"] |= {"leg": leg, "departure": day.replace(hour=hour).isoformat(timespec="seconds")}
        submit_load(document, by=actor(people.preparer))

    page = shown(people.auditor, "/inspect", aircraft="Q9-KTB", day=f"{day:%Y-%m-%d}")

    assert "Accept, as pilot in command of the flight R. Amani" in page.words
    assert f"Who could sign, at {day:%Y-%m-%d} 00:01" not in page.words


def test_a_figure_found_wrong_later_is_said_beside_the_one_that_was_used(people) -> None:
    flown(people)
    corrected = empty_weight_document(weight=q("5300", "lb"), report="W-2026-02")
    make_empty_weight(people, submitted(people).load.aircraft, corrected)

    page = shown(people.auditor, "/inspect", aircraft="Q9-KTB", day="2026-12-01")

    assert "Another empty weight is held true for that time now: 5300 lb, report W-2026-02" in page.words
    assert "5214 lb" in page.words


def test_a_past_flight_that_nobody_accepted_is_named(people) -> None:
    past = timezone.now() - timedelta(hours=2)
    flight = load_document(people)["flight"] | {"reference": "KT-GONE", "departure": past.isoformat()}
    submitted(people, flight=flight)

    words = shown(people.auditor, "/inspect").words

    assert "KT-GONE" in words
    assert "KT-GONE" not in shown(strangers().manager, "/inspect").words


def test_an_aircraft_that_is_not_entered_is_named_beside_its_field(people) -> None:
    page = shown(people.auditor, "/inspect", aircraft="Q9-NONE")

    assert page.status == 422
    assert page.faults["aircraft"] == "No aircraft of this registration is entered."
