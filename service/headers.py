"""What every answer carries: the number of the request, and what a browser may do with a page."""

import re
import uuid
from collections.abc import Callable
from typing import Final

from django.contrib.auth.views import redirect_to_login
from django.http import HttpRequest, HttpResponse
from django.http.response import HttpResponseBase

from records.act import request_id
from records.refusal import NotSignedIn, Refused
from service.problems import is_api, not_found, refusal, refused_page

# Everything is served from here and nothing stands inline, so a foreign script or style is never run.
CONTENT_SECURITY_POLICY: Final = (
    "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data:; font-src 'self'; "
    "connect-src 'self'; form-action 'self'; frame-ancestors 'none'; base-uri 'none'"
)
PERMISSIONS_POLICY: Final = ", ".join(
    f"{power}=()"
    for power in (
        "accelerometer",
        "camera",
        "display-capture",
        "geolocation",
        "gyroscope",
        "magnetometer",
        "microphone",
        "payment",
        "usb",
    )
)
_GIVEN_ID: Final = re.compile(r"[A-Za-z0-9._-]{8,64}")


class HeadersMiddleware:
    """Numbers the request, for the log, the trail and the answer, and sets the headers of every answer.

    A proxy in front may bring the number in `X-Request-ID`; it is taken when it is 8 to 64 plain characters.
    """

    def __init__(self, get_response: Callable[[HttpRequest], HttpResponseBase]) -> None:
        self.get_response = get_response

    def __call__(self, request: HttpRequest) -> HttpResponseBase:
        """This function will answer the request with its headers set."""
        given = request.headers.get("X-Request-ID", "")
        number = given if _GIVEN_ID.fullmatch(given) else str(uuid.uuid4())
        token = request_id.set(number)
        try:
            response = self._answer(request)
        finally:
            request_id.reset(token)
        response.headers["X-Request-ID"] = number
        response.headers.setdefault("Content-Security-Policy", CONTENT_SECURITY_POLICY)
        response.headers.setdefault("Permissions-Policy", PERMISSIONS_POLICY)
        response.headers.setdefault("Cross-Origin-Resource-Policy", "same-origin")
        # What somebody may see depends on who asks: nothing of it is kept on the way. (Static files never
        # get here.)
        response.headers.setdefault("Cache-Control", "no-store")
        return response

    def process_exception(self, request: HttpRequest, error: Exception) -> HttpResponse | None:
        """This function will answer for a refusal that a view let through; the rest is a failure
        (handler500).
        """
        if not isinstance(error, Refused):
            return None
        if is_api(request):
            return refusal(error)
        if isinstance(error, NotSignedIn):
            return redirect_to_login(request.get_full_path())
        return refused_page(error)

    def _answer(self, request: HttpRequest) -> HttpResponseBase:
        # PostgreSQL holds no NUL in a text, so no address with one names anything.
        if "\x00" in request.path_info:
            return not_found(request) if is_api(request) else HttpResponse(status=404)
        return self.get_response(request)
