"""`manage.py enter-operator`: the first real operator and its first person."""

from argparse import ArgumentParser
from getpass import getpass
from pathlib import Path
from typing import Any

from django.core.management.base import BaseCommand, CommandError

from fleet.actions.enter_operator import FirstPerson, NewOperator, enter_operator
from fleet.acts import ENTER_OPERATOR
from records.actor import Actor
from records.refusal import Refused

SET_UP = Actor(
    operator=None,
    kind="service",
    key="service:set-up",
    name="",
    capacity="set-up",
    may=frozenset({ENTER_OPERATOR.name}),
)


class Command(BaseCommand):
    """Enters an operator and its first person, an operations manager, who enters all others."""

    help = "Enter an operator and its first person, an operations manager, who enters everybody else."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will declare what is asked for."""
        parser.add_argument("--code", required=True, help="short name of a-z, 0-9 and -; its chain bears it")
        parser.add_argument("--name", required=True, help="the certificate holder's name")
        parser.add_argument("--certificate", default="", help="certificate number")
        parser.add_argument("--base", default="", help="principal base")
        parser.add_argument("--time-zone", required=True, help="IANA name, like America/Denver")
        parser.add_argument("--rule-set", required=True, choices=["US", "EU-UK"], help="which rules bind")
        parser.add_argument(
            "--procedure", required=True, help="procedure followed: manual, section, revision"
        )
        parser.add_argument("--weight-method", required=True, help="how weights of people and bags are found")
        parser.add_argument(
            "--estimates-may-be-signed",
            action="store_true",
            help="the operator's approved procedure allows signing a load with estimated weights of people",
        )
        parser.add_argument(
            "--two-to-sign",
            action="store_true",
            help="the person who prepared a load may not accept it",
        )
        parser.add_argument("--login", required=True, help="login of the first person")
        parser.add_argument("--person-name", required=True, help="name of the first person, as printed")
        parser.add_argument(
            "--password-file", type=Path, help="its first line is the password; else it is asked for"
        )

    def handle(self, *_: Any, **options: Any) -> None:
        """This function will enter both, or say in one sentence per field what is wrong."""
        new = NewOperator(
            code=options["code"],
            name=options["name"],
            certificate=options["certificate"],
            base=options["base"],
            time_zone=options["time_zone"],
            rule_set=options["rule_set"],
            procedure=options["procedure"],
            weight_method=options["weight_method"],
            estimates_may_be_signed=options["estimates_may_be_signed"],
            prepare_and_accept_by_one=not options["two_to_sign"],
        )
        first = FirstPerson(options["login"], options["person_name"], _password(options["password_file"]))
        try:
            operator, person = enter_operator(SET_UP, new, first, reason="entered at set-up")
        except Refused as refused:
            faults = [f"{fault.pointer.strip('/')}: {fault.detail}" for fault in refused.faults]
            raise CommandError("\n".join(faults or [refused.detail])) from refused
        self.stdout.write(f"Entered {operator.name} ({operator.code}).")
        self.stdout.write(f"{person.login} may sign in as operations manager and enter people and aircraft.")


def _password(file: Path | None) -> str:
    """This function will return the password in the file, or ask for it twice."""
    if file is not None:
        try:
            lines = file.read_text(encoding="utf-8").splitlines()
        except (OSError, UnicodeDecodeError) as problem:
            raise CommandError(f"{file} cannot be read: {problem}.") from problem
        return lines[0] if lines else ""
    password = getpass("Password of the first person: ")
    if getpass("The same again: ") != password:
        raise CommandError("The two passwords differ; nothing was entered.")
    return password
