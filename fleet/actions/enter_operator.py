"""Enters an operator with its first person: the one act that the house does for an operator."""

import secrets
import zoneinfo
from dataclasses import asdict, dataclass
from functools import partial

from fleet import acts
from fleet.actions.constraint_refusals import refused_as
from fleet.actions.enter_person import LOGIN_REFUSALS
from fleet.actions.passwords import hash_of_new
from fleet.actions.row_faults import checked
from fleet.models import Duty, Operator, Person
from fleet.models.rows import new_number
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid

_CODE_FORM = "a code is 2 to 40 of a-z, 0-9 and -, beginning with a letter or digit"
_REFUSALS = {
    "fleet_operator_pkey": partial(
        Invalid, Fault("/code", "operator-taken", "an operator of this code is entered")
    ),
    "operator_code_is_plain": partial(Invalid, Fault("/code", "wrong-form", _CODE_FORM)),
    "operator_code_is_not_the_house_chain": partial(
        Invalid, Fault("/code", "operator-taken", "house is the chain of what belongs to no operator")
    ),
    "operator_rule_set_is_known": partial(
        Invalid, Fault("/rule_set", "not-a-choice", "the rule sets are US and EU-UK")
    ),
}


@dataclass(frozen=True, slots=True)
class NewOperator:
    """What is entered of an operator. `time_zone` is an IANA name; `rule_set` is US or EU-UK."""

    code: str
    name: str
    time_zone: str
    rule_set: str
    procedure: str
    weight_method: str
    certificate: str = ""
    base: str = ""
    estimates_may_be_signed: bool = False
    prepare_and_accept_by_one: bool = True
    invented: bool = False


@dataclass(frozen=True, slots=True)
class FirstPerson:
    """The operator's first person, an operations manager, who enters the others."""

    login: str
    name: str
    password: str


def enter_operator(
    actor: Actor, new: NewOperator, first: FirstPerson, *, reason: str = ""
) -> tuple[Operator, Person]:
    """This function will enter an operator and its first person, an operations manager, on the house chain.

    Raises Invalid for a code or login that is taken or not plain, an unknown time zone or rule set, and a
    weak password.
    """
    operator = checked(Operator(**asdict(new)))
    if new.time_zone not in zoneinfo.available_timezones():
        raise Invalid(Fault("/time_zone", "time-zone-unknown", "not an IANA time zone, like America/Denver"))
    person = Person(
        id=new_number(Person),
        operator=operator,
        login=first.login.lower(),
        name=first.name,
        password=hash_of_new(first.password),
        salt=secrets.token_bytes(32),
    )
    checked(person, leave=("operator",))
    with (
        refused_as(_REFUSALS | LOGIN_REFUSALS),
        act(acts.ENTER_OPERATOR, by=actor, about=f"operator:{new.code}", reason=reason) as entry,
    ):
        operator.save(force_insert=True)
        person.save(force_insert=True)
        Duty.objects.create(
            operator=operator, person=person, role="operations manager", granted=True, since=entry.at
        )
    return operator, person
