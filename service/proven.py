"""The WSGI application of a computer that proved itself; a server is given `service.proven:application`."""

from django.db import connections

from service.wsgi import application  # first: it loads the rooms

__all__ = ("application",)


def _prove() -> None:
    from service.proving import prove_at_start  # noqa: PLC0415  # its models need the rooms loaded

    prove_at_start()
    # No connection is kept for threads that are yet to come.
    connections.close_all()


_prove()
