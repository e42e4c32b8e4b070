"""Whatever is sent to a page: an answer below 500, in reasonable time, and nothing stored."""

import time

import pytest
from django.conf import settings

from loads.models import Load, Step
from tests.cast import browser
from tests.loads.making import accepted
from tests.loads.web.test_declare_page import FIGURES, FITTED

# Drawn once by hand: two test processes must agree on the names of the tests.
NOBODYS = "6ccc6faa-99aa-4d26-bf9d-bb8a4f98a7bf"

pytestmark = pytest.mark.django_db
LONG = "9" * 60_000
# The choices a browser sends from lists whose first line is no empty one.
UNITS = {
    "seat:COCKPIT-L:unit": "lb", "seat:ROW1-L:unit": "lb", "seat:ROW1-R:unit": "lb", "item:0:unit": "lb",
    "tank:LEFT:unit": "US gal", "tank:RIGHT:unit": "US gal", "density:unit": "lb/US gal",
    "taxi:unit": "lb", "trip:unit": "lb", "minimum_at_landing:unit": "lb",
    "limit:0:unit": "lb", "limit:0:at": "take-off",
}  # fmt: skip

NONSENSE = [
    {"aircraft": "\x00"},
    {"aircraft": "Q9-KTB\x00"},
    {"aircraft": "🛩" * 200},
    {"aircraft": LONG},
    {"date": "\x00", "time": "\x00"},
    {"date": "2026-12-01T", "time": "07:30"},
    {"date": "2026-12-01", "time": "07:30+99:99"},
    {"date": "0001-01-01", "time": "00:00"},
    {"date": "9999-12-31", "time": "23:59:59.999999"},
    {"configuration": "\x00"},
    {"configuration": LONG},
    {"leg": LONG},
    {"leg": "²"},
    {"leg": "-0"},
    {"persons_on_board": LONG},
    {"persons_on_board": "٣"},
    {"persons_on_board": "1e9999999"},
    {"density": "1e9999999"},
    {"density": LONG},
    {"density:unit": "\x00"},
    {"trip": "Infinity"},
    {"trip": "NaN"},
    {"tank:LEFT:unit": "furlong"},
    {"tank:LEFT:quantity": "\x00"},
    {"seat:COCKPIT-L:person": "\x00"},
    {"seat:COCKPIT-L:person": LONG},
    {"seat:COCKPIT-L:name": "\u202egnp.exe"},
    {"seat:COCKPIT-L:name": LONG},
    {"seat:COCKPIT-L:position": "🧑‍✈️"},
    {"seat:ROW1-L:category": "\x00"},
    {"limit:0:source": LONG},
]
# What no form of ours sends and no load is the worse for: names nobody reads, and words that are only words.
HARMLESS = [
    {"item:999999999:what": "x"},
    {"item:²:what": "x"},
    {"item:-1:what": "x"},
    {"item:": "x", "item": "x", ":": "x"},
    {"limit:999999999:weight": "x"},
    {"item:0:what": "'; DROP TABLE loads_load; --"},
    {"item:0:what": "{{ 7 }}{% now 'Y' %}"},
    {"csrfmiddlewaretoken": LONG},
    {"step": LONG},
    {"next": "//elsewhere.example"},
    {"date": "2026-W49-2", "time": "07"},
]


def named(changes):
    return ascii(next(iter(changes.items())))[:40]


@pytest.fixture
def client(people):
    return browser(people.preparer)


def kept():
    return Load.objects.count(), Step.objects.count()


def quick(send, *args):
    """This function will send and say that the answer was no failure, and soon."""
    began = time.monotonic()
    answer = send(*args)
    assert answer.status_code < 500
    assert time.monotonic() - began < 10
    return answer


@pytest.mark.parametrize("changes", NONSENSE, ids=named)
def test_a_declaration_of_nonsense_is_answered_and_not_stored(client, people, changes) -> None:
    before = kept()
    load = FITTED | FIGURES | UNITS | {"seat:COCKPIT-L:person": people.pilot.login}

    for query in (changes, FITTED | changes):
        assert quick(client.get, "/declare", query).status_code == 200
    computed = quick(client.post, "/declare", load | changes)
    submitted = quick(client.post, "/declare", load | {"do": "submit"} | changes)

    # An aircraft or a configuration that is none leads back to the first page.
    expected = 200 if set(changes) & {"aircraft", "configuration"} else 422
    assert (computed.status_code, submitted.status_code) == (expected, expected)
    assert kept() == before


