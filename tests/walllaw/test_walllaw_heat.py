"""Temperature laws, turbulent Prandtl numbers, Nusselt numbers: tables, quadrature, limits."""

from __future__ import annotations

import csv
from itertools import pairwise
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.integrate import quad
from scipy.optimize import brentq
from scipy.special import hyp1f1

from walllaw import heat
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


# --- temperature laws -----------------------------------------------------------------------------


# Kader (1981) near the wall, 17 digits by mpmath
@pytest.mark.parametrize(
    "row", rows("thermal_kader_values.csv"), ids=lambda r: f"{r['pr']}-{r['y_plus']}"
)
def test_kader(row):
    value = heat.kader(float(row["y_plus"]), float(row["pr"]))
    # the law's two terms cancel to a few digits less at Pr = 0.025, where beta is negative
    assert value == pytest.approx(float(row["t_plus"]), rel=1e-14)


# beta of Kader (1981) = (3.85 Pr^(1/3) - 1.3)^2 + 2.12 ln Pr, printed to 6 decimals; far out
# T+ = 2.12 ln(1 + y+) + beta
@pytest.mark.parametrize(
    ("prandtl", "beta"), [(0.025, -7.790060), (0.71, 3.830573), (1, 6.502500), (7, 40.906947)]
)
def test_kader_far_out(prandtl, beta):
    y = 1e9
    assert heat.kader(y, prandtl) - 2.12 * np.log1p(y) == pytest.approx(beta, abs=2e-6)


# h of Kader (1981): 1.5 (2 - e)/(1 + 2(1 - e)^2), 2.5 (2 - e)/(1 + 4(1 - e)^2); 1 at the wall,
# 1.5 and 2.5 at e = 1
@pytest.mark.parametrize(("flow", "outer"), [("duct", 1.5), ("boundary-layer", 2.5)])
def test_outer_factor_of_kader(flow, outer):
    wall = heat.kader(1e4, 0.71)
    assert heat.kader(1e4, 0.71, relative_distance=0.0, flow=flow) == pytest.approx(wall, rel=1e-15)
    edge = heat.kader(1e4, 0.71, relative_distance=1.0, flow=flow)
    assert edge - wall == pytest.approx(2.12 * np.log(outer), rel=1e-9)


# at Pr = 100, y+ = 1 Kader's fit is 83.80, 16 % below Pr y+ (mpmath)
def test_kader_conduction_layer():
    assert heat.kader(1.0, 100.0) == pytest.approx(83.80, abs=5e-3)
    assert heat.kader(1e-3, 0.71) == pytest.approx(0.71e-3, rel=1e-12)
    assert heat.kader(0.0, 0.71) == 0.0


# Jayatilleke (1969): P and the upper root of the crossing, 17 digits by mpmath
@pytest.mark.parametrize("row", rows("thermal_jayatilleke_values.csv"), ids=lambda r: r["pr"])
def test_jayatilleke(row):
    pr, prt, kappa = float(row["pr"]), float(row["prt"]), float(row["kappa"])
    B = float(mpmath.log(mpmath.mpf(row["E"])) / mpmath.mpf(row["kappa"]))
    assert heat.jayatilleke_resistance(pr, prt) == pytest.approx(float(row["P"]), rel=4e-15)
    crossing = heat.thermal_intersection(pr, prt, kappa, B)
    assert crossing == pytest.approx(float(row["y_plus_thermal"]), rel=4e-15)


