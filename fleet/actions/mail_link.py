"""Mails somebody the link by which they choose a new password."""

from django.conf import settings
from django.core.mail import EmailMessage

from fleet.models import Person

_BODY = """\
An operations manager made this link for you, because your password is forgotten:

{address}

It serves once, within {hours} hours. If you did not ask for it, tell your operations manager.
"""


def mail_goes() -> bool:
    """This function will say whether a mail server is set."""
    return bool(settings.EMAIL_HOST)


def mail_link(person: Person, address: str, *, hours: int) -> bool:
    """This function will send the link to the person's own address, and say whether it could.

    False: no mail server is set, the person has no address, or the server did not take it.
    """
    if not mail_goes() or not person.mail:
        return False
    message = EmailMessage(
        subject="Choose a new password", body=_BODY.format(address=address, hours=hours), to=[person.mail]
    )
    try:
        message.send()
    except OSError:  # smtplib's own errors are of this kind, too
        return False
    return True
