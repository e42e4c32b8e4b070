"""The restore drill: what was backed up stands again on another cluster, verified, and only then may be used.

And the other way round: a backup in which one byte is another is refused before anything is written.
"""

import json
import re
import subprocess
import sys
from collections.abc import Iterator
from io import StringIO
from pathlib import Path

import psycopg
import pytest
from django.conf import settings
from django.core.management import CommandError, call_command

from fleet.models import Aircraft
from loads.actions.file_manifest import manifest_bytes
from loads.models import Paper
from records.models import Document
from records.verify import follow_chains
from service import roles
from service.backup import manifest
from service.bootstrap.environment import ROOT
from service.embedded import postgres, postgres_binaries
from tests import databases
from tests.cast import cast
from tests.loads.making import accepted
from tests.makers import ready_aircraft


@pytest.fixture(scope="module")
def kept(own_database: str, tmp_path_factory, django_db_blocker) -> Path:
    """A backup of a database with a signed load and its filed manifest, and a folder with its key."""
    folder = tmp_path_factory.mktemp("kept")
    with psycopg.connect(databases.server(), dbname=own_database, autocommit=True) as superuser:
        superuser.execute("DROP SCHEMA seed CASCADE")  # of the tests alone
    with django_db_blocker.unblock():
        people = cast("kestrel-drill")
        ready_aircraft(people)
        accepted(people)
        manifest_bytes(people.operator.code, Paper.objects.get().load_id)
        said = StringIO()
        call_command("backup", folder / "backups", keys=folder / "keys", stdout=said)
    (folder / "said").write_text(said.getvalue())
    return folder


@pytest.fixture
def backup(kept: Path) -> Path:
    (made,) = (kept / "backups").iterdir()
    return made


@pytest.fixture(scope="module")
def elsewhere(tmp_path_factory) -> Iterator[postgres.Cluster]:
    """Another cluster, as another machine would have it: no roles of ours, no database."""
    cluster = postgres.start(
        tmp_path_factory.mktemp("elsewhere") / "postgres", durable=False, say=lambda _line: None
    )
    yield cluster
    postgres.stop(cluster)


def restored(backup: Path, into: str) -> tuple[int, str]:
    out = StringIO()
    try:
        call_command("restore", backup, into=into, stdout=out, stderr=out)
    except CommandError as refused:
        return refused.returncode, f"{out.getvalue()}{refused}"
    except SystemExit as ended:
        return int(ended.code or 0), out.getvalue()
    return 0, out.getvalue()


def names_of_databases(cluster: postgres.Cluster) -> set[str]:
    with psycopg.connect(cluster.url("postgres", "postgres")) as admin:
        return {str(row[0]) for row in admin.execute("SELECT datname FROM pg_database")}


def test_a_backup_holds_the_dump_and_its_manifest_readable_by_nobody_else(backup: Path, kept: Path):
    made = manifest.read(backup)

    assert {path.name for path in backup.iterdir()} == {"database.dump", "manifest.json", "manifest.sha256"}
    assert {path.stat().st_mode & 0o777 for path in backup.iterdir()} == {0o600}
    assert {chain for chain, *_ in made.heads} == {"house", "kestrel-drill"}
    assert made.heads == tuple((h.chain, h.position, h.digest) for h in follow_chains().heads)
    assert made.rows["records_document"] == Document.objects.count() == 1
    assert made.rows["fleet_aircraft"] == Aircraft.objects.count() == 1
    checked = subprocess.run(["sha256sum", "--check", "manifest.sha256"], cwd=backup, check=False)
    assert checked.returncode == 0
    assert re.search(
        r"Digest of the manifest, to be kept elsewhere: [0-9a-f]{64}\n", (kept / "said").read_text()
    )


