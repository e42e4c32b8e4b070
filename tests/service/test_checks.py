"""Mistakes of a deployment stop it, each with an id and a hint."""

from types import SimpleNamespace

from service import checks

HERE = SimpleNamespace(
    ALLOWED_HOSTS=["127.0.0.1", "localhost"], HTTPS=False, DATABASES={"default": {"USER": "a"}}
)


def _ids(messages):
    assert all(message.hint for message in messages)
    return [message.id for message in messages]


def _settings(monkeypatch, **changes):
    monkeypatch.setattr(checks, "settings", SimpleNamespace(**(vars(HERE) | changes)))


def test_two_roles_and_plain_http_on_this_machine_are_sound(monkeypatch):
    _settings(monkeypatch, DATABASES={"default": {"USER": "serves"}, "owner": {"USER": "owns"}})

    assert _ids(checks.two_roles(None)) == []
    assert _ids(checks.plain_http_stays_here(None)) == []


def test_one_role_for_both_jobs_is_refused(monkeypatch):
    _settings(monkeypatch, DATABASES={"default": {"USER": "same"}, "owner": {"USER": "same"}})

    assert _ids(checks.two_roles(None)) == ["tarebook.E001"]


def test_plain_http_for_other_machines_is_refused(monkeypatch):
    _settings(monkeypatch, ALLOWED_HOSTS=["127.0.0.1", "loads.example"])
    assert _ids(checks.plain_http_stays_here(None)) == ["tarebook.E002"]

    _settings(monkeypatch, ALLOWED_HOSTS=["127.0.0.1", "loads.example"], HTTPS=True)
    assert _ids(checks.plain_http_stays_here(None)) == []


def test_the_owners_address_beside_the_serving_one_is_warned_of(monkeypatch):
    _settings(monkeypatch, DATABASES={"default": {}, "owner": {}})
    assert _ids(checks.owner_stays_away(None)) == ["tarebook.W003"]

    _settings(monkeypatch)
    assert _ids(checks.owner_stays_away(None)) == []