# Pr_t 0.85, (0.4187, E 9.793), mpmath, printed to 12 digits: P, T+(100), crossing; and Kader's
# T+(100) over it: 1.070, 0.969, 0.919
@pytest.mark.parametrize(
    ("prandtl", "P", "t_plus", "crossing", "ratio"),
    [
        (0.71, -1.49146084477, 12.7131809619, 11.79391812, 1.070),
        (7.0, 45.1096645749, 52.3241375686, 6.690543016, 0.969),
        (100.0, 360.257108476, 320.199464885, 3.131680333, 0.919),
    ],
)
def test_jayatilleke_law(prandtl, P, t_plus, crossing, ratio):
    law = {"kappa": 0.4187, "B": float(mpmath.log("9.793") / mpmath.mpf("0.4187"))}
    assert heat.jayatilleke_resistance(prandtl) == pytest.approx(P, rel=1e-11)
    assert heat.thermal_intersection(prandtl, **law) == pytest.approx(crossing, rel=1e-9)
    value = heat.jayatilleke(100.0, prandtl, **law)
    assert value == pytest.approx(t_plus, rel=1e-11)
    assert heat.kader(100.0, prandtl) / value == pytest.approx(ratio, abs=5e-4)


# scipy.optimize.brentq on Pr y - Pr_t (ln(y)/kappa + B + P), from its minimum upward
@pytest.mark.parametrize("prandtl", [0.1, 0.71, 3.0, 50.0, 2000.0])
def test_thermal_intersection_against_a_bracketing_solver(prandtl):
    P = heat.jayatilleke_resistance(prandtl, 0.9)

    def gap(y):
        return prandtl * y - 0.9 * (np.log(y) / 0.41 + 5.0 + P)

    low = 0.9 / 0.41 / prandtl
    root = brentq(gap, low, 1e6, xtol=1e-13, rtol=1e-14)
    assert heat.thermal_intersection(prandtl, 0.9, 0.41, 5.0) == pytest.approx(root, rel=1e-11)


@SETTINGS
@given(st.floats(0.2, 1e4), st.floats(0.7, 1.2))
def test_jayatilleke_is_continuous_at_its_crossing(prandtl, prt):
    y = heat.thermal_intersection(prandtl, prt)
    below, above = heat.jayatilleke(
        [y * (1 - 1e-13), y * (1 + 1e-13)], prandtl, turbulent_prandtl=prt
    )
    assert above == pytest.approx(below, rel=1e-10)
    assert below == pytest.approx(prandtl * y, rel=1e-12)


# for Pr = Pr_t = 1 temperature and velocity are one law: u+ = ln(y+)/0.41 + 5 at 100
def test_two_layer_analogy_is_the_velocity_law_at_prandtl_1():
    assert heat.two_layer(100.0, 1.0, turbulent_prandtl=1.0) == pytest.approx(
        np.log(100) / 0.41 + 5, rel=1e-14
    )
    assert heat.two_layer(5.0, 3.0) == 15.0


@pytest.mark.parametrize("law", [heat.kader, heat.jayatilleke, heat.two_layer])
def test_temperature_laws_rise(law):
    y = np.geomspace(1e-3, 1e6, 4001)
    for prandtl in (0.71, 7.0, 100.0):
        assert (np.diff(law(y, prandtl)) > 0).all()


# --- integral of the mixing length ----------------------------------------------------------------


# van Driest velocity profile, kappa 0.41, A+ 26, by quadrature (mpmath), printed to 12 digits:
# the temperature law at Pr = Pr_t = 1
@pytest.mark.parametrize(
    ("y_plus", "u_plus"),
    [
        (1, 0.999951842904),
        (5, 4.88298776233),
        (10, 8.42167641913),
        (30, 13.1863319828),
        (100, 16.527843221),
        (1000, 22.1282379517),
    ],
)
def test_integral_is_the_velocity_law_at_prandtl_1(y_plus, u_plus):
    value = heat.integrated(y_plus, 1.0, turbulent_prandtl=1.0)
    assert value == pytest.approx(u_plus, rel=1e-11)


def by_quadrature(y_plus, prandtl, turbulent_prandtl):
    """scipy.integrate.quad in ln y+, piece by piece."""

    def integrand(log_y):
        y = np.exp(log_y)
        length = 0.41 * y * -np.expm1(-y / 26.0)
        ratio = 2 * length**2 / (1 + np.sqrt(1 + 4 * length**2))
        if callable(turbulent_prandtl):
            prt = turbulent_prandtl(max(ratio, 1e-30), prandtl)
        else:
            prt = turbulent_prandtl
        return y / (1 / prandtl + ratio / prt)

    edges = np.append(np.arange(np.log(y_plus) - 34, np.log(y_plus) - 0.5, 1.0), np.log(y_plus))
    total = sum(quad(integrand, a, b, epsabs=0, epsrel=1e-13)[0] for a, b in pairwise(edges))
    return total + prandtl * np.exp(edges[0])


