"""Flat plate: 17-digit tables, 50-digit roots, force readings and simulations, identities."""

from __future__ import annotations

import csv
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from walllaw import plate
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)
LOCAL = {
    "blasius_laminar": plate.laminar,
    "power_1_5": plate.power_1_5,
    "power_1_7": plate.power_1_7,
    "white_log": plate.white,
    "schlichting_local": plate.schlichting,
    "schultz_grunow": plate.schultz_grunow,
    "karman_local": plate.karman,
}
MEAN = {
    "blasius_laminar": plate.laminar_mean,
    "power_1_5": plate.power_1_5_mean,
    "prandtl_schlichting": plate.prandtl_schlichting_mean,
    "schoenherr": plate.karman_schoenherr_mean,
    "white_log": plate.white_mean,
    "ittc_1957": plate.ittc_1957_mean,
}
THETA = {
    "karman_schoenherr": plate.karman_schoenherr_theta,
    "power_1_6": plate.power_1_6_theta,
    "nagib_2007_0384_4127": plate.nagib_theta,
    "osterlund_2000_038_408": plate.osterlund_theta,
}
BY_X = [
    *LOCAL.values(),
    plate.power_1_7_2011,
    plate.karman_schoenherr,
    *MEAN.values(),
    plate.power_1_7_mean,
    plate.thickness_laminar,
    plate.thickness_turbulent,
]
LOGARITHMIC = [
    plate.white,
    plate.schlichting,
    plate.schultz_grunow,
    plate.karman,
    plate.karman_schoenherr,
    plate.prandtl_schlichting_mean,
    plate.karman_schoenherr_mean,
    plate.white_mean,
    plate.ittc_1957_mean,
]


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


def columns(name: str, *fields: str) -> list[np.ndarray]:
    table = rows(name)
    return [np.array([float(row[field]) for row in table]) for field in fields]


def quiet(function, *arguments):
    """Evaluate outside the range of the source without its warning."""
    with record():
        return function(*arguments)


def ulp(value: float, reference) -> float:
    spacing = mpmath.mpf(float(np.spacing(abs(float(reference)))))
    return float(abs(mpmath.mpf(float(value)) - reference) / spacing)


# --- 17-digit tables (mpmath; equation numbers in the files' headers) -----------------------------


@pytest.mark.parametrize("column", LOCAL)
def test_local_values(column):
    re, expected = columns("plate_cf_local_values.csv", "re_x", column)
    np.testing.assert_allclose(quiet(LOCAL[column], re), expected, rtol=3e-15, atol=0)


@pytest.mark.parametrize("column", MEAN)
def test_mean_values(column):
    re, expected = columns("plate_cf_mean_values.csv", "re_l", column)
    np.testing.assert_allclose(quiet(MEAN[column], re), expected, rtol=3e-15, atol=0)


@pytest.mark.parametrize("column", THETA)
def test_theta_values(column):
    re, expected = columns("plate_cf_theta_values.csv", "re_theta", column)
    np.testing.assert_allclose(quiet(THETA[column], re), expected, rtol=3e-15, atol=0)


# Blasius solution by 60-term Taylor steps at 50 digits
@pytest.mark.parametrize("reynolds", [1e4, 2.5e5, 1e6])
def test_blasius_constants(reynolds):
    value = {row["quantity"]: float(row["value"]) for row in rows("blasius_constants.csv")}
    root = np.sqrt(reynolds)
    layer = plate.laminar_layer(reynolds)
    for mine, name in (
        (plate.laminar(reynolds) * root, "c_f sqrt(Re_x)"),
        (plate.laminar_mean(reynolds) * root, "C_F sqrt(Re_L) (mean)"),
        (layer.thickness * root, "eta at u/U = 0.99"),
        (layer.displacement_thickness * root, "delta_star/x sqrt(Re_x)"),
        (layer.momentum_thickness * root, "theta/x sqrt(Re_x)"),
        (layer.shape_factor, "shape factor H"),
    ):
        assert mine == pytest.approx(value[name], rel=1e-15)


