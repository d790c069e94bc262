"""Spalding, Reichardt and van Driest against tables, direct simulation and 50-digit arithmetic."""

from __future__ import annotations

import csv
import pathlib

import mpmath
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

import walllaw
from walllaw.errors import InputError

DATA = pathlib.Path(__file__).parents[1] / "reference" / "data"
mpmath.mp.dps = 50
mpf = mpmath.mpf
K = mpf(0.41)


def rows(name: str) -> list[dict[str, str]]:
    with open(DATA / name, encoding="utf-8") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


def places(low: int, high: int, seed: int, count: int = 300) -> list[float]:
    """Log-uniform points and all powers of ten."""
    points = 10.0 ** np.random.default_rng(seed).uniform(low, high, count)
    return [*points.tolist(), *(10.0 ** np.arange(low, high + 1)).tolist()]


def root(f, start: float):
    """50-digit root of f from a start good to 14 digits, by secants."""
    a, b = mpf(start), mpf(start) * (1 + mpf(10) ** -13)
    fa = f(a)
    for _ in range(4):
        fb = f(b)
        if fb in (0, fa):
            break
        a, b, fa = b, b - fb * (b - a) / (fb - fa), fb
    return b


def assert_ulp(value: float, reference, limit: float) -> None:
    assert abs(mpf(value) - reference) <= limit * np.spacing(abs(float(reference)))


ORACLE = {
    "log": lambda k, b: walllaw.LogLaw(k, b),
    "spalding4": lambda k, b: walllaw.Spalding(k, b, 4),
    "spalding3": lambda k, b: walllaw.Spalding(k, b, 3),
    "reichardt": lambda k, b: walllaw.Reichardt(k, b),
    "musker": lambda k, b: walllaw.Musker(k, b),
    "van_driest26": lambda k, b: walllaw.VanDriest(k, 26.0),
}


@pytest.mark.parametrize("law", ORACLE)
@pytest.mark.filterwarnings("ignore::walllaw.errors.RangeWarning")  # the log law from y+ = 0.1
def test_tables_of_45_digits(law):
    """60 rows a law, computed with 45 digits from the formulas named in the file's head."""
    for row in rows("wall_law_oracle.csv"):
        kappa, b, y = float(row["kappa"]), float(row["B"]), float(row["y_plus"])
        u = ORACLE[law](kappa, b).u_plus(y)
        reference = mpf(row[law])
        # the log law crosses zero: its error is that of B
        scale = max(abs(float(reference)), b if law == "log" else 0.0)
        assert abs(u - reference) <= 4 * np.spacing(scale), row


def test_published_spalding_curve():
    # NASA Turbulence Modeling Resource (2025): Spalding with 0.40, 5.5, bracket to the third power
    law = walllaw.Spalding(0.40, 5.5)
    for row in rows("spalding_published_curve.csv"):
        y = law.y_plus(float(row["u_plus"]))
        assert np.log10(y) == pytest.approx(float(row["log10_y_plus"]), abs=6e-6)


@pytest.mark.parametrize(
    "set_", ["lm2015_ret182", "coleman_ret392", "lm2015_ret1000", "lm2015_ret5186"]
)
@pytest.mark.parametrize(
    "law",
    [walllaw.Spalding(0.40, 5.5, 4), walllaw.Reichardt(0.41, 5.0), walllaw.VanDriest(0.41, 26.0),
     walllaw.Musker(0.384, 4.27), walllaw.ChauhanMonkewitzNagib()],
)  # fmt: skip
def test_against_direct_simulation(set_, law):
    """Lee & Moser (2015) and Coleman: rms deviation of u+ for 1 < y+ < 0.15 Re_tau.

    A law without wake, with constants of boundary layers, is within 0.6 of a channel at these Re.
    """
    data = rows(f"channel_dns_{set_}.csv")
    y = np.array([float(r["y_plus"]) for r in data])
    u = np.array([float(r["U_plus"]) for r in data])
    use = (y > 1) & (y < max(0.15 * y.max(), 30))
    assert np.sqrt(np.mean((law.u_plus(y[use]) - u[use]) ** 2)) < 0.6


def exact_spalding(law):
    def y(u):
        with mpmath.workdps(90):
            x = mpf(law.kappa) * u
            series = sum(x**j / mpmath.factorial(j) for j in range(law.order + 1))
            scale = mpmath.exp(-mpf(law.kappa) * mpf(law.B))
            return u + scale * (mpmath.exp(x) - series)

    return y


@pytest.mark.parametrize("order", [3, 4])
def test_spalding_to_a_few_ulp(order):
    law = walllaw.Spalding(0.41, 5.0, order)
    exact = exact_spalding(law)
    for y in places(-8, 12, 1):
        u = law.u_plus(y)
        true = root(lambda x, y=y: mpmath.log(exact(x) / mpf(y)), u)
        assert_ulp(u, true, 2)
        assert_ulp(law.y_plus(u), exact(mpf(u)), 2 * (1 + 0.41 * u))
        with mpmath.workdps(90):
            x = K * true
            tail = mpmath.exp(x) - sum(x**j / mpmath.factorial(j) for j in range(order))
            eddy = K * mpmath.exp(-5 * K) * tail
            higher = (
                tail
                - x**order / mpmath.factorial(order)
                - x ** (order + 1) / (mpmath.factorial(order + 1))
            )
            area = true * mpf(y) - true**2 / 2 - mpmath.exp(-5 * K) / K * higher
        # d ln(eddy)/d ln(u) is at most order near the wall, x far from it
        assert_ulp(law.eddy_viscosity(y), eddy, 1.5 * (1 + order + 0.41 * u))
        assert_ulp(law.integral(y), area, 4)


