"""The acts of this room that each role allows, in the words of `fleet.duties`; `service.actors` joins them.

Whether the signer is the load's own pilot in command is asked of the load, not of the role. An integration
never signs.
"""

from collections.abc import Mapping
from types import MappingProxyType
from uuid import UUID

from fleet.duties import Role
from loads import acts
from records.actor import Actor

_DECLARES = frozenset(
    {
        acts.SUBMIT_LOAD.name,
        acts.REVISE_LOAD.name,
        acts.ASSESS_LOAD.name,
        acts.WITHDRAW_LOAD.name,
        acts.DEPART_LOAD.name,
    }
)
# Who supervised the loading says so, where the operator's rules ask for it.
_CONFIRMS = frozenset({acts.CONFIRM_LOADING.name})
_PREPARES = frozenset({acts.PREPARE_LOAD.name})
# A last-minute change is accepted in the step that makes it, so it is the pilot's.
_ACCEPTS = frozenset({acts.ACCEPT_LOAD.name, acts.CHANGE_LATE.name})
_NOTES = frozenset({acts.WRITE_NOTE.name})
# Whoever may have a hand in mending a rejected load, maintenance with its weighings among them.
_REMARKS = frozenset({acts.REMARK_REJECT.name})

# Who looks after the computing itself.
_PROVES = frozenset({acts.RUN_SELF_CHECK.name, acts.RECHECK_LOADS.name})

ACTS_OF: Mapping[Role, frozenset[str]] = MappingProxyType(
    {
        "pilot": _DECLARES | _PREPARES | _ACCEPTS | _REMARKS | _NOTES,
        "load preparer": _DECLARES | _PREPARES | _REMARKS | _NOTES,
        "loading supervisor": _REMARKS | _CONFIRMS,
        "maintenance": _REMARKS,
        "records approver": _REMARKS,
        "operations manager": _DECLARES | _PREPARES | _REMARKS | _NOTES | _PROVES,
        "auditor": frozenset(),
        "integration": _DECLARES,
    }
)

# What the worker may do that prints and files manifests, tells of stale loads, and computes loads again.
ACTS_OF_THE_WORKER = frozenset({acts.FILE_MANIFEST.name, acts.TELL_STALE.name, acts.FINISH_RECHECK.name})


def service_at_work(operator: str, caused_by: UUID | None) -> Actor:
    """This function will return the service itself, acting for an operator because of somebody's act."""
    return Actor(
        operator=operator,
        kind="service",
        key="service:worker",
        name="",
        capacity="worker",
        may=ACTS_OF_THE_WORKER,
        caused_by=caused_by,
    )
