"""What the API answers about aircraft, for its published description. People stand as "person:7", never
by name.
"""

from rest_framework import serializers


class Window(serializers.Serializer[object]):
    """Held true from and until, as known from and until; ends are not included, null is until further
    notice.
    """

    valid_from = serializers.DateTimeField()
    valid_until = serializers.DateTimeField(allow_null=True)
    known_from = serializers.DateTimeField()
    known_until = serializers.DateTimeField(allow_null=True)


class ApprovalGiven(serializers.Serializer[object]):
    """The second person's approval."""

    approved_by = serializers.CharField()
    approved_at = serializers.DateTimeField()
    true_from = serializers.DateTimeField()


class LoadingBasisLine(serializers.Serializer[object]):
    """One revision of a loading basis, without its document."""

    id = serializers.UUIDField()
    aircraft = serializers.CharField()
    revision = serializers.IntegerField()
    digest = serializers.CharField()
    entered_by = serializers.CharField()
    entered_at = serializers.DateTimeField()
    approval = ApprovalGiven(allow_null=True)
    windows = Window(many=True)


class LoadingBasisAnswer(LoadingBasisLine):
    """One revision with its document, numbers as typed."""

    document = serializers.DictField()


class EmptyWeightLine(serializers.Serializer[object]):
    """One empty weight, without its document."""

    id = serializers.UUIDField()
    aircraft = serializers.CharField()
    fit = serializers.CharField()
    digest = serializers.CharField()
    true_from = serializers.DateTimeField()
    entered_by = serializers.CharField()
    entered_at = serializers.DateTimeField()
    approval = ApprovalGiven(allow_null=True)
    windows = Window(many=True)


class EmptyWeightAnswer(EmptyWeightLine):
    """One empty weight with its document, numbers as typed."""

    document = serializers.DictField()


class BasisInForce(serializers.Serializer[object]):
    """Which loading basis is in force."""

    id = serializers.UUIDField()
    revision = serializers.IntegerField()
    digest = serializers.CharField()


class WeightInForce(serializers.Serializer[object]):
    """Which empty weight is in force on a base fit."""

    id = serializers.UUIDField()
    fit = serializers.CharField()
    digest = serializers.CharField()


class AircraftLine(serializers.Serializer[object]):
    """One aircraft."""

    id = serializers.UUIDField()
    registration = serializers.CharField()
    type = serializers.CharField()
    serial_number = serializers.CharField()
    category = serializers.ChoiceField(("aeroplane", "helicopter"))
    engines = serializers.IntegerField()
    passenger_seats = serializers.IntegerField()


class FallingDue(serializers.Serializer[object]):
    """What lapses: a weighing by the operator's rules, a permit by its own date."""

    what = serializers.CharField()
    lapses = serializers.DateTimeField(help_text="the first instant at which it serves no more")
    past_due = serializers.BooleanField()
    source = serializers.CharField()  # type: ignore[assignment]  # DRF takes fields out of the class


class AircraftAnswer(AircraftLine):
    """One aircraft with what is in force now, and what falls due."""

    loading_basis = BasisInForce(allow_null=True)
    empty_weights = WeightInForce(many=True)
    falling_due = FallingDue(many=True)


class AircraftList(serializers.Serializer[object]):
    """Every aircraft of the operator, by registration."""

    aircraft = AircraftLine(many=True)


class LoadingBasisList(serializers.Serializer[object]):
    """Every loading basis of the aircraft, newest revision first."""

    loading_bases = LoadingBasisLine(many=True)


class EmptyWeightList(serializers.Serializer[object]):
    """Which empty weights were in force at `at`, as known at `as_known_at`, and every version ever
    entered.
    """

    at = serializers.DateTimeField()
    as_known_at = serializers.DateTimeField()
    in_force = WeightInForce(many=True)
    empty_weights = EmptyWeightAnswer(many=True)


class Configuration(serializers.Serializer[object]):
    """A named fit, as the loading basis has it."""

    id = serializers.CharField()
    name = serializers.CharField()
    fit = serializers.CharField()
    seats = serializers.ListField(child=serializers.CharField())
    places = serializers.ListField(child=serializers.CharField())
    minimum_crew = serializers.IntegerField()
    equipment = serializers.ListField(child=serializers.DictField())
    operating_items = serializers.ListField(child=serializers.DictField())


class ConfigurationList(serializers.Serializer[object]):
    """The configurations of the loading basis in force at `at`, as known at `as_known_at`."""

    at = serializers.DateTimeField()
    as_known_at = serializers.DateTimeField()
    loading_basis = BasisInForce(allow_null=True)
    configurations = Configuration(many=True)
