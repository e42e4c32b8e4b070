"""The line of a request names the token that asked, never its secret."""

import logging
from datetime import timedelta

import pytest
from django.test import Client

from fleet.actions.issue_token import issue_token
from service.allowed import grantable
from tests.cast import actor, cast

pytestmark = pytest.mark.django_db


def test_a_request_with_a_token_is_logged_under_the_token(caplog: pytest.LogCaptureFixture) -> None:
    people = cast()
    issued = issue_token(
        actor(people.pilot),
        people.pilot,
        label="log",
        scopes=["read"],
        grantable=grantable(["pilot"], integration=False),
        valid_for=timedelta(days=1),
    )
    caplog.set_level(logging.INFO, logger="service.accounting")

    Client().get("/api/v1/loads", headers={"Authorization": f"Bearer {issued.secret}"})

    lines = [record.getMessage() for record in caplog.records if "/loads" in record.getMessage()]
    assert lines
    assert all(f"token:{issued.token.pk}" in line for line in lines)
    assert not any(issued.secret in line for line in lines)
