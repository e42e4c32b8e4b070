"""Gathers what a manifest says from the rows of an accepted load. Nothing that can still change is read."""

import json
from collections.abc import Mapping
from datetime import datetime
from typing import Any
from uuid import UUID

from fleet.applicable import applicable
from fleet.models import Aircraft, EmptyWeight, LoadingBasis, Operator, Provision
from fleet.queries.figures import basis_of
from fleet.queries.provisions import used_provisions
from fleet.queries.settings import Settings, settings_at
from loads.balance.late_change import said
from loads.manifest.facts import (
    AircraftFacts,
    BasisFacts,
    ChangeFacts,
    EmptyWeightFacts,
    Facts,
    OperatorFacts,
    ProvisionFacts,
    SealFacts,
    SignatureFacts,
)
from loads.manifest.figures import utc
from loads.models import Assessment, LateChange, Load, Paper, Signature, Step
from loads.queries.current import Current
from loads.queries.declaration import declared_now
from loads.queries.late_change import bound_of, changes_of, lines_of, moved_by
from loads.queries.legs import followed_by, follows, uplift_words
from loads.queries.provided import basis_under
from loads.queries.signable import statement_of
from loads.statement import MEANINGS
from records.canonical import canonical
from records.models.act import Act
from records.queries import seal_of
from records.refusal import NotKnown, StepRefused
from records.strict_json import JSON


def facts_of(paper: Paper, change: LateChange | None = None) -> Facts:
    """This function will return the facts of the load a manifest number was taken for, for its first issue or
    the one that a last-minute change made.

    They are those of that acceptance: the assessment that was signed and the versions it used, whatever is in
    force now. Raises StepRefused while the act of acceptance is not sealed, which another transaction never
    sees.
    """
    act = change.act if change else paper.act
    step = Step.objects.select_related(
        "load__operator",
        "load__aircraft",
        "assessment__loading_basis__approval",
        "assessment__empty_weight__approval",
    ).get(load_id=paper.load_id, act=act)
    load, used = step.load, step.assessment
    if used is None or used.loading_basis is None or used.empty_weight is None:
        raise StepRefused(
            "not-computed", "The load was accepted on no computation, so there is nothing to print."
        )
    current = Current(load, step, used)
    declared = declared_now(current)
    signed = canonical(statement_of(current, declared))
    return Facts(
        operator=_operator(load.operator, settings_at(load.operator_id, step.at, step.at)),
        aircraft=_aircraft(load.aircraft),
        load=str(load.id),
        replaces=str(load.replaces_id or ""),
        number=paper.number,
        inputs=json.loads(canonical(declared)),
        result=current.result(),
        basis=_basis(used, used.loading_basis, current.result(), load.configuration),
        empty_weight=_empty_weight(used.empty_weight),
        engine=used.engine,
        signatures=_signatures(load, used),
        seal=_seal(act),
        statement=signed,
        digest=used.digest,
        changes=_changes(load, change, declared),
        earlier=_signatures(load, used, before=step.number) if change else (),
        provisions=tuple(_provision(one) for one in used_provisions(used.provisions)),
        legs=_legs(load, step.at),
        uplift=uplift_words(current, step.at),
    )


def paper_of(operator: str, load: UUID) -> Paper:
    """This function will return the manifest number of an operator's load; raises NotKnown, for another's
    too.
    """
    found = Paper.objects.filter(load_id=load, operator_id=operator).first()
    if found is None:
        raise NotKnown(
            "manifest-not-known",
            "There is no manifest: no load of this number has been accepted.",
            next_step="Prepare and accept the load; its manifest is numbered by the acceptance.",
        )
    return found


def _operator(row: Operator, then: Settings) -> OperatorFacts:
    """Tell the operator, with what its settings said at the acceptance."""
    return OperatorFacts(
        code=row.code,
        name=row.name,
        certificate=row.certificate,
        base=row.base,
        time_zone=row.time_zone,
        rule_set="US" if then.rule_set == "US" else "EU-UK",
        procedure=then.procedure,
        weight_method=then.weight_method,
        invented=row.invented,
    )


