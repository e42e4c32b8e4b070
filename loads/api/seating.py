"""An operator's margin for seating, worked out from the cabin. Nothing is stored."""

from drf_spectacular.utils import extend_schema
from rest_framework import serializers
from rest_framework.request import Request
from rest_framework.response import Response
from rest_framework.views import APIView

from fleet.api.asking import aircraft_asked
from fleet.api.documents import described
from fleet.seating import seating_variation
from fleet.seating_reading import read_cabin
from loads.balance.seating_told import seating_document
from records.actor import READ, refuse_without_leave
from records.api.asking import actor_of, document_of, parameters_of
from records.api.describing import problems


class Amount(serializers.Serializer[object]):
    """A moment to keep inside one edge of the certified envelope, rounded up."""

    value = serializers.CharField()
    unit = serializers.CharField()


class Amounts(serializers.Serializer[object]):
    """The margin, as it is entered under `amounts` of a curtailment; a side that needs none is left out."""

    forward = Amount(required=False)
    aft = Amount(required=False)


class TakenLine(serializers.Serializer[object]):
    """One passenger more: the seat taken, and the moments with everybody so far."""

    passenger = serializers.IntegerField()
    row = serializers.CharField()
    seat = serializers.ChoiceField(("window", "aisle", "remaining"))
    arm = serializers.CharField()
    moment = serializers.CharField()
    assumed = serializers.CharField()
    difference = serializers.CharField(help_text="Moment less assumed moment: below zero is forward.")


class FillingDone(serializers.Serializer[object]):
    """A section of the cabin filled in one order; the lines with its greatest differences are named."""

    section = serializers.CharField(allow_blank=True)
    order = serializers.ChoiceField(("from the front", "from the rear"))
    assumed_arm = serializers.CharField()
    forward_at = serializers.IntegerField(allow_null=True)
    aft_at = serializers.IntegerField(allow_null=True)
    lines = TakenLine(many=True)


class SeatingVariationAnswer(serializers.Serializer[object]):
    """The margin for seating, with the working behind it, line by line."""

    schema = serializers.CharField()
    method = serializers.CharField()
    units = serializers.DictField(child=serializers.CharField())
    weight = serializers.CharField()
    amounts = Amounts()
    working = FillingDone(many=True)


class SeatingVariationsView(APIView):
    """Works out what a free choice of seats can do to the moment."""

    @extend_schema(
        operation_id="work_out_seating_variation",
        summary="Work out the margin for seating from the cabin; nothing is stored",
        request=described("seating-variation-1"),
        responses={200: SeatingVariationAnswer, **problems(400, 401, 403, 404, 413, 422, 503)},
    )
    def post(self, request: Request, registration: str) -> Response:
        """Work out a curtailment for seating variation, line by line. Nothing is stored: enter what it finds
        in the next loading basis, with the page of your manual.
        """
        refuse_without_leave(actor_of(request), READ)
        parameters_of(request, allowed=())
        aircraft_asked(request, registration)
        cabin = read_cabin(document_of(request))
        found = seating_variation(cabin.rows, cabin.weight, cabin.assumed)
        return Response(seating_document(found, cabin.unit, cabin.length))
