"""Addresses of the fleet pages."""

from django.urls import path

from fleet.web import aircraft, settings

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
    path("settings", settings.settings, name="settings"),
]