@pytest.mark.parametrize("turbulent_prandtl", [0.85, heat.kays_crawford, heat.kays])
@pytest.mark.parametrize(("y_plus", "prandtl"), [(30, 0.025), (100, 0.71), (1e4, 7), (300, 1000)])
def test_integral_against_adaptive_quadrature(y_plus, prandtl, turbulent_prandtl):
    value = heat.integrated(y_plus, prandtl, turbulent_prandtl=turbulent_prandtl)
    assert value == pytest.approx(by_quadrature(y_plus, prandtl, turbulent_prandtl), rel=1e-11)


# adaptive quadrature with 40 digits (mpmath) over the whole range the docstring states
@pytest.mark.parametrize(
    ("y_plus", "prandtl"), [(1e-3, 0.7), (11.0, 1e4), (1e4, 1e-3), (1e8, 100.0)]
)
def test_integral_against_40_digits(y_plus, prandtl):
    with mpmath.workdps(40):
        kappa, A, prt = mpmath.mpf(0.41), mpmath.mpf(26), mpmath.mpf(0.85)

        def integrand(log_y):
            y = mpmath.exp(log_y)
            square = (kappa * y * mpmath.expm1(-y / A)) ** 2
            ratio = 2 * square / (1 + mpmath.sqrt(1 + 4 * square))
            return y / (1 / mpmath.mpf(prandtl) + ratio / prt)

        top = mpmath.log(y_plus)
        edges = [top - 46 + 2 * i for i in range(24)]
        exact = mpmath.quad(integrand, edges) + prandtl * mpmath.exp(edges[0])
    assert heat.integrated(y_plus, prandtl) == pytest.approx(float(exact), rel=5e-15)


@SETTINGS
@given(st.floats(1e-3, 1e6), st.floats(0.01, 1000))
def test_integral_is_bounded_by_conduction_and_rises(y_plus, prandtl):
    low, high = heat.integrated([y_plus, 1.01 * y_plus], prandtl)
    assert 0 < low < high
    assert low <= prandtl * y_plus * (1 + 1e-14)


def test_integral_of_nothing_is_nothing():
    assert heat.integrated(0.0, 0.7) == 0.0
    assert heat.integrated(0.0, 0.7, turbulent_prandtl=heat.kays) == 0.0


# Kader's measured-data fit and the integral agree to about 10 %, as the fit itself claims for air
def test_integral_is_near_kader_in_air():
    y = np.array([30.0, 100.0, 300.0, 1000.0])
    assert heat.integrated(y, 0.71) == pytest.approx(heat.kader(y, 0.71), rel=0.10)


# --- conduction layer -----------------------------------------------------------------------------


# y+ at which Kader's law is 1 % (5 %) below Pr y+: Pr 7: 0.89560 (1.5418); 100: 0.36902 (0.63535);
# 1000: 0.17128 (0.29490) (mpmath)
@pytest.mark.parametrize(
    ("prandtl", "one", "five"),
    [(7, 0.89560, 1.5418), (100, 0.36902, 0.63535), (1000, 0.17128, 0.29490)],
)
def test_conduction_layer(prandtl, one, five):
    assert heat.conduction_layer(prandtl) == pytest.approx(one, rel=2e-3)
    assert heat.conduction_layer(prandtl, 0.05) == pytest.approx(five, rel=2e-3)
    assert heat.kader(one, prandtl) / (prandtl * one) == pytest.approx(0.99, abs=1e-5)
    assert heat.kader(five, prandtl) / (prandtl * five) == pytest.approx(0.95, abs=2e-5)


