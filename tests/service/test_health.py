"""Readiness: every part by name, nothing of the inside; a broker that is down stops no departure."""

import json
from datetime import UTC, datetime, timedelta

import psycopg
import pytest
from django.db import OperationalError, connection
from django.test import Client

from records.models import Seal, Verified
from records.verified import verify_everything, verify_onwards
from service import health
from tests import databases

pytestmark = pytest.mark.django_db(transaction=True)


@pytest.fixture(params=["/health", "/api/v1/health"])
def path(request):
    return request.param


def _ask(path):
    response = Client().get(path)
    return response.status_code, json.loads(response.content)


def test_it_is_ready_without_login_and_without_a_broker(path):
    status, body = _ask(path)

    assert status == 200
    assert body == {
        "status": "ready",
        "parts": {
            "database": "ok",
            "roles": "ok",
            "guards": "ok",
            "migrations": "ok",
            "broker": "not reached",
            "self-check": "ok",
            "trail": "not all verified yet",
        },
        "verified": {"entries": 0, "waiting": Seal.objects.count(), "at": None, "whole_at": None},
    }


def test_it_tells_how_far_the_trail_was_verified_and_when(path):
    verify_onwards()
    verify_everything()

    status, body = _ask(path)

    assert status == 200
    assert body["parts"]["trail"] == "ok"
    assert (body["verified"]["entries"], body["verified"]["waiting"]) == (Seal.objects.count(), 0)
    now = datetime.now(UTC)
    for when in ("at", "whole_at"):
        assert timedelta(0) <= now - datetime.fromisoformat(body["verified"][when]) < timedelta(minutes=1)


def test_a_trail_that_does_not_hold_is_told_without_its_place_and_stops_nobody(path):
    Verified.objects.create(
        chain="kestrel", position=3, digest="f" * 64, at=datetime.now(UTC), broken="chain kestrel, entry 4"
    )

    status, body = _ask(path)

    assert (status, body["parts"]["trail"]) == (200, "broken")
    assert "kestrel" not in json.dumps(body)


def test_a_process_that_is_alive_says_so_and_asks_no_database(monkeypatch):
    monkeypatch.setattr(health.connection, "cursor", None)

    response = Client().get("/health/alive")

    assert (response.status_code, json.loads(response.content)) == (200, {"status": "alive"})


def test_a_guard_that_was_switched_off_makes_it_unready_and_back_on_ready(path):
    database = connection.settings_dict["NAME"]
    with psycopg.connect(databases.server(), dbname=database, autocommit=True) as superuser:
        superuser.execute("ALTER TABLE fleet_aircraft DISABLE TRIGGER witness_insert")
        try:
            status, body = _ask(path)
        finally:
            superuser.execute("ALTER TABLE fleet_aircraft ENABLE ALWAYS TRIGGER witness_insert")

    assert (status, body["status"]) == (503, "not ready")
    assert body["parts"]["guards"] == "1 missing or changed"
    assert "fleet_aircraft" not in json.dumps(body)
    assert _ask(path)[0] == 200


def test_a_database_that_is_not_reached_makes_it_unready(path, monkeypatch):
    def refuses(*_args, **_kwargs):
        raise OperationalError("the password of the database")

    monkeypatch.setattr(health.connection, "cursor", refuses)

    status, body = _ask(path)

    assert status == 503
    assert body["parts"]["database"] == "not reached"
    assert "password" not in json.dumps(body)


def test_another_role_than_the_service_role_makes_it_unready(path, monkeypatch):
    monkeypatch.setattr(health, "SERVICE", "somebody_else")

    status, body = _ask(path)

    assert status == 503
    assert body["parts"]["roles"] == "not the service role"


def test_only_reading_methods_are_answered(path):
    assert Client().post(path).status_code == 405
