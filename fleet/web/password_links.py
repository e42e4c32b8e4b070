"""The way back for somebody who forgot their password: a link that an operations manager makes."""

from django.conf import settings
from django.http import HttpRequest, HttpResponse
from django.shortcuts import resolve_url
from django.views.decorators.http import require_POST

from fleet.actions.let_choose_password import let_choose_password
from fleet.actions.mail_link import mail_link
from fleet.duties import READ_PEOPLE
from fleet.people_reading import read_reason
from fleet.queries.people import person_of
from fleet.web.asking import without_empty
from fleet.web.people import person_page
from records.actor import refuse_without_leave
from records.refusal import Refused
from records.web.asking import actor_of, operator_of, signed_in


@require_POST
@signed_in
def make_link(request: HttpRequest, person: int) -> HttpResponse:
    """This function will make the link for the reason typed, and mail it, or else show it this once."""
    refuse_without_leave(actor_of(request), READ_PEOPLE)
    whose = person_of(operator_of(request), person)
    try:
        reason = read_reason(without_empty({"reason": request.POST.get("reason", "")}))
        link = let_choose_password(actor_of(request), whose, reason=reason)
    except Refused as refusal:
        return person_page(request, person, refusal)
    address = request.build_absolute_uri(resolve_url("new-password", link.person, link.code))
    hours = settings.PASSWORD_RESET_TIMEOUT // 3600
    mailed = mail_link(whose, address, hours=hours)
    shown = {"mailed_to": whose.mail if mailed else "", "address": "" if mailed else address, "hours": hours}
    return person_page(request, person, link=shown)
