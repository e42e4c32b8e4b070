"""Exactly one effect per `Idempotency-Key`, and the same answer, byte for byte, to whoever asks again.

One durable transaction holds all of it: an advisory lock on the key, the look for an earlier answer, the
work with its acts, and the answer's bytes. A process killed between commit and reply leaves the answer for
the next try; one killed before leaves nothing. Refusals are never kept: the transaction that would have
kept them is rolled back.
"""

import json
import re
from collections.abc import Callable, Mapping
from http import HTTPStatus
from typing import Final, TypeAlias

from django.http import HttpRequest, HttpResponse
from django.utils.crypto import salted_hmac
from rest_framework.request import Request

from records.act import transaction_for_acts
from records.api.asking import actor_of
from records.api.parser import body_of
from records.api.render import rendered
from records.models.receipt import KEPT_FOR, Receipt
from records.prepared import rows
from records.refusal import Invalid, StepRefused, Unreadable
from records.sealing import opened, sealed

# Status, headers and body of an answer; the body is a document, or its bytes where they stand already.
Answer: TypeAlias = tuple[int, Mapping[str, str], Mapping[str, object] | bytes]

_KEY: Final = re.compile(r"[\x21-\x7e]{1,120}")
_PURPOSE: Final = "receipt"
_HOLD: Final = "SELECT pg_try_advisory_xact_lock(hashtextextended(%s, 0))"
_FIND: Final = (
    "SELECT id, answered_at > statement_timestamp() - %s FROM records_receipt WHERE actor = %s AND key = %s"
)
_KEEP: Final = (
    "INSERT INTO records_receipt (actor, key, request_digest, status, headers, body, answered_at) "
    "VALUES (%s, %s, %s, %s, %s, %s, statement_timestamp()) RETURNING id"
)


def once(request: Request, work: Callable[[], Answer], *, confidential: bool = False) -> HttpResponse:
    """This function will do `work` once for the request's `Idempotency-Key` and return its answer, now or
    again.

    `work` runs inside one durable transaction that its acts join; it raises a `Refused` to refuse. A
    repeated answer carries `Idempotency-Replayed: true`. The answer of a `confidential` endpoint (it shows a
    secret once) is kept encrypted. Raises Unreadable (no key, or one that is not 1 to
    120 visible ASCII characters), Invalid (the key came with another request before), StepRefused (that
    request is still being answered).
    """
    actor = actor_of(request).key
    key = _key_of(request)
    asked = _request_digest(request)
    with transaction_for_acts():
        _hold(actor, key)
        kept = _kept(actor, key)
        if kept is not None:
            return _again(kept, asked, confidential=confidential)
        status, headers, body = work()
        if status >= HTTPStatus.BAD_REQUEST:
            raise ValueError("a refusal is raised, never returned: it must not be kept")
        answer = body if isinstance(body, bytes) else rendered(body)
        body = sealed(answer, _PURPOSE) if confidential else answer
        rows(_KEEP, [actor, key, asked, int(status), json.dumps(dict(headers)), body])
    return _response(status, headers, answer)


def _key_of(request: Request) -> str:
    key = request.headers.get("Idempotency-Key", "")
    if not key:
        raise Unreadable(
            "idempotency-key-missing",
            "This request stores something and needs an Idempotency-Key header.",
            next_step="Send a fresh random key (a UUID), and the same key again when you repeat the request.",
        )
    if not _KEY.fullmatch(key):
        raise Unreadable(
            "idempotency-key-malformed",
            "An Idempotency-Key is 1 to 120 visible ASCII characters without spaces.",
        )
    return key


def _request_digest(request: HttpRequest) -> str:
    """This function will return a digest that tells this request from another one.

    Keyed, because a body may hold a password: who reads the table must not be able to try passwords against
    it.
    """
    parts = (request.method or "", request.get_full_path())
    head = "\n".join(parts).encode("utf-8", "backslashreplace") + b"\n"
    return salted_hmac("records.receipt", head + body_of(request), algorithm="sha256").hexdigest()


def _hold(actor: str, key: str) -> None:
    """This function will take the key for this transaction; raises StepRefused while another one holds it.

    An advisory lock, since there is no row to lock before the work is done, and one that does not wait:
    whoever repeats too early is told so instead of holding a connection.
    """
    ((held,),) = rows(_HOLD, [f"receipt\n{actor}\n{key}"])
    if not held:
        raise StepRefused(
            "idempotency-key-in-flight",
            "A request with this Idempotency-Key is being answered right now.",
            next_step="Wait a second and repeat the same request with the same key.",
        )


def _kept(actor: str, key: str) -> Receipt | None:
    """This function will return the answer kept under the key. One whose time is over makes room: its row
    may still stand when nobody has swept yet.
    """
    for number, fresh in rows(_FIND, [KEPT_FOR, actor, key]):
        receipt = Receipt.objects.get(id=number)
        if fresh:
            return receipt
        receipt.delete()
    return None


def _again(kept: Receipt, asked: str, *, confidential: bool) -> HttpResponse:
    if kept.request_digest != asked:
        raise Invalid(
            code="idempotency-key-reused",
            detail="This Idempotency-Key came with another request before.",
            next_step="Send a fresh key for a new request, or the same bytes for a repeated one.",
        )
    body = bytes(kept.body)  # the digest names the address, so it was kept as this endpoint keeps it
    response = _response(kept.status, kept.headers, opened(body, _PURPOSE) if confidential else body)
    response["Idempotency-Replayed"] = "true"
    return response


def _response(status: int, headers: Mapping[str, str], body: bytes) -> HttpResponse:
    return HttpResponse(body, status=status, headers=dict(headers), content_type="application/json")
