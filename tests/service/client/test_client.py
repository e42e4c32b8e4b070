"""What the client sends again, with which key, and what it does not, against a server that does as told."""

import hashlib
import json
import shutil
import subprocess
import sys
from datetime import UTC, datetime
from decimal import Decimal
from pathlib import Path

import pytest

from service.client import (
    AnswerUnusable,
    Fault,
    Invalid,
    Load,
    MovedOn,
    NotAllowed,
    NotKnown,
    NotSignedIn,
    Patience,
    Refused,
    ServerFailed,
    StateNotSent,
    StepRefused,
    Tarebook,
    TooLarge,
    TooSoon,
    Unanswered,
    Unreadable,
)
from tests.service.client.told_server import LOAD, STORED, ToldServer, Turn, problem, telling

TOKEN = "tb_only-for-tests"
DROPPED = [Turn(cut="before"), Turn(201, LOAD, cut="within"), problem(409, "idempotency-key-in-flight")]
BUSY = [problem(429, "too-many-requests", Retry_After="7"), Turn(502, b"<html>"), problem(503, "unavailable")]


def client(server: ToldServer, waits: list[float], **patience: float) -> Tarebook:
    return Tarebook(server.address, TOKEN, patience=Patience(**patience), sleep=waits.append)


def a_load(etag: str = '"1"') -> Load:
    return Load("within", "d" * 64, {}, (), {}, LOAD["id"], "open", etag, None, None, False)


def test_what_got_no_answer_is_sent_again_word_for_word_under_the_same_key() -> None:
    waits: list[float] = []
    with telling(*DROPPED, *BUSY[1:], STORED) as server:
        load = client(server, waits).submit({"weight": Decimal("6.70"), "name": "Ærø"})

    assert (load.id, load.etag, load.verdict) == (LOAD["id"], '"1"', "within")
    assert len(server.asked) == 6
    assert len(set(server.keys())) == 1
    assert {(one.method, one.path, one.body) for one in server.asked} == {
        ("POST", "/api/v1/loads", '{"weight": "6.70", "name": "Ærø"}'.encode())
    }
    assert {one.headers["Authorization"] for one in server.asked} == {f"Bearer {TOKEN}"}
    assert waits == sorted(waits)
    assert all(0.25 * 2**turn <= wait <= 0.5 * 2**turn for turn, wait in enumerate(waits))


def test_two_intents_have_two_keys_and_a_given_key_is_used() -> None:
    with telling(STORED) as server:
        made = client(server, [])
        made.submit({})
        made.submit({})
        made.submit({}, key="flight-7")

    first, second, third = server.keys()
    assert (first != second, third) == (True, "flight-7")


def test_a_time_out_is_sent_again() -> None:
    with telling(Turn(stall_seconds=1.5), STORED) as server:
        load = client(server, [], answer_within=0.3).submit({})
        assert load.id == LOAD["id"]

    assert len(server.asked) == 2
    assert len(set(server.keys())) == 1


def test_the_wait_the_server_asks_for_is_kept() -> None:
    waits: list[float] = []
    with telling(problem(429, "too-many-requests", Retry_After="7"), STORED) as server:
        client(server, waits).submit({})

    assert waits == [7.0]


def test_a_wait_longer_than_ones_patience_is_not_kept_but_told() -> None:
    waits: list[float] = []
    with telling(problem(429, "locked-out", Retry_After="900")) as server, pytest.raises(TooSoon) as refused:
        client(server, waits).sign(a_load(), "prepared", "not it")

    assert (refused.value.wait_seconds, waits, len(server.asked)) == (900, [], 1)


REFUSALS = [
    (400, Unreadable),
    (401, NotSignedIn),
    (403, NotAllowed),
    (404, NotKnown),
    (409, StepRefused),
    (412, MovedOn),
    (413, TooLarge),
    (418, Refused),
    (422, Invalid),
    (428, StateNotSent),
    (500, ServerFailed),
    (504, ServerFailed),
]


@pytest.mark.parametrize(("status", "kind"), REFUSALS)
def test_a_refusal_that_waiting_does_not_mend_is_raised_at_once(status: int, kind: type[Refused]) -> None:
    waits: list[float] = []
    with telling(problem(status, "some-code")) as server, pytest.raises(Refused) as refused:
        client(server, waits).submit({}, key="flight-7")

    raised = refused.value
    assert (type(raised), raised.status, raised.code, raised.next_step) == (kind, status, "some-code", "wait")
    assert (raised.request, raised.key, waits, len(server.asked)) == ("r-1", "flight-7", [], 1)


def test_the_faults_of_a_refusal_are_named() -> None:
    errors = [{"pointer": "/crew/0/weight/unit", "code": "unit-missing", "detail": "use one of kg, lb"}]
    with (
        telling(Turn(422, {"code": "invalid", "errors": errors})) as server,
        pytest.raises(Invalid) as refused,
    ):
        client(server, []).submit({})

    assert refused.value.faults == (Fault("/crew/0/weight/unit", "unit-missing", "use one of kg, lb"),)
    assert "/crew/0/weight/unit: use one of kg, lb" in str(refused.value)


def test_when_no_answer_comes_the_key_is_told_so_that_it_can_be_sent_again_later() -> None:
    with telling(Turn(cut="before")) as server, pytest.raises(Unanswered) as lost:
        client(server, [], tries=3).submit({})

    assert len(server.asked) == 3
    assert {lost.value.key} == set(server.keys())
    with telling(STORED) as server:
        client(server, []).submit({}, key=lost.value.key)
    assert server.keys() == [lost.value.key]


