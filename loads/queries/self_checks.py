"""Whether the computer proved itself: the last self-check, and whether another is due."""

from dataclasses import dataclass
from datetime import datetime, timedelta
from typing import Final

from fleet.queries.provisions import provisions_at
from fleet.rules import Interval
from fleet.rules_reading import rules_from_text
from loads.balance.engine import ENGINE_VERSION
from loads.models import SelfCheck
from loads.selfcheck.interval import USUAL, interval_in, is_overdue
from loads.selfcheck.references import reference_set
from records.actor import HOUSE

MOST_SHOWN: Final = 30
# The processes of one start come up within this time.
_ONE_START: Final = timedelta(minutes=1)


@dataclass(frozen=True, slots=True)
class Standing:
    """The last self-check of this engine with this set of references, None without one, and whether it is
    overdue by the `interval` of the operator's rules. `failed`: the last one of any engine failed.
    """

    last: SelfCheck | None
    overdue: bool
    failed: bool
    interval: Interval | None


def standing_of(operator: str, now: datetime) -> Standing:
    """This function will return how the self-check stands for an operator at `now`.

    Those the service ran by itself and those the operator's own people asked for count alike.
    """
    mine = SelfCheck.objects.filter(chain__in={operator, HOUSE}).order_by("-checked_at", "-id")
    newest = mine.only("passed").first()
    last = mine.filter(engine=ENGINE_VERSION, references=reference_set().digest).defer("document").first()
    held = provisions_at(operator, None, now, now).rules
    interval = interval_in(rules_from_text(held.document) if held is not None else None, now)
    overdue = last is None or is_overdue(last.checked_at, now, interval)
    return Standing(last, overdue, newest is not None and not newest.passed, interval)


def last_checks(operator: str, most: int = MOST_SHOWN) -> tuple[SelfCheck, ...]:
    """This function will return the self-checks that count for an operator, the newest first."""
    rows = SelfCheck.objects.filter(chain__in={operator, HOUSE})
    return tuple(rows.order_by("-checked_at", "-id")[:most])


def filed_lately(now: datetime) -> bool:
    """This function will say whether another process of this start has filed a passed self-check."""
    rows = SelfCheck.objects.filter(chain=HOUSE, cause="start", checked_at__gte=now - _ONE_START)
    newest = rows.filter(engine=ENGINE_VERSION, references=reference_set().digest).order_by("-checked_at")
    return bool(newest.values_list("passed", flat=True).first())


def last_word(now: datetime) -> str:
    """This function will return what a monitor is told: "ok", "overdue", or "failed" when the newest
    self-check of anybody failed.
    """
    newest = SelfCheck.objects.order_by("-checked_at", "-id").only("passed", "checked_at").first()
    if newest is None:
        return "overdue"
    if not newest.passed:
        return "failed"
    return "overdue" if is_overdue(newest.checked_at, now, USUAL) else "ok"
