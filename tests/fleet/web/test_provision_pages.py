"""The pages of tables, rules, restrictions and permits, and what the aircraft's page tells of them."""

import json

import pytest

from fleet.actions.approve_permit import approve_permit
from fleet.actions.enter_permit import enter_permit
from fleet.models import Provision
from fleet.web.provisions import SAMPLES
from tests.cast import actor, browser, cast
from tests.fleet.papers import permitted, restrict
from tests.makers import ready_aircraft
from tests.pure.fleet.test_rules import every, rule, rules_document
from tests.pure.loads.papers import lb, permit_document, restriction_document
from tests.pure.loads.standards import eu_document, seasonal_document
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
LOWER = {"effect": "limit", "limit": "take_off", "weight": lb("8000")}
BLOCK = {"effect": "seats", "ids": ["ROW1-L"]}
ALWAYS = {"true_from": "2026-01-01T00:00:00Z"}


@pytest.fixture
def people():
    return cast()


@pytest.fixture
def aircraft(people):
    return ready_aircraft(people)


def words(person, address):
    return Page(browser(person).get(address)).words


def test_a_table_is_entered_shown_row_by_row_and_approved_by_another_person(people) -> None:
    sent = browser(people.manager).post("/standard-weights", {"document": json.dumps(eu_document())})
    assert sent.status_code == 302
    shown = words(people.manager, "/standard-weights")
    assert "1 to 5 seats: male 104 kg, female 86 kg, child 35 kg" in shown
    assert "Infant: infant in its own seat, under 2 years, counts as child" in shown
    assert "Declared weights below 10 seats, plus clothing 4 kg, hand baggage 6 kg" in shown
    assert "awaits a second person" in shown

    table = Provision.objects.get()
    done = browser(people.approver).post(f"/standard-weights/{table.id}/approval")

    assert done.status_code == 302
    assert "in force" in words(people.manager, "/standard-weights")


def test_seasons_and_rules_read_as_people_say_them(people) -> None:
    browser(people.manager).post("/standard-weights", {"document": json.dumps(seasonal_document())})
    bound = {"from_engines": 2, "to_seats": 9, "operations": ["charter"]}
    document = rules_document(rule(**every(36, "calendar months"), applies_to=bound), rule(none=True))
    browser(people.manager).post("/rules", {"document": json.dumps(document)})

    assert "1 seats or more, winter (11-01 to 04-30): adult 200 lb" in words(
        people.auditor, "/standard-weights"
    )
    shown = words(people.auditor, "/rules")
    assert (
        "Weighing of the aircraft: 36 calendar months, for 2 or more engines, up to 9 seats, charter; 135.185"
        in shown
    )
    assert "Weighing of the aircraft: none; 135.185" in shown


def test_a_fault_in_a_document_is_told_and_what_was_typed_stays(people) -> None:
    typed = json.dumps(seasonal_document(rows=[]))

    page = browser(people.manager).post("/standard-weights", {"document": typed})
    broken = browser(people.manager).post("/standard-weights", {"document": "{"})

    assert page.status_code == 422
    assert "Company weights" in page.content.decode()
    assert broken.status_code in {400, 422}


def test_restrictions_are_entered_and_lifted_on_their_page_and_told_on_the_aircrafts(
    people, aircraft
) -> None:
    document = json.dumps(restriction_document(BLOCK, **ALWAYS))
    address = f"/aircraft/{aircraft.registration}/restrictions"

    assert browser(people.maintenance).post(address, {"document": document}).status_code == 302

    assert "Restriction DD-14. Item inoperative; ROW1-L blocked" in words(
        people.pilot, f"/aircraft/{aircraft.registration}"
    )
    one = Provision.objects.get(kind="restriction")
    lifting = f"{address}/{one.id}/lifting"
    own = browser(people.maintenance).post(lifting, {"reason": "repaired"})
    without = browser(people.approver).post(lifting, {"reason": " "})
    done = browser(people.approver).post(lifting, {"reason": "repaired"})
    assert [own.status_code, without.status_code, done.status_code] == [403, 422, 302]
    shown = words(people.pilot, address)
    assert "by E. Quill: repaired" in shown
    assert "Restrictions and permits in force None." in words(
        people.pilot, f"/aircraft/{aircraft.registration}"
    )


def test_permits_are_approved_and_ended_on_their_page(people, aircraft) -> None:
    permit = enter_permit(
        actor(people.maintenance),
        aircraft,
        permit_document(LOWER, operations=["ferry"], conditions=["day VFR"]),
    )
    address = f"/aircraft/{aircraft.registration}/permits"
    shown = words(people.pilot, address)
    assert "Given by Civil Aviation Office, Nalden" in shown
    assert "For ferry only" in shown
    assert "Day VFR" in shown

    approved = browser(people.approver).post(f"{address}/{permit.id}/approval")
    ended = browser(people.maintenance).post(f"{address}/{permit.id}/ending", {"reason": "not needed"})

    assert [approved.status_code, ended.status_code] == [302, 302]
    assert "by N. Tarrow: not needed" in words(people.pilot, address)


def test_standing_says_what_became_of_a_permit(people, aircraft) -> None:
    permitted(
        people,
        aircraft,
        LOWER,
        number="OLD",
        true_from="2020-01-01T00:00:00Z",
        true_until="2020-02-01T00:00:00Z",
    )
    later = enter_permit(
        actor(people.maintenance),
        aircraft,
        permit_document(
            LOWER, number="LATER", true_from="2890-01-01T00:00:00Z", true_until="2890-02-01T00:00:00Z"
        ),
    )
    approve_permit(actor(people.approver), aircraft, later)

    shown = words(people.pilot, f"/aircraft/{aircraft.registration}/permits")

    assert "lapsed" in shown
    assert "in force later" in shown


def test_another_operators_aircraft_has_no_such_page(people, aircraft) -> None:
    other = cast("elsewhere")
    restrict(people, aircraft, BLOCK)

    page = browser(other.manager).get(f"/aircraft/{aircraft.registration}/restrictions")

    assert page.status_code == 404


@pytest.mark.parametrize(
    ("page", "sample"), [("rules", "rules.json"), ("standard-weights", "standard-weights-eu.json")]
)
def test_whoever_may_enter_one_is_shown_a_sample_that_would_be_taken(people, page: str, sample: str) -> None:
    document = (SAMPLES / sample).read_text("utf-8")

    assert " ".join(document.split()) in words(people.manager, f"/{page}")
    assert browser(people.manager).post(f"/{page}", {"document": document}).status_code == 302
    assert "A sample to start from" not in words(people.pilot, f"/{page}")


@pytest.mark.parametrize("page", ["restrictions", "permits"])
def test_the_samples_for_an_aircraft_would_be_taken(people, aircraft, page: str) -> None:
    document = (SAMPLES / f"{page[:-1]}.json").read_text("utf-8")
    address = f"/aircraft/{aircraft.registration}/{page}"

    assert " ".join(document.split()) in words(people.maintenance, address)
    assert browser(people.maintenance).post(address, {"document": document}).status_code == 302
