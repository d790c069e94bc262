"""Closure tables: values against their sources, recomputed expressions, deliberate damage."""

from __future__ import annotations

import copy
import pickle
from fractions import Fraction

import pytest

from closures.closure_list import aliases, closure_heads, closure_ids, resolve
from closures.closure_tables import build, closure, closures_all
from closures.table_checks import STATUS
from walllaw import tables
from walllaw.errors import InputError, TableError

# Values as printed in the places named. TMR: NASA Turbulence Modeling Resource (2025) pages;
# Eca 2005: L. Eca et al., IST D72-34 (2005), equation numbers as there; lecture: NPTEL 112104120.
PRINTED = [
    ("launder-spalding-1974", "C_mu", 0.09, "Eca 2005 eqs. 41-43"),
    ("launder-spalding-1974", "C_eps1", 1.44, "Eca 2005 eqs. 41-43"),
    ("launder-spalding-1974", "C_eps2", 1.92, "Eca 2005 eqs. 41-43"),
    ("launder-spalding-1974", "sigma_k", 1.0, "Eca 2005 eqs. 41-43"),
    ("launder-spalding-1974", "sigma_eps", 1.3, "Eca 2005 eqs. 41-43"),
    ("yakhot-1992", "C_mu", 0.0845, "lecture"),
    ("yakhot-1992", "C_eps1", 1.42, "lecture"),
    ("yakhot-1992", "C_eps2", 1.68, "lecture"),
    ("yakhot-1992", "eta_0", 4.38, "lecture"),
    ("yakhot-1992", "beta", 0.012, "lecture"),
    ("chien-1982", "C_eps1", 1.35, "TMR; Eca 2005 eqs. 50-56"),
    ("chien-1982", "C_eps2", 1.80, "TMR; Eca 2005 eqs. 50-56"),
    ("chien-1982", "C_3", 0.0115, "TMR; Eca 2005 eqs. 50-56"),
    ("launder-sharma-1974", "C_eps2", 1.92, "lecture"),
    ("wilcox-1988", "beta", 3 / 40, "TMR"),
    ("wilcox-1988", "alpha", 5 / 9, "TMR"),
    ("wilcox-1998", "beta", 9 / 125, "TMR"),
    ("wilcox-1998", "alpha", 13 / 25, "TMR"),
    ("wilcox-2006", "beta", 0.0708, "TMR"),
    ("wilcox-2006", "sigma_k", 0.6, "TMR"),
    ("wilcox-2006", "C_lim", 7 / 8, "TMR"),
    ("wilcox-2006", "sigma_d", 1 / 8, "TMR"),
    ("menter-bsl-1994", "inner.sigma_k", 0.5, "TMR; Eca 2005 eqs. 75-77"),
    ("menter-sst-1994", "inner.sigma_k", 0.85, "TMR"),
    ("menter-sst-1994", "outer.beta", 0.0828, "TMR"),
    ("menter-sst-1994", "outer.sigma_omega", 0.856, "TMR"),
    ("menter-sst-1994", "a_1", 0.31, "TMR"),
    ("menter-sst-1994", "P_limit", 20, "TMR"),
    ("menter-sst-2003", "P_limit", 10, "TMR"),
    ("menter-sst-2003", "inner.alpha", 5 / 9, "TMR"),
    ("menter-sst-2003", "outer.alpha", 0.44, "TMR"),
    ("spalart-allmaras-1994", "c_b1", 0.1355, "TMR"),
    ("spalart-allmaras-1994", "c_b2", 0.622, "TMR"),
    ("spalart-allmaras-1994", "sigma", 2 / 3, "TMR"),
    ("spalart-allmaras-1994", "c_v1", 7.1, "TMR"),
    ("spalart-allmaras-1994", "c_t3", 1.2, "TMR"),
    ("spalart-allmaras-1994", "c_t4", 0.5, "TMR"),
    ("spalart-allmaras-noft2", "c_t3", 0.0, "TMR"),
    ("menter-1997", "c_2", 1.862, "Eca et al. 2006 eqs. 25-27"),
    ("hanjalic-2004", "C_mu", 0.22, "TMR"),
    ("hanjalic-2004", "C_L", 0.36, "TMR"),
    ("wilcox-stress-omega-2006", "C_2", 10 / 19, "TMR"),
    ("ssg-lrr-omega-2012", "C_2_LRR", 0.52, "TMR"),
    ("ssg-lrr-omega-2012", "outer.sigma_d", 1.712, "TMR"),
    ("hellsten-2005", "inner.sigma_omega", 0.53, "TMR"),
    ("wallin-johansson-2000", "N_eq", 81 / 20, "TMR"),
    ("langtry-menter-2009", "c_e2", 50, "TMR"),
    ("langtry-menter-2009", "Re_theta_c_3", 6.96506e-7, "TMR"),
    ("menter-gamma-2015", "C_PG1", 14.68, "TMR"),
    ("baldwin-lomax-1978", "C_cp", 1.6, "Cebeci et al., CFD for Engineers, p. 85"),
    ("baldwin-lomax-1978", "C_wk", 0.25, "Cebeci et al., CFD for Engineers, p. 85"),
]  # fmt: skip

