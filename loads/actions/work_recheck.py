"""Doing the work of a recheck, part by part: each safe to run twice, by as many workers as there are.

A part and what came of it are written in one transaction, under a lock on the part's row: whoever is killed
leaves the part as it was, and another takes it.
"""

from collections import Counter
from hashlib import sha256
from typing import Any, Final, Literal
from uuid import UUID

from django.db import connection, transaction
from django.db.models import F, Func, IntegerField, Sum
from django.db.models.functions import Now

from fleet.actions.constraint_refusals import refused_as
from loads.actions.self_check import refuse_unproven
from loads.acts import FINISH_RECHECK
from loads.duties import service_at_work
from loads.lifecycle import GONE
from loads.models import Recheck, RecheckedLoad, RecheckPart, RecheckResult
from loads.queries.rechecks import COUNTS
from loads.queries.recompute import Outcome, recompute
from records.act import act
from records.canonical import canonical
from records.refusal import StepRefused

Worked = Literal["more", "busy", "finished"]
LOADS_A_PART: Final = 4000
_PLANNING: Final = 4203  # the class of advisory locks under which a recheck is parted
# What departs first is wanted first: loads to come by departure, then past ones, the latest first.
_PARTED: Final = """
INSERT INTO loads_recheckpart
    (recheck_id, number, loads, same, changed, not_computed, other_fit, gone, exactly)
SELECT %(recheck)s, part, array_agg(load_id ORDER BY turn), 0, 0, 0, 0, 0, 0 FROM (
    SELECT load_id, turn, (turn - 1) / %(size)s AS part FROM (
        SELECT load_id, row_number() OVER (ORDER BY departure < %(asked)s,
            CASE WHEN departure >= %(asked)s THEN departure END, departure DESC, load_id) AS turn
        FROM loads_present
        WHERE operator_id = %(operator)s AND (%(aircraft)s::uuid IS NULL OR aircraft_id = %(aircraft)s)
          AND (%(since)s::timestamptz IS NULL OR departure >= %(since)s)
          AND (%(until)s::timestamptz IS NULL OR departure < %(until)s) AND state <> ALL (%(gone)s)
    ) in_order) parted GROUP BY part
"""
_FLAGGED: Final = """
INSERT INTO loads_loadflag
    (id, operator_id, load_id, recheck_id, assessment_id, now, "limit", excess, flagged_at)
SELECT uuidv7(), %(operator)s, load_id, recheck_id, assessment_id, now, "limit", excess, %(at)s
FROM loads_recheckedload
WHERE recheck_id = %(recheck)s AND verdict = 'within' AND now IN ('outside', 'unresolved')
ORDER BY part, id
"""
# A recheck is filed once, whichever of its rows is written first.
_FILED_ONCE: Final = ("loads_recheckresult_pkey", "load_is_flagged_once_a_recheck")


def work_recheck(recheck: UUID) -> Worked:
    """This function will do one part of a recheck that nobody else is doing, and finish the recheck when
    there is none left. Raises StepRefused when the computer did not prove itself.
    """
    refuse_unproven(Recheck.objects.values_list("operator_id", flat=True).get(id=recheck))
    asked = Recheck.objects.select_related("standard_weights").get(id=recheck)
    if RecheckResult.objects.filter(recheck=asked).exists():
        return "finished"
    _plan(asked)
    if _one_part(asked):
        return "more"
    if asked.parts.filter(done_at__isnull=True).exists():
        return "busy"
    _finish(asked)
    return "finished"


def _plan(recheck: Recheck) -> None:
    """Part the loads once: whoever comes second finds it done."""
    if recheck.parts.exists():
        return
    with transaction.atomic(), connection.cursor() as cursor:
        cursor.execute("SELECT pg_advisory_xact_lock(hashtextextended(%s, %s))", [str(recheck.id), _PLANNING])
        if recheck.parts.exists():
            return
        values: dict[str, Any] = {
            "recheck": recheck.id,
            "size": LOADS_A_PART,
            "asked": recheck.asked_at,
            "operator": recheck.operator_id,
            "aircraft": recheck.aircraft_id,
            "since": recheck.since,
            "until": recheck.until,
            "gone": list(GONE),
        }
        cursor.execute(_PARTED, values)


