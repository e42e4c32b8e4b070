"""The compose file is valid, and gives each process only the secrets it needs.

No engine is at hand here: that the images build and run is not shown by these tests.
"""

import re
import subprocess
import sys
from pathlib import Path

import pytest
import yaml

from service import compose_secrets, probe
from service.bootstrap.environment import ROOT
from tests.house.test_documents_are_true import variables_in_code

COMPOSE = ROOT / "docker-compose.yml"


@pytest.fixture(scope="module")
def composed() -> dict:
    return yaml.safe_load(COMPOSE.read_text())


def fits_the_published_schema(path: Path) -> bool:
    command = [sys.executable, "-m", "check_jsonschema", "--builtin-schema", "vendor.compose-spec", str(path)]
    return subprocess.run(command, capture_output=True, check=False).returncode == 0


def test_it_fits_the_published_schema_of_compose_files(tmp_path: Path):
    (tmp_path / "broken.yml").write_text(
        COMPOSE.read_text().replace("restart: unless-stopped", "restart: {a: b}", 1)
    )

    assert fits_the_published_schema(COMPOSE)
    assert not fits_the_published_schema(tmp_path / "broken.yml")


def test_every_secret_it_names_is_one_that_is_made(composed, tmp_path: Path):
    made = compose_secrets.make(tmp_path / "new")

    assert set(composed["secrets"]) == set(made)
    for name, secret in composed["secrets"].items():
        assert secret["file"] == "${TAREBOOK_SECRETS:-./.tarebook/secrets}/" + name
    for service in composed["services"].values():
        held = {f"/run/secrets/{name}" for name in service.get("secrets", [])}
        read = {value for name, value in service.get("environment", {}).items() if name.endswith("_FILE")}
        assert read == held


def test_it_runs_database_queue_web_worker_and_scheduler(composed):
    assert set(composed["services"]) == {
        "database",
        "queue",
        "roles",
        "migrate",
        "backup",
        "web",
        "worker",
        "scheduler",
    }


def test_only_what_migrates_and_backs_up_has_the_owners_address_and_only_the_roles_step_the_superusers(
    composed,
):
    held = {name: set(service.get("secrets", [])) for name, service in composed["services"].items()}

    assert {name for name, secrets in held.items() if "owner-url" in secrets} == {"migrate", "backup"}
    assert {name for name, secrets in held.items() if "superuser-url" in secrets} == {"roles"}
    for name in ("web", "worker", "scheduler"):
        assert held[name] == {"secret-key", "metrics-token", "mail-password", "service-url"}


def test_no_secret_stands_in_the_environment_and_only_the_loopback_is_published(composed):
    for service in composed["services"].values():
        for name, value in (service.get("environment") or {}).items():
            assert "://" not in value or name in {"BROKER_URL", "CSRF_TRUSTED_ORIGINS"}
        assert all(port.startswith("127.0.0.1:") for port in service.get("ports", []))


def test_everything_that_stays_up_is_asked_whether_it_is_well(composed):
    staying = {name for name, one in composed["services"].items() if one.get("restart") == "unless-stopped"}

    assert {name for name, one in composed["services"].items() if "healthcheck" in one} == staying


def test_every_setting_is_declared_for_all_who_read_the_settings(composed):
    """So that none has to be looked for in the source by whoever runs it. The rest is said why."""
    read = {name for name, where in variables_in_code().items() if where & {"service/settings.py"}}
    elsewhere = {
        "OWNER_DATABASE_URL",  # only for what migrates and backs up
        "STATIC_ROOT",  # not needed
    }

    for name in ("migrate", "backup", "web", "worker", "scheduler"):
        declared = {one.removesuffix("_FILE") for one in composed["services"][name]["environment"]}
        assert read - elsewhere - declared == set()
    assert "PROMETHEUS_MULTIPROC_DIR" in composed["services"]["web"]["environment"]


def test_a_value_handed_through_has_the_default_the_settings_have(composed):
    settings = (ROOT / "service" / "settings.py").read_text()
    handed_through = re.findall(r"\$\{((?:RATE|SIGN|LOG|MAIL)_\w+):-([^}]*)\}", COMPOSE.read_text())

    assert len(handed_through) == 11
    for name, default in handed_through:
        said = re.search(rf'env\.\w+\("{name}", ("[^"]*"|\w+)', settings)
        assert said is not None, name
        assert said[1].strip('"').lower() == default.lower(), name


def test_only_what_must_reach_outside_does(composed):
    outside = {name for name, one in composed["services"].items() if "outside" in one["networks"]}

    assert composed["networks"] == {"inside": {"internal": True}, "outside": None}
    assert outside == {"web", "worker"}
    assert {name for name, one in composed["services"].items() if one.get("ports")} == {"web"}


def test_what_runs_our_program_may_do_nothing_else(composed):
    for name in ("roles", "migrate", "backup", "web", "worker", "scheduler"):
        service = composed["services"][name]
        assert service["read_only"] is True
        assert service["cap_drop"] == ["ALL"]
        assert service["security_opt"] == ["no-new-privileges:true"]


def test_the_image_runs_as_nobody_in_particular_from_the_hashed_lock_with_pango(composed):
    words = (ROOT / "Dockerfile").read_text()

    assert re.findall(r"^USER (.*)$", words, re.MULTILINE) == ["10001"]
    assert "--require-hashes --no-deps --only-binary :all: -r requirements.lock" in words
    for library in ("libpango-1.0-0", "libpangoft2-1.0-0", "libharfbuzz-subset0"):
        assert library in words
    assert re.search(r"^FROM python:3\.1[123]-slim", words, re.MULTILINE)
    assert "ADD " not in words
    assert "latest" not in words


def test_the_image_holds_every_room(composed):
    lines = (ROOT / "Dockerfile").read_text().splitlines()

    for room in ("records", "fleet", "loads", "service", "templates", "static"):
        assert f"COPY {room} {room}" in lines
        assert f"!{room}" in (ROOT / ".dockerignore").read_text().splitlines()


def test_secrets_are_made_once_and_an_address_follows_its_password(tmp_path: Path):
    assert len(compose_secrets.make(tmp_path / "new")) == 9
    assert compose_secrets.make(tmp_path / "new") == ()
    (tmp_path / "new" / "owner-password").write_text("another\n")

    assert compose_secrets.make(tmp_path / "new") == ("owner-url",)

    assert ":another@database:5432/tarebook" in (tmp_path / "new" / "owner-url").read_text()
    assert (tmp_path / "new").stat().st_mode & 0o777 == 0o700


def test_a_server_that_does_not_answer_is_not_well(capsys):
    assert not probe.well("http://127.0.0.1:9/health")
    assert capsys.readouterr().err
