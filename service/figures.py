"""What a monitor is told: GET /metrics, in the text form of Prometheus, for this machine or for a token.

Requests, refusals and acts are counted in each process; with PROMETHEUS_MULTIPROC_DIR set, whichever process
is asked tells the sum of all. What stands in the database (work that waits, how far the trail was verified)
is read when asked.
"""

import hmac
import os
from collections.abc import Iterator
from typing import Any, Final

from django.conf import settings
from django.db import DatabaseError
from django.http import HttpRequest, HttpResponse
from django.views.decorators.http import require_safe
from prometheus_client import (
    CONTENT_TYPE_LATEST,
    REGISTRY,
    CollectorRegistry,
    Counter,
    Histogram,
    generate_latest,
)
from prometheus_client.core import GaugeMetricFamily
from prometheus_client.multiprocess import MultiProcessCollector
from prometheus_client.registry import Collector

from records import outbox
from records.verified import last_verified
from service.addresses import is_this_machine
from service.problems import not_found

_BOUNDS: Final = (0.005, 0.01, 0.02, 0.05, 0.1, 0.2, 0.5, 1.0, 2.0, 5.0, 10.0)
REQUESTS: Final = Counter(
    "tarebook_requests",
    "Requests answered, by address pattern, method and status.",
    ["endpoint", "method", "status"],
)
SECONDS: Final = Histogram(
    "tarebook_request_seconds", "Time to answer, by address pattern.", ["endpoint"], buckets=_BOUNDS
)
REFUSALS: Final = Counter("tarebook_refusals", "Requests refused, by the code of the problem body.", ["code"])


@require_safe
def metrics(request: HttpRequest) -> HttpResponse:
    """This function will tell the figures to who may have them; for everybody else there is nothing here."""
    if not _may(request):
        return not_found(request)
    registry = CollectorRegistry()
    if "PROMETHEUS_MULTIPROC_DIR" in os.environ:
        MultiProcessCollector(registry)  # type: ignore[no-untyped-call]  # the library is typed in part
    else:
        registry.register(REGISTRY)
    registry.register(Stored())
    return HttpResponse(generate_latest(registry), content_type=CONTENT_TYPE_LATEST)


def _may(request: HttpRequest) -> bool:
    if settings.METRICS_TOKEN:
        scheme, _, sent = request.headers.get("Authorization", "").partition(" ")
        fits = hmac.compare_digest(sent.strip().encode(), settings.METRICS_TOKEN.encode())
        return fits and scheme.lower() == "bearer"
    return is_this_machine(request)


class Stored(Collector):
    """The figures that stand in the database."""

    def collect(self) -> Iterator[Any]:
        """This function will read them; nothing of it is told while the database is not reached."""
        try:
            waiting, verified = outbox.waiting(), last_verified()
        except DatabaseError:
            yield _figure("database_up", "Whether the database answered.", 0)
            return
        yield _figure("database_up", "Whether the database answered.", 1)
        yield _figure("outbox_waiting", "Promised work that is not done.", waiting.count)
        yield _figure("outbox_oldest_seconds", "How long the oldest of it waits.", waiting.oldest_seconds)
        yield _figure("verified_entries", "Entries up to the last verified positions.", verified.entries)
        yield _figure("unverified_entries", "Entries sealed since.", verified.waiting)
        yield _figure("trail_sound", "Whether all that was verified held.", int(verified.sound))
        if verified.at is not None:
            words = "When the chains were last followed, the longest ago of them."
            yield _figure("verified_timestamp_seconds", words, verified.at.timestamp())
        if verified.whole_at is not None:
            words = "When chains, documents, rows and guards were last verified together."
            yield _figure("verified_whole_timestamp_seconds", words, verified.whole_at.timestamp())


def _figure(name: str, words: str, value: float) -> GaugeMetricFamily:
    return GaugeMetricFamily(f"tarebook_{name}", words, value=value)
