"""Puts a mutant in the place of the code of its function, in this process and for good.

The code object is changed and not the name, so that whoever imported the function before meets the mutant,
and a function without a mutant costs nothing.
"""

import __future__

import ast
import importlib
import inspect
from pathlib import Path
from types import CodeType, FunctionType
from typing import Any, Final

TREE: Final = f"{Path(__file__).resolve().parents[2]}/"
ROOMS: Final = ("fleet", "loads", "records")
LATER: Final = __future__.annotations.compiler_flag


def key_of(one: CodeType | dict[str, Any]) -> str:
    """This function will return what a mutant and the code it stands for have in common."""
    if isinstance(one, CodeType):
        path = one.co_filename.removeprefix(TREE).removesuffix(".py").removesuffix("/__init__")
        return f"{path.replace('/', '.')}:{one.co_qualname.partition('.<locals>')[0]}"
    return f"{one['module']}:{one['function']}"


def is_ours(code: CodeType) -> bool:
    """This function will say whether code comes from a room of the tree."""
    return code.co_filename.removeprefix(TREE).partition("/")[0] in ROOMS


def put_in_place(mutant: dict[str, Any]) -> None:
    """This function will give the function of a mutant the mutant's code and defaults."""
    module = importlib.import_module(mutant["module"])
    *classes, name = mutant["function"].split(".")
    owner: Any = module
    for one in classes:
        owner = vars(owner)[one]
    original = inspect.unwrap(getattr(vars(owner)[name], "__func__", vars(owner)[name]))
    source = mutant["source"]
    if classes:
        # Within a class, so that `super` has its cell.
        source = f"class {classes[-1]}:\n" + "\n".join(f"  {line}" for line in source.split("\n"))
    names: dict[str, Any] = dict(vars(module))
    exec(compile(ast.parse(source), str(module.__file__), "exec", LATER), names)  # noqa: S102  # the mutant
    made: FunctionType = vars(names[classes[-1]])[name] if classes else names[name]
    original.__code__ = made.__code__
    original.__defaults__ = made.__defaults__
    original.__kwdefaults__ = made.__kwdefaults__
