"""What every endpoint's published description shares: the problem body, and the headers asked for."""

from collections.abc import Mapping
from typing import Any, Final

from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, OpenApiResponse
from rest_framework import serializers


class ProblemError(serializers.Serializer[object]):
    """One field that is wrong: a JSON pointer (or `?name` for a parameter), a stable code, a sentence."""

    pointer = serializers.CharField(allow_blank=True)
    code = serializers.CharField()
    detail = serializers.CharField()


class Problem(serializers.Serializer[object]):
    """A refusal (RFC 9457). `code` is stable."""

    type = serializers.CharField()
    title = serializers.CharField()
    status = serializers.IntegerField()
    code = serializers.CharField()
    detail = serializers.CharField()
    next_step = serializers.CharField(allow_blank=True)
    errors = ProblemError(many=True)  # type: ignore[assignment]  # DRF takes fields out of the class
    request = serializers.CharField(allow_blank=True)


IDEMPOTENCY_KEY: Final = OpenApiParameter(
    "Idempotency-Key",
    OpenApiTypes.STR,
    OpenApiParameter.HEADER,
    required=True,
    description="1 to 120 visible ASCII characters; the same key with the same request gets the same answer.",
)
IF_MATCH: Final = OpenApiParameter(
    "If-Match",
    OpenApiTypes.STR,
    OpenApiParameter.HEADER,
    required=True,
    description="The ETag of the record as it was read.",
)
_MEANING: Final[Mapping[int, str]] = {
    400: "The request cannot be read, or its Idempotency-Key is missing.",
    401: "Nobody is signed in, or the token does not serve.",
    403: "The actor may not do this.",
    404: "The address names nothing, or something of another operator.",
    409: "The state does not allow this step, or a request with this key is being answered.",
    412: "If-Match does not fit the record as it stands.",
    413: "The body is larger than is read.",
    422: "Fields are wrong; each is named by its pointer.",
    428: "If-Match is missing.",
    429: "Too many wrong passwords; the header Retry-After says how long to wait.",
    503: "The database could not be reached; nothing is known to have been stored.",
}
_READS: Final = (401, 403, 404, 422, 503)
_STORES: Final = (400, 401, 403, 404, 409, 413, 422, 503)
_MOVES: Final = (400, 401, 403, 404, 409, 412, 413, 422, 428, 503)


def problems(*statuses: int) -> dict[Any, Any]:
    """This function will return the descriptions of the problem answers with these statuses."""
    return {
        (status, "application/problem+json"): OpenApiResponse(Problem, description=_MEANING[status])
        for status in statuses
    }


def problems_of_reading() -> dict[Any, Any]:
    """This function will return what an endpoint that only reads may refuse with."""
    return problems(*_READS)


def problems_of_storing() -> dict[Any, Any]:
    """This function will return what an endpoint that stores something new may refuse with."""
    return problems(*_STORES)


def problems_of_moving() -> dict[Any, Any]:
    """This function will return what an endpoint that moves a state may refuse with."""
    return problems(*_MOVES)
