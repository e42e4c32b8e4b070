"""A small client of our own API, on the standard library: what a scheduling system would do."""

import json
import urllib.error
import urllib.request
from dataclasses import dataclass
from typing import Any


class RefusedByServer(RuntimeError):
    """The server refused a request; `problem` is the body it sent (RFC 9457)."""

    def __init__(self, method: str, path: str, status: int, problem: dict[str, Any]) -> None:
        faults = "; ".join(f"{fault['pointer']}: {fault['detail']}" for fault in problem.get("errors", []))
        super().__init__(f"{method} {path}: {status} {problem.get('code')}: {problem.get('detail')} {faults}")
        self.status = status
        self.problem = problem


@dataclass(frozen=True, slots=True)
class Answer:
    """What came back: the body, and the ETag of the state it shows."""

    body: dict[str, Any]
    etag: str


@dataclass(frozen=True, slots=True)
class Client:
    """Talks to one server with one bearer token."""

    address: str
    token: str

    def get(self, path: str) -> Answer:
        """This function will read `path`, which begins after /api/v1."""
        return self._send("GET", path, None, {})

    def post(self, path: str, document: Any, *, key: str, etag: str = "") -> Answer:
        """This function will send `document`; the same `key` again has no second effect."""
        headers = {"Idempotency-Key": key, "Content-Type": "application/json"}
        if etag:
            headers["If-Match"] = etag
        return self._send("POST", path, json.dumps(document).encode(), headers)

    def download(self, path: str) -> bytes:
        """This function will read the bytes at `path`."""
        with urllib.request.urlopen(self._request("GET", path, None, {}), timeout=60) as answer:  # noqa: S310 # our own http address
            return bytes(answer.read())

    def _request(
        self, method: str, path: str, body: bytes | None, headers: dict[str, str]
    ) -> urllib.request.Request:
        headers = headers | {"Authorization": f"Bearer {self.token}"}
        address = f"{self.address}/api/v1{path}"
        return urllib.request.Request(address, data=body, headers=headers, method=method)  # noqa: S310 # our own http address

    def _send(self, method: str, path: str, body: bytes | None, headers: dict[str, str]) -> Answer:
        try:
            with urllib.request.urlopen(self._request(method, path, body, headers), timeout=60) as answer:  # noqa: S310 # our own http address
                return Answer(json.loads(answer.read()), answer.headers.get("ETag", ""))
        except urllib.error.HTTPError as refusal:
            raise RefusedByServer(
                method, path, refusal.code, json.loads(refusal.read() or b"{}")
            ) from refusal
