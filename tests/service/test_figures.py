"""What a monitor is told, and who is told it."""

import json
import os
import subprocess
import sys

import pytest
from django.db import OperationalError
from django.test import Client
from django.utils import timezone
from prometheus_client.parser import text_string_to_metric_families

from loads.actions.submit_load import submit_load
from records.models import Outbox, Seal
from records.verified import verify_everything, verify_onwards
from service import figures
from service.bootstrap.environment import ROOT
from tests.cast import actor, browser, cast
from tests.loads.making import submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db(transaction=True)


def _told(**headers):
    response = Client(REMOTE_ADDR="127.0.0.1").get("/metrics", headers=headers)
    assert response.status_code == 200
    assert response["Content-Type"].startswith("text/plain; version=")
    return {
        (sample.name, *sorted(sample.labels.values())): sample.value
        for family in text_string_to_metric_families(response.content.decode())
        for sample in family.samples
    }


def test_acts_are_told_by_kind_once_they_are_committed():
    people = cast()
    ready_aircraft(people)
    before = _told()

    submitted(people)
    with pytest.raises(Exception, match=r"."):
        submit_load({}, by=actor(people.pilot))

    key = ("tarebook_acts_total", "submit-load")
    assert _told()[key] == before.get(key, 0) + 1


def test_requests_are_told_by_pattern_and_status_and_refusals_by_code():
    nowhere = "00000000-0000-7000-8000-000000000000"
    before = _told()
    client = browser(cast().pilot)

    client.get("/api/v1/loads")
    for _ in range(2):
        client.get(f"/api/v1/loads/{nowhere}")
    client.get(f"/made-up/{nowhere}")

    after = _told()

    def more(*key):
        return after.get(key, 0) - before.get(key, 0)

    pattern = "/api/v1/loads/<uuid:load>"
    assert more("tarebook_requests_total", "/api/v1/loads", "200", "GET") == 1
    assert more("tarebook_requests_total", pattern, "404", "GET") == 2
    assert more("tarebook_requests_total", "(nothing here)", "404", "GET") == 1
    assert more("tarebook_refusals_total", "load-not-known") == 2
    assert more("tarebook_request_seconds_count", pattern) == 2
    assert more("tarebook_request_seconds_bucket", "+Inf", pattern) == 2
    assert not any(nowhere in str(key) for key in after)


def test_the_last_verified_position_and_waiting_work_are_told():
    people = cast()
    ready_aircraft(people)
    sealed = Seal.objects.count()

    before = _told()
    verify_onwards()
    verify_everything()
    after = _told()

    assert (before["tarebook_verified_entries",], before["tarebook_unverified_entries",]) == (0, sealed)
    assert (after["tarebook_verified_entries",], after["tarebook_unverified_entries",]) == (sealed, 0)
    assert after["tarebook_trail_sound",] == after["tarebook_database_up",] == 1
    assert after["tarebook_verified_whole_timestamp_seconds",] > 1_700_000_000
    waiting = Outbox.objects.filter(done_at__isnull=True).count()  # no worker runs here
    assert after["tarebook_outbox_waiting",] == waiting > 0
    assert 0 < after["tarebook_outbox_oldest_seconds",] < 60
    Outbox.objects.update(done_at=timezone.now())
    done = _told()
    assert done["tarebook_outbox_waiting",] == done["tarebook_outbox_oldest_seconds",] == 0


def test_a_database_that_is_not_reached_is_told_as_such(monkeypatch):
    def refuses():
        raise OperationalError

    monkeypatch.setattr(figures, "last_verified", refuses)

    assert _told()["tarebook_database_up",] == 0


@pytest.mark.parametrize(
    ("address", "headers", "behind_proxy", "status"),
    [
        ("127.0.0.1", {}, False, 200),
        ("::1", {}, False, 200),
        ("192.0.2.1", {}, False, 404),
        ("127.0.0.1", {"X-Forwarded-For": "192.0.2.1"}, False, 404),
        ("127.0.0.1", {"X-Forwarded-Proto": "https"}, False, 404),
        ("127.0.0.1", {}, True, 404),
        ("", {}, False, 404),
    ],
)
def test_without_a_token_only_this_machine_is_told(settings, address, headers, behind_proxy, status):
    settings.BEHIND_PROXY = behind_proxy

    assert Client(REMOTE_ADDR=address).get("/metrics", headers=headers).status_code == status


@pytest.mark.parametrize(
    ("sent", "status"),
    [
        ("Bearer watch-tower-11", 200),
        ("bearer watch-tower-11", 200),
        ("Bearer watch-tower-12", 404),
        ("Basic watch-tower-11", 404),
        ("", 404),
    ],
)
def test_with_a_token_whoever_sends_it_is_told_and_nobody_else(settings, sent, status):
    settings.METRICS_TOKEN = "watch-tower-11"
    headers = {"Authorization": sent} if sent else {}

    assert Client(REMOTE_ADDR="127.0.0.1").get("/metrics", headers=headers).status_code == status


_ONE_PROCESS = """
import django
django.setup()
from records.figures import count_act
for _ in range(3):
    count_act("submit-load")
"""


def test_what_several_processes_counted_is_told_as_one_sum(tmp_path):
    """As under the web server: each process writes files of its own, and one reads them all."""
    environment = {
        **os.environ,
        "PROMETHEUS_MULTIPROC_DIR": str(tmp_path),
        "DJANGO_SETTINGS_MODULE": "service.settings",
    }
    for _ in range(2):
        subprocess.run([sys.executable, "-c", _ONE_PROCESS], cwd=ROOT, env=environment, check=True)
    asks = (
        "import django, json; django.setup();"
        "from django.test import Client; from django.test.utils import setup_test_environment;"
        "setup_test_environment();"
        "r = Client(REMOTE_ADDR='127.0.0.1').get('/metrics'); print(json.dumps(r.content.decode()))"
    )
    told = subprocess.run(
        [sys.executable, "-c", asks], cwd=ROOT, env=environment, check=True, capture_output=True, text=True
    )

    assert 'tarebook_acts_total{act="submit-load"} 6.0' in json.loads(told.stdout.splitlines()[-1])
