"""Filed documents, by their digest."""

from django.http import HttpResponse
from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiResponse, extend_schema
from rest_framework.request import Request
from rest_framework.views import APIView

from records.api.asking import operator_of, parameters_of
from records.api.describing import problems_of_reading
from records.api.render import ExactJSONRenderer, PDFRenderer
from records.archive import document_of, hand_out


class DocumentView(APIView):
    """One filed document."""

    renderer_classes = (PDFRenderer, ExactJSONRenderer)

    @extend_schema(
        operation_id="read_document",
        summary="Read a filed document",
        responses={
            (200, "application/pdf"): OpenApiResponse(OpenApiTypes.BINARY, description="The bytes as filed."),
            **problems_of_reading(),
        },
    )
    def get(self, request: Request, digest: str) -> HttpResponse:
        """Read a document as it was filed. It is handed out only if its bytes still fit the digest."""
        parameters_of(request, allowed=())
        document = document_of(operator_of(request), digest)
        body = hand_out(document)
        return HttpResponse(body, content_type=document.media_type, headers=paper_headers(document.digest))


def paper_headers(digest: str) -> dict[str, str]:
    """This function will return the headers of a document that never changes, named by its digest."""
    return {
        "ETag": f'"{digest}"',
        "Cache-Control": "private, max-age=31536000, immutable",
        "Content-Disposition": f'inline; filename="{digest[:16]}.pdf"',
        "X-Content-Type-Options": "nosniff",
    }