def test_conduction_layer_warns_below_prandtl_7():
    with pytest.warns(RangeWarning, match="prandtl"):
        heat.conduction_layer(0.7)


# --- turbulent Prandtl number ---------------------------------------------------------------------


# Kays & Crawford (1993) with P = 0.85, C = 0.3: Pe 0.1, 1, 10, 100; limits 1.7 and 0.85
@pytest.mark.parametrize(
    ("peclet", "value"), [(0.1, 1.613229), (1, 1.210577), (10, 0.899645), (100, 0.855107)]
)
def test_kays_crawford(peclet, value):
    assert heat.kays_crawford(peclet, 1.0) == pytest.approx(value, abs=5e-7)
    assert heat.kays_crawford(peclet / 0.7, 0.7) == pytest.approx(value, abs=5e-7)


# the air form 1/(0.5882 + 0.228 x - 0.0441 x^2 [1 - exp(-5.165/x)]) of the same book, Pr = 0.70;
# the slack is half a unit of the last digit of its three coefficients
def test_kays_crawford_air_form():
    x = np.array([0.1, 0.5, 1.0, 3.0])
    fade = 1 - np.exp(-5.165 / x)
    air = 0.5882 + 0.228 * x - 0.0441 * x**2 * fade
    slack = 5e-5 + 5e-4 * x + 5e-5 * x**2 * fade
    assert (np.abs(1 / heat.kays_crawford(x, 0.70) - air) < slack).all()


def test_kays_crawford_is_the_printed_form_at_50_digits():
    P, C = mpmath.mpf(0.85), mpmath.mpf("0.3")
    for peclet in np.geomspace(1e-10, 1e15, 400).tolist():
        pe = mpmath.mpf(peclet)
        root = mpmath.sqrt(P)
        inverse = 1 / (2 * P) + C * pe / root
        inverse -= (C * pe) ** 2 * (1 - mpmath.exp(-1 / (C * pe * root)))
        exact = 1 / inverse
        error = abs(mpmath.mpf(heat.kays_crawford(peclet, 1.0)) / exact - 1)
        assert error < 6e-16


def test_kays_crawford_limits():
    assert heat.kays_crawford([0.0, 1e-30, 1e30], 1.0) == pytest.approx([1.7, 1.7, 0.85], rel=1e-15)


# hand evaluations of the formulas: 1e5^0.888 = 27542.287
def test_section_means():
    assert heat.jischa_rieke(1e5, 0.025) == pytest.approx(
        0.9 + 182.4 / (0.025 * 27542.287), rel=1e-8
    )
    far = heat.weigand(1e30, 0.025, 1e5)
    assert far == pytest.approx(0.85 + 100 / (0.025 * 27542.287), rel=1e-8)
    assert heat.reynolds_mean(1e4, 1.0) == pytest.approx(2 * (1 / 2.2 - 0.15), rel=1e-15)
    assert heat.kays(10.0, 0.7) == pytest.approx(0.95, rel=1e-15)
    assert heat.kays(10.0, 0.02, liquid_metal=True) == pytest.approx(10.85, rel=1e-15)


# --- first cell -----------------------------------------------------------------------------------


@SETTINGS
@given(st.floats(250, 600), st.floats(250, 600), st.floats(1e-3, 10), st.floats(0.5, 500))
def test_flux_and_wall_temperature_are_inverse(wall, fluid, u_tau, t_plus):
    flux = heat.wall_heat_flux(wall, fluid, u_tau, 1.2, 1005.0, t_plus)
    assert heat.wall_temperature(flux, fluid, u_tau, 1.2, 1005.0, t_plus) == pytest.approx(wall)
    coefficient = heat.heat_transfer_coefficient(u_tau, 1.2, 1005.0, t_plus)
    assert flux == pytest.approx(coefficient * (wall - fluid), rel=1e-12)


