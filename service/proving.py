"""What every process of the web server does before it serves: it computes the reference loads."""

import logging

from django.db import DatabaseError
from django.utils import timezone

from loads.actions.self_check import own_proof, run_self_check
from loads.queries.self_checks import filed_lately

log = logging.getLogger(__name__)


def prove_at_start() -> None:
    """This function will run the self-check and file it; the processes of one start that pass file it once.

    A database that is not there yet stops nothing: the check is overdue then, and is run before a signature.
    """
    try:
        if own_proof().passed and filed_lately(timezone.now()):
            return
        run_self_check("start")
    except DatabaseError as problem:
        log.warning("the self-check of this start could not be filed: %s", type(problem).__name__)
