"""The form of a row of the permission matrix: who may, by which ways, what is sent and what is answered."""

from collections.abc import Callable
from dataclasses import dataclass, field
from typing import Any, Final, Literal

from tests.service.permission_world import World

EVERYBODY: Final = frozenset({"everybody, signed in or not"})
EVERY: Final = frozenset(
    {
        "pilot",
        "load preparer",
        "loading supervisor",
        "maintenance",
        "records approver",
        "operations manager",
        "auditor",
        "integration",
    }
)
OWN: Final = EVERY - {"integration"}
DECLARE: Final = frozenset({"pilot", "load preparer", "operations manager", "integration"})
PREPARE: Final = frozenset({"pilot", "load preparer", "operations manager"})
ACCEPT: Final = frozenset({"pilot"})
CONFIRM: Final = frozenset({"loading supervisor"})
REMARK: Final = EVERY - {"auditor", "integration"}
NOTE: Final = PREPARE
ENTER: Final = frozenset({"maintenance", "operations manager"})
APPROVE: Final = frozenset({"records approver", "operations manager"})
MANAGE: Final = frozenset({"operations manager"})
SUBSCRIBE: Final = frozenset({"operations manager", "integration"})
LOOK_AT_PEOPLE: Final = frozenset({"operations manager", "auditor"})


@dataclass(frozen=True, slots=True)
class Sent:
    """A valid request: what stands in the address, the query, the body (a form for a page) and headers."""

    at: dict[str, str] = field(default_factory=dict)
    query: dict[str, str] = field(default_factory=dict)
    body: Any = None
    headers: dict[str, str] = field(default_factory=dict)


Send = Callable[[World, str], Sent]
Way = Literal["any", "person", "session"]


@dataclass(frozen=True, slots=True)
class Row:
    """One operation, or one case of it. `foreign` is what another operator's people get who may do it at
    home; None where nothing of an operator is named.
    """

    method: str
    path: str
    may: frozenset[str]
    then: int
    send: Send = lambda _world, _role: Sent()
    way: Way = "any"
    foreign: int | None = None
    case: str = ""

    @property
    def name(self) -> str:
        return f"{self.method} {self.path}{f' ({self.case})' if self.case else ''}"


def named(*names: str, **more: Any) -> Send:
    """This function will return what sends a request whose address names these."""

    def send(world: World, role: str) -> Sent:
        return Sent(at={name: name_of(world, role, name) for name in names}, **more)

    return send


def name_of(world: World, role: str, name: str) -> str:
    match name:
        case "registration":
            return world.aircraft
        case "person":
            return str(world.by_role["idle"].pk)
        case "token":
            return world.names.get(f"token of {role}", world.names["token of pilot"])
        case "load":
            return str(world.loads["open"].load.id)
        case _:
            return world.names[name]


def version(kind: str) -> Send:
    def send(world: World, _role: str) -> Sent:
        return Sent(at={"registration": world.aircraft, "version": world.names[kind]}, body={})

    return send
