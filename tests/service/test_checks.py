"""Mistakes of a deployment stop it, each with an id and a hint."""

import re
import subprocess
import sys
from types import SimpleNamespace

import yaml

from service import checks, compose_secrets
from service.bootstrap.environment import ROOT

HERE = SimpleNamespace(
    ALLOWED_HOSTS=["127.0.0.1", "localhost"], HTTPS=False, DATABASES={"default": {"USER": "a"}}
)


def _ids(messages):
    assert all(message.hint for message in messages)
    return [message.id for message in messages]


def _settings(monkeypatch, **changes):
    monkeypatch.setattr(checks, "settings", SimpleNamespace(**(vars(HERE) | changes)))


def test_two_roles_and_plain_http_on_this_machine_are_sound(monkeypatch):
    _settings(monkeypatch, DATABASES={"default": {"USER": "serves"}, "owner": {"USER": "owns"}})

    assert _ids(checks.two_roles(None)) == []
    assert _ids(checks.plain_http_stays_here(None)) == []


def test_one_role_for_both_jobs_is_refused(monkeypatch):
    _settings(monkeypatch, DATABASES={"default": {"USER": "same"}, "owner": {"USER": "same"}})

    assert _ids(checks.two_roles(None)) == ["tarebook.E001"]


def test_plain_http_for_other_machines_is_refused(monkeypatch):
    _settings(monkeypatch, ALLOWED_HOSTS=["127.0.0.1", "loads.example"])
    assert _ids(checks.plain_http_stays_here(None)) == ["tarebook.E002"]

    _settings(monkeypatch, ALLOWED_HOSTS=["127.0.0.1", "loads.example"], HTTPS=True)
    assert _ids(checks.plain_http_stays_here(None)) == []


def test_the_owners_address_beside_the_serving_one_is_warned_of(monkeypatch):
    _settings(monkeypatch, DATABASES={"default": {}, "owner": {}})
    assert _ids(checks.owner_stays_away(None)) == ["tarebook.W003"]

    _settings(monkeypatch)
    assert _ids(checks.owner_stays_away(None)) == []


def test_what_the_compose_file_sets_passes_every_check_of_a_deployment(tmp_path):
    """As a server would run it: the secrets as they are made, the settings as they are composed."""
    compose_secrets.make(tmp_path)
    composed = yaml.safe_load((ROOT / "docker-compose.yml").read_text())["services"]["web"]["environment"]
    environment = {"PATH": "/usr/bin:/bin", "TAREBOOK_HOST": "loads.example.org"}
    for name, value in composed.items():
        filled = re.sub(r"\$\{(\w+)(?::[-?]([^}]*))?\}", lambda m: environment.get(m[1], m[2] or ""), value)
        environment[name] = filled.replace("/run/secrets", str(tmp_path))
    environment["PROMETHEUS_MULTIPROC_DIR"] = str(tmp_path)

    def checked(**changes):
        return subprocess.run(
            [sys.executable, "manage.py", "check", "--deploy", "--fail-level", "DEBUG"],
            cwd=ROOT, env=environment | changes, capture_output=True, text=True, check=False,
        )  # fmt: skip

    sound, plain = checked(), checked(HTTPS="false")

    assert sound.returncode == 0, sound.stderr
    assert "System check identified no issues" in sound.stdout
    assert "tarebook.E002" in plain.stderr
    assert plain.returncode == 1
