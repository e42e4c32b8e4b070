"""The embedded broker: on a private socket, adopted when it runs, started again when it was killed."""

import os
import signal
import stat
from pathlib import Path

import redis

from service.embedded import processes, valkey


def test_it_answers_on_a_private_socket_until_it_is_stopped(tmp_path: Path):
    broker = valkey.start(tmp_path / "valkey")

    with redis.Redis(unix_socket_path=str(broker.socket)) as client:
        assert client.ping()
        assert client.config_get("port") == {"port": "0"}
    assert stat.S_IMODE(broker.socket.parent.stat().st_mode) == 0o700
    assert broker.url == valkey.address(tmp_path / "valkey") == f"redis+socket://{broker.socket}"
    valkey.stop(broker)
    assert not processes.is_alive(broker.process)


def test_a_second_start_adopts_the_running_one(tmp_path: Path):
    broker = valkey.start(tmp_path / "valkey")

    assert valkey.start(tmp_path / "valkey") == broker

    valkey.stop(broker)


def test_one_that_was_killed_is_started_again(tmp_path: Path):
    broker = valkey.start(tmp_path / "valkey")
    os.kill(broker.process.pid, signal.SIGKILL)
    processes.wait_until_gone(broker.process, 5)

    again = valkey.start(tmp_path / "valkey")

    assert again.process != broker.process
    assert processes.is_alive(again.process)
    valkey.stop(again)
