"""Deliberate damage to a good closure table: each kind is found and named in one line."""

from __future__ import annotations

import copy

import pytest

from closures.closure_tables import build, closure
from walllaw import tables
from walllaw.errors import TableError

GOOD = "launder-spalding-1974"


def _damage(raw, path, value):
    raw = copy.deepcopy(raw)
    place = raw
    *heads, last = path.split(".")
    for head in heads:
        place = place[head]
    if value is None:
        del place[last]
    else:
        place[last] = value
    return raw


DAMAGE = [
    ("name", None, "name"), ("family", None, "family"), ("variables", None, "variables"),
    ("source", None, "source"), ("status", None, "status"), ("summary", None, "summary"),
    ("evidence", None, "evidence"), ("free_stream", None, "free_stream"),
    ("algebra", None, "algebra.C_mu"), ("wall.treatments", None, "wall.treatments"),
    ("coefficients", None, "coefficients: is missing"), ("nmae", "x", "nmae"), ("name", "", "name"),
    ("name", 5, "name"), ("family", "k-eps", "family"), ("variables", ["k", "eps"], "variables"),
    ("variables", "k", "variables"), ("variables", [], "variables"),
    ("source", "nobody-1900", "nobody-1900"), ("status", "certain", "status"),
    ("coefficients.C_mu", 0.09, "C_mu"), ("coefficients.C_mu", {"value": 0.09}, "as printed"),
    ("coefficients.C_mu", {"value": "0,09"}, "C_mu"), ("coefficients.C_mu", {}, "C_mu"),
    ("coefficients.C_mu", {"value": "1", "expression": "2"}, "C_mu"),
    ("coefficients.C_mu", {"value": "0.09", "sorce": "x"}, "did you mean 'source'"),
    ("coefficients.C_mu", {"value": "0.09", "source": "nobody-1900"}, "nobody-1900"),
    ("coefficients.C_mu", {"value": "0.09", "status": "sure"}, "status"),
    ("coefficients.X", {"expression": "C_nu*2"}, "C_nu"),
    ("coefficients.X", {"expression": "__import__('os')"}, "X"),
    ("coefficients.X", {"expression": "1/0"}, "X"), ("coefficients.X", {"value": "nan"}, "X"),
    ("wall.treatments", ["walls"], "wall.treatments"), ("wall.y_max", "1", "y_max"),
    ("wall.conditions.k", {"source": "wilcox-1988"}, "wall.conditions.k"),
    ("functions.nu_t", {"text": "x"}, "functions.nu_t"), ("free_stream.decay", "fast", "decay"),
    ("free_stream.recommendations", [{"quantity": "k"}], "recommendations"),
    ("algebra.C_mu", "C_nu", "C_nu"), ("base", "nobody-1900", "nobody-1900"),
    ("coefficients.C_mu", {"value": "0.09", "status": "derived"}, "derived"),
    ("coefficients.C_mu", {"value": "0.09", "note": 5}, "C_mu.note"),
    ("coefficients.C_mu", "0.09", "C_mu: must be a table"),
    ("coefficients.C-mu", {"value": "1"}, "C-mu"), ("coefficients.pi", {"value": "3"}, "pi"),
    ("coefficients.X", {"expression": "X + 1"}, "X: expressions need each other"),
    ("coefficients.X", {"value": "1e400"}, "X"), ("coefficients.X", {"value": "9e999999999"}, "X"),
    ("coefficients.X", {"value": "((9**999)**999)**999"}, "X"),
    ("coefficients.X", {"expression": "(-8)**(1/3)"}, "X"),
    ("coefficients.X", {"expression": "sqrt(-1)"}, "X"), ("coefficients.X", {"value": ""}, "X"),
    ("sigma_convention", "factor", "sigma_convention"), ("misprints", "a text", "misprints"),
    ("base", 5, "base"), ("base", "wilcox-1978", "did you mean 'wilcox-1988'"), ("use", 5, "use"),
    ("base", "./mine.toml", "base"), ("wall.treatments", "resolved", "wall.treatments"),
    ("wall.y_plus_max", "1", "y_plus_max"), ("wall.y_plus_max", {"value": "high"}, "y_plus_max"),
    ("wall.conditions.k.rule", "nought", "wall.conditions.k.rule"),
    ("wall.conditions.omega", {"rule": "zero"}, "wall.conditions.omega"),
    ("functions.nu_t.formula", 5, "functions.nu_t.formula"),
    ("free_stream.decay_set", "outer", "decay_set"), ("free_stream.decay_set", "far", "decay_set"),
    ("free_stream.note", 5, "free_stream.note"), ("inner", {"x": {"value": "1"}}, "inner, outer: x"),
    ("free_stream.recommendations", "none", "recommendations"),
    ("extensions", {"x": {"value": "1", "source": "nobody-1900"}}, "extensions.x"),
    ("alternatives", {"x": {"value": "1.0.0"}}, "x"),
]  # fmt: skip


