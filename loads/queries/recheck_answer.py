"""A recheck as the API answers it: plain values, in the order they are read."""

from itertools import chain

from loads.models import Recheck
from loads.queries.answer import LOAD_PATH, cautions
from loads.queries.rechecks import COLUMNS, Page, progress_of, table_rows

RECHECK_PATH = "/api/v1/rechecks/{}"
CSV_TYPE = "text/csv"
Answer = dict[str, object]


def recheck_answer(recheck: Recheck, page: Page) -> Answer:
    """This function will return how a recheck stands, with one page of its table."""
    progress = progress_of(recheck)
    path = RECHECK_PATH.format(recheck.id)
    following = f"{path}?after={page.after[0]}.{page.after[1]}" if page.after else None
    return {
        "id": recheck.id,
        "state": progress.state,
        "asked_at": recheck.asked_at,
        "asked_by": recheck.asked_by_id,
        "aircraft": recheck.aircraft.registration if recheck.aircraft else None,
        "empty_weight": recheck.empty_weight_id,
        "loading_basis": recheck.loading_basis_id,
        "standard_weights": recheck.standard_weights_id,
        "from": recheck.since,
        "to": recheck.until,
        "reason": recheck.reason,
        "engine": recheck.engine,
        "progress": {"loads": progress.loads, "done": progress.done},
        "counts": {**progress.counts, "flagged": progress.flagged},
        "problem": progress.problem,
        "flights": [
            {
                "load": one.load_id,
                "href": LOAD_PATH.format(one.load_id),
                "aircraft": one.load.aircraft.registration,
                "reference": one.load.reference,
                "leg": one.load.leg,
                "departure": one.load.departure_text,
                "signed_verdict": one.verdict,
                "verdict_now": one.now,
                "code": one.code,
                "limit": one.limit,
                "excess": one.excess,
            }
            for one in page.rows
        ],
        "next": following,
        "csv": f"{path}.csv",
        "cautions": cautions(invented=recheck.operator.invented),
    }


def csv_of(recheck: Recheck) -> "chain[tuple[str, ...]]":
    """This function will return the whole table with its head, row by row."""
    return chain((COLUMNS,), table_rows(recheck))
