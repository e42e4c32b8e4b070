"""Reading the trail: whole, by its parts, page by page, of one chain only."""

import uuid

import pytest

from fleet.actions.change_password import change_password
from records.models import Act
from records.queries import seal_of
from records.refusal import NotKnown
from records.trail import Asked, actors_of, entry_of, read_trail
from tests.cast import PASSWORD, actor, cast, strangers
from tests.makers import make_aircraft

pytestmark = pytest.mark.django_db


def test_the_newest_act_comes_first_with_its_place_and_its_rows() -> None:
    people = cast()
    aircraft = make_aircraft(people)

    trail = read_trail(people.operator.code, Asked())

    newest = trail.lines[0]
    assert (newest.kind, newest.about) == ("enter-aircraft", f"aircraft:{aircraft.id}")
    assert (newest.actor_key, newest.name) == (f"person:{people.maintenance.pk}", "N. Tarrow")
    assert newest.rows == 1
    seal = seal_of(newest.act)
    assert seal is not None
    assert (newest.position, newest.digest) == (seal.position, seal.digest)
    assert [line.at for line in trail.lines] == sorted((line.at for line in trail.lines), reverse=True)


@pytest.mark.parametrize(
    ("part", "value"),
    [("kind", "grant-duty"), ("actor", None), ("about", None)],
    ids=["kind", "actor", "about"],
)
def test_filters_leave_only_what_was_asked(part, value) -> None:
    people = cast()
    aircraft = make_aircraft(people)
    value = value or {"actor": f"person:{people.manager.pk}", "about": f"aircraft:{aircraft.id}"}[part]

    lines = read_trail(people.operator.code, Asked(**{part: value})).lines

    field = {"kind": "kind", "actor": "actor_key", "about": "about"}[part]
    assert lines
    assert {getattr(line, field) for line in lines} == {value}
    column = {"kind": "kind", "actor": "actor_key", "about": "about"}[part]
    assert len(lines) == Act.objects.filter(chain=people.operator.code, **{column: value}).count()


def test_pages_follow_one_another_without_gap_or_repeat() -> None:
    people = cast()
    code = people.operator.code
    whole = [line.act for line in read_trail(code, Asked(), most=200).lines]

    found, after = [], None
    while True:
        page = read_trail(code, Asked(), after=after, most=3)
        found += [line.act for line in page.lines]
        after = page.after
        if after is None:
            break

    assert len(whole) > 6
    assert found == whole


def test_another_operators_acts_are_not_there() -> None:
    people, others = cast(), strangers()
    make_aircraft(people)
    theirs = read_trail(others.operator.code, Asked(), most=200)
    ours = read_trail(people.operator.code, Asked(), most=200)

    assert not {line.act for line in theirs.lines} & {line.act for line in ours.lines}
    with pytest.raises(NotKnown):
        entry_of(others.operator.code, ours.lines[0].act)
    with pytest.raises(NotKnown):
        entry_of(people.operator.code, uuid.uuid4())


def test_one_act_tells_every_field_it_wrote_and_the_text_that_was_sealed() -> None:
    people = cast()
    make_aircraft(people)
    newest = read_trail(people.operator.code, Asked()).lines[0]

    entry = entry_of(people.operator.code, newest.act)

    (row,) = entry.written
    fields = {name: (before, after) for name, before, after in row.fields}
    assert (row.table, row.operation) == ("fleet_aircraft", "insert")
    assert fields["registration"] == (None, "Q9-KTB")
    assert entry.text.startswith('{"schema":"tarebook.entry/1"')
    assert entry.previous == seal_of(read_trail(people.operator.code, Asked()).lines[1].act).digest


def test_a_change_tells_what_is_new_and_of_a_password_only_that_it_changed() -> None:
    people = cast()
    change_password(actor(people.pilot), people.pilot, current=PASSWORD, new="another-quiet-harbour-8")
    newest = read_trail(people.operator.code, Asked(kind="change-password")).lines[0]

    (row,) = entry_of(people.operator.code, newest.act).written

    assert (row.table, row.operation) == ("fleet_person", "update")
    assert [(name, after) for name, _, after in row.fields] == [("password", "changed")]


def test_who_has_a_name_in_the_chain_is_listed_by_name() -> None:
    people = cast()
    make_aircraft(people)

    named = actors_of(people.operator.code)

    assert (f"person:{people.maintenance.pk}", "N. Tarrow") in named
    assert [name for _, name in named] == sorted((name for _, name in named), key=str.casefold)
