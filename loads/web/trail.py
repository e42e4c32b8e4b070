"""The trail in sentences, of everything or of one object, and one act with all it wrote."""

import json
from datetime import UTC
from typing import Any
from urllib.parse import urlencode
from uuid import UUID
from zoneinfo import ZoneInfo

from django.apps import apps
from django.http import HttpRequest, HttpResponse
from django.shortcuts import render
from django.urls import reverse
from django.views.decorators.http import require_safe

from loads.queries.trail_words import SENTENCES, Subject, said, subjects, who
from loads.web.asking import zone_of
from loads.web.looking import Look, begins, ends
from records.chain import entry_digest
from records.trail import Asked, Line, Written, actors_of, entry_of, read_trail
from records.web.asking import operator_of, signed_in

ROWS = 50
LONGEST_VALUE = 300


@require_safe
@signed_in
def trail(request: HttpRequest) -> HttpResponse:
    """This function will show who did what, newest first; `?about=` leaves one object, `?actor=` one
    actor.
    """
    operator, zone, look = operator_of(request), zone_of(request), Look(request)
    asked = Asked(
        about=look.word("about"),
        actor=look.word("actor"),
        kind=look.word("kind"),
        since=begins(look.day("from"), zone),
        until=ends(look.day("to"), zone),
    )
    after = _after(look)
    context: dict[str, Any] = {
        "look": look,
        "lines": [],
        "kinds": sorted(SENTENCES.items(), key=lambda pair: pair[1]),
        "actors": actors_of(operator),
        "asked": asked != Asked(),
    }
    if not look.faults:
        found = read_trail(operator, asked, after=after, most=ROWS)
        called = subjects(operator, {line.about for line in found.lines} | {asked.about} - {""})
        context["lines"] = [_line(line, called[line.about], zone) for line in found.lines]
        context["subject"] = _subject(called[asked.about]) if asked.about else None
        if found.after is not None:
            typed = {name: value for name, value in look.typed.items() if value}
            context["next"] = f"?{urlencode(typed | {'after': str(found.after)})}"
    return render(request, "loads/trail.html", context, status=422 if look.faults else 200)


@require_safe
@signed_in
def one_act(request: HttpRequest, act: UUID) -> HttpResponse:
    """This function will show one act: the rows it wrote field by field, and its entry as it was sealed."""
    operator, zone = operator_of(request), zone_of(request)
    entry = entry_of(operator, act)
    context = {
        "line": _line(entry.line, subjects(operator, {entry.line.about})[entry.line.about], zone),
        "written": [_written(one) for one in entry.written],
        "previous": entry.previous,
        "entry": entry.text,
        "fits": entry_digest(entry.text) == entry.line.digest,
    }
    return render(request, "loads/act.html", context)


def _after(look: Look) -> UUID | None:
    text = look.word("after")
    if not text:
        return None
    try:
        return UUID(text)
    except ValueError:
        look.faults["after"] = "This page does not exist; begin again with the newest acts."
        return None


def _subject(subject: Subject) -> dict[str, str]:
    address = reverse(subject.page, args=[subject.key]) if subject.page else ""
    return {"registration": subject.registration, "words": subject.words, "address": address}


def _line(line: Line, subject: Subject, zone: ZoneInfo) -> dict[str, Any]:
    return {
        "act": line.act,
        "day": line.at.astimezone(zone).date(),
        "local": line.at.astimezone(zone).strftime("%H:%M:%S"),
        "utc": line.at.astimezone(UTC).strftime("%Y-%m-%d %H:%M:%S"),
        "who": who(line),
        "capacity": line.capacity,
        "said": said(line.kind),
        "kind": line.kind,
        "about": line.about,
        "subject": _subject(subject),
        "reason": line.reason,
        "rows": line.rows,
        "position": line.position,
        "digest": line.digest,
        "request": line.request,
        "caused_by": line.caused_by,
        "actor": line.actor_key,
    }


def _written(one: Written) -> dict[str, Any]:
    return {
        "table": _called(one.table),
        "row": one.row,
        "added": one.operation == "insert",
        "fields": [
            {
                "name": name.removesuffix("_id").replace("_", " "),
                "before": _text(before),
                "after": _text(after),
            }
            for name, before, after in one.fields
        ],
    }


def _called(table: str) -> str:
    """This function will return the name of a table's rows as people say it ("empty weight")."""
    found = (model for model in apps.get_models() if model._meta.db_table == table)  # noqa: SLF001  # documented
    return next((str(model._meta.verbose_name) for model in found), table)  # noqa: SLF001  # documented


def _text(value: object) -> str:
    """This function will write a value of an image for reading; a long one is cut, and says so."""
    if value is None:
        return ""
    words = value if isinstance(value, str) else json.dumps(value, ensure_ascii=False)
    return words if len(words) <= LONGEST_VALUE else f"{words[:LONGEST_VALUE]}… ({len(words)} characters)"
