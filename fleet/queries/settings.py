"""What an operator's settings were at one instant, as known at another."""

from dataclasses import dataclass
from datetime import datetime
from decimal import Decimal

from fleet.models import Operator, OperatorSettings


@dataclass(frozen=True, slots=True)
class Settings:
    """What holds for an operator.

    `last_minute_bound_*`: the most that may change on one load at the last minute, added up, in kg or lb and
    in persons; all None: no last-minute change is allowed. `weighing_threshold_percent`: of the landing
    weight limit; None: not set. `number` is the version (0: what was said when the operator was entered).
    """

    operator: str
    number: int
    true_from: datetime | None
    known_from: datetime | None
    last_minute_bound_weight: Decimal | None
    last_minute_bound_unit: str | None
    last_minute_bound_persons: int | None
    weighing_threshold_percent: Decimal | None
    operations_mail: tuple[str, ...]
    prepare_and_accept_by_one: bool
    estimates_may_be_signed: bool
    rule_set: str
    procedure: str
    weight_method: str


def settings_at(operator: str, at: datetime, known: datetime) -> Settings:
    """This function will return what held for the operator at `at`, as known at `known`.

    Of the versions that had begun, the one with the latest beginning; of equals the one entered last. Before
    any, what the operator's own row says. Raises Operator.DoesNotExist for a code of no operator.
    """
    begun = OperatorSettings.objects.filter(operator_id=operator, true_from__lte=at, known_from__lte=known)
    row = begun.order_by("-true_from", "-number").first()
    return _as_entered(Operator.objects.get(code=operator)) if row is None else settings_of(row)


def settings_of(row: OperatorSettings) -> Settings:
    """This function will return what one version says."""
    return Settings(
        operator=row.operator_id,
        number=row.number,
        true_from=row.true_from,
        known_from=row.known_from,
        last_minute_bound_weight=_figure(row.last_minute_weight),
        last_minute_bound_unit=row.last_minute_unit or None,
        last_minute_bound_persons=row.last_minute_persons,
        weighing_threshold_percent=_figure(row.weighing_threshold_percent),
        operations_mail=tuple(row.operations_mail),
        prepare_and_accept_by_one=row.prepare_and_accept_by_one,
        estimates_may_be_signed=row.estimates_may_be_signed,
        rule_set=row.rule_set,
        procedure=row.procedure,
        weight_method=row.weight_method,
    )


def last_number(operator: str) -> int:
    """This function will return the number of the version entered last, 0 before any."""
    newest = OperatorSettings.objects.filter(operator_id=operator).order_by("-number")
    return newest.values_list("number", flat=True).first() or 0


def settings_history(operator: str) -> tuple[OperatorSettings, ...]:
    """This function will return every version, the one entered last first."""
    rows = OperatorSettings.objects.filter(operator_id=operator).select_related("entered_by")
    return tuple(rows.order_by("-number"))


def _as_entered(row: Operator) -> Settings:
    return Settings(
        operator=row.code,
        number=0,
        true_from=None,
        known_from=None,
        last_minute_bound_weight=None,
        last_minute_bound_unit=None,
        last_minute_bound_persons=None,
        weighing_threshold_percent=None,
        operations_mail=(),
        prepare_and_accept_by_one=row.prepare_and_accept_by_one,
        estimates_may_be_signed=row.estimates_may_be_signed,
        rule_set=row.rule_set,
        procedure=row.procedure,
        weight_method=row.weight_method,
    )


def _figure(text: str) -> Decimal | None:
    return Decimal(text) if text else None
