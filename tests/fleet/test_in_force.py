"""What is in force when, as known when."""

from datetime import UTC, datetime, timedelta
from uuid import UUID

import pytest
from django.utils import timezone
from hypothesis import settings
from hypothesis import strategies as st
from hypothesis.stateful import RuleBasedStateMachine, initialize, rule, run_state_machine_as_test

from fleet.actions.approve_empty_weight import approve_empty_weight
from fleet.actions.approve_loading_basis import approve_loading_basis
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.actions.enter_loading_basis import enter_loading_basis
from fleet.queries.in_force import in_force, in_force_for
from tests.cast import Cast, actor, cast
from tests.makers import (
    basis_document,
    empty_weight_document,
    make_aircraft,
    make_basis,
    make_empty_weight,
    ready_aircraft,
)

pytestmark = pytest.mark.django_db

DAY_ZERO = datetime(2026, 5, 1, tzinfo=UTC)
MOMENT = timedelta(microseconds=1)


def day(number: int) -> datetime:
    return DAY_ZERO + timedelta(days=number)


def test_an_approved_basis_and_empty_weight_are_in_force_together() -> None:
    aircraft = ready_aircraft(cast())
    now = timezone.now()

    found = in_force(aircraft, now, now, "wheels")

    assert found.basis == aircraft.loading_bases.get()
    assert found.empty_weight == aircraft.empty_weights.get()


def test_nothing_is_in_force_before_its_approval_was_known() -> None:
    aircraft = ready_aircraft(cast())
    now = timezone.now()

    found = in_force(aircraft, now, now - timedelta(days=1), "wheels")

    assert found.basis is None
    assert found.empty_weight is None


def test_nothing_is_in_force_before_it_is_true() -> None:
    aircraft = ready_aircraft(cast())

    found = in_force(aircraft, datetime(2025, 12, 31, 23, 59, 59, tzinfo=UTC), timezone.now(), "wheels")

    assert found.basis is None
    assert found.empty_weight is None


def test_what_was_only_entered_is_not_in_force() -> None:
    people = cast()
    aircraft = make_aircraft(people)
    enter_loading_basis(actor(people.maintenance), aircraft, basis_document())
    enter_empty_weight(actor(people.maintenance), aircraft, empty_weight_document())
    now = timezone.now()

    found = in_force(aircraft, now, now, "wheels")

    assert found.basis is None
    assert found.empty_weight is None


def test_the_configuration_decides_which_base_fit_is_asked_for() -> None:
    people = cast()
    aircraft = ready_aircraft(people)
    skis = make_empty_weight(people, aircraft, empty_weight_document(fit="skis", report="W-2025-32"))
    now = timezone.now()

    on_wheels = in_force_for(aircraft, now, now, "four-seat")
    on_skis = in_force_for(aircraft, now, now, "four-seat-skis")
    unknown = in_force_for(aircraft, now, now, "no-such-fit")

    assert on_wheels.empty_weight is not None
    assert on_wheels.empty_weight.fit == "wheels"
    assert on_skis.empty_weight == skis
    assert unknown.basis == on_wheels.basis
    assert unknown.empty_weight is None


def test_a_back_dated_weighing_changes_the_past_as_known_now_and_not_as_known_then() -> None:
    people = cast()
    aircraft = ready_aircraft(people)
    known_then = timezone.now()
    late = make_empty_weight(
        people, aircraft, empty_weight_document(true_from="2026-03-01T00:00:00Z", report="W-2026-02")
    )
    flight = datetime(2026, 4, 1, tzinfo=UTC)

    before = in_force(aircraft, flight, known_then, "wheels").empty_weight
    after = in_force(aircraft, flight, timezone.now(), "wheels").empty_weight

    assert before is not None
    assert before != late
    assert after == late


class Approvals(RuleBasedStateMachine):
    """Approvals in any order of beginnings, against a naive evaluation of the whole history."""

    people: Cast  # set by the test
    count = 0

    @initialize()
    def begin(self) -> None:
        type(self).count += 1
        self.aircraft = make_aircraft(self.people, f"Q9-{type(self).count:04}")
        # kind and fit -> (beginning, known from, version), in the order of approval
        self.history: dict[str, list[tuple[datetime, datetime, UUID]]] = {
            "basis": [],
            "wheels": [],
            "skis": [],
        }

    @rule(start=st.integers(0, 6), fit=st.sampled_from(["wheels", "skis"]))
    def approve_a_weight(self, start: int, fit: str) -> None:
        number = len(self.history[fit])
        document = empty_weight_document(
            fit=fit, true_from=day(start).isoformat(), report=f"W-{fit}-{number}"
        )
        weight = enter_empty_weight(actor(self.people.maintenance), self.aircraft, document)
        approval = approve_empty_weight(actor(self.people.approver), self.aircraft, weight)
        self.history[fit].append((day(start), approval.known_from, weight.id))

    @rule(start=st.integers(0, 6))
    def approve_a_basis(self, start: int) -> None:
        basis = enter_loading_basis(actor(self.people.maintenance), self.aircraft, basis_document())
        approval = approve_loading_basis(
            actor(self.people.approver), self.aircraft, basis, true_from=day(start)
        )
        self.history["basis"].append((day(start), approval.known_from, basis.id))

    @rule(number=st.integers(-1, 7), early=st.booleans(), data=st.data())
    def ask(self, number: int, early: bool, data: st.DataObject) -> None:
        at = day(number) - (MOMENT if early else timedelta(0))
        instants = sorted(known for rows in self.history.values() for _, known, _ in rows)
        choices = [timezone.now(), *instants, *(known - MOMENT for known in instants)]
        known = choices[data.draw(st.integers(0, len(choices) - 1))]

        for fit in ("wheels", "skis"):
            found = in_force(self.aircraft, at, known, fit)
            assert (found.basis and found.basis.id) == self.naive("basis", at, known)
            assert (found.empty_weight and found.empty_weight.id) == self.naive(fit, at, known)

    def naive(self, what: str, at: datetime, known: datetime) -> UUID | None:
        """Of all approvals known by then that had begun by then: the latest beginning, then the latest
        approval.
        """
        begun = [row for row in self.history[what] if row[0] <= at and row[1] <= known]
        return max(begun, key=lambda row: (row[0], row[1]))[2] if begun else None


def test_any_history_of_approvals_reads_as_its_naive_evaluation() -> None:
    Approvals.people = cast()

    run_state_machine_as_test(
        Approvals, settings=settings(max_examples=20, stateful_step_count=14, deadline=None, derandomize=True)
    )


def test_a_basis_and_its_aircraft_of_another_operator_stay_apart() -> None:
    first, second = cast("first-op"), cast("second-op")
    here, there = make_aircraft(first), make_aircraft(second)
    basis = make_basis(first, here)
    now = timezone.now()

    assert in_force(here, now, now, "wheels").basis == basis
    assert in_force(there, now, now, "wheels").basis is None
