"""Enters a set of rule values; it counts for nothing until a second person approves it."""

from datetime import datetime

from fleet import acts
from fleet.actions.authorship import operator_acting, person_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.provision_rows import REFUSALS, Laid, enter
from fleet.entering import plausible
from fleet.models import Provision
from fleet.provisions import RULES
from fleet.rules_reading import read_rules
from records.act import act
from records.actor import Actor
from records.strict_json import JSON


def enter_rules(actor: Actor, document: JSON, *, reason: str = "") -> Provision:
    """This function will enter the document `tarebook.rules/1` as the operator's next version.

    Raises Invalid with every fault of the document, NotAllowed without the duty.
    """
    about = f"operator:{operator_acting(actor)}"
    person_acting(actor)
    with refused_as(REFUSALS), act(acts.ENTER_RULES, by=actor, about=about, reason=reason) as entry:
        read_rules(document)
        if not isinstance(document, dict):
            raise TypeError("a document that was read is an object")
        true_from = plausible(datetime.fromisoformat(str(document["true_from"])), "/true_from")
        return enter(entry, actor, Laid(RULES, document, true_from))
