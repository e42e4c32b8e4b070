"""Right loading bases that together have every field one may have: limits stated and said to be none, and the
sections that only some aircraft need.
"""

from typing import Any, Final

from tests.makers import basis_document, q

Documents = tuple[dict[str, Any], ...]
LIMITS: Final = ("ramp", "take_off", "zero_fuel", "landing", "minimum_flying")


def loading_bases() -> Documents:
    """This function will write five bases: limits and stations stated, said to be none, rules that only some
    aircraft have with limits stated and with none, and what a manual prints divided or in index units.
    """
    return _stated(), _none(), _ruled(), _ruled_by_none(), _presented()


def _source(page: str) -> dict[str, str]:
    return {"document": "FL9-FM", "page": page, "revision": "C"}


def _most(value: str, unit: str) -> dict[str, Any]:
    return {**q(value, unit), "source": _source("6-11")}


def _no(page: str = "2-4") -> dict[str, Any]:
    return {"none": True, "source": _source(page)}


def _limits(*, under: int = 0) -> dict[str, Any]:
    """All six limits; the upper ones so many pounds under those of the twin."""
    upper = {"ramp": 8800, "take_off": 8750, "zero_fuel": 7900, "landing": 8600, "with_external_load": 8800}
    lower = {name: _most(str(value - under), "lb") for name, value in upper.items()}
    return lower | {"minimum_flying": _most("4100", "lb")}


def _stated() -> dict[str, Any]:
    full = basis_document(
        burn_order_source=_source("2-11"),
        taxi_order=[{"tanks": ["LEFT", "RIGHT"]}],
        datum={"name": "forward bulkhead", "source": _source("6-2")},
        trim=_no("6-4"),
        lateral_limits=_no("2-5"),
        limits=_limits(),
        other_datums=[{"name": "firewall", "offset": q("24", "in"), "source": _source("6-2")}],
    )
    full["limits"]["minimum_flying"] = _most("4000", "lb")
    full["chord"]["source"] = _source("6-3")
    for part in ("seats", "places"):
        full[part][0] |= {"source": _source("6-9")}
        full[part][0]["maximum"]["source"] = _source("6-9")
    full["zones"][0]["maximum"]["source"] = _source("6-10")
    by_weight = {
        "against": "weight",
        "against_unit": "lb",
        "gives": "arm",
        "gives_unit": "in",
        "straight_in": "arm",
        "points": [["0", "132.0"], ["400", "133.0"], ["804", "133.5"]],
        "density": q("6.7", "lb/US gal"),
    }
    full["tanks"][0] |= {"table": by_weight, "source": _source("6-14")}
    full["envelopes"][0]["source"] = _source("2-5")
    _state_stations(full)
    cabin = {"weight": q("31", "lb"), "arm": q("150", "in"), "lateral_arm": q("0", "in")}
    full["configurations"][0] |= {
        "equipment": [{"what": "cabin divider", **cabin}],
        "limits": _limits(under=50),
        "source": _source("S-1"),
    }
    full["sample_loads"][0]["source"] = _source("6-20")
    return full


def _none() -> dict[str, Any]:
    """Wherever a figure may be said to be none, it is."""
    spare = basis_document(chord=_no(), limits=dict.fromkeys(LIMITS, _no()))
    spare["sample_loads"] = _no("6-20")
    _state_stations(spare)
    step = spare["cumulative"][0]["steps"][0]
    for one in (spare["seats"][0], spare["places"][0], spare["zones"][0], step):
        one["maximum"] = _no()
    for one in (spare["seats"][2], spare["places"][1], spare["zones"][0]):
        one["conditional"][0]["maximum"] = _no()
    spare["places"][1]["floor"] |= {"per_area": _no("6-11"), "per_length": _no("6-11")}
    spare["configurations"][0]["limits"] = dict.fromkeys(LIMITS, _no())
    return spare


def _ruled() -> dict[str, Any]:
    """A basis with categories, a modification, performance, fuel balance, trim, limits by gear."""
    basis = basis_document(limits=_limits())
    del basis["lateral_limits"]
    source = _source("6-9")
    states = [
        {
            "id": "DOWN",
            "name": "down",
            "moment_change": q("0", "lb in"),
            "holds": ["ground"],
            "source": source,
        },
        {"id": "UP", "name": "up", "moment_change": q("900", "lb in"), "holds": ["flight"], "source": source},
    ]
    held = {
        "configurations": [one["id"] for one in basis["configurations"]],
        "categories": ["normal", "utility"],
        "positions": [{"part": "GEAR", "states": ["DOWN", "UP"]}],
    }
    required = {"at": "take-off", "rule": "required", "kinds": ["climb"], "operations": ["air-taxi"]}
    enough = {"at": "landing", "rule": "structural only", "operations": ["training"]}
    # one for each, with something outside and without
    basis["envelopes"][0] |= {**held, "external_load": "none"}
    basis["envelopes"].append({**basis["envelopes"][0], "id": "hooked", "external_load": "carried"})
    basis["places"][0]["external"] = True
    basis["configurations"][0] |= {
        "modifications": ["KIT"],
        "performance": [{**enough, "source": source}, {**required, "source": source}],
    }
    basis |= {
        "positions": [{"id": "GEAR", "name": "gear", "as_weighed": "DOWN", "states": states}],
        "certification_categories": [
            {"id": "normal", "name": "normal category", "source": source},
            {"id": "utility", "name": "utility category", "limits": _limits(under=90), "source": source},
        ],
        "modifications": [{"id": "KIT", "name": "weight kit", "limits": _limits(under=10), "source": source}],
        "performance": [{**required, "source": source}],
        "lateral_by_cg": [
            {
                "id": "sides",
                "phases": ["ramp", "take-off", "landing", "zero-fuel"],
                "gives": "arm",
                "points": [["110", "-5"], ["110", "5"], ["140", "5"], ["140", "-5"]],
                "longitudinal_unit": "in",
                "unit": "in",
                "source": source,
                **held,
                "external_load": "carried",
            }
        ],
        "fuel_balance": [_balance("WINGS", maximum=q("200", "lb")), _balance("BY-FUEL", table=_BY_FUEL)],
        "trim": {
            "against": "arm",
            "against_unit": "in",
            "unit": "units nose up",
            "step": "0.1",
            "range": {"low": "0", "high": "9", "source": source},
            "tables": [
                {
                    "flap": "take-off",
                    "weight": q("7000", "lb"),
                    "points": [["110", "8"], ["140", "1"]],
                    "source": source,
                }
            ],
        },
    }
    return basis