# conduction: in the sublayer T+ = Pr y+ makes the flux lambda (T_w - T)/y
def test_sublayer_flux_is_fourier():
    rho, cp, nu, pr, y, u_tau = 1.2, 1005.0, 1.5e-5, 0.71, 1e-5, 0.3
    conductivity = rho * cp * nu / pr
    t_plus = pr * y * u_tau / nu
    flux = heat.wall_heat_flux(310.0, 300.0, u_tau, rho, cp, t_plus)
    assert flux == pytest.approx(conductivity * 10.0 / y, rel=1e-14)


# --- Nusselt numbers ------------------------------------------------------------------------------


# 17 digits by mpmath; rows at Re = 5e3 lie below the range of all but Gnielinski's law
@pytest.mark.parametrize(
    "row", rows("nusselt_pipe_values.csv"), ids=lambda r: f"{r['re']}-{r['pr']}"
)
def test_pipe(row):
    re, pr = float(row["re"]), float(row["pr"])
    with record():
        values = {
            "f_petukhov": heat.petukhov_friction(re),
            "gnielinski_1976": heat.gnielinski(re, pr),
            "petukhov_1970": heat.petukhov(re, pr),
            "dittus_boelter": heat.dittus_boelter(re, pr),
            "colburn": heat.colburn(re, pr),
        }
    for name, value in values.items():
        assert value == pytest.approx(float(row[name]), rel=3e-15), name


# Shah & London (1978); 30 digits by mpmath
@pytest.mark.parametrize(
    ("geometry", "wall", "words"),
    [
        ("pipe", "temperature", "circular pipe uniform wall temperature"),
        ("pipe", "heat_flux", "circular pipe uniform heat flux"),
        ("plates", "temperature", "parallel plates both walls uniform temperature"),
        ("plates", "heat_flux", "parallel plates both walls uniform heat flux"),
    ],
)
def test_laminar(geometry, wall, words):
    table = {
        row["geometry"]: row
        for row in rows("laminar_duct_constants.csv")
        if row["quantity"] == "Nu"
    }
    assert heat.laminar(geometry, wall) == pytest.approx(float(table[words]["value"]), rel=1e-15)


# The Graetz problem: Nu at uniform wall temperature is lambda_0^2/2 with the first zero of
# 1F1(1/2 - lambda/4, 1, lambda), here by scipy
def test_laminar_pipe_is_the_first_graetz_eigenvalue():
    root = brentq(lambda x: hyp1f1(0.5 - x / 4, 1.0, x), 2.0, 3.5, xtol=1e-14)
    assert heat.laminar("pipe", "temperature") == pytest.approx(root**2 / 2, rel=1e-12)


def test_friction_may_be_given():
    rough = heat.gnielinski(1e5, 0.7, darcy_friction=0.03)
    assert rough > heat.gnielinski(1e5, 0.7)
    f = heat.petukhov_friction(1e5)
    assert heat.gnielinski(1e5, 0.7, darcy_friction=f) == heat.gnielinski(1e5, 0.7)
    assert heat.petukhov(1e5, 0.7, darcy_friction=f) == heat.petukhov(1e5, 0.7)


# at Pr = 1 Petukhov's law is the Reynolds analogy over 1.07: St = f/8/1.07
def test_petukhov_at_prandtl_1():
    f = heat.petukhov_friction(1e5)
    assert heat.petukhov(1e5, 1.0) / 1e5 == pytest.approx(f / 8 / 1.07, rel=1e-15)
    assert heat.reynolds_analogy(f / 4) == pytest.approx(f / 8, rel=1e-15)


# Sieder & Tate (1936): 0.027 1e5^0.8 = 270 at Pr = 1; a wall half as viscous adds 2^0.14 = 1.1019
def test_sieder_tate():
    assert heat.sieder_tate(1e5, 1.0, 2.0) == pytest.approx(270 * 1.10190512, rel=1e-8)


def test_cooling_exponent():
    ratio = heat.dittus_boelter(1e5, 7.0, cooled=True) / heat.dittus_boelter(1e5, 7.0)
    assert ratio == pytest.approx(7**-0.1, rel=1e-14)


