"""The mail about a stale load, to its pilot in command and to operations. It names no person."""

from datetime import UTC
from uuid import UUID

from django.conf import settings
from django.core.mail import EmailMessage

from loads.actions.tell_stale import mail_addresses
from loads.models import StaleNotice

_BODY = """\
Load {reference} leg {leg} of {registration}, {origin} to {destination}, planned departure {departure}
({utc} UTC), was accepted, and since then its {changed} changed. The accepted figures no longer rest on
what is in force.

The pilot in command must know. Before departure the load is revised, prepared and accepted anew.

The load: /loads/{load}
"""


def mail_stale_notice(notice: UUID) -> int:
    """This function will mail a notice to pilot and operations, as their addresses are now; returns how
    many.

    A worker that ends between sending and noting it sends again, under the same Message-ID.
    """
    row = StaleNotice.objects.select_related("load__aircraft", "load__pilot").get(id=notice)
    addresses = mail_addresses(row.load)
    if not addresses:
        return 0
    load = row.load
    message = EmailMessage(
        subject=f"Stale before departure: {load.aircraft.registration} {load.reference} leg {load.leg}",
        body=_BODY.format(
            reference=load.reference,
            leg=load.leg,
            registration=load.aircraft.registration,
            origin=load.origin,
            destination=load.destination,
            departure=load.departure_text,
            utc=f"{load.departure.astimezone(UTC):%Y-%m-%d %H:%M}",
            changed=row.changed.replace(", ", " and "),
            load=load.id,
        ),
        to=list(addresses),
        headers={"Message-ID": f"<stale-{row.id}@{settings.DEFAULT_FROM_EMAIL.rpartition('@')[2]}>"},
    )
    message.send()
    return len(addresses)
