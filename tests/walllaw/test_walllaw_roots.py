"""Shared roots and sums against 50 digits."""

from __future__ import annotations

import mpmath
import numpy as np
import pytest

from walllaw import roots

mpmath.mp.dps = 50


def ulp(value: float, reference) -> float:
    spacing = mpmath.mpf(float(np.spacing(abs(float(reference)))))
    return float(abs(mpmath.mpf(float(value)) - reference) / spacing)


@pytest.mark.parametrize("degree", [5, 6, 7])
def test_inverse_root_is_exact_to_2_ulp(degree):
    rng = np.random.default_rng(70)
    values = np.concatenate([10.0 ** rng.uniform(-30.0, 30.0, 2000), 2.0 ** np.arange(-90.0, 91.0)])
    found = roots.inverse_root(values, degree)
    for y, x in zip(found, values, strict=True):
        assert ulp(y, 1 / mpmath.root(mpmath.mpf(float(x)), degree)) <= 2.0


@pytest.mark.parametrize("slope", [1.889, 2.0, 4.15, 1.0 / 0.242])
def test_sum_with_a_logarithm_keeps_the_digits_that_cancel(slope):
    rng = np.random.default_rng(71)
    y = 10.0 ** rng.uniform(-240.0, 240.0, 2000)
    x = -slope * np.log10(y) * (1.0 + 1e-9 * rng.standard_normal(2000))
    for total, a, b in zip(roots.add_log10(x, slope, y), x, y, strict=True):
        exact = mpmath.mpf(float(a)) + mpmath.mpf(slope) * mpmath.log10(mpmath.mpf(float(b)))
        # one unit of rounding of x is 1e-14 at 60 and 1e-13 at 1000
        assert abs(mpmath.mpf(float(total)) - exact) < 4e-16 * slope


@pytest.mark.parametrize("power", [1.0, 2.0])
@pytest.mark.parametrize("slope", [0.5, 2.0, 4.15])
def test_log_law_solves_its_equation(slope, power):
    re = 10.0 ** np.linspace(-3.0, 300.0, 200)
    x = roots.log_law_root(re, slope, 0.3, power)
    residual = x - slope * (np.log10(re) - power * np.log10(x)) - 0.3
    assert abs(residual / (x + slope)).max() < 1e-14
    np.testing.assert_allclose(roots.log_law_friction(re, slope, 0.3, power), x**-2.0, rtol=2e-14)


def test_inverse_square_keeps_a_step_below_rounding():
    x, step = np.array([10.0]), np.array([4e-16])  # x - step rounds to x
    exact = 1 / (mpmath.mpf(10) - mpmath.mpf(4e-16)) ** 2
    assert ulp(roots.inverse_square(x, step)[0], exact) <= 1.0
