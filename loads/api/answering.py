"""Turning what an action returns into an answer with its entity tag."""

from http import HTTPStatus

from loads.queries.answer import answer_parts
from loads.queries.current import Current
from records.actor import Actor
from records.api.asking import etag
from records.api.once import Answer
from records.api.render import rendered
from records.refusal import Fault, Invalid
from records.strict_json import JSON


def moved(current: Current, by: Actor, status: HTTPStatus = HTTPStatus.OK) -> Answer:
    """This function will return the answer to the actor who just moved this load."""
    return status, {"ETag": etag(current.step.number)}, written(current, reach=by.reach)


def created(current: Current, by: Actor) -> Answer:
    """This function will return the answer to the actor who just submitted this load, with its address."""
    status, headers, body = moved(current, by, HTTPStatus.CREATED)
    return status, {**headers, "Location": f"/api/v1/loads/{current.load.id}"}, body


def written(current: Current, *, reach: frozenset[str] | None) -> bytes:
    """This function will return the bytes of `answer_of`, with the result put in as the text that is stored:
    that is canonical, so reading it and writing it again gives the same.
    """
    before, result, after = answer_parts(current, reach=reach)
    return b",".join((rendered(before)[:-1], result[1:-1].encode(), rendered(after)[1:]))


def refuse_other_fields(document: dict[str, JSON], *known: str) -> None:
    """This function will raise Invalid for fields that are not known here."""
    faults = tuple(
        Fault(
            f"/{name.replace('~', '~0').replace('/', '~1')}",
            "unknown-field",
            f"the fields here are {', '.join(known)}",
        )
        for name in document
        if name not in known
    )
    if faults:
        raise Invalid(*faults[:20])


def text_in(document: dict[str, JSON], name: str) -> str:
    """This function will return a text of the document; raises Invalid when it is missing or no text."""
    value = document.get(name)
    if not isinstance(value, str):
        code = "text-form" if name in document else "missing"
        raise Invalid(Fault(f"/{name}", code, "a text is needed here"))
    return value
