"""The client asks for what `service/openapi.json` describes, and reads what is answered by it."""

import dataclasses
import inspect
import json
import re
from collections.abc import Callable
from contextlib import suppress
from datetime import UTC, datetime
from pathlib import Path
from typing import Any, get_type_hints, is_typeddict
from urllib.parse import parse_qs

import pytest

from service.client import (
    Act,
    AnswerUnusable,
    Check,
    LatePreview,
    Load,
    Note,
    Person,
    Provision,
    RecheckedFlight,
    Remedies,
    Remedy,
    Settings,
    Tarebook,
    Token,
    documents,
)
from service.client.shapes import Aircraft, Delivery, LoadLine, Subscription, Version
from tests.service.client.told_server import Turn, telling

DESCRIBED: dict[str, Any] = json.loads(
    (Path(__file__).parents[3] / "service" / "openapi.json").read_text("utf-8")
)
SHAPES = DESCRIBED["components"]["schemas"]
DOCUMENTS = [
    one for one in vars(documents).values() if is_typeddict(one) and one.__module__ == documents.__name__
]
NOT_IN_ANSWER = {"body", "etag"}  # the client's own


@pytest.mark.parametrize("document", DOCUMENTS, ids=lambda one: one.__name__)
def test_a_document_has_the_fields_described(document: Any) -> None:
    described = SHAPES[document.__name__]

    assert set(get_type_hints(document)) == set(described["properties"])
    assert document.__required_keys__ == set(described.get("required", ()))


@pytest.mark.parametrize(
    ("shape", "name"),
    [
        (Check, "Check"),
        (Aircraft, "AircraftLine"),
        (Version, "LoadingBasisLine"),
        (Version, "EmptyWeightLine"),
        (Delivery, "DeliveryAnswer"),
        (RecheckedFlight, "RecheckedFlight"),
        (Remedies, "LoadRemedies"),
        (Remedy, "Remedy"),
        (LatePreview, "LatePreview"),
        (Note, "NoteAnswer"),
        (Act, "ActLine"),
        (Person, "PersonLine"),
        (Token, "TokenLine"),
        (Settings, "SettingsAnswer"),
    ],
)
def test_what_is_read_is_always_answered(shape: Any, name: str) -> None:
    fields = {field.name for field in dataclasses.fields(shape)} - NOT_IN_ANSWER

    assert fields - set(SHAPES[name]["required"]) == set()


def test_a_load_and_a_line_of_the_list_are_always_answered_with_what_is_read() -> None:
    computed = {"verdict", "digest", "governing", "checks"}
    assert computed - set(SHAPES["AssessedAnswer"]["required"]) == set()
    assert computed | {"id", "state", "replaces", "manifest"} <= set(SHAPES["LoadAnswer"]["required"])
    of_flight = {"reference", "leg", "departure"}
    line = {field.name for field in dataclasses.fields(LoadLine)} - NOT_IN_ANSWER - of_flight
    assert line | {"step", "flight"} <= set(SHAPES["LoadSummary"]["required"])
    assert of_flight <= set(SHAPES["Flight"]["required"])


