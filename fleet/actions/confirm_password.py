"""Asking for the password again before something is signed. Failures count as failed sign-ins do."""

import math
from typing import Final

from axes.handlers.proxy import AxesProxyHandler
from axes.helpers import get_cool_off
from axes.models import AccessAttempt
from django.contrib.auth import authenticate
from django.db import transaction
from django.db.models import Max
from django.http import HttpRequest
from django.utils import timezone

from fleet.actions.noting import note_person
from fleet.models import Person
from records.refusal import Fault, Invalid, LockedOut

POINTER: Final = "/password"
LONGEST: Final = 1000


def confirm_password(
    request: HttpRequest, person: Person, password: object, *, pointer: str = POINTER
) -> None:
    """This function will do nothing when this is the person's password.

    Raises Invalid at `pointer` when it is missing or wrong, LockedOut after repeated failures; both are
    noted in the log of sign-ins. Call it before any transaction: a failure must stay counted when the
    signing is undone, so inside one it raises RuntimeError.
    """
    if not isinstance(password, str) or not password or len(password) > LONGEST:
        words = "type your password again to sign" if pointer == POINTER else "type the password you have"
        raise Invalid(Fault(pointer, "password-missing", words))
    plain = getattr(request, "_request", request)  # the API's request wraps the one the counting writes to
    _refuse_locked_out(plain, person)
    with transaction.atomic(durable=True):
        found = authenticate(plain, username=person.login, password=password)
        if found is not None and found.pk == person.pk:
            AxesProxyHandler.reset_attempts(username=person.login)
            return
    note_person(plain, "password-wrong", person)
    _refuse_locked_out(plain, person)
    raise Invalid(
        Fault(pointer, "password-wrong", "this is not the password of the person who is signed in"),
        next_step="Type it again; after repeated failures you have to wait.",
    )


def refuse_locked_out(request: HttpRequest, login: str) -> None:
    """This function will do nothing while the login may try; raises LockedOut with the wait in minutes
    and seconds.
    """
    if AxesProxyHandler.is_allowed(request, {"username": login}):
        return
    last = AccessAttempt.objects.filter(username=login).aggregate(last=Max("attempt_time"))["last"]
    wait = 60
    if last is not None and (cool_off := get_cool_off(request)) is not None:
        wait = max(1, math.ceil((last + cool_off - timezone.now()).total_seconds()))
    raise LockedOut(
        "locked-out",
        f"Too many wrong passwords. Wait {wait // 60} min {wait % 60} s.",
        wait_seconds=wait,
        next_step="Wait as stated; the password itself stays as it is.",
    )


def _refuse_locked_out(request: HttpRequest, person: Person) -> None:
    try:
        refuse_locked_out(request, person.login)
    except LockedOut:
        note_person(request, "locked-out", person)
        raise
