"""What the client reads of the trail it checks itself; people and settings carry what the next call needs."""

import hashlib
from typing import Any

import pytest

from service.client import AnswerUnusable, Tarebook
from tests.service.client.told_server import Turn, telling

NUMBER = "01a23107-3d72-7a66-8157-3ea0a197a14a"
TEXT = '{"schema":"tarebook.entry/1"}'
LINE: dict[str, Any] = {
    "act": NUMBER,
    "at": "2026-12-01T08:00:00Z",
    "kind": "accept-load",
    "sentence": "R. Amani (pilot) accepted a load: KT-214",
    "actor": "person:7",
    "about": "load:1",
    "reason": "",
    "position": 12,
    "digest": hashlib.sha256(b"\x00" + TEXT.encode()).hexdigest(),
}
SETTINGS = {"number": 3}


def test_an_entry_is_believed_when_its_text_has_the_digest() -> None:
    with telling(Turn(200, LINE | {"previous": None, "entry": TEXT})) as server:
        entry = Tarebook(server.address, "t").entry(NUMBER)

    assert (entry.text, entry.line.position, entry.previous) == (TEXT, 12, None)


def test_an_entry_whose_text_was_altered_is_not() -> None:
    with (
        telling(Turn(200, LINE | {"previous": None, "entry": TEXT + " "})) as server,
        pytest.raises(AnswerUnusable),
    ):
        Tarebook(server.address, "t").entry(NUMBER)


def test_the_trail_is_read_page_after_page() -> None:
    following = {"Link": '<https://elsewhere.example/api/v1/trail?cursor=abc>; rel="next"'}
    with telling(Turn(200, {"acts": [LINE]}, following), Turn(200, {"acts": [LINE, LINE]})) as server:
        acts = list(Tarebook(server.address, "t").trail(kind="accept-load"))

    assert len(acts) == 3
    assert [one.path for one in server.asked] == [
        "/api/v1/trail?kind=accept-load&limit=50",
        "/api/v1/trail?cursor=abc",
    ]


def test_a_change_of_settings_names_the_version_that_was_seen() -> None:
    shown = Turn(200, {"in_force": SETTINGS}, {"ETag": '"3"'})
    with telling(shown, Turn(201, SETTINGS | {"number": 4}, {"ETag": '"4"'})) as server:
        client = Tarebook(server.address, "t")
        after = client.change_settings(client.settings(), {"reason": "manual revised"})

    assert server.asked[1].headers["If-Match"] == '"3"'
    assert (after.number, after.etag) == (4, '"4"')
