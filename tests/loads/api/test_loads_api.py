"""Loads over the API: the whole way of one load, and what bad requests get."""

import copy
import hashlib
import json
from uuid import uuid4

import pytest
from django.utils import timezone

from loads.actions.submit_load import submit_load
from loads.api.answering import written
from loads.balance.engine import ENGINE_VERSION
from loads.models import Assessment, Declaration, Load, Signature, Step
from loads.queries.answer import answer_of
from records.api.render import rendered
from records.models import Act
from records.models.receipt import Receipt
from tests.cast import PASSWORD, actor, api, cast, strangers
from tests.loads.making import accepted, load_document, outside_document, submitted
from tests.makers import make_empty_weight, ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    made = cast()
    ready_aircraft(made)
    return made


def send(person, path, body, *, seen=None, key=None):
    """This function will post a document as the person, with a fresh key and the state seen."""
    headers = {"Idempotency-Key": key or str(uuid4())}
    if seen is not None:
        headers["If-Match"] = seen
    data = body if isinstance(body, bytes) else json.dumps(body)
    return api(person).post(f"/api/v1{path}", data=data, content_type="application/json", headers=headers)


def answer(response):
    return json.loads(response.content)


def rows():
    return tuple(
        model.objects.count() for model in (Load, Declaration, Assessment, Step, Signature, Receipt, Act)
    )


def test_a_load_goes_from_submission_to_departure(people) -> None:
    made = send(people.preparer, "/loads", load_document(people))
    body = answer(made)
    assert (made.status_code, made["ETag"], made["Location"]) == (201, '"1"', f"/api/v1/loads/{body['id']}")
    assert (body["state"], body["verdict"]) == ("open", "within")
    at = f"/loads/{body['id']}"

    signing = {"meaning": "prepared", "digest": body["digest"], "password": PASSWORD}
    prepared = send(people.preparer, f"{at}/signatures", signing, seen='"1"')
    assert (prepared.status_code, prepared["ETag"]) == (200, '"2"')

    signed = send(people.pilot, f"{at}/signatures", signing | {"meaning": "accepted"}, seen='"2"')
    assert (signed.status_code, answer(signed)["state"]) == (200, "accepted")
    assert answer(signed)["manifest"] == {
        "number": 1,
        "issue": 1,
        "href": f"/api/v1/loads/{body['id']}/manifest",
    }

    left = send(people.pilot, f"{at}/departure", {"at": timezone.now().isoformat()}, seen='"3"')
    assert (left.status_code, answer(left)["state"]) == (200, "departed")

    read = answer(api(people.auditor).get(f"/api/v1{at}"))
    assert [step["state"] for step in read["steps"]] == ["open", "prepared", "accepted", "departed"]
    assert [(s["name"], s["meaning"]) for s in read["signatures"]] == [
        ("D. Lorn", "prepared"),
        ("R. Amani", "accepted"),
    ]
    assert read["declared"]["flight"]["departure"] == "2026-12-01T08:30:00-06:00"


def test_the_answer_of_a_submission_holds_the_whole_sum_and_no_name(people) -> None:
    body = answer(send(people.preparer, "/loads", load_document(people)))

    assert {"phases", "checks", "sumsheet", "basis", "digest", "cautions", "governing"} <= set(body)
    assert body["basis"]["engine"] == ENGINE_VERSION
    assert not any(name in json.dumps(body) for name in ("Osei", "Dravo", "Amani"))


def test_the_same_key_gives_the_same_bytes_and_one_load(people) -> None:
    key = str(uuid4())

    first, second = (send(people.preparer, "/loads", load_document(people), key=key) for _ in range(2))

    assert (first.content, second.status_code) == (second.content, 201)
    assert second["Idempotency-Replayed"] == "true"
    assert Load.objects.count() == 1


def test_an_assessment_gives_the_digest_of_the_load_and_stores_nothing(people) -> None:
    before = rows()

    made = api(people.auditor).post(
        "/api/v1/assessments", data=json.dumps(load_document(people)), content_type="application/json"
    )

    assert (made.status_code, rows()) == (200, before)
    assert answer(made)["digest"] == submitted(people).assessment.digest


