"""Computing a load against what is in force: nothing is stored here, so the same sum serves every way in."""

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime

from fleet.basis import Basis
from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Provision
from fleet.queries.aircraft import aircraft_of
from fleet.queries.figures import basis_of
from fleet.queries.in_force import InForce, in_force_for
from fleet.weighing import EmptyFigures
from loads.balance.aboard import Declared, Outline
from loads.balance.assess import assess, checks_alone
from loads.balance.declared import read_outline
from loads.balance.engine import ENGINE_VERSION
from loads.balance.result import Check, Result
from loads.balance.shape import check_shape
from loads.queries.crew import pilot_in
from loads.queries.current import Current
from loads.queries.figures import empty_figures
from loads.queries.legs import leg_before
from loads.queries.provided import declared_under, provided_versions, ruled_for, used_of
from loads.statement import digest_from
from records.canonical import canonical_of_exact
from records.refusal import Fault, Invalid, NotKnown
from records.strict_json import JSON


@dataclass(frozen=True, slots=True)
class Computation:
    """A load document, what it was computed with, and what came out.

    `digest` is that of the statement: schema, inputs as typed, versions, engine and result.
    """

    document: dict[str, JSON]
    inputs: bytes  # the document, canonical
    outline: Outline
    aircraft: Aircraft
    pilot: int | None
    basis: LoadingBasis | None
    empty_weight: EmptyWeight | None
    provisions: tuple[Provision, ...]  # those that were used
    result: dict[str, object]
    result_text: bytes  # the result, canonical
    digest: str
    before: Current | None = None  # the load of the leg before, where the flight names it

    @property
    def verdict(self) -> str:
        """Within, outside or unresolved."""
        return str(self.result["verdict"])


def compute(operator: str, document: dict[str, JSON], known: datetime) -> Computation:
    """This function will compute a load document with the versions in force at its departure, as known at
    `known`.

    Raises Invalid with every fault found; an aircraft the operator has not entered is one.
    """
    outline = read_outline(document)
    aircraft = _aircraft_in(operator, outline)
    before = leg_before(operator, aircraft, outline.flight)
    used = in_force_for(aircraft, outline.flight.departure, known, outline.configuration)
    declared, assessed = assessed_with(document, outline, used, known)
    pilot = pilot_in(operator, document)
    result = assessed.as_document()
    provisions = used_of(used.provisions, declared) if isinstance(declared, Declared) else ()
    versions = versions_of(used.basis, used.empty_weight, provisions)
    inputs, result_text = canonical_of_exact(document), canonical_of_exact(result)
    return Computation(
        document=document,
        inputs=inputs,
        outline=outline,
        aircraft=aircraft,
        pilot=pilot,
        basis=used.basis,
        empty_weight=used.empty_weight,
        provisions=provisions,
        result=result,
        result_text=result_text,
        digest=digest_from(inputs, versions, ENGINE_VERSION, result_text),
        before=before,
    )


def assessed_with(
    document: dict[str, JSON], outline: Outline, used: InForce, known: datetime, *, advised: bool = True
) -> tuple[Declared | Outline, Result]:
    """This function will return a load document as read against these versions, and its result; without a
    basis its outline is all that is read. Raises Invalid with every fault.
    """
    declared, basis, empty = _read_with(document, outline, used, known)
    return declared, assess(declared, basis, empty, advised=advised)


def checked_with(
    document: dict[str, JSON], outline: Outline, used: InForce, known: datetime
) -> tuple[Check, ...]:
    """This function will return the checks of a load document against these versions and no more. Raises
    Invalid with every fault.
    """
    declared, basis, empty = _read_with(document, outline, used, known)
    if basis is None or isinstance(declared, Outline):
        return assess(declared, basis, empty).checks
    return checks_alone(declared, basis, empty)


def _read_with(
    document: dict[str, JSON], outline: Outline, used: InForce, known: datetime
) -> tuple[Declared | Outline, Basis | None, EmptyFigures | None]:
    basis = basis_of(used.basis) if used.basis else None
    if basis is None:
        check_shape(document)
    ruled = ruled_for(basis, used.provisions, outline) if basis else None
    declared = declared_under(document, used, ruled, known) if ruled else outline
    empty = (
        empty_figures(used.empty_weight.document, used.basis.document)
        if used.empty_weight and used.basis
        else None
    )
    return declared, ruled.basis if ruled else None, empty


def _aircraft_in(operator: str, outline: Outline) -> Aircraft:
    try:
        return aircraft_of(operator, outline.aircraft)
    except NotKnown:
        detail = f"no aircraft {outline.aircraft} is entered; correct the registration, or enter the aircraft"
        raise Invalid(Fault("/aircraft", "unknown-aircraft", detail)) from None


def versions_of(
    basis: LoadingBasis | None, empty_weight: EmptyWeight | None, provisions: Sequence[Provision] = ()
) -> dict[str, object]:
    """This function will return ids and digests of the versions used, as the statement holds them; None if
    none was. What the operator laid down stands there only where some of it was used.
    """
    return {
        "loading_basis": {"id": str(basis.id), "digest": basis.digest} if basis else None,
        "empty_weight": {"id": str(empty_weight.id), "digest": empty_weight.digest} if empty_weight else None,
        **(provided_versions(provisions) if provisions else {}),
    }
