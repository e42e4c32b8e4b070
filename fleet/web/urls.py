"""Addresses of the fleet pages."""

from django.urls import path

from fleet.web import access_log, aircraft, own, password_links, people, provisions, settings, tokens

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
    path("aircraft/<str:registration>/restrictions", provisions.restrictions, name="restrictions"),
    path(
        "aircraft/<str:registration>/restrictions/<uuid:version>/lifting",
        provisions.lift,
        name="lift-restriction",
    ),
    path("aircraft/<str:registration>/permits", provisions.permits, name="permits"),
    path(
        "aircraft/<str:registration>/permits/<uuid:version>/approval",
        provisions.approve_a_permit,
        name="approve-permit",
    ),
    path(
        "aircraft/<str:registration>/permits/<uuid:version>/ending",
        provisions.end_a_permit,
        name="end-permit",
    ),
    path("standard-weights", provisions.standard_weights, name="standard-weights"),
    path(
        "standard-weights/<uuid:version>/approval",
        provisions.approve_weights,
        name="approve-standard-weights",
    ),
    path("rules", provisions.rules, name="rules"),
    path("rules/<uuid:version>/approval", provisions.approve_the_rules, name="approve-rules"),
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
