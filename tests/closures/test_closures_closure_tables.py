"""Closure tables: values against their sources, recomputed expressions, own tables."""

from __future__ import annotations

import csv
import math
import pathlib
import pickle
from fractions import Fraction

import mpmath
import pytest

from closures.closure_tables import closure, closures_all
from closures.table_checks import STATUS
from walllaw import tables
from walllaw.errors import InputError, TableError
from walllaw.exact import evaluate

DATA = pathlib.Path(__file__).parents[1] / "reference" / "data" / "closure_coefficients.csv"

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


def test_repr_shows_numbers_and_source():
    text = repr(closure("wilcox-1988"))
    assert "beta=0.075" in text
    assert "source wilcox-1988" in text


def test_errors_survive_pickling():
    error = InputError("a", "b", "c", "d")
    assert str(pickle.loads(pickle.dumps(error))) == str(error)  # noqa: S301 - our own object


def _collected():
    with open(DATA, encoding="utf-8") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


@pytest.mark.parametrize("id_", sorted({row["closure"] for row in _collected()}))
def test_every_collected_value(id_):
    # the places named in each row of tests/reference/data/closure_coefficients.csv
    c = closure(id_)
    pool = {**c.extensions, **c.alternatives, **c.coefficients}
    for row in _collected():
        if row["closure"] == id_:
            k = pool[row["coefficient"]]
            assert k.value == pytest.approx(float(evaluate(row["value"])), rel=1e-15), row
            assert k.status in (row["status"], "derived"), row


def test_collected_values_cover_every_closure():
    # spalart-rumsey-2007 adds two ambient values to its base; they are checked by their intensity
    assert {c.id for c in closures_all()} - {row["closure"] for row in _collected()} == {
        "spalart-rumsey-2007"
    }
    assert closure("spalart-rumsey-2007")["k_ambient"] == 1e-6  # TMR, page of the SST closure
    assert closure("spalart-rumsey-2007")["omega_ambient"] == 5.0


# Implied von Karman constant, kappa^2 = sqrt(C_mu) sigma_eps (C_eps2 - C_eps1): of the k-epsilon
# equations in the log layer; six decimals from an independent evaluation with the values as printed.
@pytest.mark.parametrize(
    ("id_", "kappa"),
    [("launder-spalding-1974", 0.432666), ("launder-sharma-1974", 0.432666),
     ("lam-bremhorst-1981", 0.432666), ("jones-launder-1972", 0.418927), ("chien-1982", 0.418927),
     ("abe-kondoh-nagano-1994", 0.409878)],
)  # fmt: skip
def test_implied_kappa_of_k_epsilon(id_, kappa):
    c = closure(id_)
    found = math.sqrt(c.C_mu) * c["sigma_eps"] * (c["C_eps2"] - c["C_eps1"])
    assert math.sqrt(found) == pytest.approx(kappa, abs=5e-7)


# the same for k-omega: kappa^2 = sqrt(beta_star) (beta/beta_star - alpha)/sigma_omega
@pytest.mark.parametrize(
    ("id_", "part", "kappa"),
    [("wilcox-1988", "", 0.408248), ("wilcox-1998", "", 0.409878), ("wilcox-2006", "", 0.4),
     ("kok-2000", "", 0.41), ("menter-sst-1994", "inner.", 0.41), ("menter-sst-1994", "outer.", 0.41),
     ("menter-sst-2003", "inner.", 0.408248), ("menter-sst-2003", "outer.", 0.410152)],
)  # fmt: skip
def test_implied_kappa_of_k_omega(id_, part, kappa):
    c = closure(id_)
    ratio = c[f"{part}beta"] / c["beta_star"] - c[f"{part}alpha"]
    found = math.sqrt(c["beta_star"]) * ratio / c[f"{part}sigma_omega"]
    assert math.sqrt(found) == pytest.approx(kappa, abs=5e-7)


def test_log_layer_values_of_a_variable_C_mu():
    c = closure("craft-launder-suga-1996")  # C_mu m^2 = 1 solved to 30 digits by mpmath
    with mpmath.workdps(30):
        m = mpmath.findroot(
            lambda m: (
                0.3 / (1 + 0.35 * m**1.5) * (1 - mpmath.exp(-0.36 * mpmath.exp(0.75 * m))) * m**2
                - 1
            ),
            3,
        )
        assert float(m) == pytest.approx(3.190675, abs=5e-7)
        assert c.C_mu == pytest.approx(float(1 / m**2), abs=5e-7)
        realizable = closure("shih-1995")
        s = mpmath.findroot(lambda s: 4.04 * s**2 + mpmath.sqrt(4.5) * s - 1, 0.3)
        assert realizable["C_mu_log"] == pytest.approx(float(s**2), rel=1e-14)
    assert realizable.C_mu == pytest.approx(realizable["C_mu_log"], abs=1e-6)
    assert closure("wallin-johansson-2000")["C_mu_log"] == pytest.approx(0.087182, abs=5e-7)


