"""Reads a whole loading basis."""

from collections.abc import Mapping
from functools import lru_cache
from typing import Any

from fleet.basis import Basis, Chord
from fleet.basis_reading.configurations import read_configurations
from fleet.basis_reading.curtailments import read_curtailments
from fleet.basis_reading.datums import read_other_datums
from fleet.basis_reading.envelopes import lateral_limits_entered, read_envelopes
from fleet.basis_reading.findings import Findings, exact
from fleet.basis_reading.fuel import read_burn_order, read_tanks, read_taxi_order
from fleet.basis_reading.fuel_balance import read_fuel_balance
from fleet.basis_reading.lateral import read_lateral_by_cg
from fleet.basis_reading.limits import read_limits
from fleet.basis_reading.performance import read_performance
from fleet.basis_reading.positions import read_positions
from fleet.basis_reading.presentation import read_presentation
from fleet.basis_reading.running_sums import read_conditions, read_cumulative
from fleet.basis_reading.samples import read_sample_loads
from fleet.basis_reading.stations import read_places, read_seats, read_zones
from fleet.basis_reading.trim import read_trim
from fleet.basis_reading.variants import read_variants
from fleet.document_schema import shape_faults
from records.refusal import Fault, Invalid
from records.strict_json import read

SCHEMA = "loading-basis-1"


def read_basis(document: object) -> Basis:
    """Return the basis in a document `tarebook.loading-basis/1`, as `records.strict_json.read` gives it.

    Raises `Invalid` with all faults that could be found, each with its JSON pointer. When the units, the
    document named or the number of seats are at fault, nothing else can be judged and only faults of form
    are named.
    """
    faults = shape_faults(SCHEMA, document)
    if not isinstance(document, Mapping) or _headless(faults):
        raise Invalid(*faults)
    findings = Findings(dict(document), faults)
    parts = _parts(findings)
    if findings.faults:
        raise Invalid(*dict.fromkeys(findings.faults))  # a limit that serves several is told of once
    return _basis(findings, parts)


@lru_cache(maxsize=256)
def basis_from_text(text: str) -> Basis:
    """Return the basis in the text of a stored document; texts already read are remembered."""
    return read_basis(read(text.encode()))


def _headless(faults: list[Fault]) -> bool:
    """Return whether a fault lies where every other part depends on it."""
    heads = ("/units", "/document", "/passenger_seats_installed")
    return any(not fault.pointer or fault.pointer.startswith(heads) for fault in faults)


def _parts(findings: Findings) -> dict[str, Any]:
    """Return what the lists of the document hold, leaving all faults in `findings`."""
    limits = read_limits(findings)
    variants = read_variants(findings, limits)
    burn_order = read_burn_order(findings)
    envelopes = read_envelopes(findings, variants)
    return {
        "chord": _chord(findings),
        "seats": read_seats(findings),
        "places": read_places(findings),
        "zones": read_zones(findings),
        "tanks": read_tanks(findings),
        "burn_order": burn_order,
        "taxi_order": read_taxi_order(findings, burn_order),
        "limits": limits,
        "envelopes": envelopes,
        "lateral_limits_entered": lateral_limits_entered(findings, envelopes),
        "configurations": read_configurations(findings, variants),
        "sample_loads": read_sample_loads(findings),
        "certification_categories": variants.certification_categories,
        "modifications": variants.modifications,
        "performance": read_performance(findings, findings.document.get("performance"), "/performance"),
        "lateral_by_cg": read_lateral_by_cg(findings),
        "fuel_balance": read_fuel_balance(findings),
        "trim": read_trim(findings),
        "positions": read_positions(findings),
        "conditions": read_conditions(findings),
        "cumulative": read_cumulative(findings),
        "curtailments": read_curtailments(findings, envelopes),
        "presentation": read_presentation(findings),
        "other_datums": read_other_datums(findings),
    }


def _chord(findings: Findings) -> Chord | None:
    given = findings.document.get("chord")
    if not findings.sound("/chord") or not isinstance(given, dict) or "none" in given:
        return None
    return Chord(
        leading_edge=exact(given["leading_edge"], findings.length),
        length=findings.above_zero(given["length"], findings.length, "/chord/length"),
        source=findings.source(given["source"]),
    )


def _basis(findings: Findings, parts: dict[str, Any]) -> Basis:
    document = findings.document
    return Basis(
        aircraft_type=document["aircraft_type"],
        category=document["category"],
        engines=document["engines"],
        passenger_seats_installed=document["passenger_seats_installed"],
        weight_unit=findings.weight,
        length_unit=findings.length,
        volume_unit=findings.volume,
        datum=document["datum"]["name"],
        fits=tuple(document["fits"]),
        **parts,
    )
