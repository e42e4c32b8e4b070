"""What the OpenAPI document says besides the endpoints themselves: who may ask, and how any refusal looks.

Each endpoint describes its own shapes, and what is special in its refusals (`records.api.describing`).
"""

import json
from collections.abc import Iterator
from pathlib import Path
from typing import Any, Final

from django.conf import settings
from drf_spectacular.drainage import GENERATOR_STATS
from drf_spectacular.extensions import OpenApiAuthenticationExtension
from drf_spectacular.generators import SchemaGenerator

from records.api.describing import IDEMPOTENCY_KEY
from service.problems import MEDIA_TYPE

COMMITTED: Final = Path(__file__).with_name("openapi.json")
# The same sum with nothing stored: repeating it needs no key.
STORES_NOTHING: Final = frozenset(
    {
        "/api/v1/assessments",
        "/api/v1/aircraft/{registration}/seating-variations",
        "/api/v1/loads/{load}/last-minute-changes/preview",
    }
)
UNLIMITED: Final = frozenset({"health"})
_KEY: Final = {
    "name": IDEMPOTENCY_KEY.name,
    "in": "header",
    "required": True,
    "description": IDEMPOTENCY_KEY.description,
    "schema": {"type": "string", "pattern": "^[\\x21-\\x7e]{1,120}$"},
}
_REFUSALS: Final = {
    "400": "The request cannot be read, or its Idempotency-Key is missing.",
    "401": "Nobody is signed in, or the token does not serve.",
    "403": "The actor may not do this.",
    "404": "The address names nothing, or something of another operator.",
    "409": "The state does not allow this step, or a request with this key is being answered.",
    "413": "The body is larger than is read.",
    "422": "Fields are wrong, each named by its pointer; or the key came with another request before.",
    "503": "The database could not be reached; nothing is known to have been stored.",
    "429": "Too many requests came in a minute; the header Retry-After says how many seconds to wait.",
    "default": "Any other refusal or failure.",
}


class TokenScheme(OpenApiAuthenticationExtension):  # type: ignore[no-untyped-call]  # the library is untyped
    """How a bearer token is shown in the document."""

    target_class = "service.actors.TokenAuthentication"
    name = "token"

    def get_security_definition(self, _auto_schema: Any) -> dict[str, Any]:
        """This function will describe the scheme."""
        return {"type": "http", "scheme": "bearer", "bearerFormat": "tb_ and 43 characters"}


class SessionScheme(OpenApiAuthenticationExtension):  # type: ignore[no-untyped-call]  # the library is untyped
    """How a signed-in browser is shown in the document."""

    target_class = "service.actors.SessionAuthentication"
    name = "session"

    def get_security_definition(self, _auto_schema: Any) -> dict[str, Any]:
        """This function will describe the scheme."""
        return {"type": "apiKey", "in": "cookie", "name": settings.SESSION_COOKIE_NAME}


def finish(result: dict[str, Any], **_: Any) -> dict[str, Any]:
    """This function will complete every operation (a POSTPROCESSING_HOOK): its key, and how it refuses.

    What an endpoint says of itself stands. `default` is a method, an answer or a body of another kind (405,
    406, 415) or a failure (500).
    """
    components = result.setdefault("components", {})
    components["responses"] = {f"Problem{status}": _problem(words) for status, words in _REFUSALS.items()}
    for path, method, operation in _operations(result):
        stores = method == "post" and path not in STORES_NOTHING
        named = {parameter.get("name") for parameter in operation.get("parameters", ())}
        if stores and "Idempotency-Key" not in named:
            operation.setdefault("parameters", []).append(_KEY)
        statuses = {"429", "default"} if operation["operationId"] not in UNLIMITED else {"default"}
        # A parameter that is not known is a 422 wherever somebody is asked for.
        statuses |= {"401", "403", "422", "503"} if operation.get("security") else set()
        statuses |= {"404"} if "{" in path else set()
        statuses |= {"400", "413", "422"} if method == "post" else set()
        statuses |= {"409"} if stores else set()
        for status in sorted(statuses - set(operation["responses"])):
            operation["responses"][status] = {"$ref": f"#/components/responses/Problem{status}"}
    return result


def _problem(words: str) -> dict[str, Any]:
    return {
        "description": words,
        "content": {MEDIA_TYPE: {"schema": {"$ref": "#/components/schemas/Problem"}}},
    }


def document() -> tuple[str, list[str]]:
    """This function will return the document as it follows from the endpoints, and what is wrong with it."""
    GENERATOR_STATS.reset()
    generator = SchemaGenerator()  # type: ignore[no-untyped-call]  # the library is untyped
    with GENERATOR_STATS.silence():
        schema = generator.get_schema(request=None, public=True)  # type: ignore[no-untyped-call]  # as above
    complaints = {*GENERATOR_STATS._error_cache, *GENERATOR_STATS._warn_cache}  # noqa: SLF001  # no public way
    if "Problem" not in schema["components"]["schemas"]:
        complaints.add("no endpoint describes the problem body")
    return json.dumps(schema, indent=1, ensure_ascii=False, default=str) + "\n", sorted(complaints)


def _operations(schema: dict[str, Any]) -> Iterator[tuple[str, str, dict[str, Any]]]:
    for path, operations in schema["paths"].items():
        for method, operation in operations.items():
            yield path, method, operation
