"""Reads tanks, their tables, and the order in which they feed."""

from typing import Any

from fleet.basis import BurnStage, Tank, TankTable
from fleet.basis_reading.findings import Findings, exact, number
from fleet.basis_reading.presentation import divided_by
from fleet.conversion import converted
from fleet.quantities import DIMENSION_OF, Unit
from fleet.tanks import NotATable


def read_tanks(findings: Findings) -> tuple[Tank, ...]:
    """Return the tanks; a table that cannot be interpolated or that ends below the capacity is a fault."""
    findings.once(("tanks",))
    tanks = []
    for at, entry in findings.entries("tanks"):
        capacity = findings.above_zero(entry["capacity"], findings.volume, f"{at}/capacity")
        table = _table(findings, f"{at}/table", entry["table"])
        if table is None:
            continue
        if capacity > table.curve.last:
            findings.fault(
                f"{at}/capacity",
                "capacity-beyond-table",
                "the tank holds more than its table covers; enter the missing points, none are extrapolated",
            )
        tanks.append(
            Tank(
                id=entry["id"],
                name=entry["name"],
                capacity=capacity,
                lateral_arm=exact(entry["lateral_arm"], findings.length),
                table=table,
                source=findings.source(entry["source"]),
            )
        )
    return tuple(tanks)


def read_burn_order(findings: Findings) -> tuple[BurnStage, ...]:
    """Return the stages in which tanks feed; every tank must stand in exactly one."""
    stages = _stages(findings, "burn_order")
    fed = {tank for stage in stages for tank in stage.tanks}
    if findings.sound("/burn_order"):
        for at, entry in findings.entries("tanks"):
            if entry["id"] not in fed:
                findings.fault(
                    f"{at}/id",
                    "tank-never-burned",
                    f"{entry['id']} is in no stage of the burn order; add it to one",
                )
    return stages


def read_taxi_order(findings: Findings, burn_order: tuple[BurnStage, ...]) -> tuple[BurnStage, ...]:
    """Return the stages that feed taxiing: the basis's own, which may leave tanks out, or else the burn
    order.
    """
    return _stages(findings, "taxi_order") if "taxi_order" in findings.document else burn_order


def _stages(findings: Findings, field: str) -> tuple[BurnStage, ...]:
    known = findings.named("tanks")
    seen: set[str] = set()
    stages = []
    for at, entry in findings.entries(field):
        findings.known(entry["tanks"], known, f"{at}/tanks", "tank")
        for row, tank in enumerate(entry["tanks"]):
            if tank in seen:
                findings.fault(
                    f"{at}/tanks/{row}", "tank-burned-twice", f"{tank} already feeds earlier; keep one stage"
                )
        seen.update(entry["tanks"])
        stages.append(BurnStage(tuple(entry["tanks"])))
    return tuple(stages)


def _table(findings: Findings, at: str, entry: dict[str, Any]) -> TankTable | None:
    against, gives = Unit(entry["against_unit"]), Unit(entry["gives_unit"])
    fits = True
    for unit, field, wanted in ((against, "against", entry["against"]), (gives, "gives", entry["gives"])):
        if DIMENSION_OF[unit].value != {"arm": "length"}.get(wanted, wanted):
            fits = False
            findings.fault(
                f"{at}/{field}_unit", "unit-dimension", f"{unit.value} is no unit of {wanted}; correct it"
            )
    if not fits:
        return None
    factor = divided_by(findings, at, entry, moments=entry["gives"] == "moment")
    if factor is None:
        return None
    quantity_unit = findings.volume if entry["against"] == "volume" else findings.weight
    value_unit = findings.length if entry["gives"] == "arm" else findings.moment
    try:
        return TankTable(
            against=entry["against"],
            gives=entry["gives"],
            straight_in=entry["straight_in"],
            density=exact(entry["density"], findings.density) if "density" in entry else None,
            points=tuple(
                (
                    converted(number(quantity), against, quantity_unit),
                    converted(number(value) * factor, gives, value_unit),
                )
                for quantity, value in entry["points"]
            ),
        )
    except NotATable as refused:
        row = "/points" if refused.row is None else f"/points/{refused.row}"
        findings.fault(at + ("/density" if "density" in refused.code else row), refused.code, str(refused))
        return None
