"""The rows of the permission matrix for tables of standard weights, rules, restrictions and permits."""

import json
from typing import Any, Final

from tests.pure.fleet.test_rules import rule, rules_document
from tests.pure.loads.papers import lb, permit_document, restriction_document
from tests.pure.loads.standards import seasonal_document
from tests.service.permission_rows import APPROVE, ENTER, EVERY, MANAGE, Row, Send, Sent, named, version

ONE: Final = "/api/v1/aircraft/{registration}"
LOWER: Final = {"effect": "limit", "limit": "take_off", "weight": lb("8000")}
END: Final = {"reason": "repaired"}


def _body(document: dict[str, Any]) -> Send:
    return lambda _world, _role: Sent(body=document)


def _of_aircraft(document: dict[str, Any]) -> Send:
    return lambda world, _role: Sent(at={"registration": world.aircraft}, body=document)


def _version(kind: str, body: dict[str, Any] | None = None) -> Send:
    """This function will return what sends a document about a version of the operator's."""
    return lambda world, _role: Sent(at={"version": world.names[kind]}, body=body)


def _ending(kind: str) -> Send:
    return lambda world, _role: Sent(
        at={"registration": world.aircraft, "version": world.names[kind]}, body=END
    )


PROVISIONS: tuple[Row, ...] = (
    Row("GET", "/api/v1/standard-weights", EVERY, 200),
    Row("POST", "/api/v1/standard-weights", MANAGE, 201, _body(seasonal_document()), "person"),
    Row("GET", "/api/v1/standard-weights/{version}", EVERY, 200, _version("table"), foreign=404),
    Row(
        "POST",
        "/api/v1/standard-weights/{version}/approval",
        APPROVE,
        201,
        _version("table", {}),
        "person",
        404,
    ),
    Row("GET", "/api/v1/rules", EVERY, 200),
    Row("POST", "/api/v1/rules", MANAGE, 201, _body(rules_document(rule(none=True))), "person"),
    Row("GET", "/api/v1/rules/{version}", EVERY, 200, _version("rules"), foreign=404),
    Row(
        "POST",
        "/api/v1/rules/{version}/approval",
        APPROVE,
        201,
        _version("rules", {}),
        "person",
        404,
    ),
    Row("GET", f"{ONE}/restrictions", EVERY, 200, named("registration"), foreign=404),
    Row(
        "POST",
        f"{ONE}/restrictions",
        ENTER,
        201,
        _of_aircraft(restriction_document(LOWER)),
        foreign=404,
    ),
    Row("GET", f"{ONE}/restrictions/{{version}}", EVERY, 200, version("restriction"), foreign=404),
    Row(
        "POST",
        f"{ONE}/restrictions/{{version}}/lifting",
        APPROVE,
        201,
        _ending("restriction"),
        "person",
        404,
    ),
    Row("GET", f"{ONE}/permits", EVERY, 200, named("registration"), foreign=404),
    Row("POST", f"{ONE}/permits", ENTER, 201, _of_aircraft(permit_document(LOWER)), foreign=404),
    Row("GET", f"{ONE}/permits/{{version}}", EVERY, 200, version("permit"), foreign=404),
    Row("POST", f"{ONE}/permits/{{version}}/approval", APPROVE, 201, version("permit"), "person", 404),
    Row("POST", f"{ONE}/permits/{{version}}/ending", ENTER, 201, _ending("permit"), foreign=404),
)


def _form(document: dict[str, Any]) -> dict[str, str]:
    return {"document": json.dumps(document)}


DONE: Final = 302
# The same by pages: forms, answered by a redirection.
PROVISION_PAGES: tuple[Row, ...] = (
    Row("GET", "/standard-weights", EVERY, 200),
    Row("POST", "/standard-weights", MANAGE, DONE, _body(_form(seasonal_document()))),
    Row(
        "POST",
        "/standard-weights/{version}/approval",
        APPROVE,
        DONE,
        _version("table", {}),
        foreign=404,
    ),
    Row("GET", "/rules", EVERY, 200),
    Row("POST", "/rules", MANAGE, DONE, _body(_form(rules_document(rule(none=True))))),
    Row("POST", "/rules/{version}/approval", APPROVE, DONE, _version("rules", {}), foreign=404),
    Row("GET", "/aircraft/{registration}/restrictions", EVERY, 200, named("registration"), foreign=404),
    Row(
        "POST",
        "/aircraft/{registration}/restrictions",
        ENTER,
        DONE,
        _of_aircraft(_form(restriction_document(LOWER))),
        foreign=404,
    ),
    Row(
        "POST",
        "/aircraft/{registration}/restrictions/{version}/lifting",
        APPROVE,
        DONE,
        _ending("restriction"),
        foreign=404,
    ),
    Row("GET", "/aircraft/{registration}/permits", EVERY, 200, named("registration"), foreign=404),
    Row(
        "POST",
        "/aircraft/{registration}/permits",
        ENTER,
        DONE,
        _of_aircraft(_form(permit_document(LOWER))),
        foreign=404,
    ),
    Row(
        "POST",
        "/aircraft/{registration}/permits/{version}/approval",
        APPROVE,
        DONE,
        version("permit"),
        foreign=404,
    ),
    Row(
        "POST",
        "/aircraft/{registration}/permits/{version}/ending",
        ENTER,
        DONE,
        _ending("permit"),
        foreign=404,
    ),
)
