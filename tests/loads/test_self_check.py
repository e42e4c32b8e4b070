"""The self-check is filed, only a failed one stops signing, and an overdue one is run there and then."""

import json
from datetime import timedelta

import pytest
from django.core.management import call_command
from django.test import Client
from django.utils import timezone

from fleet.envelope import Shape
from loads.actions import self_check
from loads.actions.self_check import check_when_overdue, own_proof, run_self_check
from loads.balance.engine import ENGINE_VERSION
from loads.models import SelfCheck
from loads.queries import self_checks
from loads.selfcheck.references import reference_set
from loads.tasks import self_check as daily
from records.models import Act
from records.refusal import NotAllowed, StepRefused
from service.proving import prove_at_start
from tests.cast import PASSWORD, actor, api, browser, cast, post
from tests.loads.making import accepted, prepared, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    people = cast()
    ready_aircraft(people)
    return people


@pytest.fixture
def broken(monkeypatch):
    """An engine that holds everything to be inside; what this process found before is forgotten after it."""
    monkeypatch.setattr(Shape, "holds", lambda *_: True)
    monkeypatch.setattr(Shape, "holds_whole", lambda *_: True)
    own_proof.cache_clear()
    yield
    own_proof.cache_clear()


def test_a_self_check_is_filed_with_engine_and_digest_in_an_act():
    check = run_self_check("start")

    assert (check.passed, check.engine, check.references) == (True, ENGINE_VERSION, reference_set().digest)
    act = Act.objects.get(id=check.act)
    assert (act.chain, act.kind, act.actor_key) == ("house", "run-self-check", "service:self-check")
    assert json.loads(check.document)["passed"] is True


def test_a_broken_engine_cannot_sign_even_before_it_was_asked_to_prove_itself(people, broken):
    current = submitted(people)

    with pytest.raises(StepRefused) as refused:
        prepared(people, current)
    assert refused.value.code == "self-check-failed"
    assert "flight manual" in refused.value.next_step


def test_a_failed_self_check_stops_preparing_accepting_and_nothing_else(people, monkeypatch):
    ready = prepared(people)
    with monkeypatch.context() as patched:
        patched.setattr(Shape, "holds", lambda *_: True)
        patched.setattr(Shape, "holds_whole", lambda *_: True)
        assert not run_self_check("daily").passed
    own_proof.cache_clear()  # this process is sound again; what was filed still stands

    with pytest.raises(StepRefused, match="published answers"):
        accepted(people, ready)
    assert submitted(people).assessment.verdict == "within"
    assert run_self_check("asked").passed
    assert accepted(people, ready).state == "accepted"


def test_the_refusal_is_a_problem_with_a_code_over_the_api(people, broken):
    run_self_check("daily")
    current = submitted(people)
    body = {"meaning": "prepared", "digest": current.assessment.digest, "password": PASSWORD}
    client = api(people.preparer)
    client.credentials(HTTP_IF_MATCH=f'"{current.step.number}"')

    answer = post(client, f"/loads/{current.load.id}/signatures", body)

    assert (answer.status_code, answer.json()["code"]) == (409, "self-check-failed")


def test_one_that_is_overdue_is_run_before_the_signature_and_does_not_stop_it(people, monkeypatch):
    run_self_check("daily")
    before = SelfCheck.objects.count()
    check_when_overdue("kestrel-test")
    assert SelfCheck.objects.count() == before

    later = timezone.now() + timedelta(days=185)
    monkeypatch.setattr(self_check.timezone, "now", lambda: later)
    check_when_overdue("kestrel-test")

    assert SelfCheck.objects.latest("checked_at").cause == "overdue"
    assert SelfCheck.objects.count() == before + 1


def test_one_of_another_engine_does_not_count(people, monkeypatch):
    run_self_check("daily")
    monkeypatch.setattr(self_checks, "ENGINE_VERSION", "another")

    assert self_checks.standing_of("kestrel-test", timezone.now()).overdue


def test_it_runs_daily_and_at_every_start():
    daily()
    assert SelfCheck.objects.latest("checked_at").cause == "daily"
    prove_at_start()
    prove_at_start()  # the second process of the same start

    assert SelfCheck.objects.filter(cause="start").count() == 1


def test_a_broken_process_files_its_failure_though_another_of_the_same_start_passed(monkeypatch):
    prove_at_start()
    monkeypatch.setattr(Shape, "holds", lambda *_: True)
    monkeypatch.setattr(Shape, "holds_whole", lambda *_: True)
    own_proof.cache_clear()
    prove_at_start()
    own_proof.cache_clear()

    starts = SelfCheck.objects.filter(cause="start").order_by("checked_at")
    assert [one.passed for one in starts] == [True, False]


def test_health_tells_it_and_stays_ready(monkeypatch):
    def told():
        answer = Client().get("/health")
        return answer.status_code, answer.json()["parts"]["self-check"]

    assert self_checks.last_word(timezone.now() + timedelta(days=185)) == "overdue"
    run_self_check("daily")
    assert told()[1] == "ok"
    with monkeypatch.context() as patched:
        patched.setattr(Shape, "holds", lambda *_: True)
        patched.setattr(Shape, "holds_whole", lambda *_: True)
        run_self_check("daily")
    own_proof.cache_clear()
    assert told()[1] == "failed"


def test_the_manager_runs_it_on_the_page_and_others_only_look(people):
    page = browser(people.manager)
    assert page.post("/self-check").status_code == 302
    check = SelfCheck.objects.latest("checked_at")
    assert (check.chain, check.cause) == ("kestrel-test", "asked")
    shown = browser(people.pilot).get("/self-check")
    assert shown.status_code == 200
    assert "every published answer came out" in shown.content.decode()
    assert "Run it now" not in shown.content.decode()
    with pytest.raises(NotAllowed):
        run_self_check("asked", by=actor(people.pilot))


@pytest.mark.parametrize(("sound", "code"), [(True, 0), (False, 1)])
def test_the_command_says_it_by_its_exit_code(sound, code, monkeypatch, capsys):
    if not sound:
        monkeypatch.setattr(Shape, "holds", lambda *_: True)
        monkeypatch.setattr(Shape, "holds_whole", lambda *_: True)

    with pytest.raises(SystemExit) as ended:
        call_command("selfcheck")
    own_proof.cache_clear()

    assert ended.value.code == code
    out = capsys.readouterr().out
    assert "15 reference loads" in out
    assert ("WRONG" in out) is not sound
