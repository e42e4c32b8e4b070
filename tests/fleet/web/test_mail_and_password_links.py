"""A person's own mail address, and the way back for somebody who forgot their password."""

import re
from datetime import timedelta

import pytest
from django.core import mail
from django.test import Client
from django.utils import timezone

from fleet.actions.change_mail import change_mail
from fleet.actions.choose_password import choose_password
from fleet.actions.let_choose_password import let_choose_password
from fleet.models import Person
from records.models import Act, Change
from records.refusal import NotAllowed, NotKnown, StepRefused
from tests.cast import PASSWORD, actor, browser, cast, post, strangers
from tests.reading_pages import Page

pytestmark = pytest.mark.django_db
NEW = "another-good-phrase-4"
ADDRESS = "r.amani@example.org"
TYPED = {"new": NEW, "again": NEW}


@pytest.fixture
def people():
    return cast()


def _link_of(people, client=None) -> str:
    answer = (client or browser(people.manager)).post(
        f"/people/{people.pilot.pk}/password-link", {"reason": "forgotten"}
    )
    assert answer.status_code == 200
    found = re.search(r"http://testserver(/new-password/[^<\s]+)", answer.content.decode())
    assert found is not None
    return found.group(1)


def test_the_address_is_kept_from_ones_own_page_and_taken_out_again(people):
    client = browser(people.pilot)

    client.post("/me/mail", {"mail": ADDRESS})
    assert Person.objects.get(pk=people.pilot.pk).mail == ADDRESS
    assert Page(client.get("/me")).form("/me/mail").values["mail"] == ADDRESS

    client.post("/me/mail", {"mail": ""})
    assert Person.objects.get(pk=people.pilot.pk).mail == ""


def test_a_wrong_address_is_named_at_its_input_and_comes_back(people):
    answer = browser(people.pilot).post("/me/mail", {"mail": "amani at example"})

    page = Page(answer)
    assert (answer.status_code, set(page.faults)) == (422, {"mail"})
    assert page.form("/me/mail").values["mail"] == "amani at example"


def test_the_trail_never_holds_the_address_itself(people):
    change_mail(actor(people.pilot), people.pilot, ADDRESS)

    act = Act.objects.get(kind="change-mail")
    images = [str(change.__dict__) for change in Change.objects.filter(act=act)]
    assert len(images) == 1
    assert ADDRESS not in images[0]
    assert "mail" in images[0]


def test_nobody_changes_anothers_address(people):
    with pytest.raises(NotAllowed):
        change_mail(actor(people.manager), people.pilot, ADDRESS)


def test_a_program_keeps_no_address_but_a_session_does(people, client):
    client.force_login(people.pilot)

    answer = post(client, "/me/mail", {"mail": ADDRESS})

    assert answer.status_code == 200
    assert Person.objects.get(pk=people.pilot.pk).mail == ADDRESS


def test_whoever_has_the_link_chooses_a_password_and_signs_in_with_it(people):
    before = browser(people.pilot)
    address, stranger = _link_of(people), Client()

    assert people.pilot.login in stranger.get(address).content.decode()
    answer = stranger.post(address, TYPED)

    assert answer["Location"] == "/sign-in?chosen=yes"
    assert before.get("/me").status_code == 302
    assert stranger.get("/me").status_code == 302  # a link alone opens no session
    signed = stranger.post("/sign-in", {"login": people.pilot.login, "password": NEW})
    assert signed.status_code == 302
    kinds = list(Act.objects.order_by("at").values_list("kind", "reason"))
    assert ("let-choose-password", "forgotten") in kinds
    assert kinds[-1] == ("change-password", "chosen anew by a link that an operations manager made")


def test_a_link_serves_once(people):
    address = _link_of(people)
    Client().post(address, TYPED)

    again = Client().post(address, {"new": "yet-another-phrase-5", "again": "yet-another-phrase-5"})

    assert again.status_code == 404
    assert Person.objects.get(pk=people.pilot.pk).check_password(NEW)


def test_of_two_who_hold_one_link_the_second_is_refused(people):
    link = let_choose_password(actor(people.manager), people.pilot, reason="forgotten")
    choose_password(actor(people.pilot), people.pilot, link.code, new=NEW)

    with pytest.raises(NotKnown):
        choose_password(actor(people.pilot), people.pilot, link.code, new="yet-another-phrase-5")


def test_a_link_is_too_old_after_four_hours(people, monkeypatch):
    address = _link_of(people)
    later = timezone.now().replace(tzinfo=None) + timedelta(hours=4, seconds=2)
    monkeypatch.setattr("django.contrib.auth.tokens.PasswordResetTokenGenerator._now", lambda _self: later)

    assert Client().get(address).status_code == 404


@pytest.mark.parametrize("spoiled", ["/new-password/{}/abc-def", "/new-password/999999/{}"])
def test_a_link_that_never_was_does_not_serve(people, spoiled):
    assert Client().get(spoiled.format(people.pilot.pk)).status_code == 404


def test_a_link_of_one_person_does_not_serve_for_another(people):
    code = _link_of(people).rpartition("/")[2]

    assert Client().get(f"/new-password/{people.manager.pk}/{code}").status_code == 404


@pytest.mark.parametrize(
    ("typed", "field"),
    [({"new": NEW, "again": NEW + "x"}, "again"), ({"new": "short", "again": "short"}, "new")],
)
def test_what_is_wrong_with_the_new_password_stands_at_its_input(people, typed, field):
    answer = Client().post(_link_of(people), typed)

    assert (answer.status_code, set(Page(answer).faults)) == (422, {field})
    assert Person.objects.get(pk=people.pilot.pk).check_password(PASSWORD)


def test_with_an_address_and_a_server_the_link_is_mailed_and_not_shown(people, settings):
    settings.EMAIL_HOST = "mail.example"
    change_mail(actor(people.pilot), people.pilot, ADDRESS)

    answer = browser(people.manager).post(f"/people/{people.pilot.pk}/password-link", {"reason": "forgotten"})

    (message,) = mail.outbox
    assert message.to == [ADDRESS]
    assert "/new-password/" in message.body
    assert "/new-password/" not in answer.content.decode()
    assert ADDRESS in answer.content.decode()


def test_a_server_that_takes_no_mail_leaves_the_link_on_the_page(people, settings, monkeypatch):
    settings.EMAIL_HOST = "mail.example"
    change_mail(actor(people.pilot), people.pilot, ADDRESS)

    def fails(_self):
        raise ConnectionRefusedError

    monkeypatch.setattr("django.core.mail.EmailMessage.send", fails)

    assert _link_of(people).startswith("/new-password/")


def test_nobody_makes_a_link_for_oneself_a_stranger_or_who_left(people):
    away = strangers().pilot
    with pytest.raises(NotAllowed):
        let_choose_password(actor(people.manager), people.manager, reason="x")
    with pytest.raises(NotKnown):
        let_choose_password(actor(people.manager), away, reason="x")
    people.idle.is_active = False
    with pytest.raises(StepRefused):
        let_choose_password(actor(people.manager), people.idle, reason="x")
    assert not Act.objects.filter(kind="let-choose-password").exists()
