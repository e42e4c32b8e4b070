"""The statement of a load: what was declared, what it was computed with, what came out. It is what people
sign.

Its digest is the SHA-256 of its canonical bytes (RFC 8785), so a change of any signed figure, version or
engine gives another digest, and a signature on the one is no signature on the other. Identity, state and time
are not in it: the same inputs and versions give the same bytes, always.
"""

from collections.abc import Mapping, Sequence
from hashlib import sha256
from typing import cast

from records.canonical import canonical, digest

SCHEMA = "tarebook.statement/1"
MEANINGS: dict[str, str] = {
    "prepared": "I prepared this load from what was declared, and checked the figures above",
    "loaded": "I supervised the loading, and the aircraft is loaded as listed above",
    "accepted": "I accept this load for the flight named above as its pilot in command",
}

Document = Mapping[str, object]


def statement(inputs: Document, versions: Document, engine: str, result: Document) -> dict[str, object]:
    """Return the statement of a load.

    `inputs` is the load document as typed, `versions` the id and digest of each record used (None where none
    was in force), `engine` the version of the computation, `result` its result document.
    """
    return {
        "schema": SCHEMA,
        "inputs": inputs,
        "versions": versions,
        "engine": engine,
        "result": result,
    }


def digest_of(stated: Document) -> str:
    """Return the digest of a statement as 64 lower-case hexadecimal digits."""
    return digest(stated)


def digest_from(inputs: bytes, versions: Document, engine: str, result: bytes) -> str:
    """Return the digest of the statement whose inputs and result are given as their canonical bytes.

    The same as `digest_of(statement(...))`: canonical bytes of an object are those of its members, in the
    order of their names. It saves writing the two long members once more.
    """
    parts = {
        b"engine": canonical(engine),
        b"inputs": inputs,
        b"result": result,
        b"schema": canonical(SCHEMA),
        b"versions": canonical(versions),
    }
    whole = b",".join(b'"' + name + b'":' + part for name, part in sorted(parts.items()))
    return sha256(b"{" + whole + b"}").hexdigest()


def signing_text(stated: Document, *, name: str, capacity: str, meaning: str) -> str:
    """Return the sentences a signer is shown, one a line, and signs: nothing of weight stands outside them.

    `meaning` is a key of `MEANINGS`. Raises `KeyError` for another, and for a statement whose result has no
    phases: only a load that was computed can be signed.
    """
    meant = MEANINGS[meaning]
    result = cast("Document", stated["result"])
    inputs = cast("Document", stated["inputs"])
    phases = {str(phase["phase"]): phase for phase in _objects(result["phases"])}
    units = cast("Document", result["units"])
    lines = [
        _flight(inputs),
        f"Verdict: {result['verdict']}.",
        *(_phase(phases[phase], units) for phase in ("take-off", "zero fuel", "landing")),
        *_governing(result),
        *_fuel(result),
        _persons(result),
        _not_assessed(result),
        *_versions(stated),
        f"Digest of the statement: {digest_of(stated)}.",
        f"{name}, {capacity}: {meant}.",
    ]
    return "\n".join(lines)


def _flight(inputs: Document) -> str:
    flight = cast("Document", inputs["flight"])
    which = f"flight {flight['reference']} leg {flight['leg']}"
    way = f"{flight['origin']} to {flight['destination']}, departure {flight['departure']}"
    return f"Aircraft {inputs['aircraft']}, configuration {inputs['configuration']}, {which}, {way}."


def _phase(phase: Document, units: Document) -> str:
    chord = f" ({phase['percent_chord']} % of the mean chord)" if phase["percent_chord"] is not None else ""
    return (
        f"{str(phase['phase']).capitalize()}: {phase['weight']} {units['weight']}, "
        f"CG {phase['arm']} {units['length']}{chord}, lateral {phase['lateral_text']}."
    )


def _governing(result: Document) -> list[str]:
    governing = cast("Document", result["governing"])
    return [f"Weight: {governing['weight']}.", f"CG: {governing['cg']}."]


def _fuel(result: Document) -> list[str]:
    fuel = cast("Document", result["fuel"])
    unit = fuel["unit"]
    tanks = "; ".join(
        f"{tank['name']} {tank['at_engine_start']} {tank['unit']}" for tank in _objects(fuel["tanks"])
    )
    burn = f"taxi {fuel['taxi']} {unit}, trip {fuel['trip']} {unit}"
    left = f"at landing {fuel['landing']} {unit}, minimum at landing {fuel['minimum_at_landing']} {unit}"
    density = f"density {fuel['density']} ({fuel['density_source']})"
    return [f"Fuel at engine start: {tanks}; {density}.", f"Fuel: {burn}, {left}."]


def _persons(result: Document) -> str:
    persons = cast("Document", result["persons"])
    most = f"; at most {persons['greatest_in_flight']} in flight" if "greatest_in_flight" in persons else ""
    return (
        f"Persons on board: {persons['total']} ({persons['crew']} crew, {persons['passengers']} passengers, "
        f"{persons['lap_infants']} lap infants){most}."
    )


def _not_assessed(result: Document) -> str:
    open_ends = "; ".join(str(line) for line in cast("Sequence[object]", result["not_assessed"]))
    return f"Not assessed: {open_ends or 'nothing'}."


def _versions(stated: Document) -> list[str]:
    versions = cast("Mapping[str, object]", stated["versions"])
    found = [
        f"{name.replace('_', ' ').capitalize()}: {_which(version)}."
        for name, version in sorted(versions.items())
    ]
    return [*found, f"Computed by engine version {stated['engine']}."]


def _which(version: object) -> str:
    """Return one version, or several of a kind, by id and digest."""
    if version is None:
        return "none"
    listed = _objects(version) if isinstance(version, list | tuple) else (cast("Document", version),)
    return "; ".join(f"{one['id']}, digest {one['digest']}" for one in listed)


def _objects(value: object) -> "Sequence[Document]":
    return cast("Sequence[Document]", value)
