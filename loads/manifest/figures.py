"""Figures and times as they are printed: columns that line up, sides in letters, two clocks."""

from collections.abc import Sequence
from datetime import UTC, datetime
from fractions import Fraction
from zoneinfo import ZoneInfo

from fleet.basis import Chord
from loads.balance.rounding import CHORD_PLACES, Direction, printed

GROUPED_FROM = 5  # figures before the point from which thousands are set apart
SPACE = "\u00a0"


def column(texts: Sequence[str | None]) -> list[str]:
    """This function will give the figures of a column the same number of decimals; None becomes an empty
    cell.

    Only zeros are added, so no figure changes.
    """
    places = max((len(text.partition(".")[2]) for text in texts if text), default=0)
    return ["" if text is None else figure(text, places) for text in texts]


def figure(text: str, places: int | None = None) -> str:
    """This function will write a decimal text with a true minus sign, thousands of long figures set apart."""
    sign = "\u2212" if text.startswith("-") else ""
    whole, _, part = text.lstrip("-").partition(".")
    part = part if places is None else part.ljust(places, "0")
    if len(whole) >= GROUPED_FROM:
        whole = f"{int(whole):,}".replace(",", SPACE)
    return f"{sign}{whole}.{part}" if part else f"{sign}{whole}"


def sided(texts: Sequence[str | None]) -> list[str]:
    """This function will write a column of lateral figures with L or R in front, never with a bare sign."""
    plain = column([text.lstrip("-") if text else text for text in texts])
    return [
        written
        if not text or not text.strip("-0.")
        else f"{'L' if text.startswith('-') else 'R'}{SPACE}{written}"
        for text, written in zip(texts, plain, strict=True)
    ]


def percent_chord(arm: str, chord: Chord | None, direction: Direction) -> str:
    """This function will return an arm as per cent of the chord, rounded as told, or "" without a chord."""
    if chord is None:
        return ""
    return printed((Fraction(arm) - chord.leading_edge) / chord.length * 100, CHORD_PLACES, direction)


def both_clocks(moment: datetime, zone: str) -> str:
    """This function will write an instant in UTC and in local time with its offset."""
    here = moment.astimezone(ZoneInfo(zone))
    return f"{utc(moment)} ({here:%Y-%m-%d %H:%M:%S} {offset(here)} local)"


def utc(moment: datetime) -> str:
    """This function will write an instant in UTC, to the second."""
    return f"{moment.astimezone(UTC):%Y-%m-%d %H:%M:%S} UTC"


def offset(moment: datetime) -> str:
    """This function will write the offset of an aware instant as +02:00, with a true minus sign."""
    text = moment.isoformat()[-6:] if moment.utcoffset() else "+00:00"
    return text.replace("-", "\u2212")
