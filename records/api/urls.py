"""Addresses of the notary's part of the API."""

from django.urls import URLPattern, URLResolver, re_path

from records.api.documents import DocumentView

urlpatterns: list[URLPattern | URLResolver] = [
    re_path(r"^documents/(?P<digest>[0-9a-f]{64})$", DocumentView.as_view(), name="api-document"),
]
