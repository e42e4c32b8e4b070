"""What the measurements stand on: a PostgreSQL that really waits for its disk, and a migrated database in it.

`TAREBOOK_TEST_SERVER` names a running one to use. Figures are ratios within one run, never times
between runs.
"""

import os
import shutil
import tempfile
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

import tests.environment

os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")


@contextmanager
def database() -> Iterator[None]:
    """This function will give the measurement a database, and take it away again."""
    assert tests.environment.__name__  # its import set the environment that settings read
    import django

    django.setup()
    from service.embedded import postgres
    from tests import databases

    own, folder = None, Path(tempfile.mkdtemp(prefix="tarebook-bench-"))
    if "TAREBOOK_TEST_SERVER" not in os.environ:
        own = postgres.start(folder / "postgres", say=lambda _line: None)
        os.environ["TAREBOOK_TEST_SERVER"] = own.url("postgres", "postgres")
    try:
        with databases.copied("bench"):
            yield
    finally:
        if own is not None:
            postgres.stop(own)
        shutil.rmtree(folder, ignore_errors=True)
