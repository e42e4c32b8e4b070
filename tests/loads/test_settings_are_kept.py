"""What the settings say is what happens: who signs, what may be signed, what the manifest names."""

from datetime import timedelta

import pytest
from django.db import DatabaseError
from django.utils import timezone

from fleet.actions.change_settings import change_settings
from fleet.queries.settings import last_number
from fleet.settings_reading import read_settings
from loads.actions.accept_load import accept_load
from loads.actions.prepare_load import prepare_load
from loads.actions.submit_load import submit_load
from loads.manifest.gathering import facts_of, paper_of
from records.refusal import StepRefused
from tests.cast import Cast, actor, browser, cast
from tests.loads.making import accepted, load_document, prepared, signing, submitted
from tests.makers import ready_aircraft
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


@pytest.fixture
def people() -> Cast:
    made = cast()
    ready_aircraft(made)
    return made


def settle(people, **document):
    seen = str(last_number(people.operator.code))
    return change_settings(
        actor(people.manager), read_settings({"reason": "manual rev 6"} | document), seen=seen
    )


def by_the_pilot_alone(people):
    current = submitted(people)
    ready = prepare_load(current.load.id, signing(current), seen="1", by=actor(people.pilot))
    return accept_load(ready.load.id, signing(ready), seen="2", by=actor(people.pilot))


def test_one_person_prepares_and_accepts_until_the_settings_ask_for_two(people) -> None:
    assert by_the_pilot_alone(people).state == "accepted"

    settle(people, prepare_and_accept_by_one=False)

    with pytest.raises(StepRefused) as refused:
        by_the_pilot_alone(people)
    assert refused.value.code == "second-person-needed"
    assert accepted(people, prepared(people, submitted(people))).state == "accepted"


def test_the_database_asks_for_the_second_person_as_well(people, monkeypatch) -> None:
    settle(people, prepare_and_accept_by_one=False)
    monkeypatch.setattr("loads.actions.signing._refuse_the_same_hand_twice", lambda *_parts: None)

    with pytest.raises(DatabaseError) as refused:
        by_the_pilot_alone(people)

    assert refused.value.__cause__.diag.constraint_name == "step_of_acceptance_is_by_a_second_person"


def test_a_change_that_begins_later_asks_nobody_now(people) -> None:
    later = (timezone.now() + timedelta(days=1)).isoformat()
    settle(people, prepare_and_accept_by_one=False, true_from=later)

    assert by_the_pilot_alone(people).state == "accepted"


def estimated(people):
    document = load_document(people)
    document["passengers"][0]["how"] = "estimated"
    return submit_load(document, by=actor(people.preparer))


def signed(people, current):
    return prepare_load(current.load.id, signing(current), seen="1", by=actor(people.preparer))


def test_an_estimated_weight_of_a_person_is_signed_where_the_procedure_allows_it_and_only_there(
    people,
) -> None:
    before = estimated(people)
    assert before.assessment.verdict == "unresolved"
    with pytest.raises(StepRefused) as refused:
        signed(people, before)
    assert refused.value.code == "not-within"

    settle(people, estimates_may_be_signed=True, true_from="2026-01-01T00:00:00Z")
    allowed = estimated(people)

    check = next(one for one in allowed.result()["checks"] if one["code"] == "weights.estimated")
    assert (allowed.assessment.verdict, check["result"], check["source"]) == (
        "within",
        "pass",
        "settings No. 1",
    )
    assert check["margin_text"] == "estimated: row1 l; the operator's procedure allows it"
    assert signed(people, allowed).state == "prepared"
    assert "may be signed by the procedure" in Page(browser(people.manager).get("/settings")).words


def test_an_estimate_that_was_allowed_is_not_signed_any_more_once_the_procedure_forbids_it(people) -> None:
    settle(people, estimates_may_be_signed=True, true_from="2026-01-01T00:00:00Z")
    allowed = estimated(people)
    settle(people, estimates_may_be_signed=False)

    with pytest.raises(StepRefused) as refused:
        signed(people, allowed)

    assert refused.value.code == "estimated-weights"


def test_a_manifest_names_the_procedure_of_its_acceptance_whatever_is_entered_afterwards(people) -> None:
    first = accepted(people, prepared(people, submitted(people)))
    settle(people, procedure="Operations manual, section 8, revision 6", rule_set="EU-UK")
    second = accepted(people, prepared(people, submitted(people)))

    before = facts_of(paper_of(people.operator.code, first.load.id)).operator
    after = facts_of(paper_of(people.operator.code, second.load.id)).operator

    assert (before.procedure, before.rule_set) == ("Operations manual, section 8, revision 5", "US")
    assert (after.procedure, after.rule_set) == ("Operations manual, section 8, revision 6", "EU-UK")


def test_pages_speak_in_the_words_of_the_rule_set_in_force(people) -> None:
    current = submitted(people)
    address = f"/loads/{current.load.id}"

    before = Page(browser(people.auditor).get(address)).words
    settle(people, rule_set="EU-UK")
    after = Page(browser(people.auditor).get(address)).words

    assert "Zero-fuel weight" in before
    assert "Zero-fuel mass" in after
    assert "Zero-fuel weight" not in after
