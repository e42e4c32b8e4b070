"""Readiness: every part by name, nothing of the inside; a broker that is down stops no departure."""

import json

import psycopg
import pytest
from django.db import OperationalError, connection
from django.test import Client

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
        },
    }


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
