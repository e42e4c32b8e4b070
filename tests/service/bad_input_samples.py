"""Right documents of every kind that is taken, together with every field that may stand in one; and what of a
spoiled one is right after all.
"""

from collections.abc import Callable, Mapping
from typing import Any, Final

from django.utils import timezone

from tests.cast import PASSWORD
from tests.loads.late import change_of, proposed
from tests.loads.making import load_document, signing
from tests.makers import basis_document, empty_weight_document, q
from tests.pure.fleet.cabins import cabin
from tests.service.bad_input_provisions import PROVISION_NOT_TAKEN, PROVISION_SAMPLES
from tests.service.permission_world import World

Documents = tuple[dict[str, Any], ...]
_AIRCRAFT: Final = "/api/v1/aircraft/{registration}"
_LOAD: Final = "/api/v1/loads/{load}"


def _source(page: str) -> dict[str, str]:
    return {"document": "FL9-FM", "page": page, "revision": "C"}


def _loading_bases(_world: World) -> Documents:
    """Three: figures where the second says there are none, and the rules that only some bases have."""
    full = basis_document(
        burn_order_source=_source("2-11"),
        taxi_order=[{"tanks": ["LEFT", "RIGHT"]}],
        datum={"name": "forward bulkhead", "source": _source("6-2")},
        trim={"none": True, "source": _source("6-4")},
        lateral_limits={"none": True, "source": _source("2-5")},
    )
    full["limits"]["minimum_flying"] = {**q("4000", "lb"), "source": _source("2-4")}
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
        "limits": {
            "ramp": {**q("8700", "lb"), "source": _source("S-4")},
            "take_off": {**q("8650", "lb"), "source": _source("S-4")},
            "zero_fuel": {**q("7800", "lb"), "source": _source("S-4")},
            "landing": {**q("8500", "lb"), "source": _source("S-4")},
            "minimum_flying": {**q("4100", "lb"), "source": _source("S-4")},
        },
        "source": _source("S-1"),
    }
    full["sample_loads"][0]["source"] = _source("6-20")
    for limit in full["limits"].values():
        limit["source"] = _source("2-4")
    none = {"none": True, "source": _source("2-4")}
    spare = basis_document(chord=none, limits=dict.fromkeys(full["limits"], none))
    spare["sample_loads"] = {"none": True, "source": _source("6-20")}
    spare["seats"][0]["maximum"] = spare["places"][0]["maximum"] = spare["zones"][0]["maximum"] = none
    spare["configurations"][0]["limits"] = dict.fromkeys(full["limits"], none)
    return full, spare, _ruled()


