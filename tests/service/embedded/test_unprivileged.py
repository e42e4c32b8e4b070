"""As root a server runs as nobody; where nobody is shut out, programs and data stand elsewhere."""

import os
import shutil
import tempfile
from pathlib import Path

import psycopg
import pytest

from service.embedded import postgres, sockets, unprivileged
from service.embedded.stopped import Stopped

as_root = pytest.mark.skipif(os.geteuid() != 0, reason="only root has to become somebody else")


def test_an_ordinary_account_runs_servers_itself(monkeypatch):
    monkeypatch.setattr(os, "geteuid", lambda: 1000)

    assert unprivileged.account() == unprivileged.Account()


@as_root
def test_without_the_capability_data_and_programs_go_to_the_state_folder_of_the_system(tmp_path, monkeypatch):
    nobody = unprivileged.account()
    plain = tuple(word for word in nobody.prefix if not word.startswith(("--inh", "--ambient", "--secure")))
    shut_out = unprivileged.Account(plain, nobody.uid, nobody.gid, passes_closed_folders=False)
    monkeypatch.setattr(postgres, "account", lambda: shut_out)
    monkeypatch.setattr(unprivileged, "STATE", Path(tempfile.mkdtemp()) / "state")
    unprivileged.STATE.parent.chmod(0o755)
    closed = tmp_path / "closed"
    closed.mkdir(mode=0o700)

    one = postgres.start(closed / "postgres", durable=False, say=lambda _: None)

    assert one.data.is_relative_to(unprivileged.STATE)
    with psycopg.connect(one.url("postgres", "postgres")) as connection:
        assert connection.execute("SELECT 1").fetchone() == (1,)
    assert postgres.find(closed / "postgres") == one
    postgres.stop(one)
    shutil.rmtree(unprivileged.STATE.parent)


@as_root
def test_data_that_the_account_can_no_longer_reach_is_not_replaced_by_an_empty_cluster(tmp_path, monkeypatch):
    nobody = unprivileged.account()
    shut_out = unprivileged.Account(("false",), nobody.uid, nobody.gid, passes_closed_folders=False)
    monkeypatch.setattr(postgres, "account", lambda: shut_out)
    (tmp_path / "postgres").mkdir()
    (tmp_path / "postgres" / "PG_VERSION").write_text("18\n")

    with pytest.raises(Stopped, match="cannot reach the data"):
        postgres.start(tmp_path / "postgres", say=lambda _: None)


def test_a_socket_folder_somebody_else_put_there_is_refused(tmp_path, monkeypatch):
    monkeypatch.setattr(sockets.tempfile, "gettempdir", lambda: str(tmp_path))
    long = tmp_path / ("x" * 120)
    to = unprivileged.account()
    mine = sockets.socket_folder(long, to)
    mine.rmdir()
    mine.symlink_to("/")

    with pytest.raises(Stopped, match="belongs to someone else"):
        sockets.socket_folder(long, to)
