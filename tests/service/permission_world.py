"""What the permission matrix is tried on: two operators with one of everything, one person for each role."""

from dataclasses import dataclass, field
from datetime import timedelta
from typing import Any

from django.test import Client
from django.utils import timezone

from fleet.actions.approve_rules import approve_rules
from fleet.actions.enter_empty_weight import enter_empty_weight
from fleet.actions.enter_loading_basis import enter_loading_basis
from fleet.actions.enter_permit import enter_permit
from fleet.actions.enter_person import enter_person
from fleet.actions.enter_restriction import enter_restriction
from fleet.actions.enter_rules import enter_rules
from fleet.actions.enter_standard_weights import enter_standard_weights
from fleet.actions.grant_duty import grant_duty
from fleet.actions.issue_token import issue_token
from fleet.models import EmptyWeight, Person
from loads.actions.ask_recheck import ask_recheck
from loads.actions.depart_load import depart_load
from loads.actions.file_manifest import manifest_of
from loads.actions.self_check import run_self_check
from loads.actions.submit_load import submit_load
from loads.queries.current import Current
from records.models import Act, WebhookDelivery
from records.webhooks.deliver import deliver_due
from records.webhooks.sending import Outcome
from records.webhooks.subscribe import subscribe
from service import allowed
from tests.cast import PASSWORD, Cast, actor, cast
from tests.loads.late import BAG, bounded, change_of, proposed
from tests.loads.making import accepted, load_document, outside_document, prepared, submitted
from tests.makers import basis_document, empty_weight_document, make_empty_weight, q, ready_aircraft
from tests.pure.fleet.test_rules import rule, rules_document
from tests.pure.loads.papers import permit_document, restriction_document
from tests.pure.loads.standards import seasonal_document
from tests.records.webhooks.making import make_due

ADDRESS = "https://hooks.example.org/"


@dataclass(frozen=True, slots=True)
class World:
    """One operator: who holds which role (`idle` holds none), and what stands there by name."""

    people: Cast
    by_role: dict[str, Person]
    aircraft: str
    loads: dict[str, Current]
    names: dict[str, str] = field(default_factory=dict)
    secrets: dict[tuple[str, bool], str] = field(default_factory=dict)

    def marks(self) -> set[str]:
        """This function will return words by which what is this operator's is known."""
        loads = {str(one.load.id) for one in self.loads.values()}
        return (
            loads | set(self.names.values()) | {one.login for one in self.by_role.values()} | {self.aircraft}
        )


def make_world(code: str, aircraft: str) -> World:
    """This function will enter an operator with all its people, aircraft, loads in every state and tokens."""
    run_self_check("start")  # as every start of the service does: none is overdue when somebody signs
    people = cast(code)
    by_role = _roles(people, code)
    # A stale load has an aircraft of its own, so that the others stay fresh.
    stale_at = f"{aircraft}S"
    ready_aircraft(people, stale_at)
    stale = _submitted(people, stale_at, reference="STALE")
    make_empty_weight(people, stale.load.aircraft, _heavier())
    ready_aircraft(people, aircraft)
    bounded(people, "500", persons=3)
    names = _subscriptions(people, aircraft)
    loads = {"stale": stale, **_loads(people, aircraft)}
    loads["supervised"] = _supervised(people, aircraft)
    _park(names)
    names |= _waiting_versions(loads["open"]) | _provisions(people, loads["open"])
    names["digest"] = manifest_of(people.operator.code, loads["accepted"].load.id)[0]
    names["act"] = str(Act.objects.get(about=f"load:{loads['open'].load.id}").pk)
    names["recheck"] = str(ask_recheck({"aircraft": aircraft}, by=actor(people.manager)).id)
    late = proposed(loads["accepted"], change_of(BAG))
    names["late digest"] = late.computation.digest
    secrets = _tokens(by_role, names)
    Client().post("/sign-in", {"login": people.pilot.login, "password": PASSWORD})
    return World(people, by_role, aircraft, loads, names, secrets)


def _roles(people: Cast, code: str) -> dict[str, Person]:
    return {
        "pilot": people.pilot,
        "load preparer": people.preparer,
        "loading supervisor": _another(people, code, "loading", "loading supervisor"),
        "maintenance": people.maintenance,
        "records approver": people.approver,
        "operations manager": people.manager,
        "auditor": people.auditor,
        "integration": _another(people, code, "program", "integration"),
        "idle": people.idle,
    }


def _another(people: Cast, code: str, login: str, role: str) -> Person:
    made = enter_person(
        actor(people.manager),
        people.operator,
        login=f"{code}.{login}",
        name=f"B. {login}",
        password=PASSWORD,
    )
    grant_duty(actor(people.manager), made, role)
    return made


