"""The page on which an accepted load is changed at the last minute, and the form for notes after flight."""

from collections.abc import Mapping
from typing import Any, Final
from uuid import UUID

from django.http import HttpRequest, HttpResponse, HttpResponseRedirect
from django.shortcuts import render, resolve_url
from django.views.decorators.debug import sensitive_post_parameters
from django.views.decorators.http import require_http_methods, require_POST

from fleet.actions.confirm_password import confirm_password
from fleet.models import Person
from fleet.queries.figures import basis_of
from loads.actions.change_late import change_late
from loads.actions.self_check import check_when_overdue
from loads.actions.signing import Signing, refuse_unless_signer
from loads.actions.write_note import write_note
from loads.acts import CHANGE_LATE
from loads.balance.late_change import said
from loads.balance.late_reading import HOWS_AT_THE_DOOR, KINDS_AT_THE_DOOR
from loads.manifest.gathering import paper_of
from loads.queries.current import Current, load_of
from loads.queries.declaration import declared_now
from loads.queries.late_change import bound_at, changes_of, moved_by, propose, words_to_sign_late
from loads.queries.overtaken import database_time
from loads.web.asking import typed_in
from loads.web.load import load_answer
from loads.web.shown import stops, verdict_words
from loads.web.wording import words_at
from records.refusal import NotSignedIn, Refused
from records.web.asking import actor_of, operator_of, signed_in

ROWS: Final = 5
CHANGES: Final = (
    ("", "nothing"),
    ("passenger-on", "passenger on"),
    ("passenger-off", "passenger off"),
    ("item-on", "item on"),
    ("item-off", "item off"),
    ("fuel-on", "fuel up"),
    ("fuel-off", "fuel down"),
)
UNITS: Final = ("lb", "kg", "US gal", "l", "imp gal")
# By kind of change: what each input of a row stands for.
_WHERE: Final = {"passenger": "seat", "item": "place", "fuel": "tank"}
_WHO: Final = {"passenger": "name", "item": "what", "fuel": ""}
_AMOUNT: Final = {"passenger": "weight", "item": "weight", "fuel": "quantity"}


