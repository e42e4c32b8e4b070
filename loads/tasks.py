"""Work done after a commit. Ids in, one call; safe to run twice and at the same time."""

from uuid import UUID

from celery import shared_task

from loads.actions.file_manifest import FILING, FILING_ISSUE
from loads.actions.file_manifest import file_issue as file_one_issue
from loads.actions.file_manifest import file_manifest as file_one
from loads.models import LateChange, Paper
from records import outbox


@shared_task(name=FILING, ignore_result=True)
def file_manifest(load: str) -> None:
    """This function will file the manifest of an accepted load. A failure is noted and tried again later."""
    try:
        file_one(Paper.objects.get(load_id=UUID(load)))
        outbox.done(FILING, load)  # also when a request had filed it before the outbox row was seen
    except Exception as problem:
        outbox.failed(FILING, load, problem)
        raise


@shared_task(name=FILING_ISSUE, ignore_result=True)
def file_issue(key: str) -> None:
    """This function will file a reissued manifest; `key` is "load/number of the last-minute change"."""
    load, _, number = key.partition("/")
    try:
        file_one_issue(LateChange.objects.get(load_id=UUID(load), number=int(number)))
        outbox.done(FILING_ISSUE, key)
    except Exception as problem:
        outbox.failed(FILING_ISSUE, key, problem)
        raise
