"""Who may do what: one row for each method at each address, written by hand and compared with the program.

A row says which roles may, what somebody who may is answered to the valid request of the row, and by which
ways: `session` alone (a token is refused), `person` (a session or a person's own token), `any` (a program's
token, too). Where what is sent decides, an operation has several rows, told apart by `case`.
"""

from collections.abc import Callable
from typing import Any, Final

from django.utils import timezone

from tests.cast import PASSWORD
from tests.loads.late import BAG, change_of
from tests.loads.making import load_document, signing
from tests.makers import basis_document, empty_weight_document
from tests.pure.fleet.cabins import cabin
from tests.service.permission_provisions import PROVISIONS
from tests.service.permission_rows import (
    ACCEPT,
    APPROVE,
    CONFIRM,
    DECLARE,
    ENTER,
    EVERY,
    EVERYBODY,
    LOOK_AT_PEOPLE,
    MANAGE,
    NOTE,
    OWN,
    PREPARE,
    SUBSCRIBE,
    Row,
    Send,
    Sent,
    name_of,
    named,
    version,
)
from tests.service.permission_world import ADDRESS, World


def _load(state: str, body: Any = None, *, step: bool = True) -> Send:
    """This function will return what sends a document about the load in that state, with the step seen."""

    def send(world: World, role: str) -> Sent:
        current = world.loads[state]
        sent = body(world, role) if callable(body) else body
        headers = {"If-Match": f'"{current.step.number}"'} if step else {}
        return Sent(at={"load": str(current.load.id)}, body=sent, headers=headers)

    return send


def _document(world: World, _role: str) -> dict[str, Any]:
    return load_document(world.people, aircraft=world.aircraft)


def _recheck(world: World, _role: str) -> Sent:
    return Sent(body={"aircraft": world.aircraft, "reason": "scale was off"})


def _sent_document(world: World, role: str) -> Sent:
    return Sent(body=_document(world, role))


def _signature(meaning: str, state: str) -> Send:
    return _load(
        state,
        lambda world, _role: {
            "meaning": meaning,
            "digest": signing(world.loads[state]).digest,
            "password": PASSWORD,
        },
    )


def _late(world: World, _role: str) -> dict[str, Any]:
    return {**change_of(BAG), "digest": world.names["late digest"], "password": PASSWORD}


def _asked(**query: Callable[[World], str]) -> Send:
    return lambda world, _role: Sent(
        query={name.replace("_", "-"): ask(world) for name, ask in query.items()}
    )


def _open(world: World) -> str:
    return f"load:{world.loads['open'].load.id}"


def _aircraft(world: World) -> str:
    return world.aircraft


def _new_aircraft(_world: World, _role: str) -> Sent:
    body = {
        "registration": "Q9-NEW",
        "type": "Fenlark 9",
        "serial_number": "9-new",
        "category": "aeroplane",
        "engines": 2,
        "passenger_seats": 4,
    }
    return Sent(body=body)


def _new_token(_world: World, role: str) -> Sent:
    return Sent(
        body={"label": "another", "scopes": ["read"], "days": 3, "integration": role == "integration"}
    )


NEW_PERSON: Final = {"login": "new.person", "name": "N. Person", "password": "slow-copper-meadow-4"}
DUTY: Final = {"role": "pilot", "granted": True, "reason": "checked out"}
WHY: Final = {"reason": "no longer needed"}
SUBSCRIPTION: Final = {"address": f"{ADDRESS}new", "events": ["load.accepted"], "label": "new"}
NEW_PASSWORD: Final = {"current": PASSWORD, "new": "slow-copper-meadow-4"}
ONE: Final = "/api/v1/aircraft/{registration}"
LOAD: Final = "/api/v1/loads/{load}"
HOOK: Final = "/api/v1/webhooks/{webhook}"


def _departure(_world: World, _role: str) -> dict[str, str]:
    return {"at": timezone.now().isoformat()}


def _of_settings(_world: World, _role: str) -> Sent:
    return Sent(body={"reason": "manual revised", "operations_mail": []}, headers={"If-Match": '"1"'})


