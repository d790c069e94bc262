"""The public list of walllaw: complete, sorted, and free until used."""

from __future__ import annotations

import ast
import importlib
import pathlib
import subprocess
import sys

import pytest

import walllaw

PACKAGE = pathlib.Path(walllaw.__file__).parent


def test_the_list_is_sorted_and_everything_on_it_loads():
    assert walllaw.__all__ == sorted(walllaw.__all__)
    assert dir(walllaw) == walllaw.__all__
    for name in walllaw.__all__:
        assert getattr(walllaw, name) is not None
    with pytest.raises(AttributeError, match="nonsense"):
        _ = walllaw.nonsense


def test_every_law_is_on_the_list():
    laws = set()
    for path in PACKAGE.glob("*.py"):
        module = importlib.import_module(f"walllaw.{path.stem}")
        laws |= {
            name
            for name, value in vars(module).items()
            if isinstance(value, type)
            and issubclass(value, walllaw.Law)
            and not getattr(value, "__abstractmethods__", None)
            and "ROW" in vars(value)
        }
    assert "Spalding" in laws
    assert laws <= set(walllaw.__all__)


def test_type_checkers_see_the_same_names():
    tree = ast.parse((PACKAGE / "__init__.py").read_text(encoding="utf-8"))
    block = next(n for n in tree.body if isinstance(n, ast.If))
    seen = {a.name for n in block.body if isinstance(n, ast.ImportFrom) for a in n.names}
    assert seen == set(walllaw.__all__)


def test_importing_costs_next_to_nothing():
    code = (
        "import sys, walllaw;"
        "assert not {'numpy', 'scipy'} & set(sys.modules);"
        "walllaw.Spalding; assert 'numpy' in sys.modules and 'scipy' not in sys.modules;"
        "from walllaw import *; assert 'LogLaw' in dir()"
    )
    subprocess.run([sys.executable, "-c", code], check=True)
