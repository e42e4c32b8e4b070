"""What the search forms of pages ask: words, days and whole numbers, each with a fault in words beside it."""

from dataclasses import dataclass, field
from datetime import date, datetime, time, timedelta
from zoneinfo import ZoneInfo

from django.http import HttpRequest

LONGEST = 80
# The neighbours of the first and the last day of the calendar could not be named.
FIRST_DAY, LAST_DAY = date(1950, 1, 1), date(2150, 1, 1)
LARGEST_NUMBER = 2**31 - 1


@dataclass
class Look:
    """A search form as it was sent: `typed` is shown again, `faults` stand beside the fields."""

    request: HttpRequest
    typed: dict[str, str] = field(default_factory=dict)
    faults: dict[str, str] = field(default_factory=dict)

    def word(self, name: str) -> str:
        """This function will return what was typed, trimmed; "" for nothing, and for a fault."""
        value = self.request.GET.get(name, "").strip()
        self.typed[name] = value[:LONGEST] if value.isprintable() else ""
        if len(value) > LONGEST or not value.isprintable():
            self.faults[name] = f"At most {LONGEST} printable characters."
            return ""
        return value

    def day(self, name: str) -> date | None:
        """This function will return the day typed, None without one or for a fault."""
        text = self.word(name)
        if not text:
            return None
        try:
            found = date.fromisoformat(text)
        except ValueError:
            found = None
        if found is None or not FIRST_DAY <= found <= LAST_DAY:
            self.faults[name] = "Write a day like 2026-12-01."
            return None
        return found

    def number(self, name: str) -> int | None:
        """This function will return the whole number typed, None without one or for a fault."""
        text = self.word(name)
        if not text:
            return None
        if not (text.isascii() and text.isdigit()) or not 1 <= int(text) <= LARGEST_NUMBER:
            self.faults[name] = "Write a whole number from 1 on."
            return None
        return int(text)


def begins(day: date | None, zone: ZoneInfo) -> datetime | None:
    """This function will return the first instant of a day of the operator's clock."""
    return datetime.combine(day, time(), tzinfo=zone) if day is not None else None


def ends(day: date | None, zone: ZoneInfo) -> datetime | None:
    """This function will return the first instant after a day of the operator's clock."""
    return begins(day + timedelta(days=1), zone) if day is not None else None
