"""Aircraft with their loading bases and empty weights."""

from collections.abc import Mapping
from datetime import datetime
from urllib.parse import quote, urlencode
from uuid import uuid4

from service.client.exchange import Exchange
from service.client.shapes import Aircraft, EmptyWeights, Version, aircraft_in, empty_weights_in, version_in


class AircraftRecords:
    """What is read and entered about aircraft. Two people are needed for what moves a limit: who enters it
    does not approve it.
    """

    _exchange: Exchange

    def aircraft(self) -> tuple[Aircraft, ...]:
        """This function will return every aircraft this token may see, by registration."""
        return tuple(aircraft_in(one) for one in self._exchange.get("/aircraft").rows("aircraft"))

    def one_aircraft(self, registration: str) -> Aircraft:
        """This function will return one aircraft; `body` also says what is in force now."""
        return aircraft_in(self._exchange.get(_place(registration)).document())

    def empty_weights(
        self, registration: str, *, at: datetime | None = None, as_known_at: datetime | None = None
    ) -> EmptyWeights:
        """This function will return the empty weights of an aircraft, and which were in force at `at`, as it
        was known at `as_known_at`; both are now unless given.
        """
        asked = {"at": at, "as-known-at": as_known_at}
        query = urlencode({name: value.isoformat() for name, value in asked.items() if value})
        path = f"{_place(registration)}/empty-weights"
        return empty_weights_in(self._exchange.get(f"{path}?{query}" if query else path).document())

    def enter_aircraft(self, document: Mapping[str, object], *, key: str = "") -> Aircraft:
        """This function will enter an aircraft."""
        return aircraft_in(self._exchange.post("/aircraft", document, key=_key(key)).document())

    def enter_loading_basis(
        self, registration: str, document: Mapping[str, object], *, key: str = ""
    ) -> Version:
        """This function will enter a loading basis, `tarebook.loading-basis/1`."""
        path = f"{_place(registration)}/loading-bases"
        return version_in(self._exchange.post(path, document, key=_key(key)).document())

    def approve_loading_basis(
        self, registration: str, version: Version, reason: str, *, true_from: datetime, key: str = ""
    ) -> None:
        """This function will approve a loading basis that somebody else entered, true from an instant on."""
        path = f"{_place(registration)}/loading-bases/{version.id}/approval"
        approval = {"true_from": true_from.isoformat(), "reason": reason}
        self._exchange.post(path, approval, key=_key(key))

    def enter_empty_weight(
        self, registration: str, document: Mapping[str, object], *, key: str = ""
    ) -> Version:
        """This function will enter an empty weight, `tarebook.empty-weight/1`."""
        path = f"{_place(registration)}/weighings"
        return version_in(self._exchange.post(path, document, key=_key(key)).document())

    def approve_empty_weight(
        self, registration: str, version: Version, reason: str, *, key: str = ""
    ) -> None:
        """This function will approve an empty weight that somebody else entered."""
        path = f"{_place(registration)}/empty-weights/{version.id}/approval"
        self._exchange.post(path, {"reason": reason}, key=_key(key))


def _place(registration: str) -> str:
    return f"/aircraft/{quote(registration, safe='')}"


def _key(given: str) -> str:
    return given or str(uuid4())
