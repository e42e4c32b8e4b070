"""Filing the manifest of an accepted load: printed first, then kept once, whoever comes first."""

from uuid import UUID

from django.db import IntegrityError

from loads.actions.announcing import announce_filed
from loads.acts import FILE_MANIFEST
from loads.duties import ACTS_OF_THE_WORKER
from loads.manifest.gathering import facts_of, paper_of
from loads.manifest.printing import pdf_of
from loads.manifest.sheet import title_of
from loads.models import FiledPaper, Paper
from records import outbox
from records.act import act
from records.actor import Actor
from records.archive import file_document, hand_out
from records.press import renderer_versions

FILING = "loads.tasks.file_manifest"
MEDIA_TYPE = "application/pdf"


def manifest_bytes(operator: str, load: UUID) -> bytes:
    """This function will return the filed manifest of an operator's load, filing it first if no worker has
    yet.

    Raises NotKnown when the load is not the operator's or was never accepted, DocumentAltered when the stored
    bytes do not fit their digest. What became of the load afterwards does not matter: a filed manifest stays
    as it is.
    """
    return manifest_of(operator, load)[1]


def manifest_of(operator: str, load: UUID) -> tuple[str, bytes]:
    """This function will do the same and return the digest besides."""
    filed = file_manifest(paper_of(operator, load))
    return filed.document_id, hand_out(filed.document)


def file_manifest(paper: Paper) -> FiledPaper:
    """This function will file the manifest unless it is filed, and return it. Two at once file one.

    The paper is printed before the act is opened: printing takes long, and an act holds the operator's chain.
    """
    if (filed := filed_paper(paper)) is not None:
        return filed
    facts = facts_of(paper)
    body = pdf_of(facts)
    try:
        with act(FILE_MANIFEST, by=_worker_for(paper), about=f"load:{paper.load_id}") as entry:
            document = file_document(
                entry,
                body,
                media_type=MEDIA_TYPE,
                about=f"load:{paper.load_id}",
                title=title_of(facts),
                renderer=renderer_versions(),
            )
            filed = FiledPaper.objects.create(
                paper=paper, operator_id=entry.chain, document=document, filed_at=entry.at
            )
            announce_filed(entry, paper, document.digest)
            outbox.done(FILING, str(paper.load_id))
    except IntegrityError:
        filed = filed_paper(paper)  # another came first, with the same bytes
        if filed is None:
            raise
    return filed


def filed_paper(paper: Paper) -> FiledPaper | None:
    """This function will return the filed paper of a manifest number, None while there is none."""
    return FiledPaper.objects.select_related("document").filter(paper=paper).first()


def _worker_for(paper: Paper) -> Actor:
    """The service itself, acting because of the acceptance and able to do this one act."""
    return Actor(
        operator=paper.operator_id,
        kind="service",
        key="service:worker",
        name="",
        capacity="worker",
        may=ACTS_OF_THE_WORKER,
        caused_by=paper.act,
    )
