"""The duties a person may hold, grouped as roles, and the acts of this room that each allows.

Rooms above name their own acts per role the same way; `service.actors` joins them. A person may hold duties
that enter and that approve; the database still refuses the same person twice on one version.
"""

from collections.abc import Mapping
from types import MappingProxyType
from typing import Final, Literal, get_args

from fleet import acts
from records.actor import Actor
from records.acts import READ_ACCESS_LOG, WEBHOOK_KINDS

# Looking at the people, and at who signed in when, is no act; it needs leave all the same.
READ_PEOPLE: Final = "read-people"

Role = Literal[
    "pilot",
    "load preparer",
    "loading supervisor",
    "maintenance",
    "records approver",
    "operations manager",
    "auditor",
    "integration",
]
ROLES: tuple[Role, ...] = get_args(Role)

# What anybody with a login may do for themselves.
_OWN = frozenset(
    {
        acts.CHANGE_PASSWORD.name,
        acts.CHANGE_MAIL.name,
        acts.END_SESSIONS.name,
        acts.ISSUE_TOKEN.name,
        acts.ROTATE_TOKEN.name,
        acts.REVOKE_TOKEN.name,
    }
)
_ENTERS = frozenset(
    {
        acts.ENTER_AIRCRAFT.name,
        acts.ENTER_LOADING_BASIS.name,
        acts.ENTER_EMPTY_WEIGHT.name,
        acts.ENTER_RESTRICTION.name,
        acts.ENTER_PERMIT.name,
        acts.END_PERMIT.name,
    }
)
# Lifting a restriction widens what is allowed, so it is an approver's.
_APPROVES = frozenset(
    {
        acts.APPROVE_LOADING_BASIS.name,
        acts.APPROVE_EMPTY_WEIGHT.name,
        acts.APPROVE_STANDARD_WEIGHTS.name,
        acts.APPROVE_RULES.name,
        acts.APPROVE_PERMIT.name,
        acts.LIFT_RESTRICTION.name,
    }
)
_PEOPLE = frozenset(
    {
        acts.ENTER_PERSON.name,
        acts.GRANT_DUTY.name,
        acts.END_DUTY.name,
        acts.DEACTIVATE_PERSON.name,
        acts.LET_CHOOSE_PASSWORD.name,
    }
)
_SETTLES = frozenset({acts.CHANGE_SETTINGS.name, acts.ENTER_STANDARD_WEIGHTS.name, acts.ENTER_RULES.name})
# Who is told of events: a manager decides it, and an integration that was given the scope may for itself.
_WEBHOOKS = frozenset(kind.name for kind in WEBHOOK_KINDS)

ACTS_OF: Mapping[Role, frozenset[str]] = MappingProxyType(
    {
        "pilot": _OWN,
        "load preparer": _OWN,
        "loading supervisor": _OWN,
        "maintenance": _OWN | _ENTERS,
        "records approver": _OWN | _APPROVES,
        "operations manager": _OWN | _ENTERS | _APPROVES | _PEOPLE | _SETTLES | _WEBHOOKS,
        "auditor": _OWN,
        "integration": _WEBHOOKS,
    }
)

# What each role may look at besides the fleet and the loads, which every role does.
READS_OF: Mapping[Role, frozenset[str]] = MappingProxyType(
    {
        "operations manager": frozenset({READ_PEOPLE, READ_ACCESS_LOG}),
        "auditor": frozenset({READ_PEOPLE, READ_ACCESS_LOG}),
    }
)


def is_role(word: str) -> bool:
    """This function will say whether the word names a role."""
    return word in ACTS_OF


def scheduler_at_work(operator: str) -> Actor:
    """This function will return the scheduler, acting for an operator by the calendar."""
    return Actor(
        operator=operator,
        kind="service",
        key="service:scheduler",
        name="",
        capacity="scheduler",
        may=frozenset({acts.TELL_FALLING_DUE.name}),
    )
