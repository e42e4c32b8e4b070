"""What the API reads, for its published description. The reading itself is exact and stands in
`loads.balance`.
"""

from typing import Any

from drf_spectacular.utils import extend_schema_field
from rest_framework import serializers

from fleet.flight_rules import PERFORMANCE_KINDS

NUMBER = {"oneOf": [{"type": "number"}, {"type": "string", "pattern": r"^-?\d+(\.\d+)?$"}]}


@extend_schema_field(NUMBER)
class ExactNumber(serializers.Field[object, object, object, object]):
    """A JSON number or a decimal string; at most 15 digits, no exponent. Kept as typed."""


class Quantity(serializers.Serializer[object]):
    """A number and its unit; a unit is never inferred."""

    value = ExactNumber()
    unit = serializers.CharField()


class Density(Quantity):
    """The delivered density of the fuel and the document that states it."""

    source = serializers.CharField()  # type: ignore[assignment]  # DRF takes fields out of the class


class Flight(serializers.Serializer[object]):
    """Which flight; `departure` carries its offset from UTC."""

    reference = serializers.CharField()
    leg = serializers.IntegerField(min_value=1, max_value=99)
    departure = serializers.CharField(help_text="RFC 3339 with an offset: 2026-12-01T08:30:00-06:00")
    origin = serializers.CharField()
    destination = serializers.CharField()
    operation = serializers.CharField()
    follows = serializers.UUIDField(
        required=False,
        help_text="the id of the load of the leg before: same aircraft, it ends where this one begins",
    )


class LapInfant(serializers.Serializer[object]):
    """An infant on a lap; weight and how only where the adult's weight is not a standard one."""

    name = serializers.CharField()
    weight = Quantity(required=False)
    how = serializers.ChoiceField(("weighed", "declared", "estimated"), required=False)


class CrewMember(serializers.Serializer[object]):
    """One of the crew; `person` is a login, which the pilot in command needs before anyone can accept the
    load.
    """

    name = serializers.CharField()
    position = serializers.CharField()
    seat = serializers.CharField()
    how = serializers.ChoiceField(("weighed", "declared", "standard", "estimated"))
    person = serializers.CharField(required=False)
    category = serializers.CharField(required=False)
    weight = Quantity(required=False)


class Passenger(serializers.Serializer[object]):
    """One passenger in a seat."""

    name = serializers.CharField()
    seat = serializers.CharField()
    how = serializers.ChoiceField(("weighed", "declared", "standard", "estimated"))
    category = serializers.CharField(required=False)
    weight = Quantity(required=False)
    lap_infant = LapInfant(required=False)
    restraint = Quantity(required=False, help_text="what a child's or infant's restraint weighs")


class Footprint(serializers.Serializer[object]):
    """What touches the floor as the item stands, not its outline: one area, and how many there are."""

    length = Quantity()
    width = Quantity()
    lies = serializers.ChoiceField(("along", "across"), help_text="which way the length lies in the aircraft")
    feet_lengthwise = serializers.IntegerField(min_value=1, max_value=100, required=False)
    feet_widthwise = serializers.IntegerField(min_value=1, max_value=100, required=False)


class Spreader(serializers.Serializer[object]):
    """A pallet or spreader: it weighs, and with a size of its own it stands on the floor in the item's
    stead.
    """

    weight = Quantity()
    length = Quantity(required=False)
    width = Quantity(required=False)
    lies = serializers.ChoiceField(("along", "across"), required=False)


class Net(serializers.Serializer[object]):
    """A net over an item: it weighs."""

    weight = Quantity()


class Item(serializers.Serializer[object]):
    """What is aboard besides people and fuel; `removed`: equipment of the empty weight that is not aboard."""

    kind = serializers.ChoiceField(("baggage", "cargo", "ballast", "equipment", "consumable"))
    what = serializers.CharField()
    place = serializers.CharField()
    how = serializers.ChoiceField(("weighed", "declared", "standard", "estimated"))
    weight = Quantity(required=False)
    removed = serializers.BooleanField(required=False)
    jettisonable = serializers.BooleanField(
        required=False, help_text="it hangs in a place outside the aircraft and can be released in flight"
    )
    footprint = Footprint(required=False)
    pallet = Spreader(required=False)
    net = Net(required=False)
    spreader = Spreader(required=False)


class Fuel(serializers.Serializer[object]):
    """Usable fuel per tank at engine start, and what of it is meant to burn."""

    density = Density()
    at_engine_start = serializers.DictField(child=Quantity())
    not_usable = serializers.DictField(child=Quantity(), required=False)
    taxi = Quantity()
    trip = Quantity()
    minimum_at_landing = Quantity()


class StatedLimit(serializers.Serializer[object]):
    """A limit of this flight and its source."""

    at = serializers.ChoiceField(("take-off", "landing"))
    weight = Quantity()
    source = serializers.CharField()  # type: ignore[assignment]  # DRF takes fields out of the class
    kind = serializers.ChoiceField(
        PERFORMANCE_KINDS,
        required=False,
        help_text="what of the performance it comes from; the loading basis may ask for some of them",
    )


