"""What every test stands on: a PostgreSQL of our own, a template migrated as the owner, the service role at
work.

`TAREBOOK_TEST_SERVER` names a running PostgreSQL 18 (libpq address of a superuser) to use instead of an
embedded one, `TAREBOOK_TEST_DB` the beginning of the database names made there.
"""

import os
import shutil
import tempfile
from collections.abc import Iterator
from pathlib import Path

import hypothesis
import pytest
from django.conf import settings
from django.db import connections
from django.test import TransactionTestCase
from pytest_django import DjangoDbBlocker

from service.embedded import postgres
from tests import databases

_cluster: list[tuple[postgres.Cluster, Path]] = []


def pytest_configure(config: pytest.Config) -> None:
    """Start the cluster once, before any worker is made, and use a password hasher that is quick."""
    # What takes long on a busy machine is no failure. A profile that was loaded before is kept otherwise.
    hypothesis.settings.register_profile("patient", hypothesis.settings(), deadline=None)
    hypothesis.settings.load_profile("patient")
    settings.PASSWORD_HASHERS = ["django.contrib.auth.hashers.MD5PasswordHasher"]
    # A flush is a TRUNCATE, which our own triggers refuse.
    TransactionTestCase._fixture_teardown = lambda _self: databases.emptied()
    if hasattr(config, "workerinput") or "TAREBOOK_TEST_SERVER" in os.environ or config.option.collectonly:
        return
    if getattr(config.option, "numprocesses", None):
        _start_cluster()


def pytest_unconfigure(config: pytest.Config) -> None:
    """Stop the cluster this process started."""
    for cluster, folder in _cluster:
        postgres.stop(cluster)
        shutil.rmtree(folder, ignore_errors=True)
    _cluster.clear()


@pytest.fixture(scope="session")
def django_db_setup(django_db_blocker: DjangoDbBlocker) -> Iterator[None]:
    """This fixture will give this process a migrated database of its own."""
    if "TAREBOOK_TEST_SERVER" not in os.environ:
        _start_cluster()
    with django_db_blocker.unblock(), databases.copied(os.environ.get("PYTEST_XDIST_WORKER", "main")):
        yield
        connections.close_all()


@pytest.fixture(scope="module")
def own_database(django_db_setup: None, django_db_blocker: DjangoDbBlocker) -> Iterator[str]:
    """This fixture will give a module a fresh database in which its tests really commit."""
    with django_db_blocker.unblock(), databases.copied("own") as name:
        yield name


@pytest.fixture
def fresh_database(django_db_setup: None, django_db_blocker: DjangoDbBlocker) -> Iterator[str]:
    """This fixture will give one test a fresh database in which it really commits."""
    with django_db_blocker.unblock(), databases.copied("fresh") as name:
        yield name


def _start_cluster() -> None:
    folder = Path(tempfile.mkdtemp(prefix="tarebook-tests-"))
    cluster = postgres.start(folder / "postgres", durable=False, say=lambda _line: None)
    _cluster.append((cluster, folder))
    os.environ["TAREBOOK_TEST_SERVER"] = cluster.url("postgres", "postgres")