def test_effective_C_mu_of_elliptic_closures():
    # nu_t = C_mu v2 k/epsilon with v2 = 2k/3 at an isotropic inlet
    for id_ in ("lien-kalitzin-2001", "hanjalic-2004", "durbin-1995"):
        c = closure(id_)
        assert pytest.approx(2 * c["C_mu"] / 3, rel=1e-15) == c.C_mu


def test_other_values_are_kept_apart():
    sa = closure("spalart-allmaras-1994")
    assert sa.alternatives["c_w1_appendix"].value == pytest.approx(2.763488, abs=5e-7)
    assert sa.alternatives["c_w1_rounded"].value == pytest.approx(sa["c_w1"], abs=5e-5)
    for c in closures_all():
        for name, row in {**c.alternatives, **c.extensions}.items():
            assert name not in c.coefficients, (c.id, name)
            assert row.source == "common practice" or row.source in tables.sources(), (c.id, name)
        for name, row in c.alternatives.items():
            assert row.note, (c.id, name)


def test_a_changed_coefficient_reaches_what_is_derived(tmp_path):
    head = (
        'name = "n"\nfamily = "{}"\nvariables = {}\nsource = "wilcox-1988"\nstatus = "unsure"\n'
        'base = "{}"\nsummary = "s"\nevidence = "e"\n[coefficients]\nkappa = {{ value = "0.40" }}\n'
        '[wall]\ntreatments = ["resolved"]\n[free_stream]\n{}\n'
    )
    file = tmp_path / "mine.toml"
    file.write_text(head.format("one-equation", '["nu_tilde"]', "sa", 'decay = "none"'))
    c = closure(str(file))
    assert c["c_w1"] == pytest.approx(0.1355 / 0.16 + 1.622 * 1.5, rel=1e-15)
    assert c.coefficients["c_w1"].source == "spalart-allmaras-1994"
    assert c.coefficients["kappa"].source == "wilcox-1988"
    file.write_text(
        head.format(
            "k-omega", '["k", "omega"]', "menter-sst-1994", 'decay = "k-omega"\ndecay_set = "outer"'
        )
        + '[outer]\nbeta = { value = "0.083" }\n'
    )
    c = closure(str(file))
    assert c["inner.alpha"] == pytest.approx(0.075 / 0.09 - 0.5 * 0.16 / 0.3, rel=1e-15)
    assert c["outer.alpha"] == pytest.approx(0.083 / 0.09 - 0.856 * 0.16 / 0.3, rel=1e-15)
    assert c["outer.sigma_omega"] == 0.856


def test_the_two_sets_without_prefix():
    c = closure("menter-sst-2003")
    assert c.inner.keys() == c.outer.keys()
    assert (c.inner["beta"].value, c.outer["beta"].value) == (0.075, 0.0828)
    assert not closure("wilcox-1988").inner


def test_a_wrong_coefficient_name_is_answered():
    with pytest.raises(InputError, match="inner.beta or outer.beta"):
        closure("menter-sst-2003")["beta"]
    with pytest.raises(InputError, match="did you mean 'beta_star'"):
        closure("wilcox-1988")["betastar"]


def test_a_heat_closure_has_no_C_mu():
    with pytest.raises(InputError, match="kader-1981"):
        _ = closure("kader-1981").C_mu


def test_first_cell_of_resolved_closures():
    for c in closures_all():
        if c.treatments[:1] == ("resolved",):
            assert c.y_plus_max.value == 1.0
            assert c.wall["y_plus_max"] == "1"
            assert c.y_plus_max.status in ("confirmed", "memory", "common practice")
        else:
            assert c.y_plus_max is None or "resolved" in c.treatments


def test_expressions_in_any_order(tmp_path):
    file = tmp_path / "mine.toml"
    text = tables.text("closures", "wilcox-1988.toml")
    file.write_text(
        text.replace(
            "[coefficients]",
            '[coefficients]\na = { expression = "2*b" }\nb = { expression = "3*c" }\nc = { value = "7" }',
        )
    )
    c = closure(str(file))
    assert (c["a"], c["b"], list(c.coefficients)[:3]) == (42.0, 21.0, ["a", "b", "c"])


@pytest.mark.parametrize("name", ["./no-such.toml", "closures/", "a\0b/c.toml"])
def test_a_missing_own_table(name):
    with pytest.raises((InputError, TableError), match="closure"):
        closure(name)
