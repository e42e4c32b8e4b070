"""A scheduling system flies a month through the client, over a line where every third request meets trouble.

It submits, sends again what got no answer, hears of rejects by webhook and mends each as it was told, has the
loads signed, fetches every manifest, and is itself restarted in the middle. Then everything is counted.
"""

import hashlib
from collections.abc import Iterator
from dataclasses import dataclass, field
from datetime import UTC, datetime, timedelta
from uuid import UUID

import pytest
from django.conf import settings
from pytest_django.live_server_helper import LiveServer

from fleet.actions.enter_person import enter_person
from fleet.actions.grant_duty import grant_duty
from loads.models import FiledPaper, Load, Paper, Step
from loads.tasks import file_manifest
from records.models import Act, WebhookDelivery, WebhookEvent
from records.webhooks.deliver import deliver_due
from service.client import LoadLine, Message, Patience, Subscription, Tarebook, read_message
from service.client import Paper as Fetched
from tests.cast import PASSWORD, Cast, actor
from tests.journeys.bad_line import BadLine, bad_line
from tests.journeys.scheduling import DAYS, FLIGHTS_A_DAY, Flight, mended_as_told, month
from tests.journeys.trail import unsound
from tests.journeys.twins import enter_twins, token_of
from tests.records.webhooks.making import make_due
from tests.records.webhooks.receiver import ToldReceiver, running

AIRCRAFT = ("Q9-LVN", "Q9-LVP")
SEED = 7
# On one day of four the weather keeps a flight on the ground.
WITHDRAWN = DAYS // 4
EVENTS = ("load.rejected", "load.accepted", "manifest.filed")
# Short waits, since the line's troubles pass at once; many tries, since they come one after the other.
PATIENCE = Patience(tries=12, first_wait=0.02, longest_wait=1.0, answer_within=3.0)
STALL_SECONDS = 3.5


@dataclass
class SchedulingSystem:
    """What the operator's other program does and remembers. Its keys are its own numbers of its flights, so
    that it can be restarted anywhere.
    """

    client: Tarebook
    receiver: ToldReceiver
    subscription: Subscription
    planned: dict[tuple[str, str], Flight] = field(default_factory=dict)
    heard: dict[str, Message] = field(default_factory=dict)
    came: int = 0
    told: list[str] = field(default_factory=list)
    papers: dict[str, Fetched] = field(default_factory=dict)

    def submit(self, flights: list[Flight]) -> list[str]:
        for flight in flights:
            self.planned[flight.document["flight"]["reference"], flight.departure.isoformat()] = flight
        return [self.client.submit(one.document, key=f"{one.key}-submitted").id for one in flights]

    def hear(self) -> None:
        """Do what the events ask for that came since; one that comes again asks for nothing."""
        fresh = self.receiver.received[self.came :]
        self.came += len(fresh)
        for request in fresh:
            message = read_message(request.body, request.headers, self.subscription.secret)
            if message.id not in self.heard:
                self.heard[message.id] = message
                self._do(message)

    def _do(self, message: Message) -> None:
        number = message.data["load"]
        if message.type == "load.rejected":
            flight = self.planned[message.data["reference"], message.data["departure"]]
            load = self.client.load(number)
            document, advice = mended_as_told(load, flight.document)
            self.told.append(advice)
            self.client.revise(load, document, advice, key=f"{load.id}-revised")
        elif message.type == "manifest.filed":
            paper = self.client.manifest(number)
            assert paper.digest == message.data["manifest"]["digest"]
            self.papers[number] = paper

    def of_the_day(self, day: datetime, state: str) -> list[LoadLine]:
        """Read the list a page of two at a time, as somebody with many loads would."""
        found = self.client.loads(
            departing_from=day, departing_before=day + timedelta(days=1), state=state, page_rows=2
        )
        return list(found)


@dataclass
class Airline:
    people: Cast
    line: BadLine
    server: LiveServer
    pilot: Tarebook
    preparer: Tarebook
    scheduling: SchedulingSystem
    scheduler_token: str


@pytest.fixture
def airline(people: Cast, monkeypatch: pytest.MonkeyPatch) -> Iterator[Airline]:
    enter_twins(people, *AIRCRAFT)
    scheduler = enter_person(
        actor(people.manager), people.operator, login="scheduling", name="Scheduling", password=PASSWORD
    )
    grant_duty(actor(people.manager), scheduler, "integration")
    token = token_of(
        people, scheduler, "integration", "read", "submit-load", "revise-load", "subscribe-webhook"
    )
    signs = ("read", "sign", "prepare-load", "withdraw-load")
    server = LiveServer("127.0.0.1")
    with (
        running() as receiver,
        bad_line(server.thread.host, server.thread.port, stall_seconds=STALL_SECONDS) as line,
    ):
        monkeypatch.setattr(settings, "WEBHOOK_TRUSTED_RECEIVERS", frozenset({receiver.place}))
        client = Tarebook(line.address, token, patience=PATIENCE)
        subscription = client.subscribe(receiver.address, EVENTS, label="scheduling", key="subscribed")
        pilots = token_of(people, people.pilot, "pilot", *signs, "accept-load", "depart-load")
        yield Airline(
            people,
            line,
            server,
            Tarebook(line.address, pilots, patience=PATIENCE),
            Tarebook(
                line.address, token_of(people, people.preparer, "load preparer", *signs), patience=PATIENCE
            ),
            SchedulingSystem(client, receiver, subscription),
            token,
        )
    server.stop()


