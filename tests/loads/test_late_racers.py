"""Two hands at once on an accepted load, and two workers on one notice: real threads, real commits."""

from datetime import timedelta

import pytest
from django.utils import timezone

from loads.actions.change_late import change_late
from loads.actions.depart_load import depart_load
from loads.actions.file_manifest import file_issue
from loads.actions.signing import Signing
from loads.actions.tell_stale import tell_after_approval
from loads.models import FiledIssue, LateChange, Signature, StaleNotice
from loads.queries.current import load_of
from tests.cast import Cast, actor, cast
from tests.loads.late import BAG, bounded, change_of, changed, proposed
from tests.loads.making import accepted, load_document, prepared, submitted
from tests.loads.test_racers import at_once, codes
from tests.makers import empty_weight_document, make_empty_weight, q, ready_aircraft

pytestmark = pytest.mark.usefixtures("own_database")


@pytest.fixture(scope="module")
def people(own_database: str) -> Cast:
    made = cast()
    ready_aircraft(made)
    bounded(made, weight="30")
    return made


def _change(people, current, change):
    shown = Signing(proposed(current, change).computation.digest, "127.0.0.1")
    who = actor(people.pilot)
    return lambda: change_late(current.load.id, change, shown, seen=str(current.step.number), by=who)


def test_two_changes_at_once_are_one_and_never_pass_the_bound_together(people: Cast) -> None:
    for _ in range(3):
        current = accepted(people)
        works = [_change(people, current, change_of(BAG | {"what": what})) for what in ("one", "two")]

        found = at_once(*works)

        assert len(codes(found)) == 1
        assert set(codes(found)) <= {"step-taken", "state-moved-on"}
        assert LateChange.objects.filter(load=current.load).count() == 1
        assert Signature.objects.filter(load=current.load).count() == 3


def test_a_change_and_the_departure_at_once_are_one_of_the_two(people: Cast) -> None:
    for turn in range(4):
        current = accepted(people)
        late = _change(people, current, change_of(BAG))
        who, load, seen = actor(people.pilot), current.load.id, str(current.step.number)

        def leave(load=load, seen=seen, who=who):
            return depart_load(load, at=timezone.now(), seen=seen, by=who)

        found = at_once(*([late, leave] if turn % 2 else [leave, late]))

        assert len(codes(found)) == 1
        stands = load_of(people.operator.code, load)
        assert (stands.state == "departed") is not LateChange.objects.filter(load=load).exists()


def test_two_workers_file_one_issue(people: Cast) -> None:
    changed(people, accepted(people), change_of(BAG))
    change = LateChange.objects.order_by("-changed_at").first()

    first, second = at_once(lambda: file_issue(change), lambda: file_issue(change))

    assert first.document_id == second.document_id
    assert FiledIssue.objects.filter(change=change).count() == 1


def test_two_workers_tell_once(people: Cast) -> None:
    departure = (timezone.now() + timedelta(hours=1)).replace(microsecond=0).isoformat()
    flight = load_document(people)["flight"] | {"departure": departure}
    current = accepted(people, prepared(people, submitted(people, flight=flight)))
    weight = make_empty_weight(people, current.load.aircraft, empty_weight_document(weight=q("5210", "lb")))
    approval = weight.approval.id

    told = at_once(lambda: tell_after_approval(approval), lambda: tell_after_approval(approval))

    assert StaleNotice.objects.filter(load=current.load).count() == 1
    assert sum(told) >= 1
