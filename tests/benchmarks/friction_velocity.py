"""Friction velocity from (U, y, nu): speed against SciPy's root finders in one run, and memory."""

from __future__ import annotations

import statistics
import time
import tracemalloc

import numpy as np
from scipy.optimize import brentq, elementwise

import walllaw

N = 1_000_000


def median(function, repeats: int) -> float:
    times = []
    for _ in range(repeats):
        start = time.perf_counter()
        function()
        times.append(time.perf_counter() - start)
    return statistics.median(times)


def run() -> list[tuple[str, float, float, float]]:
    """Return (law, ns per point, ratio to elementwise.find_root, ratio to a brentq loop)."""
    rng = np.random.default_rng(0)
    re = 10 ** rng.uniform(-3, 12, N)
    rows = []
    for name, law in (
        ("Spalding", walllaw.Spalding(0.41, 5.0)), ("LogLaw", walllaw.LogLaw(0.41, 5.0)),
        ("Reichardt", walllaw.Reichardt(0.41, 5.0)), ("Musker", walllaw.Musker(0.41, 5.0)),
        ("VanDriest", walllaw.VanDriest(0.41, 26.0)),
    ):  # fmt: skip
        few = re[:20_000] if name != "LogLaw" else 10 ** rng.uniform(2, 12, 20_000)
        logs = np.log(few)

        def residual(t, target, law=law):
            y = np.exp(t)
            return np.log(np.maximum(law._u(y), 1e-300)) + t - target

        def library(logs=logs, residual=residual):
            return elementwise.find_root(residual, (0.5 * logs - 3.0, logs + 3.0), args=(logs,))

        def loop(logs=logs, residual=residual):
            for target in logs[:500]:
                brentq(
                    lambda t, target=target: float(residual(np.array([t]), target)[0]),
                    0.5 * target - 3,
                    target + 8,
                    xtol=1e-14,
                )

        whole = re if name != "VanDriest" else re[:200_000]
        ours = median(lambda law=law, whole=whole: law.u_plus_of_re_y(whole), 5) / whole.size
        rows.append(
            (name, ours * 1e9, median(library, 3) / few.size / ours, median(loop, 3) / 500 / ours)
        )
    return rows


def memory() -> float:
    """Return the largest extra memory of one call, in arrays of its length."""
    law, re = walllaw.Spalding(0.41, 5.0), np.full(N, 1e4)
    law.u_plus_of_re_y(re[:10])
    tracemalloc.start()
    law.u_plus_of_re_y(re)
    peak = tracemalloc.get_traced_memory()[1]
    tracemalloc.stop()
    return peak / re.nbytes


def main() -> None:
    for name, ns, library, loop in run():
        print(
            f"{name:12} {ns:8.1f} ns/point   find_root x{library:6.1f}   brentq loop x{loop:8.0f}"
        )
    print(f"extra memory: {memory():.2f} arrays")


if __name__ == "__main__":
    main()
