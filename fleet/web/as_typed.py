"""Quantities of a document as people read them: what was typed, with its unit."""

from collections.abc import Mapping
from typing import Any


def as_typed(part: Mapping[str, Any]) -> str:
    """This function will write a quantity of a document."""
    return f"{part['value']} {part['unit']}"


def sided(name: str, part: Mapping[str, Any]) -> str:
    """This function will write a lateral figure as L or R of the centreline, never with a bare sign, and any
    other as it was typed.
    """
    value = str(part["value"])
    if not name.startswith("lateral") or not value.strip("-0."):
        return as_typed(part)
    return f"{'L' if value.startswith('-') else 'R'} {value.lstrip('-')} {part['unit']}"