NUMBER = "01a23107-3d72-7a66-8157-3ea0a197a14a"
SEEN = Load("within", "d", {}, (), {}, NUMBER, "open", '"1"', None, None, False)
VERSION = Version(NUMBER, "d", {})
HOOK = Subscription(NUMBER, "https://x.example", ("load.rejected",), "live")
LAID = Provision(NUMBER, "permit", 1, "2026-01-01T00:00:00Z", None, False, False, "d", {})
PREVIEW = LatePreview("within", "d", 2, (), "", {})
PERSON = Person(7, "r.amani", "R. Amani", True, ())
TOKEN = Token(3, "planner", "person:7", True, (), {})
AT = datetime(2026, 12, 1, tzinfo=UTC)
CALLS: dict[str, Callable[[Tarebook], object]] = {
    "assess": lambda made: made.assess({}),
    "submit": lambda made: made.submit({}),
    "revise": lambda made: made.revise(SEEN, {}, "bags"),
    "assess_again": lambda made: made.assess_again(SEEN),
    "sign": lambda made: made.sign(SEEN, "prepared", "pw"),
    "withdraw": lambda made: made.withdraw(SEEN, "weather"),
    "depart": lambda made: made.depart(SEEN, AT),
    "load": lambda made: made.load(NUMBER),
    "loads": lambda made: list(
        made.loads(
            aircraft="Q9-KTB",
            departing_from=AT,
            departing_before=AT,
            state="open",
            verdict="within",
            reference="K",
        )
    ),
    "manifest": lambda made: made.manifest(SEEN, issue=1),
    "aircraft": lambda made: made.aircraft(),
    "one_aircraft": lambda made: made.one_aircraft("Q9/KTB"),
    "empty_weights": lambda made: made.empty_weights("Q9-KTB", at=AT, as_known_at=AT),
    "enter_aircraft": lambda made: made.enter_aircraft({}),
    "enter_loading_basis": lambda made: made.enter_loading_basis("Q9-KTB", {}),
    "approve_loading_basis": lambda made: made.approve_loading_basis("Q9-KTB", VERSION, "seen", true_from=AT),
    "enter_empty_weight": lambda made: made.enter_empty_weight("Q9-KTB", {}),
    "approve_empty_weight": lambda made: made.approve_empty_weight("Q9-KTB", VERSION, "seen"),
    "provisions": lambda made: made.provisions("restrictions", "Q9-KTB", at=AT, as_known_at=AT),
    "enter_provision": lambda made: made.enter_provision("standard-weights", {}),
    "approve_provision": lambda made: made.approve_provision("permits", LAID, "seen", "Q9-KTB"),
    "end_provision": lambda made: made.end_provision("restrictions", LAID, "fixed", "Q9-KTB", true_from=AT),
    "preview_late_change": lambda made: made.preview_late_change(SEEN, {}),
    "change_late": lambda made: made.change_late(SEEN, {}, PREVIEW, "pw"),
    "write_note": lambda made: made.write_note(SEEN, "a bag too many"),
    "ask_recheck": lambda made: made.ask_recheck("Q9-KTB", empty_weight=NUMBER, since=AT, reason="scale"),
    "remedies": lambda made: made.remedies(NUMBER),
    "recheck": lambda made: made.recheck(NUMBER),
    "rechecked_flights": lambda made: list(made.rechecked_flights(NUMBER)),
    "recheck_table": lambda made: made.recheck_table(NUMBER),
    "trail": lambda made: list(
        made.trail(about="load:1", actor="person:7", kind="accept-load", since=AT, before=AT)
    ),
    "entry": lambda made: made.entry(NUMBER),
    "who_am_i": lambda made: made.who_am_i(),
    "people": lambda made: made.people(),
    "person": lambda made: made.person(7),
    "enter_person": lambda made: made.enter_person({}),
    "change_duty": lambda made: made.change_duty(PERSON, "pilot", "checked out", granted=True, since=AT),
    "deactivate": lambda made: made.deactivate(PERSON, "left"),
    "tokens": lambda made: made.tokens(),
    "revoke_token": lambda made: made.revoke_token(TOKEN, "lost"),
    "settings": lambda made: made.settings(at=AT, as_known_at=AT),
    "change_settings": lambda made: made.change_settings(Settings(1, '"1"', {}), {}),
    "webhooks": lambda made: made.webhooks(),
    "subscribe": lambda made: made.subscribe("https://x.example", ["load.rejected"]),
    "new_webhook_secret": lambda made: made.new_webhook_secret(HOOK),
    "resume_webhook": lambda made: made.resume_webhook(HOOK),
    "end_webhook": lambda made: made.end_webhook(HOOK),
    "deliveries": lambda made: list(made.deliveries(HOOK, state="parked")),
    "replay": lambda made: made.replay(HOOK, Delivery(NUMBER, "m", "load.rejected", "load:1", "parked")),
}


def test_every_method_is_tried_here() -> None:
    public = {name for name, _ in inspect.getmembers(Tarebook, inspect.isfunction) if name[0] != "_"}

    assert set(CALLS) == public


@pytest.mark.parametrize("name", CALLS)
def test_a_method_asks_for_what_is_described_with_all_that_is_required(name: str) -> None:
    with telling(Turn(200, {})) as server, suppress(AnswerUnusable):
        CALLS[name](Tarebook(server.address, "t"))  # an empty answer is enough: what counts is what was asked

    (asked,) = server.asked
    path, _, query = asked.path.partition("?")
    (operation,) = [
        operations[asked.method.lower()]
        for form, operations in DESCRIBED["paths"].items()
        if re.fullmatch(re.sub(r"\{\w+\}", "[^/.]+", form), path) and asked.method.lower() in operations
    ]
    parameters = operation.get("parameters", ())
    headers = {one["name"] for one in parameters if one["in"] == "header" and one.get("required")}
    assert headers - set(asked.headers) == set()
    assert set(parse_qs(query)) - {one["name"] for one in parameters if one["in"] == "query"} == set()
    assert ("requestBody" in operation) == bool(asked.body)
