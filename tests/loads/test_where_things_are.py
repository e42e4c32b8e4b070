"""Floors, running sums, conditions, rails and restraints where people meet them: answer, pages, paper."""

import io
import json
import re
from typing import Any
from uuid import uuid4

import pytest
from pypdf import PdfReader

from loads.actions.file_manifest import manifest_bytes
from loads.actions.submit_load import submit_load
from loads.models import Load
from loads.queries.current import declared_in
from tests.cast import Cast, actor, api, browser, cast
from tests.loads.making import accepted, load_document, prepared
from tests.makers import basis_document, limit, make_aircraft, make_basis, make_empty_weight, page, q
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db


def stations_document() -> dict[str, Any]:
    """The twin whose aft hold has a floor and a net, row 1 on rails, a running sum, an exit at row 2."""
    document = basis_document()
    for seat in document["seats"]:
        if seat["id"].startswith("ROW"):
            seat |= {
                "row": seat["id"][3],
                "infant_restraint": True,
                "exit_row": seat["id"].startswith("ROW2"),
            }
        if seat["id"].startswith("ROW1"):
            settings = [{"setting": "A", "arm": q("136", "in")}, {"setting": "D", "arm": q("141", "in")}]
            seat["rail"] = {
                "forward": q("135", "in"), "aft": q("142", "in"), "settings": settings, "source": page("6-9"),
            }  # fmt: skip
    document["places"][1] |= {
        "floor": {
            "runs": "along",
            "per_area": limit("50", "lb/ft2", "6-11"),
            "per_length": limit("100", "lb/ft", "6-11"),
        },
        "conditional": [{"when": ["NET"], "maximum": limit("300", "lb", "6-11")}],
    }
    document["conditions"] = [{"id": "NET", "name": "net fitted", "source": page("6-11")}]
    steps = [
        {"name": "aft hold", "members": ["AFT-HOLD"], "maximum": limit("300", "lb", "6-12")},
        {"name": "row 2", "members": ["ROW2-L", "ROW2-R"], "maximum": limit("650", "lb", "6-12")},
    ]
    document["cumulative"] = [{"id": "TAIL", "name": "cabin floor", "from": "tail", "steps": steps}]
    return document


@pytest.fixture
def people() -> Cast:
    made = cast()
    aircraft = make_aircraft(made)
    make_basis(made, aircraft, stations_document())
    make_empty_weight(made, aircraft)
    return made


def crate(**more: Any) -> dict[str, Any]:
    # 120 lb and a board of 20 lb on 24 in x 24 in = 4 ft2: 35 lb/ft2, 70 lb/ft.
    board = {"weight": q("20", "lb"), "length": q("24", "in"), "width": q("24", "in"), "lies": "along"}
    return {
        "kind": "cargo", "what": "gearbox", "place": "AFT-HOLD", "weight": q("120", "lb"), "how": "weighed",
        "spreader": board, **more,
    }  # fmt: skip


def full_document(people: Cast, **changes: Any) -> dict[str, Any]:
    document = load_document(
        people, items=[crate()], conditions=["NET"], seat_settings=[{"row": "1", "setting": "A"}]
    )
    document["passengers"][0]["restraint"] = q("9", "lb")
    return document | changes


def post(people: Cast, document: dict[str, Any]) -> tuple[int, dict[str, Any]]:
    response = api(people.preparer).post(
        "/api/v1/loads",
        data=json.dumps(document),
        content_type="application/json",
        headers={"Idempotency-Key": str(uuid4())},
    )
    return response.status_code, json.loads(response.content)


def test_the_answer_has_every_check_with_margin_source_and_stations(people: Cast) -> None:
    status, body = post(people, full_document(people))
    checks = {check["code"]: check for check in body["checks"]}

    assert (status, body["verdict"]) == (201, "within")
    assert checks["floor-area.AFT-HOLD.1"]["actual"] == "35"
    assert checks["floor-run.AFT-HOLD.1"]["margin"] == "30"
    assert checks["place.AFT-HOLD"]["title"] == "aft hold, net fitted"
    assert (checks["place.AFT-HOLD"]["actual"], checks["place.AFT-HOLD"]["limit"]) == ("140", "300")
    assert checks["cumulative.TAIL"]["at"]["stations"] == [
        {"station": "aft hold", "sum": "140", "limit": "300"},
        {"station": "row 2", "sum": "140", "limit": "650"},
    ]
    assert checks["floor-area.AFT-HOLD.1"]["source"] == "FL9-FM rev C p. 6-11"
    assert "declared as fitted: net fitted" in body["advisories"]
    lines = [line["what"] for line in body["sumsheet"]]
    assert "aft hold, spreader of cargo" in lines
    assert "row1 l, restraint" in lines
    assert "gearbox" not in json.dumps(body["checks"])  # what is typed freely may name somebody


