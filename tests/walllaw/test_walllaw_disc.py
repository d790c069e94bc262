"""Rotating disc: the similar solution solved anew, 50-digit root, integrals, refusals."""

from __future__ import annotations

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from walllaw import disc
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

mpmath.mp.dps = 50
SETTINGS = settings(derandomize=True, deadline=None)
LAWS = [
    disc.cochran,
    disc.cochran_moment,
    disc.karman,
    disc.karman_thickness,
    disc.karman_moment,
    disc.goldstein_moment,
]


def quiet(function, *arguments):
    """Evaluate outside the range of the source without its warning."""
    with record():
        return function(*arguments)


def ulp(value: float, reference) -> float:
    spacing = mpmath.mpf(float(np.spacing(abs(float(reference)))))
    return float(abs(mpmath.mpf(float(value)) - reference) / spacing)


@pytest.fixture(scope="module")
def wall_gradient() -> float:
    """-G'(0) of von Karman's similar flow, by scipy's boundary-value solver."""
    from scipy.integrate import solve_bvp

    def equations(_, s):
        f, df, g, dg, h = s
        return np.array([df, f * f - g * g + df * h, dg, 2.0 * f * g + dg * h, -2.0 * f])

    def boundary(wall, far):
        return np.array([wall[0], wall[2] - 1.0, wall[4], far[0], far[2]])

    z = np.linspace(0.0, 20.0, 400)
    decay = np.exp(-z)
    guess = np.array([0.3 * z * decay, 0.3 * (1 - z) * decay, decay, -decay, decay - 1.0])
    run = solve_bvp(equations, boundary, z, guess, tol=1e-10, max_nodes=100_000)
    assert run.success
    return float(-run.y[3, 0])


def test_laminar_disc_against_a_numerical_solution(wall_gradient):
    # tau_phi = rho sqrt(nu omega^3) r (-G'(0)); both sides: C_M = 2 pi (-G'(0)) Re^(-1/2)
    assert wall_gradient == pytest.approx(0.61592, abs=5e-6)
    assert disc.cochran(1e4) == pytest.approx(2.0 * wall_gradient / 100.0, rel=2e-4)
    assert disc.cochran_moment(1e4) == pytest.approx(2.0 * np.pi * wall_gradient / 100.0, rel=2e-4)


def test_local_friction_integrates_to_the_moment():
    # one side: 2 pi r^2 tau dr; both sides over rho omega^2 R^5/2; exact to the printed digits
    assert quiet(disc.karman_moment, 1e6) == pytest.approx(
        2.0 * 2.0 * np.pi / 4.6 * quiet(disc.karman, 1e6), rel=2e-3
    )
    assert disc.cochran_moment(1e4) == pytest.approx(
        2.0 * 2.0 * np.pi / 4.0 * disc.cochran(1e4), rel=2e-4
    )


def test_local_friction_follows_from_the_thickness():
    # 0.0225 rho U^2 (nu/(U delta))^(1/4) with the swirl angle 0.162 of the 1/7 profile
    thickness = disc.karman_thickness(1e6)
    expected = 2.0 * 0.0225 * (1.0 + 0.162**2) ** 0.375 * (thickness * 1e6) ** -0.25
    assert disc.karman(1e6) == pytest.approx(expected, rel=5e-5)


# Re = 1e7, 10 digits by mpmath: 0.146 law 0.0058123647, Goldstein 0.0072869300
def test_values():
    assert quiet(disc.karman_moment, 1e7) == pytest.approx(0.0058123647, abs=5e-11)
    assert disc.goldstein_moment(1e7) == pytest.approx(0.0072869300, abs=5e-11)


def test_goldstein_is_exact_to_4_ulp():
    rng = np.random.default_rng(50)
    re = np.concatenate([10.0 ** rng.uniform(2.0, 30.0, 500), 10.0 ** np.arange(2.0, 31.0)])
    c = mpmath.mpf("1.97") / mpmath.log(10)
    for value, reynolds in zip(quiet(disc.goldstein_moment, re).tolist(), re.tolist(), strict=True):
        z = mpmath.log(mpmath.mpf(reynolds) / c) + mpmath.mpf("0.03") / c
        assert ulp(value, 1 / (c * mpmath.lambertw(mpmath.exp(z)).real) ** 2) <= 4.0


@pytest.mark.parametrize("function", LAWS, ids=lambda f: f.__name__)
@given(log_re=st.floats(2.0, 12.0), step=st.floats(1e-6, 3.0))
@SETTINGS
def test_laws_fall_with_the_reynolds_number(function, log_re, step):
    first, second = quiet(function, 10.0 ** np.array([log_re, log_re + step]))
    assert second < first


@pytest.mark.parametrize("function", LAWS, ids=lambda f: f.__name__)
def test_shapes_and_one_evaluation_path(function):
    re = 10.0 ** np.random.default_rng(51).uniform(3.0, 7.0, 100)
    many = quiet(function, re)
    assert [quiet(function, r) for r in re.tolist()] == many.tolist()
    assert isinstance(quiet(function, 1e6), float)
    assert quiet(function, np.empty((2, 0))).shape == (2, 0)


@pytest.mark.parametrize("function", LAWS, ids=lambda f: f.__name__)
@pytest.mark.parametrize("bad", [0.0, -1.0, np.nan, np.inf])
def test_impossible_reynolds_numbers_are_refused(function, bad):
    with pytest.raises(InputError, match="reynolds"):
        function(bad)


@pytest.mark.parametrize(
    ("function", "outside"),
    [
        (disc.cochran, 4e5),
        (disc.cochran_moment, 4e5),
        (disc.karman, 1e7),
        (disc.karman_thickness, 1e7),
        (disc.karman_moment, 1e7),
        (disc.goldstein_moment, 2e5),
    ],
)
def test_outside_the_range_of_the_source_warns(function, outside):
    with pytest.warns(RangeWarning):
        function(outside)
