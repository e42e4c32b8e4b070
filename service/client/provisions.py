"""What an operator lays down for a time: standard weights, rules, restrictions and permits."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import datetime
from typing import Any, Literal
from urllib.parse import quote, urlencode
from uuid import uuid4

from service.client.exchange import Exchange
from service.client.reading import read

OfOperator = Literal["standard-weights", "rules"]
OfAircraft = Literal["restrictions", "permits"]


@dataclass(frozen=True, slots=True)
class Provision:
    """One version. `approved` is always true of a restriction, which binds from its entry; `ended` says that
    it was lifted or ended.
    """

    id: str
    kind: str
    number: int
    true_from: str
    true_until: str | None
    approved: bool
    ended: bool
    digest: str
    body: Mapping[str, Any] = field(repr=False, compare=False)


@dataclass(frozen=True, slots=True)
class Provisions:
    """Which versions held, by id, and every version, the one entered last first."""

    in_force: tuple[str, ...]
    versions: tuple[Provision, ...]


class ProvisionRecords:
    """What is read, entered, approved and ended. Whoever entered a version does not approve it, and does not
    lift a restriction.
    """

    _exchange: Exchange

    def provisions(
        self,
        kind: OfOperator | OfAircraft,
        registration: str = "",
        *,
        at: datetime | None = None,
        as_known_at: datetime | None = None,
    ) -> Provisions:
        """This function will return the versions of a kind, of the operator or of the aircraft named, and
        which held at `at`, as was known at `as_known_at`; both are now unless given.
        """
        asked = {"at": at, "as-known-at": as_known_at}
        query = urlencode({name: value.isoformat() for name, value in asked.items() if value})
        path = _place(kind, registration)
        answer = self._exchange.get(f"{path}?{query}" if query else path).document()
        return read(
            lambda body: Provisions(tuple(body["in_force"]), tuple(_one(one) for one in body["versions"])),
            answer,
        )

    def enter_provision(
        self,
        kind: OfOperator | OfAircraft,
        document: Mapping[str, object],
        registration: str = "",
        *,
        key: str = "",
    ) -> Provision:
        """This function will enter a version: `tarebook.standard-weights/1`, `tarebook.rules/1`, or of an
        aircraft `tarebook.restriction/1`, `tarebook.permit/1`.
        """
        return _one(self._exchange.post(_place(kind, registration), document, key=_key(key)).document())

    def approve_provision(
        self,
        kind: Literal["standard-weights", "rules", "permits"],
        version: Provision,
        reason: str,
        registration: str = "",
        *,
        key: str = "",
    ) -> Provision:
        """This function will approve what somebody else entered; a restriction needs no approval."""
        path = f"{_place(kind, registration)}/{version.id}/approval"
        return _one(self._exchange.post(path, {"reason": reason}, key=_key(key)).document())

    def end_provision(
        self,
        kind: OfAircraft,
        version: Provision,
        reason: str,
        registration: str,
        *,
        true_from: datetime | None = None,
        key: str = "",
    ) -> Provision:
        """This function will lift a restriction, or end a permit, from an instant on; now unless given."""
        way = "lifting" if kind == "restrictions" else "ending"
        ending = {"reason": reason} | ({"true_from": true_from.isoformat()} if true_from else {})
        path = f"{_place(kind, registration)}/{version.id}/{way}"
        return _one(self._exchange.post(path, ending, key=_key(key)).document())


def _one(body: Mapping[str, Any]) -> Provision:
    return read(
        lambda one: Provision(
            id=one["id"],
            kind=one["kind"],
            number=one["number"],
            true_from=one["true_from"],
            true_until=one["true_until"],
            approved=one["kind"] == "restriction" or one["approval"] is not None,
            ended=one["ending"] is not None,
            digest=one["digest"],
            body=one,
        ),
        body,
    )


def _place(kind: str, registration: str) -> str:
    return f"/aircraft/{quote(registration, safe='')}/{kind}" if registration else f"/{kind}"


def _key(given: str) -> str:
    return given or str(uuid4())
