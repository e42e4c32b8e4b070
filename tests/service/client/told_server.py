"""A server on this machine that answers as it is told, one turn a request; the last turn serves on."""

import json
import threading
import time
from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from dataclasses import dataclass, field
from http.server import BaseHTTPRequestHandler, ThreadingHTTPServer
from typing import Any


@dataclass(frozen=True)
class Turn:
    """What one request gets: an answer, or (`cut`) a connection that ends before or within the answer."""

    status: int = 200
    body: Any = field(default_factory=dict)
    headers: dict[str, str] = field(default_factory=dict)
    cut: str = ""  # "before" or "within" the answer
    stall_seconds: float = 0


@dataclass(frozen=True)
class Asked:
    method: str
    path: str
    headers: dict[str, str]
    body: bytes


@dataclass
class ToldServer:
    address: str
    asked: list[Asked] = field(default_factory=list)

    def keys(self) -> list[str | None]:
        return [one.headers.get("Idempotency-Key") for one in self.asked]


@contextmanager
def telling(*turns: Turn) -> Iterator[ToldServer]:
    """This function will serve the turns until the block ends."""
    told = ToldServer("")
    server = ThreadingHTTPServer(("127.0.0.1", 0), _handler(told, turns))
    server.daemon_threads, server.block_on_close = True, False
    told.address = f"http://127.0.0.1:{server.server_port}"
    thread = threading.Thread(target=server.serve_forever, kwargs={"poll_interval": 0.02}, daemon=True)
    thread.start()
    try:
        yield told
    finally:
        server.shutdown()
        server.server_close()
        thread.join()


def _handler(told: ToldServer, turns: Sequence[Turn]) -> type[BaseHTTPRequestHandler]:
    class Handler(BaseHTTPRequestHandler):
        def _answer(self) -> None:
            body = self.rfile.read(int(self.headers.get("Content-Length") or 0))
            told.asked.append(Asked(self.command, self.path, dict(self.headers.items()), body))
            turn = turns[min(len(told.asked), len(turns)) - 1]
            time.sleep(turn.stall_seconds)
            content = turn.body if isinstance(turn.body, bytes) else json.dumps(turn.body).encode()
            self.close_connection = True
            if turn.cut == "before":
                return
            try:
                self.send_response(turn.status)
                for name, value in {"Content-Length": str(len(content)), **turn.headers}.items():
                    self.send_header(name, value)
                self.end_headers()
                self.wfile.write(content[: len(content) // 2] if turn.cut else content)
            except OSError:
                pass  # whoever asked had enough

        do_GET = do_POST = do_DELETE = _answer  # noqa: N815  # the names the server's class asks for

        def log_message(self, *_: Any) -> None:
            pass

    return Handler


COMPUTED = {"verdict": "within", "digest": "d" * 64, "governing": {"weight": "w", "cg": "c"}, "checks": []}
LOAD = COMPUTED | {
    "id": "01a23107-3d72-7a66-8157-3ea0a197a14a",
    "state": "open",
    "replaces": None,
    "manifest": None,
}
STORED = Turn(201, LOAD, {"ETag": '"1"'})


def problem(status: int, code: str, **headers: str) -> Turn:
    """This function will tell the server to refuse with a problem body."""
    body = {
        "status": status,
        "code": code,
        "detail": "no",
        "next_step": "wait",
        "errors": [],
        "request": "r-1",
    }
    return Turn(status, body, {name.replace("_", "-"): value for name, value in headers.items()})
