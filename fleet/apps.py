"""Registers the room with Django."""

from django.apps import AppConfig


class FleetConfig(AppConfig):
    """The fleet room."""

    name = "fleet"
