"""The trail over the API: filters, pages, one act, other operators, bad parameters."""

import hashlib

import pytest

from tests.cast import api, cast, get, strangers
from tests.loads.making import accepted, prepared, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def test_the_trail_of_a_load_is_its_life_newest_first(people) -> None:
    current = accepted(people, prepared(people, submitted(people)))

    answer = get(api(people.auditor), f"/trail?about=load:{current.load.id}")

    acts = answer.json()["acts"]
    assert [one["kind"] for one in acts] == ["accept-load", "prepare-load", "submit-load"]
    assert acts[0]["sentence"].startswith("R. Amani accepted a load: Q9-KTB KT-214, XNAL to XKOR")
    assert answer.json()["next"] is None


def test_pages_follow_by_the_link(people) -> None:
    client, path, seen = api(people.auditor), "/trail?limit=4", []
    while path:
        answer = get(client, path)
        seen += [one["act"] for one in answer.json()["acts"]]
        following = answer.json()["next"]
        assert (following is None) == ("Link" not in answer)
        path = following.removeprefix("/api/v1") if following else ""

    assert len(seen) > 8
    assert len(set(seen)) == len(seen)
    assert seen == [one["act"] for one in get(client, "/trail?limit=200").json()["acts"]]


def test_one_act_gives_the_text_its_digest_is_of(people) -> None:
    client = api(people.auditor)
    newest = get(client, "/trail?limit=1").json()["acts"][0]

    act = get(client, f"/trail/{newest['act']}").json()

    assert hashlib.sha256(b"\x00" + act["entry"].encode()).hexdigest() == act["digest"] == newest["digest"]


def test_kinds_and_actors_are_filters(people) -> None:
    client = api(people.auditor)

    kinds = get(client, "/trail?kind=enter-aircraft").json()["acts"]
    actors = get(client, f"/trail?actor=person:{people.approver.pk}").json()["acts"]

    assert [one["kind"] for one in kinds] == ["enter-aircraft"]
    assert {one["kind"] for one in actors} == {"approve-loading-basis", "approve-empty-weight"}


def test_another_operators_acts_are_not_known(people) -> None:
    act = get(api(people.auditor), "/trail?limit=1").json()["acts"][0]["act"]
    others = api(strangers().manager)

    assert get(others, f"/trail/{act}").status_code == 404
    assert act not in str(get(others, "/trail?limit=200").json())


def test_who_has_no_duty_reads_nothing(people) -> None:
    assert get(api(people.idle), "/trail").status_code == 403


@pytest.mark.parametrize(
    ("query", "pointer"),
    [
        ("kind=fly", "?kind"),
        ("limit=0", "?limit"),
        ("limit=1e2", "?limit"),
        ("limit=201", "?limit"),
        ("cursor=xyz", "?cursor"),
        ("cursor=%F0%9F%9B%A9", "?cursor"),
        ("from=yesterday", "?from"),
        ("colour=red", "?colour"),
        ("about=%00", "?about"),
    ],
)
def test_parameters_that_make_no_sense_are_named(people, query, pointer) -> None:
    answer = get(api(people.auditor), f"/trail?{query}")

    assert answer.status_code == 422
    assert [error["pointer"] for error in answer.json()["errors"]] == [pointer]
