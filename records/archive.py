"""The archive: documents are kept under their SHA-256 and handed out only while that still fits."""

import hashlib
import secrets

from records.act import Entry
from records.models.document import Document
from records.refusal import NotKnown, Refused

SALT_BYTES = 16


class DocumentAltered(Refused):
    """The stored bytes are no longer those that were filed; nothing is handed out."""

    status = 500
    title = "document altered"


def file_document(
    entry: Entry, body: bytes, *, media_type: str, about: str, title: str, renderer: str = ""
) -> Document:
    """This function will file `body` inside the open act and return the row.

    `about` names what it belongs to ("load:<uuid>"); `title` must hold no personal name, since only the body
    can be destroyed. The same bytes are filed once: a second time is refused by the database
    (IntegrityError).
    """
    document = Document(
        digest=hashlib.sha256(body).hexdigest(),
        operator_id=entry.chain,
        about=about,
        title=title,
        media_type=media_type,
        size=len(body),
        renderer=renderer,
        body=body,
        salt=secrets.token_bytes(SALT_BYTES),
        filed_at=entry.at,
    )
    document.save(force_insert=True)
    return document


def document_of(operator: str, digest: str) -> Document:
    """This function will return the operator's document of a digest; raises NotKnown, also for another's."""
    found = Document.objects.filter(operator_id=operator, digest=digest).first()
    if found is None:
        raise NotKnown("document-not-known", "No document of that digest is filed.")
    return found


def hand_out(document: Document) -> bytes:
    """This function will return the bytes of a document whose digest still fits them.

    Raises NotKnown when the paper was destroyed and DocumentAltered when the bytes are not those that were
    filed.
    """
    body = bytes(document.body)
    if hashlib.sha256(body).hexdigest() == document.digest:
        return body
    if not body:
        raise NotKnown(
            "document-destroyed", "The document was destroyed when its time came; the trail remains."
        )
    raise DocumentAltered(
        "document-altered",
        f"The stored bytes do not fit the digest they were filed under: {document.digest}. Withheld.",
        next_step="Run the verification of the trail and tell whoever keeps the records.",
    )
