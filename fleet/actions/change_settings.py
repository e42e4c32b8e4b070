"""Changes what an operator's procedures say, as a new version from an instant on."""

import secrets
from decimal import Decimal

from fleet import acts
from fleet.actions.authorship import operator_acting, person_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.models import OperatorSettings
from fleet.queries.settings import Settings, last_number, settings_at
from fleet.settings_reading import SettingsChange
from records.act import act
from records.actor import Actor
from records.refusal import PreconditionFailed


def _moved_on() -> PreconditionFailed:
    return PreconditionFailed(
        "state-moved-on",
        "Somebody changed the settings since they were read.",
        next_step="Read them again, look at what changed, and enter the change anew.",
    )


def change_settings(actor: Actor, change: SettingsChange, *, seen: str) -> OperatorSettings:
    """This function will enter a version of the settings of the actor's operator; `seen` is the number of the
    last one when they were read.

    What the change leaves out stays as it is at its beginning. A beginning in the past is allowed: it
    alters what is held true from now on, not what was known then. Raises PreconditionFailed when another
    version was entered since, NotAllowed without the duty or for what is no person's act.
    """
    operator, person = operator_acting(actor), person_acting(actor)
    with (
        refused_as({"settings_number_is_taken_once": _moved_on}),
        act(acts.CHANGE_SETTINGS, by=actor, about=f"operator:{operator}", reason=change.reason) as entry,
    ):
        last = last_number(operator)
        if seen != str(last):
            raise _moved_on()
        begins = change.true_from or entry.at
        columns = _columns(settings_at(operator, begins, entry.at)) | dict(change.columns)
        return OperatorSettings.objects.create(
            operator_id=operator,
            number=last + 1,
            true_from=begins,
            known_from=entry.at,
            entered_by_id=person,
            reason=change.reason,
            salt=secrets.token_bytes(32),
            **columns,
        )


def _columns(now: Settings) -> dict[str, object]:
    return {
        "last_minute_weight": _typed(now.last_minute_bound_weight),
        "last_minute_unit": now.last_minute_bound_unit or "",
        "last_minute_persons": now.last_minute_bound_persons,
        "weighing_threshold_percent": _typed(now.weighing_threshold_percent),
        "operations_mail": list(now.operations_mail),
        "prepare_and_accept_by_one": now.prepare_and_accept_by_one,
        "estimates_may_be_signed": now.estimates_may_be_signed,
        "rule_set": now.rule_set,
        "procedure": now.procedure,
        "weight_method": now.weight_method,
    }


def _typed(figure: Decimal | None) -> str:
    return "" if figure is None else f"{figure:f}"
