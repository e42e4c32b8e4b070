"""Where a request comes from, as far as that can be believed."""

import ipaddress
from typing import Final

from django.conf import settings
from django.http import HttpRequest

# Whoever has one address of an IPv6 network has all of its last half.
_IPV6_PREFIX: Final = 64


def address_of(request: HttpRequest) -> str:
    """This function will return the address of whoever asks, an IPv6 one as its network of 64 bits; "" when
    unknown.

    Behind a proxy it is what the proxy itself added to `X-Forwarded-For`, the last word: all before it came
    with the request and may be anything.
    """
    if settings.BEHIND_PROXY:
        said = request.headers.get("X-Forwarded-For", "").rpartition(",")[2].strip()
    else:
        said = request.META.get("REMOTE_ADDR", "")
    try:
        address = ipaddress.ip_address(said)
    except ValueError:
        return ""
    if address.version == 6:  # noqa: PLR2004  # the version of IPv6
        mapped = getattr(address, "ipv4_mapped", None)
        return str(mapped or ipaddress.ip_network((address, _IPV6_PREFIX), strict=False))
    return str(address)


def is_this_machine(request: HttpRequest) -> bool:
    """This function will say whether a program on this machine asks, and not a proxy for somebody else."""
    forwarded = {"X-Forwarded-For", "X-Forwarded-Host", "X-Forwarded-Proto", "Forwarded", "X-Real-Ip", "Via"}
    if settings.BEHIND_PROXY or any(name in request.headers for name in forwarded):
        return False
    try:
        return ipaddress.ip_address(request.META.get("REMOTE_ADDR", "")).is_loopback
    except ValueError:
        return False
