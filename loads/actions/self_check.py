"""Running the self-check, filing what came out, and stopping signatures when it failed."""

import logging
from functools import cache
from typing import Final, Literal

from django.utils import timezone

from loads.acts import RUN_SELF_CHECK
from loads.models import SelfCheck
from loads.queries.self_checks import standing_of
from loads.selfcheck.proving import Proof, prove
from records.act import act
from records.actor import Actor
from records.canonical import canonical
from records.refusal import StepRefused

log = logging.getLogger(__name__)

Cause = Literal["start", "daily", "asked", "overdue"]
_BY_ITSELF: Final = Actor(
    operator=None,
    kind="service",
    key="service:self-check",
    name="",
    capacity="the service itself",
    may=frozenset({RUN_SELF_CHECK.name}),
)


@cache
def own_proof() -> Proof:
    """This function will return what this process found when it last computed the reference loads."""
    return prove()


def run_self_check(cause: Cause, *, by: Actor = _BY_ITSELF) -> SelfCheck:
    """This function will compute the reference loads, file what came out, passed or not, and return it.

    Raises NotAllowed.
    """
    own_proof.cache_clear()
    proof = own_proof()
    with act(RUN_SELF_CHECK, by=by, about=f"engine:{proof.engine}") as entry:
        check = SelfCheck.objects.create(
            chain=entry.chain,
            cause=cause,
            engine=proof.engine,
            references=proof.references,
            passed=proof.passed,
            document=canonical(proof.as_document()).decode(),
            checked_at=entry.at,
            act=entry.id,
        )
    if not proof.passed:
        wrong = ", ".join(one.reference.id for one in proof.loads if not one.right)
        log.error("the self-check failed, nothing can be signed: %s", wrong or "no reference load")
    return check


def check_when_overdue(operator: str) -> None:
    """This function will run the self-check there and then when the last one is overdue.

    Ask it before the act that signs: whatever comes out must stay filed although the signature is refused.
    """
    stands = standing_of(operator, timezone.now())
    if stands.overdue and not stands.failed:
        log.warning("the self-check is overdue and is run now")
        run_self_check("overdue")


def refuse_unproven(operator: str) -> None:
    """This function will raise StepRefused when the last self-check failed, or this very process computes the
    reference loads wrong.
    """
    if standing_of(operator, timezone.now()).failed or not own_proof().passed:
        raise StepRefused(
            "self-check-failed",
            "The computer did not give the published answers of its reference loads, so nothing is signed.",
            next_step="Work the load by the flight manual, tell whoever keeps the program, and run the "
            "self-check again once it is mended (the page Self-check, or manage.py selfcheck).",
        )
