"""Filing a manifest: once, with what was signed, whoever comes first, and whatever happens afterwards."""

import hashlib
import io
import json
from uuid import uuid4

import pikepdf
import pytest

from loads.actions import file_manifest as filing
from loads.actions.file_manifest import FILING, file_manifest, manifest_bytes
from loads.actions.withdraw_load import withdraw_load
from loads.manifest.gathering import facts_of, paper_of
from loads.models import FiledPaper, Load, Paper
from loads.tasks import file_manifest as the_task
from records.archive import DocumentAltered
from records.models import Act, Document, Outbox, Seal
from records.refusal import NotKnown
from tests.cast import actor, api, cast, strangers
from tests.loads.making import accepted, prepared
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


def _accepted():
    people = cast()
    ready_aircraft(people)
    return people, accepted(people)


def test_the_worker_files_the_paper_under_its_digest_in_an_act_of_its_own() -> None:
    people, done = _accepted()

    the_task(str(done.load.id))

    filed = FiledPaper.objects.select_related("document").get()
    body = bytes(filed.document.body)
    act = Act.objects.get(kind="file-manifest")
    assert body.startswith(b"%PDF-")
    assert filed.document.digest == hashlib.sha256(body).hexdigest()
    assert (filed.document.operator_id, filed.document.size) == (people.operator.code, len(body))
    assert "weasyprint" in filed.document.renderer
    assert (act.actor_kind, act.actor_key, act.chain) == ("service", "service:worker", people.operator.code)
    assert act.caused_by == Paper.objects.get().act
    assert Outbox.objects.get(task=FILING).done_at is not None


def test_the_entry_of_the_trail_holds_no_part_of_the_paper_or_its_names() -> None:
    _people, done = _accepted()

    the_task(str(done.load.id))

    entry = Seal.objects.get(act__kind="file-manifest").entry
    assert "R. Amani" not in entry
    assert "%PDF" not in entry
    assert FiledPaper.objects.get().document_id in entry


def test_the_enclosed_statement_is_what_was_signed() -> None:
    people, done = _accepted()

    body = manifest_bytes(people.operator.code, done.load.id)

    with pikepdf.open(io.BytesIO(body)) as pdf:
        enclosed = pdf.attachments["statement.json"].get_file().read_bytes()
    assert hashlib.sha256(enclosed).hexdigest() == done.assessment.digest
    assert json.loads(enclosed)["inputs"]["crew"][0]["name"] == "R. Amani"


def test_running_the_task_twice_files_one() -> None:
    _people, done = _accepted()

    the_task(str(done.load.id))
    the_task(str(done.load.id))

    assert (FiledPaper.objects.count(), Document.objects.count()) == (1, 1)
    assert Act.objects.filter(kind="file-manifest").count() == 1


def test_who_comes_second_in_a_race_gets_the_paper_of_the_first(monkeypatch: pytest.MonkeyPatch) -> None:
    people, done = _accepted()
    paper = paper_of(people.operator.code, done.load.id)
    first = file_manifest(paper)
    seen = iter([None, first])  # the look before printing finds nothing, the look after the refusal finds it
    monkeypatch.setattr(filing, "filed_paper", lambda _paper: next(seen))

    second = file_manifest(paper)

    assert second == first
    assert FiledPaper.objects.count() == 1


def test_the_same_record_gives_the_same_bytes_again() -> None:
    people, done = _accepted()
    first = manifest_bytes(people.operator.code, done.load.id)

    again = filing.pdf_of(facts_of(paper_of(people.operator.code, done.load.id)))

    assert again == first


def test_a_paper_asked_for_before_the_worker_came_is_filed_in_the_request() -> None:
    people, done = _accepted()

    answer = api(people.auditor).get(f"/api/v1/loads/{done.load.id}/manifest")

    assert answer.status_code == 200
    assert answer["Content-Type"] == "application/pdf"
    assert hashlib.sha256(answer.content).hexdigest() == answer["ETag"].strip('"')
    assert FiledPaper.objects.get().document_id == answer["ETag"].strip('"')


def test_a_withdrawn_load_keeps_the_manifest_it_has() -> None:
    people, done = _accepted()
    before = manifest_bytes(people.operator.code, done.load.id)

    withdraw_load(done.load.id, reason="weather", seen=str(done.step.number), by=actor(people.pilot))

    assert manifest_bytes(people.operator.code, done.load.id) == before
    assert FiledPaper.objects.count() == 1


def test_a_load_nobody_accepted_has_no_manifest() -> None:
    people = cast()
    ready_aircraft(people)
    waiting = prepared(people)

    answer = api(people.pilot).get(f"/api/v1/loads/{waiting.load.id}/manifest")

    assert (answer.status_code, answer.json()["code"]) == (404, "manifest-not-known")
    with pytest.raises(NotKnown):
        manifest_bytes(people.operator.code, uuid4())


def test_another_operator_sees_neither_the_manifest_nor_the_document() -> None:
    people, done = _accepted()
    others = strangers()
    manifest_bytes(people.operator.code, done.load.id)
    digest = FiledPaper.objects.get().document_id

    of_load = api(others.manager).get(f"/api/v1/loads/{done.load.id}/manifest")
    of_digest = api(others.manager).get(f"/api/v1/documents/{digest}")

    assert (of_load.status_code, of_digest.status_code) == (404, 404)


def test_a_document_is_handed_out_by_its_digest() -> None:
    people, done = _accepted()
    body = manifest_bytes(people.operator.code, done.load.id)
    digest = hashlib.sha256(body).hexdigest()

    answer = api(people.auditor).get(f"/api/v1/documents/{digest}")

    assert (answer.status_code, answer.content) == (200, body)
    assert api(people.auditor).get(f"/api/v1/documents/{'0' * 64}").status_code == 404


def test_nothing_is_printed_when_the_record_no_longer_gives_what_was_signed(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    people, done = _accepted()
    paper = paper_of(people.operator.code, done.load.id)
    monkeypatch.setattr("loads.manifest.gathering.statement_of", lambda _current, _declared: {"other": "1"})

    with pytest.raises(DocumentAltered) as refused:
        file_manifest(paper)

    assert refused.value.code == "statement-altered"
    assert FiledPaper.objects.count() == 0


def test_a_failing_task_is_noted_and_stays_promised(monkeypatch: pytest.MonkeyPatch) -> None:
    _people, done = _accepted()
    monkeypatch.setattr("loads.tasks.file_one", lambda _paper: 1 / 0)

    with pytest.raises(ZeroDivisionError):
        the_task(str(done.load.id))

    row = Outbox.objects.get(task=FILING)
    assert (row.done_at, row.last_problem) == (None, "ZeroDivisionError")
    assert Load.objects.count() == 1
