"""The rows of the permission matrix for pages: forms as a browser sends them, answered by a redirection."""

from collections.abc import Callable
from typing import Any, Final

from django.contrib.auth.tokens import default_token_generator

from loads.queries.declaration import declared_now
from loads.web.copied import typed_of
from tests.cast import PASSWORD
from tests.loads.making import signing
from tests.service.permission_provisions import PROVISION_PAGES
from tests.service.permission_rows import (
    ACCEPT,
    APPROVE,
    CONFIRM,
    DECLARE,
    EVERY,
    EVERYBODY,
    LOOK_AT_PEOPLE,
    MANAGE,
    NOTE,
    OWN,
    PREPARE,
    REMARK,
    Row,
    Send,
    Sent,
    named,
    version,
)
from tests.service.permission_world import World

DONE: Final = 302
LOAD: Final = "/loads/{load}"
Filled = Callable[[World], dict[str, Any]]


def _step(state: str, fill: Filled = lambda _world: {}) -> Send:
    """This function will return what sends the form of a load in that state, with the step it shows."""

    def send(world: World, _role: str) -> Sent:
        current = world.loads[state]
        body = {"step": str(current.step.number)} | fill(world)
        return Sent(at={"load": str(current.load.id)}, body=body)

    return send


def _signature(meaning: str, state: str) -> Send:
    return _step(
        state,
        lambda world: {
            "meaning": meaning,
            "digest": signing(world.loads[state]).digest,
            "password": PASSWORD,
        },
    )


def _typed(world: World, **more: str) -> dict[str, str]:
    declared = declared_now(world.loads["open"])
    return typed_of(declared) | {"date": "2026-12-01", "time": "08:30"} | more


def _declared(do: str) -> Send:
    return lambda world, _role: Sent(body=_typed(world, do=do))


def _revised(do: str) -> Send:
    return _step("open", lambda world: _typed(world, do=do, checked="yes", reason="one bag more"))


def _changed(do: str) -> Send:
    """This function will return what sends the form of a last-minute change."""
    line = {"change:0": "item-on", "where:0": "NOSE-HOLD", "who:0": "bag at the door", "kind:0": "baggage"}
    amount = {"amount:0": "20", "unit:0": "lb", "how:0": "weighed", "persons_on_board": "3"}

    def fill(world: World) -> dict[str, str]:
        signed = {"do": do, "digest": world.names["late digest"], "password": PASSWORD}
        return line | amount | signed

    return _step("accepted", fill)


def _token(world: World, role: str) -> Sent:
    number = world.names.get(f"token of {role}", world.names["token of pilot"])
    return Sent(at={"token": number}, body={"overlap_hours": "1", "days": "3", "reason": "rotated"})


NEW_PERSON: Final = {
    "login": "new.person",
    "name": "N. Person",
    "password": "slow-copper-meadow-4",
    "reason": "joined",
}
NEW_PASSWORD: Final = {
    "current": PASSWORD,
    "new": "slow-copper-meadow-4",
    "again": "slow-copper-meadow-4",
}
SETTINGS: Final = {
    "reason": "manual revised",
    "rule_set": "US",
    "procedure": "section 8",
    "weight_method": "weighed",
    "seen": "1",
}


def _by_link(world: World, _role: str) -> Sent:
    person = world.by_role["pilot"]
    words = {"new": NEW_PASSWORD["new"], "again": NEW_PASSWORD["again"]}
    return Sent(at={"person": str(person.pk), "code": default_token_generator.make_token(person)}, body=words)


def _plain(body: dict[str, Any]) -> Send:
    return lambda _world, _role: Sent(body=body)


