"""Commands of Django: their names, whose database they work on, and the codes they end with."""

import os
import runpy
import sys
from pathlib import Path

import pytest

from service.bootstrap import dispatch
from service.bootstrap.environment import ROOT
from service.embedded.postgres import Cluster
from service.embedded.stopped import Stopped
from service.start import other
from service.start.data_folder import DataFolder


@pytest.fixture
def executed(monkeypatch):
    """Note what would be handed to Django; the environment is put back afterwards."""
    seen: list[list[str]] = []
    monkeypatch.setattr(other, "_execute", lambda arguments: seen.append(arguments) or 0)
    monkeypatch.setattr(os, "environ", os.environ.copy())
    for name in ("DATABASE_URL", "OWNER_DATABASE_URL", "DATABASE_URL_FILE"):
        os.environ.pop(name, None)
    return seen


@pytest.fixture
def cluster(tmp_path: Path, monkeypatch) -> Cluster:
    """A data folder on which the database seems to run."""
    found = Cluster(tmp_path / "postgres", tmp_path / "run", {"tarebook_owner": "o", "tarebook_service": "s"})
    monkeypatch.setattr(other, "default_path", lambda: tmp_path)
    monkeypatch.setattr(other.postgres, "find", lambda _: found)
    monkeypatch.setattr(other.valkey, "address", lambda _: "redis+socket:///nonexistent/valkey.sock")
    DataFolder(tmp_path).secret_key()
    return found


def test_a_name_with_hyphens_is_djangos_with_underscores(executed, cluster):
    other.run_django(["enter-operator", "--login", "a-b"])

    assert executed == [["enter_operator", "--login", "a-b"]]


@pytest.mark.parametrize(
    ("words", "handed_on"),
    [
        (["verify"], ["verify"]),
        (["migrate"], ["migrate", "--database", "owner"]),
        (["showmigrations", "fleet"], ["showmigrations", "fleet", "--database", "owner"]),
        (["migrate", "--database", "default"], ["migrate", "--database", "default"]),
    ],
)
def test_commands_work_as_the_service_and_migrations_as_the_owner(words, handed_on, executed, cluster):
    other.run_django(words)

    assert executed == [handed_on]
    assert os.environ["DATABASE_URL"].startswith("postgresql://tarebook_service:s@/tarebook?host=")
    assert os.environ["OWNER_DATABASE_URL"].startswith("postgresql://tarebook_owner:o@/tarebook?host=")


@pytest.mark.parametrize("name", ["DATABASE_URL", "DATABASE_URL_FILE"])
def test_a_database_named_in_the_environment_is_the_one_used(name: str, executed, cluster):
    os.environ[name] = "as given"

    other.run_django(["verify"])

    assert executed == [["verify"]]
    assert "OWNER_DATABASE_URL" not in os.environ


def test_making_migrations_needs_no_database(executed, cluster):
    other.run_django(["makemigrations", "--check"])

    assert "/nonexistent" in os.environ["DATABASE_URL"].replace("%2F", "/")


def test_a_command_that_ends_with_a_code_or_a_word_ends_so(monkeypatch, capsys):
    def ending(with_what: object):
        def run(_: list[str]) -> None:
            raise SystemExit(with_what)

        return run

    codes = []
    for with_what in (None, 0, 2, "no such thing"):
        monkeypatch.setattr("django.core.management.execute_from_command_line", ending(with_what))
        codes.append(other._execute(["verify"]))

    assert codes == [0, 0, 2, 1]
    assert capsys.readouterr().err == "no such thing\n"


def test_what_stops_a_command_is_one_sentence_and_code_2(monkeypatch, capsys):
    def stopped(_: list[str]) -> int:
        raise Stopped("Nothing goes on; do this next.")

    monkeypatch.setattr(other, "run_django", stopped)

    assert dispatch.run(["verify"]) == 2
    assert capsys.readouterr().err == "Tarebook: Nothing goes on; do this next.\n"


def test_without_a_command_help_is_shown(monkeypatch):
    seen: list[list[str]] = []
    monkeypatch.setattr(other, "run_django", lambda arguments: seen.append(arguments) or 0)

    assert dispatch.run([]) == 0

    assert seen == [["help"]]


def test_an_older_python_is_told_which_one_is_needed(monkeypatch):
    monkeypatch.setattr(sys, "version_info", (3, 9))

    with pytest.raises(SystemExit, match=r"needs Python 3\.11 or newer; this is 3\.9\."):
        runpy.run_path(str(ROOT / "manage.py"))
