"""Addresses of the fleet's part of the API."""

from django.urls import path

from fleet.api import aircraft, empty_weights, loading_bases, own, people, settings, tokens

_ONE = "aircraft/<str:registration>"

urlpatterns = [
    path("me", own.OwnEndpoint.as_view()),
    path("me/password", own.OwnPasswordEndpoint.as_view(), name="api-own-password"),
    path("me/mail", own.OwnMailEndpoint.as_view()),
    path("me/sessions/ending", own.SessionsEndingEndpoint.as_view()),
    path("people", people.PeopleEndpoint.as_view()),
    path("people/<int:person>", people.OnePersonEndpoint.as_view()),
    path("people/<int:person>/duties", people.DutiesEndpoint.as_view()),
    path("people/<int:person>/deactivation", people.DeactivationEndpoint.as_view()),
    path("tokens", tokens.TokensEndpoint.as_view()),
    path("tokens/<int:token>/rotation", tokens.RotationEndpoint.as_view()),
    path("tokens/<int:token>/revocation", tokens.RevocationEndpoint.as_view()),
    path("settings", settings.SettingsEndpoint.as_view()),
    path("aircraft", aircraft.AircraftEndpoint.as_view()),
    path(_ONE, aircraft.OneAircraftEndpoint.as_view()),
    path(f"{_ONE}/configurations", aircraft.ConfigurationsEndpoint.as_view()),
    path(f"{_ONE}/loading-bases", loading_bases.LoadingBasesEndpoint.as_view()),
    path(f"{_ONE}/loading-bases/<uuid:version>", loading_bases.OneLoadingBasisEndpoint.as_view()),
    path(
        f"{_ONE}/loading-bases/<uuid:version>/approval", loading_bases.LoadingBasisApprovalEndpoint.as_view()
    ),
    path(f"{_ONE}/empty-weights", empty_weights.EmptyWeightsEndpoint.as_view()),
    path(f"{_ONE}/empty-weights/<uuid:version>", empty_weights.OneEmptyWeightEndpoint.as_view()),
    path(
        f"{_ONE}/empty-weights/<uuid:version>/approval", empty_weights.EmptyWeightApprovalEndpoint.as_view()
    ),
    path(f"{_ONE}/weighings", empty_weights.WeighingsEndpoint.as_view()),
]
