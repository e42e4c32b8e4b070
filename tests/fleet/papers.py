"""Enters restrictions and permits for the tests, through the real actions."""

from typing import Any

from fleet.actions.approve_permit import approve_permit
from fleet.actions.enter_permit import enter_permit
from fleet.actions.enter_restriction import enter_restriction
from fleet.models import Aircraft, Provision
from tests.cast import Cast, actor
from tests.pure.loads.papers import permit_document, restriction_document


def restrict(people: Cast, aircraft: Aircraft, *effects: dict[str, Any], **changes: Any) -> Provision:
    """This function will enter a restriction of the aircraft."""
    return enter_restriction(actor(people.maintenance), aircraft, restriction_document(*effects, **changes))


def permitted(people: Cast, aircraft: Aircraft, *effects: dict[str, Any], **changes: Any) -> Provision:
    """This function will enter a permit and have it approved by a second person."""
    permit = enter_permit(actor(people.maintenance), aircraft, permit_document(*effects, **changes))
    approve_permit(actor(people.approver), aircraft, permit)
    return permit
