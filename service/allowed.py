"""Which acts a person or a token may do: the duties of all rooms joined, and what a token never may."""

from collections.abc import Collection
from typing import Final

import fleet.acts
import fleet.duties
import loads.acts
import loads.duties
import records.actor
import records.acts

# Reading is no act and leaves nothing in the trail, but a token needs leave for it all the same.
READ: Final = records.actor.READ
READS: Final = frozenset({READ, fleet.duties.READ_PEOPLE, records.acts.READ_ACCESS_LOG})
# The scope a person's token needs, besides the password, to sign. It is no act either.
SIGN: Final = "sign"
SIGNATURES: Final = frozenset(
    {
        loads.acts.PREPARE_LOAD.name,
        loads.acts.CONFIRM_LOADING.name,
        loads.acts.ACCEPT_LOAD.name,
        loads.acts.CHANGE_LATE.name,
    }
)
# Whatever approves a figure, widens a limit or says who may do what needs a person: an integration never does
# it, whoever owns it. It may tighten: enter a restriction, end a permit.
_NEEDS_A_PERSON: Final = SIGNATURES | {
    fleet.acts.APPROVE_LOADING_BASIS.name,
    fleet.acts.APPROVE_EMPTY_WEIGHT.name,
    fleet.acts.CHANGE_SETTINGS.name,
    fleet.acts.ENTER_STANDARD_WEIGHTS.name,
    fleet.acts.APPROVE_STANDARD_WEIGHTS.name,
    fleet.acts.ENTER_RULES.name,
    fleet.acts.APPROVE_RULES.name,
    fleet.acts.APPROVE_PERMIT.name,
    fleet.acts.LIFT_RESTRICTION.name,
    loads.acts.REMARK_REJECT.name,
    loads.acts.WRITE_NOTE.name,
    loads.acts.RECHECK_LOADS.name,
    loads.acts.RUN_SELF_CHECK.name,
    fleet.acts.ENTER_PERSON.name,
    fleet.acts.GRANT_DUTY.name,
    fleet.acts.END_DUTY.name,
    fleet.acts.CHANGE_PASSWORD.name,
    fleet.acts.CHANGE_MAIL.name,
    fleet.acts.LET_CHOOSE_PASSWORD.name,
    fleet.acts.ISSUE_TOKEN.name,
    fleet.acts.REVOKE_TOKEN.name,
    fleet.acts.ROTATE_TOKEN.name,
    fleet.acts.DEACTIVATE_PERSON.name,
    fleet.acts.END_SESSIONS.name,
    fleet.duties.READ_PEOPLE,
    records.acts.READ_ACCESS_LOG,
}
# A token makes no token and takes nobody's session or password: these need a person who is signed in.
_NEEDS_A_SESSION: Final = frozenset(
    {
        fleet.acts.CHANGE_PASSWORD.name,
        fleet.acts.CHANGE_MAIL.name,
        fleet.acts.LET_CHOOSE_PASSWORD.name,
        fleet.acts.END_SESSIONS.name,
        fleet.acts.ISSUE_TOKEN.name,
        fleet.acts.ROTATE_TOKEN.name,
    }
)


def to_person(roles: Collection[str]) -> frozenset[str]:
    """This function will return the acts the roles allow, and `read` when there is at least one role.

    A person without any duty can sign in and sees nothing.
    """
    acts: frozenset[str] = frozenset()
    for role in fleet.duties.ROLES:
        if role in roles:
            acts |= fleet.duties.ACTS_OF[role] | loads.duties.ACTS_OF[role] | {READ}
            acts |= fleet.duties.READS_OF.get(role, frozenset())
    return acts


def to_token(roles: Collection[str], scopes: Collection[str], *, integration: bool) -> frozenset[str]:
    """This function will return what the token's scopes and its person's roles both allow.

    Signatures need the scope `sign` besides the act's own name. An integration does nothing that needs a
    person.
    """
    acts = (to_person(roles) & frozenset(scopes)) - _NEEDS_A_SESSION
    if SIGN not in scopes:
        acts -= SIGNATURES
    return acts - _NEEDS_A_PERSON if integration else acts


def grantable(roles: Collection[str], *, integration: bool) -> frozenset[str]:
    """This function will return the scopes a token of somebody with these roles may be given."""
    acts = to_person(roles) - _NEEDS_A_SESSION
    if integration:
        return acts - _NEEDS_A_PERSON
    return acts | {SIGN} if acts & SIGNATURES else acts
