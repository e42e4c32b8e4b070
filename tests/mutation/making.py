"""Writes every mutant of the files named into the copy, and prints their names as JSON.

A program of its own: `mutmut` reads the configuration of the folder it runs in.
"""

import ast
import difflib
import json
import sys
from pathlib import Path

from mutmut.mutation.file_mutation import mutate_file_contents

copy, paths = Path(sys.argv[1]), sys.argv[2:]
names: list[str] = []
differences: dict[str, str] = {}
for path in paths:
    source = (copy / path).read_text("utf-8")
    mutated = mutate_file_contents(path, source)
    module = path.removesuffix(".py").replace("/", ".").removesuffix(".__init__")
    (copy / path).write_text(mutated.code, "utf-8")
    bodies = {
        node.name: ast.unparse(node).split("\n")
        for node in ast.walk(ast.parse(mutated.code))
        if isinstance(node, ast.FunctionDef)
    }
    for name in mutated.mutant_names:
        names.append(f"{module}.{name}")
        original = bodies.get(f"{name.rpartition('__mutmut_')[0]}__mutmut_orig", [])
        lines = difflib.unified_diff(original, bodies.get(name, []), lineterm="", n=0)
        kept = [line for line in lines if line[:2] not in ("--", "++", "@@") and "__mutmut_" not in line]
        differences[f"{module}.{name}"] = "\n".join(kept)
(copy / "differences.json").write_text(json.dumps(differences), "utf-8")
print(json.dumps(names))
