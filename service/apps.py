"""Registers the room with Django."""

from django.apps import AppConfig


class ServiceConfig(AppConfig):
    """The service room."""

    name = "service"