@sensitive_post_parameters("password")
@require_http_methods(["GET", "HEAD", "POST"])
@signed_in
def change(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will ask for a last-minute change, show what comes out, and have the pilot accept it."""
    current = load_of(operator_of(request), load)
    if request.method != "POST":
        return _page(request, current, {"step": str(current.step.number)})
    typed = typed_in(request)
    password = typed.pop("password", "")
    try:
        document = document_of(typed)
        if typed.get("do") != "accept":
            return _page(request, current, typed, shown=_computed(request, current, document))
        _accept(request, load, typed, document, password)
    except Refused as refusal:
        return _page(request, current, typed, refusal=refusal)
    return HttpResponseRedirect(resolve_url("load", load))


def _accept(
    request: HttpRequest, load: UUID, typed: Mapping[str, str], document: dict[str, Any], password: str
) -> None:
    actor = actor_of(request)
    refuse_unless_signer(CHANGE_LATE, actor)
    if not isinstance(request.user, Person):
        raise NotSignedIn("not-signed-in", "Only a person signs.")
    confirm_password(request, request.user, password)
    check_when_overdue(actor.chain)
    signing = Signing(typed.get("digest", ""), str(request.META.get("REMOTE_ADDR", "")))
    change_late(load, document, signing, seen=typed.get("step", ""), by=actor)


@require_POST
@signed_in
def note(request: HttpRequest, load: UUID) -> HttpResponse:
    """This function will write the note typed on a departed load."""
    try:
        write_note(load, request.POST.get("text", "").strip(), by=actor_of(request))
    except Refused as refusal:
        return load_answer(request, load, refusal, "note")
    return HttpResponseRedirect(resolve_url("load", load))


def document_of(typed: Mapping[str, str]) -> dict[str, Any]:
    """This function will return the change that was typed; rows that say nothing are left out."""
    lines = []
    for row in range(ROWS):
        given = {part: typed.get(f"{part}:{row}", "").strip() for part in _PARTS}
        kind, _, _ = given["change"].partition("-")
        if kind not in _WHERE:
            continue
        line: dict[str, Any] = {"change": given["change"], _WHERE[kind]: given["where"]}
        on = given["change"].endswith("-on")
        if kind == "item" or (kind == "passenger" and on):
            line[_WHO[kind]] = given["who"]
        if given["amount"] and (on or kind != "passenger"):
            line[_AMOUNT[kind]] = {"value": given["amount"], "unit": given["unit"]}
        if on and kind != "fuel":
            line["how"] = given["how"]
        if on and kind == "item":
            line["kind"] = given["kind"]
        lines.append(line)
    persons = typed.get("persons_on_board", "").strip()
    counted = int(persons) if persons.isascii() and persons.isdigit() and len(persons) < 5 else persons  # noqa: PLR2004  # more is no count of persons
    return {"lines": lines, "persons_on_board": counted}


_PARTS: Final = ("change", "where", "who", "kind", "amount", "unit", "how")


def _computed(request: HttpRequest, current: Current, document: dict[str, Any]) -> dict[str, Any]:
    now = database_time()
    proposal = propose(current, document, now)
    result: dict[str, Any] = proposal.computation.result
    words = words_at(current.load.operator_id, now)
    within = proposal.computation.verdict == "within"
    paper = paper_of(current.load.operator_id, current.load.id)
    its_pilot = current.load.pilot_id == actor_of(request).person
    return {
        "verdict": proposal.computation.verdict,
        "verdict_words": verdict_words(proposal.computation.verdict),
        "lines": [said(line, named=True) for line in proposal.lines],
        "governing": [words.said(result["governing"][part]) for part in ("weight", "cg")],
        "stops": stops(result, words),
        "not_assessed": result["not_assessed"],
        "counted": f"{proposal.bound.said(proposal.moved)} of {proposal.bound.words()}",
        "issue": proposal.issue,
        "digest": proposal.computation.digest,
        "to_sign": words_to_sign_late(current, proposal, paper.number) if within and its_pilot else "",
    }


def _page(
    request: HttpRequest,
    current: Current,
    typed: Mapping[str, str],
    *,
    shown: dict[str, Any] | None = None,
    refusal: Refused | None = None,
) -> HttpResponse:
    load, declared = current.load, declared_now(current)
    context = {
        "load": {
            "id": load.id,
            "registration": load.aircraft.registration,
            "reference": load.reference,
            "state": current.state,
        },
        "bound": _bound(current, declared),
        "aboard": _aboard(declared),
        "rows": [_row(typed, row) for row in range(ROWS)],
        "changes": CHANGES,
        "where": _where(current),
        "kinds": KINDS_AT_THE_DOOR,
        "units": UNITS,
        "hows": HOWS_AT_THE_DOOR,
        "persons": typed.get("persons_on_board", ""),
        "step": typed.get("step", ""),
        "shown": shown,
        "refusal": refusal,
    }
    return render(request, "loads/late.html", context, status=refusal.status if refusal else 200)


def _row(typed: Mapping[str, str], row: int) -> dict[str, Any]:
    return {"row": row} | {part: typed.get(f"{part}:{row}", "") for part in _PARTS}


def _where(current: Current) -> list[tuple[str, tuple[str, ...]]]:
    """This function will return the seats, places and tanks of the load's configuration."""
    version = current.assessment.loading_basis
    if version is None:
        return []
    basis = basis_of(version)
    tanks = ("Tanks", tuple(tank.id for tank in basis.tanks))
    fitted = [one for one in basis.configurations if one.id == current.load.configuration]
    return [part for one in fitted for part in (("Seats", one.seats), ("Places", one.places))] + [tanks]


def _bound(current: Current, declared: dict[str, Any]) -> str:
    try:
        bound = bound_at(current.load.operator_id, database_time())
    except Refused:
        return ""
    moved = bound.said(moved_by(changes_of(current.load), declared))
    return f"At most {bound.words()} may change on one load, added up; {moved} changed so far."


def _aboard(declared: Mapping[str, Any]) -> list[str]:
    people = [f"{one['seat']}: {one['name']}" for one in declared["passengers"]]
    items = [
        f"{one['place']}: {one['kind']} “{one['what']}”, {one['weight']['value']} {one['weight']['unit']}"
        for one in declared["items"]
        if "weight" in one
    ]
    fuel = [
        f"{tank}: {amount['value']} {amount['unit']} of fuel"
        for tank, amount in declared["fuel"]["at_engine_start"].items()
    ]
    return [*people, *items, *fuel]
