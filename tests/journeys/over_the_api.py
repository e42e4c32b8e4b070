"""People at work over the API, as their own programs would: what was read is sent back as seen."""

import json
from dataclasses import dataclass
from typing import Any
from uuid import uuid4

from fleet.models import Person
from tests.cast import PASSWORD, api


@dataclass(frozen=True, slots=True)
class Answer:
    """One answer: its status, its body, and the state it shows."""

    status: int
    body: Any
    etag: str


@dataclass(frozen=True, slots=True)
class Desk:
    """One person at the API."""

    person: Person

    def get(self, path: str) -> Answer:
        """This function will read a path after /api/v1."""
        return _answer(api(self.person).get(f"/api/v1{path}"))

    def post(self, path: str, document: Any, *, seen: str = "") -> Answer:
        """This function will send a document under a fresh key, with the state that was seen."""
        headers = {"Idempotency-Key": str(uuid4())} | ({"If-Match": seen} if seen else {})
        body = json.dumps(document)
        return _answer(
            api(self.person).post(f"/api/v1{path}", body, content_type="application/json", headers=headers)
        )

    def sign(self, load: Answer, meaning: str, password: str = PASSWORD) -> Answer:
        """This function will sign what an answer showed."""
        signature = {"meaning": meaning, "digest": load.body["digest"], "password": password}
        return self.post(f"/loads/{load.body['id']}/signatures", signature, seen=load.etag)


def _answer(response: Any) -> Answer:
    is_json = "json" in response.headers.get("Content-Type", "")
    body = json.loads(response.content) if is_json else response.content
    return Answer(response.status_code, body, response.headers.get("ETag", ""))
