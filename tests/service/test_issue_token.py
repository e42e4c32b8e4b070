"""`manage.py issue_token`: prints a token once, with all the duties allow but signing."""

from io import StringIO

import pytest
from django.core.management import CommandError, call_command

from fleet.models import Token
from fleet.queries.tokens import digest_of
from records.models import Act
from tests.cast import cast

pytestmark = pytest.mark.django_db


def _issue(*arguments):
    out, err = StringIO(), StringIO()
    call_command("issue_token", *arguments, stdout=out, stderr=err)
    return out.getvalue().strip(), err.getvalue()


def test_the_secret_alone_is_on_standard_output():
    people = cast()

    secret, told = _issue(people.pilot.login.upper(), "--label", "desk")

    token = Token.objects.get(digest=digest_of(secret))
    assert token.person == people.pilot
    assert "submit-load" in token.scopes
    assert "sign" not in token.scopes
    assert secret not in told
    assert Act.objects.get(kind="issue-token").actor_key == "service:command"


def test_an_integration_gets_no_signature_even_when_asked():
    people = cast()

    with pytest.raises(CommandError, match="not to be had"):
        _issue(people.pilot.login, "--label", "x", "--integration", "--scope", "accept-load")

    _issue(people.pilot.login, "--label", "x", "--integration")
    token = Token.objects.get()
    assert token.integration
    assert "accept-load" not in token.scopes


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        (("nobody", "--label", "x"), "Nobody has the login"),
        (("kestrel-test.pilot", "--label", "x", "--days", "366"), "up to 365 days"),
        (("kestrel-test.pilot", "--label", "x", "--days", "0"), "up to 365 days"),
        (("kestrel-test.pilot", "--label", "x", "--days", "999999999"), "up to 365 days"),
        (("kestrel-test.idle", "--label", "x"), "without a scope"),
    ],
)
def test_what_is_wrong_is_said_in_a_sentence(arguments, words):
    cast()

    with pytest.raises(CommandError, match=words):
        _issue(*arguments)

    assert not Token.objects.exists()
