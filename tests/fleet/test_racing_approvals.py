"""Approvals and revisions at the same moment, really committed: none is lost, none stands beside another."""

from concurrent.futures import ThreadPoolExecutor
from datetime import UTC, datetime, timedelta
from threading import Barrier

from django.db import connection
from django.utils import timezone

from fleet.actions.approve_empty_weight import approve_empty_weight
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.actions.enter_loading_basis import enter_loading_basis
from fleet.models import Aircraft, EmptyWeight
from fleet.queries.in_force import empty_weight_in_force
from records.actor import Actor
from records.refusal import StepRefused
from tests.cast import actor, cast
from tests.makers import basis_document, empty_weight_document, make_aircraft

RACERS = 6


def test_of_racing_approvals_each_stands_or_is_told_to_try_again(fresh_database: str) -> None:
    people = cast()
    aircraft = make_aircraft(people)
    start = datetime(2026, 5, 1, tzinfo=UTC)
    weights = [
        enter_empty_weight(
            actor(people.maintenance),
            aircraft,
            empty_weight_document(true_from=(start + timedelta(days=day)).isoformat(), report=f"W-{day}"),
        )
        for day in range(RACERS)
    ]
    approver = actor(people.approver)
    together = Barrier(RACERS)

    def approve(weight: EmptyWeight) -> None:
        together.wait(timeout=20)
        try:
            _approve_until_it_stands(approver, aircraft, weight)
        finally:
            connection.close()

    with ThreadPoolExecutor(RACERS) as racers:
        list(racers.map(approve, weights))

    now = timezone.now()
    for day, weight in enumerate(weights):
        assert empty_weight_in_force(aircraft, start + timedelta(days=day), now, "wheels") == weight


def test_of_racing_revisions_each_has_its_own_number(fresh_database: str) -> None:
    people = cast()
    aircraft = make_aircraft(people)
    by = actor(people.maintenance)
    together = Barrier(RACERS)

    def enter(_: int) -> str:
        together.wait(timeout=20)
        try:
            enter_loading_basis(by, aircraft, basis_document())
        except StepRefused as refused:
            return refused.code
        finally:
            connection.close()
        return "entered"

    with ThreadPoolExecutor(RACERS) as racers:
        ends = list(racers.map(enter, range(RACERS)))

    entered = ends.count("entered")
    revisions = list(aircraft.loading_bases.order_by("revision").values_list("revision", flat=True))
    assert set(ends) <= {"entered", "revision-raced"}
    assert entered >= 1
    assert revisions == list(range(1, entered + 1))


def _approve_until_it_stands(approver: Actor, aircraft: Aircraft, weight: EmptyWeight) -> None:
    for _ in range(RACERS + 1):
        try:
            approve_empty_weight(approver, aircraft, weight)
        except StepRefused as refused:
            if refused.code != "approval-out-of-order":
                raise
        else:
            return
    raise AssertionError("an approval was told to try again more often than there were others")
