"""The same sum as for a load, with nothing stored."""

from django.utils import timezone
from drf_spectacular.types import OpenApiTypes
from drf_spectacular.utils import OpenApiParameter, extend_schema
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from loads.api.shapes_in import LoadDocument
from loads.api.shapes_remedies import AssessedAnswer
from loads.queries.answer import computed_answer
from loads.queries.computation import compute
from loads.queries.remedies import remedies_for
from records.actor import READ, refuse_without_leave
from records.api.asking import actor_of, document_of, operator_of, parameters_of
from records.api.describing import problems
from records.refusal import Fault, Invalid

YES_OR_NO = ("true", "false")
_REMEDIES = OpenApiParameter(
    "remedies", OpenApiTypes.STR, enum=YES_OR_NO, description="true: what would bring it within, too"
)


class AssessmentsView(APIView):
    """Computes a load document without keeping it."""

    @extend_schema(
        operation_id="assess",
        summary="Compute a load; nothing is stored",
        parameters=[_REMEDIES],
        request=LoadDocument,
        responses={200: AssessedAnswer, **problems(400, 401, 403, 413, 422, 503)},
    )
    def post(self, request: Request) -> Response:
        """Compute a load with the versions in force at its departure, as known now; nothing is stored."""
        # Nothing is stored, so no act asks: the answer tells what an aircraft weighs and may weigh.
        refuse_without_leave(actor_of(request), READ)
        wanted = parameters_of(request, allowed=("remedies",)).get("remedies", "false")
        if wanted not in YES_OR_NO:
            raise Invalid(Fault("?remedies", "parameter-malformed", "this is true or false"))
        operator, document, now = operator_of(request), document_of(request), timezone.now()
        answer = computed_answer(compute(operator, document, now))
        if wanted == "true":
            answer["remedies"] = remedies_for(operator, document, now)
        return Response(answer)
