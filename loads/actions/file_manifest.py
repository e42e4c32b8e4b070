"""Filing the manifest of an accepted load: printed first, then kept once, whoever comes first.

A last-minute change reissues it under the same number: each issue is a document of its own, and the earlier
ones stay.
"""

from contextlib import AbstractContextManager
from uuid import UUID

from django.db import IntegrityError

from loads.actions.announcing import announce_filed
from loads.actions.tell_stale import tell_if_stale
from loads.acts import FILE_MANIFEST
from loads.duties import service_at_work
from loads.manifest.facts import Facts
from loads.manifest.gathering import facts_of, paper_of
from loads.manifest.printing import pdf_of
from loads.manifest.sheet import title_of
from loads.models import FiledIssue, FiledPaper, LateChange, Paper
from records import outbox
from records.act import Entry, act
from records.archive import file_document, hand_out
from records.models import Document
from records.press import renderer_versions
from records.refusal import NotKnown

FILING = "loads.tasks.file_manifest"
FILING_ISSUE = "loads.tasks.file_issue"
MEDIA_TYPE = "application/pdf"


def manifest_bytes(operator: str, load: UUID, issue: int | None = None) -> bytes:
    """This function will return the filed manifest of an operator's load, filing it first if no worker has
    yet; the last issue, or the one asked for.

    Raises NotKnown when the load is not the operator's, was never accepted or has no such issue;
    DocumentAltered when the stored bytes do not fit their digest. What became of the load afterwards does not
    matter: a filed manifest stays as it is.
    """
    return manifest_of(operator, load, issue)[1]


def manifest_of(operator: str, load: UUID, issue: int | None = None) -> tuple[str, bytes]:
    """This function will do the same and return the digest besides."""
    paper = paper_of(operator, load)
    change = change_of_issue(paper, issue)
    filed = file_manifest(paper) if change is None else file_issue(change)
    return filed.document_id, hand_out(filed.document)


def change_of_issue(paper: Paper, issue: int | None) -> LateChange | None:
    """This function will return the last-minute change behind an issue, None for the first; without a number,
    of the last issue. Raises NotKnown.
    """
    changes = LateChange.objects.filter(load_id=paper.load_id)
    if issue is None:
        return changes.order_by("-number").first()
    if issue == 1:
        return None
    found = changes.filter(number=issue - 1).first()
    if found is None:
        raise NotKnown("issue-not-known", f"Manifest {paper.number} has no issue {issue}.")
    return found


def file_manifest(paper: Paper) -> FiledPaper:
    """This function will file the first issue of a manifest unless it is filed, and return it. Two at once
    file one.

    The paper is printed before the act is opened: printing takes long, and an act holds the operator's chain.
    """
    if (filed := filed_paper(paper)) is not None:
        return filed
    # An approval that committed beside the acceptance did not see it; here the acceptance sees the approval.
    tell_if_stale(paper.operator_id, paper.load_id, paper.act)
    facts = facts_of(paper)
    body = pdf_of(facts)
    try:
        with _filing(paper, paper.act) as entry:
            document = _document(entry, paper, facts, body)
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


def file_issue(change: LateChange) -> FiledIssue:
    """This function will do the same for the issue that a last-minute change made."""
    if (filed := filed_issue(change)) is not None:
        return filed
    paper = Paper.objects.select_related("load__aircraft").get(load_id=change.load_id)
    tell_if_stale(paper.operator_id, paper.load_id, change.act)  # as above
    facts = facts_of(paper, change)
    body = pdf_of(facts)
    try:
        with _filing(paper, change.act) as entry:
            document = _document(entry, paper, facts, body)
            filed = FiledIssue.objects.create(
                change=change, operator_id=entry.chain, document=document, filed_at=entry.at
            )
            announce_filed(entry, paper, document.digest, issue=change.issue)
            outbox.done(FILING_ISSUE, f"{change.load_id}/{change.number}")
    except IntegrityError:
        filed = filed_issue(change)
        if filed is None:
            raise
    return filed


def filed_paper(paper: Paper) -> FiledPaper | None:
    """This function will return the filed paper of a manifest number, None while there is none."""
    return FiledPaper.objects.select_related("document").filter(paper=paper).first()


def filed_issue(change: LateChange) -> FiledIssue | None:
    """This function will return the filed paper of a later issue, None while there is none."""
    return FiledIssue.objects.select_related("document").filter(change=change).first()


def _filing(paper: Paper, cause: UUID) -> AbstractContextManager[Entry]:
    return act(FILE_MANIFEST, by=service_at_work(paper.operator_id, cause), about=_about(paper))


def _about(paper: Paper) -> str:
    return f"load:{paper.load_id}"


def _document(entry: Entry, paper: Paper, facts: Facts, body: bytes) -> Document:
    return file_document(
        entry,
        body,
        media_type=MEDIA_TYPE,
        about=_about(paper),
        title=title_of(facts),
        renderer=renderer_versions(),
    )