def test_a_revision_names_its_reason(people) -> None:
    outside = answer(send(people.preparer, "/loads", outside_document(people)))
    path = f"/loads/{outside['id']}/revisions"

    without = send(people.preparer, path, load_document(people), seen='"1"')
    made = send(people.preparer, path, load_document(people) | {"reason": "moved forward"}, seen='"1"')

    assert (without.status_code, answer(without)["errors"][0]["pointer"]) == (422, "/reason")
    assert (made.status_code, answer(made)["replaces"]) == (201, outside["id"])
    old = answer(api(people.pilot).get(f"/api/v1/loads/{outside['id']}"))
    assert (old["state"], old["replaced_by"]) == ("superseded", answer(made)["id"])


def test_a_stale_load_is_assessed_again(people) -> None:
    body = answer(send(people.preparer, "/loads", load_document(people)))
    make_empty_weight(people, Load.objects.get().aircraft)
    at = f"/loads/{body['id']}"
    assert answer(api(people.pilot).get(f"/api/v1{at}"))["stale"] == ["empty weight"]

    again = send(people.preparer, f"{at}/assessment", b"", seen='"1"')

    assert (again.status_code, again["ETag"]) == (200, '"2"')
    assert answer(api(people.pilot).get(f"/api/v1{at}"))["stale"] == []


def test_what_may_be_signed_next_is_shown_word_for_word(people) -> None:
    current = submitted(people)

    read = answer(api(people.pilot).get(f"/api/v1/loads/{current.load.id}"))
    send(
        people.preparer,
        f"/loads/{current.load.id}/signatures",
        {"meaning": "prepared", "digest": read["digest"], "password": PASSWORD},
        seen='"1"',
    )

    assert list(read["to_sign"]) == ["prepared"]
    assert Signature.objects.get().statement == read["to_sign"]["prepared"]


@pytest.mark.parametrize(
    ("change", "status", "code"),
    [
        ({"digest": "0" * 64}, 409, "digest-differs"),
        ({"password": "not it"}, 422, "invalid"),
        ({"password": None}, 422, "invalid"),
        ({"meaning": "seen"}, 422, "invalid"),
        ({"meaning": "loaded"}, 403, "signature-not-allowed"),  # the loading supervisor's alone
        ({"meaning": ["prepared"]}, 422, "invalid"),
        ({"extra": 1}, 422, "invalid"),
    ],
)
def test_a_signature_that_is_not_right_leaves_nothing(people, change, status, code) -> None:
    current = submitted(people)
    signing = {"meaning": "prepared", "digest": current.assessment.digest, "password": PASSWORD}
    before = rows()

    refused = send(people.preparer, f"/loads/{current.load.id}/signatures", signing | change, seen='"1"')

    assert (refused.status_code, answer(refused)["code"], rows()) == (status, code, before)


def test_a_step_needs_the_state_it_is_taken_from(people) -> None:
    current = submitted(people)
    path = f"/loads/{current.load.id}/withdrawal"

    missing = send(people.preparer, path, {"reason": "weather"})
    other = send(people.preparer, path, {"reason": "weather"}, seen='"7"')

    assert (missing.status_code, other.status_code, Step.objects.count()) == (428, 412, 1)


def test_another_operators_load_is_a_404_in_every_way(people) -> None:
    others = strangers()
    current = submitted(people)
    at = f"/loads/{current.load.id}"
    signing = {"meaning": "accepted", "digest": current.assessment.digest, "password": PASSWORD}
    before = rows()

    answers = [
        api(others.pilot).get(f"/api/v1{at}"),
        send(others.pilot, f"{at}/withdrawal", {"reason": "x"}, seen='"1"'),
        send(others.pilot, f"{at}/departure", {"at": timezone.now().isoformat()}, seen='"1"'),
        send(others.pilot, f"{at}/assessment", b"", seen='"1"'),
        send(others.pilot, f"{at}/revisions", load_document(people) | {"reason": "x"}, seen='"1"'),
        send(others.pilot, f"{at}/signatures", signing, seen='"1"'),
    ]

    assert [(one.status_code, answer(one)["code"]) for one in answers] == [(404, "load-not-known")] * 6
    assert rows() == before
    assert answer(api(others.pilot).get("/api/v1/loads"))["loads"] == []