def test_blasius_constants_against_an_integration():
    # f''' + f f''/2 = 0 by scipy at 1e-12, from the wall gradient
    from scipy.integrate import solve_ivp

    root = 1e3  # of Re_x = 1e6
    gradient = 0.5 * plate.laminar(1e6) * root
    run = solve_ivp(
        lambda _, s: [s[1], s[2], -0.5 * s[0] * s[2]],
        (0.0, 12.0),
        [0.0, 0.0, gradient],
        rtol=1e-12,
        atol=1e-13,
        dense_output=True,
    )
    f, slope, _ = run.y[:, -1]
    assert slope == pytest.approx(1.0, rel=1e-10)
    layer = plate.laminar_layer(1e6)
    assert run.sol(layer.thickness * root)[1] == pytest.approx(0.99, rel=1e-10)
    assert 12.0 - f == pytest.approx(layer.displacement_thickness * root, rel=1e-9)
    assert layer.momentum_thickness == pytest.approx(plate.laminar(1e6), rel=1e-15)


# 10 to 12 digits by mpmath at Re_x = 1e7 and Re_x = 1e6, 11 digits of the friction Reynolds numbers
def test_published_check_points():
    assert plate.power_1_7_2011(1e7) == pytest.approx(0.0027, rel=1e-15)
    assert plate.karman_schoenherr(1e7) == pytest.approx(0.002456642553, abs=5e-13)
    assert plate.turbulent_layer(1e6).thickness == pytest.approx(0.02334542175, abs=5e-12)
    assert plate.turbulent_layer_1_7(1e6).thickness == pytest.approx(0.02223192791, abs=5e-12)
    expected = [157.70966, 962.88092, 5878.7754]
    np.testing.assert_allclose(plate.re_tau([1e5, 1e6, 1e7]), expected, rtol=5e-8)
    expected = [382.01326, 2661.2057]
    np.testing.assert_allclose(quiet(plate.re_tau_theta, [1e3, 1e4]), expected, rtol=5e-8)


# --- exact roots and powers against 50 digits -----------------------------------------------------


@pytest.mark.parametrize(
    ("function", "slope", "intercept"),
    [
        (plate.karman, mpmath.mpf("4.15"), mpmath.mpf("1.7")),
        (plate.karman_schoenherr_mean, 1 / mpmath.mpf("0.242"), mpmath.mpf(0)),
    ],
)
def test_roots_are_exact_to_4_ulp(function, slope, intercept):
    rng = np.random.default_rng(40)
    re = np.concatenate([10.0 ** rng.uniform(3.0, 30.0, 600), 10.0 ** np.arange(3.0, 31.0)])
    c = 2 * slope / mpmath.log(10)  # x = slope log10(Re/x^2) + intercept
    for value, reynolds in zip(quiet(function, re).tolist(), re.tolist(), strict=True):
        z = mpmath.log(mpmath.mpf(reynolds)) / 2 + intercept / c - mpmath.log(c)
        assert ulp(value, 1 / (c * mpmath.lambertw(mpmath.exp(z)).real) ** 2) <= 4.0


@pytest.mark.parametrize(
    ("function", "factor", "degree"),
    [
        (plate.power_1_5, "0.0592", 5),
        (plate.power_1_7, "0.026", 7),
        (plate.power_1_6_theta, "0.012", 6),
    ],
)
def test_powers_are_exact_to_3_ulp(function, factor, degree):
    rng = np.random.default_rng(41)
    re = 10.0 ** rng.uniform(1.0, 30.0, 500)
    for value, reynolds in zip(quiet(function, re), re, strict=True):
        root = mpmath.root(mpmath.mpf(float(reynolds)), degree)
        assert ulp(value, mpmath.mpf(factor) / root) <= 3.0


# --- measurements and simulations -----------------------------------------------------------------


