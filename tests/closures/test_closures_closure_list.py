"""Ids, aliases and heads of the closure tables: quick, and the same as the full tables say."""

from __future__ import annotations

import subprocess
import sys

import pytest

from closures.closure_list import aliases, closure_heads, closure_ids, resolve
from closures.closure_tables import closure
from walllaw import tables
from walllaw.errors import InputError


def test_heads_agree_with_the_tables():
    heads = closure_heads()
    assert [h["id"] for h in heads] == list(closure_ids())
    assert len(heads) >= 50
    for head in heads:
        c = closure(head["id"])
        assert (head["name"], head["family"], tuple(head["variables"])) == (
            c.name, c.family, c.variables,
        )  # fmt: skip


def test_aliases_lead_to_ids():
    for alias, id_ in aliases().items():
        assert resolve(alias) == id_
        assert id_ in closure_ids()
    assert not set(aliases()) & set(closure_ids())


@pytest.mark.parametrize(
    ("wrong", "right"),
    [
        ("menter-sst-203", "menter-sst-2003"), ("wilcox-1978", "wilcox-1988"), ("ssst", "sst"),
        ("realisable", "realizable"), ("spalart-almaras-1994", "spalart-allmaras-1994"),
        ("k-epsilom", "k-epsilon"), ("launder_sharma_1974", "launder-sharma-1974"),
        ("chien-1928", "chien-1982"), ("Menter-SST-1994", "menter-sst-1994"),
    ],
)  # fmt: skip
def test_nearest_name(wrong, right):
    with pytest.raises(InputError, match=f"did you mean '{right}'"):
        closure(wrong)


def test_every_alias_says_why():
    for line in tables.text("aliases.toml").splitlines():
        assert "# " in line, line


def test_listing_needs_neither_numpy_nor_dataclasses():
    code = (
        "import sys; from closures.closure_list import closure_heads; heads = closure_heads();"
        "heavy = {'numpy', 'scipy', 'dataclasses'} & set(sys.modules);"
        "assert len(heads) > 50 and not heavy, heavy"
    )
    subprocess.run([sys.executable, "-c", code], check=True)
