"""The folder of packages: kept while it fits, made again when it does not, a stranger's left alone."""

import json
import subprocess
import sys
import time
from pathlib import Path

import pytest

from service.bootstrap import environment
from service.embedded.stopped import Stopped


@pytest.fixture
def made(tmp_path, monkeypatch):
    """Stand in for the installers: each makes a working Python and notes what it was asked for."""
    asked: list[tuple[str, str]] = []

    def installer(name: str):
        def make(place: Path, lock: str) -> bool:
            asked.append((name, lock))
            (place / "bin").mkdir(exist_ok=True)
            if not environment.python().exists():
                environment.python().symlink_to(sys.executable)
            return True

        return make

    monkeypatch.setenv("TAREBOOK_VENV", str(tmp_path / "venv"))
    monkeypatch.setattr(environment, "_uv", lambda: True)
    monkeypatch.setattr(environment, "_with_uv", installer("uv"))
    monkeypatch.setattr(environment, "_with_pip", installer("pip"))
    return asked


def test_it_is_made_once_and_then_kept(made):
    first = environment.ensure("run")

    assert environment.ensure("run") == first == environment.python()
    assert made == [("uv", "requirements.lock")]


def test_pip_makes_it_where_uv_cannot(made, monkeypatch):
    monkeypatch.setattr(environment, "_with_uv", lambda *_: False)

    environment.ensure("run")

    assert made == [("pip", "requirements.lock")]


def test_the_tests_add_to_what_a_run_needs_and_a_run_needs_no_more_after_them(made):
    environment.ensure("run")
    (environment.folder() / "kept").touch()

    environment.ensure("tests")
    environment.ensure("run")

    assert made == [("uv", "requirements.lock"), ("uv", "requirements-dev.lock")]
    assert (environment.folder() / "kept").exists()


def test_a_half_made_folder_is_removed_and_made_again(made, capsys):
    place = environment.folder()
    place.mkdir()
    (place / "tarebook.making").touch()
    (place / "half").touch()

    environment.ensure("run")

    assert not (place / "half").exists()
    assert "half-made" in capsys.readouterr().out


def test_a_folder_somebody_else_made_is_left_alone(made):
    place = environment.folder()
    place.mkdir()
    (place / "pyvenv.cfg").touch()

    with pytest.raises(Stopped, match="was not made by this program; move it away"):
        environment.ensure("run")

    assert (place / "pyvenv.cfg").exists()
    assert made == []


def test_another_lock_file_means_another_folder(made):
    environment.ensure("run")
    stamp = environment.folder() / "tarebook.stamp"
    told = json.loads(stamp.read_text())
    told["sets"]["run"] = "0" * 64
    stamp.write_text(json.dumps(told))
    (environment.folder() / "old").touch()

    environment.ensure("run")

    assert len(made) == 2
    assert not (environment.folder() / "old").exists()


def test_it_is_made_again_when_the_python_it_was_made_with_is_gone(made):
    environment.ensure("run")
    environment.python().unlink()
    environment.python().symlink_to("/nonexistent/python3")

    environment.ensure("run")

    assert len(made) == 2
    assert environment.python().exists()


@pytest.mark.parametrize("stamp", ["", "{", "[]", '{"sets": 3, "python": "3.11"}'])
def test_an_unreadable_stamp_is_no_stamp(made, stamp: str):
    environment.ensure("run")
    (environment.folder() / "tarebook.stamp").write_text(stamp)

    environment.ensure("run")

    assert len(made) == 2


def test_two_at_once_make_it_once(tmp_path):
    program = (
        "from service.bootstrap import environment as e\n"
        "import sys, time\n"
        "def slow(place, lock):\n"
        "    time.sleep(1); (place / 'bin').mkdir(); e.python().symlink_to(sys.executable)\n"
        "    print('made', flush=True)\n"
        "    return True\n"
        "e._uv, e._with_uv = (lambda: True), slow\n"
        "e.ensure('run')\n"
    )
    variables = {"TAREBOOK_VENV": str(tmp_path / "venv"), "PATH": "/usr/bin:/bin"}
    both = [
        subprocess.Popen(
            [sys.executable, "-c", program],
            cwd=environment.ROOT,
            env=variables,
            stdout=subprocess.PIPE,
            text=True,
        )
        for _ in range(2)
    ]

    said = "".join(one.communicate()[0] for one in both)

    assert [one.returncode for one in both] == [0, 0]
    assert said.splitlines().count("made") == 1
    assert "waiting for it" in said


def test_an_installer_that_outlives_a_killed_run_is_waited_for(tmp_path):
    begin = "from service.bootstrap import environment as e\nimport sys\n"
    works = "print(1, flush=True); import time; time.sleep(2)"
    slow = f"with e._alone():\n    e._run(sys.executable, '-c', {works!r})\n"
    wait = "with e._alone():\n    print('mine')\n"
    first = subprocess.Popen(
        [sys.executable, "-c", begin + slow], cwd=environment.ROOT, stdout=subprocess.PIPE, text=True
    )
    first.stdout.readline()
    first.kill()
    first.wait()
    begun = time.monotonic()

    second = subprocess.run(
        [sys.executable, "-c", begin + wait],
        cwd=environment.ROOT,
        capture_output=True,
        text=True,
        check=True,
    )

    assert second.stdout.splitlines()[-1] == "mine"
    assert "waiting for it" in second.stdout
    assert time.monotonic() - begun > 1
    first.stdout.close()


def test_what_would_mislead_pip_or_python_is_taken_out(monkeypatch):
    for name in ("PIP_USER", "PYTHONPATH", "PYTHONHOME", "PIP_TARGET", "VIRTUAL_ENV"):
        monkeypatch.setenv(name, "1")
    monkeypatch.setenv("PIP_INDEX_URL", "https://mirror.invalid/simple")

    kept = environment.clean_environment()

    assert not {"PIP_USER", "PYTHONPATH", "PYTHONHOME", "PIP_TARGET", "VIRTUAL_ENV"} & set(kept)
    assert kept["PIP_INDEX_URL"] == "https://mirror.invalid/simple"


def test_every_package_is_pinned_by_digest():
    for lock in environment.LOCKS.values():
        lines = [line for line in (environment.ROOT / lock).read_text().splitlines() if line[:1].isalnum()]

        assert len(lines) > 50
        assert all("==" in line and line.endswith("\\") for line in lines)


def test_no_network_ends_in_one_sentence_with_the_next_step(tmp_path, monkeypatch):
    monkeypatch.setattr(environment, "_run", lambda *command: "install" not in command)

    with pytest.raises(Stopped, match=r"could not be installed .* connect this machine, or name a mirror"):
        environment._with_pip(tmp_path, "requirements.lock")


def test_the_bare_standard_library_is_enough_to_begin():
    words = "import service.bootstrap.dispatch, sys; print(*sorted(sys.modules))"
    told = subprocess.run(
        [
            sys.executable,
            "-I",
            "-S",
            "-c",
            f"import sys; sys.path.insert(0, {str(environment.ROOT)!r}); {words}",
        ],
        capture_output=True,
        text=True,
        check=True,
    )

    loaded = {name.partition(".")[0] for name in told.stdout.split()}
    assert loaded - sys.stdlib_module_names - {"__main__", "service"} == set()
