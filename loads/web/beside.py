"""What stands beside a load on its page: doubles, last-minute changes, what was told, notes after flight."""

from collections import Counter
from collections.abc import Iterable, Sequence
from datetime import UTC
from typing import Any
from uuid import UUID

from fleet.queries.settings import settings_at
from loads import acts
from loads.actions.write_note import LONGEST_NOTE
from loads.balance.late_change import said
from loads.models import LoadFlag, Signature, StaleNotice
from loads.queries.answer import notes_of
from loads.queries.current import Current
from loads.queries.doubles import Double, doubles_of
from loads.queries.late_change import bound_of, changes_of, lines_of, moved_by
from loads.queries.overtaken import database_time
from loads.queries.rechecks import flags_of
from records.actor import Actor


def beside(current: Current, declared: dict[str, Any], actor: Actor) -> dict[str, Any]:
    """This function will return the values of these parts, and what this actor can do there now."""
    load, state = current.load, current.state
    may_change = acts.CHANGE_LATE.name in actor.may and load.pilot_id == actor.person
    return {
        "doubles": doubles_shown(doubles_of(current, reach=actor.reach)),
        "late_changes": _changes(current, declared),
        "told": [
            {"at": one.told_at.astimezone(UTC), "changed": one.changed, "mail": one.mail_addresses}
            for one in StaleNotice.objects.filter(load=load).order_by("told_at", "id")
        ],
        "flags": [flag_shown(one) for one in flags_of(load.id)],
        "notes": [
            {"at": one.written_at.astimezone(UTC), "who": one.person.name, "text": one.text}
            for one in (notes_of(load) if state == "departed" else ())
        ],
        "longest_note": LONGEST_NOTE,
        "can_change_late": state == "accepted" and may_change and _bounded(load.operator_id),
        "can_note": state == "departed" and acts.WRITE_NOTE.name in actor.may,
    }


def doubles_shown(doubles: Iterable[Double]) -> list[dict[str, Any]]:
    """This function will return what looks doubled, a line for each other load: the first sight of it whole,
    of the rest what comes before the words that name the load, with how often.
    """
    sights: dict[UUID | None, list[str]] = {}
    for one in doubles:
        sights.setdefault(one.load, []).append(one.detail)
    return [
        {"load": load, "detail": details[0], "besides": _counted(details[1:])}
        for load, details in sights.items()
    ]


def _counted(details: Sequence[str]) -> list[str]:
    counts = Counter(detail.split(":")[0] for detail in details)
    return [f"{words} ({count} of them)" if count > 1 else words for words, count in counts.items()]


def flag_shown(flag: LoadFlag) -> dict[str, Any]:
    """This function will return one flag as pages show it."""
    return {
        "at": flag.flagged_at.astimezone(UTC),
        "recheck": flag.recheck_id,
        "now": flag.now,
        "limit": flag.limit,
        "excess": flag.excess,
    }


def _bounded(operator: str) -> bool:
    now = database_time()
    return settings_at(operator, now, now).last_minute_bound_weight is not None


def _changes(current: Current, declared: dict[str, Any]) -> list[dict[str, Any]]:
    if current.assessment.number == 1:
        return []
    changes = changes_of(current.load)
    names = {one.step_id: bytes(one.name).decode() for one in Signature.objects.filter(load=current.load)}
    return [
        {
            "number": one.number,
            "issue": one.issue,
            "earlier": one.issue - 1,
            "lines": [said(line, named=True) for line in lines_of(one)],
            "at": one.changed_at.astimezone(UTC),
            "who": names[one.step_id],
            "counted": f"{bound_of(one).said(moved_by(changes[:place], declared))} "
            f"of {bound_of(one).words()}",
        }
        for place, one in enumerate(changes, 1)
    ]
