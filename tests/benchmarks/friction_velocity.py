"""Friction velocity from (U, y, nu): speed against SciPy's root finders in one run, and memory.

The rivals solve u+ y+ = Re_y for ln y+ with the law's own u+(y+); for Spalding's formula, whose
y+(u+) is explicit, they solve for ln u+ and never invert it. The loop of brentq evaluates plain
numbers with ``math`` for Spalding's formula.
"""

from __future__ import annotations

import math
import statistics
import time
import tracemalloc

import numpy as np
from scipy.optimize import brentq, elementwise

import walllaw
from walllaw.relation import record

N = 1_000_000
FEW, LOOP = 20_000, 500


def median(function, repeats: int) -> float:
    times = []
    for _ in range(repeats):
        start = time.perf_counter()
        function()
        times.append(time.perf_counter() - start)
    return statistics.median(times)


def spalding(t, target):
    """Residual in ln u+ of the third-order formula with kappa 0.41 and B 5."""
    u = np.exp(t)
    x = 0.41 * u
    rise = np.expm1(x) - x - 0.5 * x * x - x * x * x / 6.0
    return np.log(u + math.exp(-2.05) * rise) + t - target


def spalding_number(t, target):
    u = math.exp(t)
    x = 0.41 * u
    rise = math.expm1(x) - x - 0.5 * x * x - x * x * x / 6.0
    return math.log(u + math.exp(-2.05) * rise) + t - target


def rivals(law, logs):
    """Return a vectorised solver and a loop, each over its own number of points."""
    if isinstance(law, walllaw.Spalding):
        ends = np.full_like(logs, -20.0), np.full_like(logs, 6.5)
        return (
            lambda: elementwise.find_root(spalding, ends, args=(logs,)),
            lambda: [brentq(spalding_number, -20.0, 6.5, (t,), xtol=1e-15) for t in logs[:LOOP]],
        )

    def residual(t, target):
        return np.log(np.maximum(law._u(np.exp(t)), 1e-300)) + t - target

    def number(t, target):
        return float(residual(np.array([t]), target)[0])

    return (
        lambda: elementwise.find_root(residual, (0.5 * logs - 3.0, logs + 3.0), args=(logs,)),
        lambda: [brentq(number, 0.5 * t - 3, t + 8, (t,), xtol=1e-15) for t in logs[:LOOP]],
    )


def run() -> list[tuple[str, float, float, float]]:
    """Return (law, ns per point, ratio to elementwise.find_root, ratio to a brentq loop)."""
    rng = np.random.default_rng(0)
    rows = []
    for name, law, low in (
        ("Spalding", walllaw.Spalding(0.41, 5.0), -3), ("LogLaw", walllaw.LogLaw(0.41, 5.0), 2),
        ("Reichardt", walllaw.Reichardt(0.41, 5.0), -3), ("Musker", walllaw.Musker(0.41, 5.0), -3),
        ("VanDriest", walllaw.VanDriest(0.41, 26.0), -3),
    ):  # fmt: skip
        re = 10 ** rng.uniform(low, 12, N)
        library, loop = rivals(law, np.log(re[:FEW]))
        nu, distance = 1.5e-5, np.full(N, 1e-3)
        velocity = re * nu / distance
        with record():
            law.friction_velocity(1.0, 1e-3, nu)  # makes the tables
            ours = median(lambda: law.friction_velocity(velocity, distance, nu), 5) / N
        rows.append(
            (name, ours * 1e9, median(library, 3) / FEW / ours, median(loop, 3) / LOOP / ours)
        )
    return rows


def first_call() -> float:
    """Return the milliseconds that new constants cost once."""
    return 1e3 * median(
        lambda: walllaw.Spalding(0.41, 5.0 + time.perf_counter() % 1e-3).u_plus_of_re_y(1.0), 9
    )


def memory() -> float:
    """Return the largest extra memory of one call, in arrays of its length."""
    law, re = walllaw.Spalding(0.41, 5.0), np.full(N, 1e4)
    law.friction_velocity(re[:10], 1.0, 1.0)
    tracemalloc.start()
    law.friction_velocity(re, 1.0, 1.0)
    peak = tracemalloc.get_traced_memory()[1]
    tracemalloc.stop()
    return peak / re.nbytes


def main() -> None:
    for name, ns, library, loop in run():
        print(
            f"{name:12} {ns:8.1f} ns/point   find_root x{library:6.1f}   brentq loop x{loop:8.0f}"
        )
    print(f"new constants: {first_call():.1f} ms once;  extra memory: {memory():.2f} arrays")


if __name__ == "__main__":
    main()