@pytest.mark.parametrize(("path", "value", "words"), DAMAGE)
def test_deliberate_damage_is_found(path, value, words):
    raw = tables.read("closures", f"{GOOD}.toml")
    with pytest.raises(TableError, match=words) as caught:
        build(GOOD, _damage(raw, path, value))
    assert str(caught.value).startswith(f"closure {GOOD}: ")
    assert "\n" not in str(caught.value)


def _sst(**changes):
    raw = copy.deepcopy(tables.read("closures", "menter-sst-1994.toml"))
    for path, value in changes.items():
        part, _, name = path.partition("__")
        raw[part][name] = value
    return raw


@pytest.mark.parametrize(
    ("changes", "words"),
    [
        ({"coefficients__beta": {"value": "0.08"}}, "coefficients.beta: stands in inner too"),
        ({"inner__gamma": {"value": "0.5"}}, "inner, outer: gamma"),
        ({"inner__alpha": {"expression": "beta_2"}}, "inner.alpha"),
        ({"inner__beta": {"expression": "alpha/2"}}, "inner.beta, alpha: expressions need each"),
        ({"free_stream__decay_set": "middle"}, "free_stream.decay_set"),
    ],
)
def test_damage_to_two_sets_is_found(changes, words):
    with pytest.raises(TableError, match=words):
        build("menter-sst-1994", _sst(**changes))


def test_two_sets_need_one_for_the_decay():
    raw = _sst()
    del raw["free_stream"]["decay_set"]
    with pytest.raises(TableError, match="decay_set"):
        build("menter-sst-1994", raw)


@pytest.mark.parametrize(
    ("change", "words"),
    [({"low": "1"}, "high: is missing"), ({"high": "1"}, "low: is missing"),
     ({"low": "2", "high": "1"}, "is above high"), ({"low": "few", "high": "1"}, "few")],
)  # fmt: skip
def test_damage_to_a_recommendation_is_found(change, words):
    row = {"quantity": "k", "formula": "k", "source": GOOD, "status": "memory", **change}
    raw = copy.deepcopy(tables.read("closures", f"{GOOD}.toml"))
    raw["free_stream"]["recommendations"] = [row]
    with pytest.raises(TableError, match=words):
        build(GOOD, raw)


def test_the_undamaged_table_passes():
    assert build(GOOD, tables.read("closures", f"{GOOD}.toml"))["C_mu"] == closure(GOOD)["C_mu"]


def test_own_table_faults_name_the_file(tmp_path):
    file = tmp_path / "mine.toml"
    text = tables.text("closures", f"{GOOD}.toml")
    file.write_text(text.replace('C_mu = { value = "0.09" }', "C_mu = { value = 0.09 }"))
    with pytest.raises(TableError, match=f"closure {file}: coefficients.C_mu: write the value"):
        closure(str(file))
    file.write_text(text.replace('name = "', "name = "))
    with pytest.raises(TableError, match="not valid TOML") as caught:
        closure(str(file))
    assert str(file) in str(caught.value)