class SeatSetting(serializers.Serializer[object]):
    """Where a seat, or every seat on a rail in a row, stands on its rail: one of seat and row."""

    setting = serializers.CharField()
    seat = serializers.CharField(required=False)
    row = serializers.CharField(required=False)


class Departing(serializers.Serializer[object]):
    """Who or what leaves: a person by the `seat`, an item by `place` and `what`, in which the load declares
    them. `weight` is of an item of which only some leaves.
    """

    seat = serializers.CharField(required=False)
    place = serializers.CharField(required=False)
    what = serializers.CharField(required=False)
    weight = Quantity(required=False)


class Shifting(serializers.Serializer[object]):
    """Who or what moves, named as in what leaves, and the seat or place it moves `to`."""

    seat = serializers.CharField(required=False)
    place = serializers.CharField(required=False)
    what = serializers.CharField(required=False)
    to = serializers.CharField()


class ComingAboard(serializers.Serializer[object]):
    """Who or what comes aboard, on a line of its own: a person with a `seat`, written like a passenger (with
    a `position`: crew; with `at`: the place, such as a hoist, where they are first), or an item with a
    `place`.
    """

    name = serializers.CharField(required=False)
    seat = serializers.CharField(required=False)
    at = serializers.CharField(required=False)
    position = serializers.CharField(required=False)
    category = serializers.CharField(required=False)
    lap_infant = LapInfant(required=False)
    restraint = Quantity(required=False)
    kind = serializers.ChoiceField(("baggage", "cargo", "ballast", "equipment", "consumable"), required=False)
    what = serializers.CharField(required=False)
    place = serializers.CharField(required=False)
    jettisonable = serializers.BooleanField(required=False)
    footprint = Footprint(required=False)
    pallet = Spreader(required=False)
    net = Net(required=False)
    spreader = Spreader(required=False)
    how = serializers.ChoiceField(("weighed", "declared", "standard", "estimated"))
    weight = Quantity(required=False)


class FuelTransfer(serializers.Serializer[object]):
    """Fuel that goes from one tank to another; nothing is burned meanwhile."""

    def get_fields(self) -> dict[str, serializers.Field[Any, Any, Any, Any]]:
        """Name the tanks; `from` is no name that Python takes."""
        return {"from": serializers.CharField(), "to": serializers.CharField(), "quantity": Quantity()}


class FlightEvent(serializers.Serializer[object]):
    """What happens on the flight at one moment: exactly one of `leave`, `move`, `transfer`, `position`,
    `come_aboard`.

    Events are in order. All who move in one event move at once.
    """

    after_burning = Quantity(help_text="usable fuel burned by then, by weight or volume; 0: straight after")
    since = serializers.ChoiceField(
        ("engine start", "take-off"), required=False, help_text="since when; take-off when left out"
    )
    leave = Departing(many=True, required=False)
    move = Shifting(many=True, required=False)
    come_aboard = ComingAboard(many=True, required=False)
    transfer = FuelTransfer(required=False)
    position = serializers.DictField(
        child=serializers.CharField(), required=False, help_text="moving part to its state: gear, flaps"
    )


class LoadDocument(serializers.Serializer[object]):
    """A load as submitted: `tarebook.load/1`."""

    schema = serializers.ChoiceField(("tarebook.load/1",))
    aircraft = serializers.CharField(help_text="the registration")
    configuration = serializers.CharField()
    flight = Flight()
    persons_on_board = serializers.IntegerField(min_value=1)
    crew = CrewMember(many=True)
    passengers = Passenger(many=True)
    items = Item(many=True)
    fuel = Fuel()
    limits = StatedLimit(many=True, required=False)
    certification_category = serializers.CharField(
        required=False,
        help_text="normal, utility, ...: one of the loading basis, needed where it has several",
    )
    sequence = FlightEvent(many=True, required=False)
    conditions = serializers.ListField(
        child=serializers.CharField(),
        required=False,
        help_text="conditions of the basis that hold: what is fitted",
    )
    seat_settings = SeatSetting(many=True, required=False)


class RevisionDocument(LoadDocument):
    """A load that replaces another, and why."""

    reason = serializers.CharField(max_length=500)


class SignatureRequest(serializers.Serializer[object]):
    """A signature: what it means, the digest that was shown, and the signer's password."""

    meaning = serializers.ChoiceField(("prepared", "loaded", "accepted"))
    digest = serializers.RegexField(r"^[0-9a-f]{64}$")
    password = serializers.CharField(write_only=True)


class WithdrawalRequest(serializers.Serializer[object]):
    """Why the load will not fly."""

    reason = serializers.CharField(max_length=500)


class DepartureRequest(serializers.Serializer[object]):
    """When the aircraft left, with its offset."""

    at = serializers.CharField(help_text="RFC 3339 with an offset: 2026-12-01T08:41:00-06:00")
