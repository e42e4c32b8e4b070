"""Remedies and room, for the API's published description. Figures are decimal texts in the units stated."""

from rest_framework import serializers

from loads.api.shapes_out import VERDICTS, ComputedAnswer

KINDS = (
    "reseat",
    "move-items",
    "rearrange",
    "leave-items",
    "ballast",
    "less-fuel",
    "fuel-elsewhere",
    "configuration",
    "leave-people",
)
FOUND = ("smallest", "best found")


class Figure(serializers.Serializer[object]):
    """One figure of the flight before and after a remedy."""

    title = serializers.CharField()
    unit = serializers.CharField()
    before = serializers.CharField()
    after = serializers.CharField()


class Mended(serializers.Serializer[object]):
    """One limit that was broken: its margin in words, before and after."""

    code = serializers.CharField()
    title = serializers.CharField()
    before = serializers.CharField()
    after = serializers.CharField()


class PatchStep(serializers.Serializer[object]):
    """One operation of a JSON Patch (RFC 6902) on the load document."""

    op = serializers.ChoiceField(("replace", "add", "copy", "remove"))
    path = serializers.CharField()
    value = serializers.JSONField(required=False)

    def get_fields(self) -> dict[str, serializers.Field[object, object, object, object]]:
        """Return the fields, with `from`, which Python keeps for itself."""
        return {**super().get_fields(), "from": serializers.CharField(required=False)}


class Remedy(serializers.Serializer[object]):
    """One change of one kind that brings the load within all limits, along the whole flight; it was assessed.

    `found` says whether it was proved the smallest of its kind. `next` is what governs afterwards. `change`
    is empty where people would have to stay behind: who that is, a program does not say.
    """

    kind = serializers.ChoiceField(KINDS)
    sentence = serializers.CharField()
    found = serializers.ChoiceField(FOUND)
    figures = Figure(many=True)
    mended = Mended(many=True)
    next = serializers.DictField(child=serializers.CharField())
    change = PatchStep(many=True)


class More(serializers.Serializer[object]):
    """How much more can go into a place, a free seat (of a row, where rows are stated), or a tank; rounded
    down.

    `stopped_by` is the limit that breaks with the next last digit; null: none was found.
    """

    kind = serializers.ChoiceField(("place", "seat", "tank"))
    id = serializers.CharField()
    name = serializers.CharField()
    amount = serializers.CharField()
    unit = serializers.CharField()
    stopped_by = serializers.CharField(allow_null=True)


class RoomForError(serializers.Serializer[object]):
    """How much heavier something could be than stated before the first limit breaks; rounded down.

    `each` is the same as an amount: of one person, of all in a place, of the density. Of people it is looked
    for by itself, everybody by the same amount. `stopped_by` is null where 50 percent break nothing.
    """

    kind = serializers.ChoiceField(("people", "place", "fuel-density"))
    id = serializers.CharField(allow_blank=True)
    name = serializers.CharField()
    percent = serializers.CharField()
    each = serializers.CharField()
    unit = serializers.CharField()
    stopped_by = serializers.CharField(allow_null=True)


class Remedies(serializers.Serializer[object]):
    """What would bring a load within, or what room there is in one that is. Nothing of it is stored.

    `said` is what there is to say besides: what has to be settled first, that nothing was found, or that the
    time ran out.
    """

    verdict = serializers.ChoiceField(VERDICTS)
    engine = serializers.CharField()
    remedies = Remedy(many=True)
    more = More(many=True)
    error = RoomForError(many=True)
    said = serializers.CharField(allow_blank=True)


class AssessedAnswer(ComputedAnswer):
    """A load computed; with `remedies` where they were asked for."""

    remedies = Remedies(required=False)


class LoadRemedies(Remedies):
    """The same for a stored load, with what is in force at its departure as known now."""

    load = serializers.UUIDField()
    step = serializers.IntegerField()
    cautions = serializers.ListField(child=serializers.CharField())