def _aircraft(row: Aircraft) -> AircraftFacts:
    return AircraftFacts(row.registration, row.serial_number, row.type, row.category, row.engines)


def _basis(used: Assessment, row: LoadingBasis, result: Mapping[str, Any], configuration: str) -> BasisFacts:
    """Tell the basis with the envelopes that were judged by: those of restrictions and permits, too."""
    category = (result.get("certification_category") or {}).get("id")
    ruled = basis_under(basis_of(row), used_provisions(used.provisions))
    figures = applicable(ruled, configuration, category)
    document = json.loads(row.document)
    return BasisFacts(
        row.revision,
        row.digest,
        _known_from(row),
        document,
        figures.envelopes,
        figures.chord,
        figures.curtailments,
        figures.lateral_by_cg,
    )


def _empty_weight(row: EmptyWeight) -> EmptyWeightFacts:
    return EmptyWeightFacts(row.digest, row.true_from, _known_from(row), json.loads(row.document))


def _provision(row: Provision) -> ProvisionFacts:
    document = json.loads(row.document)
    title = document.get("title") or document.get("what")
    own = f" {document['number']}" if "number" in document else f", version {row.number}"
    return ProvisionFacts(row.kind.capitalize(), f"{title}{own}, true from {utc(row.true_from)}", row.digest)


def _known_from(row: LoadingBasis | EmptyWeight) -> datetime | None:
    approval = getattr(row, "approval", None)
    return approval.known_from if approval else None


def _changes(load: Load, last: LateChange | None, declared: dict[str, JSON]) -> tuple[ChangeFacts, ...]:
    """Tell the changes up to the last one given; a later one belongs to a later issue."""
    if last is None:
        return ()
    changes = changes_of(load)[: last.number]
    names = {one.step_id: bytes(one.name).decode() for one in Signature.objects.filter(load=load)}
    told = []
    for place, one in enumerate(changes, 1):
        bound = bound_of(one)
        told.append(
            ChangeFacts(
                number=one.number,
                lines=tuple(said(line, named=True) for line in lines_of(one)),
                by=names[one.step_id],
                at=one.changed_at,
                moved=bound.said(moved_by(changes[:place], declared)),
                bound=bound.words(),
            )
        )
    return tuple(told)


def _legs(load: Load, then: datetime) -> tuple[str, ...]:
    """Tell the linked legs as they were at the acceptance."""
    before = follows(load)
    told = [] if before is None else [f"follows {before.words} (load {before.load})"]
    told += [f"followed by {one.words} (load {one.load})" for one in followed_by(load, then)]
    return tuple(told)


def _signatures(load: Load, used: Assessment, before: int | None = None) -> tuple[SignatureFacts, ...]:
    """Tell the signatures under an assessment, or those under the earlier ones that were accepted."""
    rows = Signature.objects.filter(load=load).order_by("step__number")
    if before is None:
        rows = rows.filter(assessment=used)
    else:
        accepted = load.steps.filter(after="accepted", number__lt=before).values("assessment")
        rows = rows.filter(assessment__in=accepted)
    return tuple(
        SignatureFacts(
            name=bytes(row.name).decode(),
            capacity=row.capacity,
            meaning=row.meaning,
            statement=MEANINGS.get(row.meaning, ""),
            signed_at=row.signed_at,
            means=row.means,
        )
        for row in rows
    )


def _seal(act: UUID) -> SealFacts:
    seal = seal_of(act)
    if seal is None:
        raise StepRefused(
            "not-sealed", "The acceptance is not sealed yet.", next_step="Ask again in a moment."
        )
    opened = Act.objects.values_list("at", flat=True).get(pk=act)
    return SealFacts(seal.position, seal.digest, opened)
