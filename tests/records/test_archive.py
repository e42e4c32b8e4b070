"""The archive: what is filed is handed out only while its digest fits, and never changes."""

import hashlib

import pytest
from django.db import IntegrityError, connections, transaction

from records.act import act
from records.archive import DocumentAltered, document_of, file_document, hand_out
from records.guard.refusals import refusals_named
from records.kind import Kind
from records.models import Document, Seal
from records.refusal import NotKnown
from tests.cast import Cast, actor, cast, strangers

pytestmark = pytest.mark.django_db
KIND = Kind("submit-load", "submitted a load")
BODY = b"%PDF- L. Osei, 176 lb"


def _filed(people=None) -> Document:
    people = people or cast()
    with act(KIND, by=actor(people.preparer), about="load:x") as entry:
        return file_document(
            entry, BODY, media_type="application/pdf", about="load:x", title="a paper", renderer="press 1"
        )


def test_a_document_is_kept_under_the_digest_of_its_bytes() -> None:
    document = _filed()

    kept = document_of("kestrel-test", hashlib.sha256(BODY).hexdigest())

    assert kept == document
    assert hand_out(kept) == BODY
    assert (kept.size, len(bytes(kept.salt))) == (len(BODY), 16)


def test_the_trail_holds_the_digest_and_no_byte_of_the_body() -> None:
    document = _filed()

    entry = Seal.objects.get(act__kind=KIND.name).entry

    assert document.digest in entry
    assert "Osei" not in entry
    assert BODY.hex() not in entry


def test_another_operators_document_is_not_known() -> None:
    document = _filed()
    others = strangers()

    with pytest.raises(NotKnown):
        document_of(others.operator.code, document.digest)


def test_altered_bytes_are_withheld() -> None:
    document = _filed()
    document.body = BODY + b" "

    with pytest.raises(DocumentAltered) as refused:
        hand_out(document)

    assert (refused.value.status, refused.value.code) == (500, "document-altered")


def test_a_destroyed_document_is_told_apart_from_an_altered_one() -> None:
    document = _filed()
    document.body = b""

    with pytest.raises(NotKnown) as refused:
        hand_out(document)

    assert refused.value.code == "document-destroyed"


@pytest.mark.parametrize(
    "change", ["body = 'x'::bytea", "digest = repeat('0', 64)", "title = 'other'", "size = 1"]
)
def test_the_service_role_can_change_nothing_of_a_filed_document(change: str) -> None:
    _filed()

    with pytest.raises(Exception, match=r"permission denied|only ever added"):
        _execute(f"UPDATE records_document SET {change}")  # fixed words above


@pytest.mark.parametrize("wrong", [{"digest": "0" * 64}, {"size": 1}])
def test_the_database_refuses_a_digest_or_a_size_that_does_not_fit(wrong: dict[str, object]) -> None:
    people = cast()

    with pytest.raises(IntegrityError):
        _write(people, wrong)


def _execute(statement: str) -> None:
    with transaction.atomic(), refusals_named(), connections["default"].cursor() as cursor:
        cursor.execute(statement)


def _write(people: Cast, fields: dict[str, object]) -> None:
    with act(KIND, by=actor(people.preparer), about="load:x") as entry:
        row = {
            "digest": hashlib.sha256(BODY).hexdigest(),
            "operator_id": entry.chain,
            "about": "load:x",
            "title": "a paper",
            "media_type": "application/pdf",
            "size": len(BODY),
            "renderer": "",
            "body": BODY,
            "salt": b"0" * 16,
            "filed_at": entry.at,
        }
        Document.objects.create(**(row | fields))