def test_keys_and_passwords_are_never_in_a_backup_and_the_key_is_apart(backup: Path, kept: Path):
    (key,) = (kept / "keys").iterdir()

    assert key.read_text().strip() == settings.SECRET_KEY
    assert key.stat().st_mode & 0o777 == 0o600
    program = str(postgres_binaries.folder() / "pg_restore")
    plain = subprocess.run(
        [program, "--file=-", str(backup / "database.dump")],
        capture_output=True, check=True,
    ).stdout  # fmt: skip
    whole = plain + b"".join(path.read_bytes() for path in backup.iterdir())
    assert b"CREATE TABLE public.records_seal" in plain
    for secret in (settings.SECRET_KEY, databases._PASSWORD):
        assert secret.encode() not in whole
    assert b"CREATE ROLE" not in plain


@pytest.mark.parametrize("keys", ["backups", "backups/keys", "."])
def test_a_key_beside_its_backup_is_refused(tmp_path: Path, kept: Path, keys: str):
    with pytest.raises(CommandError, match="apart from it") as refused:
        call_command("backup", tmp_path / "backups", keys=tmp_path / keys)

    assert refused.value.returncode == 2
    assert not (tmp_path / "backups").exists()


def test_it_is_restored_elsewhere_verified_reconciled_and_open_to_the_service(
    backup: Path, elsewhere, monkeypatch
):
    monkeypatch.setenv("OWNER_PASSWORD", elsewhere.passwords[roles.OWNER])
    monkeypatch.setenv("SERVICE_PASSWORD", elsewhere.passwords[roles.SERVICE])

    code, said = restored(backup, elsewhere.url("postgres", "tarebook"))

    assert code == 0, said
    assert said.endswith("Restored and sound: chains, filed documents, rows and guards all hold.\n")
    for chain, position, head in manifest.read(backup).heads:
        assert f"chain {chain}: {position} entries hold, head {head}" in said
    # And now as the service would: with its own role, in another process, by the usual command.
    verified = subprocess.run(
        [sys.executable, "manage.py", "verify"], cwd=ROOT, check=False, capture_output=True, text=True,
        env={
            "PATH": "/usr/bin:/bin",
            "SECRET_KEY": settings.SECRET_KEY,
            "BROKER_URL": "redis+socket:///nonexistent/valkey.sock",
            "DATABASE_URL": elsewhere.url(roles.SERVICE, "tarebook"),
        },
    )  # fmt: skip
    assert verified.returncode == 0, verified.stdout + verified.stderr
    with psycopg.connect(elsewhere.url(roles.SERVICE, "tarebook")) as service:
        bodies = [bytes(row[0]) for row in service.execute("SELECT body FROM records_document")]
        sessions = service.execute("SELECT count(*) FROM django_session").fetchone()
    assert bodies == [bytes(Document.objects.get().body)]
    assert sessions == (0,)


def test_a_folder_without_data_is_restored_into_and_goes_on_from_there(backup: Path, kept: Path, tmp_path):
    data = tmp_path / "data"
    data.mkdir()
    (key,) = (kept / "keys").iterdir()
    (data / "secret-key").write_text(key.read_text())

    def manage(*words: str) -> subprocess.CompletedProcess[str]:
        return subprocess.run(
            [sys.executable, "manage.py", *words], cwd=ROOT, check=False, capture_output=True, text=True,
            env={"PATH": "/usr/bin:/bin", "TAREBOOK_DATA": str(data)},
        )  # fmt: skip

    first, verified, again = manage("restore", str(backup)), manage("verify"), manage("restore", str(backup))

    assert first.returncode == 0, first.stdout + first.stderr
    assert "another than when the backup was made" not in first.stdout
    assert verified.returncode == 0, verified.stdout + verified.stderr
    assert (again.returncode, "is not empty" in again.stderr) == (2, True)


def test_a_database_that_is_not_empty_is_refused_and_left_as_it_is(backup: Path, elsewhere):
    address = elsewhere.url("postgres", "occupied")
    with psycopg.connect(elsewhere.url("postgres", "postgres"), autocommit=True) as admin:
        admin.execute("CREATE DATABASE occupied")
    with psycopg.connect(address, autocommit=True) as target:
        target.execute("CREATE TABLE somebodys (a int)")

    code, said = restored(backup, address)

    assert (code, "occupied is not empty" in said) == (2, True)
    with psycopg.connect(address) as target:
        assert target.execute("SELECT count(*) FROM pg_tables WHERE schemaname = 'public'").fetchone() == (1,)