PAGES: tuple[Row, ...] = (
    Row("GET", "/health", EVERYBODY, 200),
    Row("GET", "/health/alive", EVERYBODY, 200),
    # For this machine alone while no METRICS_TOKEN is set; tests/service/test_figures.py has the rest.
    Row("GET", "/metrics", EVERYBODY, 200),
    Row("GET", "/docs", EVERYBODY, 200),
    Row("GET", "/sign-in", EVERYBODY, 200),
    # Nobody is let in by a wrong password: the page shows again.
    Row("POST", "/sign-in", EVERYBODY, 422, _plain({"login": "nobody", "password": "wrong"})),
    Row("POST", "/sign-out", EVERYBODY, DONE),
    Row("GET", "/", EVERY, 200),
    Row("GET", "/aircraft", EVERY, 200),
    Row("GET", "/aircraft/{registration}", EVERY, 200, named("registration"), foreign=404),
    Row(
        "POST",
        "/aircraft/{registration}/loading-bases/{version}/approval",
        APPROVE,
        DONE,
        version("basis"),
        foreign=404,
    ),
    Row(
        "POST",
        "/aircraft/{registration}/empty-weights/{version}/approval",
        APPROVE,
        DONE,
        version("weight"),
        foreign=404,
    ),
    *PROVISION_PAGES,
    Row("GET", "/people", LOOK_AT_PEOPLE, 200),
    Row("POST", "/people", MANAGE, DONE, _plain(NEW_PERSON)),
    Row("GET", "/people/{person}", LOOK_AT_PEOPLE, 200, named("person"), foreign=404),
    Row(
        "POST",
        "/people/{person}/duties",
        MANAGE,
        DONE,
        named("person", body={"role": "pilot", "granted": "yes", "reason": "checked out"}),
        foreign=404,
    ),
    Row(
        "POST",
        "/people/{person}/deactivation",
        MANAGE,
        DONE,
        named("person", body={"reason": "left"}),
        foreign=404,
    ),
    # The page itself answers, with the link this once.
    Row(
        "POST",
        "/people/{person}/password-link",
        MANAGE,
        200,
        named("person", body={"reason": "forgotten"}),
        foreign=404,
    ),
    Row("GET", "/new-password/{person}/{code}", EVERYBODY, 200, _by_link),
    Row("POST", "/new-password/{person}/{code}", EVERYBODY, DONE, _by_link),
    Row("GET", "/tokens", EVERY, 200),
    # These two answer with the page itself, on which the secret shows this once.
    Row("POST", "/tokens", OWN, 200, _plain({"label": "another", "scopes": "read", "days": "3"})),
    Row("POST", "/tokens/{token}/rotation", OWN, 200, _token, foreign=404),
    Row("POST", "/tokens/{token}/revocation", OWN, DONE, _token, foreign=404),
    Row("GET", "/me", EVERY, 200),
    Row("POST", "/me/password", OWN, DONE, _plain(NEW_PASSWORD)),
    Row("POST", "/me/mail", OWN, DONE, _plain({"mail": "r.amani@example.org"})),
    Row("POST", "/me/sessions", OWN, DONE),
    Row("GET", "/access-log", LOOK_AT_PEOPLE, 200),
    Row("GET", "/settings", EVERY, 200),
    Row("POST", "/settings", MANAGE, DONE, _plain(SETTINGS)),
    Row("GET", "/rechecks", EVERY, 200),
    Row("POST", "/rechecks", MANAGE, DONE, _plain({"reason": "scale was off"})),
    Row("GET", "/rechecks/{recheck}", EVERY, 200, named("recheck"), foreign=404),
    Row("GET", "/self-check", EVERY, 200),
    Row("POST", "/self-check", MANAGE, DONE),
    Row("GET", "/declare", EVERY, 200),
    Row("POST", "/declare", EVERY, 200, _declared("look"), case="computed"),
    Row("POST", "/declare", DECLARE, DONE, _declared("submit"), case="submitted"),
    Row("GET", LOAD, EVERY, 200, named("load"), foreign=404),
    Row("GET", f"{LOAD}/manifest", EVERY, 200, _step("accepted"), foreign=404),
    Row("GET", f"{LOAD}/revise", EVERY, 200, named("load"), foreign=404),
    Row("POST", f"{LOAD}/revise", EVERY, 200, _revised("look"), foreign=404, case="computed"),
    Row("POST", f"{LOAD}/revise", DECLARE, DONE, _revised("submit"), foreign=404, case="replaced"),
    Row("POST", f"{LOAD}/sign", PREPARE, DONE, _signature("prepared", "open"), foreign=404, case="prepared"),
    Row(
        "POST", f"{LOAD}/sign", ACCEPT, DONE, _signature("accepted", "prepared"), foreign=404, case="accepted"
    ),
    Row(
        "POST",
        f"{LOAD}/sign",
        CONFIRM,
        DONE,
        _signature("loaded", "supervised"),
        foreign=404,
        case="loaded",
    ),
    Row("POST", f"{LOAD}/assess", DECLARE, DONE, _step("stale"), foreign=404),
    Row("POST", f"{LOAD}/depart", DECLARE, DONE, _step("accepted"), foreign=404),
    Row(
        "POST",
        f"{LOAD}/withdraw",
        DECLARE,
        DONE,
        _step("open", lambda _w: {"reason": "not flown"}),
        foreign=404,
    ),
    Row("GET", f"{LOAD}/change", EVERY, 200, _step("accepted"), foreign=404),
    Row("POST", f"{LOAD}/change", EVERY, 200, _changed("look"), foreign=404, case="computed"),
    Row("POST", f"{LOAD}/change", ACCEPT, DONE, _changed("accept"), foreign=404, case="accepted"),
    Row(
        "POST",
        f"{LOAD}/note",
        NOTE,
        DONE,
        _step("departed", lambda _w: {"text": "a bag too many"}),
        foreign=404,
    ),
    Row("GET", "/rejects", EVERY, 200),
    Row(
        "POST",
        "/rejects/{load}/remarks",
        REMARK,
        DONE,
        _step("reject", lambda _w: {"words": "bags moved"}),
        foreign=404,
    ),
    Row("GET", "/documents", EVERY, 200, lambda w, _r: Sent(query={"registration": w.aircraft})),
    Row("GET", "/inspect", EVERY, 200),
    Row(
        "GET",
        "/inspect",
        EVERY,
        200,
        lambda w, _r: Sent(query={"aircraft": w.aircraft}),
        foreign=422,
        case="of one aircraft",
    ),
    Row("GET", "/trail", EVERY, 200, lambda w, _r: Sent(query={"about": f"load:{w.loads['open'].load.id}"})),
    Row("GET", "/trail/{act}", EVERY, 200, named("act"), foreign=404),
)
