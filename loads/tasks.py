"""Work done after a commit. Ids in, one call; safe to run twice and at the same time."""

from collections.abc import Callable
from uuid import UUID

from celery import shared_task

from fleet.events import PROVISIONS_CHANGED, VERSIONS_CHANGED
from loads.actions.file_manifest import FILING, FILING_ISSUE
from loads.actions.file_manifest import file_issue as file_one_issue
from loads.actions.file_manifest import file_manifest as file_one
from loads.actions.mail_stale import mail_stale_notice
from loads.actions.self_check import run_self_check
from loads.actions.tell_stale import MAILING, tell_after_approval, tell_after_provision
from loads.actions.work_recheck import work_recheck
from loads.models import LateChange, Paper
from loads.queries.rechecks import RECHECKING
from records import outbox


@shared_task(name=FILING, ignore_result=True)
def file_manifest(load: str) -> None:
    """This function will file the manifest of an accepted load. A failure is noted and tried again later."""
    _work(FILING, load, lambda: file_one(Paper.objects.get(load_id=UUID(load))))


@shared_task(name=FILING_ISSUE, ignore_result=True)
def file_issue(key: str) -> None:
    """This function will file a reissued manifest; `key` is "load/number of the last-minute change"."""
    load, _, number = key.partition("/")
    _work(
        FILING_ISSUE,
        key,
        lambda: file_one_issue(LateChange.objects.get(load_id=UUID(load), number=int(number))),
    )


@shared_task(name=VERSIONS_CHANGED, ignore_result=True)
def tell_of_stale_loads(approval: str) -> None:
    """This function will tell at once of the accepted loads that an approval made stale."""
    _work(VERSIONS_CHANGED, approval, lambda: tell_after_approval(UUID(approval)))


@shared_task(name=PROVISIONS_CHANGED, ignore_result=True)
def tell_of_loads_under_provisions(key: str) -> None:
    """This function will tell of the accepted loads that a table, rule, restriction or permit made stale;
    `key` is "its number/held" or "its number/ended".
    """
    _work(PROVISIONS_CHANGED, key, lambda: tell_after_provision(key))


@shared_task(name=MAILING, ignore_result=True)
def mail_stale(notice: str) -> None:
    """This function will mail one notice of a stale load."""
    _work(MAILING, notice, lambda: mail_stale_notice(UUID(notice)))


@shared_task(name="loads.tasks.self_check", ignore_result=True)
def self_check() -> None:
    """This function will have the computer prove itself, as it does every day."""
    run_self_check("daily")


@shared_task(name=RECHECKING, ignore_result=True)
def recheck(number: str) -> None:
    """This function will do one part of a recheck and have the next one done after it, behind whatever else
    is waiting: a long recheck keeps no manifest from being filed.
    """
    try:
        worked = work_recheck(UUID(number))
    except Exception as problem:
        outbox.failed(RECHECKING, number, problem)
        raise
    if worked == "more":
        outbox.wake(RECHECKING, number)
    elif worked == "finished":
        outbox.done(RECHECKING, number)


def _work(task: str, key: str, work: Callable[[], object]) -> None:
    try:
        work()
        outbox.done(task, key)  # also what a request had done before the outbox row was seen
    except Exception as problem:
        outbox.failed(task, key, problem)
        raise