def _ruled() -> dict[str, Any]:
    """A basis with categories, a modification, performance, fuel balance, trim, limits by gear."""
    basis = basis_document()
    del basis["lateral_limits"]
    source = _source("6-9")
    raised = {"take_off": {**q("8700", "lb"), "source": source}}
    tighter = {"take_off": {**q("8000", "lb"), "source": source}}
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
    basis["envelopes"][0] |= held
    basis["configurations"][0] |= {
        "modifications": ["KIT"],
        "performance": [{"at": "landing", "rule": "structural only", "source": source}],
    }
    basis |= {
        "positions": [{"id": "GEAR", "name": "gear", "as_weighed": "DOWN", "states": states}],
        "certification_categories": [
            {"id": "normal", "name": "normal category", "source": source},
            {"id": "utility", "name": "utility category", "limits": tighter, "source": source},
        ],
        "modifications": [{"id": "KIT", "name": "weight kit", "limits": raised, "source": source}],
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


_BY_FUEL = {"unit": "US gal", "points": [["0", "60"], ["240", "20"]]}


def _balance(name: str, **allowed: Any) -> dict[str, Any]:
    sides: dict[str, Any] = {"left": ["LEFT"], "right": ["RIGHT"], "phases": ["ramp", "take-off", "landing"]}
    return {"id": name, "name": "wing tanks", **sides, **allowed, "source": _source("6-9")}


def _state_stations(basis: dict[str, Any]) -> None:
    """Put all that may be stated of seats and places into a basis."""

    def most(value: str, unit: str) -> dict[str, Any]:
        return {**q(value, unit), "source": _source("6-11")}

    conditional = [{"when": ["NET"], "maximum": most("150", "lb")}]
    basis["seats"][2] |= {
        "row": "1",
        "exit_row": False,
        "infant_restraint": True,
        "attendant": False,
        "conditional": conditional,
        "rail": {
            "forward": q("135", "in"),
            "aft": q("142", "in"),
            "settings": [{"setting": "A", "arm": q("136", "in")}],
            "source": _source("6-9"),
        },
    }
    basis["places"][1] |= {
        "conditional": conditional,
        "floor": {
            "runs": "along",
            "per_area": most("50", "lb/ft2"),
            "per_length": most("100", "lb/ft"),
            "length": q("48", "in"),
            "no_footprint": {"up_to": q("25", "lb"), "kinds": ["baggage"], "source": _source("6-11")},
        },
    }
    basis["zones"][0]["conditional"] = conditional
    basis["conditions"] = [{"id": "NET", "name": "net fitted", "source": _source("6-11")}]
    step = {"name": "aft hold", "members": ["AFT-HOLD"], "maximum": most("300", "lb")}
    basis["cumulative"] = [{"id": "TAIL", "name": "cabin floor", "from": "tail", "steps": [step]}]


def _empty_weights(_world: World) -> Documents:
    arms = empty_weight_document(arm=q("122.94", "in"), lateral_arm=q("-0.17", "in"))
    for part in ("moment", "lateral_moment"):
        del arms[part]
    return empty_weight_document(), arms


def _standing() -> dict[str, Any]:
    """What an item may stand on, all of it."""
    sides = {"length": q("24", "in"), "width": q("18", "in"), "lies": "along"}
    return {
        "footprint": {**sides, "feet_lengthwise": 1, "feet_widthwise": 1},
        "pallet": {"weight": q("12", "lb"), **sides},
        "net": {"weight": q("3", "lb")},
        "spreader": {"weight": q("9", "lb"), **sides},
    }


def load_with_everything(world: World) -> dict[str, Any]:
    """This function will write a load with every field a load may have."""
    document = load_document(world.people, aircraft=world.aircraft, persons_on_board=4)
    document["crew"][0]["category"] = "adult"
    infant = {"name": "B. Osei", "weight": q("18", "lb"), "how": "declared"}
    document["passengers"][0] |= {"category": "adult", "lap_infant": infant}
    document["passengers"][0]["restraint"] = q("9", "lb")
    document["items"][0] |= {"removed": False, **_standing()}
    document |= {"conditions": [], "seat_settings": []}  # the ready twin has none to name
    document["fuel"]["not_usable"] = {"LEFT": q("1", "US gal")}
    return document


def late_lines() -> dict[str, Any]:
    """This function will write a last-minute change with a line of each kind."""
    infant = {"name": "C. Pell", "weight": q("16", "lb"), "how": "declared"}
    on = {"name": "U. Pell", "seat": "ROW2-L", "weight": q("90", "lb"), "how": "declared"}
    return change_of(
        {"change": "passenger-off", "seat": "ROW1-L"},
        {
            "change": "passenger-on",
            **on,
            "category": "adult",
            "lap_infant": infant,
            "restraint": q("9", "lb"),
        },
        {"change": "item-off", "what": "checked bags", "place": "AFT-HOLD", "weight": q("10", "lb")},
        {
            "change": "item-on",
            "kind": "baggage",
            "what": "bag at the door",
            "place": "NOSE-HOLD",
            "weight": q("12", "lb"),
            "how": "weighed",
            "footprint": _standing()["footprint"],
        },
        {"change": "fuel-on", "tank": "LEFT", "quantity": q("1", "US gal")},
        {"change": "fuel-off", "tank": "RIGHT", "quantity": q("1", "US gal")},
        persons=4,
    )


def _late_changes(world: World) -> Documents:
    change = late_lines()
    digest = proposed(world.loads["accepted"], change).computation.digest
    return ({**change, "digest": digest, "password": PASSWORD},)


def _cabin() -> dict[str, Any]:
    """Rows called by letters: a name that looks like a number is no worse for being spoiled."""
    document = cabin()
    for row, letter in zip(document["rows"], "ABC", strict=True):
        row["row"] = letter
    return document


def _rechecks(world: World) -> Documents:
    current = world.loads["accepted"].assessment
    document = {
        "aircraft": world.aircraft,
        "empty_weight": str(current.empty_weight_id),
        "loading_basis": str(current.loading_basis_id),
        "standard_weights": world.names["table"],
        "from": "2026-01-01T00:00:00Z",
        "to": "2027-01-01T00:00:00Z",
        "reason": "weighed again",
    }
    return (document,)


def _one(**document: Any) -> Callable[[World], Documents]:
    return lambda _world: (document,)


SAMPLES: Final[Mapping[str, Callable[[World], Documents]]] = {
    "/api/v1/aircraft": _one(
        registration="Q9-NEW",
        type="Fenlark 9",
        serial_number="9-new",
        category="aeroplane",
        engines=2,
        passenger_seats=4,
        reason="bought",
    ),
    f"{_AIRCRAFT}/loading-bases": _loading_bases,
    f"{_AIRCRAFT}/loading-bases/{{version}}/approval": _one(true_from="2026-01-02T00:00:00Z", reason="read"),
    f"{_AIRCRAFT}/empty-weights/{{version}}/approval": _one(reason="read"),
    f"{_AIRCRAFT}/weighings": _empty_weights,
    f"{_AIRCRAFT}/seating-variations": lambda _world: (_cabin(),),
    **PROVISION_SAMPLES,
    "/api/v1/assessments": lambda world: (load_with_everything(world),),
    "/api/v1/loads": lambda world: (load_with_everything(world),),
    f"{_LOAD}/revisions": lambda world: ({**load_with_everything(world), "reason": "one bag more"},),
    f"{_LOAD}/departure": lambda _world: ({"at": timezone.now().isoformat()},),
    f"{_LOAD}/last-minute-changes": _late_changes,
    f"{_LOAD}/last-minute-changes/preview": lambda _world: (late_lines(),),
    f"{_LOAD}/notes": _one(text="a bag too many"),
    f"{_LOAD}/signatures": lambda world: (
        {"meaning": "prepared", "digest": signing(world.loads["open"]).digest, "password": PASSWORD},
    ),
    f"{_LOAD}/withdrawal": _one(reason="not flown"),
    "/api/v1/me/mail": _one(mail="r.amani@example.org"),
    "/api/v1/me/password": _one(current=PASSWORD, new="slow-copper-meadow-4"),
    "/api/v1/people": _one(
        login="new.person",
        name="N. Person",
        mail="n.person@example.org",
        password="slow-copper-meadow-4",
        reason="joined",
    ),
    "/api/v1/people/{person}/deactivation": _one(reason="left"),
    "/api/v1/people/{person}/duties": _one(
        role="pilot", granted=True, since="2027-01-01T00:00:00Z", reason="checked out"
    ),
    "/api/v1/rechecks": _rechecks,
    "/api/v1/settings": _one(
        reason="manual revised",
        true_from="2027-01-01T00:00:00Z",
        last_minute_bound={"weight": q("200", "lb"), "persons": 1},
        weighing_threshold_percent="0.5",
        operations_mail=["ops@kestrel.example"],
        prepare_and_accept_by_one=True,
        estimates_may_be_signed=False,
        rule_set="US",
        procedure="section 8",
        weight_method="weighed",
    ),
    "/api/v1/tokens": lambda world: (
        {
            "label": "another",
            "scopes": ["read"],
            "days": 3,
            "integration": True,
            "registrations": [world.aircraft],
            "person": world.by_role["operations manager"].pk,
        },
    ),
    "/api/v1/tokens/{token}/rotation": _one(overlap_hours=1, days=3, reason="rotated"),
    "/api/v1/tokens/{token}/revocation": _one(reason="lost"),
    "/api/v1/webhooks": _one(address="https://hooks.example.org/new", events=["load.accepted"], label="new"),
}

# Where a spoiled document is right after all: the end of the address, the way ("" for any), the fields.
RIGHT: Final[tuple[tuple[str, str, frozenset[str]], ...]] = (
    # What there may be two of that are alike.
    ("", "sent twice", frozenset({"/items/#", "/limits/#", "/lines/#", "/events/#", "/effects/#"})),
    (
        "/loading-bases",
        "sent twice",
        frozenset(
            {
                "/configurations/#/equipment/#",
                "/configurations/#/operating_items/#",
                "/sample_loads/#",
                "/sample_loads/#/weights/#",
            }
        ),
    ),
    # A datum may stand behind the wing.
    ("/loading-bases", "negative", frozenset({"/chord/leading_edge/value"})),
    # Trim goes both ways from nought.
    ("/loading-bases", "negative", frozenset({"/trim/range/low"})),
    # Nothing set, said plainly.
    ("/settings", "null", frozenset({"/last_minute_bound", "/weighing_threshold_percent"})),
    ("/webhooks", "empty", frozenset({"/label"})),
    # Taken out again.
    ("/me/mail", "empty", frozenset({"/mail"})),
)
# What the schema describes and the endpoint refuses: an empty weight says itself from when it holds.
NOT_TAKEN: Final[Mapping[str, frozenset[str]]] = {
    f"{_AIRCRAFT}/empty-weights/{{version}}/approval": frozenset({"/true_from"}),
    **PROVISION_NOT_TAKEN,
}
