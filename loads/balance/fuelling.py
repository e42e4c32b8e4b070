"""Reading the fuel of a load: density, what each tank holds, and what of it is meant to burn."""

from fractions import Fraction

from fleet.basis import Basis
from fleet.conversion import density_unit, in_unit, volume_of_weight, weight_of_volume
from fleet.quantities import DIMENSION_OF, Dimension, Quantity, Unit
from loads.balance.aboard import FuelPlan, TankFuel
from loads.balance.fields import Fields
from loads.balance.fuel import burn
from loads.balance.plausible import FUEL_KG_PER_L, within_band
from loads.balance.rounding import VOLUME_PLACES, printed

FUEL_FIELDS = ("density", "at_engine_start", "taxi", "trip", "minimum_at_landing")
FUEL_OPTIONAL = ("not_usable",)
WEIGHT_OR_VOLUME = (Dimension.WEIGHT, Dimension.VOLUME)
LONGEST_SOURCE = 200


def read_fuel(document: Fields, basis: Basis) -> FuelPlan | None:
    """Return the fuel plan in basis units, noting faults; None when something of it could not be read."""
    fields = document.inner("fuel", FUEL_FIELDS, FUEL_OPTIONAL)
    if fields is None:
        return None
    density = fields.quantity("density", Dimension.DENSITY, zero=False, also=frozenset({"source"}))
    source = _density_source(fields)
    if density is not None and not within_band(density, FUEL_KG_PER_L, Unit.KG_PER_L):
        low, high = FUEL_KG_PER_L
        taken = f"{printed(low, 2)} to {printed(high, 2)} kg/l"
        detail = f"no fuel has this density (taken are {taken}); check the number and its unit"
        fields.note("density", "implausible", detail)
        density = None
    ids = tuple(tank.id for tank in basis.tanks)
    usable = fields.named("at_engine_start", ids, "unknown-tank", "tank", all_needed=True)
    trapped = fields.named("not_usable", ids, "unknown-tank", "tank", all_needed=False)
    in_tanks = {tank: _amount(usable, tank, zero=True) for tank in ids} if usable else {}
    stuck = {tank: _amount(trapped, tank, zero=True) for tank in ids if trapped and tank in trapped}
    plan = (_amount(fields, "taxi", zero=True), _amount(fields, "trip", zero=False))
    least = _amount(fields, "minimum_at_landing", zero=False)
    if (
        density is None
        or source is None
        or usable is None
        or None in in_tanks.values()
        or None in stuck.values()
    ):
        return None
    if plan[0] is None or plan[1] is None or least is None:
        return None
    tanks = _tanks(fields, basis, density, in_tanks, stuck)
    taxi, trip, minimum = (_weight(amount, density, basis) for amount in (plan[0], plan[1], least))
    per_volume = in_unit(density, density_unit(basis.weight_unit, basis.volume_unit))
    found = FuelPlan(per_volume, source, tanks, taxi, trip, minimum)
    return found if _burn_fits(fields, basis, found) else None


def _density_source(fields: Fields) -> str | None:
    density = fields.mapping("density")
    if density is not None and "source" not in density:
        density.note("source", "missing", "the source is missing; name the delivery note or the page")
    return None if density is None else density.text("source", LONGEST_SOURCE)


def _amount(fields: Fields | None, name: str, *, zero: bool) -> Quantity | None:
    return None if fields is None else fields.quantity(name, WEIGHT_OR_VOLUME, zero=zero)


def _volume(amount: Quantity | None, density: Quantity, basis: Basis) -> Fraction:
    if amount is None:
        return Fraction(0)
    if DIMENSION_OF[amount.unit] is Dimension.VOLUME:
        return in_unit(amount, basis.volume_unit)
    return volume_of_weight(amount, density, basis.volume_unit)


def _weight(amount: Quantity, density: Quantity, basis: Basis) -> Fraction:
    if DIMENSION_OF[amount.unit] is Dimension.WEIGHT:
        return in_unit(amount, basis.weight_unit)
    return weight_of_volume(amount, density, basis.weight_unit)


def _tanks(
    fields: Fields,
    basis: Basis,
    density: Quantity,
    usable: dict[str, Quantity | None],
    trapped: dict[str, Quantity | None],
) -> tuple[TankFuel, ...]:
    """Return the fuel of each tank by volume; more than a tank holds is noted."""
    found = []
    for tank in basis.tanks:
        fuel = TankFuel(
            tank, _volume(usable.get(tank.id), density, basis), _volume(trapped.get(tank.id), density, basis)
        )
        if fuel.usable + fuel.trapped > tank.capacity:
            where = "not_usable" if fuel.usable <= tank.capacity and fuel.trapped else "at_engine_start"
            holds = f"{printed(tank.capacity, VOLUME_PLACES, 'down')} {basis.volume_unit.value}"
            line = fields.mapping(where)
            if line is not None:
                line.note(
                    tank.id, "over-capacity", f"more than {tank.name} holds, which is {holds}; correct it"
                )
        found.append(fuel)
    return tuple(found)


def _burn_fits(fields: Fields, basis: Basis, plan: FuelPlan) -> bool:
    """Note a burn greater than what the tanks that feed it hold."""
    contents = {fuel.tank.id: fuel.usable for fuel in plan.tanks}
    at_take_off, short = burn(contents, basis.taxi_order, plan.taxi / plan.density)
    if short:
        fields.note("taxi", "burn-exceeds-fuel", "more than the tanks that feed taxiing hold; correct it")
        return False
    _, short = burn(at_take_off, basis.burn_order, plan.trip / plan.density)
    if short:
        detail = "taxi and trip fuel are more than is usable in the tanks; correct them or the fuel on board"
        fields.note("trip", "burn-exceeds-fuel", detail)
        return False
    return True
