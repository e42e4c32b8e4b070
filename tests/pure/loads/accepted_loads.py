"""Makers of accepted loads as plain facts: invented aircraft, real reading, real assessment, no database."""

import hashlib
import json
from collections.abc import Callable
from dataclasses import replace
from datetime import UTC, datetime
from pathlib import Path
from typing import Any

from fleet.basis_reading import basis_from_text
from fleet.empty_weight_reading import read_empty_weight
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.engine import ENGINE_VERSION
from loads.manifest.facts import (
    AircraftFacts,
    BasisFacts,
    EmptyWeightFacts,
    Facts,
    OperatorFacts,
    SealFacts,
    SignatureFacts,
)
from loads.statement import MEANINGS, statement
from records.canonical import canonical, digest
from records.strict_json import read

DATA = Path(__file__).parents[3] / "service" / "demo" / "data"
OPERATOR = OperatorFacts(
    code="kestrel-ridge",
    name="Kestrel Ridge Air",
    certificate="KRA-0417",
    base="Nallow Field",
    time_zone="America/Chicago",
    rule_set="US",
    procedure="Operations manual part B, section 6, revision 4",
    weight_method="actual weights, each person and item weighed or declared",
    invented=True,
)
SIGNED = datetime(2026, 12, 1, 13, 52, 7, tzinfo=UTC)


def q(value: float | str, unit: str) -> dict[str, str]:
    return {"value": str(value), "unit": unit}


def person(
    name: str, seat: str, weight: str, unit: str, how: str = "declared", **more: Any
) -> dict[str, Any]:
    return {"name": name, "seat": seat, "weight": q(weight, unit), "how": how, **more}


def pilot(name: str, seat: str, weight: str, unit: str) -> dict[str, Any]:
    login = name.lower().replace(" ", "")
    return person(name, seat, weight, unit, "weighed", position="pilot in command", person=login)


def item(what: str, place: str, weight: dict[str, str], **more: Any) -> dict[str, Any]:
    return {"kind": "baggage", "what": what, "place": place, "weight": weight, "how": "weighed", **more}


def _flight(reference: str, departure: str, origin: str, destination: str) -> dict[str, Any]:
    return {
        "reference": reference,
        "leg": 1,
        "departure": departure,
        "origin": origin,
        "destination": destination,
        "operation": "passenger-charter",
    }


def twin_load(**changes: Any) -> dict[str, Any]:
    """A light twin in lb and in, six seats, four tanks; with a lap infant and a stated limit."""
    unit = "lb"
    infant = {"name": "I. Dravo", "weight": q(18, unit), "how": "weighed"}
    return {
        "schema": "tarebook.load/1", "aircraft": "Q9-KTB", "configuration": "six-seat",
        "flight": _flight("KT-214", "2026-12-01T08:30:00-06:00", "XNAL", "XKOR"),
        "persons_on_board": 5,
        "crew": [pilot("R. Amani", "COCKPIT-L", "181", unit)],
        "passengers": [
            person("L. Osei", "ROW1-L", "176", unit),
            person("M. Dravo", "ROW1-R", "139", unit, lap_infant=infant),
            person("T. Havel", "ROW2-L", "158", unit),
        ],
        "items": [
            item("checked bags", "AFT-HOLD", q(85, unit)),
            item("survey tripod", "NOSE-HOLD", q(60, unit), kind="cargo"),
        ],
        "fuel": {
            "density": {**q("6.7", "lb/US gal"), "source": "delivery note 4471"},
            "at_engine_start": {
                "LEFT-AUX": q(20, "US gal"), "RIGHT-AUX": q(20, "US gal"),
                "LEFT-MAIN": q(60, "US gal"), "RIGHT-MAIN": q(60, "US gal"),
            },
            "not_usable": {},
            "taxi": q(24, unit), "trip": q(480, unit), "minimum_at_landing": q(210, unit),
        },
        "limits": [{"at": "take-off", "weight": q(6150, unit), "source": "performance sheet 12"}],
        **changes,
    }  # fmt: skip


