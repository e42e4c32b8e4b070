"""The laws of the house about files, names and functions."""

import ast
import re

from tests.house.tree import ROOMS, ROOT, files, parsed, shown, sources

MOST_LINES, MOST_TEST_LINES, MOST_FUNCTION_LINES = 300, 400, 60
EMPTY_NAMES = {
    "utils", "util", "helpers", "helper", "common", "core", "base", "misc",
    "managers", "manager", "services", "stuff", "constants",
}  # fmt: skip
TOP_LEVEL = {
    "README.md", "DEVELOPERS.md", "manage.py", "pyproject.toml", "docker-compose.yml", "Dockerfile",
    "requirements.lock", "requirements-dev.lock",
    "fleet", "loads", "records", "service", "templates", "static", "tests",
}  # fmt: skip


def test_no_source_file_is_longer_than_a_sitting() -> None:
    counted = {shown(path): len(path.read_text(encoding="utf-8").splitlines()) for path in sources()}

    assert counted
    assert {name: lines for name, lines in counted.items() if lines > MOST_LINES} == {}


def test_no_sql_file_is_longer_than_a_sitting() -> None:
    counted = {
        shown(path): len(path.read_text(encoding="utf-8").splitlines())
        for path in files()
        if path.suffix == ".sql"
    }

    assert counted
    assert {name: lines for name, lines in counted.items() if lines > MOST_LINES} == {}


def test_no_test_file_is_too_long() -> None:
    counted = {
        shown(path): len(path.read_text(encoding="utf-8").splitlines()) for path in sources(tests=True)
    }

    assert counted
    assert {name: lines for name, lines in counted.items() if lines > MOST_TEST_LINES} == {}


def test_no_function_is_longer_than_a_screen() -> None:
    long = {
        f"{shown(path)}:{node.name}": node.end_lineno - node.lineno + 1
        for path in sources()
        for node in ast.walk(parsed(path))
        if isinstance(node, ast.FunctionDef | ast.AsyncFunctionDef)
        and node.end_lineno is not None
        and node.end_lineno - node.lineno + 1 > MOST_FUNCTION_LINES
    }

    assert long == {}


def test_no_module_has_a_name_that_says_nothing() -> None:
    named = {
        shown(path)
        for path in (*sources(), *sources(tests=True))
        for part in (*path.relative_to(ROOT).parts[:-1], path.stem)
        if part in EMPTY_NAMES
    }

    assert named == set()


def test_the_rooms_begin_empty_so_that_pure_modules_import_without_settings() -> None:
    assert {
        room: (ROOT / room / "__init__.py").read_text(encoding="utf-8") for room in ROOMS
    } == dict.fromkeys(ROOMS, "")


def test_nothing_but_the_agreed_entries_stands_at_the_top() -> None:
    top = {path.relative_to(ROOT).parts[0] for path in files()}

    assert {name for name in top if not name.startswith(".")} - TOP_LEVEL == set()


def test_public_docstrings_complete_this_function_will() -> None:
    """A public module-level function outside Django's own forms has a docstring that says what it will do."""
    silent = {
        f"{shown(path)}:{node.name}"
        for path in sources()
        for node in parsed(path).body
        if isinstance(node, ast.FunctionDef) and not node.name.startswith("_") and not ast.get_docstring(node)
    }

    assert silent == set()


def test_nothing_is_left_open_in_the_source() -> None:
    open_ends = re.compile(r"\b(TODO|FIXME|XXX|HACK)\b|NotImplementedError")
    left = {
        f"{shown(path)}:{number}"
        for path in (*sources(), *sources(tests=True))
        if path.name != "test_files_are_small_and_well_named.py"
        for number, line in enumerate(path.read_text(encoding="utf-8").splitlines(), 1)
        if open_ends.search(line)
    }

    assert left == set()
