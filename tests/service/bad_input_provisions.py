"""Right documents of tables, rules, restrictions and permits, with every field that may stand in one."""

from collections.abc import Callable, Mapping
from typing import Any, Final

from tests.makers import q
from tests.pure.fleet.test_rules import rules_document
from tests.pure.loads.papers import permit_document, restriction_document
from tests.pure.loads.standards import lb, seasonal_document
from tests.service.permission_world import World

Documents = tuple[dict[str, Any], ...]
_AIRCRAFT: Final = "/api/v1/aircraft/{registration}"


def _source(**more: str) -> dict[str, str]:
    return {"document": "Operations manual A", "revision": "D", "page": "A-2", **more}


def _tables(_world: World) -> Documents:
    """Two: declared weights with additions, and none at all."""
    approved = _source(authority="FSDO-99")
    full = seasonal_document(source=approved)
    full["categories"].append({"id": "infant", "name": "infant", "below_age": 2, "counts_as": "child"})
    full["rows"][0] |= {
        "to_seats": 9,
        "operations": ["charter"],
        "routes": [{"origin": "XNAL", "destination": "XKOR"}],
        "source": approved,
    }
    full["declared"] = {
        "below_seats": 10,
        "additions": [{"what": "clothing", "weight": q("10", "lb")}],
        "source": approved,
    }
    full["crew"] = [
        {
            "id": "flight",
            "name": "flight crew",
            "positions": ["pilot in command"],
            "weight": q("190", "lb"),
            "source": approved,
        }
    ]
    rows = [{"from_seats": 1, "weights": [lb("190", "adult"), lb("80", "child")], "source": approved}]
    none = seasonal_document(source=approved, declared={"none": True, "source": approved}, rows=rows)
    return full, none


def _rules(_world: World) -> Documents:
    source = {"rule": "135.185", "document": "14 CFR", "page": "a"}
    bound = {
        "category": "aeroplane",
        "from_engines": 2,
        "to_engines": 4,
        "from_seats": 1,
        "to_seats": 9,
        "operations": ["charter"],
    }
    months = {"count": 36, "unit": "calendar months"}
    return (
        rules_document(
            {"rule": "weighing-interval", "interval": months, "source": source, "applies_to": bound},
            {"rule": "manifest-retention", "none": True, "source": source},
            {"rule": "loading-signature", "demanded": True, "source": source},
        ),
    )


_ENVELOPE: Final = {
    "effect": "envelope",
    "of": "normal",
    "points": [["116", "5000"], ["122", "8800"], ["134", "8800"], ["134", "5000"]],
    "unit": "in",
    "weight_unit": "lb",
}
_LIMIT: Final = {"effect": "limit", "limit": "take_off", "weight": q("8000", "lb")}
_MAXIMUM: Final = {"effect": "maximum", "of": "AFT-HOLD", "weight": q("100", "lb")}


def _restrictions(_world: World) -> Documents:
    return (
        restriction_document(
            _LIMIT,
            _MAXIMUM,
            {"effect": "seats", "ids": ["ROW2-L"]},
            {"effect": "places", "ids": ["NOSE-HOLD"]},
            {"effect": "fuel", "of": "LEFT", "volume": q("5", "US gal")},
            _ENVELOPE,
            true_until="2027-01-01T00:00:00Z",
            source=_source(),
        ),
    )


def _permits(_world: World) -> Documents:
    return (
        permit_document(
            _LIMIT,
            _MAXIMUM,
            _ENVELOPE,
            operations=["ferry"],
            conditions=["day VFR"],
            source=_source(),
        ),
    )


def _one(**document: Any) -> Callable[[World], Documents]:
    return lambda _world: (document,)


PROVISION_SAMPLES: Final[Mapping[str, Callable[[World], Documents]]] = {
    "/api/v1/standard-weights": _tables,
    "/api/v1/standard-weights/{version}/approval": _one(reason="read"),
    "/api/v1/rules": _rules,
    "/api/v1/rules/{version}/approval": _one(reason="read"),
    f"{_AIRCRAFT}/restrictions": _restrictions,
    f"{_AIRCRAFT}/restrictions/{{version}}/lifting": _one(
        reason="repaired", true_from="2031-02-01T00:00:00Z"
    ),
    f"{_AIRCRAFT}/permits": _permits,
    f"{_AIRCRAFT}/permits/{{version}}/approval": _one(reason="read"),
    f"{_AIRCRAFT}/permits/{{version}}/ending": _one(reason="not needed", true_from="2026-12-01T00:00:00Z"),
}
# What the schema of an approval describes and these refuse: they say themselves from when they hold.
PROVISION_NOT_TAKEN: Final[Mapping[str, frozenset[str]]] = {
    path: frozenset({"/true_from"}) for path in PROVISION_SAMPLES if path.endswith("/approval")
}
