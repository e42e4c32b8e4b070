"""Last-minute changes and notes, for the API's published description."""

from rest_framework import serializers

from loads.api.shapes_in import Footprint, LapInfant, Quantity
from loads.balance.late_reading import FORMS, HOWS_AT_THE_DOOR, KINDS_AT_THE_DOOR


class LateLine(serializers.Serializer[object]):
    """One thing that goes on or off. Which fields it takes depends on `change`:

    passenger-on: name, seat, weight, how, and category, lap_infant, restraint if any; passenger-off: seat;
    item-on: kind, what, place, weight, how, and footprint if its place needs one; item-off: what, place, and
    weight if only a part of it; fuel-on, fuel-off: tank, quantity.
    """

    change = serializers.ChoiceField(tuple(FORMS))
    name = serializers.CharField(required=False)
    seat = serializers.CharField(required=False)
    weight = Quantity(required=False)
    how = serializers.ChoiceField(HOWS_AT_THE_DOOR, required=False)
    category = serializers.CharField(required=False)
    lap_infant = LapInfant(required=False)
    restraint = Quantity(required=False)
    kind = serializers.ChoiceField(KINDS_AT_THE_DOOR, required=False)
    what = serializers.CharField(required=False)
    place = serializers.CharField(required=False)
    footprint = Footprint(required=False)
    tank = serializers.CharField(required=False)
    quantity = Quantity(required=False)


class LateChangeDocument(serializers.Serializer[object]):
    """A last-minute change: its lines, and how many persons are then on board."""

    lines = LateLine(many=True)
    persons_on_board = serializers.IntegerField(min_value=1)


class LateChangeRequest(LateChangeDocument):
    """A last-minute change as its pilot in command signs it: the digest is that of the preview."""

    digest = serializers.RegexField(r"^[0-9a-f]{64}$")
    password = serializers.CharField(write_only=True)


class LateBound(serializers.Serializer[object]):
    """The most that may change on one load, added up; `settings` is the version that states it."""

    weight = Quantity()
    persons = serializers.IntegerField()
    settings = serializers.IntegerField()


class LateMoved(serializers.Serializer[object]):
    """What all changes of a load moved, this one included, each line by its absolute value."""

    kilograms = serializers.CharField()
    persons = serializers.IntegerField()


class LateChangeMade(serializers.Serializer[object]):
    """One last-minute change; its manifest is issue `issue`."""

    number = serializers.IntegerField()
    issue = serializers.IntegerField()
    lines = serializers.ListField(child=serializers.CharField())
    changed_at = serializers.DateTimeField()
    person = serializers.IntegerField()
    digest = serializers.CharField()
    moved = LateMoved()
    bound = LateBound()


class NoteRequest(serializers.Serializer[object]):
    """What was wrong, in 1 to 2,000 characters."""

    text = serializers.CharField(max_length=2000)


class NoteAnswer(serializers.Serializer[object]):
    """One note after flight."""

    id = serializers.UUIDField()
    written_at = serializers.DateTimeField()
    person = serializers.IntegerField()
    name = serializers.CharField()
    text = serializers.CharField()