def _submitted(people: Cast, aircraft: str, **flight: str) -> Current:
    document = load_document(people, aircraft=aircraft)
    document["flight"] |= flight
    return submitted(people, **document)


def _heavier() -> dict[str, Any]:
    return empty_weight_document(weight=q("5220", "lb"), report="W-2026-1", true_from="2026-02-01T00:00:00Z")


def _loads(people: Cast, aircraft: str) -> dict[str, Current]:
    """This function will make a load in every state, and one that is outside."""
    outside = outside_document(people) | {"aircraft": aircraft}
    departed = accepted(people, prepared(people, _submitted(people, aircraft, reference="GONE")))
    return {
        "open": _submitted(people, aircraft),
        "prepared": prepared(people, _submitted(people, aircraft, reference="PREPARED")),
        "accepted": accepted(people, prepared(people, _submitted(people, aircraft, reference="ACCEPTED"))),
        "reject": submit_load(outside, by=actor(people.preparer)),
        "departed": depart_load(
            departed.load.id, at=timezone.now(), seen=str(departed.step.number), by=actor(people.pilot)
        ),
    }


def _subscriptions(people: Cast, aircraft: str) -> dict[str, str]:
    """This function will subscribe two receivers before the loads are made, so that both have deliveries."""
    made = {
        name: subscribe(
            actor(people.manager),
            address=f"{ADDRESS}{aircraft}/{name}",
            events=["load.rejected"],
            label=f"{name} {aircraft}",
        )
        for name in ("webhook", "parked")
    }
    return {name: str(one.standing.webhook.pk) for name, one in made.items()}


def _park(names: dict[str, str]) -> None:
    """This function will let ten tries at one receiver fail, and remember a delivery of the other."""
    down = Outcome("not reached", detail="nobody there")
    for _ in range(10):
        make_due(names["parked"])
        deliver_due(names["parked"], sending=lambda *_: down)
    names["delivery"] = str(WebhookDelivery.objects.get(webhook=names["webhook"]).pk)


def _waiting_versions(current: Current) -> dict[str, str]:
    """This function will enter a loading basis and an empty weight that nobody approved yet."""
    aircraft = current.load.aircraft
    mechanic = Person.objects.get(operator=aircraft.operator_id, login__endswith=".mechanic")
    basis = enter_loading_basis(actor(mechanic), aircraft, basis_document())
    weight = enter_empty_weight(actor(mechanic), aircraft, _heavier())
    assert EmptyWeight.objects.filter(aircraft=aircraft).count() == 2
    return {"basis": str(basis.id), "weight": str(weight.id)}


def _provisions(people: Cast, current: Current) -> dict[str, str]:
    """This function will enter a table, rules and a permit that nobody approved yet, a restriction of later
    years, and a rule that asks the loading supervisor to sign what is chartered under supervision.
    """
    aircraft, mechanic = current.load.aircraft, actor(people.maintenance)
    code = people.operator.code
    manager = actor(_another(people, code, "second", "operations manager"))
    later = {"true_from": "2031-01-01T00:00:00Z"}
    lower = {"effect": "limit", "limit": "take_off", "weight": q("8000", "lb")}
    return {
        "table": str(enter_standard_weights(manager, seasonal_document()).id),
        "rules": str(enter_rules(manager, rules_document(rule(none=True))).id),
        "restriction": str(enter_restriction(mechanic, aircraft, restriction_document(lower, **later)).id),
        "permit": str(enter_permit(mechanic, aircraft, permit_document(lower)).id),
    }


def _supervised(people: Cast, aircraft: str) -> Current:
    """This function will make a prepared load that the loading supervisor has to sign."""
    asks = rule("loading-signature", demanded=True, applies_to={"operations": ["supervised"]})
    entered = enter_rules(actor(people.manager), rules_document(asks))
    approve_rules(actor(people.approver), entered)
    return prepared(people, _submitted(people, aircraft, reference="SUPERVISED", operation="supervised"))


def _tokens(by_role: dict[str, Person], names: dict[str, str]) -> dict[tuple[str, bool], str]:
    """This function will issue everybody who may read a token of their own and one for a program."""
    secrets = {}
    for role, person in by_role.items():
        for integration in (False, True):
            scopes = allowed.grantable([role], integration=integration)
            if not scopes:
                continue
            issued = issue_token(
                actor(person, may=frozenset({"issue-token"})),
                person,
                label=f"{role} of {person.operator_id}",
                scopes=scopes,
                grantable=scopes,
                valid_for=timedelta(days=1),
                integration=integration,
            )
            secrets[role, integration] = issued.secret
            names[f"token of {role}{', a program' if integration else ''}"] = str(issued.token.pk)
    return secrets
