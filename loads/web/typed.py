"""What was typed on a page, field by field: words, counts and quantities, as they stand in a document."""

from collections.abc import Mapping, Sequence
from typing import Any

Typed = Mapping[str, str]

LONGEST_COUNT = 9  # digits; a longer count stays text and is refused as one


def clean(typed: Typed, name: str) -> str:
    """This function will return what was typed in an input, without blanks at its ends."""
    return typed.get(name, "").strip()


def begun(typed: Typed, prefix: str, parts: Sequence[str]) -> bool:
    """This function will say whether anything was typed in one of the parts of a line."""
    return any(clean(typed, f"{prefix}:{part}") for part in parts)


def count_of(typed: Typed, name: str, otherwise: str = "") -> int | str:
    """This function will return a whole number, or what was typed in its stead."""
    count = clean(typed, name) or otherwise
    return int(count) if count.isascii() and count.isdigit() and len(count) <= LONGEST_COUNT else count


def quantity_of(typed: Typed, name: str, unit_name: str) -> dict[str, str]:
    """This function will return the quantity typed in two inputs."""
    return {"value": clean(typed, name), "unit": clean(typed, unit_name)}


def shared_quantity(typed: Typed, name: str, unit_name: str) -> dict[str, str]:
    """This function will return a quantity whose input shares the list of units of another, or has a unit of
    its own typed behind the figure, as in "8 kg".
    """
    value, _, unit = clean(typed, name).partition(" ")
    return {"value": value, "unit": unit.strip()} if unit else quantity_of(typed, name, unit_name)


def type_shared(typed: dict[str, str], name: str, unit_name: str, quantity: Mapping[str, Any] | None) -> None:
    """This function will put a quantity into its input, with its unit where the list it shares shows
    another.
    """
    if quantity and typed.get(unit_name, quantity["unit"]) != quantity["unit"]:
        typed[name] = f"{quantity['value']} {quantity['unit']}"
    else:
        type_quantity(typed, name, unit_name, quantity)


def type_quantity(
    typed: dict[str, str], name: str, unit_name: str, quantity: Mapping[str, Any] | None
) -> None:
    """This function will put a quantity of a document into its two inputs."""
    if quantity:
        typed[name] = str(quantity["value"])
        typed[unit_name] = str(quantity["unit"])
