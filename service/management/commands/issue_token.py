"""`manage.py issue_token LOGIN --label ... --scope ...` prints a bearer token, once."""

from argparse import ArgumentParser
from datetime import timedelta
from typing import Any

from django.core.management.base import BaseCommand, CommandError
from django.utils import timezone

from fleet.actions.issue_token import issue_token
from fleet.acts import ISSUE_TOKEN
from fleet.models import Person
from fleet.models.token import LONGEST
from fleet.queries.duties import roles_of
from records.actor import Actor
from records.refusal import Refused
from service import allowed


class Command(BaseCommand):
    """Issue a bearer token."""

    help = "Issue a bearer token of a person or an integration and print it. It is shown this once."

    def add_arguments(self, parser: ArgumentParser) -> None:
        """This function will declare whose token, its label, scopes and life."""
        parser.add_argument("login")
        parser.add_argument("--label", required=True, help="what it is for; stands in the trail")
        parser.add_argument(
            "--scope",
            action="append",
            default=[],
            metavar="NAME",
            help="an act's name, read, or sign; repeat for more; without any: all the duties allow but sign",
        )
        parser.add_argument("--days", type=int, default=90, help=f"valid for so many, 1 to {LONGEST.days}")
        parser.add_argument(
            "--aircraft",
            action="append",
            default=[],
            metavar="REGISTRATION",
            help="serve for this aircraft only; repeat for more; without any: for all",
        )
        parser.add_argument("--integration", action="store_true", help="a program's token, which never signs")

    def handle(self, *_: Any, **options: Any) -> None:
        """This function will print the secret; raises CommandError with what is wrong."""
        person = Person.objects.filter(login=options["login"].lower()).first()
        if person is None:
            raise CommandError(f"Nobody has the login {options['login']}.")
        grantable = allowed.grantable(roles_of(person, timezone.now()), integration=options["integration"])
        by = Actor(
            operator=person.operator_id,
            kind="service",
            key="service:command",
            name="",
            capacity="command line",
            may=frozenset({ISSUE_TOKEN.name}),
        )
        try:
            issued = issue_token(
                by,
                person,
                label=options["label"],
                scopes=options["scope"] or sorted(grantable - {allowed.SIGN}),
                grantable=grantable,
                valid_for=timedelta(days=options["days"]),
                integration=options["integration"],
                registrations=options["aircraft"],
            )
        except Refused as refused:
            raise CommandError(refused.detail) from refused
        self.stdout.write(issued.secret)
        self.stderr.write(
            f"Token {issued.token.pk} of {person.login}, valid until {issued.token.expires_at:%Y-%m-%d}, "
            f"may: {', '.join(issued.token.scopes)}. It is not shown again."
        )
