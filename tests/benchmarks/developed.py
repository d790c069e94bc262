"""Developed flow: speed against SciPy's quad, solve_ivp and solve_bvp in one run, with the errors."""

from __future__ import annotations

import itertools
import statistics
import time
import warnings

import numpy as np
from scipy.integrate import quad, solve_bvp, solve_ivp

from walllaw import FlowFamily, developed, flow_quadrature

RE_TAU, KAPPA, A_PLUS = 5000.0, 0.41, 26.0


def median(function, repeats: int) -> float:
    times = []
    for _ in range(repeats):
        start = time.perf_counter()
        function()
        times.append(time.perf_counter() - start)
    return statistics.median(times)


def slope(y):
    """Return dU+/dy+ of Cess's eddy viscosity in a pipe, as one would type it."""
    r = 1.0 - y / RE_TAU
    x = KAPPA * RE_TAU / 3.0 * (1 - r * r) * (1 + 2 * r * r) * (1 - np.exp(-y / A_PLUS))
    return r / (0.5 + 0.5 * np.sqrt(1.0 + x * x))


def by_quad() -> float:
    edges = 15.0 * np.expm1(np.linspace(0.0, np.log1p(RE_TAU / 15.0), 9))

    def part(y):
        return slope(y) * (1.0 - y / RE_TAU) ** 2

    return sum(quad(part, a, b, epsrel=1e-13, epsabs=0)[0] for a, b in itertools.pairwise(edges))


def by_ivp() -> float:
    def right(s, state):
        y, stretch = 15.0 * np.expm1(s), 15.0 * np.exp(s)
        return [slope(y) * (1.0 - y / RE_TAU) ** 2 * stretch]

    end = np.log1p(RE_TAU / 15.0)
    return solve_ivp(right, (0.0, end), [0.0], method="DOP853", rtol=1e-12, atol=1e-14).y[0, -1]


def by_bvp() -> float:
    def right(s, state):
        y, stretch = 15.0 * np.expm1(s), 15.0 * np.exp(s)
        return np.vstack([slope(y) * (1.0 - y / RE_TAU) ** 2 * stretch, 0.0 * y])

    s = np.linspace(0.0, np.log1p(RE_TAU / 15.0), 200)
    guess = np.vstack([np.minimum(15.0 * np.expm1(s), 20.0), 0.0 * s])

    def end(low, high):
        return np.array([low[0], low[1]])

    return solve_bvp(right, end, s, guess, tol=1e-10, max_nodes=200_000).y[0, -1]


def main() -> None:
    warnings.simplefilter("ignore")
    closing = {"mixing_length": "cess", "kappa": KAPPA, "A_plus": A_PLUS}
    kept, flow_quadrature.NODES = flow_quadrature.NODES, 60
    exact = developed("pipe", re_tau=RE_TAU, **closing).bulk_u_plus
    flow_quadrature.NODES = kept

    def ours() -> float:
        return developed("pipe", re_tau=RE_TAU, **closing).bulk_u_plus

    ours()
    one = median(ours, 300)
    print(f"one case, walllaw.developed: {one * 1e3:.3f} ms, error {abs(ours() / exact - 1):.1e}")
    for name, function, repeats in (
        ("quad", by_quad, 20),
        ("solve_ivp", by_ivp, 10),
        ("solve_bvp", by_bvp, 3),
    ):
        seconds = median(function, repeats)
        print(
            f"  scipy.integrate.{name}: x{seconds / one:.0f} the time, error {abs(function() / exact - 1):.1e}"
        )
    re_tau = np.geomspace(1e2, 1e7, 50_000)
    batch = median(lambda: developed("pipe", re_tau=re_tau, **closing), 5)
    print(f"batch, re_tau given: {re_tau.size / batch:.3g} cases per second")
    re = np.geomspace(1e4, 1e9, 5_000)
    batch = median(lambda: developed("pipe", reynolds=re, **closing), 3)
    print(f"batch, Re given: {re.size / batch:.3g} cases per second")
    family = FlowFamily("pipe", **closing)
    many = 10 ** np.random.default_rng(0).uniform(4, 9, 1_000_000)
    family.darcy_friction(many)
    seconds = median(lambda: family.darcy_friction(many), 7)
    few = many[:2000]
    error = np.abs(
        family.darcy_friction(few) / developed("pipe", reynolds=few, **closing).darcy_friction - 1
    ).max()
    print(
        f"interpolated family, Re given: {many.size / seconds:.3g} cases per second, error {error:.1e}"
    )


if __name__ == "__main__":
    main()
