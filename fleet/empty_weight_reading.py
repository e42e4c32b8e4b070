"""Reads the document `tarebook.empty-weight/1`: one version of an aircraft's empty weight, from a weighing
or from paper.

    weight, and moment or arm             aft of the datum positive
    lateral moment or lateral arm         right of the centreline positive

A recorded moment is a fact: it stands, whatever weight times the printed arm comes to. Arms are rounded
where they are printed, so the two rarely agree to the last digit; when they differ grossly one of them is a
slip, and neither is taken.
"""

from collections.abc import Mapping
from dataclasses import dataclass, replace
from datetime import date, datetime, timedelta
from decimal import Decimal
from fractions import Fraction
from typing import Any, Literal

from fleet.basis import Basis
from fleet.conversion import in_unit, moment_unit
from fleet.document_schema import shape_faults
from fleet.quantities import Quantity, Unit
from fleet.weighing import EmptyFigures, Restated
from records.refusal import Fault, Invalid

SCHEMA = "empty-weight-1"
# PHAK (FAA-H-8083-25C) 10-10 prints 69,393.0 on record against 69,416.3 by product, 0.03 %: that is rounding.
GROSS = Fraction(1, 100)


@dataclass(frozen=True, slots=True)
class EmptyWeightParticulars:
    """What an empty-weight document says besides its figures; readable before a loading basis is known."""

    how: Literal["weighing", "opening entry"]
    fit: str
    datum: str
    weighed_on: date
    date: date
    true_from: datetime
    report: str
    signed_by: str


def read_particulars(document: object) -> EmptyWeightParticulars:
    """Return the particulars of a document that is sound by itself.

    Raises `Invalid` with all faults of form.
    """
    return _particulars(_sound(document))


def read_empty_weight(document: object, basis: Basis) -> EmptyFigures:
    """Return the figures in the units of the basis it will be used with.

    From another datum of which the basis states how far it lies away, they are restated. Raises `Invalid`
    with all faults: of form, a datum or fit the basis does not have, a moment far from weight times arm.
    """
    entry = _sound(document)
    faults = []
    other = next((one for one in basis.other_datums if one.name == entry["datum"]), None)
    if entry["datum"] != basis.datum and other is None:
        faults.append(
            Fault(
                "/datum",
                "datum-differs",
                f"the loading basis counts arms from {basis.datum!r}; restate the figures for that datum, or "
                "enter in the basis how far this one lies from it",
            )
        )
    if entry["fit"] not in basis.fits:
        choice = ", ".join(basis.fits)
        faults.append(Fault("/fit", "fit-unknown", f"not a fit of the loading basis; use one of {choice}"))
    if faults:
        raise Invalid(*faults)
    weight, moment = _exact(entry["weight"], basis.weight_unit), _moment(entry, "", basis)
    restated = None
    if entry["datum"] != basis.datum and other is not None:
        restated = Restated(other.name, moment, other.offset, other.source)
        moment += weight * other.offset
    return EmptyFigures(
        weight=weight,
        moment=moment,
        lateral_moment=_moment(entry, "lateral_", basis),
        datum=basis.datum,
        fit=entry["fit"],
        how=entry["how"],
        restated=restated,
    )


def read_as_recorded(document: object, basis: Basis) -> EmptyFigures:
    """Return the figures in the units of a basis they need not go with: they keep their own fit, and their
    own datum where the basis does not state how far it lies away. Raises `Invalid` with all faults of form.
    """
    particulars = read_particulars(document)
    known = any(one.name == particulars.datum for one in basis.other_datums)
    datum = basis.datum if known else particulars.datum
    return read_empty_weight(document, replace(basis, datum=datum, fits=(particulars.fit,)))


def _sound(document: object) -> Mapping[str, Any]:
    """Return a document that agrees with its schema and with itself. Raises `Invalid`."""
    faults = shape_faults(SCHEMA, document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    if Decimal(document["weight"]["value"]) <= 0:
        faults.append(Fault("/weight/value", "not-above-zero", "must be above zero; correct it"))
    else:
        faults += [_gap(document, which) for which in ("", "lateral_") if _grossly_apart(document, which)]
    particulars = _particulars(document)
    # A day is a day somewhere: offsets differ by up to a day and two hours. The first day of the calendar has
    # none before it, so days are counted, not subtracted.
    if particulars.weighed_on > particulars.date:
        faults.append(
            Fault(
                "/weighed_on",
                "weighed-after-date",
                "the weighing a figure rests on is not after the figure; correct one of the two dates",
            )
        )
    early = particulars.date - particulars.true_from.date() > timedelta(days=1)
    if particulars.how == "weighing" and early:
        faults.append(
            Fault(
                "/true_from",
                "true-before-weighing",
                "a weighing holds from the day it was done, or later; correct one of the two dates",
            )
        )
    if faults:
        raise Invalid(*faults)
    return document


def _particulars(entry: Mapping[str, Any]) -> EmptyWeightParticulars:
    return EmptyWeightParticulars(
        how=entry["how"],
        fit=entry["fit"],
        datum=entry["datum"],
        date=date.fromisoformat(entry["date"]),
        true_from=datetime.fromisoformat(entry["true_from"]),
        report=entry["report"],
        signed_by=entry["signed_by"],
        weighed_on=date.fromisoformat(entry.get("weighed_on", entry["date"])),
    )


def _moment(entry: Mapping[str, Any], which: str, basis: Basis) -> Fraction:
    unit = moment_unit(basis.weight_unit, basis.length_unit)
    recorded = entry.get(f"{which}moment")
    if recorded is not None:
        return _exact(recorded, unit)
    return _exact(entry["weight"], basis.weight_unit) * _exact(entry[f"{which}arm"], basis.length_unit)


def _grossly_apart(entry: Mapping[str, Any], which: str) -> bool:
    """Return whether moment and arm are both given and differ by more than 1 % and by more than rounding
    explains.

    Near the datum or the centreline an arm of 0.0 is rounded by far more than 1 % of itself, so half a unit
    of its last printed digit is always allowed.
    """
    if f"{which}moment" not in entry or f"{which}arm" not in entry:
        return False
    weight, moment = _exact(entry["weight"], Unit.KG), _exact(entry[f"{which}moment"], Unit.KG_MM)
    arm = entry[f"{which}arm"]
    _, _, exponent = Decimal(arm["value"]).as_tuple()
    last_digit = {"value": Decimal((0, (1,), int(exponent))), "unit": arm["unit"]}
    gap = abs(moment - weight * _exact(arm, Unit.MM))
    return gap > GROSS * abs(moment) and gap > weight * _exact(last_digit, Unit.MM) / 2


def _gap(entry: Mapping[str, Any], which: str) -> Fault:
    product = _exact(entry["weight"], Unit.KG) * _exact(entry[f"{which}arm"], Unit.MM)
    moment = entry[f"{which}moment"]
    shown = product / _exact({"value": 1, "unit": moment["unit"]}, Unit.KG_MM)
    return Fault(
        f"/{which}moment",
        "moment-against-arm",
        f"weight times arm is {float(shown):.1f} {moment['unit']}, over 1 % away; correct one or omit it",
    )


def _exact(given: Mapping[str, Any], unit: Unit) -> Fraction:
    return in_unit(Quantity(Decimal(given["value"]), Unit(given["unit"])), unit)
