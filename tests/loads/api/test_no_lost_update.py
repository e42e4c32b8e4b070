"""Two clients at one load, in any order of reading and acting: nobody overwrites what they have not seen.

A model holds how the load stands; each client holds the state it last saw, which may be old. Every step is
sent with the right state, with an old one, with none, or with something that names none.
"""

import json
from collections import Counter
from typing import Any
from uuid import uuid4

import pytest
from django.utils import timezone
from hypothesis import HealthCheck, settings
from hypothesis import strategies as st
from hypothesis.stateful import RuleBasedStateMachine, initialize, invariant, rule, run_state_machine_as_test

from fleet.models import Person
from loads.lifecycle import ways_out
from loads.models import Load, Signature, Step
from records.models import Act
from records.models.receipt import Receipt
from tests.cast import PASSWORD, Cast, api, cast
from tests.loads.making import accepted, load_document, prepared, submitted
from tests.makers import ready_aircraft

pytestmark = pytest.mark.django_db

# Address and the state it leads to.
STEPS = {
    "prepare": ("signatures", "prepared"),
    "accept": ("signatures", "accepted"),
    "assess again": ("assessment", "open"),
    "revise": ("revisions", "superseded"),
    "withdraw": ("withdrawal", "withdrawn"),
    "depart": ("departure", "departed"),
}
WAY = ["open", "prepared", "accepted", "departed"]
STARTS = {"open": submitted, "prepared": prepared, "accepted": accepted}
# What stands in If-Match, and what is answered; "seen" is the state the client last saw.
SENT = {
    "none": (None, 428, "if-match-missing"),
    "any": ("*", 412, "if-match-malformed"),
    "weak": ('W/"1"', 412, "if-match-malformed"),
    "list": ('"1", "2", "3"', 412, "if-match-malformed"),
    "bare": ("1", 412, "if-match-malformed"),
    "strange": ('"01"', 412, "state-moved-on"),
}
CLIENTS = ("first", "second")


