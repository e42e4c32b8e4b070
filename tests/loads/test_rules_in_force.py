"""Rule values in force at a departure: a weighing past due stops only what the rule binds, and the loading
supervisor signs where the rules ask for it.
"""

import json
from typing import Any

import pytest

from fleet.actions.approve_rules import approve_rules
from fleet.actions.enter_person import enter_person
from fleet.actions.enter_rules import enter_rules
from fleet.actions.grant_duty import grant_duty
from fleet.models import Person, Provision
from loads.actions.accept_load import accept_load
from loads.actions.confirm_loading import confirm_loading
from loads.actions.submit_load import submit_load
from loads.queries.answer import answer_of
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.overtaken import database_time
from loads.queries.signable import signatures_due
from loads.queries.stale import stale_parts
from records.refusal import NotAllowed, StepRefused
from tests.cast import PASSWORD, Cast, actor, browser, cast
from tests.loads.making import load_document, prepared, signing
from tests.makers import empty_weight_document, make_empty_weight, q, ready_aircraft
from tests.pure.fleet.test_rules import every, rule, rules_document
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


@pytest.fixture
def people() -> Cast:
    made = cast()
    ready_aircraft(made)
    return made


def ruled(people: Cast, *rules: dict[str, Any], **changes: Any) -> Provision:
    entered = enter_rules(actor(people.manager), rules_document(*rules, **changes))
    approve_rules(actor(people.approver), entered)
    return entered


def submitted(people: Cast, **flight: Any) -> Current:
    document = load_document(people)
    document["flight"] |= flight
    return submit_load(document, by=actor(people.preparer))


def weighing(current: Current) -> dict[str, Any] | None:
    checks = json.loads(current.assessment.result)["checks"]
    return next((one for one in checks if one["code"] == "standing.weighing"), None)


def test_a_weighing_serves_to_the_end_of_the_month_at_the_local_date(people: Cast) -> None:
    """Weighed on 30 December 2025: 12 calendar months run to 31 December 2026, wherever the flight is."""
    used = ruled(people, rule(**every(12, "calendar months")))

    last = submitted(people, departure="2026-12-31T23:59:59-06:00")  # 1 January in UTC
    first = submitted(people, departure="2027-01-01T00:00:00+10:00", reference="KT-2")  # 31 December in UTC

    assert (last.assessment.verdict, weighing(last)["result"]) == ("within", "pass")
    assert (first.assessment.verdict, weighing(first)["result"]) == ("outside", "fail")
    assert weighing(first)["margin_text"] == (
        "weighed on 2025-12-30, which was good to the end of 2026-12-31 (every 12 calendar months)"
    )
    assert weighing(first)["source"] == "135.185, 14 CFR p. a"
    answer = answer_of(last, reach=None)
    assert answer["basis"]["rules"] == {"id": str(used.id), "digest": used.digest}
    assert answer["weighing"]["lapses"] == "2026-12-31"


def test_past_due_stops_only_the_operations_the_rule_binds(people: Cast) -> None:
    ruled(people, rule(**every(1, "months"), applies_to={"operations": ["passenger-charter"]}))

    charter, private = submitted(people), submitted(people, operation="private", reference="KT-3")

    assert (charter.assessment.verdict, private.assessment.verdict) == ("outside", "within")
    assert weighing(private) is None
    assert "rules" not in answer_of(private, reach=None)["basis"]


def test_a_rule_that_says_none_stops_nothing(people: Cast) -> None:
    ruled(people, rule(none=True))

    assert weighing(submitted(people)) is None


