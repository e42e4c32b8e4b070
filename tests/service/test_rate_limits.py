"""So many requests a minute and no more, counted by a real broker; without one nobody is limited.

The form of the headers is that of draft-ietf-httpapi-ratelimit-headers-10 (remembered, not read).
"""

import json
import logging
import math
import re
import time
from collections.abc import Iterator
from concurrent.futures import ThreadPoolExecutor
from datetime import timedelta
from pathlib import Path

import pytest
from django.test import Client

from fleet.actions.issue_token import issue_token
from service import allowed, pace
from service.embedded import valkey
from tests.cast import actor, browser, cast

pytestmark = [pytest.mark.django_db]
LOADS = "/api/v1/loads"


@pytest.fixture(scope="module")
def broker(tmp_path_factory) -> Iterator[str]:
    running = valkey.start(Path(tmp_path_factory.mktemp("broker")) / "valkey")
    yield running.url
    valkey.stop(running)


@pytest.fixture(autouse=True)
def rested(monkeypatch):
    monkeypatch.setattr(pace, "_rest", pace._Rest())


@pytest.fixture
def limits(broker, settings, request):
    """Limits of this test, on an empty broker."""
    pace._client(broker).flushall()
    settings.BROKER_URL = broker
    settings.RATE_LIMITS = {"known": 100, "stranger": 3, "sign-in": 2, "signing": 2}
    return settings.RATE_LIMITS


def _secret(person):
    made = issue_token(
        actor(person),
        person,
        label="desk",
        scopes=["read"],
        grantable=allowed.grantable(("pilot",), integration=False),
        valid_for=timedelta(days=1),
        integration=False,
    )
    return made.secret


def _ask(secret="", address="192.0.2.1", path=LOADS):
    headers = {"Authorization": f"Bearer {secret}"} if secret else {}
    return Client(REMOTE_ADDR=address).get(path, headers=headers)


def test_a_stranger_is_refused_with_a_problem_body_that_states_the_wait(limits):
    assert [_ask().status_code for _ in range(3)] == [401, 401, 401]

    refused = _ask()

    body = json.loads(refused.content)
    assert (refused.status_code, body["status"], body["code"]) == (429, 429, "too-many-requests")
    assert refused["Content-Type"] == "application/problem+json"
    assert body["request"] == refused["X-Request-ID"]
    # Three a minute: after three at once there is room again in twenty seconds.
    assert 15 <= int(refused["Retry-After"]) <= 20
    assert refused["RateLimit-Policy"] == '"stranger";q=3;w=60'
    assert re.fullmatch(r'"stranger";r=0;t=(5\d|60)', refused["RateLimit"])


def test_each_answer_tells_what_is_left(limits):
    left = [re.search(r";r=(\d+)", _ask()["RateLimit"])[1] for _ in range(3)]

    assert left == ["2", "1", "0"]


def test_an_address_is_limited_alone_and_an_ipv6_one_with_its_network(limits):
    for _ in range(4):
        _ask(address="192.0.2.1")
        _ask(address="2001:db8::1")

    assert _ask(address="192.0.2.1").status_code == 429
    assert _ask(address="192.0.2.2").status_code == 401
    assert _ask(address="2001:db8::ffff").status_code == 429
    assert _ask(address="2001:db8:0:1::1").status_code == 401


def test_behind_a_proxy_the_address_is_the_one_the_proxy_added(limits, settings):
    settings.BEHIND_PROXY = True

    def asked(forwarded):
        return Client(REMOTE_ADDR="10.0.0.1").get(LOADS, headers={"X-Forwarded-For": forwarded}).status_code

    assert [asked(f"198.51.100.{n}, 192.0.2.7") for n in range(4)] == [401, 401, 401, 429]
    assert asked("192.0.2.7, 192.0.2.8") == 401


def test_a_token_that_served_has_an_allowance_of_its_own_wherever_it_comes_from(limits):
    secret = _secret(cast().pilot)

    first = _ask(secret)
    begun = time.monotonic()
    then = [_ask(secret, address=f"192.0.2.{n % 3}") for n in range(10)]
    came_back = math.ceil((time.monotonic() - begun) * 100 / 60)  # the allowance grows while it is used

    assert '"stranger"' in first["RateLimit-Policy"]  # nobody knew yet whose it was
    assert {answer.status_code for answer in then} == {200}
    assert {answer["RateLimit-Policy"] for answer in then} == {'"known";q=100;w=60'}
    assert 90 <= int(re.search(r";r=(\d+);", then[-1]["RateLimit"])[1]) <= 90 + came_back


def test_guessed_tokens_are_charged_to_the_address_they_come_from(limits):
    found = [_ask(f"tb_{'guess' * 8}{n}").status_code for n in range(5)]

    assert found == [401, 401, 401, 429, 429]


def test_the_limit_of_a_known_token_holds(limits):
    limits["known"] = 4
    secret = _secret(cast().pilot)
    _ask(secret)

    assert [_ask(secret).status_code for _ in range(5)] == [200, 200, 200, 200, 429]


