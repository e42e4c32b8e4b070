"""Addresses of the notary's part of the API."""

from django.urls import URLPattern, URLResolver, path, re_path

from records.api.access_log import AccessLogView
from records.api.documents import DocumentView
from records.api.webhook_deliveries import WebhookDeliveriesView, WebhookReplayView
from records.api.webhooks import WebhookResumptionView, WebhookSecretView, WebhooksView, WebhookView

_ONE = "webhooks/<uuid:webhook>"

urlpatterns: list[URLPattern | URLResolver] = [
    re_path(r"^documents/(?P<digest>[0-9a-f]{64})$", DocumentView.as_view(), name="api-document"),
    path("access-log", AccessLogView.as_view(), name="api-access-log"),
    path("webhooks", WebhooksView.as_view(), name="api-webhooks"),
    path(_ONE, WebhookView.as_view(), name="api-webhook"),
    path(f"{_ONE}/secret", WebhookSecretView.as_view(), name="api-webhook-secret"),
    path(f"{_ONE}/resumption", WebhookResumptionView.as_view(), name="api-webhook-resumption"),
    path(f"{_ONE}/deliveries", WebhookDeliveriesView.as_view(), name="api-webhook-deliveries"),
    path(f"{_ONE}/deliveries/<uuid:delivery>/replay", WebhookReplayView.as_view(), name="api-webhook-replay"),
]
