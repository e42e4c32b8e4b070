"""Right loads with every field one may have, of an aircraft whose loading basis asks for them: a hook, a
hoist, seats on rails, gear, conditions, certification categories.
"""

import copy
from typing import Any, Final

from fleet.models import Aircraft
from tests.loads.making import load_document, submitted
from tests.makers import basis_document, limit, make_aircraft, make_basis, make_empty_weight, page, q
from tests.service.permission_world import World

_BACK: Final = {"leg": 2, "departure": "2026-12-01T13:00:00-06:00", "origin": "XKOR", "destination": "XNAL"}


def enter_rich_aircraft(world: World) -> None:
    """This function will enter the aircraft and a first leg of it, which the samples follow."""
    aircraft: Aircraft = make_aircraft(world.people, _registration(world))
    make_basis(world.people, aircraft, _basis())
    make_empty_weight(world.people, aircraft)
    first = submitted(world.people, aircraft=aircraft.registration, certification_category="normal")
    world.names["leg before"] = str(first.load.id)


def load_with_everything(world: World) -> dict[str, Any]:
    """This function will write a load with every field a load may have."""
    document = load_document(world.people, aircraft=_registration(world), persons_on_board=4)
    document["flight"] |= {**_BACK, "follows": world.names["leg before"]}
    document["crew"][0]["category"] = "adult"
    infant = {"name": "B. Osei", "weight": q("18", "lb"), "how": "declared"}
    document["passengers"][0] |= {"category": "adult", "lap_infant": infant, "restraint": q("9", "lb")}
    document["items"][0] |= {"removed": False, **standing()}
    document["items"].append(_hung("drum", jettisonable=True))
    document["fuel"]["not_usable"] = {"LEFT": q("1", "US gal")}
    document["limits"][0]["kind"] = "climb"
    return document | {
        "certification_category": "normal",
        "conditions": ["NET"],
        "seat_settings": [{"row": "1", "setting": "A"}, {"seat": "ROW2-L", "setting": "B"}],
        "sequence": _sequence(),
    }


def standing() -> dict[str, Any]:
    """This function will write what an item may stand on, all of it."""
    sides = {"length": q("24", "in"), "width": q("18", "in"), "lies": "along"}
    written = {
        "footprint": {**sides, "feet_lengthwise": 1, "feet_widthwise": 1},
        "pallet": {"weight": q("12", "lb"), **sides},
        "net": {"weight": q("3", "lb")},
        "spreader": {"weight": q("9", "lb"), **sides},
    }
    return copy.deepcopy(written)


def _sequence() -> list[dict[str, Any]]:
    infant = {"name": "C. Pell", "weight": q("16", "lb"), "how": "declared"}
    hoisted = {
        "name": "T. Brisk",
        "seat": "ROW2-R",
        "at": "HOIST",
        "category": "adult",
        "weight": q("150", "lb"),
        "how": "declared",
        "lap_infant": infant,
        "restraint": q("9", "lb"),
    }
    winchman = {
        "name": "W. Ash",
        "seat": "COCKPIT-R",
        "position": "winchman",
        "weight": q("170", "lb"),
        "how": "declared",
    }
    case = {
        "kind": "equipment",
        "what": "rescue case",
        "place": "NOSE-HOLD",
        "weight": q("40", "lb"),
        "how": "weighed",
        **standing(),
    }
    return [
        {"after_burning": q("10", "lb"), "since": "engine start", "position": {"GEAR": "DOWN"}},
        {"after_burning": q("60", "lb"), "leave": [_named("drum", q("20", "lb"))]},
        {"after_burning": q("70", "lb"), "leave": [{"seat": "ROW1-R"}]},
        {"after_burning": q("80", "lb"), "come_aboard": [hoisted, winchman, case]},
        {"after_burning": q("90", "lb"), "move": [{"seat": "ROW2-R", "to": "ROW2-R"}]},
        {"after_burning": q("95", "lb"), "move": [{"place": "HOOK", "what": "drum", "to": "AFT-HOLD"}]},
        {"after_burning": q("97", "lb"), "come_aboard": [_hung("crate", jettisonable=True)]},
        {
            "after_burning": q("99", "lb"),
            "transfer": {"from": "LEFT", "to": "RIGHT", "quantity": q("3", "US gal")},
        },
    ]


def _named(what: str, weight: dict[str, Any]) -> dict[str, Any]:
    return {"place": "HOOK", "what": what, "weight": weight}


def _hung(what: str, *, jettisonable: bool) -> dict[str, Any]:
    hung = {"kind": "cargo", "what": what, "place": "HOOK", "weight": q("50", "lb"), "how": "weighed"}
    return {**hung, "jettisonable": jettisonable}


def _registration(world: World) -> str:
    return f"{world.aircraft}R"


def _basis() -> dict[str, Any]:
    """The twin with what a plain one has not."""
    basis = basis_document()
    outside = {"external": True, "source": page("9-1"), "maximum": limit("300", "lb", "9-1")}
    for name, arm in (("HOOK", "130"), ("HOIST", "132")):
        basis["places"].append(
            {"id": name, "name": name.lower(), "arm": q(arm, "in"), "lateral_arm": q("0", "in"), **outside}
        )
    for one in basis["configurations"]:
        one["places"] += ["HOOK", "HOIST"]
    for seat, row, arms in zip(
        basis["seats"][2:], "1122", (("134", "142"),) * 2 + (("166", "174"),) * 2, strict=True
    ):
        forward, aft = arms
        seat |= {"row": row, "infant_restraint": True}
        seat["rail"] = {
            "forward": q(forward, "in"),
            "aft": q(aft, "in"),
            "settings": [{"setting": "A", "arm": q(forward, "in")}, {"setting": "B", "arm": q(aft, "in")}],
            "source": page("6-9"),
        }
    basis["conditions"] = [{"id": "NET", "name": "net fitted", "source": page("6-11")}]
    basis["places"][0]["conditional"] = [{"when": ["NET"], "maximum": limit("190", "lb", "6-11")}]
    basis["limits"]["with_external_load"] = limit("8800", "lb", "9-2")
    basis["certification_categories"] = [
        {"id": name, "name": f"{name} category", "source": page("2-1")} for name in ("normal", "utility")
    ]
    down, up = (
        {"id": state, "name": state.lower(), "holds": holds, "source": page("6-4")}
        for state, holds in (("DOWN", ["ground", "flight"]), ("UP", ["flight"]))
    )
    states = [{**down, "moment_change": q("0", "lb in")}, {**up, "moment_change": q("900", "lb in")}]
    basis["positions"] = [{"id": "GEAR", "name": "gear", "as_weighed": "DOWN", "states": states}]
    return basis
