"""Colebrook-White root: accuracy of a million points, speed against brentq and a general library."""

from __future__ import annotations

import statistics
import time

import fluids
import fluids.vectorized
import mpmath
import numpy as np
from scipy.optimize import brentq

from walllaw.friction import colebrook
from walllaw.relation import record

N = 1_000_000
mpmath.mp.dps = 50


def exact(re: float, rough: float, start: float) -> mpmath.mpf:
    """50-digit root of the law from a 16-digit start: two Newton steps."""
    a, b = mpmath.mpf(rough) / mpmath.mpf("3.7"), mpmath.mpf("2.51") / mpmath.mpf(re)
    x = 1 / mpmath.sqrt(mpmath.mpf(start))
    for _ in range(2):
        y = a + b * x
        x -= (x + 2 * mpmath.log10(y)) / (1 + 2 / mpmath.log(10) * b / y)
    return 1 / x**2


def extended(re: np.ndarray, rough: np.ndarray, start: np.ndarray) -> np.ndarray:
    """Root in 80-bit arithmetic for all points; its own error is below 0.01 ulp of a double."""
    a = rough.astype(np.longdouble) / (np.longdouble(37) / 10)
    b = (np.longdouble(251) / 100) / re.astype(np.longdouble)
    x = 1 / np.sqrt(start.astype(np.longdouble))
    c = 2 / np.log(np.longdouble(10))
    for _ in range(3):
        y = a + b * x
        x = x - (x + c * np.log(y)) / (1 + c * b / y)
    return 1 / (x * x)


def accuracy() -> None:
    rng = np.random.default_rng(1)
    re = 10 ** rng.uniform(np.log10(2300), 12, N)
    rough = np.where(rng.random(N) < 0.1, 0.0, 10 ** rng.uniform(-9, -1, N))
    with record():
        f = colebrook(re, rough)
    errors = np.abs(f - extended(re, rough, f)).astype(float) / np.spacing(f)
    print(
        f"a million points against 80-bit roots: largest {errors.max():.2f} ulp, median {np.median(errors):.2f}"
    )
    worst = np.argsort(errors)[-200:]
    with record():
        found = [
            float(
                abs(mpmath.mpf(f[i]) - exact(re[i], rough[i], f[i]))
                / mpmath.mpf(float(np.spacing(f[i])))
            )
            for i in worst
        ]
    print(f"the 200 worst of them against 50 digits: largest {max(found):.2f} ulp")


def speed() -> None:
    rng = np.random.default_rng(2)
    re, rough = 10 ** rng.uniform(3.6, 9, 200_000), 10 ** rng.uniform(-7, -1.2, 200_000)

    def loop(count: int = 2000) -> float:
        start = time.perf_counter()
        for r, e in zip(re[:count], rough[:count], strict=True):
            brentq(
                lambda x, r=r, e=e: x + 2 * np.log10(e / 3.7 + 2.51 * x / r), 1.0, 40.0, xtol=1e-14
            )
        return (time.perf_counter() - start) / count

    def library(function, count: int = 20_000) -> float:
        start = time.perf_counter()
        function(re[:count], rough[:count])
        return (time.perf_counter() - start) / count

    def ours() -> float:
        start = time.perf_counter()
        with record():
            colebrook(re, rough)
        return (time.perf_counter() - start) / re.size

    rows = {
        "brentq loop": loop,
        "fluids.vectorized.Colebrook": lambda: library(fluids.vectorized.Colebrook),
        "fluids.vectorized.friction_factor": lambda: library(fluids.vectorized.friction_factor),
        "walllaw.friction.colebrook": ours,
    }
    times = {name: statistics.median(f() for _ in range(7)) for name, f in rows.items()}
    base = times["walllaw.friction.colebrook"]
    for name, value in times.items():
        print(f"{name:36} {value * 1e9:10.1f} ns/point   {value / base:8.1f}")


if __name__ == "__main__":
    accuracy()
    speed()