# The mean is the integral of the local law over ln x: Nu_mean = integral of Nu_x/x dx
@pytest.mark.parametrize("law", [heat.plate_laminar, heat.plate_turbulent])
def test_plate_mean_is_the_integral_of_the_local_law(law):
    with record():
        integral, _ = quad(lambda s: law(np.exp(s), 1.0), np.log(1e-12), np.log(1e6), limit=200)
        assert law(1e6, 1.0, mean=True) == pytest.approx(integral, rel=1e-7)


# textbook form (0.037 Re^0.8 - 871) Pr^(1/3) for transition at 5e5; 871 stands for 870.5 to 871.5
def test_plate_mixed():
    for re in (1e6, 1e7):
        nusselt = heat.plate_mixed(re, 0.71) / 0.71 ** (1 / 3)
        assert nusselt == pytest.approx(0.037 * re**0.8 - 871, abs=0.5)
    with record():
        assert heat.plate_mixed(5e5, 0.71) == pytest.approx(
            heat.plate_laminar(5e5, 0.71, mean=True), rel=1e-15
        )
        assert heat.plate_mixed(1e6, 0.71, transition_reynolds=0.0) == pytest.approx(
            heat.plate_turbulent(1e6, 0.71, mean=True), rel=1e-15
        )


# the analogy of Chilton & Colburn on White's c_f = 0.0592 Re^(-1/5) is the turbulent plate
def test_analogy_gives_the_turbulent_plate():
    re, pr = 1e6, 7.0
    stanton = heat.chilton_colburn(0.0592 * re**-0.2, pr)
    assert stanton * re * pr == pytest.approx(heat.plate_turbulent(re, pr), rel=1e-13)


@pytest.mark.parametrize(
    "call",
    [
        lambda: heat.dittus_boelter(5e3, 1.0),
        lambda: heat.colburn(1e5, 500.0),
        lambda: heat.gnielinski(2e3, 1.0),
        lambda: heat.petukhov(1e5, 0.2),
        lambda: heat.sieder_tate(1e3, 10.0),
        lambda: heat.kader(10.0, 1e5),
        lambda: heat.plate_laminar(1e6, 1.0),
        lambda: heat.plate_turbulent(1e5, 1.0),
        lambda: heat.chilton_colburn(0.004, 0.01),
    ],
)
def test_out_of_range_warns(call):
    with pytest.warns(RangeWarning):
        call()


@pytest.mark.parametrize(
    ("call", "text"),
    [
        (lambda: heat.kader(-1.0, 0.7), "y_plus"),
        (lambda: heat.kader(1.0, 0.7, flow="pipe"), "flow"),
        (lambda: heat.kader(1.0, 0.7, relative_distance=1.5), "relative_distance"),
        (lambda: heat.jayatilleke(1.0, 0.0), "prandtl"),
        (lambda: heat.thermal_intersection(0.71, 0.85, 0.41, -5.0), "cross"),
        (lambda: heat.two_layer(1.0, 1.0, B=-5.0), "B"),
        (lambda: heat.integrated(1.0, 0.7, turbulent_prandtl=0.0), "turbulent_prandtl"),
        (lambda: heat.conduction_layer(10.0, 0.02), "departure"),
        (lambda: heat.laminar("duct"), "geometry"),
        (lambda: heat.laminar("pipe", "flux"), "heat_flux"),
        (lambda: heat.gnielinski(500.0, 1.0), "reynolds"),
        (lambda: heat.plate_mixed(1e5, 1.0), "transition"),
        (lambda: heat.reynolds_mean(100.0, 1.0), "reynolds"),
        (lambda: heat.wall_temperature(1e3, 300.0, 0.0, 1.2, 1005.0, 10.0), "friction_velocity"),
    ],
)
def test_refusals(call, text):
    with pytest.raises(InputError, match=text):
        call()


def test_arrays_and_single_points_give_the_same_bits():
    y = np.geomspace(0.1, 1e4, 60)
    for law in (heat.kader, heat.jayatilleke, heat.two_layer, heat.integrated):
        assert law(y, 0.71).tolist() == [law(v, 0.71) for v in y]
