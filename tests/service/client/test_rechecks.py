"""What the client asks for when loads are to be computed again, and what it makes of the answers."""

import json
from datetime import UTC, datetime

import pytest

from service.client import AnswerUnusable, Tarebook
from tests.service.client.told_server import Turn, telling

NUMBER = "01a23107-3d72-7a66-8157-3ea0a197a14a"
ROW = {
    "load": NUMBER,
    "aircraft": "Q9-KTB",
    "reference": "KT-214",
    "leg": 1,
    "departure": "2026-12-01T08:30:00-06:00",
    "signed_verdict": "within",
    "verdict_now": "outside",
    "limit": "ramp weight",
    "excess": "93 lb above the limit",
}
STANDS = {
    "id": NUMBER,
    "state": "running",
    "progress": {"loads": 3, "done": 1},
    "counts": {"same": 1},
    "flights": [ROW],
}


def client(server) -> Tarebook:
    return Tarebook(server.address, "tb_only-for-tests")


def test_only_what_was_named_is_sent() -> None:
    with telling(Turn(202, STANDS)) as server:
        asked = client(server).ask_recheck(
            "Q9-KTB", empty_weight=NUMBER, since=datetime(2026, 1, 1, tzinfo=UTC), key="one"
        )

    assert (asked.state, asked.loads, asked.done) == ("running", 3, 1)
    assert json.loads(server.asked[0].body) == {
        "aircraft": "Q9-KTB",
        "empty_weight": NUMBER,
        "from": "2026-01-01T00:00:00+00:00",
    }
    assert server.keys() == ["one"]


def test_the_table_is_read_page_by_page() -> None:
    link = {"Link": f'</api/v1/rechecks/{NUMBER}?after=0.7>; rel="next"'}
    with telling(Turn(200, STANDS, link), Turn(200, STANDS)) as server:
        flights = list(client(server).rechecked_flights(NUMBER))

    assert [one.verdict_now for one in flights] == ["outside", "outside"]
    assert server.asked[1].path == f"/api/v1/rechecks/{NUMBER}?after=0.7"


def test_the_csv_is_text() -> None:
    with telling(Turn(200, b"load,aircraft\r\n")) as server:
        assert client(server).recheck_table(NUMBER) == "load,aircraft\r\n"
    assert server.asked[0].headers["Accept"] == "text/csv"
    with telling(Turn(200, b"\xff")) as server, pytest.raises(AnswerUnusable):
        client(server).recheck_table(NUMBER)


def test_an_answer_of_another_form_and_an_instant_without_offset_are_refused() -> None:
    with telling(Turn(200, {"id": NUMBER})) as server:
        with pytest.raises(AnswerUnusable):
            client(server).recheck(NUMBER)
        with pytest.raises(ValueError, match="offset"):
            client(server).ask_recheck(since=datetime(2026, 1, 1))  # noqa: DTZ001  # the point