def flipped(backup: Path, to: Path, name: str, place: float) -> Path:
    to.mkdir()
    for path in backup.iterdir():
        body = bytearray(path.read_bytes())
        if path.name == name:
            body[int(place * (len(body) - 1))] ^= 1
        (to / path.name).write_bytes(body)
    return to


@pytest.mark.parametrize("name", ["database.dump", "manifest.json", "manifest.sha256"])
@pytest.mark.parametrize("place", [0.0, 0.37, 0.5, 0.93, 1.0])
def test_one_flipped_bit_anywhere_is_refused_before_anything_is_made(
    backup: Path, elsewhere, tmp_path: Path, name: str, place: float
):
    before = names_of_databases(elsewhere)

    code, said = restored(flipped(backup, tmp_path / "bad", name, place), elsewhere.url("postgres", "never"))

    assert code == 2
    assert said.startswith("Nothing was restored. ")
    assert names_of_databases(elsewhere) == before


@pytest.mark.parametrize("name", ["database.dump", "manifest.json", "manifest.sha256"])
def test_a_missing_or_shortened_part_is_refused(backup: Path, elsewhere, tmp_path: Path, name: str):
    for how in ("missing", "short"):
        to = tmp_path / how
        to.mkdir()
        for path in backup.iterdir():
            body = path.read_bytes()
            if path.name != name:
                (to / path.name).write_bytes(body)
            elif how == "short":
                (to / path.name).write_bytes(body[:-1])

        assert restored(to, elsewhere.url("postgres", "never"))[0] == 2


def rewritten(backup: Path, to: Path, **changes: object) -> Path:
    """A backup whose manifest says something else, and whose digest was made to fit."""
    to.mkdir()
    (to / "database.dump").write_bytes((backup / "database.dump").read_bytes())
    document = json.loads((backup / "manifest.json").read_text()) | changes
    made = manifest._understood(to, json.dumps(document).encode())
    manifest.write(to, made)
    return to


def test_a_manifest_that_says_something_else_than_the_dump_is_found_out_and_the_service_kept_away(
    backup: Path, elsewhere, tmp_path: Path
):
    heads = json.loads((backup / "manifest.json").read_text())["heads"]
    heads[-1] = {**heads[-1], "position": heads[-1]["position"] + 1}
    said_more = rewritten(backup, tmp_path / "more", heads=heads)

    code, said = restored(said_more, elsewhere.url("postgres", "doubtful"))

    assert code == 1
    assert "BROKEN  chain kestrel-drill: its head" in said
    with pytest.raises(psycopg.OperationalError, match="permission denied"):
        psycopg.connect(elsewhere.url(roles.SERVICE, "doubtful"))


def test_a_backup_of_a_newer_program_is_refused(backup: Path, elsewhere, tmp_path: Path):
    newer = rewritten(backup, tmp_path / "newer", migrations=[{"of": "records", "last": "9999_far_ahead"}])

    code, said = restored(newer, elsewhere.url("postgres", "never"))

    assert (code, "does not know (records 9999_far_ahead)" in said) == (2, True)


def test_only_a_superuser_can_restore(backup: Path, elsewhere):
    code, said = restored(backup, elsewhere.url(roles.OWNER, "tarebook"))

    assert (code, "not that of a superuser" in said or "refused" in said) == (2, True)


def test_without_the_owners_address_there_is_no_backup(tmp_path: Path, monkeypatch):
    monkeypatch.delitem(settings.DATABASES, "owner")

    with pytest.raises(CommandError, match="set OWNER_DATABASE_URL") as refused:
        call_command("backup", tmp_path / "backups")

    assert refused.value.returncode == 2
