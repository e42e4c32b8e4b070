"""Addresses of the fleet's part of the API."""

from django.urls import path

from fleet.api import (
    aircraft,
    empty_weights,
    loading_bases,
    own,
    people,
    permits,
    restrictions,
    rules,
    settings,
    standard_weights,
    tokens,
)

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
    path("standard-weights", standard_weights.StandardWeightsEndpoint.as_view()),
    path("standard-weights/<uuid:version>", standard_weights.OneStandardWeightsEndpoint.as_view()),
    path(
        "standard-weights/<uuid:version>/approval", standard_weights.StandardWeightsApprovalEndpoint.as_view()
    ),
    path("rules", rules.RulesEndpoint.as_view()),
    path("rules/<uuid:version>", rules.OneRulesEndpoint.as_view()),
    path("rules/<uuid:version>/approval", rules.RulesApprovalEndpoint.as_view()),
    path(f"{_ONE}/restrictions", restrictions.RestrictionsEndpoint.as_view()),
    path(f"{_ONE}/restrictions/<uuid:version>", restrictions.OneRestrictionEndpoint.as_view()),
    path(f"{_ONE}/restrictions/<uuid:version>/lifting", restrictions.RestrictionLiftingEndpoint.as_view()),
    path(f"{_ONE}/permits", permits.PermitsEndpoint.as_view()),
    path(f"{_ONE}/permits/<uuid:version>", permits.OnePermitEndpoint.as_view()),
    path(f"{_ONE}/permits/<uuid:version>/approval", permits.PermitApprovalEndpoint.as_view()),
    path(f"{_ONE}/permits/<uuid:version>/ending", permits.PermitEndingEndpoint.as_view()),
]
