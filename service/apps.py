"""Registers the room with Django."""

from importlib import import_module

from django.apps import AppConfig


class ServiceConfig(AppConfig):
    """The service room."""

    name = "service"

    def ready(self) -> None:
        """This function will load what registers itself by being loaded: checks, API schemes, the queue."""
        import_module("service.checks")
        import_module("service.openapi")
        # For every thread of the web server, not only the one that loads it: requests send work.
        import_module("service.worker").app.set_default()
