"""The invented twin with one of everything a loading basis may state, most of it in other units than its own.

What is stated twice is stated differently, so that a reader that takes the wrong one is noticed.
"""

from typing import Any

from tests.pure.fleet.documents import basis_document

PAGE = {"page": "7-1"}
OTHER = {"document": "OK62-S7", "revision": "2", "page": "3"}


def amount(value: Any, unit: str) -> dict[str, Any]:
    return {"value": value, "unit": unit}


def limit(value: Any, unit: str = "lb", source: dict[str, Any] | None = None) -> dict[str, Any]:
    return {"value": value, "unit": unit, "source": source or PAGE}


def everything() -> Any:
    """This function will return the document, made anew."""
    basis = basis_document("twin")
    _stations(basis)
    _variants(basis)
    basis["positions"] = [gear(), flaps()]
    basis["lateral_by_cg"] = [lateral()]
    del basis["lateral_limits"]
    basis["fuel_balance"] = [balance_by_volume(), balance_by_table()]
    basis["trim"] = trim()
    basis["curtailments"] = [curtailment()]
    basis["presentation"] = presentation()
    basis["other_datums"] = [datum("firewall", amount("1", "m")), datum("nose tip", amount("-3", "in"))]
    return basis


def datum(name: str, offset: dict[str, Any]) -> dict[str, Any]:
    return {"name": name, "offset": offset, "source": OTHER}


def _stations(basis: Any) -> None:
    basis["seats"][2] |= {
        "rail": {
            "forward": amount("162", "in"),
            "aft": amount("4.5", "m"),  # 177.165... in
            "settings": [
                {"setting": "2", "arm": amount("165", "in")},
                {"setting": "5", "arm": amount("4.4", "m")},
            ],
            "source": PAGE,
        },
        "row": "1",
        "exit_row": True,
        "infant_restraint": True,
        "conditional": [{"when": ["NET"], "maximum": limit("120", "kg", OTHER)}],
    }
    basis["seats"][3] |= {"attendant": True, "infant_restraint": False}
    basis["places"][2] |= {
        "external": True,
        "conditional": [
            {"when": ["NET"], "maximum": limit("260")},
            {"when": ["NET", "DOOR"], "maximum": {"none": True, "source": PAGE}},
        ],
        "floor": {
            "runs": "along",
            "per_area": limit("75", "lb/ft2"),
            "per_length": limit("150", "kg/m", OTHER),
            "length": amount("4", "ft"),
            "no_footprint": {"up_to": amount("25", "lb"), "kinds": ["baggage"], "source": PAGE},
        },
    }
    basis["zones"][0]["conditional"] = [{"when": ["DOOR"], "maximum": limit("500")}]
    basis["conditions"] = [
        {"id": "NET", "name": "net fitted", "source": PAGE},
        {"id": "DOOR", "name": "door off", "source": OTHER},
    ]
    basis["cumulative"] = [
        {
            "id": "AFT-RUN",
            "name": "from the tail",
            "from": "tail",
            "steps": [
                {"name": "station 236", "members": ["AFT-HOLD"], "maximum": limit("190")},
                {"name": "station 200", "members": ["ROW2-L", "ROW2-R"]},
            ],
        },
        {
            "id": "NOSE-RUN",
            "name": "from the nose",
            "from": "nose",
            "steps": [
                {"name": "station 88", "members": ["NOSE-HOLD"]},
                {"name": "station 132", "members": ["COCKPIT-L"], "maximum": limit("500", "lb", OTHER)},
            ],
        },
    ]


def _variants(basis: Any) -> None:
    basis["certification_categories"] = [
        {"id": "normal", "name": "normal category", "source": PAGE},
        {
            "id": "utility",
            "name": "utility category",
            "limits": {"take_off": limit("6100"), "landing": limit("5800", "lb", OTHER)},
            "source": OTHER,
        },
    ]
    basis["modifications"] = [
        {"id": "HEAVY", "name": "heavy gear", "limits": {"landing": limit("6000")}, "source": OTHER}
    ]
    basis["configurations"][1]["modifications"] = ["HEAVY"]
    basis["configurations"][1]["limits"] = {"zero_fuel": limit("5400")}
    basis["configurations"][1]["performance"] = [
        {"at": "landing", "rule": "structural only", "source": OTHER}
    ]
    basis["performance"] = [
        {
            "at": "take-off",
            "rule": "required",
            "kinds": ["climb"],
            "operations": ["passenger-charter", "ferry"],
            "source": PAGE,
        }
    ]


