"""Registers the room with Django."""

from django.apps import AppConfig


class RecordsConfig(AppConfig):
    """The records room."""

    name = "records"
