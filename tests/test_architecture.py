"""The structure that the code promises: layers, sizes, public names, tables."""

from __future__ import annotations

import ast
import importlib
import pathlib
import subprocess
import sys

import pytest

ROOT = pathlib.Path(__file__).parents[1]
MODULES = sorted([*ROOT.glob("walllaw/**/*.py"), *ROOT.glob("closures/**/*.py")])
# lower floors of `closures` first; a module may import from its own floor and those before
FLOORS = [
    {"_version", "quantities", "citations", "files", "units", "closure_list", "table_checks",
     "closure_tables", "water", "standard_atmosphere", "fluids", "situations"},
    {"monomials", "eddy_viscosity", "transition"},
    {"states"},
    {"inlets"},
    {"case", "ledger"},
    {"inputs", "rules"},
    {"steps"},
    {"sheets", "pictures"},
    {"evaluation", "report", "schemas"},
    {"command", "__main__"},
]  # fmt: skip


def imported(path: pathlib.Path) -> set[str]:
    found = set()
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            found |= {alias.name for alias in node.names}
        elif isinstance(node, ast.ImportFrom) and node.module:
            found.add(node.module)
            found |= {f"{node.module}.{alias.name}" for alias in node.names}
    return found


def floor(name: str) -> int:
    return next(i for i, names in enumerate(FLOORS) if name in names)


def test_walllaw_never_imports_closures():
    for path in ROOT.glob("walllaw/**/*.py"):
        assert not any(name.split(".")[0] == "closures" for name in imported(path)), path


def test_nothing_in_closures_imports_upward():
    for path in ROOT.glob("closures/**/*.py"):
        own = path.relative_to(ROOT / "closures").parts[0].removesuffix(".py")
        if own == "__init__":
            continue
        for name in imported(path):
            parts = name.split(".")
            if parts[0] == "closures" and len(parts) > 1 and parts[1] != "__version__":
                assert floor(parts[1]) <= floor(own), (path, name)


def test_modules_and_functions_stay_small():
    for path in MODULES:
        text = path.read_text(encoding="utf-8")
        assert text.count("\n") <= 450, path
        for node in ast.walk(ast.parse(text)):
            if isinstance(node, ast.FunctionDef):
                body = node.body[1:] if ast.get_docstring(node) else node.body
                lines = body[-1].end_lineno - body[0].lineno + 1 if body else 0
                assert lines <= 60, (path, node.name)


def test_every_public_thing_has_a_docstring():
    for path in MODULES:
        tree = ast.parse(path.read_text(encoding="utf-8"))
        assert ast.get_docstring(tree), path
        for node in tree.body:
            if isinstance(node, (ast.FunctionDef, ast.ClassDef)) and not node.name.startswith("_"):
                assert ast.get_docstring(node), (path, node.name)


@pytest.mark.parametrize("package", ["closures", "walllaw"])
def test_public_names_are_sorted_and_exist(package):
    module = importlib.import_module(package)
    assert module.__all__ == sorted(module.__all__, key=lambda n: (n.lower(), n)) or (
        module.__all__ == sorted(module.__all__)
    )
    for name in module.__all__:
        assert getattr(module, name) is not None
    assert dir(module) == list(module.__all__)
    with pytest.raises(AttributeError):
        _ = module.nonsense


def test_importing_the_packages_imports_nothing_heavy():
    code = (
        "import sys, walllaw, closures;"
        "heavy = {'numpy', 'scipy', 'pint', 'CoolProp', 'matplotlib', 'jinja2', 'pandas'};"
        "assert not heavy & set(sys.modules), heavy & set(sys.modules)"
    )
    subprocess.run([sys.executable, "-c", code], check=True)


def test_tables_hold_data_only():
    assert not list((ROOT / "tables").rglob("*.py"))


def test_the_top_level_is_what_was_agreed():
    allowed = {
        "README.md", "DEVELOPERS.md", "CHANGELOG.md", "LICENSE", "pyproject.toml", "closures",
        "walllaw", "tests", "tables", "docs",
    }  # fmt: skip
    listed = subprocess.run(
        ["git", "ls-files"], cwd=ROOT, capture_output=True, text=True, check=True
    ).stdout.split("\n")
    names = {line.split("/")[0] for line in listed if line}
    assert {n for n in names if not n.startswith(".")} <= allowed