def test_the_list_goes_by_departure_a_page_at_a_time(people) -> None:
    flight = load_document(people)["flight"]
    for hour in (11, 9, 10, 9):
        submitted(people, flight=flight | {"departure": f"2026-12-01T{hour:02}:00:00-06:00"})
    client, path, seen = api(people.auditor), "/api/v1/loads?limit=3", []

    while path:
        page = client.get(path)
        seen += [line["flight"]["departure"][11:13] for line in answer(page)["loads"]]
        path = answer(page)["next"]
        assert page.get("Link", "") == (f'<{path}>; rel="next"' if path else "")

    assert seen == ["09", "09", "10", "11"]


def test_a_later_beginning_counts_for_the_place_a_list_goes_on_from_and_an_earlier_one_does_not(
    people,
) -> None:
    flight = load_document(people)["flight"]
    for hour in (9, 10, 11, 12):
        submitted(people, flight=flight | {"departure": f"2026-12-01T{hour:02}:00:00-06:00"})
    client = api(people.auditor)
    on = answer(client.get("/api/v1/loads?limit=2"))["next"]

    def hours(begin):
        lines = answer(client.get(f"{on}&from=2026-12-01T{begin}:00:00-06:00".replace("limit=2", "limit=9")))
        return [line["flight"]["departure"][11:13] for line in lines["loads"]]

    assert (hours("08"), hours("12")) == (["11", "12"], ["12"])


def test_the_list_is_filtered(people) -> None:
    ready_aircraft(people, "Q9-KTC")
    done = accepted(people)
    other = submitted(people, aircraft="Q9-KTC")
    client = api(people.auditor)

    def listed(query):
        return [line["id"] for line in answer(client.get("/api/v1/loads", query))["loads"]]

    assert listed({"state": "accepted"}) == [str(done.load.id)]
    assert listed({"aircraft": "q9-ktc"}) == [str(other.load.id)]
    assert listed({"verdict": "outside"}) == []
    assert listed({"from": "2026-12-01T14:30:00+00:00", "to": "2026-12-01T14:31:00Z"}) != []
    assert listed({"from": "2026-12-01T14:31:00Z"}) == []


@pytest.mark.parametrize(
    "query",
    [
        "state=flown",
        "verdict=x",
        "limit=0",
        "limit=201",
        "limit=x",
        "cursor=%21",
        "cursor=YWJj",
        "from=2026",
        "sort=x",
    ],
)
def test_a_strange_filter_is_refused(people, query: str) -> None:
    refused = api(people.auditor).get(f"/api/v1/loads?{query}")

    assert (refused.status_code, answer(refused)["errors"][0]["pointer"][0]) == (422, "?")


def mutated(document, path, value):
    changed = copy.deepcopy(document)
    inner = changed
    for step in path[:-1]:
        inner = inner[step]
    if value is ...:
        del inner[path[-1]]
    else:
        inner[path[-1]] = value
    return changed


BAD = [
    (["crew", 0, "weight", "value"], -1, "/crew/0/weight/value"),
    (["crew", 0, "weight", "value"], "1e3", "/crew/0/weight/value"),
    (["crew", 0, "weight", "value"], "181,5", "/crew/0/weight/value"),
    (["crew", 0, "weight", "value"], " 181", "/crew/0/weight/value"),
    (["crew", 0, "weight", "value"], None, "/crew/0/weight/value"),
    (["crew", 0, "weight", "unit"], "stone", "/crew/0/weight/unit"),
    (["crew", 0, "weight", "unit"], ..., "/crew/0/weight/unit"),
    (["crew", 0, "weight"], ..., "/crew/0/weight"),
    (["crew", 0, "seat"], "ROW1-L", "/crew/0/seat"),
    (["crew", 0, "person"], "nobody", "/crew/0/person"),
    (["passengers", 1, "seat"], "ROW1-L", "/passengers/1/seat"),
    (["passengers", 1, "name"], "L. Osei", "/passengers/1/name"),
    (["passengers", 0, "how"], "guessed", "/passengers/0/how"),
    (["items", 0, "place"], "ATTIC", "/items/0/place"),
    (["items", 0, "kind"], "people", "/items/0/kind"),
    (["fuel", "at_engine_start", "LEFT", "value"], 121, "/fuel/at_engine_start/LEFT"),
    (["fuel", "at_engine_start", "MIDDLE"], {"value": 1, "unit": "l"}, "/fuel/at_engine_start/MIDDLE"),
    (["fuel", "at_engine_start", "RIGHT"], ..., "/fuel/at_engine_start/RIGHT"),
    (["fuel", "trip", "value"], 99999, "/fuel/trip"),
    (["fuel", "density", "source"], ..., "/fuel/density/source"),
    (["persons_on_board"], 4, "/persons_on_board"),
    (["persons_on_board"], "3", "/persons_on_board"),
    (["configuration"], "six-seat", "/configuration"),
    (["aircraft"], "Q9-ZZZ", "/aircraft"),
    (["aircraft"], 9, "/aircraft"),
    (["flight", "departure"], "2026-12-01T08:30:00", "/flight/departure"),
    (["flight", "departure"], "tomorrow", "/flight/departure"),
    (["flight", "leg"], 0, "/flight/leg"),
    (["flight"], ..., "/flight"),
    (["schema"], "tarebook.load/2", "/schema"),
    (["limits", 0, "source"], ..., "/limits/0/source"),
    (["unknown"], 1, "/unknown"),
    (["items"], {}, "/items"),
    (["crew"], [], "/crew"),
]


