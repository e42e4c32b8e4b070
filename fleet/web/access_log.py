"""The page of the log of sign-ins: who signed in, who failed to, which tokens were used."""

from collections.abc import Iterable
from typing import Final

from django.http import HttpRequest, HttpResponse
from django.shortcuts import render
from django.views.decorators.http import require_safe

from fleet.models import Person, Token
from fleet.web.asking import local, whole_or_words, zone_of
from records.actor import refuse_without_leave
from records.acts import READ_ACCESS_LOG
from records.models import Access
from records.queries import events_of
from records.web.asking import actor_of, operator_of, signed_in

WORDS: Final = {
    "sign-in": "signed in",
    "sign-in-failed": "failed to sign in",
    "sign-out": "signed out",
    "password-wrong": "gave a wrong password",
    "locked-out": "was refused: locked out",
    "token-used": "was used",
    "token-refused": "was refused",
    "more-not-listed": "did more of this than is listed",
}
_ROWS: Final = 100


@require_safe
@signed_in
def access_log(request: HttpRequest) -> HttpResponse:
    """This function will show a page of the log, the newest first."""
    refuse_without_leave(actor_of(request), READ_ACCESS_LOG)
    asked = whole_or_words(request.GET.get("before", ""))
    before = asked if isinstance(asked, int) and asked > 0 else None
    found = events_of(operator_of(request), before=before, most=_ROWS + 1)
    shown, zone, names = found[:_ROWS], zone_of(request), _names(operator_of(request), found)
    context = {
        "events": [
            {
                "number": one.number,
                "at": local(one.at, zone),
                "who": names.get(one.key, one.key),
                "key": one.key,
                "what": WORDS[one.what],
                "origin": one.origin[:8],
                "request": one.request,
            }
            for one in shown
        ],
        "older": shown[-1].number if len(found) > _ROWS else None,
    }
    return render(request, "fleet/access_log.html", context)


def _names(operator: str, events: Iterable[Access]) -> dict[str, str]:
    keys = {one.key for one in events}
    numbers = {kind: [int(key.split(":")[1]) for key in keys if key.startswith(kind)] for kind in ("p", "t")}
    people = Person.objects.filter(operator=operator, pk__in=numbers["p"])
    tokens = Token.objects.filter(operator=operator, pk__in=numbers["t"])
    return {f"person:{one.pk}": one.name for one in people} | {
        f"token:{one.pk}": f"token “{one.label}”" for one in tokens
    }
