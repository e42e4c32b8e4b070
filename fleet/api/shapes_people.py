"""What the API answers about people and tokens, for its published description."""

from rest_framework import serializers


class DutyLine(serializers.Serializer[object]):
    """A duty granted or ended."""

    role = serializers.CharField()
    granted = serializers.BooleanField()
    since = serializers.DateTimeField()


class PersonLine(serializers.Serializer[object]):
    """One person; `roles` are the duties held now."""

    id = serializers.IntegerField()
    key = serializers.CharField()
    login = serializers.CharField()
    name = serializers.CharField()
    mail = serializers.CharField(help_text="Empty: none is known.")
    active = serializers.BooleanField()
    roles = serializers.ListField(child=serializers.CharField())


class PersonAnswer(PersonLine):
    """One person with every duty ever granted or ended, the newest first."""

    duties = DutyLine(many=True)


class PeopleList(serializers.Serializer[object]):
    """Every person of the operator, by login."""

    people = PersonLine(many=True)


class TokenSecretLine(serializers.Serializer[object]):
    """A secret that serves now: the first has the number 0. It ends when it expires, or before, by
    rotation.
    """

    number = serializers.IntegerField()
    expires_at = serializers.DateTimeField()
    ends_at = serializers.DateTimeField()


class TokenLine(serializers.Serializer[object]):
    """One token. Without registrations it serves for all aircraft; `secrets` are those that serve now."""

    id = serializers.IntegerField()
    key = serializers.CharField()
    label = serializers.CharField()  # type: ignore[assignment]  # DRF takes fields out of the class
    person = serializers.CharField()
    integration = serializers.BooleanField()
    scopes = serializers.ListField(child=serializers.CharField())
    registrations = serializers.ListField(child=serializers.CharField())
    issued_at = serializers.DateTimeField()
    revoked_at = serializers.DateTimeField(allow_null=True)
    last_used_at = serializers.DateTimeField(allow_null=True)
    secrets = TokenSecretLine(many=True)


class TokenIssued(TokenLine):
    """A token with its new secret, which is shown here and never again."""

    secret = serializers.CharField()


class TokenList(serializers.Serializer[object]):
    """Tokens, the newest first: one's own, or all of the operator's for who looks after the people."""

    tokens = TokenLine(many=True)


class WhoAnswer(serializers.Serializer[object]):
    """Who asks, and what they may do now. `registrations` null: not limited to some aircraft."""

    key = serializers.CharField()
    operator = serializers.CharField()
    person = serializers.CharField()
    capacity = serializers.CharField()
    may = serializers.ListField(child=serializers.CharField())
    registrations = serializers.ListField(child=serializers.CharField(), allow_null=True)