@pytest.mark.parametrize(("path", "value", "pointer"), BAD, ids=[f"{b[2]}-{i}" for i, b in enumerate(BAD)])
def test_a_bad_field_is_named_by_its_pointer_and_nothing_is_stored(people, path, value, pointer) -> None:
    before = rows()

    refused = send(people.preparer, "/loads", mutated(load_document(people), path, value))

    assert refused.status_code == 422, refused.content
    assert refused["Content-Type"] == "application/problem+json"
    assert any(e["pointer"].startswith(pointer) for e in answer(refused)["errors"]), answer(refused)["errors"]
    assert rows() == before


UNREADABLE = [
    b"{",
    b'{"a": 1, "a": 2}',
    b'{"a": NaN}',
    b'{"a": Infinity}',
    b'{"a": 1e9999999}',
    b'{"a": 1234567890123456}',
    b'{"a": "\\u0000"}',
    b'{"a": "\\ud800"}',
    b"[" * 100 + b"]" * 100,
    b'\xff{"a": 1}',
]


@pytest.mark.parametrize("body", UNREADABLE, ids=range(len(UNREADABLE)))
def test_a_body_that_cannot_be_read_is_a_400_and_nothing_is_stored(people, body: bytes) -> None:
    before = rows()

    refused = send(people.preparer, "/loads", body)

    assert (refused.status_code, rows()) == (400, before), refused.content


def test_the_manifest_is_handed_out_as_filed(people) -> None:
    current = accepted(people)
    path = f"/api/v1/loads/{current.load.id}/manifest"

    first, second = (api(people.auditor).get(path, headers={"Accept": "application/pdf"}) for _ in range(2))

    assert (first.status_code, first["Content-Type"], first.content[:5]) == (200, "application/pdf", b"%PDF-")
    assert first.content == second.content
    assert first["ETag"] == f'"{hashlib.sha256(first.content).hexdigest()}"'


def test_a_load_that_was_never_accepted_has_no_manifest(people) -> None:
    current = submitted(people)

    refused = api(people.auditor).get(f"/api/v1/loads/{current.load.id}/manifest")

    assert (refused.status_code, answer(refused)["code"]) == (404, "manifest-not-known")


def test_a_submission_needs_a_key(people) -> None:
    before = rows()

    refused = api(people.preparer).post(
        "/api/v1/loads", data=json.dumps(load_document(people)), content_type="application/json"
    )

    assert (refused.status_code, answer(refused)["code"]) == (400, "idempotency-key-missing")
    assert rows() == before


def test_an_answer_holds_the_bytes_that_writing_it_whole_would_give(people) -> None:
    early = load_document(people)
    early["flight"]["departure"] = "1990-01-01T08:30:00-06:00"  # no version was in force then
    loads = [submitted(people), accepted(people)]
    loads += [submit_load(one, by=actor(people.preparer)) for one in (outside_document(people), early)]

    assert [one.assessment.verdict for one in loads] == ["within", "within", "outside", "unresolved"]
    assert all(written(one, reach=None) == rendered(answer_of(one, reach=None)) for one in loads)
