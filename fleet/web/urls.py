"""Addresses of the fleet pages."""

from django.urls import path

from fleet.web import access_log, aircraft, own, password_links, people, settings, tokens

urlpatterns = [
    path("aircraft", aircraft.aircraft_list, name="aircraft-list"),
    path("aircraft/<str:registration>", aircraft.one_aircraft, name="aircraft"),
    path(
        "aircraft/<str:registration>/loading-bases/<uuid:version>/approval",
        aircraft.approve_basis,
        name="approve-loading-basis",
    ),
    path(
        "aircraft/<str:registration>/empty-weights/<uuid:version>/approval",
        aircraft.approve_weight,
        name="approve-empty-weight",
    ),
    path("people", people.people, name="people"),
    path("people/<int:person>", people.one_person, name="person"),
    path("people/<int:person>/duties", people.change_duty, name="person-duties"),
    path("people/<int:person>/deactivation", people.deactivate, name="person-deactivation"),
    path("people/<int:person>/password-link", password_links.make_link, name="person-password-link"),
    path("tokens", tokens.tokens, name="tokens"),
    path("tokens/<int:token>/rotation", tokens.rotate, name="token-rotation"),
    path("tokens/<int:token>/revocation", tokens.revoke, name="token-revocation"),
    path("me", own.own, name="own"),
    path("me/password", own.password, name="own-password"),
    path("me/mail", own.mail, name="own-mail"),
    path("me/sessions", own.sessions, name="own-sessions"),
    path("access-log", access_log.access_log, name="access-log"),
    path("settings", settings.settings, name="settings"),
]