def test_a_server_that_is_not_there_is_no_answer() -> None:
    with telling(STORED) as server:
        gone = client(server, [], tries=2)

    with pytest.raises(Unanswered, match="2 tries"):
        gone.submit({})


def test_every_step_sends_the_state_that_was_seen_and_nobody_is_overwritten_by_trying_again() -> None:
    with telling(problem(412, "state-moved-on")) as server:
        made, seen = client(server, []), a_load('"7"')
        for step in (
            lambda: made.revise(seen, {}, "bags"),
            lambda: made.withdraw(seen, "weather"),
            lambda: made.assess_again(seen),
            lambda: made.sign(seen, "accepted", "pw"),
            lambda: made.depart(seen, datetime(2026, 12, 1, 15, tzinfo=UTC)),
        ):
            with pytest.raises(MovedOn):
                step()

    assert [one.headers["If-Match"] for one in server.asked] == ['"7"'] * 5
    assert [one.path.rpartition("/")[2] for one in server.asked] == [
        "revisions",
        "withdrawal",
        "assessment",
        "signatures",
        "departure",
    ]
    assert json.loads(server.asked[4].body) == {"at": "2026-12-01T15:00:00+00:00"}


def test_a_departure_without_an_offset_is_never_sent() -> None:
    with telling(STORED) as server, pytest.raises(ValueError, match="offset"):
        client(server, []).depart(a_load(), datetime(2026, 12, 1, 15))  # noqa: DTZ001  # is what is refused

    assert server.asked == []


@pytest.mark.parametrize("number", [float("nan"), float("inf")])
def test_a_number_that_is_none_is_never_sent(number: float) -> None:
    with telling(STORED) as server, pytest.raises(ValueError, match="JSON"):
        client(server, []).submit({"weight": number})

    assert server.asked == []


def line(number: int) -> dict[str, object]:
    flight = {"reference": f"KT-{number}", "leg": 1, "departure": "2026-12-01T08:30:00-06:00"}
    some = {"state": "open", "step": 3, "replaces": None, "aircraft": "Q9-KTB", "verdict": "within"}
    return {"id": str(number), "digest": "d", "flight": flight, **some}


def test_a_list_is_followed_to_its_end_and_the_token_goes_to_nobody_else() -> None:
    first = Turn(200, {"loads": [line(1), line(2)]}, {"Link": '</api/v1/loads?limit=2&cursor=b>; rel="next"'})
    second = Turn(
        200, {"loads": [line(3)]}, {"Link": '<https://else.example/api/v1/loads?cursor=c>; rel="next"'}
    )
    with telling(first, second, Turn(200, {"loads": []})) as server:
        loads = list(client(server, []).loads(state="open", page_rows=2))

    assert [one.reference for one in loads] == ["KT-1", "KT-2", "KT-3"]
    assert {one.etag for one in loads} == {'"3"'}
    assert [one.path for one in server.asked] == [
        "/api/v1/loads?state=open&limit=2",
        "/api/v1/loads?limit=2&cursor=b",
        "/api/v1/loads?cursor=c",
    ]


def test_a_manifest_whose_bytes_are_not_those_named_is_refused() -> None:
    digest = hashlib.sha256(b"%PDF-1.7").hexdigest()
    with telling(
        Turn(200, b"%PDF-1.7", {"ETag": f'"{digest}"'}), Turn(200, b"%PDF-x", {"ETag": f'"{digest}"'})
    ) as s:
        made = client(s, [])
        paper = made.manifest(a_load())
        assert (paper.pdf, paper.digest) == (b"%PDF-1.7", digest)
        with pytest.raises(AnswerUnusable):
            made.manifest(a_load(), issue=2)

    assert [one.path.rpartition("/")[2] for one in s.asked] == ["manifest", "manifest?issue=2"]


@pytest.mark.parametrize("body", [b"<html>", b"[]", {"id": 1}])
def test_an_answer_of_another_form_is_no_load(body: object) -> None:
    with telling(Turn(201, body)) as server, pytest.raises(AnswerUnusable):
        client(server, []).submit({})


@pytest.mark.parametrize("address", ["", "tarebook.example", "ftp://x", "https://x?y", "https://"])
def test_an_address_that_is_none_is_refused(address: str) -> None:
    with pytest.raises(ValueError, match="address"):
        Tarebook(address, TOKEN)


def test_a_token_stands_in_no_text() -> None:
    made = Tarebook("https://tarebook.example.org", TOKEN)

    assert repr(made) == "Tarebook('https://tarebook.example.org')"


def test_the_folder_works_alone(tmp_path: Path) -> None:
    shutil.copytree(Path(__file__).parents[3] / "service" / "client", tmp_path / "service" / "client")
    program = (
        f"import sys; sys.path.insert(0, {str(tmp_path)!r}); "
        "import service.client as c; print(c.Tarebook, c.__file__)"
    )

    # -I -S: no packages but the standard library, and nothing of where this runs.
    ran = subprocess.run(
        [sys.executable, "-I", "-S", "-c", program], capture_output=True, text=True, check=False, cwd=tmp_path
    )

    place = tmp_path / "service" / "client" / "__init__.py"
    said = f"<class 'service.client.tarebook.Tarebook'> {place}"
    assert (ran.returncode, ran.stdout.strip()) == (0, said), ran.stderr