def test_schultz_grunow_readings():
    # floating-element readings of Schultz-Grunow 1940
    re, cf = columns("flatplate_schultz_grunow_1940.csv", "re_x", "cf")
    assert abs(plate.schultz_grunow(re) / cf - 1.0).max() < 0.015
    for function, mean in (
        (plate.karman_schoenherr, 0.007),
        (plate.white, 0.055),
        (plate.power_1_7_2011, 0.097),
    ):
        assert (function(re) / cf - 1.0).mean() == pytest.approx(mean, abs=5e-3)
    assert abs((quiet(plate.power_1_5, re) / cf - 1.0).mean()) < 0.03


def test_wieghardt_readings():
    # Wieghardt and Tillmann 1951, re-evaluated by Coles for the 1968 Stanford conference
    theta, shape_factor, cf, printed = columns(
        "flatplate_wieghardt_1944.csv", "re_theta", "H", "cf", "cf_ludwieg_tillmann"
    )
    late = theta > 1500.0
    assert abs(cf / plate.karman_schoenherr_theta(theta) - 1.0)[late].max() < 0.025
    # the friction law of Ludwieg and Tillmann as tabulated there, to 1e-5
    mine = quiet(plate.ludwieg_tillmann, theta, shape_factor)
    assert abs(mine - printed).max() < 1.2e-5


def test_simulated_layers():
    # Schlatter and Orlu 2010 (direct), Eitel-Amor et al. 2014 (large-eddy)
    theta, tau, cf = columns("flatplate_dns_schlatter.csv", "re_theta", "re_tau", "cf")
    assert abs(plate.karman_schoenherr_theta(theta) / cf - 1.0).max() < 0.06
    assert abs(plate.nagib_theta(theta[theta > 2000.0]) / cf[theta > 2000.0] - 1.0).max() < 0.02
    assert abs(plate.re_tau_theta(theta) / tau - 1.0).max() < 0.095


# --- identities -----------------------------------------------------------------------------------


@pytest.mark.parametrize(
    ("local", "mean", "rel"),
    [
        (plate.laminar, plate.laminar_mean, 1e-10),
        (plate.power_1_5, plate.power_1_5_mean, 1e-10),
        (plate.power_1_7, plate.power_1_7_mean, 1e-10),
        (plate.karman_schoenherr, plate.karman_schoenherr_mean, 1e-5),  # 0.8686 for 2/ln 10
    ],
)
@pytest.mark.parametrize("reynolds", [2e6, 3e7])
def test_local_value_is_the_slope_of_the_drag(local, mean, rel, reynolds):
    step = 1e-3 * reynolds
    points = reynolds + step * np.array([-2.0, -1.0, 1.0, 2.0])
    drag = points * quiet(mean, points)
    slope = (drag[0] - 8.0 * drag[1] + 8.0 * drag[2] - drag[3]) / (12.0 * step)
    assert quiet(local, reynolds) == pytest.approx(slope, rel=rel)


@given(st.floats(5.05, 6.6), st.floats(0.0, 3.0))
@SETTINGS
def test_transition_conserves_momentum(log_start, further):
    start = 10.0**log_start
    # nothing has happened at the transition; the drag up to it is the laminar drag
    just_behind = start * (1.0 + 1e-12)
    mean = quiet(plate.transitional_mean, [start, just_behind], start)
    np.testing.assert_allclose(
        mean,
        plate.laminar_mean(start) if start < 3e6 else quiet(plate.laminar_mean, start),
        rtol=1e-10,
    )
    # behind it the drag grows by the local friction: fourth-order difference
    reynolds = start * (1.2 + 10.0**further)
    step = 1e-3 * reynolds
    points = reynolds + step * np.array([-2.0, -1.0, 1.0, 2.0])
    drag = points * quiet(plate.transitional_mean, points, start)
    slope = (drag[0] - 8.0 * drag[1] + 8.0 * drag[2] - drag[3]) / (12.0 * step)
    assert quiet(plate.transitional, reynolds, start) == pytest.approx(slope, rel=2e-5)


