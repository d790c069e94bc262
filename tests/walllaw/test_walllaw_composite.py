"""Whole-layer profiles against direct simulation, a published profile and 15-digit integrals."""

from __future__ import annotations

import csv
import pathlib

import numpy as np
import pytest
import scipy.optimize

import walllaw
from walllaw.errors import InputError, RangeWarning

DATA = pathlib.Path(__file__).parents[1] / "reference" / "data"


def rows(name: str) -> list[dict[str, str]]:
    with open(DATA / name, encoding="utf-8") as file:
        return list(csv.DictReader(line for line in file if not line.startswith("#")))


def test_wake_of_coles():
    # D. Coles, J. Fluid Mech. 1 (1956): the wake adds Pi/kappa at half the thickness, 2 Pi/kappa
    # at the edge
    law = walllaw.WithWake(walllaw.Musker(0.41, 5.0), 1000.0, Pi=0.55)
    inner = walllaw.Musker(0.41, 5.0)
    assert law.u_plus(500.0) - inner.u_plus(500.0) == pytest.approx(0.55 / 0.41, rel=1e-13, abs=0)
    assert law.u_plus(1000.0) - inner.u_plus(1000.0) == pytest.approx(1.1 / 0.41, rel=1e-13, abs=0)
    assert law.u_plus(1e6) == law.u_plus(1000.0) == law.edge_velocity
    assert law.slope(1e6) == 0.0
    assert law.kappa == 0.41
    assert law.B == 5.0


def test_published_boundary_layer_profile():
    # NASA Turbulence Modeling Resource (2025): Coles profile at Re_theta = 1e4, read to 0.3 %;
    # its last point is the edge
    data = rows("boundary_layer_profile_coles_retheta10000.csv")
    y = np.array([float(r["y_plus"]) for r in data])
    u = np.array([float(r["u_plus"]) for r in data])
    law = walllaw.WithWake(walllaw.Musker(0.41, 5.0), float(y.max()), Pi=0.55)
    inner = y < 0.1 * y.max()
    assert np.max(np.abs(law.u_plus(y[inner]) / u[inner] - 1)) < 0.04


def test_composite_against_boundary_layer_simulations():
    """Schlatter & Orlu 2010, Eitel-Amor et al. 2014, above Re_theta = 3000.

    The two sets differ by 2 % in skin friction and 0.5 % in shape factor where they meet; the
    profile of Chauhan et al. was fitted to measurements at higher Re_theta.
    """
    x, w = np.polynomial.legendre.leggauss(400)

    def integrals(delta):
        law, top = walllaw.Composite(delta), np.log1p(delta / 5)
        s = 0.5 * (x + 1) * top
        y, weight = 5 * np.expm1(s), 0.5 * w * top * 5 * np.exp(s)
        u, edge = law.u_plus(y), law.u_plus(delta)
        return np.sum(weight * (edge - u)), np.sum(weight * u * (1 - u / edge)), edge

    used = [r for r in rows("flatplate_dns_schlatter.csv") if float(r["re_theta"]) > 3000]
    assert len(used) >= 8
    for row in used:
        target = float(row["re_theta"])
        delta = scipy.optimize.brentq(lambda d, t=target: integrals(d)[1] - t, 250.0, 1e5)
        displacement, momentum, edge = integrals(delta)
        assert displacement / momentum == pytest.approx(float(row["H"]), rel=0.012)
        assert 2 / edge**2 == pytest.approx(float(row["cf"]), rel=0.022)


# centre velocity of Cess' profile, 15 digits from mpmath: kappa, A+, Re_tau, u+
CESS = [
    (0.421, 27.316, 1e3, 22.9278017044237), (0.421, 27.316, 1e4, 28.43437462363),
    (0.421, 27.316, 1e6, 39.3789502426204), (0.41, 26.0, 1e3, 23.0662492092103),
    (0.41, 26.0, 1e6, 39.9622849486473),
]  # fmt: skip


@pytest.mark.parametrize(("kappa", "a_plus", "re_tau", "u"), CESS)
def test_cess(kappa, a_plus, re_tau, u):
    law = walllaw.Cess(re_tau, kappa, a_plus)
    assert law.u_plus(re_tau) == pytest.approx(u, rel=1e-14, abs=0)
    flow = walllaw.developed(
        "channel", re_tau=re_tau, mixing_length="cess", kappa=kappa, A_plus=a_plus
    )
    # the mean over the half height
    assert law.integral(re_tau) / re_tau == pytest.approx(flow.bulk_u_plus, rel=1e-13, abs=0)


def test_cess_stress_and_simulation():
    law = walllaw.Cess(5186.0)
    y = 10.0 ** np.linspace(-3, np.log10(5180), 200)
    stress = 1 - y / 5186.0
    assert (1 + law.eddy_viscosity(y)) * law.slope(y) == pytest.approx(stress, rel=1e-13, abs=0)
    length = law.mixing_length(y)
    assert law.slope(y) + (length * law.slope(y)) ** 2 == pytest.approx(stress, rel=1e-13, abs=0)
    # Lee & Moser (2015), Re_tau = 5186, wall to centre: rms deviation as for the laws of the wall
    data = rows("channel_dns_lm2015_ret5186.csv")
    at = np.array([float(r["y_plus"]) for r in data])
    u = np.array([float(r["U_plus"]) for r in data])
    assert np.sqrt(np.mean((law.u_plus(at) - u)[at > 1] ** 2)) < 0.6
    # intercept of the same constants under constant stress, 7 digits
    assert pytest.approx(5.2446569, abs=6e-8) == walllaw.Cess(1e5, 0.426, 25.4).B


def test_velocity_above_the_edge():
    law = walllaw.WithWake(walllaw.Spalding(), 1000.0)
    top = law.edge_velocity
    assert law.y_plus(top) == pytest.approx(1000.0, rel=1e-12)
    with pytest.raises(InputError, match=r"^u_plus"):
        law.y_plus(1.001 * top)
    # the friction velocity of a point outside the layer: constant u+
    assert law.friction_velocity(20.0, 3.0, 1e-5) == pytest.approx(20.0 / top, rel=1e-15, abs=0)


def test_range_of_the_inner_law():
    law = walllaw.WithWake(walllaw.LogLaw(), 1000.0)
    with pytest.warns(RangeWarning, match="Log law"):
        law.u_plus(10.0)
    assert law.u_plus(1e15) == law.edge_velocity  # the layer has ended: not the log law's range


@pytest.mark.parametrize(
    ("make", "name"),
    [
        (lambda: walllaw.WithWake(walllaw.LogLaw(), 0.0), "delta_plus"),
        (lambda: walllaw.WithWake(walllaw.LogLaw(), 1000.0, -0.5), "Pi"),
        (lambda: walllaw.WithWake(0.41, 1000.0), "inner"),
        (lambda: walllaw.WithWake(walllaw.Composite(1000.0), 1000.0), "inner"),
        (lambda: walllaw.Composite(1000.0, inner=walllaw.Cess(1000.0)), "inner"),
        (lambda: walllaw.Composite(100.0), "delta_plus"),
        (lambda: walllaw.Composite(1000.0, Pi=0.0), "Pi"),
        (lambda: walllaw.Cess(float("nan")), "re_tau"),
        (lambda: walllaw.Cess(1000.0, 0.41, -1.0), "A_plus"),
    ],
)
def test_profiles_that_cannot_be(make, name):
    with pytest.raises(InputError, match=rf"^{name}"):
        make()
