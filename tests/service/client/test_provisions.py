"""What the client makes of tables, rules, restrictions and permits."""

import json

import pytest

from service.client import AnswerUnusable, Tarebook
from tests.service.client.told_server import Turn, telling

NUMBER = "01a23107-3d72-7a66-8157-3ea0a197a14a"
PERMIT = {
    "id": NUMBER,
    "kind": "permit",
    "aircraft": "Q9-KTB",
    "number": 1,
    "true_from": "2026-01-01T00:00:00Z",
    "true_until": "2026-01-02T00:00:00Z",
    "digest": "d" * 64,
    "approval": None,
    "ending": None,
    "document": {},
}


def client(server) -> Tarebook:
    return Tarebook(server.address, "tb_only-for-tests")


def test_versions_say_whether_they_are_approved_and_ended() -> None:
    lifted = PERMIT | {"kind": "restriction", "true_until": None, "ending": {"reason": "repaired"}}
    with telling(Turn(200, {"in_force": [NUMBER], "versions": [PERMIT, lifted]})) as server:
        found = client(server).provisions("permits", "Q9-KTB")

    assert found.in_force == (NUMBER,)
    assert [(one.approved, one.ended) for one in found.versions] == [(False, False), (True, True)]
    assert server.asked[0].path == "/api/v1/aircraft/Q9-KTB/permits"


def test_what_is_entered_approved_and_ended_is_sent_under_a_key() -> None:
    with telling(Turn(201, PERMIT), Turn(201, PERMIT), Turn(201, PERMIT)) as server:
        one = client(server).enter_provision("permits", {"number": "SFP-1"}, "Q9-KTB", key="a")
        client(server).approve_provision("permits", one, "seen", "Q9-KTB", key="b")
        client(server).end_provision("permits", one, "not needed", "Q9-KTB", key="c")

    assert server.keys() == ["a", "b", "c"]
    assert [asked.path.rpartition("/")[2] for asked in server.asked] == ["permits", "approval", "ending"]
    assert json.loads(server.asked[2].body) == {"reason": "not needed"}


def test_an_answer_of_another_form_is_refused() -> None:
    with telling(Turn(200, {"in_force": []})) as server, pytest.raises(AnswerUnusable):
        client(server).provisions("rules")