def test_two_browsers_of_one_person_share_an_allowance(limits):
    limits["known"] = 4
    person = cast().pilot
    one, other = browser(person), browser(person)
    one.get("/"), other.get("/")

    assert [client.get("/").status_code for client in (one, other, one, other, one)] == [200] * 4 + [429]


def test_signing_in_is_stricter_and_answered_with_a_page(limits):
    limits["stranger"] = 100

    def tried():
        form = {"login": "nobody.here", "password": "quiet-harbour-42"}
        return Client(REMOTE_ADDR="192.0.2.1").post("/sign-in", form)

    assert [tried().status_code for _ in range(2)] == [422, 422]
    refused = tried()
    assert refused.status_code == 429
    assert refused["Content-Type"].startswith("text/html")
    assert b"Send it again in" in refused.content
    assert int(refused["Retry-After"]) > 0
    assert Client(REMOTE_ADDR="192.0.2.1").get("/sign-in").status_code == 200


def test_a_refused_request_is_charged_to_no_allowance(limits):
    limits["stranger"] = 100
    client = Client(REMOTE_ADDR="192.0.2.1")
    form = {"login": "nobody.here", "password": "quiet-harbour-42"}
    before = [client.post("/sign-in", form) for _ in range(2)][-1]["RateLimit"]

    refused = client.post("/sign-in", form)

    def left(told):
        return re.findall(r'"([\w-]+)";r=(\d+)', told)

    assert left(refused["RateLimit"]) == left(before) == [("stranger", "98"), ("sign-in", "0")]


def test_signing_by_token_is_stricter(limits):
    secret = _secret(cast().pilot)
    _ask(secret)
    address = f"{LOADS}/018f0000-0000-7000-8000-000000000000/signatures"

    def signed():
        headers = {"Authorization": f"Bearer {secret}", "Idempotency-Key": "k"}
        return Client().post(address, b"{}", content_type="application/json", headers=headers)

    answers = [signed() for _ in range(3)]
    assert [answer.status_code == 429 for answer in answers] == [False, False, True]
    assert '"signing";q=2;w=60' in answers[0]["RateLimit-Policy"]


@pytest.mark.parametrize("path", ["/health", "/health/alive", "/api/v1/health", "/static/css/tarebook.css"])
def test_health_and_what_is_served_as_it_stands_are_exempt(limits, path):
    answers = [_ask(path=path) for _ in range(6)]
    for answer in answers:
        answer.close()

    assert 429 not in {answer.status_code for answer in answers}
    assert not any("RateLimit" in answer for answer in answers)


def test_no_limit_is_no_limit(limits):
    limits["stranger"] = 0

    answers = [_ask() for _ in range(10)]

    assert {answer.status_code for answer in answers} == {401}
    assert "RateLimit" not in answers[-1]


def test_many_at_once_never_get_more_than_there_is(limits):
    """One script, one step: of 60 at the same time exactly 20 go on."""
    limits["stranger"] = 20

    def one(_n):
        return pace.asked("", "192.0.2.9", ()).refused

    with ThreadPoolExecutor(12) as pool:
        refused = list(pool.map(one, range(60)))

    # A sixtieth of a minute at most has passed, which frees no place of twenty in three seconds.
    assert refused.count("") == 20
    assert refused.count("stranger") == 40


def test_room_comes_back_evenly(limits):
    limits["stranger"] = 120  # one each half second
    used = [pace.asked("", "192.0.2.10", ()).refused for _ in range(125)]
    time.sleep(1.2)

    again = [pace.asked("", "192.0.2.10", ()).refused for _ in range(8)]

    assert used[-1] == again[-1] == "stranger"
    assert 2 <= again.count("") <= 4


def test_without_a_broker_nobody_is_limited_and_that_is_said_once_a_minute(settings, caplog, monkeypatch):
    settings.BROKER_URL = "redis+socket:///nonexistent/valkey.sock"
    settings.RATE_LIMITS = {"known": 1, "stranger": 1, "sign-in": 1, "signing": 1}
    now = [1000.0]
    monkeypatch.setattr(pace, "_now", lambda: now[0])

    with caplog.at_level(logging.WARNING, logger="service.pace"):
        for _ in range(20):
            assert _ask().status_code == 401
            now[0] += 6.0

    # Twenty requests in two minutes, each of which asked the broker in vain.
    assert [record.message.partition(":")[0] for record in caplog.records] == [
        "broker not reached (ConnectionError)"
    ] * 2


def test_a_broker_that_fails_is_left_alone_for_some_seconds(settings, monkeypatch):
    settings.BROKER_URL = "redis+socket:///nonexistent/valkey.sock"
    tries = []
    monkeypatch.setattr(
        pace, "_script", lambda address: tries.append(address) or (_ for _ in ()).throw(OSError())
    )

    for _ in range(5):
        pace.asked("", "192.0.2.1", ())

    assert len(tries) == 1
