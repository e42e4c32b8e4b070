"""Shapes of rechecks, for the description of the API."""

from rest_framework import serializers

from loads.api.shapes_out import VERDICTS


class RecheckRequest(serializers.Serializer[object]):
    """What to compute again. Without `aircraft`: the whole operator. Versions that are named take the place
    of those a load was assessed with; with none named each load is computed with what is in force now.
    """

    aircraft = serializers.CharField(required=False, help_text="the registration")
    empty_weight = serializers.UUIDField(required=False)
    loading_basis = serializers.UUIDField(required=False)
    standard_weights = serializers.UUIDField(required=False)
    to = serializers.DateTimeField(required=False, help_text="planned departures before this")
    reason = serializers.CharField(required=False, max_length=500)

    def get_fields(self) -> dict[str, serializers.Field]:  # type: ignore[type-arg] # DRF's own signature
        """This function will add `from`, which is a word of the language and no name of a field here."""
        found = super().get_fields()
        found["from"] = serializers.DateTimeField(
            required=False, help_text="planned departures from this on, it included"
        )
        return found


class RecheckProgress(serializers.Serializer[object]):
    """How many loads there are to compute, and how many are done."""

    loads = serializers.IntegerField()
    done = serializers.IntegerField()


class RecheckCounts(serializers.Serializer[object]):
    """Loads by what came out; together they are all that were asked for, none is left out."""

    same = serializers.IntegerField()
    changed = serializers.IntegerField()
    not_computed = serializers.IntegerField(help_text="each stands in the table with its reason")
    other_fit = serializers.IntegerField(help_text="flown on another base fit than the empty weight's")
    gone = serializers.IntegerField(help_text="replaced or withdrawn while the work went on")
    flagged = serializers.IntegerField(help_text="of the changed: within when assessed, and not now")


class RecheckedFlight(serializers.Serializer[object]):
    """A flight whose verdict came out otherwise, or that could not be computed."""

    load = serializers.UUIDField()
    href = serializers.CharField()
    aircraft = serializers.CharField()
    reference = serializers.CharField()
    leg = serializers.IntegerField()
    departure = serializers.CharField(help_text="planned, as typed")
    signed_verdict = serializers.ChoiceField(choices=VERDICTS)
    verdict_now = serializers.ChoiceField(choices=[*VERDICTS, "not computed"])
    code = serializers.CharField(allow_blank=True, help_text="of the first limit that is broken")
    limit = serializers.CharField(allow_blank=True)
    excess = serializers.CharField(allow_blank=True, help_text="or why it could not be computed")


class RecheckAnswer(serializers.Serializer[object]):
    """A recheck, how far it is, and one page of its table: flights to come first, then past ones."""

    id = serializers.UUIDField()
    state = serializers.ChoiceField(choices=["waiting", "running", "finished"])
    asked_at = serializers.DateTimeField()
    asked_by = serializers.IntegerField(allow_null=True)
    aircraft = serializers.CharField(allow_null=True)
    empty_weight = serializers.UUIDField(allow_null=True)
    loading_basis = serializers.UUIDField(allow_null=True)
    standard_weights = serializers.UUIDField(allow_null=True)
    to = serializers.DateTimeField(allow_null=True)
    reason = serializers.CharField(allow_blank=True)
    engine = serializers.CharField()
    progress = RecheckProgress()
    counts = RecheckCounts()
    problem = serializers.CharField(allow_blank=True, help_text="the kind of error the last try met")
    flights = RecheckedFlight(many=True)
    next = serializers.CharField(allow_null=True)
    csv = serializers.CharField(help_text="the whole table as CSV")
    cautions = serializers.ListField(child=serializers.CharField())

    def get_fields(self) -> dict[str, serializers.Field]:  # type: ignore[type-arg] # DRF's own signature
        """This function will add `from`, which is a word of the language and no name of a field here."""
        found = super().get_fields()
        found["from"] = serializers.DateTimeField(allow_null=True)
        return found
