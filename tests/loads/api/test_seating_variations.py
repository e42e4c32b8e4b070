"""A margin for seating worked out over the API: the amounts, and the working behind them; nothing stored."""

import json

import pytest

from records.models.act import Act
from tests.cast import api, cast, strangers
from tests.loads.api.test_loads_api import answer
from tests.makers import ready_aircraft
from tests.pure.fleet.cabins import cabin

pytestmark = pytest.mark.django_db


def asked(person, document, registration="Q9-KTB"):
    return api(person).post(
        f"/api/v1/aircraft/{registration}/seating-variations",
        data=json.dumps(document),
        content_type="application/json",
    )


def test_the_margin_comes_with_its_working_and_nothing_is_stored():
    """Rows of three at 200, 230, 260 in, 190 lb each, assumed at 230: the first two are 11,400 lb in forward.

    Windows: -5,700, -11,400, then none, then back to 0. Aisles: -5,700, none, 0.
    """
    people = cast()
    ready_aircraft(people)
    acts = Act.objects.count()

    found = asked(people.auditor, cabin())
    body = answer(found)

    assert found.status_code == 200
    assert body["amounts"] == {
        "forward": {"value": "11400", "unit": "lb in"},
        "aft": {"value": "11400", "unit": "lb in"},
    }
    front = body["working"][0]
    assert (front["order"], front["assumed_arm"], front["forward_at"]) == ("from the front", "230", 2)
    assert [line["difference"] for line in front["lines"]] == [
        "-5700", "-11400", "-11400", "-11400", "-5700", "0", "-5700", "-5700", "0",
    ]  # fmt: skip
    assert Act.objects.count() == acts


def test_another_operator_s_aircraft_is_not_known_and_a_bad_cabin_is_named():
    people = cast()
    ready_aircraft(people)

    assert asked(strangers().pilot, cabin()).status_code == 404
    refused = asked(people.pilot, cabin(rows=[]))
    assert refused.status_code == 422
    assert [fault["pointer"] for fault in answer(refused)["errors"]] == ["/rows"]
