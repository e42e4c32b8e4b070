"""Tables of standard weights for the tests, and loads of the invented twin read with them."""

import copy
import json
from pathlib import Path
from typing import Any

from fleet.standard_weights import StandardWeights
from fleet.standard_weights_reading import read_standard_weights
from loads.balance.assess import assess
from loads.balance.declared import read_load
from loads.balance.result import Result
from tests.pure.loads.making import load, twin, twin_empty

EU = json.loads(
    (Path(__file__).resolve().parents[3] / "fleet/samples/standard-weights-eu.json").read_text("utf-8")
)


def eu_document(**changes: Any) -> dict[str, Any]:
    """The European figures as the project's sample file has them, with fields changed."""
    return copy.deepcopy(EU | changes)


def eu() -> StandardWeights:
    return read_standard_weights(eu_document())


def lb(value: str, category: str) -> dict[str, Any]:
    return {"category": category, "value": value, "unit": "lb"}


def seasonal_document(**changes: Any) -> dict[str, Any]:
    """An invented table in lb: winter from 1 November to 30 April, summer the rest of the year."""
    row = {"from_seats": 1, "source": {"page": "A-2"}}
    document = {
        "schema": "tarebook.standard-weights/1",
        "title": "Company weights",
        "true_from": "2026-01-01T00:00:00Z",
        "source": {"document": "Operations manual A", "revision": "4", "page": "A-2", "authority": "FSDO-99"},
        "categories": [
            {"id": "adult", "name": "adult", "from_age": 13},
            {"id": "child", "name": "child", "from_age": 2, "below_age": 13},
        ],
        "seasons": [
            {"id": "winter", "name": "winter", "first": "11-01", "last": "04-30"},
            {"id": "summer", "name": "summer", "first": "05-01", "last": "10-31"},
        ],
        "rows": [
            {**row, "season": "winter", "weights": [lb("200", "adult"), lb("90", "child")]},
            {**row, "season": "summer", "weights": [lb("195", "adult"), lb("85", "child")]},
        ],
    }
    return copy.deepcopy(document | changes)


def passenger(name: str, seat: str, **more: Any) -> dict[str, Any]:
    return {"name": name, "seat": seat, **more}


def standard(name: str, seat: str, category: str, **more: Any) -> dict[str, Any]:
    return passenger(name, seat, how="standard", category=category, **more)


def document_with(passengers: list[dict[str, Any]], **flight: Any) -> dict[str, Any]:
    """A load of the twin with these passengers, counted, and parts of its flight changed."""
    document = load()
    document["passengers"] = passengers
    infants = sum("lap_infant" in one for one in passengers)
    document["persons_on_board"] = len(document["crew"]) + len(passengers) + infants
    document["flight"] |= flight
    return document


def assessed(document: dict[str, Any], table: StandardWeights | None) -> Result:
    basis = twin()
    return assess(read_load(document, basis, table), basis, twin_empty())
