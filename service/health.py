"""Whether the service is alive, and whether it can do its job: GET /health, without login.

It says which part is not well and nothing about its inside. A broker that is down is told but does not make
the service unready: loads are signed without it, and manifests are made on demand. Nor does a trail that was
found broken: who then may sign is for people to decide, and `manage.py verify` names the place. Nor does a
self-check that failed: everything but signing goes on.

GET /health/alive answers as long as this process does, and asks nothing else.
"""

import logging
from collections.abc import Callable
from contextlib import suppress
from typing import Any, Final

from celery import current_app
from django.db import DatabaseError, connection
from django.db.migrations.executor import MigrationExecutor
from django.http import HttpRequest, HttpResponse
from django.utils import timezone
from django.views.decorators.http import require_safe
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from loads.queries.self_checks import last_word
from records.api.render import rendered
from records.guard import missing_guards
from records.verified import last_verified
from service.roles import SERVICE

log = logging.getLogger(__name__)

OLDEST_POSTGRESQL: Final = 180000
_SHAPE: Final = {
    "type": "object",
    "required": ["status", "parts"],
    "properties": {
        "status": {"type": "string", "enum": ["ready", "not ready"]},
        "parts": {"type": "object", "additionalProperties": {"type": "string"}},
        "verified": {
            "type": "object",
            "required": ["entries", "waiting", "at", "whole_at"],
            "properties": {
                "entries": {"type": "integer"},
                "waiting": {"type": "integer"},
                "at": {"type": ["string", "null"], "format": "date-time"},
                "whole_at": {"type": ["string", "null"], "format": "date-time"},
            },
        },
    },
}


class Health(APIView):
    """GET /health, without login."""

    authentication_classes = ()
    permission_classes = ()

    @extend_schema(
        operation_id="health",
        summary="Whether the service can do its job",
        responses={200: _SHAPE, 503: _SHAPE},
    )
    def get(self, _request: Request) -> HttpResponse:
        """This function will answer 200 when ready and 503 when not, with every part by name."""
        parts = {
            "database": _asked(_database),
            "roles": _asked(_roles),
            "guards": _asked(_guards),
            "migrations": _asked(_migrations),
        }
        ready = all(found == "ok" for found in parts.values())
        parts["broker"] = _asked(_broker)
        body: dict[str, Any] = {"status": "ready" if ready else "not ready", "parts": parts}
        with suppress(DatabaseError):
            parts["self-check"] = last_word(timezone.now())
            body["verified"], parts["trail"] = _trail()
        return HttpResponse(rendered(body), status=200 if ready else 503, content_type="application/json")


@require_safe
def alive(_request: HttpRequest) -> HttpResponse:
    """This function will answer that this process answers."""
    return HttpResponse(rendered({"status": "alive"}), content_type="application/json")


def _asked(part: Callable[[], str]) -> str:
    try:
        return part()
    except DatabaseError as error:
        log.warning("health: %s: %s", part.__name__, type(error).__name__)
        return "not reached"


def _database() -> str:
    connection.ensure_connection()
    with connection.cursor() as cursor:
        cursor.execute("SELECT current_setting('server_version_num')::int")
        (version,) = cursor.fetchone()
    return "ok" if version >= OLDEST_POSTGRESQL else "needs PostgreSQL 18"


def _roles() -> str:
    # What the role may do is asked with the guards; here, whether it is the one that serves.
    with connection.cursor() as cursor:
        cursor.execute("SELECT current_user")
        (role,) = cursor.fetchone()
    return "ok" if role == SERVICE else "not the service role"


def _guards() -> str:
    missing = missing_guards()
    if missing:
        log.error("guards missing or changed: %s", "; ".join(missing))
        return f"{len(missing)} missing or changed"
    return "ok"


def _migrations() -> str:
    executor = MigrationExecutor(connection)
    return "ok" if not executor.migration_plan(executor.loader.graph.leaf_nodes()) else "not all have run"


def _trail() -> tuple[dict[str, Any], str]:
    found = last_verified()
    told = {
        "entries": found.entries,
        "waiting": found.waiting,
        "at": found.at.isoformat() if found.at else None,
        "whole_at": found.whole_at.isoformat() if found.whole_at else None,
    }
    if not found.sound:
        return told, "broken"
    return told, "ok" if found.at else "not all verified yet"


def _broker() -> str:
    # Any failure means the same here: nobody is woken, and the sweeper does the work later.
    with suppress(Exception), current_app.connection(connect_timeout=1) as broker:
        broker.ensure_connection(max_retries=1, interval_start=0, interval_step=0, timeout=1)
        return "ok"
    return "not reached"
