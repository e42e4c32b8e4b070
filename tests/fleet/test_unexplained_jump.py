"""A large step of the empty weight needs a cause, by the operator's own threshold."""

import pytest

from fleet.actions.approve_empty_weight import approve_empty_weight
from fleet.actions.change_settings import change_settings
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.queries.aircraft import aircraft_of
from fleet.queries.settings import last_number
from fleet.settings_reading import read_settings
from records.models import Act
from records.refusal import StepRefused
from tests.cast import actor, browser, cast
from tests.makers import empty_weight_document, q, ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def threshold(people, percent):
    change = read_settings({"reason": "manual", "weighing_threshold_percent": percent})
    change_settings(actor(people.manager), change, seen=str(last_number(people.operator.code)))


def entered(people, weight):
    aircraft = aircraft_of(people.operator.code, "Q9-KTB")
    document = empty_weight_document(
        weight=q(weight, "lb"), report=f"W-{weight}", true_from="2026-02-01T00:00:00Z"
    )
    return aircraft, enter_empty_weight(actor(people.maintenance), aircraft, document)


def test_beyond_the_threshold_a_cause_is_asked_for_and_kept(people) -> None:
    """0.5 % of the landing limit of 8,600 lb is 43 lb; the running figure is 5,214 lb."""
    threshold(people, "0.5")
    aircraft, weight = entered(people, "5258")

    with pytest.raises(StepRefused) as refused:
        approve_empty_weight(actor(people.approver), aircraft, weight)

    assert refused.value.code == "cause-needed"
    assert refused.value.detail == (
        "The empty weight goes from 5214.0 lb to 5258.0 lb, by 44.0 lb, more than 43.0 lb (0.5 %)."
    )
    approve_empty_weight(actor(people.approver), aircraft, weight, reason="new radio rack, WO-118")
    act = Act.objects.filter(kind="approve-empty-weight").order_by("-at").first()
    assert act.reason == "new radio rack, WO-118"


def test_on_the_threshold_no_cause_is_needed(people) -> None:
    threshold(people, "0.5")
    aircraft, weight = entered(people, "5257")

    assert approve_empty_weight(actor(people.approver), aircraft, weight)


def test_a_removal_counts_like_an_addition(people) -> None:
    threshold(people, "0.5")
    aircraft, weight = entered(people, "5170")

    with pytest.raises(StepRefused) as refused:
        approve_empty_weight(actor(people.approver), aircraft, weight)

    assert "by -44.0 lb" in refused.value.detail


def test_without_a_threshold_any_step_is_approved(people) -> None:
    aircraft, weight = entered(people, "5400")

    assert approve_empty_weight(actor(people.approver), aircraft, weight)


def test_the_page_asks_for_the_cause_and_takes_it(people) -> None:
    threshold(people, "0.5")
    aircraft, weight = entered(people, "5400")
    address = f"/aircraft/{aircraft.registration}/empty-weights/{weight.id}/approval"

    refused = browser(people.approver).post(address, {"reason": "  "})
    done = browser(people.approver).post(address, {"reason": "floats fitted"})

    assert refused.status_code == 409
    assert "Say what caused it in the reason" in refused.content.decode()
    assert done.status_code == 302