def _hook(name: str, *more: str, body: Any = None) -> Send:
    def send(world: World, role: str) -> Sent:
        at = {"webhook": world.names[name]} | {one: name_of(world, role, one) for one in more}
        return Sent(at=at, body=body)

    return send


API: tuple[Row, ...] = (
    Row("GET", "/api/v1/health", EVERYBODY, 200),
    Row("GET", "/api/v1/openapi.json", EVERYBODY, 200),
    Row("GET", "/api/v1/me", EVERY, 200),
    Row(
        "POST",
        "/api/v1/me/mail",
        OWN,
        200,
        lambda _w, _r: Sent(body={"mail": "r.amani@example.org"}),
        "session",
    ),
    Row("POST", "/api/v1/me/password", OWN, 200, lambda _w, _r: Sent(body=NEW_PASSWORD), "session"),
    Row("POST", "/api/v1/me/sessions/ending", OWN, 200, way="session"),
    Row("GET", "/api/v1/people", LOOK_AT_PEOPLE, 200, way="person"),
    Row("POST", "/api/v1/people", MANAGE, 201, lambda _w, _r: Sent(body=NEW_PERSON), "person"),
    Row("GET", "/api/v1/people/{person}", LOOK_AT_PEOPLE, 200, named("person"), "person", 404),
    Row("POST", "/api/v1/people/{person}/duties", MANAGE, 201, named("person", body=DUTY), "person", 404),
    Row(
        "POST", "/api/v1/people/{person}/deactivation", MANAGE, 200, named("person", body=WHY), "person", 404
    ),
    Row("GET", "/api/v1/tokens", EVERY, 200),
    Row("POST", "/api/v1/tokens", OWN, 201, _new_token, "session"),
    Row(
        "POST",
        "/api/v1/tokens/{token}/rotation",
        OWN,
        201,
        named("token", body={"overlap_hours": 1, "days": 3}),
        "session",
        404,
    ),
    Row("POST", "/api/v1/tokens/{token}/revocation", OWN, 200, named("token", body=WHY), "person", 404),
    Row("GET", "/api/v1/settings", EVERY, 200),
    Row("POST", "/api/v1/settings", MANAGE, 201, _of_settings, "person"),
    Row("GET", "/api/v1/aircraft", EVERY, 200),
    Row("POST", "/api/v1/aircraft", ENTER, 201, _new_aircraft),
    Row("GET", ONE, EVERY, 200, named("registration"), foreign=404),
    Row("GET", f"{ONE}/configurations", EVERY, 200, named("registration"), foreign=404),
    *PROVISIONS,
    Row("GET", f"{ONE}/loading-bases", EVERY, 200, named("registration"), foreign=404),
    Row(
        "POST",
        f"{ONE}/loading-bases",
        ENTER,
        201,
        lambda w, _r: Sent(at={"registration": w.aircraft}, body=basis_document()),
        foreign=404,
    ),
    Row("GET", f"{ONE}/loading-bases/{{version}}", EVERY, 200, version("basis"), foreign=404),
    Row("POST", f"{ONE}/loading-bases/{{version}}/approval", APPROVE, 201, version("basis"), "person", 404),
    Row("GET", f"{ONE}/empty-weights", EVERY, 200, named("registration"), foreign=404),
    Row("GET", f"{ONE}/empty-weights/{{version}}", EVERY, 200, version("weight"), foreign=404),
    Row("POST", f"{ONE}/empty-weights/{{version}}/approval", APPROVE, 201, version("weight"), "person", 404),
    Row(
        "POST",
        f"{ONE}/weighings",
        ENTER,
        201,
        lambda w, _r: Sent(at={"registration": w.aircraft}, body=empty_weight_document(report="W-2026-9")),
        foreign=404,
    ),
    Row(
        "POST",
        f"{ONE}/seating-variations",
        EVERY,
        200,
        lambda w, _r: Sent(at={"registration": w.aircraft}, body=cabin()),
        foreign=404,
    ),
    Row("POST", "/api/v1/assessments", EVERY, 200, _sent_document, foreign=422),
    Row("GET", "/api/v1/loads", EVERY, 200, _asked(aircraft=_aircraft)),
    Row("POST", "/api/v1/loads", DECLARE, 201, _sent_document, foreign=422),
    Row("GET", LOAD, EVERY, 200, named("load"), foreign=404),
    Row(
        "POST",
        f"{LOAD}/revisions",
        DECLARE,
        201,
        _load("open", lambda w, r: _document(w, r) | {"reason": "one bag more"}),
        foreign=404,
    ),
    Row("POST", f"{LOAD}/assessment", DECLARE, 200, _load("stale"), foreign=404),
    Row(
        "POST",
        f"{LOAD}/signatures",
        PREPARE,
        200,
        _signature("prepared", "open"),
        "person",
        404,
        "prepared",
    ),
    Row(
        "POST",
        f"{LOAD}/signatures",
        ACCEPT,
        200,
        _signature("accepted", "prepared"),
        "person",
        404,
        "accepted",
    ),
    Row("GET", f"{LOAD}/remedies", EVERY, 200, _load("open", step=False), foreign=404),
    Row(
        "POST",
        f"{LOAD}/signatures",
        CONFIRM,
        200,
        _signature("loaded", "supervised"),
        "person",
        404,
        "loaded",
    ),
    Row("GET", f"{LOAD}/manifest", EVERY, 200, _load("accepted", step=False), foreign=404),
    Row("POST", f"{LOAD}/last-minute-changes", ACCEPT, 200, _load("accepted", _late), "person", 404),
    Row(
        "POST",
        f"{LOAD}/last-minute-changes/preview",
        EVERY,
        200,
        _load("accepted", change_of(BAG), step=False),
        foreign=404,
    ),
    Row(
        "POST",
        f"{LOAD}/notes",
        NOTE,
        201,
        _load("departed", {"text": "a bag too many"}, step=False),
        "person",
        404,
    ),
    Row("POST", f"{LOAD}/withdrawal", DECLARE, 200, _load("open", WHY), foreign=404),
    Row("POST", f"{LOAD}/departure", DECLARE, 200, _load("accepted", _departure), foreign=404),
    Row("POST", "/api/v1/rechecks", MANAGE, 202, _recheck, "person", 422),
    Row("GET", "/api/v1/rechecks/{recheck}", EVERY, 200, named("recheck"), foreign=404),
    Row("GET", "/api/v1/rechecks/{recheck}.csv", EVERY, 200, named("recheck"), foreign=404),
    Row("GET", "/api/v1/trail", EVERY, 200, _asked(about=_open)),
    Row("GET", "/api/v1/trail/{act}", EVERY, 200, named("act"), foreign=404),
    Row("GET", "/api/v1/documents/{digest}", EVERY, 200, named("digest"), foreign=404),
    Row("GET", "/api/v1/access-log", LOOK_AT_PEOPLE, 200, way="person"),
    Row("GET", "/api/v1/webhooks", EVERY, 200),
    Row("POST", "/api/v1/webhooks", SUBSCRIBE, 201, lambda _w, _r: Sent(body=SUBSCRIPTION)),
    Row("GET", HOOK, EVERY, 200, _hook("webhook"), foreign=404),
    Row("DELETE", HOOK, SUBSCRIBE, 204, _hook("webhook"), foreign=404),
    Row("POST", f"{HOOK}/secret", SUBSCRIBE, 201, _hook("webhook"), foreign=404),
    Row("POST", f"{HOOK}/resumption", SUBSCRIBE, 200, _hook("parked"), foreign=404),
    Row("GET", f"{HOOK}/deliveries", EVERY, 200, _hook("webhook"), foreign=404),
    Row(
        "POST",
        f"{HOOK}/deliveries/{{delivery}}/replay",
        SUBSCRIBE,
        200,
        _hook("webhook", "delivery"),
        foreign=404,
    ),
)
