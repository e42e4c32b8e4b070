"""An accepted load that goes stale: told at once, once, by page, event and mail, whoever comes when."""

from datetime import timedelta

import pytest
from django.core import mail
from django.utils import timezone

from fleet.actions.change_mail import change_mail
from fleet.events import VERSIONS_CHANGED
from loads.actions.depart_load import depart_load
from loads.actions.file_manifest import file_manifest
from loads.actions.mail_stale import mail_stale_notice
from loads.actions.tell_stale import MAILING, tell_after_approval, tell_if_stale
from loads.manifest.gathering import paper_of
from loads.models import FiledPaper, StaleNotice
from loads.tasks import mail_stale, tell_of_stale_loads
from records.models import Act, Outbox, Seal
from records.tasks import sweep_outbox
from tests.cast import actor, cast
from tests.loads.late import bounded
from tests.loads.making import accepted, load_document, prepared, submitted
from tests.makers import (
    basis_document,
    empty_weight_document,
    make_basis,
    make_empty_weight,
    q,
    ready_aircraft,
)

pytestmark = pytest.mark.django_db


@pytest.fixture
def people(settings):
    settings.EMAIL_HOST = "mail.example"
    made = cast()
    ready_aircraft(made)
    bounded(made)
    return made


def _flying_soon(people, **changes):
    """A load that departs in an hour, accepted."""
    departure = (timezone.now() + timedelta(hours=1)).replace(microsecond=0).isoformat()
    flight = load_document(people)["flight"] | {"departure": departure}
    return accepted(people, prepared(people, submitted(people, flight=flight, **changes)))


def _new_weight(people, current):
    weight = make_empty_weight(people, current.load.aircraft, empty_weight_document(weight=q("5210", "lb")))
    return str(weight.approval.id)


def test_an_approval_promises_the_look_and_the_look_tells(people) -> None:
    current = _flying_soon(people)
    approval = _new_weight(people, current)
    promised = Outbox.objects.get(task=VERSIONS_CHANGED, key=approval)

    tell_of_stale_loads(approval)

    told = StaleNotice.objects.get()
    assert (told.load_id, told.assessment_id) == (current.load.id, current.assessment.id)
    assert (told.changed, told.mail_addresses) == ("empty weight", 1)
    act = Act.objects.get(kind="tell-stale-load")
    assert (act.actor_key, act.caused_by) == ("service:worker", promised.act)
    promised.refresh_from_db()
    assert promised.done_at is not None


def test_it_is_told_once_however_often_the_work_is_done(people) -> None:
    current = _flying_soon(people)
    approval = _new_weight(people, current)

    tell_of_stale_loads(approval)
    tell_of_stale_loads(approval)
    tell_after_approval(StaleNotice.objects.get().empty_weight.approval.id)

    assert StaleNotice.objects.count() == 1
    assert Act.objects.filter(kind="tell-stale-load").count() == 1
    assert Outbox.objects.filter(task=MAILING).count() == 1


def test_each_further_version_is_told_of(people) -> None:
    current = _flying_soon(people)
    tell_of_stale_loads(_new_weight(people, current))

    basis = make_basis(people, current.load.aircraft, basis_document(datum=_datum()))
    tell_of_stale_loads(str(basis.approval.id))

    assert list(StaleNotice.objects.order_by("told_at").values_list("changed", flat=True)) == [
        "empty weight",
        "loading basis, empty weight",
    ]


def _datum():
    return basis_document()["datum"]


@pytest.mark.parametrize("state", ["open", "prepared", "departed"])
def test_only_accepted_loads_are_told_of(people, state: str) -> None:
    if state == "departed":
        current = _flying_soon(people)
        depart_load(current.load.id, at=timezone.now(), seen=str(current.step.number), by=actor(people.pilot))
    else:
        current = submitted(people) if state == "open" else prepared(people)

    tell_of_stale_loads(_new_weight(people, current))

    assert StaleNotice.objects.count() == 0


def test_a_load_planned_long_ago_and_never_reported_is_left_alone(people) -> None:
    departure = (timezone.now() - timedelta(days=3)).replace(microsecond=0).isoformat()
    flight = load_document(people)["flight"] | {"departure": departure}
    current = accepted(people, prepared(people, submitted(people, flight=flight)))

    tell_of_stale_loads(_new_weight(people, current))

    assert StaleNotice.objects.count() == 0


