"""Makes every mutant of the files named; prints a JSON list a file: `python making.py <tree> <file> ...`.

A program of its own: `mutmut` reads the configuration of the folder it runs in. A mutant is the source of one
function with one small fault; `text` says that only the words of a string differ.
"""

import ast
import difflib
import json
import sys
from concurrent.futures import ProcessPoolExecutor
from pathlib import Path

from mutmut.mutation.file_mutation import mutate_file_contents

MARK = "__mutmut_"
IN_CLASS = "ǁ"


def made_of(tree: str, path: str) -> list[dict[str, object]]:
    """This function will return the mutants of one file."""
    mutated = mutate_file_contents(path, (Path(tree) / path).read_text("utf-8"))
    module = path.removesuffix(".py").removesuffix("/__init__").replace("/", ".")
    parts = ast.walk(ast.parse(mutated.code))
    functions = {node.name: node for node in parts if isinstance(node, ast.FunctionDef)}
    mutants = []
    for name in mutated.mutant_names:
        place, _, number = name.rpartition(MARK)
        *classes, function = place.removeprefix("x_").removeprefix(f"x{IN_CLASS}").split(IN_CLASS)
        original, mutant = functions[f"{place}{MARK}orig"], functions[name]
        original.name = mutant.name = function
        original.decorator_list = mutant.decorator_list = []
        lines = difflib.unified_diff(
            ast.unparse(original).split("\n"), ast.unparse(mutant).split("\n"), lineterm="", n=0
        )
        whole = ".".join([*classes, function])
        mutants.append(
            {
                "name": f"{module}.{whole} {number}",
                "module": module,
                "function": whole,
                "source": ast.unparse(mutant),
                "text": _without_words(original) == _without_words(mutant),
                "difference": "\n".join(line for line in lines if line[:2] not in ("--", "++", "@@")),
            }
        )
    return mutants


def _without_words(function: ast.FunctionDef) -> str:
    copy = ast.parse(ast.unparse(function))
    for node in ast.walk(copy):
        if isinstance(node, ast.Constant) and isinstance(node.value, str):
            node.value = ""
    return ast.dump(copy)


if __name__ == "__main__":
    with ProcessPoolExecutor() as pool:
        paths = sys.argv[2:]
        print(json.dumps(list(pool.map(made_of, [sys.argv[1]] * len(paths), paths))))
