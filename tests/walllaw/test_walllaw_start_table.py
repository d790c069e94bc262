"""Tables of starts and the bracketed solver, against functions known in closed form and SciPy."""

from __future__ import annotations

import numpy as np
import pytest
import scipy.interpolate
import scipy.optimize

from walllaw.panels import Panels
from walllaw.start_table import STEP, StartTable, nodes, safe_root


def test_table_against_a_cubic_hermite_spline():
    x = nodes(-2.0, 3.0)
    table = StartTable.of(-2.0, np.sin(x), np.cos(x))
    spline = scipy.interpolate.CubicHermiteSpline(x, np.sin(x), np.cos(x))
    at = np.random.default_rng(1).uniform(-2.0, 3.0, 1000)
    assert table(at) == pytest.approx(spline(at), abs=1e-15)
    assert table(x[:-1]) == pytest.approx(np.sin(x[:-1]), abs=1e-15)
    assert np.max(np.abs(table(at) - np.sin(at))) < STEP**4 / 384 * 1.01  # bound of the cubic


def test_table_is_straight_beyond_its_ends():
    x = nodes(0.0, 1.0)
    table = StartTable.of(0.0, x * x, 2.0 * x)
    assert table(np.array([-5.0, 3.0])) == pytest.approx([0.0, 1.0 + 2.0 * 2.0], abs=1e-12)


@pytest.mark.parametrize("power", [1, 3, 9, 41])
def test_safe_root_from_anywhere(power):
    target = np.linspace(-0.9, 0.9, 37)

    def residual(t):
        return np.sign(t) * np.abs(t) ** power - target, power * np.abs(t) ** (power - 1)

    low, high = np.full_like(target, -2.0), np.full_like(target, 3.0)
    found = safe_root(residual, low, high, np.full_like(target, 1.7), 90)
    exact = np.sign(target) * np.abs(target) ** (1 / power)
    assert found[target != 0] == pytest.approx(exact[target != 0], rel=1e-14, abs=0)


def test_safe_root_over_a_kink():
    def residual(t):
        return np.where(t < 0.0, 100.0 * t, 0.01 * t) - 1e-4, np.where(t < 0.0, 100.0, 0.01)

    one = np.ones(1)
    root = scipy.optimize.brentq(lambda t: float(residual(np.array([t]))[0][0]), -5, 5, xtol=1e-15)
    assert safe_root(residual, -5 * one, 5 * one, -4 * one, 40) == pytest.approx(root, rel=1e-12)


def test_panels_against_closed_forms():
    y = 10.0 ** np.linspace(-8, 30, 400)
    for integrand, stretch, exact in (
        (lambda x: 1.0 / (1.0 + x), 1.0, np.log1p(y)),
        (lambda x: np.exp(-x / 26.0), 15.0, -26.0 * np.expm1(-y / 26.0)),
        (lambda x: 1.0 / np.sqrt(1.0 + x * x / 25.0), 5.0, 5.0 * np.arcsinh(y / 5.0)),
    ):
        assert Panels.of(integrand, stretch)(y) == pytest.approx(exact, rel=4e-15, abs=0)
