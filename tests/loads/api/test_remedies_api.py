"""What would bring a load within, over the API: computed, not stored, and without a name."""

import json

import pytest

from loads.actions.submit_load import submit_load
from loads.balance.engine import ENGINE_VERSION
from loads.balance.remedies.patching import patched
from records.models import Act
from tests.cast import actor, api, cast, strangers
from tests.loads.making import outside_document, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def read(person, path):
    response = api(person).get(f"/api/v1{path}")
    return response, json.loads(response.content)


def assessed(person, document, *, remedies=""):
    path = f"/api/v1/assessments{remedies}"
    response = api(person).post(path, data=json.dumps(document), content_type="application/json")
    return response, json.loads(response.content)


def test_a_reject_is_told_what_would_bring_it_within_and_each_remedy_does_when_it_is_sent_in(people) -> None:
    load = submit_load(outside_document(people), by=actor(people.preparer)).load
    _, stored = read(people.preparer, f"/loads/{load.id}")
    acts = Act.objects.count()

    response, body = read(people.preparer, f"/loads/{load.id}/remedies")

    assert response.status_code == 200
    assert (body["load"], body["step"], body["verdict"]) == (str(load.id), 1, "outside")
    assert body["engine"] == ENGINE_VERSION
    assert body["remedies"]
    assert body["more"] == body["error"] == []
    for remedy in body["remedies"]:
        assert remedy["sentence"].endswith(".")
        assert remedy["mended"]
        assert remedy["next"]["weight"]
        changed = patched(stored["declared"], remedy["change"])
        again, result = assessed(people.preparer, changed)
        assert (again.status_code, result["verdict"]) == (200, "within"), remedy["sentence"]
    assert Act.objects.count() == acts


def test_remedies_name_nobody(people) -> None:
    document = outside_document(people)
    load = submit_load(document, by=actor(people.preparer)).load

    response, _ = read(people.preparer, f"/loads/{load.id}/remedies")

    names = [person["name"] for person in (*document["crew"], *document["passengers"])]
    names += [item["what"] for item in document["items"]]
    text = response.content.decode()
    assert names
    assert not [name for name in names if name in text]


def test_a_load_within_is_told_how_much_more_can_go_and_how_wrong_its_weights_may_be(people) -> None:
    load = submitted(people).load

    _, body = read(people.preparer, f"/loads/{load.id}/remedies")

    assert (body["verdict"], body["remedies"], body["said"]) == ("within", [], "")
    assert {line["kind"] for line in body["more"]} >= {"place", "tank"}
    assert {line["kind"] for line in body["error"]} >= {"people", "fuel-density"}
    assert all(line["stopped_by"] for line in body["more"])


def test_an_assessment_tells_its_remedies_only_when_asked(people) -> None:
    plain, without = assessed(people.preparer, outside_document(people))
    asked, with_them = assessed(people.preparer, outside_document(people), remedies="?remedies=true")
    odd, problem = assessed(people.preparer, outside_document(people), remedies="?remedies=yes")

    assert (plain.status_code, asked.status_code, odd.status_code) == (200, 200, 422)
    assert "remedies" not in without
    assert with_them["remedies"]["remedies"]
    assert {name: part for name, part in with_them.items() if name != "remedies"} == without
    assert problem["errors"][0]["pointer"] == "?remedies"


def test_another_operators_load_is_not_known(people) -> None:
    load = submit_load(outside_document(people), by=actor(people.preparer)).load

    response, _ = read(strangers().manager, f"/loads/{load.id}/remedies")

    assert response.status_code == 404
