"""`manage.py recheck` from a terminal: the work done here, the table, the CSV, refusals in a sentence."""

import csv

import pytest
from django.core.management import CommandError, call_command

from loads.models import LoadFlag, Recheck
from records.models import Act, Outbox
from tests.cast import cast, strangers
from tests.loads.making import submitted
from tests.loads.test_recheck import heavier
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db


@pytest.fixture
def people():
    people = cast()
    ready_aircraft(people)
    return people


def test_it_computes_prints_a_table_and_writes_all_of_it(people, capsys, tmp_path):
    weight = heavier(people)
    file = tmp_path / "table.csv"

    call_command(
        "recheck", "Q9-KTB", "--empty-weight", str(weight.id), "--csv", str(file), "--reason", "scale"
    )

    out = capsys.readouterr().out
    assert "1 loads: 0 with the same verdict, 1 with another" in out
    assert "1 flagged" in out
    assert "KT-214" in out
    (row,) = csv.DictReader(file.read_text(encoding="utf-8").splitlines())
    assert (row["signed verdict"], row["verdict now"], row["code"]) == ("within", "outside", "weight.ramp")
    recheck = Recheck.objects.get()
    assert Act.objects.get(id=recheck.act).actor_key == "service:command"
    assert Outbox.objects.get(key=str(recheck.id)).done_at is not None
    assert LoadFlag.objects.count() == 1


def test_without_an_aircraft_it_takes_the_whole_operator_once_it_is_clear_which(people, capsys):
    submitted(people)
    call_command("recheck")
    assert "1 loads: 1 with the same verdict" in capsys.readouterr().out

    strangers()
    with pytest.raises(CommandError, match="--operator"):
        call_command("recheck")
    call_command("recheck", "--operator", "kestrel-test")
    assert Recheck.objects.count() == 2


@pytest.mark.parametrize(
    ("words", "said"),
    [
        (["Q9-NONE"], "No such aircraft"),
        (["Q9-KTB", "--empty-weight", "seven"], "write the id of a version"),
        (["Q9-KTB", "--from", "soon"], "write date, time and offset"),
    ],
)
def test_what_cannot_be_done_is_said_in_a_sentence(people, words, said):
    with pytest.raises(CommandError, match=said):
        call_command("recheck", *words)
    assert not Recheck.objects.exists()