def test_a_calculated_change_does_not_make_the_weighing_younger(people: Cast) -> None:
    """An opening entry of 1 November 2026 that rests on the weighing of 30 December 2025."""
    ruled(people, rule(**every(12, "calendar months")))
    current = submitted(people)
    document = empty_weight_document(
        how="opening entry",
        weight=q("5216", "lb"),
        date="2026-11-01",
        weighed_on="2025-12-30",
        true_from="2026-11-01T00:00:00Z",
        report="calculation 12",
    )
    make_empty_weight(people, current.load.aircraft, document)

    later = submitted(people, departure="2027-01-02T08:00:00Z", reference="KT-4")

    assert weighing(later)["result"] == "fail"
    assert "weighed on 2025-12-30" in weighing(later)["margin_text"]


def test_later_rules_make_loads_stale_that_they_bind(people: Cast) -> None:
    charter, private = submitted(people), submitted(people, operation="private", reference="KT-5")
    ruled(people, rule(**every(36, "months"), applies_to={"operations": ["passenger-charter"]}))

    now = database_time()
    assert stale_parts(charter, now) == ("rules",)
    assert stale_parts(private, now) == ()
    bound = submitted(people, reference="KT-6")
    ruled(people, rule(**every(24, "months")), true_from="2026-02-01T00:00:00Z")
    assert stale_parts(bound, database_time()) == ("rules",)


def supervisor(people: Cast) -> Person:
    made = enter_person(
        actor(people.manager),
        people.operator,
        login="kestrel-test.loader",
        name="B. Orne",
        password=PASSWORD,
    )
    grant_duty(actor(people.manager), made, "loading supervisor")
    return made


def test_the_loading_supervisor_signs_between_preparer_and_pilot_where_the_rules_ask(people: Cast) -> None:
    ruled(people, rule("loading-signature", demanded=True))
    loader = supervisor(people)
    ready = prepared(people, submitted(people))
    assert set(signatures_due(ready, declared_now(ready))) == {"loaded"}
    with pytest.raises(StepRefused) as refused:
        accept_load(ready.load.id, signing(ready), seen="2", by=actor(people.pilot))
    assert refused.value.code == "loading-signature-needed"
    with pytest.raises(NotAllowed):
        confirm_loading(ready.load.id, signing(ready), seen="2", by=actor(people.preparer))

    loaded = confirm_loading(ready.load.id, signing(ready), seen="2", by=actor(loader))

    assert loaded.state == "loaded"
    assert set(signatures_due(loaded, declared_now(loaded))) == {"accepted"}
    flown = accept_load(loaded.load.id, signing(loaded), seen="3", by=actor(people.pilot))
    assert flown.state == "accepted"
    given = [(one["meaning"], one["capacity"]) for one in answer_of(flown, reach=None)["signatures"]]
    assert given == [
        ("prepared", "load preparer"),
        ("loaded", "loading supervisor"),
        ("accepted", "pilot in command"),
    ]


def test_where_no_rule_asks_the_loading_supervisor_does_not_sign(people: Cast) -> None:
    loader = supervisor(people)
    ready = prepared(people, submitted(people))

    with pytest.raises(StepRefused) as refused:
        confirm_loading(ready.load.id, signing(ready), seen="2", by=actor(loader))

    assert refused.value.code == "loading-signature-not-asked"
    assert set(signatures_due(ready, declared_now(ready))) == {"accepted"}


def test_rules_count_for_nothing_before_another_person_approved_them(people: Cast) -> None:
    entered = enter_rules(actor(people.manager), rules_document(rule(**every(1, "days"))))

    assert weighing(submitted(people)) is None
    with pytest.raises(NotAllowed):
        approve_rules(actor(people.manager), entered)


def test_the_inspectors_screen_tells_what_the_operator_laid_down_for_a_load(people: Cast) -> None:
    ruled(people, rule(**every(36, "calendar months")))
    submitted(people)

    words = Page(browser(people.auditor).get("/inspect?aircraft=Q9-KTB&day=2026-12-01")).words

    assert "Rules 1: Rules of the certificate, entered by M. Keel" in words
    assert "approved by E. Quill" in words
    assert "Sign as loaded, where the rules ask for it" in words
