"""Settings of an operator: versions on two clocks, changed by an operations manager with a reason."""

from datetime import timedelta
from decimal import Decimal

import pytest
from django.utils import timezone

from fleet.actions.change_settings import change_settings
from fleet.models import OperatorSettings
from fleet.queries.settings import settings_at, settings_history
from fleet.settings_reading import read_settings
from records.models import Act, Change
from records.refusal import Invalid, NotAllowed, PreconditionFailed
from tests.cast import actor, cast, strangers
from tests.makers import q

pytestmark = pytest.mark.django_db
BOUND = {"weight": q("30", "kg"), "persons": 1}


def change(people, *, seen="0", **document):
    return change_settings(
        actor(people.manager), read_settings({"reason": "manual rev 6", **document}), seen=seen
    )


def now_of(people):
    now = timezone.now()
    return settings_at(people.operator.code, now, now)


def test_before_any_change_the_operators_own_row_speaks() -> None:
    people = cast()

    settings = now_of(people)

    assert settings.number == 0
    assert settings.procedure == "Operations manual, section 8, revision 5"
    assert settings.prepare_and_accept_by_one
    assert not settings.estimates_may_be_signed
    assert settings.last_minute_bound_weight is None
    assert settings.operations_mail == ()


def test_a_change_holds_from_now_and_keeps_what_it_leaves_out() -> None:
    people = cast()
    change(people, last_minute_bound=BOUND, operations_mail=["ops@kestrel.example"])

    change(people, seen="1", procedure="Operations manual, section 8, revision 6")

    settings = now_of(people)
    assert settings.number == 2
    assert (settings.last_minute_bound_weight, settings.last_minute_bound_unit) == (Decimal(30), "kg")
    assert settings.last_minute_bound_persons == 1
    assert settings.operations_mail == ("ops@kestrel.example",)
    assert settings.procedure.endswith("revision 6")


def test_what_held_and_what_was_known_are_two_questions() -> None:
    people = cast()
    code, before = people.operator.code, timezone.now()
    last_week = before - timedelta(days=7)
    change(people, true_from=last_week.isoformat(), estimates_may_be_signed=True)
    after = timezone.now()

    assert settings_at(code, before, after).estimates_may_be_signed
    assert not settings_at(code, before, before).estimates_may_be_signed
    assert not settings_at(code, last_week - timedelta(seconds=1), after).estimates_may_be_signed


def test_a_change_entered_for_later_waits_for_its_time() -> None:
    people = cast()
    code, later = people.operator.code, timezone.now() + timedelta(days=30)
    change(people, true_from=later.isoformat(), prepare_and_accept_by_one=False)

    known = timezone.now()

    assert settings_at(code, later - timedelta(seconds=1), known).prepare_and_accept_by_one
    assert not settings_at(code, later, known).prepare_and_accept_by_one


def test_of_two_versions_with_one_beginning_the_later_entered_corrects_the_other() -> None:
    people = cast()
    beginning = (timezone.now() - timedelta(days=1)).isoformat()
    change(people, true_from=beginning, last_minute_bound=BOUND)
    change(people, seen="1", true_from=beginning, last_minute_bound=None)

    assert now_of(people).last_minute_bound_weight is None
    assert [row.number for row in settings_history(people.operator.code)] == [2, 1]


def test_who_read_an_older_version_is_refused() -> None:
    people = cast()
    change(people, estimates_may_be_signed=True)

    with pytest.raises(PreconditionFailed):
        change(people, seen="0", estimates_may_be_signed=False)

    assert OperatorSettings.objects.count() == 1


def test_only_an_operations_manager_changes_them() -> None:
    people = cast()

    for person in (people.pilot, people.maintenance, people.approver, people.auditor, people.idle):
        with pytest.raises(NotAllowed):
            change_settings(actor(person), read_settings({"reason": "because"}), seen="0")

    assert not OperatorSettings.objects.exists()


def test_operators_have_their_own() -> None:
    people, others = cast(), strangers()
    change(people, last_minute_bound=BOUND)

    now = timezone.now()

    assert settings_at(others.operator.code, now, now).number == 0


def test_the_trail_has_the_act_its_reason_and_no_mail_address() -> None:
    people = cast()
    change(people, operations_mail=["keel.at.home@kestrel.example"])

    entry = Act.objects.get(kind="change-settings")
    image = Change.objects.get(act=entry).image

    assert (entry.about, entry.reason) == (f"operator:{people.operator.code}", "manual rev 6")
    assert "keel" not in image
    assert '"operations_mail": "sha256:' in image


@pytest.mark.parametrize(
    ("document", "pointer", "code"),
    [
        ({}, "/reason", "missing"),
        ({"reason": " "}, "/reason", "wrong-form"),
        ({"reason": "x" * 401}, "/reason", "too-long"),
        ({"reason": "r", "last_minute_bound": {"persons": 1}}, "/last_minute_bound/weight", "missing"),
        (
            {"reason": "r", "last_minute_bound": {"weight": {"value": "30"}, "persons": 1}},
            "/last_minute_bound/weight/unit",
            "unit-missing",
        ),
        (
            {"reason": "r", "last_minute_bound": {"weight": q("30", "in"), "persons": 1}},
            "/last_minute_bound/weight/unit",
            "unit-dimension",
        ),
        (
            {"reason": "r", "last_minute_bound": {"weight": q("-1", "kg"), "persons": 1}},
            "/last_minute_bound/weight/value",
            "out-of-range",
        ),
        (
            {"reason": "r", "last_minute_bound": {"weight": q("0.1234", "kg"), "persons": 1}},
            "/last_minute_bound/weight/value",
            "too-fine",
        ),
        (
            {"reason": "r", "last_minute_bound": {"weight": q("30", "kg"), "persons": -1}},
            "/last_minute_bound/persons",
            "too-small",
        ),
        ({"reason": "r", "weighing_threshold_percent": "1e2"}, "/weighing_threshold_percent", "number-form"),
        ({"reason": "r", "weighing_threshold_percent": "100"}, "/weighing_threshold_percent", "out-of-range"),
        ({"reason": "r", "operations_mail": ["a@b"]}, "/operations_mail/0", "mail-form"),
        (
            {"reason": "r", "operations_mail": ["x@y.example\nBcc: z@y.example"]},
            "/operations_mail/0",
            "mail-form",
        ),
        ({"reason": "r", "rule_set": "MARS"}, "/rule_set", "not-a-choice"),
        ({"reason": "r", "true_from": "yesterday"}, "/true_from", "wrong-form"),
        ({"reason": "r", "true_from": "0026-12-01T00:00:00Z"}, "/true_from", "instant-implausible"),
        ({"reason": "r", "colour": "blue"}, "/colour", "unknown-field"),
    ],
)
def test_what_makes_no_sense_is_named_by_its_pointer(document, pointer, code) -> None:
    with pytest.raises(Invalid) as refused:
        read_settings(document)

    assert (pointer, code) in {(fault.pointer, fault.code) for fault in refused.value.faults}
