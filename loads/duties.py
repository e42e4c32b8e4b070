"""The acts of this room that each role allows, in the words of `fleet.duties`; `service.actors` joins them.

Whether the signer is the load's own pilot in command is asked of the load, not of the role. An integration
never signs.
"""

from collections.abc import Mapping
from types import MappingProxyType

from fleet.duties import Role
from loads import acts

_DECLARES = frozenset(
    {
        acts.SUBMIT_LOAD.name,
        acts.REVISE_LOAD.name,
        acts.ASSESS_LOAD.name,
        acts.WITHDRAW_LOAD.name,
        acts.DEPART_LOAD.name,
    }
)
_PREPARES = frozenset({acts.PREPARE_LOAD.name})
_ACCEPTS = frozenset({acts.ACCEPT_LOAD.name})

ACTS_OF: Mapping[Role, frozenset[str]] = MappingProxyType(
    {
        "pilot": _DECLARES | _PREPARES | _ACCEPTS,
        "load preparer": _DECLARES | _PREPARES,
        "loading supervisor": frozenset(),
        "maintenance": frozenset(),
        "records approver": frozenset(),
        "operations manager": _DECLARES | _PREPARES,
        "auditor": frozenset(),
        "integration": _DECLARES,
    }
)

# What the worker that prints and files manifests may do.
ACTS_OF_THE_WORKER = frozenset({acts.FILE_MANIFEST.name})
