"""Mistakes of a deployment, each with an id and what to do about it: `manage.py check --deploy`."""

from collections.abc import Sequence
from typing import Any, Final

from django.apps import AppConfig
from django.conf import settings
from django.core import checks

from service.roles import SERVICE

_OURS: Final = frozenset({"127.0.0.1", "localhost", "[::1]"})


@checks.register
def two_roles(app_configs: Sequence[AppConfig] | None, **_: Any) -> list[checks.CheckMessage]:
    """This function will refuse one database role for both migrating and serving."""
    del app_configs
    owner = settings.DATABASES.get("owner")
    if owner and owner["USER"] == settings.DATABASES["default"]["USER"]:
        return [
            checks.Error(
                "DATABASE_URL and OWNER_DATABASE_URL name the same role.",
                hint=f"Serve as {SERVICE}; only migrations run as the owner. service/roles.py makes both.",
                id="tarebook.E001",
            )
        ]
    return []


@checks.register(deploy=True)
def plain_http_stays_here(app_configs: Sequence[AppConfig] | None, **_: Any) -> list[checks.CheckMessage]:
    """This function will refuse HTTPS=false for any host but this machine."""
    del app_configs
    abroad = sorted(set(settings.ALLOWED_HOSTS) - _OURS)
    if not settings.HTTPS and abroad:
        return [
            checks.Error(
                f"HTTPS is false and ALLOWED_HOSTS names other machines: {', '.join(abroad)}.",
                hint="Serve behind TLS and leave HTTPS at its default, true.",
                id="tarebook.E002",
            )
        ]
    return []


@checks.register(deploy=True)
def owner_stays_away(app_configs: Sequence[AppConfig] | None, **_: Any) -> list[checks.CheckMessage]:
    """This function will warn when the owner's address is in the environment of the process that serves."""
    del app_configs
    if "owner" in settings.DATABASES:
        return [
            checks.Warning(
                "OWNER_DATABASE_URL is set in this environment.",
                hint="Set it only for migrations: web and workers must not be able to act as the owner.",
                id="tarebook.W003",
            )
        ]
    return []
