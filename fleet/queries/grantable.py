"""What scopes a token may be given: the duties of all rooms, which only the switchboard knows together."""

from collections.abc import Callable, Collection
from typing import cast

from django.conf import settings
from django.utils import timezone
from django.utils.module_loading import import_string

from fleet.models import Person
from fleet.queries.duties import roles_of


def grantable_to(person: Person, *, integration: bool) -> frozenset[str]:
    """This function will return the scopes a token of this person may be given now.

    The setting GRANTABLE names the function that joins the rooms' duties.
    """
    joined = cast("Callable[..., frozenset[str]]", import_string(settings.GRANTABLE))
    roles: Collection[str] = roles_of(person, timezone.now())
    return joined(roles, integration=integration)
