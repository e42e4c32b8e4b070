"""The invented helicopter and twin with every rule a basis may have besides: for pages, paper and plots."""

from typing import Any

PAGE = {"page": "6-9"}


def helicopter_with_limits(document: dict[str, Any]) -> dict[str, Any]:
    """Lateral limits against the longitudinal CG, and a trim table by flaps and weight."""
    corners = [[2200, -40], [2200, 40], [2350, 90], [2500, 40], [2500, -40], [2350, -90]]
    document["lateral_by_cg"] = [
        {
            "id": "hover",
            "phases": ["ramp", "take-off", "landing"],
            "gives": "arm",
            "points": corners,
            "longitudinal_unit": "mm",
            "unit": "mm",
            "source": PAGE,
        }
    ]
    document["performance"] = [{"at": "take-off", "rule": "structural only", "source": PAGE}]
    return document


def twin_with_limits(document: dict[str, Any]) -> dict[str, Any]:
    """Two certification categories, fuel balance, performance asked for, trim by flaps and weight."""
    document["certification_categories"] = [
        {"id": "normal", "name": "normal category", "source": PAGE},
        {
            "id": "utility",
            "name": "utility category",
            "limits": {"take_off": {"value": 6100, "unit": "lb", "source": PAGE}},
            "source": PAGE,
        },
    ]
    document["performance"] = [
        {"at": "take-off", "rule": "required", "operations": ["passenger-charter"], "source": PAGE}
    ]
    document["fuel_balance"] = [
        {
            "id": "WINGS",
            "name": "main and auxiliary tanks",
            "left": ["LEFT-MAIN", "LEFT-AUX"],
            "right": ["RIGHT-MAIN", "RIGHT-AUX"],
            "maximum": {"value": 180, "unit": "lb"},
            "source": PAGE,
        }
    ]
    document["trim"] = {
        "against": "arm",
        "against_unit": "in",
        "unit": "units nose up",
        "step": "0.1",
        "range": {"low": 0, "high": 9, "source": PAGE},
        "tables": [
            {
                "flap": flap,
                "weight": {"value": w, "unit": "lb"},
                "points": [[140, 8], [180, top]],
                "source": PAGE,
            }
            for flap, w, top in (("up", 4000, 1), ("up", 7000, 2), ("10", 4000, 2), ("10", 7000, 3))
        ],
    }
    return document