def test_a_load_that_leaves_the_footprint_out_is_kept_unresolved_and_says_what_is_needed(
    people: Cast,
) -> None:
    bare = crate()
    del bare["spreader"]

    status, body = post(people, full_document(people, items=[bare]))

    assert (status, body["verdict"]) == (201, "unresolved")
    wanted = [check["what_next"] for check in body["checks"] if check["result"] == "unresolved"]
    assert wanted == ["Enter the footprint of item 1: what touches the floor, not its outline."] * 2


def test_faults_of_all_these_fields_are_named_at_once_and_nothing_is_stored(people: Cast) -> None:
    bad = full_document(
        people,
        conditions=["SKIS"],
        seat_settings=[{"row": "1", "setting": "Q"}],
        items=[crate(net={"weight": q("0", "lb")})],
    )

    status, body = post(people, bad)

    assert status == 422
    assert {fault["pointer"] for fault in body["errors"]} == {
        "/conditions/0",
        "/seat_settings/0/setting",
        "/items/0/net/weight/value",
    }
    assert not Load.objects.exists()


def test_the_page_of_the_load_shows_them_all(people: Cast) -> None:
    current = submit_load(full_document(people), by=actor(people.preparer))

    words = Page(browser(people.pilot).get(f"/loads/{current.load.id}")).words

    for shown in (
        "Aft hold, net fitted",
        "Aft hold, floor load on an area, item 1 (cargo)",
        "35 50 lb/ft2",
        "Cabin floor, tail to aft hold",
        "seats on rails: row1 l at A, row1 r at A",
        "row1 l, restraint",
    ):
        assert shown in words, shown


def test_an_open_seat_on_rails_says_on_the_page_which_end_was_worse(people: Cast) -> None:
    current = submit_load(full_document(people, seat_settings=[]), by=actor(people.preparer))

    words = Page(browser(people.pilot).get(f"/loads/{current.load.id}")).words

    assert re.search(r"seats on rails (forward|aft)", words)
    assert (
        "both ends of the rail checked, no setting stated: row1 l 135 to 142, row1 r 135 to 142 in" in words
    )


def test_the_paper_prints_them_all(people: Cast) -> None:
    current = submit_load(full_document(people), by=actor(people.preparer))
    done = accepted(people, prepared(people, current))

    reader = PdfReader(io.BytesIO(manifest_bytes(people.operator.code, done.load.id)))
    text = re.sub(r"\s+", " ", " ".join(one.extract_text() for one in reader.pages).replace("\u00a0", " "))

    for printed in (
        "aft hold, net fitted",
        "floor load on an area",
        "lb/ft2",
        "tail to aft hold",
        "seats on rails: row1 l at A",
        "spreader of cargo",
        "row1 l, restraint",
    ):
        assert printed.casefold() in text.casefold(), printed


def revised_on_the_page(people: Cast, document: dict[str, Any]) -> dict[str, Any]:
    """Submit a document, revise the load on the page as it stands, and return what the new load declares."""
    current = submit_load(document, by=actor(people.preparer))
    client = browser(people.preparer)
    form = Page(client.get(f"/loads/{current.load.id}/revise")).form("")
    sent = form.filled({"checked": "yes", "reason": "counted again"}, press="submit")
    assert client.post(f"/loads/{current.load.id}/revise", sent).status_code == 302
    return declared_in(Load.objects.get(replaces=current.load))


def test_a_revision_on_the_page_keeps_every_part(people: Cast) -> None:
    document = full_document(people)

    fresh = revised_on_the_page(people, document)

    for part in ("conditions", "seat_settings", "items"):
        assert fresh[part] == document[part], part
    assert fresh["passengers"][0]["restraint"] == q("9", "lb")


def test_a_net_over_an_item_is_kept_by_a_revision_on_the_page(people: Cast) -> None:
    fresh = revised_on_the_page(people, full_document(people, items=[crate(net={"weight": q("4", "lb")})]))

    assert fresh["items"][0]["net"] == {"weight": q("4", "lb")}


def test_the_page_of_the_aircraft_tells_what_the_basis_states(people: Cast) -> None:
    words = Page(browser(people.pilot).get("/aircraft/Q9-KTB")).words

    assert "Where things may be" in words
    for shown in ("50 lb/ft2", "100 lb/ft", "Aft hold, net fitted", "settings A at 136 in, D at 141 in"):
        assert shown in words, shown
