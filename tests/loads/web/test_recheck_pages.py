"""Rechecks on pages: asked by the manager, watched without script, and flags where a flight is looked at."""

import pytest

from loads.actions.work_recheck import work_recheck
from loads.models import Recheck
from tests.cast import api, browser, cast, get
from tests.loads.making import accepted
from tests.loads.test_recheck import finished, heavier
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    people = cast()
    ready_aircraft(people)
    return people


def page(person, path):
    answer = browser(person).get(path)
    assert answer.status_code == 200
    return answer, answer.content.decode()


def test_the_manager_asks_and_the_page_renews_itself_until_it_is_finished(people):
    weight = heavier(people)
    form = {"aircraft": "Q9-KTB", "empty_weight": str(weight.id), "from": "2026-12-01", "to": "2026-12-01"}
    sent = browser(people.manager).post("/rechecks", form | {"reason": "scale was off"})
    recheck = Recheck.objects.get()
    assert sent["Location"] == f"/rechecks/{recheck.id}"

    waiting, text = page(people.pilot, f"/rechecks/{recheck.id}")
    assert waiting["Refresh"]
    assert "<progress" in text
    assert "<script>" not in text
    work_recheck(recheck.id)
    _, text = page(people.pilot, f"/rechecks/{recheck.id}")
    assert "1 of 1 loads" in text
    finished(recheck)
    done, text = page(people.pilot, f"/rechecks/{recheck.id}")

    assert "Refresh" not in done
    assert "1 flagged" in text
    assert "verdict--outside" in text
    assert f"/api/v1/rechecks/{recheck.id}.csv" in text
    assert "6814 lb" in page(people.pilot, "/rechecks")[1]


def test_only_who_may_ask_sees_the_form(people):
    assert "Compute again" in page(people.manager, "/rechecks")[1]
    assert "Compute again" not in page(people.pilot, "/rechecks")[1]
    assert browser(people.pilot).post("/rechecks", {}).status_code == 403


def test_what_is_wrong_stands_beside_its_field(people):
    weight = heavier(people)
    answer = browser(people.manager).post("/rechecks", {"empty_weight": str(weight.id), "from": "soon"})
    assert answer.status_code == 422
    assert "write a day like" in answer.content.decode()

    answer = browser(people.manager).post("/rechecks", {"empty_weight": str(weight.id)})
    assert 'id="empty_weight:fault"' in answer.content.decode()


def test_a_flag_shows_on_the_load_the_documents_the_inspectors_screen_and_the_api(people):
    flown = accepted(people)
    weight = heavier(people)
    browser(people.manager).post("/rechecks", {"aircraft": "Q9-KTB", "empty_weight": str(weight.id)})
    recheck = Recheck.objects.get()
    before = page(people.auditor, f"/loads/{flown.load.id}")[1]
    finished(recheck)

    words = "A later figure puts this flight outside"
    assert words not in before
    for path in (
        f"/loads/{flown.load.id}",
        "/documents",
        "/inspect?aircraft=Q9-KTB&day=2026-12-01",
    ):
        text = page(people.auditor, path)[1]
        assert words in text, path
        assert f"/rechecks/{recheck.id}" in text
    (flag,) = get(api(people.auditor), f"/loads/{flown.load.id}").json()["flags"]
    assert flag["verdict_now"] == "outside"
    assert flag["recheck"] == str(recheck.id)