class TwoClients(RuleBasedStateMachine):
    """One load, two clients who read it and step it."""

    people: Cast
    answered: Counter[tuple[str, str]]  # over all runs: step, and what came of it

    @initialize(start=st.sampled_from(sorted(STARTS)))
    def begin(self, start: str) -> None:
        """Both saw the load when it was submitted; the first client also as it stands."""
        current = STARTS[start](self.people)
        self.load, self.digest = str(current.load.id), current.assessment.digest
        self.taken = WAY[: WAY.index(start) + 1]
        self.state, self.number = start, len(self.taken)
        self.seen = {"first": f'"{self.number}"', "second": '"1"'}
        self.others = Load.objects.count()

    @rule(client=st.sampled_from(CLIENTS))
    def read(self, client: str) -> None:
        answer = api(self.people.auditor).get(f"/api/v1/loads/{self.load}")
        assert (answer.json()["state"], answer["ETag"]) == (self.state, f'"{self.number}"')
        self.seen[client] = answer["ETag"]

    @rule(client=st.sampled_from(CLIENTS), step=st.sampled_from(sorted(STEPS)))
    def take(self, client: str, step: str) -> None:
        """Send a step with the state the client last saw, whether or not that is how the load stands."""
        before, to = _rows(), STEPS[step][1]
        answer = self.send(step, self.seen[client])
        self.answered[step, answer.json().get("code", "done")] += 1
        if self.seen[client] != f'"{self.number}"':
            assert (answer.status_code, answer.json()["code"]) == (412, "state-moved-on")
        elif not self.allowed(to):
            assert (answer.status_code, answer.json()["code"]) == (409, "step-not-allowed")
        elif step == "assess again":  # nothing it rests on has changed
            assert (answer.status_code, answer.json()["code"]) == (409, "assessment-current")
        else:
            assert answer.status_code == (201 if step == "revise" else 200), answer.content
            self.state, self.number = to, self.number + 1
            self.taken.append(to)
            self.others += step == "revise"
            if step != "revise":  # that answer is about the new load
                assert (answer.json()["state"], answer["ETag"]) == (to, f'"{self.number}"')
                self.seen[client] = answer["ETag"]
            return
        assert _rows() == before

    @rule(client=st.sampled_from(CLIENTS), data=st.data())
    def go_on(self, client: str, data: st.DataObject) -> None:
        """Read the load and take a step that is allowed, behind the other's back."""
        possible = [step for step, (_, to) in STEPS.items() if to != "open" and self.allowed(to)]
        if possible:
            self.read(client)
            step = data.draw(st.sampled_from(possible))
            self.take(client, step)
            assert self.state == STEPS[step][1]

    @rule(step=st.sampled_from(sorted(STEPS)), sent=st.sampled_from(sorted(SENT)))
    def take_without_having_seen(self, step: str, sent: str) -> None:
        before, (etag, status, code) = _rows(), SENT[sent]
        answer = self.send(step, etag)
        assert (answer.status_code, answer.json()["code"]) == (status, code)
        assert _rows() == before

    @invariant()
    def nothing_is_lost(self) -> None:
        steps = Step.objects.filter(load_id=self.load).order_by("number")
        assert list(steps.values_list("after", flat=True)) == self.taken
        assert list(steps.values_list("number", flat=True)) == list(range(1, self.number + 1))
        assert Load.objects.count() == self.others
        given = Signature.objects.filter(load_id=self.load).count()
        assert given == self.taken.count("prepared") + self.taken.count("accepted")

    def allowed(self, to: str) -> bool:
        """The table allows the step; a load that is accepted is accepted again only by a late change."""
        return to in ways_out(self.state) and (self.state, to) != ("accepted", "accepted")

    def send(self, step: str, etag: str | None) -> Any:
        signing = {"digest": self.digest, "password": PASSWORD}
        documents: dict[str, tuple[Person, Any]] = {
            "prepare": (self.people.preparer, signing | {"meaning": "prepared"}),
            "accept": (self.people.pilot, signing | {"meaning": "accepted"}),
            "assess again": (self.people.preparer, {}),
            "revise": (self.people.preparer, load_document(self.people) | {"reason": "bags"}),
            "withdraw": (self.people.preparer, {"reason": "weather"}),
            "depart": (self.people.pilot, {"at": timezone.now().isoformat()}),
        }
        person, document = documents[step]
        headers = {"Idempotency-Key": str(uuid4())} | ({"If-Match": etag} if etag is not None else {})
        return api(person).post(
            f"/api/v1/loads/{self.load}/{STEPS[step][0]}",
            data=json.dumps(document),
            content_type="application/json",
            headers=headers,
        )


def _rows() -> tuple[int, ...]:
    return tuple(model.objects.count() for model in (Load, Step, Signature, Act, Receipt))


@pytest.fixture
def people() -> Cast:
    made = cast("two-clients")
    ready_aircraft(made)
    TwoClients.people, TwoClients.answered = made, Counter()
    return made


def test_two_clients_lose_nothing(people: Cast) -> None:
    run_state_machine_as_test(
        TwoClients,
        settings=settings(
            max_examples=20,
            stateful_step_count=10,
            deadline=None,
            derandomize=True,
            suppress_health_check=list(HealthCheck),
        ),
    )

    # A run that only ever refused, or never met an old state, would show nothing.
    codes = Counter(code for _, code in TwoClients.answered.elements())
    assert min(codes[code] for code in ("done", "state-moved-on", "step-not-allowed")) >= 10, codes


POSSIBLE = [
    (start, step)
    for start in sorted(STARTS)
    for step, (_, to) in STEPS.items()
    if to in ways_out(start) and to not in {"open", start}
]


@pytest.mark.parametrize(("start", "step"), POSSIBLE, ids=[" ".join(pair) for pair in POSSIBLE])
def test_after_any_step_of_one_the_other_is_refused_any(people: Cast, start: str, step: str) -> None:
    two = TwoClients()
    two.begin(start)

    two.take("first", step)
    for late in STEPS:
        two.take("second", late)
    for sent in SENT:
        two.take_without_having_seen(step, sent)

    two.nothing_is_lost()
    assert two.answered[step, "done"] == 1
    assert sum(two.answered[late, "state-moved-on"] for late in STEPS) == len(STEPS)
