"""The manifest of a load as the PDF that was filed."""

from collections.abc import Mapping
from uuid import UUID

from django.http import HttpResponse
from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, OpenApiResponse, extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from loads.actions.file_manifest import MEDIA_TYPE, manifest_of
from records.api.asking import operator_of, parameters_of
from records.api.describing import problems_of_reading
from records.api.documents import paper_headers
from records.api.render import ExactJSONRenderer, PDFRenderer
from records.refusal import Fault, Invalid

_ISSUES = frozenset(str(issue) for issue in range(1, 1000))


class ManifestView(APIView):
    """The manifest of one load."""

    renderer_classes = (PDFRenderer, ExactJSONRenderer)

    @extend_schema(
        operation_id="read_manifest",
        summary="Read the manifest of an accepted load",
        parameters=[
            OpenApiParameter("issue", OpenApiTypes.INT, description="an issue; the last one without")
        ],
        responses={
            (200, MEDIA_TYPE): OpenApiResponse(OpenApiTypes.BINARY, description="The PDF as filed."),
            **problems_of_reading(),
        },
    )
    def get(self, request: Request, load: UUID) -> HttpResponse:
        """Read the filed PDF. If no worker has filed it yet, it is filed now: no departure waits for one."""
        issue = _issue_in(parameters_of(request, allowed=("issue",)))
        digest, body = manifest_of(operator_of(request), load, issue)
        return HttpResponse(body, content_type=MEDIA_TYPE, headers=paper_headers(digest))


def _issue_in(asked: Mapping[str, str]) -> int | None:
    if "issue" not in asked:
        return None
    if asked["issue"] not in _ISSUES:
        raise Invalid(Fault("?issue", "out-of-range", f"write a whole number from 1 to {len(_ISSUES)}"))
    return int(asked["issue"])
