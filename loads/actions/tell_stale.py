"""Telling at once that an accepted load is stale: a notice on its page, an event, mail to those concerned.

Told once for each load and pair of versions: the row that says so is unique, and event and mail are promised
in the act that writes it. Asked after every approval, and before a manifest is filed: an acceptance that
committed just beside an approval is found by the second.
"""

from uuid import UUID

from django.conf import settings

from fleet.actions.constraint_refusals import refused_as
from fleet.events import PROVISIONS_CHANGED, VERSIONS_CHANGED
from fleet.models import Aircraft, Approval, Provision
from fleet.queries.aircraft import all_aircraft
from fleet.queries.settings import settings_at
from loads.actions.announcing import announce_stale
from loads.acts import TELL_STALE
from loads.duties import service_at_work
from loads.models import Load, StaleNotice
from loads.queries.current import load_of
from loads.queries.overtaken import accepted_loads, database_time, is_told, overtaken
from records import outbox
from records.act import act
from records.models import Outbox
from records.refusal import StepRefused

MAILING = "loads.tasks.mail_stale_notice"


def tell_after_approval(approval: UUID) -> int:
    """This function will tell of every accepted load that an approval made stale, and return how many that
    was. Run twice, it tells nothing twice.
    """
    approved = Approval.objects.select_related("aircraft").get(id=approval)
    return _tell_of(approved.operator_id, (approved.aircraft,), _cause(VERSIONS_CHANGED, str(approval)))


def tell_after_provision(key: str) -> int:
    """This function will tell of every accepted load that a table, rule, restriction or permit made stale,
    and return how many that was; `key` is that of the promised work. Run twice, it tells nothing twice.
    """
    laid = Provision.objects.select_related("aircraft").get(id=key.partition("/")[0])
    fleet = (laid.aircraft,) if laid.aircraft is not None else all_aircraft(laid.operator_id)
    return _tell_of(laid.operator_id, fleet, _cause(PROVISIONS_CHANGED, key))


def _cause(task: str, key: str) -> UUID | None:
    return Outbox.objects.filter(task=task, key=key).values_list("act", flat=True).first()


def _tell_of(operator: str, fleet: tuple[Aircraft, ...], caused_by: UUID | None) -> int:
    now = database_time()
    loads = [one for aircraft in fleet for one in accepted_loads(aircraft, now)]
    told = [tell_if_stale(operator, one.load.id, caused_by) for one in loads]
    return sum(notice is not None for notice in told)


def tell_if_stale(operator: str, load: UUID, caused_by: UUID | None) -> StaleNotice | None:
    """This function will tell that an accepted load is stale, unless it is not, or that was told before."""
    current = load_of(operator, load)
    found = overtaken(current, database_time())
    if found is None or is_told(load, found):
        return None
    try:
        with refused_as({"stale_notice_is_given_once": _nothing_to_tell}):
            return _tell(operator, load, caused_by)
    except StepRefused:  # another worker told it meanwhile, or the load moved on: the act is undone
        return None


def _tell(operator: str, load: UUID, caused_by: UUID | None) -> StaleNotice:
    with act(TELL_STALE, by=service_at_work(operator, caused_by), about=f"load:{load}") as entry:
        current = load_of(operator, load)
        found = overtaken(current, entry.at)
        if found is None:
            raise _nothing_to_tell()
        addresses = mail_addresses(current.load)
        notice = StaleNotice.objects.create(
            operator_id=entry.chain,
            load=current.load,
            assessment=current.assessment,
            loading_basis=found.loading_basis,
            empty_weight=found.empty_weight,
            provisions=found.provisions.ids(),
            changed=", ".join(found.changed),
            mail_addresses=len(addresses),
            told_at=entry.at,
            act=entry.id,
        )
        announce_stale(entry, current.load, current.assessment, found.changed)
        if addresses:
            outbox.put(entry, MAILING, str(notice.id))
        return notice


def _nothing_to_tell() -> StepRefused:
    return StepRefused("nothing-to-tell", "It was told already, or the load moved on.")


def mail_addresses(load: Load) -> tuple[str, ...]:
    """This function will return where such mail goes: the pilot in command's own address, if one is known,
    and those of operations; nothing when no mail server is set.
    """
    if not settings.EMAIL_HOST:
        return ()
    now = database_time()
    pilot = load.pilot
    own = (pilot.mail,) if pilot is not None and pilot.is_active and pilot.mail else ()
    return tuple(dict.fromkeys(own + settings_at(load.operator_id, now, now).operations_mail))
