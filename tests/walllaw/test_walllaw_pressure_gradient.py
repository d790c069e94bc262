"""The law of the wall under a pressure gradient, against SciPy's quadrature and root finder."""

from __future__ import annotations

import itertools

import numpy as np
import pytest
from scipy.integrate import quad
from scipy.optimize import brentq

import walllaw
from walllaw import pressure_gradient as pg
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

KAPPA, A_PLUS = 0.41, 26.0


@pytest.fixture(autouse=True)
def whole_domain():
    with record():
        yield


def slope(y, p, factor=0.0):
    """Return dU+/dy+ as one would type it."""
    length = KAPPA * y * -np.expm1(-y * np.sqrt(max(1 + factor * p, 0.0)) / A_PLUS)
    tau = max(1 + p * y, 0.0)
    return 2 * tau / (1 + np.sqrt(1 + 4 * length * length * tau))


def integrated(function, low, high, parts=40):
    edges = np.geomspace(low, high, parts)
    return sum(
        quad(function, a, b, epsabs=0, epsrel=2e-14)[0] for a, b in itertools.pairwise(edges)
    )


@pytest.mark.parametrize("p", [-0.009, -1e-4, 0.0, 1e-3, 0.1, 5.0])
@pytest.mark.parametrize("y", [0.3, 12.0, 110.0, 5e4])
def test_van_driest_against_adaptive_quadrature(y, p):
    if p * y < -1:
        return
    for damping, factor in (("van-driest", 0.0), ("cebeci", 11.8)):
        first = 1e-9 * y
        exact = first + integrated(lambda x, f=factor: slope(x, p, f), first, y)
        # u+ = y+ below the first place, to its square
        assert pg.van_driest(y, p, damping=damping) == pytest.approx(exact, rel=1e-10)


@pytest.mark.parametrize("p", [-0.0005, 1e-8, 0.02, 3.0])
def test_log_law_is_the_integral_of_its_slope(p):
    rise = integrated(lambda y: np.sqrt(1 + p * y) / (KAPPA * y), 40.0, 1500.0)
    assert pg.log_law(1500.0, p) - pg.log_law(40.0, p) == pytest.approx(rise, rel=1e-12)


def test_without_gradient_they_are_the_usual_laws():
    y = np.geomspace(1.0, 1e8, 200)
    assert pg.log_law(y, 0.0) == pytest.approx(walllaw.LogLaw(0.41, 5.0).u_plus(y), rel=1e-14)
    assert pg.van_driest(y, 0.0) == pytest.approx(walllaw.VanDriest().u_plus(y), rel=1e-13)
    u = np.geomspace(0.01, 100.0, 50)
    for law, usual in (("van-driest", walllaw.VanDriest()), ("log", walllaw.LogLaw(0.41, 5.0))):
        found = pg.friction_velocity(u, 0.01, 1e-6, 0.0, law=law)
        assert found == pytest.approx(usual.friction_velocity(u, 0.01, 1e-6), rel=1e-12)


def test_half_power_law_far_out():
    # Stratford 1959: where the gradient rules, u = (2/kappa) sqrt(y dp/dx/rho) and a constant
    y = np.array([1e9, 4e9])
    u = pg.log_law(y, 10.0)
    assert np.diff(u) / np.diff(np.sqrt(10.0 * y)) == pytest.approx(2 / KAPPA, rel=1e-4)


def test_sublayer_is_a_parabola():
    y, p = 0.05, 0.4
    assert pg.van_driest(y, p) == pytest.approx(y + 0.5 * p * y * y, rel=1e-6)


@pytest.mark.parametrize("law", pg.LAWS)
@pytest.mark.parametrize("gradient", [-300.0, 40.0, 500.0])
def test_friction_velocity_against_a_bracketing_solver(law, gradient):
    u, y, nu = 8.0, 1e-3, 1.5e-5

    def miss(u_tau):
        p = gradient * nu / u_tau**3
        if law == "log":
            return u_tau * pg.log_law(y * u_tau / nu, p) - u
        return u_tau * pg.van_driest(y * u_tau / nu, p, damping=law) - u

    low = max(np.sqrt(max(-gradient, 0.0) * y) * 1.0001, 0.35)
    exact = brentq(miss, low, 2.0, xtol=1e-14)
    assert pg.friction_velocity(u, y, nu, gradient, law=law) == pytest.approx(exact, rel=1e-10)


def test_a_rising_pressure_lowers_the_friction():
    found = pg.friction_velocity(8.0, 1e-3, 1.5e-5, np.linspace(-300.0, 1500.0, 60), law="cebeci")
    assert np.all(np.diff(found) < 0)


def test_refusals_and_warning():
    with pytest.raises(InputError, match="at least -1"):
        pg.log_law(100.0, -0.02)
    with pytest.raises(InputError, match="at least -1"):
        pg.van_driest([1.0, 100.0], -0.02)
    with pytest.raises(InputError, match="some wall stress above 0"):
        pg.friction_velocity([8.0, 0.5], 1e-3, 1.5e-5, 2e4, law="cebeci")
    with pytest.raises(InputError, match="some wall stress above 0"):
        pg.friction_velocity(8.0, 1e-3, 1.5e-5, -2e4)
    with pytest.raises(InputError, match="did you mean 'cebeci'"):
        pg.friction_velocity(8.0, 1e-3, 1.5e-5, 0.0, law="cebecci")
    with pytest.raises(InputError, match="velocity"):
        pg.friction_velocity(0.0, 1e-3, 1.5e-5, 0.0)
    shape = pg.friction_velocity(np.full((2, 1), 8.0), 1e-3, np.full(3, 1.5e-5), 10.0).shape
    assert shape == (2, 3)


def test_range():
    from walllaw.relation import _RECORD

    token = _RECORD.set(None)
    try:
        with pytest.warns(RangeWarning, match="y_plus = 10 is outside 30"):
            pg.log_law(10.0, 0.0)
    finally:
        _RECORD.reset(token)
