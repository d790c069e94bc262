"""The logarithmic Lambert functions against mpmath with 50 digits."""

from __future__ import annotations

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy import special

from walllaw.lambert import wright_omega, wright_omega_lower

mpmath.mp.dps = 50


def ulp(value: float, exact) -> float:
    return float(abs(mpmath.mpf(value) - exact) / mpmath.mpf(float(np.spacing(float(exact)))))


def omega(z: float):
    """W0(exp(z)) by mpmath, by its own Newton where exp(z) has too many digits."""
    if z < 300:
        return mpmath.lambertw(mpmath.exp(mpmath.mpf(z))).real
    w = mpmath.mpf(z) - mpmath.log(z)
    for _ in range(7):
        w -= (w + mpmath.log(w) - mpmath.mpf(z)) / (1 + 1 / w)
    return w


def lower(s: float):
    """-W_-1(-exp(-s)) by mpmath, by its own Newton where exp(-s) vanishes."""
    if s < 300:
        return -mpmath.lambertw(-mpmath.exp(-mpmath.mpf(s)), -1).real
    v = mpmath.mpf(s) + mpmath.log(s)
    for _ in range(7):
        v -= (v - mpmath.log(v) - mpmath.mpf(s)) / (1 - 1 / v)
    return v


def test_omega_is_within_2_ulp_from_minus_1000_to_1e300():
    rng = np.random.default_rng(1)
    seams = np.array(
        [-38.0, -37.999999, -38.000001, 0.0, 1.0, np.nextafter(1.0, 2.0), -700.0, -701.0]
    )
    z = np.concatenate(
        [
            rng.uniform(-700, 50, 2500),
            rng.uniform(-3, 3, 2500),
            10 ** rng.uniform(-3, 300, 2000),
            seams,
            [1e300, -1e-300],
        ]
    )
    errors = [ulp(w, omega(x)) for w, x in zip(wright_omega(z).tolist(), z.tolist(), strict=True)]
    assert max(errors) <= 2.0


def test_lower_branch_is_within_2_ulp_from_the_branch_point_to_1e300():
    rng = np.random.default_rng(2)
    s = np.concatenate(
        [
            1.0 + 10 ** rng.uniform(-15, 3, 4000),
            rng.uniform(1, 30, 2000),
            10 ** rng.uniform(0, 300, 1500),
            [np.nextafter(1.0, 2.0), 2.0, 1e300],
        ]
    )
    errors = [
        ulp(v, lower(x)) for v, x in zip(wright_omega_lower(s).tolist(), s.tolist(), strict=True)
    ]
    assert max(errors) <= 2.0


def test_underflow_and_branch_point_without_a_warning():
    assert wright_omega(np.array([-1000.0, -1e300])).tolist() == [0.0, 0.0]
    assert wright_omega_lower(np.array([1.0])).tolist() == [1.0]


# scipy.special.wrightomega, an implementation of Lawrence, Corless & Jeffrey (2012)
def test_omega_agrees_with_scipy():
    z = np.linspace(-30, 100, 5001)
    assert wright_omega(z) == pytest.approx(special.wrightomega(z), rel=2e-14)


@settings(derandomize=True, deadline=None)
@given(st.floats(-700, 1e6))
def test_omega_rises_with_z_over_a_wide_step(z):
    w = wright_omega(np.array([z, z + abs(z) * 1e-12 + 1e-12]))
    assert w[1] >= w[0] > 0


@settings(derandomize=True, deadline=None)
@given(st.floats(1, 1e6))
def test_both_branches_meet_their_equation(s):
    v = wright_omega_lower(np.array([s]))[0]
    assert v >= 1.0
    assert v - np.log(v) == pytest.approx(s, rel=1e-15, abs=4e-16)
    w = wright_omega(np.array([s]))[0]
    assert w + np.log(w) == pytest.approx(s, rel=1e-15, abs=4e-16)


def test_one_point_and_many_give_the_same_bits():
    z = np.linspace(-50, 50, 1001)
    assert wright_omega(z).tolist() == [wright_omega(np.array([x]))[0] for x in z]