def test_a_version_for_later_makes_an_earlier_flight_no_staler(people) -> None:
    current = _flying_soon(people)
    later = (timezone.now() + timedelta(days=30)).isoformat()
    weight = make_empty_weight(people, current.load.aircraft, empty_weight_document(true_from=later))

    tell_of_stale_loads(str(weight.approval.id))

    assert StaleNotice.objects.count() == 0


def test_an_acceptance_beside_an_approval_is_found_when_its_manifest_is_filed(people) -> None:
    current = _flying_soon(people)
    _new_weight(people, current)  # its look ran, let us say, before the acceptance was committed

    file_manifest(paper_of(people.operator.code, current.load.id))

    assert StaleNotice.objects.get().load_id == current.load.id
    assert FiledPaper.objects.count() == 1


def test_mail_goes_to_operations_and_names_nobody(people) -> None:
    current = _flying_soon(people)
    tell_of_stale_loads(_new_weight(people, current))
    notice = StaleNotice.objects.get()

    mail_stale(str(notice.id))

    sent = mail.outbox[0]
    assert sent.to == ["ops@kestrel.example"]
    assert sent.subject == "Stale before departure: Q9-KTB KT-214 leg 1"
    assert "its empty weight changed" in sent.body
    assert f"/loads/{current.load.id}" in sent.body
    assert not any(name in sent.body for name in ("Amani", "Osei", "Dravo"))
    assert sent.extra_headers["Message-ID"].startswith(f"<stale-{notice.id}@")
    assert Outbox.objects.get(task=MAILING).done_at is not None


def test_mail_that_fails_is_tried_again(people, monkeypatch: pytest.MonkeyPatch) -> None:
    current = _flying_soon(people)
    tell_of_stale_loads(_new_weight(people, current))
    notice = StaleNotice.objects.get()

    def broken(*_):
        raise ConnectionRefusedError

    with monkeypatch.context() as patched:
        patched.setattr("django.core.mail.backends.locmem.EmailBackend.send_messages", broken)
        with pytest.raises(ConnectionRefusedError):
            mail_stale(str(notice.id))

    row = Outbox.objects.get(task=MAILING)
    assert (row.done_at, row.last_problem) == (None, "ConnectionRefusedError")
    mail_stale(str(notice.id))
    assert len(mail.outbox) == 1


def test_without_a_mail_server_no_mail_is_promised_and_the_notice_says_so(people, settings) -> None:
    settings.EMAIL_HOST = ""
    current = _flying_soon(people)

    tell_of_stale_loads(_new_weight(people, current))

    assert StaleNotice.objects.get().mail_addresses == 0
    assert not Outbox.objects.filter(task=MAILING).exists()
    assert mail_stale_notice(StaleNotice.objects.get().id) == 0


def test_the_sweeper_sends_the_look_again(people, monkeypatch: pytest.MonkeyPatch) -> None:
    current = _flying_soon(people)
    approval = _new_weight(people, current)
    Outbox.objects.update(try_after=timezone.now() - timedelta(seconds=1))
    woken = []
    monkeypatch.setattr("records.outbox.wake", lambda task, key: woken.append((task, key)) or True)

    sweep_outbox()

    assert (VERSIONS_CHANGED, approval) in woken


def test_the_notice_is_sealed_and_names_the_versions(people) -> None:
    current = _flying_soon(people)
    tell_of_stale_loads(_new_weight(people, current))

    entry = Seal.objects.get(act__kind="tell-stale-load").entry

    assert str(StaleNotice.objects.get().empty_weight_id) in entry


def test_what_is_not_stale_is_not_told(people) -> None:
    current = _flying_soon(people)

    assert tell_if_stale(people.operator.code, current.load.id, None) is None


def test_the_pilot_in_command_is_mailed_at_their_own_address(people) -> None:
    change_mail(actor(people.pilot), people.pilot, "r.amani@example.org")
    current = _flying_soon(people)
    tell_of_stale_loads(_new_weight(people, current))

    mail_stale(str(StaleNotice.objects.get().id))

    (message,) = mail.outbox
    assert message.to[0] == "r.amani@example.org"
    assert len(message.to) == StaleNotice.objects.get().mail_addresses == 2
