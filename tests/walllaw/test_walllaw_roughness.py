"""Roughness functions, equivalent heights and rough-wall values: printed values and limits."""

from __future__ import annotations

import csv
import inspect
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from walllaw import friction, roughness
from walllaw.errors import InputError, RangeWarning

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)
PAIRS = [(0.41, 5.0), (0.41, 5.2), (0.40, 5.5), (0.384, 4.27)]
SHIFTS = [roughness.ligrani_moffat, roughness.cebeci_bradshaw, roughness.grigson]


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


FUNCTIONS = rows("roughness_function_values.csv")
WALLS = rows("rough_wall_values.csv")


# --- roughness functions --------------------------------------------------------------------------


# 17 digits by mpmath of the formulas in the file's header. Between 2.25 and exp[kappa (8.5 - B)]
# the printed sand formulas are negative; the functions give 0 there.
@pytest.mark.parametrize("row", FUNCTIONS, ids=lambda r: f"{r['kappa']}-{r['ks_plus']}")
@pytest.mark.parametrize(
    ("column", "function"),
    [
        ("cebeci_bradshaw", roughness.cebeci_bradshaw),
        ("ligrani_moffat", roughness.ligrani_moffat),
        ("colebrook_type", roughness.grigson),
    ],
)
def test_roughness_functions(row, column, function):
    value = function(float(row["ks_plus"]), float(row["kappa"]), float(row["B"]))
    assert value == pytest.approx(max(float(row[column]), 0.0), rel=4e-15, abs=1e-15)


# 12 digits by mpmath; the wall-function forms for kappa 0.4187
@pytest.mark.parametrize("row", [r for r in WALLS if r["quantity"].startswith("wall_function")])
def test_wall_function_shift(row):
    C_s = float(row["quantity"].split()[1])
    value = roughness.wall_function_shift(float(row["roughness_plus"]), C_s, 0.4187)
    assert value == pytest.approx(float(row["value"]), rel=1e-11)


@pytest.mark.parametrize(("kappa", "B"), PAIRS)
def test_all_families_tend_to_the_fully_rough_line(kappa, B):
    ks = np.array([1e5, 1e7, 1e9])
    line = roughness.fully_rough(ks, kappa, B)
    for shift in SHIFTS:
        assert shift(ks, kappa, B) == pytest.approx(line, rel=1e-5)
    C_s = roughness.nikuradse_constant(kappa, B)
    assert roughness.wall_function_shift(ks, C_s, kappa) == pytest.approx(line, rel=1e-5)


@pytest.mark.parametrize("shift", SHIFTS)
@pytest.mark.parametrize(("kappa", "B"), PAIRS)
def test_shift_never_falls_and_is_never_negative(shift, kappa, B):
    ks = np.concatenate(
        [np.geomspace(1e-6, 1e8, 20001), 90 + np.arange(-30, 31) * np.spacing(90.0)]
    )
    values = shift(np.sort(ks), kappa, B)
    assert (values >= 0).all()
    assert (np.diff(values) >= -4e-15 * values[1:]).all()
    assert shift(0.0, kappa, B) == 0.0


def test_exact_sine_is_continuous_at_both_limits():
    for edge, step in [(2.25, 1e-12), (90.0, 1e-10)]:
        low, high = roughness.ligrani_moffat([edge - step, edge + step], 0.41, 8.0)
        assert high - low == pytest.approx(0.0, abs=1e-10)


# (pi/2)/ln(90/2.25) = 0.42581937 against 0.4258 and ln 2.25 = 0.81093 against 0.811
def test_rounded_sine_is_within_3e_4_of_the_exact_one():
    ks = np.geomspace(2.3, 1e3, 5000)
    difference = roughness.cebeci_bradshaw(ks) - roughness.ligrani_moffat(ks)
    assert 1e-5 < np.abs(difference).max() < 3e-4


# Families differ 13 times at k_s+ = 5: 1.91259731051 against 0.141874776447 (mpmath)
def test_the_family_matters_in_the_transitional_regime():
    ratio = roughness.grigson(5.0) / roughness.cebeci_bradshaw(5.0)
    assert ratio == pytest.approx(1.91259731051 / 0.141874776447, rel=1e-11)


# usual values of the factor of the Colebrook type: 0.2381, 0.2585, 0.3012 (the usual 0.3), 0.2950
@pytest.mark.parametrize(
    ("kappa", "B", "factor"),
    [(0.41, 5.0, 0.2381), (0.41, 5.2, 0.2585), (0.40, 5.5, 0.3012), (0.421, 5.6, 0.2950)],
)
def test_factor_of_the_colebrook_type(kappa, B, factor):
    ks = 1e-7  # where ln(1 + a k)/kappa is a k/kappa
    assert roughness.grigson(ks, kappa, B) * kappa / ks == pytest.approx(factor, abs=5e-5)


