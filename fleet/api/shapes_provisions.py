"""What the API answers about tables of standard weights, rules, restrictions and permits."""

from rest_framework import serializers


class ProvisionApproved(serializers.Serializer[object]):
    """The second person's approval; from `approved_at` on the version is held true."""

    approved_by = serializers.CharField()
    approved_at = serializers.DateTimeField()


class ProvisionEnded(serializers.Serializer[object]):
    """That a restriction was lifted or a permit ended, from when, and why."""

    ended_by = serializers.CharField()
    ended_at = serializers.DateTimeField()
    true_from = serializers.DateTimeField()
    reason = serializers.CharField()


class ProvisionAnswer(serializers.Serializer[object]):
    """One version with its document, numbers as typed. `true_until` null: until it is lifted or replaced.

    A restriction binds from its entry and has no approval.
    """

    id = serializers.UUIDField()
    kind = serializers.ChoiceField(("standard weights", "rules", "restriction", "permit"))
    aircraft = serializers.CharField(allow_null=True)
    number = serializers.IntegerField()
    true_from = serializers.DateTimeField()
    true_until = serializers.DateTimeField(allow_null=True)
    digest = serializers.CharField()
    entered_by = serializers.CharField()
    entered_at = serializers.DateTimeField()
    approval = ProvisionApproved(allow_null=True)
    ending = ProvisionEnded(allow_null=True)
    document = serializers.DictField()


class ProvisionList(serializers.Serializer[object]):
    """What held at `at`, as known at `as_known_at`, by id, and every version, the one entered last first."""

    at = serializers.DateTimeField()
    as_known_at = serializers.DateTimeField()
    in_force = serializers.ListField(child=serializers.UUIDField())
    versions = ProvisionAnswer(many=True)
