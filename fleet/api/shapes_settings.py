"""What the API answers about an operator's settings, for its published description."""

from rest_framework import serializers


class BoundWeight(serializers.Serializer[object]):
    """A weight as typed."""

    value = serializers.CharField()
    unit = serializers.ChoiceField(("kg", "lb"))


class LastMinuteBound(serializers.Serializer[object]):
    """The most that may change on one load at the last minute, added up."""

    weight = BoundWeight()
    persons = serializers.IntegerField()


class SettingsAnswer(serializers.Serializer[object]):
    """One version; number 0 is what was said when the operator was entered."""

    number = serializers.IntegerField()
    true_from = serializers.DateTimeField(allow_null=True)
    known_from = serializers.DateTimeField(allow_null=True)
    last_minute_bound = LastMinuteBound(allow_null=True)
    weighing_threshold_percent = serializers.CharField(allow_null=True)
    operations_mail = serializers.ListField(child=serializers.CharField())
    prepare_and_accept_by_one = serializers.BooleanField()
    estimates_may_be_signed = serializers.BooleanField()
    rule_set = serializers.ChoiceField(("US", "EU-UK"))
    procedure = serializers.CharField()
    weight_method = serializers.CharField()


class SettingsVersion(SettingsAnswer):
    """One version with who entered it and why."""

    entered_by = serializers.CharField()
    reason = serializers.CharField()


class SettingsShown(serializers.Serializer[object]):
    """What held at `at`, as known at `as_known_at`, and every version, the one entered last first."""

    at = serializers.DateTimeField()
    as_known_at = serializers.DateTimeField()
    in_force = SettingsAnswer()
    versions = SettingsVersion(many=True)
