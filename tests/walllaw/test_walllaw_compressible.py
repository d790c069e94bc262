"""Compressible plate and profiles: reference curves, 50-digit forms, constructed profiles."""

from __future__ import annotations

import csv
from pathlib import Path

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from walllaw import compressible, plate
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

mpmath.mp.dps = 50
DATA = Path(__file__).parents[1] / "reference" / "data"
SETTINGS = settings(derandomize=True, deadline=None)


def rows(name: str) -> list[dict[str, float]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    table = csv.DictReader(line for line in lines if not line.startswith("#"))
    return [{k: v if k == "case" else float(v) for k, v in row.items()} for row in table]


def quiet(function, *arguments, **options):
    """Evaluate outside the range of the source without its warning."""
    with record():
        return function(*arguments, **options)


def ulp(value: float, reference) -> float:
    spacing = mpmath.mpf(float(np.spacing(abs(float(reference)))))
    return float(abs(mpmath.mpf(float(value)) - reference) / spacing)


# --- van Driest II ----------------------------------------------------------------------------


# NASA Turbulence Modeling Resource, high-Mach flat plate, reference curves: T_e = 300 K, r = 0.89
@pytest.mark.parametrize(
    "row",
    rows("plate_van_driest2.csv"),
    ids=lambda r: f"{r['mach']:g}-{r['tw_over_tinf']:g}-{r['re_theta']:g}",
)
def test_reference_curves(row):
    # at the hottest wall the transformed Re_theta falls to 167, below the 200 of the law's range
    value = quiet(
        compressible.van_driest_2_theta, row["re_theta"], row["mach"], row["tw_over_tinf"], 300.0
    )
    assert value == pytest.approx(row["cf"], rel=5e-7)


# F_c and F_theta to 10 decimals by 50-digit arithmetic on the printed arcsine form; c_f at
# Re_theta = 1e4 to 9 digits
@pytest.mark.parametrize(
    ("mach", "wall", "friction", "momentum", "cf"),
    [
        (2.0, 1.712, 1.4493975097, 0.6787683711, 1.95452813e-3),
        (5.0, 1.09, 1.7332522916, 0.9365515343, 1.53795483e-3),
        (5.0, 2.725, 2.4622199793, 0.5026249729, 1.21987882e-3),
        (5.0, 5.45, 3.4965838789, 0.3342665093, 9.32721803e-4),
    ],
)
def test_factors(mach, wall, friction, momentum, cf):
    f = compressible.van_driest_2_factors(mach, wall, 300.0)
    assert f.friction == pytest.approx(friction, abs=5e-11)
    assert f.momentum == pytest.approx(momentum, abs=5e-11)
    assert f.distance == pytest.approx(f.momentum / f.friction, rel=1e-15)
    value = compressible.van_driest_2_theta(1e4, mach, wall, 300.0)
    assert value == pytest.approx(cf, rel=3e-9)


def printed_friction_factor(m, t):
    """F_c with the two arcsines, at 120 digits."""
    with mpmath.workdps(120):
        m, t = mpmath.mpf(float(m)), mpmath.mpf(float(t))
        a, b = mpmath.sqrt(m / t), (1 + m) / t - 1
        root = mpmath.sqrt(b * b + 4 * a * a)
        return m / (mpmath.asin((2 * a * a - b) / root) + mpmath.asin(b / root)) ** 2


def test_friction_factor_equals_the_printed_form_to_6_ulp():
    rng = np.random.default_rng(60)
    mach = np.concatenate([rng.uniform(0.0, 20.0, 500), 10.0 ** rng.uniform(-8.0, 0.0, 500)])
    wall = 10.0 ** rng.uniform(-2.0, 2.0, 1000)
    with np.errstate(over="raise", divide="raise", invalid="raise"):
        factors = quiet(compressible.van_driest_2_factors, mach, wall, 300.0)
    m = 0.5 * 0.89 * (1.4 - 1.0) * (mach * mach)
    errors = [
        ulp(value, printed_friction_factor(heating, t))
        for value, heating, t in zip(factors.friction, m, wall, strict=True)
    ]
    assert max(errors) <= 6.0


@given(st.floats(0.05, 20.0))
@SETTINGS
def test_slow_flow_with_heat_transfer(wall):
    limit = (0.5 * (1.0 + np.sqrt(wall))) ** 2
    for mach in (0.0, 1e-200, 1e-9):
        value = quiet(compressible.van_driest_2_factors, mach, wall, 300.0).friction
        assert value == pytest.approx(limit, rel=1e-14)
    assert quiet(compressible.van_driest_2_factors, 0.0, 1.0, 300.0).friction == 1.0
    assert quiet(compressible.van_driest_2_factors, 0.0, 1.0, 300.0).momentum == 1.0


@given(st.floats(0.0, 8.0), st.floats(0.25, 1.0))
@SETTINGS
def test_friction_factor_against_quadrature(mach, share):
    # 1/sqrt(F_c) is the mean of sqrt(T_e/T) over the velocity; T by Crocco and Busemann
    from scipy.integrate import quad

    m = 0.5 * 0.89 * 0.4 * mach**2
    t = share * (1.0 + m)
    mean = quad(lambda z: (t + (1.0 + m - t) * z - m * z * z) ** -0.5, 0.0, 1.0, epsabs=0.0)[0]
    value = compressible.van_driest_2_factors(mach, t, 300.0).friction
    assert value == pytest.approx(mean**-2.0, rel=1e-9)


# Re_x = 1e7, T_e = 300 K, incompressible law of White; computed with S = 110.33 K, where the
# functions have 110.4 K: that is worth 2e-5 in c_f and 1e-4 in y
@pytest.mark.parametrize(
    ("mach", "wall", "reference", "eckert", "van_driest", "distance"),
    [
        (0.3, 1.0, 1.0035244, 2.5637789080e-3, 2.5645943072e-3, 1.001133),
        (2.0, 1.712, 1.5126400, 1.8981827344e-3, 1.9943666800e-3, 2.188283),
        (5.0, 5.45, 4.2040000, 9.0740021999e-4, 1.0838452903e-3, 10.753905),
        (5.0, 2.725, 2.8415000, 1.2010099941e-3, 1.3462949672e-3, 4.537628),
        (5.0, 1.09, 2.0240000, 1.5352151019e-3, 1.6303651475e-3, 1.399702),
    ],
)
def test_check_values_by_distance(mach, wall, reference, eckert, van_driest, distance):
    with record():
        star = compressible.reference_temperature_ratio(mach, wall)
        by_eckert = compressible.eckert(1e7, mach, wall, 300.0)
        cf = compressible.van_driest_2(1e7, mach, wall, 300.0)
        y = compressible.first_cell_centre(1.0, cf, 40.0, 1.5e-5, wall, 300.0)
    assert star == pytest.approx(reference, abs=5e-8)
    assert by_eckert == pytest.approx(eckert, rel=5e-5)
    assert cf == pytest.approx(van_driest, rel=5e-5)
    incompressible = 1.5e-5 / (40.0 * np.sqrt(0.5 * plate.white(1e7)))
    assert y / incompressible == pytest.approx(distance, rel=2e-4)


def test_no_compressibility_is_the_incompressible_law():
    assert compressible.van_driest_2(1e7, 0.0, 1.0, 300.0) == plate.white(1e7)
    assert compressible.eckert(1e7, 0.0, 1.0, 300.0) == plate.white(1e7)
    assert compressible.van_driest_2_theta(1e4, 0.0, 1.0, 300.0) == pytest.approx(
        plate.karman_schoenherr_theta(1e4), rel=1e-15
    )


@given(st.floats(0.0, 8.0), st.floats(0.1, 2.0))
@SETTINGS
def test_friction_falls_with_the_mach_number_on_adiabatic_walls(mach, step):
    pair = np.array([mach, mach + step])
    wall = compressible.adiabatic_wall_ratio(pair)
    first, second = quiet(compressible.van_driest_2, 1e7, pair, wall, 300.0)
    assert second < first


# --- recovery and viscosity ---------------------------------------------------------------------


def test_recovery():
    assert compressible.recovery_factor(0.71) == pytest.approx(0.71 ** (1 / 3), rel=1e-15)
    assert compressible.recovery_factor_laminar(0.64) == pytest.approx(0.8, rel=1e-15)
    assert compressible.adiabatic_wall_ratio(5.0) == pytest.approx(5.45, rel=1e-15)
    assert compressible.adiabatic_wall_ratio(2.0, 1.0) == pytest.approx(1.8, rel=1e-15)


@pytest.mark.parametrize("temperature", [200.0, 300.0, 600.0, 1000.0])
def test_sutherland_against_coolprop(temperature):
    # CoolProp's reference correlation of air at low density; Sutherland is good to 4 %
    from CoolProp.CoolProp import PropsSI

    exact = PropsSI("V", "T", temperature, "P", 1e3, "Air") / PropsSI(
        "V", "T", 300.0, "P", 1e3, "Air"
    )
    assert compressible.sutherland_ratio(temperature, 300.0) == pytest.approx(exact, rel=0.04)


@given(st.floats(100.0, 1900.0), st.floats(100.0, 1900.0), st.floats(100.0, 1900.0))
@SETTINGS
def test_sutherland_ratios_chain(first, second, third):
    ratio = compressible.sutherland_ratio
    assert ratio(first, second) * ratio(second, third) == pytest.approx(
        ratio(first, third), rel=4e-15
    )


# --- wall units and profiles ----------------------------------------------------------------------


# Trettel and Larsson 2016, direct simulations of a channel with power-law viscosity (exponent 0.75)
@pytest.mark.parametrize(
    "row", rows("channel_compressible_trettel_larsson.csv"), ids=lambda r: r["case"]
)
def test_semi_local_units_of_simulated_channels(row):
    t = row["centre_temperature_ratio"]
    star = compressible.semi_local_distance(row["re_tau"], 1.0 / t, t**0.75)
    # mean density and viscosity are taken at the mean temperature here: 0.02 to 0.17 %
    assert star[0] == pytest.approx(row["re_tau_star"], rel=2e-3)
    # c_f on wall density: the friction velocity is Ma_tau over Ma_bulk, printed to 4 digits
    assert 2.0 * (row["ma_tau"] / row["ma_bulk"]) ** 2 == pytest.approx(row["cf_wall"], rel=6e-4)


@given(st.integers(2, 60))
@SETTINGS
def test_constant_properties_leave_a_profile_alone(count):
    y = np.geomspace(0.3, 500.0, count)
    u = np.log1p(0.4 * y) / 0.4
    tau = 1.0 - y / 600.0
    for moved in (
        compressible.van_driest_velocity(u, 1.0),
        compressible.trettel_larsson_velocity(y, u, 1.0, 1.0),
        compressible.total_stress_velocity(y, u, 1.0, 1.0, tau),
    ):
        np.testing.assert_allclose(moved, u, rtol=1e-13)
    np.testing.assert_allclose(compressible.semi_local_distance(y, 1.0, 1.0), y, rtol=1e-15)


def temperature(y):
    """A smooth cooled-wall temperature over the wall's, and its slope."""
    return 1.0 + 0.8 * (1.0 - np.exp(-y / 30.0)), 0.8 / 30.0 * np.exp(-y / 30.0)


def constructed(count: int, kind: str):
    """A profile whose transformed velocity is log1p(0.4 y)/0.4 of its own distance, by scipy."""
    from scipy.integrate import solve_ivp

    def parts(y):
        t, slope = temperature(y)
        rho, mu = 1.0 / t, t**0.7
        star = y * np.sqrt(rho) / mu
        stretch = np.sqrt(rho) / mu * (1.0 - y * slope / t * 1.2)  # dy*/dy, y* = y t^-1.2
        return rho, mu, star, stretch

    def rise(y, _):
        rho, mu, star, stretch = parts(y)
        if kind == "van_driest":
            return [1.0 / (1.0 + 0.4 * y) / np.sqrt(rho)]
        wanted = 1.0 / (1.0 + 0.4 * star)  # dU/dy* of the transformed profile
        if kind == "trettel_larsson":
            return [wanted / mu]
        # tau = 1: S_t = S_eq/(1 + S_eq - S_TL), S_eq = g/(mu stretch), S_TL = mu g, g = dU+/dy+
        return [wanted / ((1.0 - wanted) / (mu * stretch) + wanted * mu)]

    y = np.concatenate([[0.0], np.geomspace(0.02, 200.0, count)])
    run = solve_ivp(rise, (0.0, 200.0), [0.0], t_eval=y, rtol=1e-11, atol=1e-12)
    rho, mu, star, _ = parts(y)
    return y, run.y[0], rho, mu, star


@pytest.mark.parametrize("kind", ["van_driest", "trettel_larsson", "total_stress"])
def test_constructed_profiles_come_back_with_second_order(kind):
    errors = []
    for count in (200, 400, 800):
        y, u, rho, mu, star = constructed(count, kind)
        if kind == "van_driest":
            moved, distance = compressible.van_driest_velocity(u, rho), y
        elif kind == "trettel_larsson":
            moved, distance = compressible.trettel_larsson_velocity(y, u, rho, mu), star
        else:
            moved, distance = compressible.total_stress_velocity(y, u, rho, mu), star
        errors.append(abs(moved - np.log1p(0.4 * distance) / 0.4).max())
    assert errors[0] < 2e-3
    assert np.log2(np.array(errors[:-1]) / errors[1:]) == pytest.approx(2.0, abs=0.1)


@pytest.mark.parametrize("kind", ["van_driest", "trettel_larsson", "total_stress"])
def test_the_wall_is_added_when_left_out(kind):
    y, u, rho, mu, _ = constructed(100, kind)
    function = getattr(compressible, f"{kind}_velocity")
    arguments = (u, rho) if kind == "van_driest" else (y, u, rho, mu)
    whole = function(*arguments)
    np.testing.assert_allclose(function(*(v[1:] for v in arguments)), whole[1:], rtol=1e-13)
    many = function(*(np.stack([v, v]) for v in arguments))
    assert (many == whole).all()


# --- shapes, refusals, warnings -------------------------------------------------------------------


def test_shapes():
    mach, wall = [[0.5], [2.0]], [0.9, 1.0, 1.1]
    assert quiet(compressible.van_driest_2_factors, mach, wall, 300.0).friction.shape == (2, 3)
    assert quiet(compressible.van_driest_2, 1e7, mach, wall, 300.0).shape == (2, 3)
    assert quiet(compressible.van_driest_2_theta, 1e4, mach, wall, 300.0).shape == (2, 3)
    assert quiet(compressible.eckert, 1e7, mach, wall, 300.0).shape == (2, 3)
    assert compressible.first_cell_centre(
        1.0, 0.002, [[40.0], [50.0]], 1e-5, wall, 300.0
    ).shape == (2, 3)
    assert isinstance(compressible.eckert(1e7, 2.0, 1.7, 300.0), float)
    assert compressible.van_driest_velocity(np.empty((2, 0)), 1.0).shape == (2, 0)


@pytest.mark.parametrize(
    ("name", "value"),
    [
        ("mach", -0.1), ("mach", np.nan), ("wall_temperature_ratio", 0.0),
        ("edge_temperature", 0.0), ("recovery_factor", 1.1), ("heat_capacity_ratio", 1.0),
    ],
)  # fmt: skip
def test_impossible_states_are_refused(name, value):
    given_values = {
        "mach": 2.0,
        "wall_temperature_ratio": 1.7,
        "edge_temperature": 300.0,
        name: value,
    }
    with pytest.raises(InputError, match=name):
        compressible.van_driest_2_factors(**given_values)


def test_other_impossible_input_is_refused():
    with pytest.raises(InputError, match="re_theta"):
        compressible.van_driest_2_theta(-1.0, 2.0, 1.7, 300.0)
    for function in (compressible.van_driest_2, compressible.eckert):
        with pytest.raises(InputError, match="reynolds"):
            function(-1.0, 2.0, 1.7, 300.0)
    with pytest.raises(InputError, match="skin_friction"):
        compressible.first_cell_centre(1.0, 0.0, 40.0, 1.5e-5, 1.0, 300.0)
    for function in (compressible.recovery_factor, compressible.recovery_factor_laminar):
        with pytest.raises(InputError, match="prandtl"):
            function(0.0)
    with pytest.raises(InputError, match="temperature"):
        compressible.sutherland_ratio(-5.0, 300.0)


def test_impossible_profiles_are_refused():
    with pytest.raises(InputError, match="y_plus"):
        compressible.trettel_larsson_velocity([1.0, 1.0], [1.0, 2.0], 1.0, 1.0)
    with pytest.raises(InputError, match="y_star"):
        compressible.total_stress_velocity([1.0, 2.0], [1.0, 2.0], [1.0, 0.01], 1.0)
    with pytest.raises(InputError, match="total_stress"):
        compressible.total_stress_velocity([1.0, 2.0], [9.0, 99.0], [1.0, 8.0], [1.0, 3.0])
    with pytest.raises(InputError, match="density_ratio"):
        compressible.van_driest_velocity([1.0, 2.0], [1.0, -1.0])
    with pytest.raises(InputError, match="shapes"):
        compressible.van_driest_velocity([1.0, 2.0, 3.0], [1.0, 1.0])


@pytest.mark.parametrize(
    "call",
    [
        lambda: compressible.van_driest_2_factors(9.0, 10.0, 300.0),
        lambda: compressible.van_driest_2_factors(5.0, 0.5, 300.0),
        lambda: compressible.van_driest_2_factors(1.0, 2.0, 300.0),
        lambda: compressible.reference_temperature_ratio(9.0, 1.0),
        lambda: compressible.van_driest_2(1e10, 0.5, 1.0, 300.0),
        lambda: compressible.recovery_factor(7.0),
        lambda: compressible.recovery_factor_laminar(7.0),
        lambda: compressible.sutherland_ratio(90.0, 300.0),
    ],
)
def test_outside_the_range_of_the_source_warns(call):
    with pytest.warns(RangeWarning):
        call()