def _one_part(recheck: Recheck) -> bool:
    """Do the first part that is neither done nor held by another; return whether there was one."""
    with transaction.atomic():
        part = (
            RecheckPart.objects.select_for_update(skip_locked=True)
            .filter(recheck=recheck, done_at__isnull=True)
            .annotate(length=Func(F("loads"), function="cardinality", output_field=IntegerField()))
            .defer("loads")
            .order_by("number")
            .first()
        )
        if part is None:
            return False
        found = recompute(recheck, part.pk)
        counts: Counter[str] = Counter(same=found.same_in_bulk)
        rows: list[RecheckedLoad] = []
        for one in found.exactly:
            kind = _kind(one)
            counts.update((kind, "exactly"))
            if kind in {"changed", "not_computed"}:
                rows.append(_row(recheck, part, one))
        RecheckedLoad.objects.bulk_create(rows, batch_size=500)
        # Replaced or withdrawn since the loads were parted: such a load never leaves on this declaration.
        counts["gone"] = part.length - sum(counts[name] for name in COUNTS)
        RecheckPart.objects.filter(pk=part.pk).update(
            done_at=Now(), exactly=counts["exactly"], **{name: counts[name] for name in COUNTS}
        )
    return True


def _kind(one: Outcome) -> str:
    match one.now:
        case "other fit":
            return "other_fit"
        case "not computed":
            return "not_computed"
        case _:
            return "same" if one.now == one.stored.verdict else "changed"


def _row(recheck: Recheck, part: RecheckPart, one: Outcome) -> RecheckedLoad:
    return RecheckedLoad(
        recheck=recheck,
        part=part.number,
        load_id=one.stored.load,
        assessment_id=one.stored.assessment,
        verdict=one.stored.verdict,
        now=one.now,
        code=one.code[:120],
        limit=one.limit,
        excess=one.excess,
    )


def _finish(recheck: Recheck) -> None:
    """File what came of it and flag the flights a later figure puts outside, in one act."""
    digest = table_digest(recheck)
    sums = recheck.parts.aggregate(**{name: Sum(name, default=0) for name in COUNTS})
    about = f"aircraft:{recheck.aircraft_id}" if recheck.aircraft_id else f"operator:{recheck.operator_id}"
    worker = service_at_work(recheck.operator_id, recheck.act)
    try:
        with (
            refused_as(dict.fromkeys(_FILED_ONCE, _done_already)),
            act(FINISH_RECHECK, by=worker, about=about, reason=recheck.reason) as entry,
        ):
            with connection.cursor() as cursor:
                cursor.execute(_FLAGGED, {"operator": entry.chain, "recheck": recheck.id, "at": entry.at})
                flagged = cursor.rowcount
            RecheckResult.objects.create(
                recheck=recheck,
                operator_id=entry.chain,
                loads=sum(sums.values()),
                flagged=flagged,
                table_digest=digest,
                finished_at=entry.at,
                act=entry.id,
                **sums,
            )
    except StepRefused:  # another worker finished it at the same moment
        return


def table_digest(recheck: Recheck) -> str:
    """This function will return the SHA-256 of the table of a recheck: each row canonical, in its order, a
    line each.
    """
    rows = recheck.rows.order_by("part", "id").values_list(
        "load_id", "verdict", "now", "code", "limit", "excess"
    )
    found = sha256()
    for load, *words in rows.iterator(chunk_size=1000):
        found.update(canonical([str(load), *words]) + b"\n")
    return found.hexdigest()


def _done_already() -> StepRefused:
    return StepRefused("recheck-finished", "Another worker finished this recheck.")
