"""Restrictions, permits and rule values typed in inputs: the same document, door and refusals as pasted."""

import json

import pytest

from fleet.models import Provision
from tests.cast import browser, cast
from tests.makers import ready_aircraft
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
HEAD = {
    "number": "DD-14",
    "what": "Seat belt worn",
    "true_from": "2026-11-30T06:00",
    "document_title": "Minimum equipment list",
    "revision": "7",
    "page": "25-3",
}
LOWER = {
    "effect:0:effect": "limit",
    "effect:0:limit": "take_off",
    "effect:0:amount": "8000",
    "effect:0:unit": "lb",
}
BLOCK = {"effect:1:effect": "seats", "effect:1:which": "ROW1-L, ROW1-R"}
CORNERS = {
    "effect:0:effect": "envelope",
    "effect:0:which": "normal",
    "effect:0:corners": "116 5000; 122 8800; 134 8800; 134 5000",
    "effect:0:across": "in",
    "effect:0:unit": "lb",
}
RULE = {
    "title": "Rules of the certificate",
    "true_from": "2026-01-01T00:00",
    "rule:0:rule": "weighing-interval",
    "rule:0:says": "every",
    "rule:0:count": "36",
    "rule:0:unit": "calendar months",
    "rule:0:number": "135.185",
    "rule:0:from_engines": "2",
    "rule:1:rule": "loading-signature",
    "rule:1:says": "none",
    "rule:1:number": "8.10",
}


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def send(person, address, **typed):
    """This function will type on the page what its form has inputs for, and send it."""
    client = browser(person)
    form = next(one for one in Page(client.get(address)).forms if "typed" in one.values)
    return client.post(address, form.filled(typed))


def stored():
    return json.loads(Provision.objects.get().document)


def test_a_restriction_typed_is_the_document_the_api_takes(people) -> None:
    answer = send(people.maintenance, "/aircraft/Q9-KTB/restrictions", **HEAD, **LOWER, **BLOCK)

    assert answer.status_code == 302
    assert stored() == {
        "schema": "tarebook.restriction/1",
        "number": "DD-14",
        "what": "Seat belt worn",
        "true_from": "2026-11-30T06:00:00-07:00",
        "source": {"document": "Minimum equipment list", "revision": "7", "page": "25-3"},
        "effects": [
            {"effect": "limit", "limit": "take_off", "weight": {"value": "8000", "unit": "lb"}},
            {"effect": "seats", "ids": ["ROW1-L", "ROW1-R"]},
        ],
    }


def test_a_permit_typed_widens_for_a_time_and_an_operation(people) -> None:
    more = {
        "authority": "Civil Aviation Office",
        "true_until": "2026-12-03T06:00",
        "operations": "ferry",
        "conditions": "day VFR, crew only",
    }

    answer = send(people.maintenance, "/aircraft/Q9-KTB/permits", **HEAD, **more, **CORNERS)

    assert answer.status_code == 302
    document = stored()
    assert document["true_until"] == "2026-12-03T06:00:00-07:00"
    assert (document["operations"], document["conditions"]) == (["ferry"], ["day VFR", "crew only"])
    assert document["effects"][0]["points"][1] == ["122", "8800"]


def test_rule_values_are_typed_row_by_row(people) -> None:
    assert send(people.manager, "/rules", **RULE).status_code == 302

    first, second = stored()["rules"]
    assert first == {
        "rule": "weighing-interval",
        "interval": {"count": 36, "unit": "calendar months"},
        "source": {"rule": "135.185"},
        "applies_to": {"from_engines": 2},
    }
    assert second == {"rule": "loading-signature", "none": True, "source": {"rule": "8.10"}}


@pytest.mark.parametrize(
    ("changes", "name"),
    [
        ({"number": ""}, "number"),
        ({"true_from": "tomorrow"}, "true_from"),
        ({"page": ""}, "page"),
        ({"effect:0:amount": ""}, "effect:0:amount"),
        ({"effect:0:amount": "1e3"}, "effect:0:amount"),
        ({"effect:1:which": "ROW9-L"}, "effect:1:which"),
        ({"effect:1:amount": "5"}, "effect:1:amount"),
        ({"effect:0:limit": ""}, "effect:0:limit"),
    ],
)
def test_a_field_that_is_wrong_is_named_at_its_input_and_what_was_typed_stays(people, changes, name) -> None:
    answer = send(people.maintenance, "/aircraft/Q9-KTB/restrictions", **(HEAD | LOWER | BLOCK | changes))
    page = Page(answer)

    assert page.status == 422
    assert name in page.faults
    form = next(one for one in page.forms if "typed" in one.values)
    assert form.values["what"] == "Seat belt worn"
    assert form.values[name] == changes[name]
    assert not Provision.objects.exists()


@pytest.mark.parametrize(
    ("changes", "name"),
    [
        ({"rule:0:count": "many"}, "rule:0:count"),
        ({"rule:0:number": ""}, "rule:0:number"),
        ({"rule:0:says": "", "rule:0:count": ""}, "rule:0:says"),
        ({"rule:0:to_engines": "1"}, "rule:0:to_engines"),
        ({"rule:1:says": "every"}, "rule:1:count"),
        ({"title": ""}, "title"),
    ],
)
def test_a_rule_that_is_wrong_is_named_at_its_input(people, changes, name) -> None:
    page = Page(send(people.manager, "/rules", **(RULE | changes)))

    assert page.status == 422
    assert name in page.faults
    assert not Provision.objects.exists()


def test_who_may_not_enter_one_has_no_inputs(people) -> None:
    assert not any("typed" in one.values for one in Page(browser(people.auditor).get("/rules")).forms)
