"""One load with where it stands now."""

import json
from dataclasses import dataclass
from uuid import UUID

from django.db.models import QuerySet

from loads.models import Assessment, Load, Present, Step
from records import strict_json
from records.refusal import NotKnown


@dataclass(frozen=True, slots=True)
class Current:
    """A load, its last step and the assessment in use. The state is `step.after`, the entity tag
    `step.number`.
    """

    load: Load
    step: Step
    assessment: Assessment

    @property
    def state(self) -> str:
        """The state of the load."""
        return self.step.after

    def result(self) -> dict[str, object]:
        """This function will return the result document of the assessment in use."""
        return result_in(self.assessment)


def result_in(assessment: Assessment) -> dict[str, object]:
    """This function will return the result document of an assessment."""
    document: dict[str, object] = json.loads(assessment.result)
    return document


def load_of(operator: str, load: UUID) -> Current:
    """This function will return the operator's load as it stands now; raises NotKnown, for another operator's
    too.
    """
    last = steps_with_their_loads().filter(load_id=load, operator_id=operator).order_by("-number").first()
    if last is None:
        raise NotKnown("load-not-known", "There is no load of this number.")
    return current_at(last)


def steps_with_their_loads() -> "QuerySet[Step]":
    """This function will return the steps with what is shown beside them, in one query; long documents stay
    behind.
    """
    return Step.objects.select_related(
        "load__aircraft", "load__operator", "assessment__loading_basis", "assessment__empty_weight"
    ).defer("assessment__loading_basis__document", "assessment__empty_weight__document")


def current_at(last: Step) -> Current:
    """This function will return the load of its last step."""
    return Current(last.load, last, last.assessment)


def loads_present() -> "QuerySet[Present]":
    """This function will return where loads stand, with load, aircraft, step and assessment, in one query.

    For questions about many loads: filters and orders go by its own columns. No more is joined, since the
    database would take longer to plan the query than to answer it.
    """
    return Present.objects.select_related("step", "load__aircraft", "assessment")


def current_of(present: Present) -> Current:
    """This function will return the load that stands there."""
    return Current(present.load, present.step, present.assessment)


def within(reach: frozenset[str] | None, load: Load) -> bool:
    """This function will tell whether a load is of an aircraft somebody is limited to (registrations); None
    limits to none.
    """
    return reach is None or load.aircraft.registration in reach


def declared_in(load: Load) -> dict[str, strict_json.JSON]:
    """This function will return the document that was declared, numbers as texts."""
    document = strict_json.read(bytes(load.declaration.body))
    if not isinstance(document, dict):
        raise TypeError("a stored declaration is always an object")
    return document
