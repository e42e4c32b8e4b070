"""Any order of steps: the load is where the table says, and the database holds the same."""

from itertools import pairwise
from typing import ClassVar

import pytest
from django.db import transaction
from django.utils import timezone
from hypothesis import HealthCheck, settings
from hypothesis import strategies as st
from hypothesis.stateful import RuleBasedStateMachine, initialize, invariant, precondition, rule

from fleet.models import Aircraft
from loads import lifecycle
from loads.actions.accept_load import accept_load
from loads.actions.assess_again import assess_again
from loads.actions.depart_load import depart_load
from loads.actions.prepare_load import prepare_load
from loads.actions.revise_load import revise_load
from loads.actions.withdraw_load import withdraw_load
from loads.models import Paper, Signature, Step
from loads.queries.current import load_of
from loads.queries.stale import stale_parts
from records.refusal import Refused
from tests.cast import Cast, actor, cast
from tests.loads.making import load_document, signing, submitted
from tests.makers import make_empty_weight, ready_aircraft

pytestmark = pytest.mark.django_db
# What moves a load on stands more than once, so that a random walk gets to the end.
MOVES = ("prepare", "prepare", "accept", "accept", "depart", "depart", "withdraw", "revise", "assess")


class LifeOfALoad(RuleBasedStateMachine):
    """One load at a time, moved at random; `state` and `number` are the model, the table judges."""

    people: ClassVar[Cast]
    aircraft: ClassVar[Aircraft]
    reached: ClassVar[set[str]] = set()

    @initialize()
    def begin(self) -> None:
        self.around = transaction.atomic()
        self.around.__enter__()
        self.around._from_testcase = True  # the mark by which an act knows the transaction of a test
        self._follow(submitted(self.people))

    def _follow(self, current) -> None:
        self.load, self.state, self.number, self.stale = current.load, "open", 1, False

    def _do(self, move: str, seen: str, digest):
        load, people = self.load.id, self.people
        match move:
            case "prepare":
                return prepare_load(load, digest, seen=seen, by=actor(people.preparer))
            case "accept":
                return accept_load(load, digest, seen=seen, by=actor(people.pilot))
            case "withdraw":
                return withdraw_load(load, reason="weather", seen=seen, by=actor(people.preparer))
            case "depart":
                return depart_load(load, at=timezone.now(), seen=seen, by=actor(people.pilot))
            case "revise":
                return revise_load(
                    load, load_document(people), reason="bags", seen=seen, by=actor(people.preparer)
                )
            case _:
                return assess_again(load, seen=seen, by=actor(people.preparer))

    def _expected(self, move: str) -> str | None:
        """The state a move leads to by the table, None when it is to be refused."""
        target = {
            "prepare": "prepared",
            "accept": "accepted",
            "withdraw": "withdrawn",
            "depart": "departed",
            "revise": "superseded",
            "assess": "open",
        }[move]
        if target not in lifecycle.ways_out(self.state):
            return None
        if move in {"prepare", "accept"} and self.stale:
            return None
        return None if move == "assess" and not self.stale else target

    @rule(move=st.sampled_from(MOVES), moved_on=st.sampled_from([False, False, False, True]))
    def step(self, move: str, moved_on: bool) -> None:
        seen = str(self.number + 1 if moved_on else self.number)
        expected = None if moved_on else self._expected(move)
        current = load_of(self.people.operator.code, self.load.id)

        if expected is None:
            with pytest.raises(Refused):
                self._do(move, seen, signing(current))
            return
        done = self._do(move, seen, signing(current))

        if move == "revise":
            assert load_of(self.people.operator.code, self.load.id).state == "superseded"
            self._follow(done)
            return
        assert done.state == expected
        self.state, self.number = expected, self.number + 1
        self.stale = self.stale and move != "assess"

    @precondition(lambda self: not lifecycle.ways_out(self.state))
    @rule()
    def begin_another_load(self) -> None:
        self._follow(submitted(self.people))

    @precondition(lambda self: not self.stale)
    @rule()
    def approve_another_empty_weight(self) -> None:
        make_empty_weight(self.people, self.aircraft)
        self.stale = True

    @invariant()
    def the_database_agrees_with_the_table(self) -> None:
        if not hasattr(self, "load"):
            return
        current = load_of(self.people.operator.code, self.load.id)
        self.reached |= set(Step.objects.values_list("after", flat=True))
        steps = list(self.load.steps.order_by("number").values_list("before", "after"))
        assert (current.state, current.step.number) == (self.state, self.number)
        assert steps[0] == ("", "open")
        assert all(second[0] == first[1] for first, second in pairwise(steps))
        if lifecycle.ways_out(self.state):
            assert bool(stale_parts(current, timezone.now())) == self.stale
        numbers = list(Paper.objects.order_by("number").values_list("number", flat=True))
        assert numbers == list(range(1, len(numbers) + 1))
        signed = Step.objects.filter(after__in=["prepared", "accepted"]).count()
        assert (Signature.objects.count(), Paper.objects.count()) == (
            signed,
            Step.objects.filter(after="accepted").count(),
        )

    def teardown(self) -> None:
        if hasattr(self, "around"):
            transaction.set_rollback(True)
            self.around.__exit__(None, None, None)


def test_a_load_lives_by_its_table() -> None:
    LifeOfALoad.people = cast()
    LifeOfALoad.aircraft = ready_aircraft(LifeOfALoad.people)
    LifeOfALoad.TestCase.settings = settings(
        max_examples=25,
        stateful_step_count=14,
        deadline=None,
        derandomize=True,
        suppress_health_check=list(HealthCheck),
    )
    LifeOfALoad.TestCase().runTest()

    assert LifeOfALoad.reached == set(lifecycle.STATES) - {"loaded"}
