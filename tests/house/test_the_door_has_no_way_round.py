"""No signals, no admin, no hatches; every switched-off check has its reason beside it."""

import ast
import re

from tests.house.tree import ROOT, files, parsed, shown, sources

FORBIDDEN_IMPORTS = ("django.dispatch", "django.db.models.signals", "django.contrib.admin")
HATCHES = re.compile(r"^(skip_|force|ignore_|bypass|without_|no_check)")


def _imports(tree: ast.Module) -> set[str]:
    found: set[str] = set()
    for node in ast.walk(tree):
        if isinstance(node, ast.Import):
            found |= {alias.name for alias in node.names}
        elif isinstance(node, ast.ImportFrom) and node.module and node.level == 0:
            found |= {node.module} | {f"{node.module}.{alias.name}" for alias in node.names}
    return found


def test_no_signals_and_no_admin() -> None:
    used = {
        (shown(path), name)
        for path in sources()
        for name in _imports(parsed(path))
        if name.startswith(FORBIDDEN_IMPORTS)
    }

    assert used == set()


def test_no_parameter_is_a_hatch() -> None:
    hatches = {
        f"{shown(path)}:{node.name}({argument.arg})"
        for path in sources()
        for node in ast.walk(parsed(path))
        if isinstance(node, ast.FunctionDef)
        for argument in (*node.args.args, *node.args.kwonlyargs)
        if HATCHES.match(argument.arg)
    }

    assert hatches == set()


def test_imports_are_absolute() -> None:
    relative = {
        shown(path)
        for path in sources()
        for node in ast.walk(parsed(path))
        if isinstance(node, ast.ImportFrom) and node.level
    }

    assert relative == set()


# What is switched off, by its name, and then why in words.
SWITCHED_OFF = re.compile(r"#\s*(type:\s*ignore|noqa|pragma: no cover)")
WITH_A_REASON = re.compile(
    r"#\s*(?:type:\s*ignore\[[^\]]+\]|noqa:\s*[A-Z]+\d+(?:\s*,\s*[A-Z]+\d+)*|pragma: no cover)[\s#-]+\S+ \S+"
)


def test_every_switched_off_check_names_itself_and_has_its_reason_beside_it() -> None:
    bare = {
        f"{shown(path)}:{number}"
        for path in (*sources(), *sources(tests=True))
        for number, line in enumerate(path.read_text(encoding="utf-8").splitlines(), 1)
        if SWITCHED_OFF.search(line) and not WITH_A_REASON.search(line)
        if path.name != "test_the_door_has_no_way_round.py"
    }

    assert bare == set()


def test_pages_ask_no_third_party_host() -> None:
    """Nothing that a page or a paper loads comes from elsewhere."""
    loads = re.compile(r"""(?:src|href|url|action)\s*[=(]\s*["']?\s*(?:https?:)?//[^"'\s)]+""", re.IGNORECASE)
    found = {
        f"{shown(path)}:{match.group(0)}"
        for path in files()
        if path.suffix in {".html", ".css", ".js", ".svg"} and ROOT in path.parents
        for match in loads.finditer(path.read_text(encoding="utf-8"))
    }

    assert found == set()


def test_no_page_carries_inline_script_or_style() -> None:
    inline = re.compile(r"<script(?![^>]*\bsrc=)|<style|\sstyle=|\son[a-z]+=", re.IGNORECASE)
    found = {
        shown(path)
        for path in files()
        if path.suffix == ".html"
        and path.is_relative_to(ROOT / "templates")
        and not path.is_relative_to(ROOT / "templates" / "print")
        and inline.search(path.read_text(encoding="utf-8"))
    }

    assert found == set()
