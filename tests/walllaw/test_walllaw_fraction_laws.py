"""Musker, Chauhan et al. and the Spalart-Allmaras law against quadrature of their slopes."""

from __future__ import annotations

import csv
import pathlib

import mpmath
import numpy as np
import pytest

import walllaw
from walllaw.errors import InputError

DATA = pathlib.Path(__file__).parents[1] / "reference" / "data"
mpf = mpmath.mpf


def test_musker_constant():
    # 20 digits, mpmath
    with open(DATA / "wall_law_constants.csv", encoding="utf-8") as file:
        for row in csv.DictReader(line for line in file if not line.startswith("#")):
            law = walllaw.Musker(float(row["kappa"]), float(row["B"]))
            assert pytest.approx(float(row["musker_C"]), rel=4e-15, abs=0) == law.C
    # A. J. Musker, AIAA J. 17 (1979): C = 0.001093 for 0.41 and 5.0
    assert pytest.approx(0.001093, abs=5e-7) == walllaw.Musker(0.41, 5.0).C


def test_printed_form_of_musker():
    # Musker (1979): arctangent and logarithm with rounded coefficients, good to 0.05 in u+
    y = 10.0 ** np.linspace(0, 3, 200)
    printed = (
        5.424 * np.arctan((2 * y - 8.15) / 16.7)
        + np.log10((y + 10.6) ** 9.6 / (y * y - 8.15 * y + 86) ** 2)
        - 3.52
    )
    assert np.max(np.abs(walllaw.Musker(0.41, 5.0).u_plus(y) - printed)) < 0.05


# Allmaras, Johnson & Spalart, ICCFD7-1902 (2012): closed law; 6 digits by quadrature of
# 1/(1 + kappa y+ f_v1(kappa y+))
@pytest.mark.parametrize(
    ("y", "u"), [(1, 0.999984), (10, 8.954467), (100, 16.320216), (1000, 21.887512)]
)
def test_published_values_of_spalart_allmaras(y, u):
    assert walllaw.SpalartAllmaras().u_plus(float(y)) == pytest.approx(u, abs=5e-7)


def test_chauhan_intercept():
    # Chauhan, Monkewitz & Nagib (2009): kappa 0.384 with intercept 4.17
    law = walllaw.ChauhanMonkewitzNagib()
    assert pytest.approx(4.17, abs=5e-3) == law.B
    assert law.u_plus(1e15) == pytest.approx(np.log(1e15) / 0.384 + law.B, rel=1e-12)


def fraction(kappa, s):
    return lambda y: (y * y / kappa + s) / (y**3 + y * y / kappa + s)


def chauhan(y):
    k, a, t = mpf(0.384), mpf(10.3061), mpmath.log(y / 30)
    return fraction(k, a**3 - a * a / k)(y) - 2 * t / y * mpmath.exp(-t * t) / mpf(2.85)


def spalart_allmaras(y):
    chi = mpf(0.41) * y
    return 1 / (1 + chi * chi**3 / (chi**3 + mpf(7.1) ** 3))


@pytest.mark.parametrize(
    ("law", "exact", "seam"),
    [
        (walllaw.Musker(0.41, 5.0), fraction(mpf(0.41), 1 / mpf(walllaw.Musker(0.41, 5.0).C)), 0.1),
        (walllaw.ChauhanMonkewitzNagib(), chauhan, 0.1),
        (walllaw.SpalartAllmaras(), spalart_allmaras, 0.5),
    ],
)
def test_against_30_digit_quadrature(law, exact, seam):
    """Value, slope, eddy viscosity and integral, over both branches of the closed form."""
    points = 10.0 ** np.random.default_rng(5).uniform(-4, 10, 40)
    points = np.sort([*points, *(10.0 ** np.arange(-4, 11)), seam, np.nextafter(seam, 0)])
    with mpmath.workdps(30):
        # below the first point u+ = y+ to 16 digits, for each of the three
        u, moment, previous = mpf(1e-5), mpf(1e-5) ** 2 / 2, mpf(1e-5)
        for value in points.tolist():
            y, edges, middle = mpf(value), [previous], previous
            while (middle := 2 * middle) < y:
                edges.append(middle)
            edges.append(y)
            u += mpmath.quad(exact, edges)
            moment += mpmath.quad(lambda x: x * exact(x), edges)
            previous = y
            with mpmath.workdps(60):
                slope = exact(y)
                eddy = 1 / slope - 1
            for found, reference, ulp in (
                (law.u_plus(value), u, 8),
                (law.slope(value), slope, 8),
                (law.eddy_viscosity(value), eddy, 20),  # condition up to 4
                (law.integral(value), y * u - moment, 16),
            ):
                assert abs(mpf(found) - reference) <= ulp * np.spacing(float(reference)), value


@pytest.mark.parametrize(
    ("make", "name"),
    [
        (lambda: walllaw.Musker(0.41, 99.0), "B"),
        (lambda: walllaw.Musker(0.05, 5.0), "kappa"),
        (lambda: walllaw.ChauhanMonkewitzNagib(0.384, 5.0), "a"),
    ],
)
def test_laws_that_cannot_be(make, name):
    with pytest.raises(InputError, match=rf"^{name}"):
        make()
