"""Remarks on a rejected load: what is done about it, and who has it from now on."""

import secrets
from collections.abc import Mapping
from dataclasses import dataclass
from uuid import UUID

from fleet.actions.constraint_refusals import refused_as
from fleet.models import Person
from loads.actions.keeping import SALT_BYTES
from loads.acts import REMARK_REJECT
from loads.balance.fields import fault_of_text
from loads.models import Remark
from loads.queries.current import load_of
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid, NotAllowed, StepRefused

LONGEST_REMARK = 500


@dataclass(frozen=True, slots=True)
class NewRemark:
    """What is said, and the login of who has the reject from now on; "" leaves it with whoever has it."""

    words: str
    holder: str = ""


def read_remark(document: Mapping[str, object]) -> NewRemark:
    """This function will return the remark in a document `{"words": ..., "holder": login}`; raises Invalid
    with all faults.
    """
    faults = [
        Fault(f"/{name[:40]}", "unknown-field", "not a field here; remove or correct it")
        for name in document
        if name not in {"words", "holder"}
    ]
    words, holder = document.get("words"), document.get("holder", "")
    if words is None:
        faults.append(Fault("/words", "missing", "say something about the reject"))
    elif not isinstance(words, str):
        faults.append(Fault("/words", "text-form", "a text is needed here; write it in quotes"))
    elif fault := fault_of_text(words, LONGEST_REMARK):
        faults.append(Fault("/words", *fault))
    if not isinstance(holder, str) or (holder and fault_of_text(holder, 60)):
        faults.append(Fault("/holder", "unknown-person", "write the login of a person, or leave it out"))
    if faults:
        raise Invalid(*faults)
    return NewRemark(str(words), str(holder))


def remark_reject(load: UUID, remark: NewRemark, *, by: Actor) -> Remark:
    """This function will add a remark to a load that is outside or unresolved, whatever became of it since.

    Raises NotKnown, StepRefused for a load that is within, Invalid for a holder who is nobody here,
    NotAllowed for what is no person's act.
    """
    if by.person is None:
        raise NotAllowed(
            "person-needed", "A remark is a person's.", next_step="Sign in, or use your own token."
        )
    with (
        refused_as({"remark_number_is_taken_once": _taken}),
        act(REMARK_REJECT, by=by, about=f"load:{load}") as entry,
    ):
        current = load_of(entry.chain, load)
        if current.assessment.verdict == "within":
            raise StepRefused(
                "not-a-reject",
                "This load is within every limit, so it is not on the rejects desk.",
                next_step="Look at the load; what is to be said about it belongs elsewhere.",
            )
        last = Remark.objects.filter(load=current.load).order_by("-number").first()
        return Remark.objects.create(
            operator_id=entry.chain,
            load=current.load,
            number=last.number + 1 if last else 1,
            person_id=by.person,
            holder=_holder(entry.chain, remark.holder),
            words=remark.words,
            salt=secrets.token_bytes(SALT_BYTES),
            at=entry.at,
        )


def _holder(operator: str, login: str) -> Person | None:
    if not login:
        return None
    found = Person.objects.filter(operator_id=operator, login=login.lower(), is_active=True).first()
    if found is None:
        raise Invalid(
            Fault("/holder", "unknown-person", "nobody here has this login; correct it, or leave it out")
        )
    return found


def _taken() -> StepRefused:
    return StepRefused(
        "remark-taken",
        "Somebody else remarked on this load at the same moment.",
        next_step="Read what was said, and send yours again.",
    )
