"""Judges where an event may be sent: the address as typed, and each number a name resolves to.

A receiver's address is chosen by whoever subscribes, so without this the service could be made to call
what only it can reach (server-side request forgery).
"""

import ipaddress
import re
from collections.abc import Collection
from dataclasses import dataclass
from typing import Final
from urllib.parse import urlsplit

LONGEST: Final = 500
PORTS: Final = {"https": 443, "http": 80}
_VISIBLE: Final = re.compile(r"[\x21-\x7e]+")
_NAME: Final = re.compile(
    r"(?=.{1,253}\Z)[a-z0-9_](?:[a-z0-9_-]*[a-z0-9_])?(?:\.[a-z0-9_](?:[a-z0-9_-]*[a-z0-9_])?)*"
)
# Refused besides what the library calls not global, private and the like, because older Pythons call them
# global, or because an IPv4 address hides in them (mapped, compatible, NAT64, 6to4, Teredo). From the IANA
# special-purpose registries, remembered, not read for this.
_NOT_OUTSIDE: Final = tuple(
    ipaddress.ip_network(text)
    for text in (
        "0.0.0.0/8", "100.64.0.0/10", "192.0.0.0/24", "192.0.2.0/24", "192.88.99.0/24", "198.18.0.0/15",
        "198.51.100.0/24", "203.0.113.0/24", "240.0.0.0/4",
        "::/96", "::ffff:0:0/96", "::ffff:0:0:0/96", "64:ff9b::/96", "64:ff9b:1::/48", "100::/64",
        "2001::/23", "2001:db8::/32", "2002::/16", "3fff::/20", "5f00::/16", "fec0::/10",
    )
)  # fmt: skip


@dataclass(frozen=True, slots=True)
class Receiver:
    """Where to send: `host` in lower case without brackets, `target` the path with its query."""

    scheme: str
    host: str
    port: int
    target: str

    @property
    def place(self) -> str:
        """The host and its port, as the setting of trusted receivers writes them."""
        return place_of(self.host, self.port)

    @property
    def host_header(self) -> str:
        """What stands in the header Host: the port only where it is not the usual one."""
        bare = f"[{self.host}]" if ":" in self.host else self.host
        return bare if self.port == PORTS[self.scheme] else f"{bare}:{self.port}"


class AddressRefused(ValueError):
    """An address nothing is sent to. `code` is stable; the text says why."""

    def __init__(self, code: str, detail: str) -> None:
        super().__init__(detail)
        self.code = code
        self.detail = detail


def place_of(host: str, port: int) -> str:
    """This function will write a host and a port: `relay.example.org:8443`, `[::1]:9000`."""
    return f"[{host}]:{port}" if ":" in host else f"{host}:{port}"


def read_receiver(address: str, *, trusted: Collection[str]) -> Receiver:
    """This function will read a receiver's address; raises AddressRefused.

    Only `https`, unless the place is in `trusted` (host:port). A number that is not public is refused at
    once; what a name resolves to is judged with each attempt.
    """
    if len(address) > LONGEST or not _VISIBLE.fullmatch(address):
        raise AddressRefused("address-malformed", f"an address has 1 to {LONGEST} visible ASCII characters")
    receiver = _split(address)
    if receiver.place in trusted:
        return receiver
    if receiver.scheme != "https":
        raise AddressRefused("address-not-https", "events are sent over https only")
    if receiver.host == "localhost" or receiver.host.endswith(".localhost"):
        raise AddressRefused("address-not-public", "this names the machine itself")
    if (reason := _reason_against_literal(receiver.host)) is not None:
        raise AddressRefused("address-not-public", reason)
    return receiver


def reason_against(number: str) -> str | None:
    """This function will say why nothing is sent to this IP address, None when it is a public one.

    Refused: private, loopback, link-local, multicast, reserved, unspecified and documentation addresses,
    those with a zone, and IPv6 addresses that carry an IPv4 address.
    """
    try:
        address = ipaddress.ip_address(number)
    except ValueError:
        return f"{number[:60]} is no address"
    if "%" in number:
        return f"{number[:60]} is an address of one link only"
    if any(address in network for network in _NOT_OUTSIDE if network.version == address.version):
        return f"{address} is not a public address"
    inside = address.is_private or address.is_loopback or address.is_link_local or address.is_unspecified
    if inside or address.is_multicast or address.is_reserved or not address.is_global:
        return f"{address} is not a public address"
    return None


def _reason_against_literal(host: str) -> str | None:
    try:
        ipaddress.ip_address(host)
    except ValueError:
        return None
    return reason_against(host)


def _split(address: str) -> Receiver:
    try:
        parts = urlsplit(address)
        port = parts.port
    except ValueError:
        raise AddressRefused("address-malformed", "this is no address") from None
    host = (parts.hostname or "").lower().removesuffix(".")
    if parts.scheme not in PORTS:
        raise AddressRefused("address-not-https", "an address begins with https://")
    if parts.username is not None or parts.password is not None:
        raise AddressRefused(
            "address-with-login", "leave out login and password: the signature says who sends"
        )
    if parts.fragment or "#" in address:
        raise AddressRefused("address-malformed", "leave out what stands behind #, it is never sent")
    if port == 0 or not (_NAME.fullmatch(host) or _is_number_in_brackets(host)):
        raise AddressRefused("address-malformed", "the address names no host that could be reached")
    target = (parts.path or "/") + (f"?{parts.query}" if parts.query else "")
    return Receiver(parts.scheme, host, port or PORTS[parts.scheme], target)


def _is_number_in_brackets(host: str) -> bool:
    try:
        return ipaddress.ip_address(host).version == 6  # noqa: PLR2004  # the only one written in brackets
    except ValueError:
        return False