@pytest.mark.parametrize("changes", HARMLESS, ids=named)
def test_what_nobody_asked_for_does_not_keep_a_load_from_being_submitted(client, people, changes) -> None:
    loads, _ = kept()
    load = FITTED | FIGURES | UNITS | {"seat:COCKPIT-L:person": people.pilot.login, "do": "submit"}

    quick(client.get, "/declare", FITTED | changes)
    answer = quick(client.post, "/declare", load | changes)

    assert answer.status_code == 302
    assert kept()[0] == loads + 1
    assert quick(client.get, answer["Location"]).status_code == 200


def test_a_revision_of_nonsense_is_answered_and_replaces_nothing(client, people) -> None:
    current = accepted(people)
    before = kept()
    at = f"/loads/{current.load.id}/revise"

    for changes in (*NONSENSE, *HARMLESS, {"do": "\x00"}):
        answer = quick(client.post, at, FITTED | FIGURES | UNITS | {"do": "submit", "step": "3"} | changes)
        assert answer.status_code in {200, 409, 412, 422}

    assert quick(client.get, at, {"step": LONG, "item:999999999:what": "x"}).status_code == 200
    assert kept() == before


@pytest.mark.parametrize("action", ["sign", "withdraw", "depart", "assess"])
def test_a_step_of_nonsense_is_answered_and_nothing_moves(client, people, action) -> None:
    current = accepted(people)
    before = kept()

    for name in ("step", "reason", "meaning", "digest", "password"):
        for value in ("\x00", LONG, "", "🛩", "-1", "3\r\nX: y"):
            sent = {"meaning": "prepared", "reason": "because", "step": "2", name: value}
            answer = quick(client.post, f"/loads/{current.load.id}/{action}", sent)
            assert answer.status_code in {403, 412, 422}

    assert kept() == before


def test_an_input_with_a_name_longer_than_any_is_refused(client) -> None:
    answer = quick(client.post, "/declare", FITTED | {f"item:{LONG[:6000]}:what": "x"})

    assert answer.status_code in {200, 400, 422}


@pytest.mark.parametrize(
    ("method", "path"),
    [
        ("get", f"/loads/{NOBODYS}"),
        ("get", f"/loads/{NOBODYS}/manifest"),
        ("get", f"/loads/{NOBODYS}/revise"),
        ("post", f"/loads/{NOBODYS}/sign"),
        ("post", f"/loads/{NOBODYS}/withdraw"),
        ("get", "/loads/none"),
        ("get", "/loads/%00"),
        ("get", "/aircraft/%00"),
        ("get", "/aircraft/%F0%9F%9B%A9"),
        ("get", f"/aircraft/{'A' * 5000}"),
        ("get", "/aircraft/..%2F..%2Fetc%2Fpasswd"),
        ("get", "/%FF%FE"),
        ("post", "/"),
        ("put", "/declare"),
        ("delete", "/declare"),
    ],
)
def test_an_address_that_names_nothing_is_a_page_that_says_so(client, method, path) -> None:
    answer = quick(getattr(client, method), path)

    assert answer.status_code in {404, 405}


def test_more_fields_than_any_load_has_are_refused(client) -> None:
    more = {f"field{n}": "x" for n in range(settings.DATA_UPLOAD_MAX_NUMBER_FIELDS)}

    answer = quick(client.post, "/declare", FITTED | more)

    assert answer.status_code == 400


def test_a_body_that_is_too_large_is_refused(client) -> None:
    answer = quick(client.post, "/declare", FITTED | {"reference": "x" * 2_000_000})

    assert answer.status_code in {400, 413}


def test_a_body_that_is_no_form_is_an_empty_form(client) -> None:
    body = b"\xff\xfe{not a form"

    answer = client.post("/declare", body, content_type="multipart/form-data; boundary=x")
    other = client.post("/declare", body, content_type="application/json")

    assert answer.status_code in {200, 400}
    assert other.status_code == 200


def test_the_largest_load_the_page_offers_is_sent_whole(client, people) -> None:
    figures = FIGURES | {"seat:COCKPIT-L:person": people.pilot.login}
    for row in range(200):
        figures |= {
            f"item:{row}:kind": "cargo", f"item:{row}:what": f"box {row}", f"item:{row}:place": "AFT-HOLD",
            f"item:{row}:weight": "1", f"item:{row}:unit": "lb", f"item:{row}:how": "weighed",
        }  # fmt: skip
    sent = FITTED | figures | UNITS | {"do": "submit"}

    answer = quick(client.post, "/declare", sent)

    assert answer.status_code == 302
    assert b"box 199" in client.get(answer["Location"]).content
    assert client.get(f"{answer['Location']}/revise").status_code == 200
