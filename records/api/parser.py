"""The one parser of the API: JSON as `records.strict_json` reads it."""

from typing import Any

from django.core.exceptions import RequestDataTooBig
from django.http import HttpRequest
from rest_framework.parsers import BaseParser

from records.refusal import TooLarge
from records.strict_json import MOST_BYTES, read


class StrictJSONParser(BaseParser):
    """Reads `application/json`. The raw bytes stay on the request, so that a repeated request can be told
    from another.
    """

    media_type = "application/json"

    def parse(self, stream: Any, *_positional: Any, **_named: Any) -> Any:
        """This function will return the document; raises Unreadable (400) and TooLarge (413)."""
        return read(body_of(stream) if isinstance(stream, HttpRequest) else stream.read(MOST_BYTES + 1))


def body_of(request: HttpRequest) -> bytes:
    """This function will return the raw body, kept on the request for whoever asks again; raises TooLarge
    unread.
    """
    try:
        return request.body
    except RequestDataTooBig as problem:
        raise TooLarge(
            "body-too-large",
            f"The body is larger than the {MOST_BYTES} bytes that are read.",
            next_step="Send less in one request.",
        ) from problem
