"""The OpenAPI document: the committed one fits the endpoints, and says how each may refuse."""

import json
from io import StringIO

import pytest
from django.core.management import CommandError, call_command
from django.test import Client

from service.management.commands import openapi as command
from service.openapi import COMMITTED, STORES_NOTHING, document


@pytest.fixture(scope="module")
def schema():
    text, complaints = document()
    assert complaints == []
    return json.loads(text)


def _operations(schema):
    return [(path, method, each) for path, ways in schema["paths"].items() for method, each in ways.items()]


def test_the_committed_document_fits_the_endpoints():
    said = StringIO()

    call_command("openapi", "--check", stdout=said)

    assert "fits" in said.getvalue()


def test_a_document_that_differs_is_refused_with_the_difference(tmp_path, monkeypatch):
    changed = tmp_path / "openapi.json"
    changed.write_text(COMMITTED.read_text("utf-8").replace('"Tarebook"', '"Other"'), encoding="utf-8")
    monkeypatch.setattr(command, "COMMITTED", changed)
    said = StringIO()

    with pytest.raises(CommandError):
        call_command("openapi", "--check", stdout=said)
    assert '-  "title": "Other"' in said.getvalue()

    call_command("openapi", stdout=said)
    assert changed.read_text("utf-8") == COMMITTED.read_text("utf-8")


def test_it_is_served_as_committed_without_login():
    response = Client().get("/api/v1/openapi.json")

    assert response.content == COMMITTED.read_bytes()
    assert response["Content-Type"] == "application/json"
    assert json.loads(response.content)["openapi"].startswith("3.1")


def test_every_operation_says_how_it_refuses(schema):
    for path, method, operation in _operations(schema):
        assert "default" in operation["responses"], (method, path)
        if operation.get("security"):
            assert {"401", "403"} <= set(operation["responses"]), (method, path)
            assert operation["security"] == [{"token": []}, {"session": []}], (method, path)
        if "{" in path:
            assert "404" in operation["responses"], (method, path)


def test_only_health_needs_no_login(schema):
    open_to_all = [path for path, _, operation in _operations(schema) if not operation.get("security")]

    assert open_to_all == ["/api/v1/health"]


def test_every_post_that_stores_something_needs_a_key(schema):
    for path, method, operation in _operations(schema):
        named = [parameter.get("name") for parameter in operation.get("parameters", ())]
        needs_one = method == "post" and path not in STORES_NOTHING
        assert named.count("Idempotency-Key") == (1 if needs_one else 0), (method, path)


def test_every_operation_but_health_says_that_it_is_limited(schema):
    limited = {path for path, _method, operation in _operations(schema) if "429" in operation["responses"]}

    assert set(schema["paths"]) - limited == {"/api/v1/health"}


def test_every_reference_leads_somewhere(schema):
    def references(value):
        if isinstance(value, dict):
            yield from ([value["$ref"]] if isinstance(value.get("$ref"), str) else [])
            for member in value.values():
                yield from references(member)
        elif isinstance(value, list):
            for member in value:
                yield from references(member)

    for reference in set(references(schema)):
        place = schema
        for step in reference.removeprefix("#/").split("/"):
            place = place[step]
        assert place


def test_the_page_that_shows_it_takes_everything_from_here():
    page = Client().get("/docs").content.decode()

    assert 'data-document="/api/v1/openapi.json"' in page
    assert "://" not in page
    assert "<style" not in page
    assert "<script>" not in page
