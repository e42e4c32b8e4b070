"""Rechecks over the API: taken up at once, read while they go on, their table as JSON and as CSV."""

import csv
import io
import uuid

import pytest

from loads.actions.submit_load import submit_load
from loads.actions.work_recheck import work_recheck
from loads.models import Recheck
from loads.queries import rechecks
from loads.queries.recheck_csv import csv_lines
from tests.cast import actor, api, cast, get, post, strangers
from tests.loads.making import load_document
from tests.loads.test_recheck import heavier
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    people = cast()
    ready_aircraft(people)
    return people


def asked(people, **document):
    answer = post(api(people.manager), "/rechecks", {"aircraft": "Q9-KTB", **document})
    assert answer.status_code == 202, answer.content
    return answer


def body_of(answer):
    return b"".join(answer.streaming_content).decode()


def test_it_is_taken_up_at_once_and_read_until_it_is_finished(people):
    weight = heavier(people)
    answer = asked(people, empty_weight=str(weight.id), reason="scale was off")
    begun = answer.json()
    assert (begun["state"], begun["progress"], begun["flights"]) == ("waiting", {"loads": 0, "done": 0}, [])
    assert answer["Location"] == f"/api/v1/rechecks/{begun['id']}"

    while work_recheck(uuid.UUID(begun["id"])) != "finished":
        stands = get(api(people.pilot), f"/rechecks/{begun['id']}").json()
        assert stands["state"] == "running"
    done = get(api(people.pilot), f"/rechecks/{begun['id']}").json()

    assert (done["state"], done["progress"]) == ("finished", {"loads": 1, "done": 1})
    assert done["counts"] == {
        "same": 0,
        "changed": 1,
        "not_computed": 0,
        "other_fit": 0,
        "gone": 0,
        "flagged": 1,
    }
    (flight,) = done["flights"]
    assert (flight["reference"], flight["signed_verdict"], flight["verdict_now"]) == (
        "KT-214",
        "within",
        "outside",
    )
    assert "above the limit" in flight["excess"]


def test_the_same_key_asks_once(people):
    client, key = api(people.manager), str(uuid.uuid4())
    first = post(client, "/rechecks", {"aircraft": "Q9-KTB"}, key=key)
    again = post(client, "/rechecks", {"aircraft": "Q9-KTB"}, key=key)

    assert first.content == again.content
    assert Recheck.objects.count() == 1


def test_the_table_is_csv_by_accept_and_by_address_and_safe_in_a_spreadsheet(people):
    document = load_document(people)
    document["flight"]["reference"] = "=HYPERLINK(1)"
    submit_load(document, by=actor(people.preparer))
    weight = heavier(people)
    number = asked(people, empty_weight=str(weight.id)).json()["id"]
    while work_recheck(uuid.UUID(number)) != "finished":
        pass
    client = api(people.auditor)

    by_address = client.get(f"/api/v1/rechecks/{number}.csv")
    by_accept = client.get(f"/api/v1/rechecks/{number}", headers={"Accept": "text/csv"})

    assert by_address["Content-Type"] == by_accept["Content-Type"] == "text/csv; charset=utf-8"
    text = body_of(by_address)
    assert text == body_of(by_accept)
    rows = list(csv.DictReader(io.StringIO(text)))
    assert {row["flight"] for row in rows} == {"'=HYPERLINK(1)", "KT-214"}
    assert {row["verdict now"] for row in rows} == {"outside"}


@pytest.mark.parametrize("cell", ["=1+1", "+1", "-1", "@x", "\tx", "\rx"])
def test_no_cell_begins_like_a_formula(cell):
    (line,) = csv_lines([("KT-1", cell)])

    assert next(csv.reader(io.StringIO(line, newline="")))[1] == f"'{cell}"


def test_a_long_table_is_read_page_by_page(people, monkeypatch):
    monkeypatch.setattr(rechecks.table_page, "__defaults__", (None, 2))
    for number in range(4):
        document = load_document(people)
        document["flight"]["reference"] = f"KT-{number}"
        submit_load(document, by=actor(people.preparer))
    weight = heavier(people)
    number = asked(people, empty_weight=str(weight.id)).json()["id"]
    while work_recheck(uuid.UUID(number)) != "finished":
        pass

    client, path, seen = api(people.manager), f"/rechecks/{number}", []
    while path:
        page = get(client, path).json()
        seen += [flight["load"] for flight in page["flights"]]
        path = page["next"] and page["next"].removeprefix("/api/v1")

    assert len(seen) == len(set(seen)) == 5


def test_another_operators_recheck_does_not_exist(people):
    number = asked(people).json()["id"]

    stranger = api(strangers().manager)
    for path in (f"/rechecks/{number}", f"/rechecks/{number}.csv"):
        assert get(stranger, path).status_code == 404
    assert get(api(people.manager), "/rechecks/" + str(uuid.uuid4())).status_code == 404


def test_a_wrong_cursor_and_an_unknown_field_are_named(people):
    number = asked(people).json()["id"]
    client = api(people.manager)

    assert get(client, f"/rechecks/{number}?after=x").json()["errors"][0]["pointer"] == "?after"
    refused = post(client, "/rechecks", {"aircraft": "Q9-NONE", "fast": True}).json()
    assert {one["pointer"] for one in refused["errors"]} == {"/aircraft", "/fast"}
