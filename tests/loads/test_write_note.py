"""Notes after flight: only added, only after departure, by a person."""

import pytest
from django.utils import timezone

from loads.actions.depart_load import depart_load
from loads.actions.file_manifest import manifest_bytes
from loads.actions.write_note import write_note
from loads.models import Note
from records.models import Seal
from records.refusal import Invalid, NotAllowed, NotKnown, StepRefused
from tests.cast import actor, cast, strangers
from tests.loads.making import accepted, prepared, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db
TEXT = "M. Dravo sat in row 2, not in row 1."


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def _departed(people):
    current = accepted(people)
    return depart_load(
        current.load.id, at=timezone.now(), seen=str(current.step.number), by=actor(people.pilot)
    )


def test_a_note_stands_beside_the_load_with_who_and_when(people) -> None:
    current = _departed(people)

    note = write_note(current.load.id, TEXT, by=actor(people.pilot))

    assert (note.text, note.person_id) == (TEXT, people.pilot.pk)
    assert Note.objects.get().written_at == note.written_at


def test_the_manifest_stays_as_it_is(people) -> None:
    current = _departed(people)
    before = manifest_bytes(people.operator.code, current.load.id)

    write_note(current.load.id, TEXT, by=actor(people.pilot))

    assert manifest_bytes(people.operator.code, current.load.id) == before


def test_the_trail_tells_of_the_note_without_its_words(people) -> None:
    current = _departed(people)

    write_note(current.load.id, TEXT, by=actor(people.pilot))

    assert "Dravo" not in Seal.objects.get(act__kind="write-note").entry


@pytest.mark.parametrize("make", [submitted, prepared, accepted])
def test_before_departure_there_are_no_notes(people, make) -> None:
    current = make(people)

    with pytest.raises(StepRefused) as refused:
        write_note(current.load.id, TEXT, by=actor(people.pilot))

    assert refused.value.code == "not-departed"
    assert Note.objects.count() == 0


@pytest.mark.parametrize("text", ["", " ", "x" * 2001, "two\nlines", "\x00"])
def test_a_note_says_something_that_can_be_printed(people, text: str) -> None:
    current = _departed(people)

    with pytest.raises(Invalid):
        write_note(current.load.id, text, by=actor(people.pilot))


def test_who_may_not_and_who_is_a_stranger_write_none(people) -> None:
    current = _departed(people)

    with pytest.raises(NotAllowed):
        write_note(current.load.id, TEXT, by=actor(people.auditor))
    with pytest.raises(NotAllowed):
        write_note(current.load.id, TEXT, by=actor(people.pilot, person=None))
    with pytest.raises(NotKnown):
        write_note(current.load.id, TEXT, by=actor(strangers().pilot))
