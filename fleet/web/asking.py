"""What the pages about people and tokens ask of a request, and how they write times and faults."""

from collections.abc import Mapping
from datetime import datetime
from zoneinfo import ZoneInfo

from django.http import HttpRequest

from fleet.models import Operator, Person
from records.refusal import NotSignedIn, Refused
from records.web.asking import operator_of


def zone_of(request: HttpRequest) -> ZoneInfo:
    """This function will return the time zone of the operator of who is signed in."""
    return ZoneInfo(Operator.objects.values_list("time_zone", flat=True).get(code=operator_of(request)))


def person_of_page(request: HttpRequest) -> Person:
    """This function will return the person who is signed in; raises NotSignedIn without one."""
    if not isinstance(request.user, Person):
        raise NotSignedIn("not-signed-in", "Nobody is signed in.")
    return request.user


def local(instant: datetime | None, zone: ZoneInfo) -> str:
    """This function will write an instant on the operator's clock, to the minute; nothing for none."""
    return instant.astimezone(zone).isoformat(sep=" ", timespec="minutes") if instant else ""


def faults_by_input(refusal: Refused | None, renamed: Mapping[str, str] | None = None) -> dict[str, str]:
    """This function will return the first fault of each input: that of `/scopes/0` stands at `scopes`."""
    found: dict[str, str] = {}
    for fault in refusal.faults if refusal else ():
        name = fault.pointer.removeprefix("/").split("/")[0]
        found.setdefault((renamed or {}).get(name, name), fault.detail)
    return found


def without_empty(typed: Mapping[str, str]) -> dict[str, str]:
    """This function will leave out what was not typed, as a program leaves a field away."""
    return {name: value for name, value in typed.items() if value}


def whole_or_words(text: str) -> int | str:
    """This function will return the whole number typed, or the words as they stand, to be refused by name."""
    plain = text.isascii() and text.removeprefix("-").isdigit() and len(text) <= len(str(2**62))
    return int(text) if plain else text
