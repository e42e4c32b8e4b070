"""Two hands at once, with real threads and real commits: one step, one signature, no gap in the numbers."""

from concurrent.futures import ThreadPoolExecutor
from threading import Barrier

import pytest
from django.db import connections

from loads.actions.accept_load import accept_load
from loads.actions.prepare_load import prepare_load
from loads.actions.revise_load import revise_load
from loads.actions.withdraw_load import withdraw_load
from loads.models import Load, Paper, Signature, Step
from loads.queries.current import load_of
from records.models import Seal
from records.refusal import Refused
from tests.cast import Cast, actor, cast
from tests.loads.making import load_document, prepared, signing, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.usefixtures("own_database")


@pytest.fixture(scope="module")
def people(own_database: str) -> Cast:
    made = cast()
    ready_aircraft(made)
    return made


def at_once(*works):
    """Run the works at the same moment, each on its own connection; what each returned, or its refusal."""
    start = Barrier(len(works))

    def run(work):
        try:
            start.wait(10)
            return work()
        except Refused as refused:
            return refused
        finally:
            connections.close_all()

    with ThreadPoolExecutor(len(works)) as pool:
        return list(pool.map(run, works))


def codes(found):
    return sorted(one.code for one in found if isinstance(one, Refused))


def prepare_twice(people: Cast):
    current, who = submitted(people), actor(people.preparer)

    def work():
        return prepare_load(current.load.id, signing(current), seen="1", by=who)

    return current, at_once(work, work)


def accept_revise_and_withdraw(people: Cast, turn: int):
    current = prepared(people)
    load, shown = current.load.id, signing(current)
    pilot, preparer = actor(people.pilot), actor(people.preparer)
    works = [
        lambda: accept_load(load, shown, seen="2", by=pilot),
        lambda: revise_load(load, load_document(people), reason="bags", seen="2", by=preparer),
        lambda: withdraw_load(load, reason="weather", seen="2", by=preparer),
    ]
    return load, at_once(*(works[turn:] + works[:turn]))


def test_two_who_prepare_the_same_load_are_one_signature(people: Cast) -> None:
    for _ in range(5):
        current, found = prepare_twice(people)

        assert len(codes(found)) == 1
        assert set(codes(found)) <= {"step-taken", "state-moved-on"}
        assert Signature.objects.filter(load=current.load).count() == 1


def test_accepting_revising_and_withdrawing_at_once_is_one_of_the_three(people: Cast) -> None:
    for turn in (0, 1, 2, 0, 1, 2):
        load, found = accept_revise_and_withdraw(people, turn)

        assert len(codes(found)) == 2
        state = load_of(people.operator.code, load).state
        assert Step.objects.filter(load_id=load).count() == 3
        assert Load.objects.filter(replaces_id=load).count() == (state == "superseded")
        assert Paper.objects.filter(load_id=load).count() == (state == "accepted")


def test_many_acceptances_at_once_leave_no_gap_in_the_numbers(people: Cast) -> None:
    before = Paper.objects.count()
    ready = [prepared(people) for _ in range(12)]
    pilot = actor(people.pilot)

    found = at_once(
        *[(lambda one=one: accept_load(one.load.id, signing(one), seen="2", by=pilot)) for one in ready]
    )

    assert codes(found) == []
    numbers = sorted(Paper.objects.values_list("number", flat=True))
    assert numbers == list(range(1, before + 13))
    positions = sorted(Seal.objects.filter(chain=people.operator.code).values_list("position", flat=True))
    assert positions == list(range(1, len(positions) + 1))
