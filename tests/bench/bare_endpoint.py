"""The judge of `post_loads_throughput`: an endpoint that reads JSON and inserts one row, and nothing else.

It has no settings of its own: `bare_in_service` puts it in the place of the service's addresses, `bare_fresh`
into a project that has nothing else.
"""

from django.core.serializers.json import DjangoJSONEncoder
from django.db import models
from django.urls import path
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView


class Row(models.Model):
    """One row of the judge's own table."""

    reference = models.CharField(max_length=80)
    document = models.JSONField(encoder=DjangoJSONEncoder)

    class Meta:
        app_label = "bench"
        db_table = "bench_row"

    def __str__(self) -> str:
        return self.reference


class BareView(APIView):
    """Reads a document and keeps it."""

    def post(self, request: Request) -> Response:
        """Insert one row and answer with its number."""
        row = Row.objects.create(reference=request.data["flight"]["reference"], document=request.data)
        return Response({"id": row.pk}, status=201)


urlpatterns = [path("api/v1/loads", BareView.as_view())]
