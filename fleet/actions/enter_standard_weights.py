"""Enters a table of standard weights; it counts for nothing until a second person approves it."""

from fleet import acts
from fleet.actions.authorship import operator_acting, person_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, Laid, enter
from fleet.entering import plausible
from fleet.models import Provision
from fleet.provisions import STANDARD_WEIGHTS
from fleet.standard_weights_reading import read_standard_weights, true_from_of
from records.act import act
from records.actor import Actor
from records.strict_json import JSON


def enter_standard_weights(actor: Actor, document: JSON, *, reason: str = "") -> Provision:
    """This function will enter the document `tarebook.standard-weights/1` as the operator's next version.

    Raises Invalid with every fault of the document, NotAllowed without the duty.
    """
    about = f"operator:{operator_acting(actor)}"
    person_acting(actor)
    with (
        refused_as(REFUSALS),
        act(acts.ENTER_STANDARD_WEIGHTS, by=actor, about=about, reason=reason) as entry,
    ):
        read_standard_weights(document)
        if not isinstance(document, dict):
            raise TypeError("a document that was read is an object")
        true_from = plausible(true_from_of(document), "/true_from")
        return enter(entry, actor, Laid(STANDARD_WEIGHTS, document, true_from))