# Colebrook (1939): 1/sqrt(f) = -2 log10(k/(3.7 D) + 2.51/(Re sqrt(f))) lies below the smooth law by
# 2 log10(1 + a k_s+), k_s+ = (k/D) Re sqrt(f/8): the same function of k_s+ by another route
def test_colebrook_friction_implies_the_same_function():
    reynolds, relative = np.geomspace(1e5, 1e8, 7), 1e-3
    f = friction.colebrook(reynolds, relative)
    smooth = -2 * np.log10(2.51 / (reynolds * np.sqrt(f)))
    fall = smooth - 1 / np.sqrt(f)  # of 1/sqrt(f); u_b+ = sqrt(8/f)
    ks_plus = relative * reynolds * np.sqrt(f / 8)
    kappa = np.log(10) / (2 * np.sqrt(8))  # slope of Colebrook's logarithm in wall units
    a = np.sqrt(8) / (3.7 * 2.51)
    B = 8.5 + np.log(a) / kappa
    assert np.sqrt(8) * fall == pytest.approx(roughness.grigson(ks_plus, kappa, B), rel=1e-10)


def test_intercept_of_sand_is_8_5_when_fully_rough():
    ks = np.array([100.0, 1e4])
    for shift in (roughness.ligrani_moffat, roughness.fully_rough):
        assert roughness.intercept(ks, shift(ks)) == pytest.approx([8.5, 8.5], rel=1e-14)


def test_fully_rough_warns_below_90():
    with pytest.warns(RangeWarning, match="90"):
        roughness.fully_rough(50.0)


# Limits of the fit of Nikuradse's sand: 2.25 and 90
def test_regimes():
    names = roughness.regime([0.0, 2.25, 2.26, 89.9, 90.0])
    assert names.tolist() == ["smooth", "smooth", "transitional", "transitional", "fully rough"]
    assert roughness.regime(3.0) == "transitional"


# --- heights --------------------------------------------------------------------------------------


# exp(8.5 kappa), mpmath
@pytest.mark.parametrize("row", rows("roughness_z0_ratio.csv"))
def test_aerodynamic_roughness(row):
    kappa = float(row["kappa"])
    assert roughness.from_aerodynamic(1.0, kappa) == pytest.approx(
        float(row["ks_over_z0"]), rel=1e-15
    )
    assert roughness.aerodynamic_roughness(1.0, kappa) == pytest.approx(
        float(row["z0_over_ks"]), rel=1e-15
    )


B_9793 = float(mpmath.log("9.793") / mpmath.mpf("0.4187"))


# Blocken, Stathopoulos & Carmeliet (2007): k_s = 9.793 z0/C_s; for z0 = 0.03 m and C_s = 0.5 the
# height is 0.58758 m, with C_s = 1 it is 0.29379 m
@pytest.mark.parametrize(("C_s", "height"), [(0.5, 0.58758), (1.0, 0.29379)])
def test_height_of_a_wall_function(C_s, height):
    assert roughness.wall_function_height(0.03, C_s, 0.4187, B_9793) == pytest.approx(
        height, rel=1e-12
    )


# C_s that reproduces Nikuradse's intercept 8.5, mpmath: 0.2787939905 for (0.4187, E 9.793) and
# 0.2758838 for (0.41, E 9); C_s = 0.5 acts like a sand grain 1.79 times the height
def test_constant_that_reproduces_nikuradse():
    assert roughness.nikuradse_constant(0.4187, B_9793) == pytest.approx(0.2787939905, abs=5e-11)
    B = float(mpmath.log(9) / mpmath.mpf("0.41"))
    assert roughness.nikuradse_constant(0.41, B) == pytest.approx(0.2758838, abs=5e-8)
    assert roughness.equivalent_roughness(1.0, 0.5, 0.4187, B_9793) == pytest.approx(1.79, abs=5e-3)
    assert roughness.equivalent_roughness(
        2.0, roughness.nikuradse_constant(0.4187, B_9793), 0.4187, B_9793
    ) == pytest.approx(2.0, rel=1e-15)


# Flack & Schultz (2010), hand evaluation: 0.1 mm, skewness 0.5 -> 0.7721 mm
def test_sand_grain_from_statistics():
    assert roughness.flack_schultz(1e-4, 0.5) == pytest.approx(7.721e-4, abs=5e-8)
    assert roughness.flack_schultz(1e-4, 0.0) == pytest.approx(4.43e-4, rel=1e-15)


@SETTINGS
@given(st.floats(1e-6, 1e2), st.floats(0.3, 0.5), st.floats(3.0, 8.0), st.floats(0.1, 1.0))
def test_heights_agree_in_the_fully_rough_limit(z0, kappa, B, C_s):
    k = roughness.wall_function_height(z0, C_s, kappa, B)
    grain = roughness.equivalent_roughness(k, C_s, kappa, B)
    assert grain == pytest.approx(roughness.from_aerodynamic(z0, kappa), rel=1e-13)
    assert roughness.aerodynamic_roughness(grain, kappa) == pytest.approx(z0, rel=1e-13)


