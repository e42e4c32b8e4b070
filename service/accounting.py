"""What every request leaves behind: one line in the log, and figures for a monitor.

The line has method, pattern of the address, status, time and who asked, under the number of the request. No
query, no body, no header: names and secrets may stand there.
"""

import json
import logging
import time
from collections.abc import Callable
from typing import Final

from django.http import HttpRequest
from django.http.response import HttpResponse, HttpResponseBase

from service.figures import REFUSALS, REQUESTS, SECONDS
from service.problems import MEDIA_TYPE

log = logging.getLogger("tarebook.requests")
_METHODS: Final = frozenset({"GET", "HEAD", "POST", "PUT", "PATCH", "DELETE", "OPTIONS"})


class AccountingMiddleware:
    """Notes every answer. It stands inside the one that numbers the request."""

    def __init__(self, get_response: Callable[[HttpRequest], HttpResponseBase]) -> None:
        self.get_response = get_response

    def __call__(self, request: HttpRequest) -> HttpResponseBase:
        """This function will answer the request and note what came of it."""
        begun = time.perf_counter()
        response = self.get_response(request)
        seconds = time.perf_counter() - begun
        endpoint, status = _endpoint(request), response.status_code
        method = request.method if request.method in _METHODS else "other"
        REQUESTS.labels(endpoint, method, str(status)).inc()
        SECONDS.labels(endpoint).observe(seconds)
        code = _code(response)
        if code:
            REFUSALS.labels(code).inc()
        log.info(
            "%s %s %d %s %.1f ms%s",
            method,
            endpoint,
            status,
            getattr(getattr(request, "actor", None), "key", "stranger"),
            seconds * 1000,
            f" {code}" if code else "",
        )
        return response


def _endpoint(request: HttpRequest) -> str:
    """This function will return the pattern of the address, which names no row; addresses made up are one."""
    match = request.resolver_match
    return f"/{match.route}" if match else "(nothing here)"


def _code(response: HttpResponseBase) -> str:
    """This function will return the stable code of a problem body; "" for any other answer."""
    if not isinstance(response, HttpResponse) or response.headers.get("Content-Type") != MEDIA_TYPE:
        return ""
    return str(json.loads(response.content).get("code", ""))
