"""The first run: the invented operator flies its day through the real API, once, and leaves a sound trail."""

import json
from collections import Counter
from importlib import import_module

import pypdf
import pytest
from django.test import Client
from pytest_django.live_server_helper import LiveServer

from fleet.models import Operator, Person
from loads.cautions import INVENTED
from loads.models import FiledPaper, Load, Paper, Signature
from loads.queries.listing import Filters, list_loads
from records.models import Act
from service.demo.cast import OPERATOR, PEOPLE
from service.demo.day import FLIGHTS
from tests.journeys.trail import unsound
from tests.reading_pages import Page

# The package's own name `run` is the function in it.
demo = import_module("service.demo.run")


@pytest.fixture(scope="module")
def day(own_database, tmp_path_factory):
    """This fixture will enter the day, with nobody but the server at work, and return its folder."""
    data = tmp_path_factory.mktemp("data")
    server = LiveServer("127.0.0.1")
    with pytest.MonkeyPatch.context() as patch:
        # No worker files anything here: the request that asks for a paper makes it.
        patch.setattr(demo, "PATIENCE", -demo.PATIENCE)
        demo.run(str(server), data)
        yield server, data
    server.stop()


def test_sixteen_flights_end_as_they_should(day) -> None:
    loads = list_loads(OPERATOR.code, Filters(), most=100).loads

    assert len(FLIGHTS) == 16
    assert Counter((one.assessment.verdict, one.state) for one in loads) == {
        ("within", "departed"): 12,
        ("within", "accepted"): 1,
        ("outside", "superseded"): 1,
        ("outside", "open"): 2,
        ("unresolved", "open"): 1,
    }
    assert Load.objects.exclude(operator_id=OPERATOR.code).count() == 0


def test_the_rejects_fail_where_they_were_meant_to(day) -> None:
    loads = list_loads(OPERATOR.code, Filters(), most=100).loads
    failed = {
        one.load.reference: {
            c["code"] for c in one.result()["checks"] if c["result"] in {"fail", "unresolved"}
        }
        for one in loads
        if one.assessment.verdict != "within"
    }

    assert failed["LV-103"] == {"cg.landing", "path.longitudinal"}
    assert failed["KT-207"] == {"weight.zero-fuel"}
    assert "standing.empty-weight" in failed["LV-105"]
    # Inside the certified envelope at take-off, outside the operator's own margin.
    assert {"cg.take-off", "cg.zero-fuel", "cg.landing"} <= failed["WX-403"]


def test_the_commuter_shows_margins_trim_and_index_and_two_loads_change_in_flight(day) -> None:
    results = {
        one.load.reference: one.result() for one in list_loads(OPERATOR.code, Filters(), most=100).loads
    }

    # Of the flaps it states for the take-off alone.
    assert [one["flap"] for one in results["WX-401"]["trim"]["settings"]] == ["10"]
    assert any(check["margin_text"].count("operator's") for check in results["WX-401"]["checks"])
    assert "event 1, leaves" in json.dumps(results["HK-307"]["sumsheet"])
    assert "event 6, leaves" in json.dumps(results["KT-211"]["sumsheet"])


def test_the_reject_of_the_commuter_has_remedies_that_move_people_and_bags(day) -> None:
    page = Page(signed_in(day).get(f"/loads/{Load.objects.get(reference='WX-403').id}"))

    assert "What would bring it within" in page.words


def signed_in(day):
    """This function will return a browser in which a pilot of the invented operator signed in."""
    client = Client()
    client.force_login(Person.objects.get(login="j.corvane"))
    return client


def test_every_accepted_load_has_its_numbered_paper_in_the_folder_and_in_the_record(day) -> None:
    _, data = day
    papers = sorted((data / "papers").glob("*.pdf"))

    assert len(papers) == 13
    assert list(Paper.objects.order_by("number").values_list("number", flat=True)) == list(range(1, 14))
    assert FiledPaper.objects.count() == 13
    assert Signature.objects.count() == 26
    for path in papers:
        text = pypdf.PdfReader(path).pages[0].extract_text()
        assert INVENTED in text
        assert path.stem.removeprefix("manifest-")[4:] in text


def test_the_trail_of_the_day_is_sound(day) -> None:
    assert Act.objects.count() > 50
    assert unsound() == ()


def test_a_second_start_enters_nothing_again(day, capsys) -> None:
    server, data = day
    before = (Act.objects.count(), Load.objects.count(), Person.objects.count())

    demo.run(str(server), data)

    assert (Act.objects.count(), Load.objects.count(), Person.objects.count()) == before
    assert "already entered" in capsys.readouterr().out


def test_a_try_that_was_cut_short_goes_on_without_a_second_effect(day, capsys) -> None:
    server, data = day
    kept = data / "invented-operator.json"
    notes = json.loads(kept.read_text("utf-8"))
    before = (Act.objects.count(), Load.objects.count(), Person.objects.count())
    kept.write_text(json.dumps(notes | {"entered": False}), "utf-8")

    demo.run(str(server), data)

    assert (Act.objects.count(), Load.objects.count(), Person.objects.count()) == before
    said = capsys.readouterr().out
    assert "KT-201" in said
    assert "What would bring WX-403 within, each alone:\n  " in said


def test_the_operator_is_marked_as_invented_and_everybody_has_their_duty(day) -> None:
    operator = Operator.objects.get(code=OPERATOR.code)

    assert operator.invented
    assert {person.login for person in operator.people.all()} == {one.login for one in PEOPLE}


def test_the_notes_are_readable_by_their_owner_alone(day) -> None:
    _, data = day

    assert (data / "invented-operator.json").stat().st_mode & 0o077 == 0
