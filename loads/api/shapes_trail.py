"""What the API answers about the trail, for its published description."""

from rest_framework import serializers


class ActLine(serializers.Serializer[object]):
    """One act: in a sentence, and by its parts; `rows` is how many rows it wrote."""

    act = serializers.UUIDField()
    at = serializers.DateTimeField()
    kind = serializers.CharField()
    sentence = serializers.CharField()
    actor = serializers.CharField()
    capacity = serializers.CharField(allow_blank=True)
    about = serializers.CharField()
    reason = serializers.CharField(allow_blank=True)
    request = serializers.CharField(allow_blank=True)
    caused_by = serializers.UUIDField(allow_null=True)
    rows = serializers.IntegerField()
    position = serializers.IntegerField()
    digest = serializers.CharField()


class ActAnswer(ActLine):
    """One act with its sealed entry: `digest` is the SHA-256 over a zero byte and `entry` as UTF-8."""

    previous = serializers.CharField(allow_null=True)
    entry = serializers.CharField()


class TrailList(serializers.Serializer[object]):
    """A page of the trail, and the address of the next one."""

    acts = ActLine(many=True)
    next = serializers.CharField(allow_null=True)
