"""An invented cabin as a document: three rows, two sections' worth of every field."""

from typing import Any


def cabin(**changes: Any) -> dict[str, Any]:
    document: dict[str, Any] = {
        "schema": "tarebook.seating-variation/1",
        "weight": {"value": "190", "unit": "lb"},
        "rows": [
            {
                "row": name,
                "arm": {"value": arm, "unit": "in"},
                "window": 2,
                "aisle": 1,
                "remaining": 0,
                "section": "cabin",
            }
            for name, arm in (("1", "200"), ("2", "230"), ("3", "260"))
        ],
        "assumed": [{"section": "cabin", "arm": {"value": "230", "unit": "in"}}],
    }
    return document | changes