@pytest.mark.parametrize("order", [3, 4])
def test_spalding_friction_velocity_to_a_few_ulp(order):
    law = walllaw.Spalding(0.41, 5.0, order)
    exact = exact_spalding(law)
    for re in places(-12, 18, 2):
        u = law.u_plus_of_re_y(re)
        assert_ulp(u, root(lambda x, re=re: mpmath.log(x * exact(x) / mpf(re)), u), 2)


def test_reichardt_to_a_few_ulp():
    law = walllaw.Reichardt(0.41, 5.0)
    c, b = 5 - mpmath.log(K) / K, mpf(0.33)

    def exact(y):
        return mpmath.log(1 + K * y) / K + c * (
            1 - mpmath.exp(-y / 11) - y / 11 * mpmath.exp(-b * y)
        )

    def area(y):
        with mpmath.workdps(90):
            log = ((1 + K * y) * mpmath.log(1 + K * y) - K * y) / K**2
            end = (1 / b**2 - mpmath.exp(-b * y) * (y / b + 1 / b**2)) / 11
            return log + c * (y - 11 * (1 - mpmath.exp(-y / 11)) - end)

    for value in places(-8, 12, 3):
        y = mpf(value)
        u, slope = law.u_plus(value), law.slope(value)
        assert_ulp(u, exact(y), 4)
        assert_ulp(slope, mpmath.diff(exact, y), 4)
        assert_ulp(law.integral(value), area(y), 16)
        condition = u / (value * slope)
        true = root(lambda x, u=u: exact(x) - mpf(u), value)
        assert_ulp(law.y_plus(u), true, 4 * (1 + condition))
    for re in places(-12, 18, 4):
        y = root(lambda x, re=re: x * exact(x) - mpf(re), re / law.u_plus_of_re_y(re))
        assert_ulp(law.u_plus_of_re_y(re), mpf(re) / y, 4)


@pytest.mark.parametrize(("kappa", "a_plus"), [(0.41, 26.0), (0.2, 1.0), (1.0, 200.0)])
def test_van_driest_against_30_digit_quadrature(kappa, a_plus):
    law, k, a = walllaw.VanDriest(kappa, a_plus), mpf(kappa), mpf(a_plus)

    def slope(y):
        length = k * y * -mpmath.expm1(-y / a)
        return 2 / (1 + mpmath.sqrt(1 + 4 * length * length))

    far = 40 * a_plus
    points = np.sort([*places(-6, 10, 5, 30), far, np.nextafter(far, 1e9)])
    u = moment = previous = mpf(0)
    with mpmath.workdps(30):
        for value in points.tolist():
            y, edges = mpf(value), [previous]
            middle = max(previous, mpf(10) ** -7)
            while (middle := 2 * middle) < y:
                edges.append(middle)
            edges.append(y)
            u += mpmath.quad(slope, edges)
            moment += mpmath.quad(lambda x: x * slope(x), edges)
            previous = y
            assert_ulp(law.u_plus(value), u, 16)
            assert_ulp(law.integral(value), y * u - moment, 16)
        x = 2 * k * previous
        undamped = (mpmath.asinh(x) - x / (1 + mpmath.sqrt(1 + x * x))) / k
        intercept = u - undamped + (mpmath.log(4 * k) - 1) / k
    assert abs(law.B - intercept) <= 4e-15 * max(1.0, float(u))


def test_implied_intercept_of_van_driest():
    # 10 digits from 45-digit integration
    for row in rows("wall_law_constants.csv"):
        law = walllaw.VanDriest(float(row["kappa"]), 26.0)
        assert pytest.approx(float(row["implied_B_van_driest26"]), abs=6e-10) == law.B


@given(
    st.floats(0.3, 0.6), st.floats(-1.0, 9.0), st.floats(-12, 18), st.sampled_from([3, 4])
)  # fmt: skip
@settings(derandomize=True, deadline=None, max_examples=100)
def test_spalding_for_any_constants(kappa, b, log_re, order):
    law = walllaw.Spalding(kappa, b, order)
    re = 10.0**log_re
    u = law.u_plus_of_re_y(re)
    assert u * law.y_plus(u) == pytest.approx(re, rel=4e-16 * (2 + kappa * u), abs=0)
    assert law.u_plus(law.y_plus(u)) == pytest.approx(u, rel=2e-15, abs=0)


@pytest.mark.parametrize(
    ("make", "name"),
    [
        (lambda: walllaw.Spalding(order=5), "order"),
        (lambda: walllaw.Spalding(kappa=0.0), "kappa"),
        (lambda: walllaw.Spalding(B=float("nan")), "B"),
        (lambda: walllaw.Spalding(B=[5.0, 5.2]), "B"),
        (lambda: walllaw.Spalding(B=-40.0), "kappa"),
        (lambda: walllaw.Spalding(0.41, 5.0, E=9.8), "E"),
        (lambda: walllaw.Reichardt(0.41, -30.0), "B"),
        (lambda: walllaw.VanDriest(0.41, 0.0), "A_plus"),
        (lambda: walllaw.VanDriest(5.0, 26.0), "kappa"),
    ],
)
def test_laws_that_cannot_be(make, name):
    with pytest.raises(InputError, match=rf"^{name}"):
        make()
