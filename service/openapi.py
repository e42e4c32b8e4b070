"""What the OpenAPI document says besides the endpoints themselves: who may ask, how refusals look, the key
of a POST.
"""

import json
from pathlib import Path
from typing import Any, Final

from django.conf import settings
from drf_spectacular.drainage import GENERATOR_STATS
from drf_spectacular.extensions import OpenApiAuthenticationExtension
from drf_spectacular.generators import SchemaGenerator

from service.problems import MEDIA_TYPE

COMMITTED: Final = Path(__file__).with_name("openapi.json")
# The same sum with nothing stored: repeating it needs no key.
STORES_NOTHING: Final = frozenset({"/api/v1/assessments"})

_TEXT: Final = {"type": "string"}
_PROBLEM: Final = {
    "type": "object",
    "description": "A problem (RFC 9457). `code` is stable; `errors` name fields by JSON pointer, query "
    "parameters as `?name`.",
    "required": ["type", "title", "status", "code", "detail", "next_step", "errors", "request"],
    "properties": {
        "type": {"type": "string", "format": "uri-reference"},
        "title": _TEXT,
        "status": {"type": "integer", "minimum": 400, "maximum": 599},
        "code": {"type": "string", "pattern": "^[a-z0-9-]+$"},
        "detail": _TEXT,
        "next_step": _TEXT,
        "errors": {
            "type": "array",
            "items": {
                "type": "object",
                "required": ["pointer", "code", "detail"],
                "properties": {"pointer": _TEXT, "code": _TEXT, "detail": _TEXT},
            },
        },
        "request": {"type": "string", "description": "The number of the request, as in X-Request-ID."},
    },
}
_KEY: Final = {
    "name": "Idempotency-Key",
    "in": "header",
    "required": True,
    "description": "A fresh random key for each new request; the same key and the same bytes to repeat "
    "one. The effect happens once, and the answer is the same, byte for byte, for seven days.",
    "schema": {"type": "string", "pattern": "^[\\x21-\\x7e]{1,120}$"},
}
_WORDS: Final = {
    "400": "unreadable",
    "401": "not signed in",
    "403": "not allowed",
    "404": "not known, or another operator's",
    "406": "not acceptable",
    "409": "the step is refused, or the key is in flight",
    "412": "the state has moved on",
    "413": "too large",
    "415": "media type not read",
    "422": "fields are wrong",
    "428": "If-Match is missing",
    "429": "locked out",
    "503": "the database was not reached",
    "default": "any other refusal or failure",
}


class TokenScheme(OpenApiAuthenticationExtension):  # type: ignore[misc]  # the library is untyped
    """How a bearer token is shown in the document."""

    target_class = "service.actors.TokenAuthentication"
    name = "token"

    def get_security_definition(self, _auto_schema: Any) -> dict[str, Any]:
        """This function will describe the scheme."""
        return {"type": "http", "scheme": "bearer", "bearerFormat": "tb_ and 43 characters"}


class SessionScheme(OpenApiAuthenticationExtension):  # type: ignore[misc]  # the library is untyped
    """How a signed-in browser is shown in the document."""

    target_class = "service.actors.SessionAuthentication"
    name = "session"

    def get_security_definition(self, _auto_schema: Any) -> dict[str, Any]:
        """This function will describe the scheme."""
        return {"type": "apiKey", "in": "cookie", "name": settings.SESSION_COOKIE_NAME}


def finish(result: dict[str, Any], **_: Any) -> dict[str, Any]:
    """This function will add problems, keys and headers to every operation (a POSTPROCESSING_HOOK)."""
    components = result.setdefault("components", {})
    components.setdefault("schemas", {})["Problem"] = _PROBLEM
    components["responses"] = {
        f"Problem{status.title()}": {
            "description": words,
            "content": {MEDIA_TYPE: {"schema": {"$ref": "#/components/schemas/Problem"}}},
        }
        for status, words in _WORDS.items()
    }
    components["parameters"] = {"IdempotencyKey": _KEY}
    for path, operations in result["paths"].items():
        for method, operation in operations.items():
            _finish_operation(path, method, operation)
    return result


def _finish_operation(path: str, method: str, operation: dict[str, Any]) -> None:
    statuses = {"406", "503", "default"}
    if operation.get("security"):
        statuses |= {"401", "403"}
    if "{" in path:
        statuses |= {"404"}
    if method == "get":
        statuses |= {"422"} if any(p["in"] == "query" for p in operation.get("parameters", ())) else set()
    else:
        statuses |= {"400", "409", "413", "415", "422"}
        if path not in STORES_NOTHING:
            operation.setdefault("parameters", []).append({"$ref": "#/components/parameters/IdempotencyKey"})
    if any(p.get("name") == "If-Match" for p in operation.get("parameters", ())):
        statuses |= {"412", "428"}
    if path.endswith("/signatures"):
        statuses |= {"429"}
    responses = operation.setdefault("responses", {})
    for status in sorted(statuses):
        responses.setdefault(status, {"$ref": f"#/components/responses/Problem{status.title()}"})


def document() -> tuple[str, list[str]]:
    """This function will return the document as it follows from the endpoints, as text, and what is wrong
    with it.
    """
    GENERATOR_STATS.reset()
    with GENERATOR_STATS.silence():
        schema = SchemaGenerator().get_schema(request=None, public=True)
    complaints = sorted({*GENERATOR_STATS._error_cache, *GENERATOR_STATS._warn_cache})  # noqa: SLF001  # no public way
    return json.dumps(schema, indent=1, ensure_ascii=False, default=str) + "\n", complaints
