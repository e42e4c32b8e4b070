"""Right documents of every kind that is taken, together with every field that may stand in one; and what of a
spoiled one is right after all.
"""

from collections.abc import Callable, Mapping
from typing import Any, Final

from django.utils import timezone

from tests.cast import PASSWORD
from tests.loads.late import change_of, proposed
from tests.loads.making import signing
from tests.makers import empty_weight_document, q
from tests.pure.fleet.cabins import cabin
from tests.service.bad_input_bases import loading_bases
from tests.service.bad_input_flights import load_with_everything, standing
from tests.service.bad_input_provisions import PROVISION_NOT_TAKEN, PROVISION_SAMPLES
from tests.service.permission_world import World

Documents = tuple[dict[str, Any], ...]
_AIRCRAFT: Final = "/api/v1/aircraft/{registration}"
_LOAD: Final = "/api/v1/loads/{load}"


def _empty_weights(_world: World) -> Documents:
    arms = empty_weight_document(arm=q("122.94", "in"), lateral_arm=q("-0.17", "in"))
    for part in ("moment", "lateral_moment"):
        del arms[part]
    return empty_weight_document(weighed_on="2025-12-30"), arms


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
            "footprint": standing()["footprint"],
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
    f"{_AIRCRAFT}/loading-bases": lambda _world: loading_bases(),
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
    # So may another datum lie, and a constant counts both ways.
    (
        "/loading-bases",
        "negative",
        frozenset({"/other_datums/#/offset/value", "/presentation/index/constant"}),
    ),
    # An arm may lie ahead of the datum.
    ("/permits", "negative", frozenset({"/effects/#/points/#/#"})),
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
