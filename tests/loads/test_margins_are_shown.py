"""An operator's margins and a presentation of moments: entered in a basis, then seen on the pages of the load
and of the aircraft, on the paper, and over the API.
"""

import json

import pytest

from loads.actions.submit_load import submit_load
from loads.manifest.gathering import facts_of
from loads.manifest.printing import html_of
from loads.models import Paper
from tests.cast import actor, api, browser, cast
from tests.loads.making import accepted, load_document
from tests.makers import basis_document, make_aircraft, make_basis, make_empty_weight, q
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db

MARGIN = {
    "id": "SEATING",
    "for": "seating variation",
    "phases": ["take-off", "landing"],
    "amounts": [{"forward": q("2100", "lb in"), "aft": q("2600", "lb in")}],
    "source": {"document": "OM-A", "revision": "4", "page": "8-12"},
}
SHOWN = {
    "index": {
        "reference_arm": q("125", "in"),
        "divisor": q("1000", "lb in"),
        "constant": "40",
        "source": {"page": "6-20"},
    },
    "moment_divisor": {"value": "100", "source": {"page": "6-20"}},
}


@pytest.fixture
def people():
    made = cast()
    aircraft = make_aircraft(made)
    make_basis(made, aircraft, basis_document(curtailments=[MARGIN], presentation=SHOWN))
    make_empty_weight(made, aircraft)
    return made


def test_the_page_of_a_load_shows_both_envelopes_the_margin_and_the_index(people) -> None:
    current = submit_load(load_document(people), by=actor(people.preparer))

    answer = browser(people.pilot).get(f"/loads/{current.load.id}")
    page, text = Page(answer), answer.content.decode()

    for words in (
        "certified",
        "operator's",
        "seating variation",
        "index",
        "Moment / 100",
        "OM-A rev 4 p. 8-12",
    ):
        assert words in page.words, words
    assert 'stroke-linecap="round"' in text
    assert "operational:" in page.words


def test_the_page_of_the_aircraft_shows_the_margin_and_the_formula(people) -> None:
    page = Page(browser(people.pilot).get("/aircraft/Q9-KTB"))

    assert "Operator's margin SEATING: seating variation, at take-off, landing" in page.words
    assert "forward 2100 lb in, aft 2600 lb in" in page.words
    assert "weight x (arm - 125 in) / 1000 lb in + 40" in page.words


def test_the_paper_prints_them_and_the_statement_holds_them(people) -> None:
    current = accepted(people)

    facts = facts_of(Paper.objects.get(load=current.load))
    paper = html_of(facts)

    assert "seating variation" in paper
    assert "moment / 100" in paper
    assert 'stroke-linecap="round"' in paper
    statement = json.loads(facts.statement)
    assert statement["result"]["presentation"]["moment_divided"]["divisor"] == "100"


def test_the_api_answers_with_them(people) -> None:
    answered = api(people.pilot).post(
        "/api/v1/assessments", data=json.dumps(load_document(people)), content_type="application/json"
    )

    body = answered.json()
    check = next(check for check in body["checks"] if check["code"] == "cg.take-off")
    assert check["curtailed"]["certified"]["within"] is True
    assert check["curtailed"]["margins"][0]["source"] == "OM-A rev 4 p. 8-12"
    assert body["presentation"]["index"]["constant"] == "40"
    assert all("index" in line for line in body["sumsheet"])


def test_a_basis_whose_margins_leave_nothing_is_refused_over_the_api(people) -> None:
    huge = MARGIN | {"amounts": [{"forward": q("90", "in")}]}
    document = basis_document(curtailments=[huge])

    refused = api(people.maintenance).post(
        "/api/v1/aircraft/Q9-KTB/loading-bases",
        data=json.dumps(document),
        content_type="application/json",
        headers={"Idempotency-Key": "margins-1"},
    )

    assert refused.status_code == 422
    fault = refused.json()["errors"][0]
    assert (fault["pointer"], fault["code"]) == ("/curtailments/0/amounts", "curtailment-too-large")
