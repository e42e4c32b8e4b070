"""People with their duties, tokens, and the operator's settings. What needs a person who is signed in (a new
token, a password, a mail address) no token does, so it is not here.
"""

from collections.abc import Mapping
from dataclasses import dataclass, field
from datetime import datetime
from typing import Any
from urllib.parse import urlencode
from uuid import uuid4

from service.client.exchange import Answer, Exchange
from service.client.reading import read


@dataclass(frozen=True, slots=True)
class Who:
    """Who asks: what the trail calls them, and the acts they may do. `registrations` None: all aircraft."""

    key: str
    operator: str
    capacity: str
    may: frozenset[str]
    registrations: frozenset[str] | None


@dataclass(frozen=True, slots=True)
class Person:
    """One person; `roles` are the duties held now."""

    id: int
    login: str
    name: str
    active: bool
    roles: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Token:
    """One token, without its secret."""

    id: int
    label: str
    person: str
    integration: bool
    scopes: tuple[str, ...]
    body: Mapping[str, Any] = field(repr=False, compare=False)


@dataclass(frozen=True, slots=True)
class Settings:
    """A version of the operator's settings; `etag` goes along with the next change."""

    number: int
    etag: str
    body: Mapping[str, Any] = field(repr=False, compare=False)


class People:
    """What is done with people, tokens and settings."""

    _exchange: Exchange

    def who_am_i(self) -> Who:
        """This function will say who this token is, and what it may do."""
        return read(_who, self._exchange.get("/me").document())

    def people(self) -> tuple[Person, ...]:
        """This function will return the operator's people by login, those who left too."""
        return tuple(_person_in(one) for one in self._exchange.get("/people").rows("people"))

    def person(self, number: int) -> Person:
        """This function will read one person."""
        return _person_in(self._exchange.get(f"/people/{int(number)}").document())

    def enter_person(self, document: Mapping[str, object], *, key: str = "") -> Person:
        """This function will enter a person: login, name and a first password, and a mail address if any."""
        return _person_in(self._exchange.post("/people", document, key=key or str(uuid4())).document())

    def change_duty(
        self,
        person: Person,
        role: str,
        reason: str,
        *,
        granted: bool,
        since: datetime | None = None,
        key: str = "",
    ) -> Person:
        """This function will grant or end a duty, now or from a later instant on."""
        asked: dict[str, object] = {"role": role, "granted": granted, "reason": reason}
        if since is not None:
            asked["since"] = since.isoformat()
        path = f"/people/{person.id}/duties"
        return _person_in(self._exchange.post(path, asked, key=key or str(uuid4())).document())

    def deactivate(self, person: Person, reason: str, *, key: str = "") -> Person:
        """This function will end all access of a person, for good."""
        path = f"/people/{person.id}/deactivation"
        return _person_in(self._exchange.post(path, {"reason": reason}, key=key or str(uuid4())).document())

    def tokens(self) -> tuple[Token, ...]:
        """This function will return one's own tokens, or all for who may look at the people."""
        return tuple(_token_in(one) for one in self._exchange.get("/tokens").rows("tokens"))

    def revoke_token(self, token: Token, reason: str, *, key: str = "") -> Token:
        """This function will revoke a token with every secret it has."""
        path = f"/tokens/{token.id}/revocation"
        return _token_in(self._exchange.post(path, {"reason": reason}, key=key or str(uuid4())).document())

    def settings(self, *, at: datetime | None = None, as_known_at: datetime | None = None) -> Settings:
        """This function will return what holds for the operator, at an instant, as known at another."""
        clocks = {"at": at, "as-known-at": as_known_at}
        asked = urlencode({name: one.isoformat() for name, one in clocks.items() if one})
        answer = self._exchange.get(f"/settings?{asked}" if asked else "/settings")
        return read(lambda one: _settings(one["in_force"], answer), answer.document())

    def change_settings(self, seen: Settings, document: Mapping[str, object], *, key: str = "") -> Settings:
        """This function will enter a new version, with its `reason`; what is left out stays as it is."""
        answer = self._exchange.post("/settings", document, key=key or str(uuid4()), etag=seen.etag)
        return read(lambda one: _settings(one, answer), answer.document())


def _who(body: Mapping[str, Any]) -> Who:
    reach = body["registrations"]
    return Who(
        body["key"],
        body["operator"],
        body["capacity"],
        frozenset(body["may"]),
        None if reach is None else frozenset(reach),
    )


def _person_in(body: Mapping[str, Any]) -> Person:
    named = ("id", "login", "name", "active")
    return read(lambda one: Person(**{name: one[name] for name in named}, roles=tuple(one["roles"])), body)


def _token_in(body: Mapping[str, Any]) -> Token:
    named = ("id", "label", "person", "integration")
    return read(
        lambda one: Token(**{name: one[name] for name in named}, scopes=tuple(one["scopes"]), body=one), body
    )


def _settings(body: Mapping[str, Any], answer: Answer) -> Settings:
    return Settings(body["number"], answer.etag, body)
