"""Registers the room with Django."""

from importlib import import_module

from django.apps import AppConfig


class ServiceConfig(AppConfig):
    """The service room."""

    name = "service"

    def ready(self) -> None:
        """This function will load what registers itself by being loaded: the checks and the API's schemes."""
        import_module("service.checks")
        import_module("service.openapi")
