"""Registers the room with Django."""

from django.apps import AppConfig


class LoadsConfig(AppConfig):
    """The loads room."""

    name = "loads"
