"""One try over the network: to the judged number, under the right name, bounded, and nowhere else."""

import socket
import time

import pytest

from records.webhooks import sending
from records.webhooks.addresses import Receiver
from records.webhooks.sending import Outcome, resolve, send
from tests.records.webhooks.receiver import certificate, running

BODY = b'{"type":"load.rejected"}'
NAME = "hooks.example.test"


def at_home(_host: str, _port: int) -> tuple[str, ...]:
    return ("127.0.0.1",)


def try_to(port: int, *, scheme: str = "http", trusted: bool = True, host: str = NAME, **more) -> Outcome:
    receiver = Receiver(scheme, host, port, "/in?a=b")
    return send(receiver, BODY, {"webhook-id": "1"}, trusted=trusted, **{"resolving": at_home, **more})


def test_a_receiver_that_answers_2xx_has_taken_it():
    with running() as told:
        told.status = 204

        outcome = try_to(told.port)

    assert outcome == Outcome("delivered", 204)
    (request,) = told.received
    assert (request.path, request.body) == ("/in?a=b", BODY)
    assert request.headers["Host"] == f"{NAME}:{told.port}"
    assert request.headers["Content-Type"] == "application/json"
    assert request.headers["webhook-id"] == "1"


@pytest.mark.parametrize(
    ("status", "name"),
    [
        (301, "redirected"),
        (307, "redirected"),
        (404, "refused"),
        (410, "gone"),
        (500, "refused"),
        (199, "refused"),
    ],
)
def test_anything_else_is_a_failure(status, name):
    with running() as told:
        told.status, told.headers = status, {"Location": f"http://127.0.0.1:{told.port}/elsewhere"}

        outcome = try_to(told.port)

    assert (outcome.name, outcome.status) == (name, status)
    assert told.connections == 1  # a redirect is not followed


@pytest.mark.parametrize(
    ("asked", "seconds"), [("120", 120), ("-1", None), ("soon", None), ("9999999", None)]
)
def test_a_receiver_may_name_a_wait(asked, seconds):
    with running() as told:
        told.status, told.headers = 429, {"Retry-After": asked}

        outcome = try_to(told.port)

    assert (outcome.asked.total_seconds() if outcome.asked else None) == seconds


def test_a_receiver_that_stalls_is_given_up(monkeypatch):
    monkeypatch.setattr(sending, "SILENCE_SECONDS", 0.3)
    with running() as told:
        told.stall_seconds = 1.0
        begun = time.monotonic()

        outcome = try_to(told.port)

    assert outcome.name == "timed-out"
    assert time.monotonic() - begun < 0.9


@pytest.mark.parametrize("scheme", ["http", "https"])
def test_a_receiver_that_drips_is_cut_off(monkeypatch, tmp_path, scheme):
    monkeypatch.setattr(sending, "WHOLE_SECONDS", 0.5)
    server, client = certificate(tmp_path, NAME)
    with running(server if scheme == "https" else None) as told:
        told.drip = True
        begun = time.monotonic()

        outcome = try_to(told.port, scheme=scheme, tls=client)

    assert outcome.name == "timed-out"
    assert time.monotonic() - begun < 2


def test_nobody_listening_is_a_failure():
    with socket.socket() as free:
        free.bind(("127.0.0.1", 0))
        port = free.getsockname()[1]

    assert try_to(port).name == "not-connected"


def test_what_is_no_http_is_a_failure():
    with socket.create_server(("127.0.0.1", 0)) as plain:
        plain.settimeout(5)
        port = plain.getsockname()[1]
        import threading  # noqa: PLC0415  # only here

        def answer() -> None:
            with plain.accept()[0] as one:
                one.recv(4096)
                one.sendall(b"hello\r\n\r\n")

        thread = threading.Thread(target=answer)
        thread.start()
        outcome = try_to(port)
        thread.join()

    assert outcome.name == "answer-unreadable"


@pytest.mark.parametrize(
    "numbers",
    [
        ("127.0.0.1",),
        ("::1",),
        ("10.0.0.1",),
        ("169.254.169.254",),
        ("::ffff:127.0.0.1",),
        ("8.8.8.8", "127.0.0.1"),
    ],
)
def test_a_name_that_resolves_to_an_address_that_is_not_public_is_never_called(monkeypatch, numbers):
    called = []
    monkeypatch.setattr(socket, "create_connection", lambda *a, **_: called.append(a))
    with running() as told:
        outcome = try_to(told.port, trusted=False, resolving=lambda _h, _p: numbers)

    assert (outcome.name, called, told.connections) == ("address-refused", [], 0)


def test_a_name_is_resolved_once_and_the_connection_goes_to_that_number(monkeypatch):
    """A name that resolves otherwise a moment later (rebinding) changes nothing."""
    asked, called = [], []

    def first_public_then_home(_host: str, _port: int) -> tuple[str, ...]:
        asked.append(1)
        return ("8.8.8.8",) if len(asked) == 1 else ("127.0.0.1",)

    def refuse(place: tuple[str, int], timeout: float) -> socket.socket:
        called.append(place)
        raise ConnectionRefusedError

    monkeypatch.setattr(socket, "create_connection", refuse)
    outcome = try_to(443, trusted=False, resolving=first_public_then_home)

    assert outcome.name == "not-connected"
    assert (len(asked), called) == (1, [("8.8.8.8", 443)])


def test_under_tls_the_name_is_asked_for_and_checked_though_the_number_is_called(tmp_path):
    server, client = certificate(tmp_path, NAME)
    with running(server) as told:
        right = try_to(told.port, scheme="https", tls=client)
        wrong = try_to(told.port, scheme="https", tls=client, host="other.example.test")
        unknown = try_to(told.port, scheme="https")

    assert right == Outcome("delivered", 200)
    assert told.names_asked_for[0] == NAME
    assert (wrong.name, unknown.name) == ("tls-refused", "tls-refused")
    assert "other.example.test" in wrong.detail
    assert len(told.received) == 1


def test_a_name_without_an_address_is_a_failure():
    def nowhere(_host: str, _port: int) -> tuple[str, ...]:
        raise socket.gaierror

    assert try_to(1, resolving=nowhere).name == "not-resolved"
    assert try_to(1, resolving=lambda _h, _p: ()).name == "not-connected"


def test_the_resolver_gives_each_number_once():
    assert resolve("127.0.0.1", 80) == ("127.0.0.1",)


def test_numbers_in_other_spellings_are_judged_as_what_they_are():
    # getaddrinfo reads these as IPv4 numbers; what it makes of them is what is judged.
    for spelling in ("2130706433", "0x7f.1", "127.1"):
        outcome = try_to(1, host=spelling, trusted=False, resolving=resolve)
        assert outcome.name == "address-refused"


def test_proxies_of_the_environment_are_not_asked(monkeypatch):
    monkeypatch.setenv("http_proxy", "http://127.0.0.1:1")
    with running() as told:
        assert try_to(told.port).delivered
