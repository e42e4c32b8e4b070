"""Enters an aircraft of the actor's operator."""

from dataclasses import asdict
from functools import partial

from fleet import acts
from fleet.actions.authorship import operator_acting
from fleet.actions.constraint_refusals import refused_as
from fleet.entering import NewAircraft
from fleet.models import Aircraft
from fleet.models.rows import new_uuid
from records.act import act
from records.actor import Actor
from records.refusal import Fault, Invalid

_TAKEN = {
    "aircraft_registration_is_taken_once": partial(
        Invalid,
        Fault("/registration", "registration-taken", "an aircraft of this registration is entered already"),
    ),
    "aircraft_serial_is_taken_once": partial(
        Invalid, Fault("/serial_number", "serial-taken", "this type and serial number is entered already")
    ),
}


def enter_aircraft(actor: Actor, new: NewAircraft, *, reason: str = "") -> Aircraft:
    """This function will enter the aircraft.

    Raises Invalid when its registration, or its type and serial number, are entered already.
    """
    operator = operator_acting(actor)
    aircraft = Aircraft(id=new_uuid(), operator_id=operator, **asdict(new))
    with (
        refused_as(_TAKEN),
        act(acts.ENTER_AIRCRAFT, by=actor, about=f"aircraft:{aircraft.id}", reason=reason),
    ):
        aircraft.save(force_insert=True)
    return aircraft
