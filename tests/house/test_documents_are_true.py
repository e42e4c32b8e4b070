"""README.md and DEVELOPERS.md say what is so: paths, modules, settings, acts, symbols, commands, and the
example.
"""

import ast
import importlib
import json
import re
from functools import cache
from itertools import chain
from pathlib import Path

import pytest
from django.core.management import get_commands
from django.db import models

import fleet.acts
import loads.acts
import records.acts
from fleet.basis_reading import read_basis
from fleet.empty_weight_reading import read_empty_weight
from loads.balance.assess import assess
from loads.balance.declared import read_load
from records.strict_json import read
from tests.house.tree import ROOMS, ROOT, files, parsed, shown, sources

README, DEVELOPERS = "README.md", "DEVELOPERS.md"
READERS = {"text", "flag", "whole", "words", "database"}  # of service.env
WAYS = {"get", "setdefault", "pop"}  # of os.environ
OURS = {"start", "test", "prove"}  # before any of Django's commands
VARIABLE = re.compile(r"[A-Z][A-Z0-9_]+")
DEMO = ROOT / "service" / "demo" / "data"


@cache
def text(name: str) -> str:
    return (ROOT / name).read_text(encoding="utf-8")


@cache
def section(name: str, heading: str) -> str:
    return text(name).split(f"\n## {heading}\n")[1].split("\n## ")[0]


def rows(heading: str) -> list[list[str]]:
    """The rows of the first table of a section of DEVELOPERS.md, without its head."""
    lines = [line for line in section(DEVELOPERS, heading).splitlines() if line.startswith("|")]
    return [[cell.strip() for cell in line.strip("|").split("|")] for line in lines[2:]]


def in_code(name: str) -> set[str]:
    """What stands between single backticks, outside blocks of code."""
    prose = re.sub(r"```.*?```", "", text(name), flags=re.DOTALL)
    return set(re.findall(r"`([^`\n]+)`", prose))


def _of_environ(node: ast.expr) -> bool:
    return isinstance(node, ast.Attribute) and node.attr == "environ"


def _asked(node: ast.AST) -> ast.expr | None:
    """The name of a variable that this piece of code reads or sets, if it does."""
    match node:
        case ast.Subscript(value=value, slice=name) if _of_environ(value):
            return name
        case ast.Compare(left=name, ops=[ast.In() | ast.NotIn()], comparators=[where]) if _of_environ(where):
            return name
        case ast.Call(func=ast.Attribute(value=value, attr=way), args=[name, *_]) if (
            _of_environ(value) and way in WAYS
        ) or (isinstance(value, ast.Name) and value.id == "env" and way in READERS):
            return name
        case ast.Call(func=ast.Name(id="_read"), args=[name, *_]):
            return name
    return None


def variables_in_code() -> dict[str, set[str]]:
    """Every variable of the environment by name, with the files that read or set it."""
    found: dict[str, set[str]] = {}
    for path in (*sources(), *sources(tests=True)):
        for node in ast.walk(parsed(path)):
            name = _asked(node)
            if isinstance(name, ast.Constant) and VARIABLE.fullmatch(str(name.value)):
                found.setdefault(name.value.removesuffix("_FILE"), set()).add(shown(path))
    for name in re.findall(r"\$\{(\w+)", text("docker-compose.yml")):
        found.setdefault(name, set()).add("docker-compose.yml")
    # Fontconfig's own name ends as ours for files do.
    return {("FONTCONFIG_FILE" if name == "FONTCONFIG" else name): where for name, where in found.items()}


def test_every_variable_of_the_environment_stands_in_the_table_and_no_other():
    in_table = {name.strip("`") for name, *_ in rows("Settings")}

    assert in_table == set(variables_in_code())


def test_the_table_of_settings_names_a_file_that_reads_the_variable():
    found = variables_in_code()

    wrong = {name for name, where, *_ in rows("Settings") if where.strip("`") not in found[name.strip("`")]}

    assert wrong == set()


@pytest.mark.parametrize("document", [README, DEVELOPERS])
def test_every_path_named_exists(document):
    tops = {path.relative_to(ROOT).parts[0] for path in files()}
    named = {
        word
        for word in in_code(document) | set(re.findall(r"\]\(([^)#:]+)\)", text(document)))
        if re.fullmatch(r"[\w./-]+", word) and word.split("/")[0] in tops
    }

    assert len(named) > 3
    assert {word for word in named if not (ROOT / word).exists()} == set()