def turboprop_load(**changes: Any) -> dict[str, Any]:
    """A single turboprop in kg and mm, every seat taken and many items: the longest paper expected."""
    unit = "kg"
    seats = ["ROW1-L", "ROW1-R", "ROW2-L", "ROW2-R", "ROW3-L", "ROW3-R", "ROW4-L", "ROW4-R"]
    holds = ("AFT-HOLD", "FWD-POD", "AFT-POD")
    long = "Wilhelmina Oyelaran-Castellanos van der Merwede-Thorvaldsen"
    return {
        "schema": "tarebook.load/1", "aircraft": "Q9-FEN", "configuration": "eight-seat",
        "flight": _flight("KT-318", "2026-12-01T14:05:00+01:00", "XVEL", "XMIR"),
        "persons_on_board": 10,
        "crew": [
            pilot("K. Ilves", "COCKPIT-L", "84", unit),
            person("S. Boateng", "COCKPIT-R", "71", unit, "weighed", position="second in command"),
        ],
        "passengers": [
            person(long if n == 3 else f"P{n}. Larssen", seat, str(60 + n), unit)
            for n, seat in enumerate(seats)
        ],
        "items": [
            item(f"bags of party {n + 1}", holds[n % 3], q(9 + n, unit), how=how)
            for n, how in enumerate(["weighed"] * 4 + ["estimated"] + ["weighed"] * 2)
        ],
        "fuel": {
            "density": {**q("0.80", "kg/l"), "source": "delivery note 88"},
            "at_engine_start": {"LEFT": q(260, "l"), "RIGHT": q(260, "l")},
            "taxi": q(12, unit), "trip": q(210, unit), "minimum_at_landing": q(110, unit),
        },
        "limits": [],
        **changes,
    }  # fmt: skip


def helicopter_load(**changes: Any) -> dict[str, Any]:
    """A helicopter in kg and mm, with limits to the sides."""
    unit = "kg"
    return {
        "schema": "tarebook.load/1", "aircraft": "Q9-HEL", "configuration": "five-seat",
        "flight": _flight("KT-77", "2026-12-01T10:00:00+00:00", "XMIR", "XOBS"),
        "persons_on_board": 3,
        "crew": [pilot("J. Sorrel", "FRONT-R", "79", unit)],
        "passengers": [person("A. Quist", "REAR-L", "82", unit), person("B. Quist", "REAR-R", "64", unit)],
        "items": [item("mast parts", "AFT-HOLD", q(30, unit), kind="cargo")],
        "fuel": {
            "density": {**q("0.80", "kg/l"), "source": "delivery note 90"},
            "at_engine_start": {"MAIN": q(220, "l")},
            "taxi": q(4, unit), "trip": q(90, unit), "minimum_at_landing": q(40, unit),
        },
        "limits": [],
        **changes,
    }  # fmt: skip


def accepted(
    load: dict[str, Any],
    kind: str,
    *,
    rule_set: str = "US",
    invented: bool = True,
    change: Callable[[dict[str, Any]], dict[str, Any]] | None = None,
) -> Facts:
    """Facts of the load as accepted, with what the real engine finds; `change` makes another basis of it."""
    inputs = json.loads(canonical(read(json.dumps(load).encode())))
    text = (DATA / f"{kind}.loading-basis.json").read_text()
    if change is not None:
        text = json.dumps(change(json.loads(text, parse_float=str)))
    empty_document = json.loads((DATA / f"{kind}.empty-weight.json").read_bytes())
    basis = basis_from_text(text)
    result = assess(read_load(inputs, basis), basis, read_empty_weight(empty_document, basis)).as_document()
    digests = {"loading_basis": digest(json.loads(text)), "empty_weight": digest(empty_document)}
    versions = {name: {"id": f"id of the {name}", "digest": found} for name, found in digests.items()}
    signed = canonical(statement(inputs, versions, ENGINE_VERSION, result))
    began = datetime(2026, 3, 19, tzinfo=UTC)
    name = inputs["crew"][0]["name"]
    return Facts(
        operator=replace(OPERATOR, rule_set=rule_set, invented=invented),
        aircraft=AircraftFacts(
            load["aircraft"], "62-0113", basis.aircraft_type, basis.category, basis.engines
        ),
        load="01980a11-2222-7333-8444-555566667777",
        replaces="",
        number=14,
        inputs=inputs,
        result=result,
        basis=BasisFacts(
            3,
            digests["loading_basis"],
            began,
            json.loads(text),
            basis.envelopes,
            basis.chord,
            lateral_by_cg=basis.lateral_by_cg,
        ),
        empty_weight=EmptyWeightFacts(digests["empty_weight"], began, began, empty_document),
        engine=ENGINE_VERSION,
        signatures=tuple(
            SignatureFacts(name, capacity, meaning, MEANINGS[meaning], SIGNED, "session")
            for capacity, meaning in (("load preparer", "prepared"), ("pilot in command", "accepted"))
        ),
        seal=SealFacts(42, hashlib.sha256(b"seal").hexdigest(), SIGNED),
        statement=signed,
        digest=hashlib.sha256(signed).hexdigest(),
    )


def twin(**changes: Any) -> Facts:
    return accepted(twin_load(**changes), "twin")


def turboprop(**changes: Any) -> Facts:
    return accepted(turboprop_load(**changes), "turboprop", rule_set="EU-UK")


def helicopter(**changes: Any) -> Facts:
    return accepted(helicopter_load(**changes), "helicopter")