# Numbers printed beside the formulas: TMR gives c_w1 = 3.2391 (Eca et al. 2006) and Menter's gamma
# formulas; six decimals by hand calculation with kappa = 0.41.
DERIVED = [
    ("spalart-allmaras-1994", "c_w1", 3.239068),
    ("menter-sst-1994", "inner.alpha", 0.553167),
    ("menter-sst-1994", "outer.alpha", 0.440355),
    ("menter-bsl-1994", "inner.alpha", 0.553167),
    ("kok-2000", "alpha", 0.553167),
    ("ssg-lrr-omega-2012", "inner.C_4", 0.970909),
    ("ssg-lrr-omega-2012", "inner.C_5", 0.578182),
    ("wilcox-stress-omega-2006", "alpha_hat", 0.775120),
    ("wilcox-stress-omega-2006", "beta_hat", 0.200957),
    ("wilcox-stress-omega-2006", "gamma_hat", 0.501435),
    ("baldwin-barth-1990", "sigma_eps", 0.700417),
]


@pytest.mark.parametrize(("id_", "name", "value", "where"), PRINTED)
def test_printed_values(id_, name, value, where):
    assert closure(id_)[name] == value, where


@pytest.mark.parametrize(("id_", "name", "value"), DERIVED)
def test_derived_values(id_, name, value):
    row = closure(id_).coefficients[name]
    assert row.value == pytest.approx(value, abs=5e-7)
    assert row.status == "derived"
    assert row.expression


def test_every_coefficient_has_a_known_source_and_status():
    for c in closures_all():
        assert c.coefficients, c.id
        for name, row in c.coefficients.items():
            assert row.source in tables.sources(), (c.id, name)
            assert row.status in STATUS, (c.id, name)
            assert row.value == float(row.exact), (c.id, name)


def test_fractions_are_exact():
    assert closure("wilcox-1988").coefficients["alpha"].exact == Fraction(5, 9)
    assert closure("spalart-allmaras-1994").coefficients["sigma"].exact == Fraction(2, 3)


def test_inheritance_keeps_the_source():
    c = closure("langtry-menter-2009")
    assert c["outer.beta"] == 0.0828
    assert c.coefficients["outer.beta"].source == "menter-2003"
    assert c.coefficients["c_a1"].source == "langtry-menter-2009"
    assert closure("spalart-allmaras-noft2").coefficients["c_v1"].value == 7.1


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


def test_own_table(tmp_path):
    file = tmp_path / "mine.toml"
    text = tables.text("closures", "launder-spalding-1974.toml")
    file.write_text(text.replace('C_eps1 = { value = "1.44" }', 'C_eps1 = { value = "1.50" }'))
    mine = closure(str(file))
    assert mine.id == "mine"
    assert mine["C_eps1"] == 1.5
    assert mine["C_eps2"] == 1.92


def test_own_table_on_a_base(tmp_path):
    file = tmp_path / "tuned.toml"
    file.write_text(
        'name = "tuned"\nfamily = "k-omega"\nvariables = ["k", "omega"]\nsource = "wilcox-2006"\n'
        'status = "unsure"\nbase = "wilcox-2006"\nsummary = "s"\nevidence = "e"\n'
        '[coefficients]\nbeta = { value = "0.072" }\n[wall]\ntreatments = ["resolved"]\n'
        '[free_stream]\ndecay = "k-omega"\n'
    )
    c = closure(str(file))
    assert (c["beta"], c["beta_star"], c.C_mu) == (0.072, 0.09, 0.09)


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
]  # fmt: skip


@pytest.mark.parametrize(("path", "value", "words"), DAMAGE)
def test_deliberate_damage_is_found(path, value, words):
    raw = tables.read("closures", "launder-spalding-1974.toml")
    with pytest.raises((TableError, InputError), match=words) as caught:
        build("launder-spalding-1974", _damage(raw, path, value))
    assert "\n" not in str(caught.value)


def test_repr_shows_numbers_and_source():
    text = repr(closure("wilcox-1988"))
    assert "beta=0.075" in text
    assert "source wilcox-1988" in text


def test_errors_survive_pickling():
    error = InputError("a", "b", "c", "d")
    assert str(pickle.loads(pickle.dumps(error))) == str(error)  # noqa: S301 - our own object
