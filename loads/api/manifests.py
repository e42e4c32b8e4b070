"""The manifest of a load as the PDF that was filed."""

from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiResponse, extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from loads.actions.file_manifest import MEDIA_TYPE, manifest_of
from records.api.asking import operator_of, parameters_of
from records.api.describing import problems_of_reading
from records.api.documents import paper_headers
from records.api.render import ExactJSONRenderer, PDFRenderer


class ManifestView(APIView):
    """The manifest of one load."""

    renderer_classes = (PDFRenderer, ExactJSONRenderer)

    @extend_schema(
        operation_id="read_manifest",
        summary="Read the manifest of an accepted load",
        responses={
            (200, MEDIA_TYPE): OpenApiResponse(OpenApiTypes.BINARY, description="The PDF as filed."),
            **problems_of_reading(),
        },
    )
    def get(self, request: Request, load: UUID) -> HttpResponse:
        """Read the filed PDF. If no worker has filed it yet, it is filed now: no departure waits for one."""
        parameters_of(request, allowed=())
        digest, body = manifest_of(operator_of(request), load)
        return HttpResponse(body, content_type=MEDIA_TYPE, headers=paper_headers(digest))
