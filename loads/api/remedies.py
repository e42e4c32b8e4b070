"""What would bring a stored load within."""

from uuid import UUID

from django.utils import timezone
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from loads.api.shapes_remedies import LoadRemedies
from loads.queries.current import load_of
from loads.queries.remedies import remedies_answer
from records.api.asking import operator_of, parameters_of
from records.api.describing import problems_of_reading


class RemediesView(APIView):
    """Remedies for a reject, and the room in a load that is within."""

    @extend_schema(
        operation_id="read_remedies",
        summary="Read what would bring a load within, or the room in it",
        responses={200: LoadRemedies, **problems_of_reading()},
    )
    def get(self, request: Request, load: UUID) -> Response:
        """Compute the smallest change of each kind that brings a load within; for one that is within, how
        much more can go where and how wrong its weights may be. Nothing is stored.
        """
        parameters_of(request, allowed=())
        current = load_of(operator_of(request), load)
        return Response(remedies_answer(current, timezone.now()))
