"""The page of one load, and its manifest."""

from uuid import UUID

from django.http import HttpRequest, HttpResponse
from django.shortcuts import render
from django.utils import timezone
from django.views.decorators.http import require_safe

from loads.actions.file_manifest import manifest_bytes
from loads.queries.current import load_of
from loads.queries.declaration import declared_now
from loads.web.asking import zone_of
from loads.web.beside import beside
from loads.web.remedies import remedies_shown
from loads.web.shown import load_page
from loads.web.wording import words_at
from records.refusal import Refused
from records.web.asking import actor_of, operator_of, signed_in

ISSUES = frozenset(str(issue) for issue in range(1, 1000))


@require_safe
@signed_in
def one_load(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will show one load: verdict, limits, computation, plot, record, and what can be done
    now.
    """
    return load_answer(request, load)


def load_answer(
    request: HttpRequest, load: UUID, refusal: Refused | None = None, about: str = ""
) -> HttpResponse:
    """This function will render the page, with what was refused on top if something was; `about` names the
    form.
    """
    current = load_of(operator_of(request), load)
    context = load_page(current, zone_of(request), timezone.now(), actor_of(request))
    context |= beside(current, declared_now(current), actor_of(request))
    now = timezone.now()
    context |= remedies_shown(current, words_at(operator_of(request), now), now, actor_of(request))
    if refusal is not None:
        context["refusal"] = {
            "title": refusal.title,
            "detail": refusal.detail,
            "next_step": refusal.next_step,
            "about": about,
        }
    return render(request, "loads/load.html", context, status=refusal.status if refusal else 200)


@require_safe
@signed_in
def manifest(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will hand out the filed manifest, the last issue or the one asked for, and file it first
    if no worker has yet.
    """
    current = load_of(operator_of(request), load)
    issue = request.GET.get("issue", "")
    asked = int(issue) if issue in ISSUES else None
    body = manifest_bytes(operator_of(request), load, asked)
    name = f"manifest-{current.load.aircraft.registration}-{current.load.reference}.pdf"
    headers = {"Content-Disposition": f'inline; filename="{_plain(name)}"'}
    return HttpResponse(body, content_type="application/pdf", headers=headers)


def _plain(name: str) -> str:
    return "".join(character if character.isalnum() or character in "-._" else "-" for character in name)
