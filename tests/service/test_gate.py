"""The gate is green only when everything passed, and shows each step with its seconds."""

import subprocess
import sys

import pytest

from service import gate
from service.bootstrap.environment import ROOT


@pytest.fixture
def tests_end_with(monkeypatch):
    asked: list[list[str]] = []

    def end_with(code: int) -> list[list[str]]:
        monkeypatch.setattr(gate, "_pytest", lambda words: asked.append(words) or code)
        return asked

    return end_with


def test_all_steps_and_then_all_tests(tests_end_with, monkeypatch, capsys):
    asked = tests_end_with(0)
    monkeypatch.setattr(
        gate, "_steps", lambda: (gate.Step("format", lambda: True), gate.Step("lint", lambda: True))
    )

    assert gate.gate([]) == 0

    said = capsys.readouterr().out
    assert "format: passed in" in said
    assert "lint: passed in" in said
    assert asked == [["-n", "2", "--dist", "loadfile"]]


def test_one_red_step_makes_it_red_though_the_tests_run_and_pass(tests_end_with, monkeypatch, capsys):
    asked = tests_end_with(0)
    monkeypatch.setattr(
        gate, "_steps", lambda: (gate.Step("types", lambda: False), gate.Step("lint", lambda: True))
    )

    assert gate.gate([]) == 1

    assert "RED before the tests: types." in capsys.readouterr().out
    assert len(asked) == 1


def test_arguments_go_to_pytest_alone(tests_end_with, monkeypatch):
    asked = tests_end_with(0)
    monkeypatch.setattr(gate, "_steps", lambda: pytest.fail("no step is wanted"))

    assert gate.gate(["tests/pure", "-q"]) == 0
    assert asked == [["tests/pure", "-q"]]


@pytest.mark.parametrize("code", [1, 2, 3, 4, 5])
def test_no_exit_code_of_pytest_but_zero_is_green(code: int, tests_end_with, monkeypatch):
    tests_end_with(code)
    monkeypatch.setattr(gate, "_steps", tuple)

    assert gate.gate([]) == code


def test_a_run_that_finds_no_test_is_red_and_its_closing_line_is_last():
    words = "import sys; from service.gate import gate; sys.exit(gate(['tests/pure', '-k', 'zzzz']))"

    done = subprocess.run(
        [sys.executable, "-c", words], cwd=ROOT, capture_output=True, text=True, check=False
    )

    assert done.returncode == 5
    assert "deselected in" in done.stdout.splitlines()[-1]


def test_continuous_integration_runs_the_same_command():
    script = (ROOT / ".ci" / "run").read_text()

    assert 'exec python3 manage.py test "$@"' in script
