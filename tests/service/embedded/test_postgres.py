"""The embedded cluster: made, adopted, killed, started again, reached over a socket only."""

import os
import signal
import stat
import threading
import time
from pathlib import Path

import psycopg
import pytest

from service.embedded import postgres, processes
from service.embedded.stopped import Stopped
from service.embedded.unprivileged import account


@pytest.fixture(scope="module")
def cluster(tmp_path_factory):
    data = tmp_path_factory.mktemp("cluster") / "postgres"
    found = postgres.start(data, durable=False, say=lambda _: None)
    yield found
    postgres.stop(found)


def ask(cluster: postgres.Cluster, question: str):
    with psycopg.connect(cluster.url("postgres", "postgres")) as connection:
        return connection.execute(question).fetchone()[0]


def test_it_is_postgresql_18_and_opens_no_port(cluster):
    assert ask(cluster, "SELECT current_setting('server_version_num')::int / 10000") == 18
    assert ask(cluster, "SELECT current_setting('listen_addresses')") == ""


def test_text_is_sorted_the_same_on_every_machine(cluster):
    locale = "SELECT format('%s %s', datlocprovider, datlocale) FROM pg_database WHERE datname = 'template1'"

    assert ask(cluster, locale) == "b C.UTF-8"
    assert ask(cluster, "SELECT current_setting('TimeZone')") == "UTC"


def test_nobody_gets_in_without_the_generated_password(cluster):
    without = cluster.url("postgres", "postgres").replace(cluster.passwords["postgres"], "guess")

    with pytest.raises(psycopg.OperationalError, match="password authentication failed"):
        psycopg.connect(without)


def test_passwords_and_sockets_are_private(cluster):
    secret = cluster.data.with_name("postgres.passwords")

    assert stat.S_IMODE(secret.stat().st_mode) == 0o600
    assert stat.S_IMODE(cluster.socket_dir.stat().st_mode) == 0o700
    assert stat.S_IMODE(cluster.data.stat().st_mode) == 0o700


def test_it_never_runs_as_root(cluster):
    server = postgres.running(cluster.data)

    assert Path(f"/proc/{server.pid}").stat().st_uid == (account().uid or os.geteuid()) != 0


def test_a_second_start_adopts_the_running_one(cluster):
    before = postgres.running(cluster.data)

    again = postgres.start(cluster.data, durable=False, say=lambda _: None)

    assert postgres.running(again.data) == before
    assert again == cluster


def test_a_running_one_is_found_without_starting_anything(cluster, tmp_path: Path):
    assert postgres.find(cluster.data) == cluster
    assert postgres.find(tmp_path / "postgres") is None


def test_it_starts_again_on_the_same_data_after_its_processes_were_killed(tmp_path: Path):
    said: list[str] = []
    one = postgres.start(tmp_path / "postgres", say=said.append)
    with psycopg.connect(one.url("postgres", "postgres")) as connection:
        connection.execute("CREATE TABLE kept AS SELECT 41 + 1 AS answer")
    busy = psycopg.connect(one.url("postgres", "postgres"))
    busy.execute("SELECT 1")  # a backend that is still there when its parent is gone
    server = postgres.running(one.data)

    os.kill(server.pid, signal.SIGKILL)
    assert processes.wait_until_gone(server, 5)
    again = postgres.start(tmp_path / "postgres", say=said.append)

    assert ask(again, "SELECT answer FROM kept") == 42
    assert postgres.running(again.data) != server
    postgres.stop(again)
    busy.close()


def test_a_start_waits_with_a_word_until_the_processes_of_a_killed_server_have_ended(tmp_path: Path):
    said: list[str] = []
    one = postgres.start(tmp_path / "postgres", durable=False, say=said.append)
    with psycopg.connect(one.url("postgres", "postgres")) as client:
        backend = client.info.backend_pid
        server = postgres.running(one.data)
        os.kill(backend, signal.SIGSTOP)  # as one that is slow to see that its parent is gone
        os.kill(server.pid, signal.SIGKILL)
        processes.wait_until_gone(server, 5)
        later = threading.Timer(1.5, os.kill, (backend, signal.SIGCONT))
        later.start()

        again = postgres.start(tmp_path / "postgres", durable=False, say=said.append)

        assert any("waiting up to a minute" in line for line in said)
        assert ask(again, "SELECT 1") == 1
        postgres.stop(again)
        later.join()
        client.close()