def test_every_module_of_the_rooms_is_on_the_map():
    entries = {
        "/".join(path.relative_to(ROOT).parts[:2])
        for path in files()
        if path.relative_to(ROOT).parts[0] in ROOMS and path.name != "__init__.py"
    }

    assert entries - in_code(DEVELOPERS) == set()


def test_every_act_is_listed():
    kinds = chain(records.acts.KINDS, fleet.acts.KINDS, loads.acts.KINDS)

    assert {kind.name for kind in kinds} - in_code(DEVELOPERS) == set()


@pytest.mark.parametrize("document", [README, DEVELOPERS])
def test_every_command_named_exists(document):
    named = set(re.findall(r"manage\.py ([a-z][a-z_-]+)", text(document)))

    assert named
    assert {word.replace("-", "_") for word in named} - OURS - set(get_commands()) == set()


@pytest.mark.parametrize("document", [README, DEVELOPERS])
def test_every_module_that_is_run_exists(document):
    named = set(re.findall(r"python3? -m ((?:tests|service)[\w.]+)", text(document)))

    missing = {
        name
        for name in named
        if not (ROOT / f"{name.replace('.', '/')}.py").exists()
        and not (ROOT / name.replace(".", "/") / "__main__.py").exists()
    }

    assert missing == set()


def test_every_symbol_is_a_name_in_the_code():
    strange = set()
    for name, where, *_ in rows("Symbols, units and signs"):
        module, _, owner = where.strip("`").rpartition(".")
        kind = getattr(importlib.import_module(module), owner)
        fields = (
            {field.name for field in kind._meta.get_fields()}
            if isinstance(kind, type) and issubclass(kind, models.Model)
            else set(kind.__annotations__)
        )
        if name.strip("`") not in fields:
            strange.add(f"{where}.{name}")

    assert strange == set()


def test_the_two_commands_are_those_of_the_gate():
    block = re.findall(r"```bash\n(.*?)```", section(README, "Two commands"), re.DOTALL)[0]

    assert block.splitlines() == ["python3 manage.py start", "python3 manage.py test"]
    assert re.search(r"^exec python3 manage\.py test\b", text(".ci/run"), re.MULTILINE)


def test_the_example_comes_out_as_shown():
    """The load of the README, against the invented twin, gives the verdicts and words that stand there."""
    shown_there = section(README, "A worked example")
    typed = re.findall(r"<<'LOAD'\n(.*?)LOAD\n", shown_there, re.DOTALL)[0]
    basis = read_basis(_demo("twin.loading-basis.json"))
    empty = read_empty_weight(_demo("twin.empty-weight.json"), basis)

    first = assess(read_load(read(typed.encode()), basis), basis, empty)
    mended = assess(read_load(read(typed.replace("AFT-HOLD", "NOSE-HOLD").encode()), basis), basis, empty)

    assert (first.verdict, mended.verdict) == ("outside", "within")
    broken = [check for check in first.checks if check.outcome == "fail"]
    assert broken
    for check in broken:
        line = f"{check.code} | {check.margin_text} | {check.source} | {check.what_next}"
        assert line in shown_there
    for result in (first, mended):
        governing = result.as_document()["governing"]
        assert all(json.dumps(words) in shown_there for words in governing.values())


def test_the_addresses_of_the_example_are_in_the_description_of_the_api():
    described = json.loads(text("service/openapi.json"))["paths"]
    asked = set(re.findall(r"\$API(/[^\s;]+)", section(README, "A worked example")))
    forms = {re.sub(r"\{\w+\}", "X", path.removeprefix("/api/v1")) for path in described}

    used = {address.replace("Q9-LVN", "X").replace("$LOAD", "X") for address in asked}

    assert used
    assert used - forms == set()


def test_pictures_are_small():
    assert {
        path.name for path in (ROOT / "static" / "pictures").iterdir() if path.stat().st_size > 150_000
    } == set()


def _demo(name: str) -> object:
    return read(Path(DEMO / name).read_bytes())
