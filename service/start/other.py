"""Every other command of `manage.py`: Django's, on the database of the environment or of the data folder."""

import os
from pathlib import Path

from service.bootstrap.speech import complain, say
from service.embedded import postgres, valkey
from service.embedded.stopped import Stopped
from service.roles import DATABASE, OWNER, SERVICE
from service.start.data_folder import DataFolder, default_path

# What only the owner of the tables may do or see.
_OWNERS_WORK = ("migrate", "showmigrations")


def run_django(arguments: list[str]) -> int:
    """Run one of Django's commands and return its exit code.

    With DATABASE_URL set, the environment alone decides. Without, the embedded database of the data folder is
    used, and started for the length of the command if it does not run.
    """
    arguments = _as_django_calls_it(arguments)
    os.environ.setdefault("DJANGO_SETTINGS_MODULE", "service.settings")
    if "DATABASE_URL" in os.environ or "DATABASE_URL_FILE" in os.environ:
        return _execute(arguments)
    folder = DataFolder(default_path())
    if arguments[:1] == ["restore"] and not any(word.startswith("--into") for word in arguments):
        return _restored_here(folder, arguments)
    if arguments[:1] == ["makemigrations"] or not (folder.path / "secret-key").exists():
        _stand_ins(folder)
        return _execute(arguments)
    running = postgres.find(folder.postgres)
    if running:
        return _with(folder, running, arguments)
    with folder.held(f"manage.py {' '.join(arguments[:1])}"):
        started = postgres.start(folder.postgres, log=folder.log("postgres"), say=say)
        try:
            return _with(folder, started, arguments)
        finally:
            postgres.stop(started)


def _as_django_calls_it(arguments: list[str]) -> list[str]:
    """People type `enter-operator`; Django knows a command by the name of its module, `enter_operator`."""
    if not arguments or arguments[0].startswith("-"):
        return arguments
    return [arguments[0].replace("-", "_"), *arguments[1:]]


def _with(folder: DataFolder, cluster: postgres.Cluster, arguments: list[str]) -> int:
    os.environ.update(folder.environment(cluster, valkey.address(folder.valkey), owner=True))
    if arguments[0] in _OWNERS_WORK and not any(word.startswith("--database") for word in arguments):
        arguments = [*arguments, "--database", "owner"]
    return _execute(arguments)


def _restored_here(folder: DataFolder, arguments: list[str]) -> int:
    """Restore into a data folder without a database, so that `start` goes on with what was restored."""
    folder.make()
    with folder.held("manage.py restore"):
        cluster = postgres.start(folder.postgres, log=folder.log("postgres"), say=say)
        try:
            os.environ.update(folder.environment(cluster, valkey.address(folder.valkey)))
            os.environ["OWNER_PASSWORD"] = cluster.passwords[OWNER]
            os.environ["SERVICE_PASSWORD"] = cluster.passwords[SERVICE]
            os.environ["SUPERUSER_URL"] = cluster.url("postgres", DATABASE)
            return _execute(arguments)
        finally:
            postgres.stop(cluster)


def _stand_ins(folder: DataFolder) -> None:
    """Let commands that need no database run before the first start; the others say what is missing."""
    os.environ.setdefault("SECRET_KEY", "only-for-commands-that-need-no-secret")
    os.environ.setdefault("BROKER_URL", "redis+socket:///nonexistent/valkey.sock")
    os.environ["DATABASE_URL"] = postgres.Cluster(folder.postgres, Path("/nonexistent")).url(
        SERVICE, DATABASE
    )
    os.environ["TAREBOOK_NO_DATABASE"] = "1"


def _execute(arguments: list[str]) -> int:
    # Imported here, once the environment is set: importing Django's command line reads nothing before.
    from django.core.management import execute_from_command_line  # noqa: PLC0415 - only once the environment is set
    from django.db import OperationalError  # noqa: PLC0415 - only once the environment is set

    try:
        execute_from_command_line(["manage.py", *arguments])
    except SystemExit as ended:
        return ended.code if isinstance(ended.code, int) else _told(ended.code)
    except OperationalError as problem:
        if "TAREBOOK_NO_DATABASE" in os.environ:
            raise Stopped(
                f"There is no database yet in {default_path()}: run `python3 manage.py start` first, name "
                "another folder in TAREBOOK_DATA, or set DATABASE_URL."
            ) from problem
        raise Stopped(f"The database does not answer: {str(problem).splitlines()[0]}") from problem
    return 0


def _told(message: object) -> int:
    if message is None:
        return 0
    complain(str(message))
    return 1
