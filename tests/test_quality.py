"""Lint, format and types are part of the tests."""

from __future__ import annotations

import pathlib
import subprocess
import sys

import pytest

ROOT = pathlib.Path(__file__).parents[1]


@pytest.mark.parametrize(
    "arguments",
    [
        ["ruff", "check", "closures", "walllaw", "tests"],
        ["ruff", "format", "--check", "closures", "walllaw", "tests"],
        ["mypy"],
    ],
    ids=["lint", "format", "types"],
)
def test_clean(arguments):
    done = subprocess.run(
        [sys.executable, "-m", *arguments], cwd=ROOT, capture_output=True, text=True, check=False
    )
    assert done.returncode == 0, done.stdout + done.stderr