def deliver(airline: Airline, *, refused_first: bool) -> None:
    """Do the worker's part: deliver what is due. A receiver that refuses is asked again when it is time."""
    webhook, receiver = UUID(airline.scheduling.subscription.id), airline.scheduling.receiver
    if refused_first:
        receiver.status = 503
        deliver_due(webhook)
        receiver.status = 200
        make_due(webhook)
    deliver_due(webhook)
    airline.scheduling.hear()


def fly_a_day(airline: Airline, number: int, flights: list[Flight]) -> None:
    scheduling, day = airline.scheduling, flights[0].departure.replace(hour=0)
    scheduling.submit(flights)
    deliver(airline, refused_first=number % 4 == 1)
    ready = scheduling.of_the_day(day, "open")
    assert {one.verdict for one in ready} == {"within"}
    if number % 4 == 3:
        airline.preparer.withdraw(ready.pop(), "weather", key=f"{day.date()}-withdrawn")
    for one in ready:
        prepared = airline.preparer.sign(one, "prepared", PASSWORD, key=f"{one.id}-prepared")
        airline.pilot.sign(prepared, "accepted", PASSWORD, key=f"{one.id}-accepted")
    for one in scheduling.of_the_day(day, "accepted"):
        if number % 2:
            file_manifest(one.id)  # the worker's part
        else:
            airline.pilot.manifest(one)  # no worker is there: whoever asks first has it filed
        airline.pilot.depart(one, datetime.now(UTC), key=f"{one.id}-departed-{number}")
    deliver(airline, refused_first=number % 5 == 2)


@pytest.mark.slow
@pytest.mark.django_db(transaction=True)
def test_after_a_month_everything_is_there_once(airline: Airline) -> None:
    plan = month(AIRCRAFT, airline.people.pilot.login, SEED)

    for number, flights in enumerate(plan):
        fly_a_day(airline, number, flights)
        if number == DAYS // 2:
            restart_and_submit_the_day_again(airline, flights)

    planned = [flight for flights in plan for flight in flights]
    assert len(planned) == DAYS * FLIGHTS_A_DAY
    every_load_is_there_once(airline, planned)
    every_manifest_is_numbered_filed_and_fetched(airline)
    every_event_came_and_counted_once(airline)
    the_line_was_as_bad_as_meant(airline.line)
    assert unsound() == ()


def restart_and_submit_the_day_again(airline: Airline, flights: list[Flight]) -> None:
    """A program that forgot how far it was sends the whole day again, under the same keys."""
    before, stored = airline.scheduling, Load.objects.count()
    again = SchedulingSystem(
        Tarebook(airline.server.url, airline.scheduler_token), before.receiver, before.subscription
    )
    loads = [again.client.submit(one.document, key=f"{one.key}-submitted") for one in flights]

    assert [one.replayed for one in loads] == [True] * FLIGHTS_A_DAY
    assert Load.objects.count() == stored


def every_load_is_there_once(airline: Airline, planned: list[Flight]) -> None:
    plainly = Tarebook(airline.server.url, airline.scheduler_token)
    listed = list(plainly.loads(page_rows=25))
    standing = [one for one in listed if one.state != "superseded"]
    withdrawn = [one for one in listed if one.state == "withdrawn"]

    assert sorted((one.reference, one.departure) for one in standing) == sorted(
        (one.document["flight"]["reference"], one.departure.isoformat()) for one in planned
    )
    assert len({one.id for one in listed}) == len(listed) == Load.objects.count()
    assert len(listed) - len(standing) == len(airline.scheduling.told) >= 3
    assert {one.state for one in standing} == {"departed", "withdrawn"}
    assert len(withdrawn) == WITHDRAWN
    acts = {
        kind: Act.objects.filter(kind=kind).count() for kind in ("submit-load", "revise-load", "depart-load")
    }
    assert acts == {
        "submit-load": len(planned),
        "revise-load": len(airline.scheduling.told),
        "depart-load": len(planned) - len(withdrawn),
    }
    assert Step.objects.filter(after="departed").count() == len(planned) - len(withdrawn)


def every_manifest_is_numbered_filed_and_fetched(airline: Airline) -> None:
    papers = airline.scheduling.papers
    numbers = sorted(Paper.objects.values_list("number", flat=True))

    assert numbers == list(range(1, len(numbers) + 1))
    assert len(numbers) == len(papers) == FiledPaper.objects.count() == DAYS * FLIGHTS_A_DAY - WITHDRAWN
    assert len({one.digest for one in papers.values()}) == len(papers)
    for paper in papers.values():
        assert paper.pdf.startswith(b"%PDF-")
        assert hashlib.sha256(paper.pdf).hexdigest() == paper.digest


def every_event_came_and_counted_once(airline: Airline) -> None:
    heard = airline.scheduling.heard
    written = {event.pk.hex: (event.name, event.about) for event in WebhookEvent.objects.all()}
    flown = DAYS * FLIGHTS_A_DAY - WITHDRAWN

    assert {number: (one.type, f"load:{one.data['load']}") for number, one in heard.items()} == written
    kinds = [one.type for one in heard.values()]
    assert {kind: kinds.count(kind) for kind in EVENTS} == {
        "load.rejected": len(airline.scheduling.told),
        "load.accepted": flown,
        "manifest.filed": flown,
    }
    assert set(WebhookDelivery.objects.values_list("state", flat=True)) == {"delivered"}
    assert airline.scheduling.came > len(heard)  # some came again, after a refusal


def the_line_was_as_bad_as_meant(line: BadLine) -> None:
    kinds = {
        "answer lost",
        "request lost",
        "answer cut within",
        "sent twice",
        "busy",
        "server away",
        "stalled",
    }
    assert {kind for kind in kinds if line.befell[kind]} == kinds, line.befell
    assert line.replayed >= DAYS
