"""What a signer is shown and signs: made from what is stored, in the words of `loads.statement`."""

from collections.abc import Mapping
from datetime import datetime

from django.utils import timezone

from fleet.queries.provisions import provisions_at, used_provisions
from loads import lifecycle
from loads.models import Load
from loads.queries.computation import versions_of
from loads.queries.current import Current
from loads.queries.weighing_due import asks_for_loading_signature
from loads.statement import signing_text, statement

# Stands for the signer in the words that are kept; the name is kept apart, where it can be destroyed.
SIGNER = "The undersigned"
MEANINGS = ("prepared", "loaded", "accepted")


def statement_of(current: Current, declared: Mapping[str, object]) -> dict[str, object]:
    """This function will return the statement made again from what is stored: its digest must be the kept
    one.
    """
    used = current.assessment
    versions = versions_of(used.loading_basis, used.empty_weight, used_provisions(used.provisions))
    return statement(declared, versions, used.engine, current.result())


def words_to_sign(current: Current, declared: Mapping[str, object], meaning: str) -> str:
    """This function will return exactly what is signed with that meaning, without the name of the signer."""
    return signing_text(
        statement_of(current, declared),
        name=SIGNER,
        capacity=capacity_of(current.state, meaning),
        meaning=meaning,
    )


def signatures_due(current: Current, declared: Mapping[str, object]) -> dict[str, str]:
    """This function will return what may be signed next, by meaning: the words; empty unless the verdict is
    within.
    """
    if current.assessment.verdict != "within":
        return {}
    # What is signed already is not due: a last-minute change is signed in its own step.
    ways = set(lifecycle.ways_out(current.state)) - {current.state}
    if current.state == "prepared":
        ways -= {"accepted" if loading_signature_asked(current.load, timezone.now()) else "loaded"}
    due = (meaning for meaning in MEANINGS if meaning in ways)
    return {meaning: words_to_sign(current, declared, meaning) for meaning in due}


def loading_signature_asked(load: Load, known: datetime) -> bool:
    """This function will say whether the rules in force at a load's departure, as known at `known`, ask the
    loading supervisor to sign before the pilot does.
    """
    rules = provisions_at(load.operator_id, None, load.departure, known).rules
    return asks_for_loading_signature(rules, load)


def capacity_of(state: str, meaning: str) -> str:
    """This function will return in what capacity a load of that state is signed with that meaning."""
    return lifecycle.step(state, meaning).signed_by or ""