def test_a_killed_server_that_was_still_ending_when_it_was_looked_for_is_reaped_later(
    tmp_path: Path, monkeypatch
):
    one = postgres.start(tmp_path / "postgres", durable=False, say=lambda _: None)
    server = postgres.running(one.data)
    looked = []

    def still_ending(data: Path) -> processes.Identity | None:
        # As the kernel tells it of a process whose memory is gone and which is no zombie yet.
        looked.append(data)
        return None if len(looked) == 1 else found(data)

    found = postgres.running
    os.kill(server.pid, signal.SIGKILL)
    monkeypatch.setattr(postgres, "running", still_ending)
    again = postgres.start(tmp_path / "postgres", durable=False, say=lambda _: None)

    assert len(looked) > 1
    assert ask(again, "SELECT 1") == 1
    postgres.stop(again)


def test_a_number_in_the_pid_file_that_is_a_strangers_by_now_does_not_count(tmp_path: Path):
    one = postgres.start(tmp_path / "postgres", durable=False, say=lambda _: None)
    postgres.stop(one)
    (one.data / "postmaster.pid").write_text(f"{os.getpid()}\n{one.data}\n0\n5432\n\n\n\nready\n")

    assert postgres.running(one.data) is None


def test_a_half_made_cluster_is_made_again(tmp_path: Path):
    half = tmp_path / "postgres.making"
    half.mkdir()
    (half / "PG_VERSION").write_text("18\n")

    one = postgres.start(tmp_path / "postgres", durable=False, say=lambda _: None)

    assert not half.exists()
    assert ask(one, "SELECT 1") == 1
    postgres.stop(one)


def test_a_path_too_long_for_a_socket_gets_a_short_private_folder(tmp_path: Path):
    deep = tmp_path / ("a-very-long-name" * 6)

    one = postgres.start(deep / "postgres", durable=False, say=lambda _: None)

    assert len(os.fsencode(deep / "run" / ".s.PGSQL.5432")) > 107
    assert len(os.fsencode(one.socket_dir / ".s.PGSQL.5432")) <= 103
    assert stat.S_IMODE(one.socket_dir.stat().st_mode) == 0o700
    assert ask(one, "SELECT 1") == 1
    postgres.stop(one)
    one.socket_dir.rmdir()


def test_stopping_cuts_off_clients_and_leaves_no_process(tmp_path: Path):
    one = postgres.start(tmp_path / "postgres", durable=False, say=lambda _: None)
    server = postgres.running(one.data)
    client = psycopg.connect(one.url("postgres", "postgres"))
    begun = time.monotonic()

    postgres.stop(one)

    assert time.monotonic() - begun < 10
    assert not processes.is_alive(server)
    postgres.stop(one)  # a second stop is nothing
    client.close()


def test_another_version_is_refused_in_one_sentence(tmp_path: Path, monkeypatch):
    (tmp_path / "postgres").write_text("#!/bin/sh\necho 'postgres (PostgreSQL) 15.3'\n")
    (tmp_path / "postgres").chmod(0o755)
    monkeypatch.setenv("TAREBOOK_POSTGRES_BIN", str(tmp_path))
    postgres.postgres_binaries.folder.cache_clear()

    with pytest.raises(Stopped, match=r"holds PostgreSQL 15\.3, but 18 is needed"):
        postgres.postgres_binaries.folder()

    postgres.postgres_binaries.folder.cache_clear()


def test_a_folder_without_the_programs_is_refused_in_one_sentence(tmp_path: Path, monkeypatch):
    monkeypatch.setenv("TAREBOOK_POSTGRES_BIN", str(tmp_path))
    postgres.postgres_binaries.folder.cache_clear()

    with pytest.raises(Stopped, match="cannot be run from"):
        postgres.postgres_binaries.folder()

    postgres.postgres_binaries.folder.cache_clear()
