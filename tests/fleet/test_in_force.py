"""What is in force when, as known when."""


import pytest
from django.utils import timezone

from fleet.queries.in_force import in_force
from tests.cast import cast
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


def test_an_approved_basis_and_empty_weight_are_in_force_together() -> None:
    aircraft = ready_aircraft(cast())
    now = timezone.now()

    found = in_force(aircraft, now, now, "wheels")

    assert found.basis == aircraft.loading_bases.get()
    assert found.empty_weight == aircraft.empty_weights.get()
