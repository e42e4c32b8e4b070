"""The first run: the invented operator flies its day through the real API, once, and leaves a sound trail."""

import json
from collections import Counter
from importlib import import_module

import pypdf
import pytest
from pytest_django.live_server_helper import LiveServer

from fleet.models import Operator, Person
from loads.cautions import INVENTED
from loads.models import FiledPaper, Load, Paper, Signature
from loads.queries.listing import Filters, list_loads
from records.models import Act
from service.demo.cast import OPERATOR, PEOPLE
from service.demo.day import FLIGHTS
from tests.journeys.trail import unsound

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


def test_twelve_flights_end_as_they_should(day) -> None:
    loads = list_loads(OPERATOR.code, Filters(), most=100).loads

    assert len(FLIGHTS) == 12
    assert Counter((one.assessment.verdict, one.state) for one in loads) == {
        ("within", "departed"): 9,
        ("within", "accepted"): 1,
        ("outside", "superseded"): 1,
        ("outside", "open"): 1,
        ("unresolved", "open"): 1,
    }
    assert Load.objects.exclude(operator_id=OPERATOR.code).count() == 0


def test_the_two_rejects_fail_where_they_were_meant_to(day) -> None:
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


def test_every_accepted_load_has_its_numbered_paper_in_the_folder_and_in_the_record(day) -> None:
    _, data = day
    papers = sorted((data / "papers").glob("*.pdf"))

    assert len(papers) == 10
    assert list(Paper.objects.order_by("number").values_list("number", flat=True)) == list(range(1, 11))
    assert FiledPaper.objects.count() == 10
    assert Signature.objects.count() == 20
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
    assert "KT-201" in capsys.readouterr().out


def test_the_operator_is_marked_as_invented_and_everybody_has_their_duty(day) -> None:
    operator = Operator.objects.get(code=OPERATOR.code)

    assert operator.invented
    assert {person.login for person in operator.people.all()} == {one.login for one in PEOPLE}


def test_the_notes_are_readable_by_their_owner_alone(day) -> None:
    _, data = day

    assert (data / "invented-operator.json").stat().st_mode & 0o077 == 0