# --- wall values ----------------------------------------------------------------------------------


@pytest.mark.parametrize(
    "row", [r for r in WALLS if " " not in r["quantity"]], ids=lambda r: r["quantity"]
)
def test_wall_values(row):
    ks = float(row["roughness_plus"])
    function = getattr(roughness, row["quantity"])
    value = function(ks, 1e-3) if row["quantity"] == "knopp_omega_wall" else function(ks)
    assert value == pytest.approx(float(row["value"]), rel=3e-9)


# Wilcox 2006 boundary-layer program: K = 100, 60, 70, 50; far above 5 only K/k_s+ is left
@pytest.mark.parametrize(
    ("form", "K"),
    [("k_omega", 100), ("low_re_k_omega", 60), ("stress_omega", 70), ("low_re_stress_omega", 50)],
)
def test_forms_of_the_2006_rule(form, K):
    assert roughness.omega_wilcox_2006(200.0, form) == pytest.approx(K / 200, rel=1e-14)
    below, above = roughness.omega_wilcox_2006([5.0, np.nextafter(5.0, 6.0)], form)
    assert below == pytest.approx(above, rel=1e-14)


def test_rules_meet_at_their_switches():
    assert roughness.omega_wilcox_1988(np.nextafter(25.0, 0)) == pytest.approx(4.0, rel=1e-14)
    assert roughness.omega_wilcox_1988(25.0) == 4.0
    assert roughness.omega_hellsten(np.nextafter(25.0, 0), 0.1) == pytest.approx(4.0, rel=1e-14)


# the smooth limit of Hellsten (2005): [50/(4.3 y+^0.85)]^2, at most 8 in the denominator
def test_hellsten_on_a_smooth_wall():
    assert roughness.omega_hellsten(0.0, 1.0) == pytest.approx((50 / 4.3) ** 2, rel=1e-15)
    assert roughness.omega_hellsten(0.0, 100.0) == pytest.approx((50 / 8) ** 2, rel=1e-15)
    assert roughness.omega_hellsten(50.0, 1.0) == roughness.omega_wilcox_1988(50.0)


# 40000 nu/k_s^2 is (200/k_s+)^2 u_tau^2/nu
def test_slightly_rough_wall_is_the_2006_rule():
    ks, nu, u_tau = 1e-4, 1.5e-5, 0.6
    value = roughness.omega_slightly_rough(ks, nu, u_tau)
    assert value == pytest.approx(
        roughness.omega_wilcox_2006(ks * u_tau / nu) * u_tau**2 / nu, rel=1e-14
    )
    with pytest.warns(RangeWarning, match="roughness_plus"):
        roughness.omega_slightly_rough(1e-3, nu, u_tau)


def test_knopp_falls_back_to_the_smooth_value():
    assert roughness.knopp_omega_wall(0.0, 0.5) == pytest.approx(60 / (0.075 * 0.25), rel=1e-15)


# 0.03 against exp(-8.5 kappa) = 0.03065 for kappa 0.41 (mpmath): the displaced law is fully rough
def test_spalart_allmaras_displacement_is_nearly_the_aerodynamic_roughness():
    assert roughness.spalart_allmaras_displacement(1.0) == 0.03
    assert roughness.aerodynamic_roughness(1.0) == pytest.approx(0.03065, abs=5e-6)


# all but the name of the regime and the two that warn out of range, tested above
NUMBERS = sorted(set(roughness.__all__) - {"regime", "fully_rough", "omega_slightly_rough"})


@pytest.mark.parametrize("name", NUMBERS)
def test_extremes_give_neither_nan_nor_infinity(name):
    function = getattr(roughness, name)
    count = sum(
        p.default is inspect.Parameter.empty
        for p in inspect.signature(function).parameters.values()
    )
    for value in (1e-30, 1e-10, 1.0, 1e10, 1e30):
        assert np.isfinite(function(*[value] * count))


@pytest.mark.parametrize(
    ("call", "text"),
    [
        (lambda: roughness.grigson(-1.0), "roughness_plus"),
        (lambda: roughness.grigson(1.0, 0.0), "kappa"),
        (lambda: roughness.grigson(1.0, 0.41, float("nan")), "B"),
        (lambda: roughness.wall_function_shift(1.0, 0.0), "C_s"),
        (lambda: roughness.flack_schultz(1e-4, -1.0), "skewness"),
        (lambda: roughness.omega_wilcox_1988(0.0), "roughness_plus"),
        (lambda: roughness.omega_wilcox_2006(1.0, "komega"), "did you mean 'k_omega'"),
        (lambda: roughness.from_aerodynamic(-1.0), "aerodynamic_roughness"),
    ],
)
def test_refusals(call, text):
    with pytest.raises(InputError, match=text):
        call()
