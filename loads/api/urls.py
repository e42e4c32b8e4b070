"""Addresses of the loads room's part of the API."""

from django.urls import path

from loads.api.assessments import AssessmentsView
from loads.api.late_changes import LateChangesView, LatePreviewView, NotesView
from loads.api.loads import LoadsView, LoadView
from loads.api.manifests import ManifestView
from loads.api.rechecks import RechecksView, RecheckTableView, RecheckView
from loads.api.remedies import RemediesView
from loads.api.seating import SeatingVariationsView
from loads.api.signatures import SignaturesView
from loads.api.steps import AssessmentView, DepartureView, RevisionsView, WithdrawalView
from loads.api.trail import ActView, TrailView

urlpatterns = [
    path("assessments", AssessmentsView.as_view(), name="api-assessments"),
    path(
        "aircraft/<str:registration>/seating-variations",
        SeatingVariationsView.as_view(),
        name="api-seating-variations",
    ),
    path("loads", LoadsView.as_view(), name="api-loads"),
    path("loads/<uuid:load>", LoadView.as_view(), name="api-load"),
    path("loads/<uuid:load>/revisions", RevisionsView.as_view(), name="api-load-revisions"),
    path("loads/<uuid:load>/assessment", AssessmentView.as_view(), name="api-load-assessment"),
    path("loads/<uuid:load>/signatures", SignaturesView.as_view(), name="api-load-signatures"),
    path("loads/<uuid:load>/remedies", RemediesView.as_view(), name="api-load-remedies"),
    path("loads/<uuid:load>/manifest", ManifestView.as_view(), name="api-load-manifest"),
    path("loads/<uuid:load>/last-minute-changes", LateChangesView.as_view(), name="api-load-late-changes"),
    path(
        "loads/<uuid:load>/last-minute-changes/preview",
        LatePreviewView.as_view(),
        name="api-load-late-preview",
    ),
    path("loads/<uuid:load>/notes", NotesView.as_view(), name="api-load-notes"),
    path("loads/<uuid:load>/withdrawal", WithdrawalView.as_view(), name="api-load-withdrawal"),
    path("loads/<uuid:load>/departure", DepartureView.as_view(), name="api-load-departure"),
    path("rechecks", RechecksView.as_view(), name="api-rechecks"),
    path("rechecks/<uuid:recheck>", RecheckView.as_view(), name="api-recheck"),
    path("rechecks/<uuid:recheck>.csv", RecheckTableView.as_view(), name="api-recheck-table"),
    path("trail", TrailView.as_view(), name="api-trail"),
    path("trail/<uuid:act>", ActView.as_view(), name="api-act"),
]