def _ruled_by_none() -> dict[str, Any]:
    """Categories and modifications whose manual says that a limit is none."""
    none = dict.fromkeys(LIMITS, _no())
    of_its_own = {"id": "kit", "name": "kit", "limits": none, "source": _source("S-2")}
    return basis_document(
        limits=none,
        certification_categories=[{**of_its_own, "id": "normal"}],
        modifications=[{**of_its_own, "id": "KIT"}],
    )


def _presented() -> dict[str, Any]:
    """Moments printed divided, index units, and the operator's own margins in both."""
    basis = basis_document(
        presentation={
            "index": {
                "reference_arm": q("125", "in"),
                "divisor": q("1000", "lb in"),
                "constant": "40",
                "source": _source("6-21"),
            },
            "moment_divisor": {"value": "1000", "source": _source("6-21")},
        },
        curtailments=[
            {
                "id": "SEATING",
                "for": "seating variation",
                "phases": ["take-off", "landing"],
                "amounts": [
                    {"to": q("6000", "lb"), "forward": q("0.5", "in"), "aft": q("0.5", "in")},
                    {"from": q("6000", "lb"), "forward": q("900", "lb in"), "aft": q("900", "lb in")},
                ],
                "source": {"document": "OM-A", "revision": "4", "page": "8-12"},
                "configurations": ["four-seat"],
            },
            {
                "id": "SIDES",
                "for": "fuel",
                "phases": ["take-off"],
                "amounts": [{"left": q("0.5", "in"), "right": q("0.5", "in")}],
                "source": {"document": "OM-A", "page": "8-13"},
                "categories": ["normal"],
            },
        ],
        certification_categories=[{"id": "normal", "name": "normal category", "source": _source("2-1")}],
    )
    del basis["lateral_limits"]
    printed = [["5000", "580"], ["8800", "1073.6"], ["8800", "1179.2"], ["5000", "670"]]
    divided = {"plane": "moment", "unit": "lb in", "divided_by": "1000", "points": printed}
    sides = [["5000", "-4"], ["8800", "-4"], ["8800", "4"], ["5000", "4"]]
    basis["envelopes"][0] |= divided
    basis["envelopes"].append({**basis_document()["envelopes"][0], "id": "sides", "axis": "lateral"})
    basis["envelopes"][1]["points"] = sides
    basis["tanks"][0]["table"] = {
        "against": "volume",
        "against_unit": "US gal",
        "gives": "moment",
        "gives_unit": "lb in",
        "straight_in": "moment",
        "divided_by": "1000",
        "density": q("6.7", "lb/US gal"),
        "points": [["0", "0"], ["60", "53.5"], ["120", "107.3"]],
    }
    return basis


_BY_FUEL = {"unit": "US gal", "points": [["0", "60"], ["240", "20"]]}


def _balance(name: str, **allowed: Any) -> dict[str, Any]:
    sides: dict[str, Any] = {"left": ["LEFT"], "right": ["RIGHT"], "phases": ["ramp", "take-off", "landing"]}
    return {"id": name, "name": "wing tanks", **sides, **allowed, "source": _source("6-9")}


def _state_stations(basis: dict[str, Any]) -> None:
    """Put all that may be stated of seats and places into a basis."""

    def conditional() -> list[dict[str, Any]]:
        return [{"when": ["NET"], "maximum": _most("150", "lb")}]

    basis["seats"][2] |= {
        "row": "A",
        "exit_row": False,
        "infant_restraint": True,
        "attendant": False,
        "conditional": conditional(),
        "rail": {
            "forward": q("135", "in"),
            "aft": q("142", "in"),
            "settings": [{"setting": "A", "arm": q("136", "in")}],
            "source": _source("6-9"),
        },
    }
    basis["places"][1] |= {
        "conditional": conditional(),
        "floor": {
            "runs": "along",
            "per_area": _most("50", "lb/ft2"),
            "per_length": _most("100", "lb/ft"),
            "length": q("48", "in"),
            "no_footprint": {"up_to": q("25", "lb"), "kinds": ["baggage"], "source": _source("6-11")},
        },
        "external": False,
    }
    basis["zones"][0]["conditional"] = conditional()
    basis["conditions"] = [{"id": "NET", "name": "net fitted", "source": _source("6-11")}]
    step = {"name": "aft hold", "members": ["AFT-HOLD"], "maximum": _most("300", "lb")}
    basis["cumulative"] = [{"id": "TAIL", "name": "cabin floor", "from": "tail", "steps": [step]}]
