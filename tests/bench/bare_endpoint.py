"""The judge of `post_loads_throughput`: a plain DRF endpoint that reads JSON and inserts one row, and nothing
else.

A WSGI application of its own with the settings of a fresh project: no session, no login, no act, no seal, no
key. It runs on the same server program and the same database as the service.
"""

import os
from urllib.parse import parse_qsl, urlsplit

import django
from django.conf import settings
from django.core.wsgi import get_wsgi_application
from django.db import models
from django.urls import path

_address = urlsplit(os.environ["DATABASE_URL"])
_options = dict(parse_qsl(_address.query))
settings.configure(
    SECRET_KEY="bench",
    ALLOWED_HOSTS=["*"],
    ROOT_URLCONF=__name__,
    INSTALLED_APPS=["rest_framework"],
    USE_TZ=True,
    DATABASES={
        "default": {
            "ENGINE": "django.db.backends.postgresql",
            "NAME": _address.path.strip("/"),
            "USER": _address.username or "",
            "PASSWORD": _address.password or "",
            "HOST": _options.get("host", _address.hostname or ""),
            "PORT": _address.port or "",
            "CONN_MAX_AGE": None,
        }
    },
    REST_FRAMEWORK={"UNAUTHENTICATED_USER": None, "DEFAULT_AUTHENTICATION_CLASSES": []},
)
django.setup()

from rest_framework.renderers import JSONRenderer  # noqa: E402  # needs the settings above
from rest_framework.request import Request  # noqa: E402  # as above
from rest_framework.response import Response  # noqa: E402  # as above
from rest_framework.views import APIView  # noqa: E402  # as above


class Row(models.Model):
    """One row of the judge's own table."""

    reference = models.CharField(max_length=80)
    document = models.JSONField()

    class Meta:
        app_label = "bench"
        db_table = "bench_row"

    def __str__(self) -> str:
        return self.reference


class BareView(APIView):
    """Reads a document and keeps it."""

    renderer_classes = (JSONRenderer,)

    def post(self, request: Request) -> Response:
        """Insert one row and answer with its number."""
        row = Row.objects.create(reference=request.data["flight"]["reference"], document=request.data)
        return Response({"id": row.pk}, status=201)


urlpatterns = [path("api/v1/loads", BareView.as_view())]
application = get_wsgi_application()