@given(st.floats(6.0, 10.0), st.floats(5.0, 6.0))
@SETTINGS
def test_a_laminar_run_saves_drag(log_re, log_start):
    re, start = 1.001 * 10.0**log_re, 10.0**log_start
    mixed = quiet(plate.transitional_mean, re, start)
    assert quiet(plate.laminar_mean, re) < mixed < quiet(plate.karman_schoenherr_mean, re)
    schlichting = quiet(plate.prandtl_schlichting_mean, re, start)
    assert schlichting < quiet(plate.prandtl_schlichting_mean, re)


def test_prandtl_schlichting_with_transition():
    start = 5e5
    ends = quiet(plate.prandtl_schlichting_mean, [4e5, start, start * (1 + 1e-12)], start)
    np.testing.assert_allclose(ends, plate.laminar_mean([4e5, start, start]), rtol=1e-10)
    # A = Re_t (C_F,turbulent(Re_t) - C_F,laminar(Re_t))
    fully = plate.prandtl_schlichting_mean(1e7)
    turbulent = quiet(plate.prandtl_schlichting_mean, start)
    A = start * (turbulent - plate.laminar_mean(start))
    assert (fully - plate.prandtl_schlichting_mean(1e7, start)) * 1e7 == pytest.approx(A, rel=1e-12)


def test_layer_identities():
    for layer in (plate.turbulent_layer(1e6, 0.7), plate.turbulent_layer_1_7(1e6, 0.7)):
        # 1/7 profile: delta* = delta/8, theta = 7 delta/72, H = 9/7
        assert layer.shape_factor == pytest.approx(9.0 / 7.0, rel=1e-15)
        assert layer.displacement_thickness == pytest.approx(layer.thickness / 8.0, rel=1e-15)
    assert plate.laminar_layer(1e5, 2.0).thickness == 2.0 * plate.laminar_layer(1e5).thickness
    assert plate.thickness_laminar(1e5) == plate.laminar_layer(1e5).thickness
    assert plate.thickness_turbulent(1e6) == plate.turbulent_layer(1e6).thickness
    assert plate.laminar_layer(1e5, 0.0).thickness == 0.0


def test_one_seventh_profile():
    # displacement and momentum thickness of u = eta^(1/7) by quadrature
    from scipy.integrate import quad

    layer = plate.turbulent_layer(1e6)
    displacement = quad(lambda s: (1.0 - s) * 7.0 * s**6, 0.0, 1.0)[0]  # s = eta^(1/7)
    momentum = quad(lambda s: s * (1.0 - s) * 7.0 * s**6, 0.0, 1.0)[0]
    assert layer.displacement_thickness == pytest.approx(displacement * layer.thickness, rel=1e-12)
    assert layer.momentum_thickness == pytest.approx(momentum * layer.thickness, rel=1e-12)


@pytest.mark.parametrize("function", BY_X, ids=lambda f: f.__name__)
@given(log_re=st.floats(3.5, 10.0), step=st.floats(1e-6, 2.0))
@SETTINGS
def test_friction_and_thickness_fall_with_the_reynolds_number(function, log_re, step):
    first, second = quiet(function, 10.0 ** np.array([log_re, log_re + step]))
    assert second < first


@pytest.mark.parametrize("function", THETA.values(), ids=lambda f: f.__name__)
@given(log_re=st.floats(2.0, 6.0), step=st.floats(1e-6, 2.0))
@SETTINGS
def test_friction_falls_with_re_theta(function, log_re, step):
    first, second = quiet(function, 10.0 ** np.array([log_re, log_re + step]))
    assert second < first


# --- shapes, refusals, warnings -------------------------------------------------------------------


@pytest.mark.parametrize("function", [*BY_X, plate.re_tau], ids=lambda f: f.__name__)
def test_shapes_and_one_evaluation_path(function):
    re = 10.0 ** np.random.default_rng(42).uniform(5.8, 6.4, 200)
    many = quiet(function, re)
    assert [quiet(function, r) for r in re.tolist()] == many.tolist()
    assert isinstance(quiet(function, 1e6), float)
    assert quiet(function, re.reshape(20, 10)).shape == (20, 10)
    assert quiet(function, np.empty((0, 3))).shape == (0, 3)


