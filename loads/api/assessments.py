"""The same sum as for a load, with nothing stored."""

from django.utils import timezone
from drf_spectacular.utils import extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from loads.api.shapes_in import LoadDocument
from loads.api.shapes_out import ComputedAnswer
from loads.queries.answer import computed_answer
from loads.queries.computation import compute
from records.actor import READ, refuse_without_leave
from records.api.asking import actor_of, document_of, operator_of
from records.api.describing import problems


class AssessmentsView(APIView):
    """Computes a load document without keeping it."""

    @extend_schema(
        operation_id="assess",
        summary="Compute a load; nothing is stored",
        request=LoadDocument,
        responses={200: ComputedAnswer, **problems(400, 401, 403, 413, 422, 503)},
    )
    def post(self, request: Request) -> Response:
        """Compute a load with the versions in force at its departure, as known now; nothing is stored."""
        # Nothing is stored, so no act asks: the answer tells what an aircraft weighs and may weigh.
        refuse_without_leave(actor_of(request), READ)
        computation = compute(operator_of(request), document_of(request), timezone.now())
        return Response(computed_answer(computation))