def state(name: str, change: Any, *holds: str, unit: str = "lb in") -> dict[str, Any]:
    return {
        "id": name,
        "name": name.lower(),
        "moment_change": amount(change, unit),
        "holds": list(holds),
        "source": PAGE,
    }


def gear() -> dict[str, Any]:
    states = [state("DOWN", 0, "ground", "flight"), state("UP", "-10", "flight", unit="kg m")]
    return {"id": "GEAR", "name": "landing gear", "as_weighed": "DOWN", "states": states}


def flaps() -> dict[str, Any]:
    states = [state("IN", 0, "ground", "flight"), state("OUT", 500, "ground", "flight")]
    return {"id": "FLAPS", "name": "flaps", "as_weighed": "IN", "states": states}


def lateral() -> dict[str, Any]:
    """Moments in kg m against arms in m: 3.8 m are 149.6 in, 4.2 m are 165.4 in."""
    return {
        "id": "hover",
        "phases": ["take-off", "landing"],
        "gives": "moment",
        "points": [["3.8", "-90"], ["3.8", "90"], ["4.2", "60"], ["4.2", "-60"]],
        "longitudinal_unit": "m",
        "unit": "kg m",
        "configurations": ["row-2-out"],
        "categories": ["utility"],
        "positions": [{"part": "GEAR", "states": ["UP"]}],
        "source": OTHER,
    }


def balance_by_volume() -> dict[str, Any]:
    return {
        "id": "MAINS",
        "name": "main tanks",
        "left": ["LEFT-MAIN"],
        "right": ["RIGHT-MAIN"],
        "maximum": amount("37.85411784", "l"),  # 10 US gal
        "phases": ["take-off"],
        "source": PAGE,
    }


def balance_by_table() -> dict[str, Any]:
    return {
        "id": "WINGS",
        "name": "all tanks",
        "left": ["LEFT-MAIN", "LEFT-AUX"],
        "right": ["RIGHT-MAIN", "RIGHT-AUX"],
        "table": {"unit": "lb", "points": [[0, 200], [600, 90], ["1320", 0]]},
        "source": OTHER,
    }


def trim() -> dict[str, Any]:
    """Arms in mm: 3,810 mm are 150 in, 4,064 mm are 160 in."""

    def line(source: dict[str, Any] = PAGE) -> dict[str, Any]:
        return {"points": [["3810", 8], ["4064", 2]], "source": source}

    return {
        "against": "arm",
        "against_unit": "mm",
        "unit": "units nose up",
        "step": "0.5",
        "range": {"low": 0, "high": 9, "source": OTHER},
        "tables": [
            {"flap": "up", "weight": amount(7000, "lb"), **line()},
            {"flap": "up", "weight": amount("1814.36948", "kg"), **line(OTHER)},  # 4,000 lb
            {"flap": "10", **line()},
        ],
    }


def curtailment() -> dict[str, Any]:
    return {
        "id": "SEATING",
        "for": "seating variation",
        "phases": ["take-off", "landing"],
        "amounts": [
            {
                "to": amount("5000", "lb"),
                "forward": amount(10, "kg m"),
                "aft": amount("1.27", "cm"),
            },
            {"from": amount("5000", "lb"), "forward": amount("0.25", "in")},
        ],
        "configurations": ["six-seat"],
        "categories": ["normal"],
        "source": {"document": "OM-A", "revision": "4", "page": "8-12"},
    }


def presentation() -> dict[str, Any]:
    return {
        "moment_divisor": {"value": 1000, "source": PAGE},
        "index": {
            "reference_arm": amount("3937", "mm"),  # 155 in
            "divisor": amount(1000, "lb in"),
            "constant": 40,
            "source": OTHER,
        },
    }
