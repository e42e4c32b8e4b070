"""Reads the documents `tarebook.restriction/1` and `tarebook.permit/1`: every fault by its pointer."""

from collections.abc import Mapping
from datetime import datetime
from decimal import Decimal
from fractions import Fraction
from functools import lru_cache
from typing import Any, Final, Literal

from fleet.basis import Basis
from fleet.document_schema import shape_faults
from fleet.polygon import NotAnEnvelope, Point, demand_polygon, overlap
from fleet.quantities import Quantity, Unit
from fleet.restrictions import Effect, Paper, corners_of, is_of, unknown_names
from fleet.sourced import Source
from records.refusal import Fault, Invalid
from records.strict_json import read

Kind = Literal["restriction", "permit"]
# What each effect is made of, besides its name.
_NEEDS: Final[Mapping[str, tuple[str, ...]]] = {
    "limit": ("limit", "weight"),
    "maximum": ("of", "weight"),
    "seats": ("ids",),
    "places": ("ids",),
    "fuel": ("of", "volume"),
    "envelope": ("of", "points", "unit", "weight_unit"),
}


def read_entered(document: object, kind: Kind, basis: Basis | None) -> Paper:
    """Return the restriction or permit in a document that is entered now, beside the basis in force.

    Besides the faults of form, an envelope that is none is a fault, and what the basis does not have; None:
    there is no basis yet. Raises `Invalid` with all of them.
    """
    paper = read_paper(document, kind)
    given = document["effects"] if isinstance(document, Mapping) else ()
    faults: list[Fault] = []
    for place, effect in enumerate(paper.effects):
        where = f"/effects/{place}"
        faults += _no_outline(effect, where) or (
            [] if basis is None else _misfits(basis, effect, where, given[place])
        )
    if faults:
        raise Invalid(*faults)
    return paper


def read_paper(document: object, kind: Kind) -> Paper:
    """Return the restriction or permit in a document. Raises `Invalid` with all faults of form."""
    faults = shape_faults(f"{kind}-1", document)
    if faults or not isinstance(document, Mapping):
        raise Invalid(*faults)
    since = datetime.fromisoformat(document["true_from"])
    until = datetime.fromisoformat(document["true_until"]) if "true_until" in document else None
    if until is not None and until <= since:
        faults.append(Fault("/true_until", "out-of-order", "must be after true_from; correct one of them"))
    found = [_effect(each, f"/effects/{place}", faults) for place, each in enumerate(document["effects"])]
    if faults:
        raise Invalid(*faults)
    source = document["source"]
    return Paper(
        kind=kind,
        number=document["number"],
        what=document["what"],
        authority=document.get("authority", ""),
        since=since,
        until=until,
        source=Source(source["document"], source.get("revision", ""), source["page"]),
        effects=tuple(effect for effect in found if effect is not None),
        operations=tuple(document.get("operations", ())),
        conditions=tuple(document.get("conditions", ())),
    )


@lru_cache(maxsize=256)
def paper_from_text(text: str, kind: Kind) -> Paper:
    """Return the restriction or permit in the text of a stored document; texts read are remembered."""
    return read_paper(read(text.encode()), kind)


def _effect(given: Mapping[str, Any], where: str, faults: list[Fault]) -> Effect | None:
    word = given["effect"]
    needs = _NEEDS[word]
    lacking = [name for name in needs if name not in given]
    strange = [name for name in given if name != "effect" and name not in needs]
    faults += [
        Fault(f"{where}/{name}", "missing", f"the effect {word} needs its {name}; give it")
        for name in lacking
    ]
    faults += [
        Fault(f"{where}/{name}", "unknown-field", f"the effect {word} has no {name}; remove it")
        for name in strange
    ]
    if lacking or strange:
        return None
    names = tuple(given["ids"]) if "ids" in given else (given.get("limit") or given["of"],)
    if word == "envelope":
        points = tuple((Decimal(across), Decimal(weight)) for across, weight in given["points"])
        return Effect(word, names, None, points, (Unit(given["unit"]), Unit(given["weight_unit"])))
    measure = next((name for name in ("weight", "volume") if name in given), None)
    if measure is None:
        return Effect(word, names)
    amount = Quantity(Decimal(given[measure]["value"]), Unit(given[measure]["unit"]))
    if amount.value <= 0:
        faults.append(Fault(f"{where}/{measure}/value", "not-above-zero", "must be above zero; correct it"))
    return Effect(word, names, amount)


def _no_outline(effect: Effect, where: str) -> list[Fault]:
    """Return why the corners of an effect are no envelope; [] where they are one, or there are none."""
    if not effect.points:
        return []
    try:
        demand_polygon(_exact(effect.points))
    except NotAnEnvelope as refused:
        return [Fault(f"{where}/points", refused.code, str(refused))]
    return []


def _misfits(basis: Basis, effect: Effect, where: str, given: Mapping[str, Any]) -> list[Fault]:
    missing = unknown_names(basis, effect)
    if missing:
        at = next(name for name in ("ids", "limit", "of") if name in given)
        detail = f"{', '.join(missing)}: not in the loading basis in force then; correct it"
        return [Fault(f"{where}/{at}", "unknown-id", detail)]
    if effect.effect != "envelope" or effect.units is None:
        return []
    own = next(one for one in basis.envelopes if one.id == effect.names[0])
    if not is_of(effect.units[0], own.plane):
        detail = (
            f"the envelope is straight in the {own.plane} plane; give its corners in a unit of {own.plane}"
        )
        return [Fault(f"{where}/unit", "unit-dimension", detail)]
    if not overlap(corners_of(effect, own, basis), own.points):
        detail = (
            f"nothing of it lies inside envelope {own.id}; give each corner as [{own.plane}, weight] and "
            "check both units"
        )
        return [Fault(f"{where}/points", "envelope-elsewhere", detail)]
    return []


def _exact(points: tuple[tuple[Decimal, Decimal], ...]) -> list[Point]:
    return [(Fraction(across), Fraction(weight)) for across, weight in points]
