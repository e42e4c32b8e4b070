"""Reads configurations: the fits of an aircraft, by name."""

from typing import Any

from fleet.basis import Configuration, FixedItem
from fleet.basis_reading.findings import Findings, exact
from fleet.basis_reading.limits import tightened
from fleet.basis_reading.performance import read_performance
from fleet.basis_reading.variants import Variants


def read_configurations(findings: Findings, variants: Variants) -> tuple[Configuration, ...]:
    """Return the configurations; unknown seats or places, and too few seats for the crew, are faults."""
    findings.once(("configurations",))
    configurations = []
    for at, entry in findings.entries("configurations"):
        findings.known(entry["seats"], findings.named("seats"), f"{at}/seats", "seat")
        findings.known(entry["places"], findings.named("places"), f"{at}/places", "place")
        _demand_seats(findings, at, entry)
        configurations.append(
            Configuration(
                id=entry["id"],
                name=entry["name"],
                seats=tuple(entry["seats"]),
                places=tuple(entry["places"]),
                fit=_fit(findings, at, entry),
                minimum_crew=entry["minimum_crew"],
                equipment=_items(findings, f"{at}/equipment", entry.get("equipment", [])),
                operating_items=_items(findings, f"{at}/operating_items", entry.get("operating_items", [])),
                limits=tightened(
                    findings,
                    entry.get("limits"),
                    f"{at}/limits",
                    variants.of_configuration(findings, at, entry),
                ),
                modifications=tuple(entry.get("modifications", ())),
                performance=read_performance(findings, entry.get("performance"), f"{at}/performance"),
            )
        )
    return tuple(configurations)


def fixed_item(findings: Findings, entry: dict[str, Any]) -> FixedItem:
    """Return an item whose weight may be below zero: something taken out."""
    return FixedItem(
        what=entry["what"],
        weight=exact(entry["weight"], findings.weight),
        arm=exact(entry["arm"], findings.length),
        lateral_arm=exact(entry["lateral_arm"], findings.length),
    )


def _fit(findings: Findings, at: str, entry: dict[str, Any]) -> str:
    """Return the base fit of a configuration: its own, or the first of the basis."""
    fits: list[str] = findings.document["fits"] if findings.sound("/fits") else []
    fit: str = entry.get("fit", fits[0] if fits else "")
    if fits and fit not in fits:
        findings.fault(f"{at}/fit", "fit-unknown", f"not a fit of this basis; use one of {', '.join(fits)}")
    return fit


def _items(findings: Findings, at: str, entries: list[dict[str, Any]]) -> tuple[FixedItem, ...]:
    items = tuple(fixed_item(findings, entry) for entry in entries)
    for number, item in enumerate(items):
        if item.weight == 0:
            findings.fault(
                f"{at}/{number}/weight",
                "weight-zero",
                "an item that weighs nothing; enter its weight or remove it",
            )
    return items


def _demand_seats(findings: Findings, at: str, entry: dict[str, Any]) -> None:
    serves = {seat["id"]: seat["for"] for _, seat in findings.entries("seats")}
    if not serves.keys() >= set(entry["seats"]):
        return  # a seat that is unknown or unsound has its own fault, and cannot be counted
    for_crew = sum(serves[seat] != "passenger" for seat in entry["seats"])
    if for_crew < entry["minimum_crew"]:
        findings.fault(
            f"{at}/minimum_crew",
            "too-few-crew-seats",
            f"{for_crew} of its seats may be used by crew; add seats or correct the number of crew",
        )
    for_passengers = sum(serves[seat] == "passenger" for seat in entry["seats"])
    if for_passengers > findings.document["passenger_seats_installed"]:
        findings.fault(
            f"{at}/seats",
            "too-many-passenger-seats",
            f"{for_passengers} passenger seats are more than are installed; correct one of the two figures",
        )