@pytest.mark.parametrize("function", [plate.transitional, plate.transitional_mean])
def test_transition_broadcasts(function):
    assert function([[1e6], [1e7]], [3e5, 5e5, 1e6]).shape == (2, 3)
    assert plate.prandtl_schlichting_mean([[1e6], [1e7]], [3e5, 5e5, 1e6]).shape == (2, 3)
    assert plate.ludwieg_tillmann([[1e4], [2e4]], [1.3, 1.4]).shape == (2, 2)
    assert plate.laminar_layer([[1e4], [2e4]], [1.3, 1.4]).thickness.shape == (2, 2)


@pytest.mark.parametrize("function", [*BY_X, plate.re_tau], ids=lambda f: f.__name__)
@pytest.mark.parametrize("bad", [0.0, -1.0, np.nan, np.inf, [1e6, -1.0]])
def test_impossible_reynolds_numbers_are_refused(function, bad):
    with pytest.raises(InputError, match="reynolds"):
        function(bad)


@pytest.mark.parametrize("function", LOGARITHMIC, ids=lambda f: f.__name__)
def test_logarithmic_laws_are_refused_near_their_poles(function):
    with pytest.raises(InputError, match="reynolds"):
        function(999.0)
    assert np.isfinite(quiet(function, [1e3, 1e300])).all()


@pytest.mark.parametrize("function", [*THETA.values(), plate.re_tau_theta])
@pytest.mark.parametrize("bad", [0.0, 9.0, np.nan])
def test_impossible_re_theta_is_refused(function, bad):
    with pytest.raises(InputError, match="re_theta"):
        function(bad)


def test_other_impossible_input_is_refused():
    for function in (plate.transitional, plate.transitional_mean):
        with pytest.raises(InputError, match="transition_reynolds"):
            function(1e6, 9e3)
    with pytest.raises(InputError, match="transition_reynolds"):
        plate.prandtl_schlichting_mean(1e6, -5e5)
    with pytest.raises(InputError, match="shape_factor"):
        plate.ludwieg_tillmann(1e4, 0.9)
    with pytest.raises(InputError, match="distance"):
        plate.turbulent_layer(1e6, -1.0)


@pytest.mark.parametrize(
    ("function", "outside"),
    [
        (plate.laminar, 3.1e6), (plate.laminar_mean, 3.1e6), (plate.power_1_5, 1.1e7),
        (plate.power_1_5_mean, 1.1e7), (plate.power_1_7, 9e4), (plate.power_1_7_mean, 9e4),
        (plate.power_1_7_2011, 9e4), (plate.white, 1.1e9), (plate.white_mean, 1.1e9),
        (plate.schlichting, 4e5), (plate.schultz_grunow, 9e5), (plate.karman, 9e4),
        (plate.karman_schoenherr, 9e5), (plate.karman_schoenherr_mean, 9e5),
        (plate.prandtl_schlichting_mean, 4e5), (plate.ittc_1957_mean, 9e5),
        (plate.karman_schoenherr_theta, 190.0), (plate.power_1_6_theta, 900.0),
        (plate.osterlund_theta, 2e3), (plate.nagib_theta, 1e3), (plate.re_tau_theta, 9e3),
        (plate.thickness_laminar, 900.0), (plate.thickness_turbulent, 4e5), (plate.re_tau, 2e9),
        (plate.turbulent_layer_1_7, 2e9),
        (lambda re: plate.transitional(re, 9e4), 1e6),
        (lambda re: plate.transitional_mean(re, 9e4), 1e6),
        (lambda h: plate.ludwieg_tillmann(1e4, h), 2.1),
    ],
)  # fmt: skip
def test_outside_the_range_of_the_source_warns(function, outside):
    with pytest.warns(RangeWarning):
        function(outside)
