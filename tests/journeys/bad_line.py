"""A line between a client and the server that loses requests and answers, in turns known beforehand."""

import http.client
import threading
import time
from collections import Counter
from collections.abc import Iterator
from contextlib import contextmanager, suppress
from dataclasses import dataclass, field
from http.server import BaseHTTPRequestHandler, ThreadingHTTPServer
from itertools import count
from typing import Any

# What befalls every third request, in turn. "answer lost" and what follows it: the server has done its work.
TROUBLES = (
    "answer lost",
    "request lost",
    "answer cut within",
    "sent twice",
    "busy",
    "answer lost",
    "server away",
    "answer cut within",
)
EVERY = 3
# So often an answer comes only after the client gave up, which costs its whole patience.
STALL_EVERY = 100

Answer = tuple[int, list[tuple[str, str]], bytes]
# What stands before a server says for it.
NOT_THE_SERVERS: dict[str, Answer] = {
    "busy": (429, [("Retry-After", "0")], b"{}"),
    "server away": (502, [], b"<html>bad gateway</html>"),
}


@dataclass
class BadLine:
    """Where the line begins, and what befell the requests on it."""

    address: str = ""
    befell: Counter[str] = field(default_factory=Counter)
    replayed: int = 0
    _turns: Iterator[int] = field(default_factory=lambda: count(1))
    _lock: threading.Lock = field(default_factory=threading.Lock)

    def next_trouble(self) -> str:
        """This function will say what befalls the next request."""
        with self._lock:
            turn = next(self._turns)
            trouble = TROUBLES[turn // EVERY % len(TROUBLES)] if turn % EVERY == 0 else ""
            trouble = "stalled" if turn % STALL_EVERY == 0 else trouble
            self.befell[trouble] += 1
            return trouble


@contextmanager
def bad_line(host: str, port: int, *, stall_seconds: float) -> Iterator[BadLine]:
    """This function will stand between a client and the server at host and port until the block ends."""
    line = BadLine()
    named = {"line": line, "onwards": (host, port), "stall_seconds": stall_seconds}
    server = ThreadingHTTPServer(("127.0.0.1", 0), type("Handler", (_Handler,), named))
    server.daemon_threads, server.block_on_close = True, False
    line.address = f"http://127.0.0.1:{server.server_port}"
    thread = threading.Thread(target=server.serve_forever, kwargs={"poll_interval": 0.02}, daemon=True)
    thread.start()
    try:
        yield line
    finally:
        server.shutdown()
        server.server_close()
        thread.join()


class _Handler(BaseHTTPRequestHandler):
    """Hands one request on, with what befalls it."""

    line: BadLine
    onwards: tuple[str, int]
    stall_seconds: float

    def _hand_on(self) -> None:
        self.close_connection = True
        body = self.rfile.read(int(self.headers.get("Content-Length") or 0))
        trouble = self.line.next_trouble()
        if trouble == "request lost":
            return
        answer = NOT_THE_SERVERS.get(trouble) or self._forwarded(body, twice=trouble == "sent twice")
        if trouble == "stalled":
            time.sleep(self.stall_seconds)
        if trouble not in {"stalled", "answer lost"}:
            self._give(answer, cut=trouble == "answer cut within")

    do_GET = do_POST = do_DELETE = _hand_on  # noqa: N815  # the names the server's class asks for

    def _forwarded(self, body: bytes, *, twice: bool) -> Answer:
        """Forward a request, or the same twice at the same moment; then the second answer counts."""
        if not twice:
            return self._exchanged(body)
        first = threading.Thread(target=self._exchanged, args=[body], daemon=True)
        first.start()
        answer = self._exchanged(body)
        first.join()
        return answer

    def _exchanged(self, body: bytes) -> Answer:
        onwards = http.client.HTTPConnection(*self.onwards, timeout=120)
        try:
            onwards.request(self.command, self.path, body, dict(self.headers.items()))
            answer = onwards.getresponse()
            self.line.replayed += answer.getheader("Idempotency-Replayed") == "true"
            return answer.status, answer.getheaders(), answer.read()
        finally:
            onwards.close()

    def _give(self, answer: Answer, *, cut: bool) -> None:
        status, headers, body = answer
        with suppress(OSError):  # whoever asked had enough
            self.send_response_only(status)
            for name, value in headers:
                if name.lower() not in {"content-length", "transfer-encoding", "connection"}:
                    self.send_header(name, value)
            self.send_header("Content-Length", str(len(body)))
            self.end_headers()
            self.wfile.write(body[: len(body) // 2] if cut else body)

    def log_message(self, *_: Any) -> None:
        """Say nothing."""
