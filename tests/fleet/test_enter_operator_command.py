"""`manage.py enter-operator`: the first real operator and its first person."""

from io import StringIO
from pathlib import Path

import pytest
from django.core.management import CommandError, call_command

from fleet.management.commands import enter_operator
from fleet.models import Operator, Person
from records.models import Act
from tests.cast import PASSWORD

pytestmark = pytest.mark.django_db


def run(password_file: Path | None, **changes: object) -> str:
    out = StringIO()
    options = {
        "code": "new-air",
        "name": "New Air",
        "time_zone": "America/Denver",
        "rule_set": "US",
        "procedure": "Operations manual, section 8",
        "weight_method": "weighed",
        "login": "o.keel",
        "person_name": "O. Keel",
        "password_file": password_file,
    }
    call_command("enter_operator", stdout=out, **(options | changes))
    return out.getvalue()


@pytest.fixture
def password_file(tmp_path: Path) -> Path:
    file = tmp_path / "password"
    file.write_text(f"{PASSWORD}\n", encoding="utf-8")
    return file


def test_an_operator_and_its_first_person_are_entered(password_file: Path) -> None:
    said = run(password_file, estimates_may_be_signed=True, two_to_sign=True)

    operator = Operator.objects.get(code="new-air")
    assert operator.estimates_may_be_signed
    assert not operator.prepare_and_accept_by_one
    assert not operator.invented
    assert Person.objects.get(login="o.keel").check_password(PASSWORD)
    assert "o.keel" in said
    assert PASSWORD not in said
    assert Act.objects.get(kind="enter-operator").actor_key == "service:set-up"


def test_the_password_is_asked_for_twice_without_a_file(monkeypatch: pytest.MonkeyPatch) -> None:
    answers = iter([PASSWORD, PASSWORD, PASSWORD, "something else entirely"])
    monkeypatch.setattr(enter_operator, "getpass", lambda _prompt: next(answers))

    run(None)
    with pytest.raises(CommandError, match="differ"):
        run(None, code="other-air", login="other")

    assert [operator.code for operator in Operator.objects.all()] == ["new-air"]


def test_what_is_wrong_is_said_field_by_field(password_file: Path, tmp_path: Path) -> None:
    with pytest.raises(CommandError, match=r"^time_zone: "):
        run(password_file, time_zone="Mars/Olympus")
    with pytest.raises(CommandError, match=r"^code: "):
        run(password_file, code="House")
    with pytest.raises(CommandError, match="cannot be read"):
        run(tmp_path / "absent")

    assert not Operator.objects.exists()
