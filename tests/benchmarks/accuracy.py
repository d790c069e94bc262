"""Accuracy of the wall laws against 50 digits: writes docs/accuracy.md.

Run as ``python tests/benchmarks/accuracy.py [points]``; the published figures are of 100000 points
for the closed forms. Errors are in units in the last place, divided by 1 + condition number.
"""

from __future__ import annotations

import pathlib
import sys

import mpmath
import numpy as np

import walllaw
from walllaw.relation import record

mpmath.mp.dps = 50
ROOT = pathlib.Path(__file__).parents[2]
K, B = mpmath.mpf(0.41), mpmath.mpf(5)


def spalding(order):
    def y(u):
        x = K * u
        return u + mpmath.exp(-K * B) * (
            mpmath.exp(x) - sum(x**j / mpmath.factorial(j) for j in range(order + 1))
        )

    return y


def reichardt(y):
    c = B - mpmath.log(K) / K
    return mpmath.log(1 + K * y) / K + c * (
        1 - mpmath.exp(-y / 11) - y / 11 * mpmath.exp(-mpmath.mpf(0.33) * y)
    )


def ulps(values, references, condition):
    return np.array([
        float(abs(mpmath.mpf(float(v)) - r) / mpmath.mpf(float(np.spacing(abs(float(r)))))) / (1 + c)
        for v, r, c in zip(values, references, condition, strict=True)
    ])  # fmt: skip


def polished(f, start):
    """50-digit root of f from a 15-digit start: two secant steps in the logarithm."""
    a = mpmath.mpf(float(start))
    b = a * (1 + mpmath.mpf(10) ** -14)
    for _ in range(3):
        fa, fb = f(a), f(b)
        if fa == fb:
            break
        a, b = b, b - fb * (b - a) / (fb - fa)
    return b


def by_residual(name, law, exact, y, re):
    """Yield u+(y+), y+(u+) and u+ of Re_y of a law known as u+(y+) to 50 digits.

    Roots are judged by their residual over the slope: to first order that is their error, and the
    second order is some 1e-30.
    """
    yield f"{name}: u+(y+)", ulps(law.u_plus(y), [exact(mpmath.mpf(t)) for t in y], 0 * y)
    u = law.u_plus(y)
    got, slope = law.y_plus(u), law.slope(y)
    true = [
        mpmath.mpf(g) - (exact(mpmath.mpf(g)) - mpmath.mpf(v)) / mpmath.mpf(s)
        for g, v, s in zip(got, u, slope, strict=True)
    ]
    yield f"{name}: y+(u+)", ulps(got, true, u / (y * slope))
    got = law.u_plus_of_re_y(re)
    rate = 1 + re / got * law.slope(re / got) / got
    true = [
        mpmath.mpf(g) * (1 + mpmath.log(exact(mpmath.mpf(r) / mpmath.mpf(g)) / mpmath.mpf(g)) / mpmath.mpf(s))
        for g, r, s in zip(got, re, rate, strict=True)
    ]  # fmt: skip
    yield f"{name}: u+ of Re_y", ulps(got, true, 0 * got)


def van_driest(y):
    """30-digit quadrature of the slope, in decades of y+."""

    def slope(t):
        length = K * t * -mpmath.expm1(-t / 26)
        return 2 / (1 + mpmath.sqrt(1 + 4 * length**2))

    edges = [mpmath.mpf(0), *(mpmath.mpf(10) ** j for j in range(-3, 12))]
    return mpmath.quad(slope, [p for p in edges if p < y] + [y])


def power(y):
    a, n = mpmath.mpf("8.3"), mpmath.mpf(1) / 7
    return y if y < a ** (1 / (1 - n)) else a * y**n


def rows(count: int):
    rng = np.random.default_rng(0)
    y = 10 ** rng.uniform(-8, 12, count)
    for order in (3, 4):
        law, exact = walllaw.Spalding(0.41, 5.0, order), spalding(order)
        u = 10 ** rng.uniform(-8, np.log10(72.0), count)
        condition = u / (law.y_plus(u) * law.slope(law.y_plus(u)))
        yield (
            f"Spalding, order {order}: y+(u+)",
            ulps(law.y_plus(u), [exact(mpmath.mpf(x)) for x in u], condition),
        )
        few = y[: count // 4]
        got = law.u_plus(few)
        yield f"Spalding, order {order}: u+(y+)", ulps(
            got, [polished(lambda x, t=t: mpmath.log(exact(x) / mpmath.mpf(t)), g) for t, g in zip(few, got, strict=True)],
            0 * few,
        )  # fmt: skip
        re = 10 ** rng.uniform(-12, 18, count // 4)
        got = law.u_plus_of_re_y(re)
        yield f"Spalding, order {order}: u+ of Re_y", ulps(
            got, [polished(lambda x, t=t: mpmath.log(x * exact(x) / mpmath.mpf(t)), g) for t, g in zip(re, got, strict=True)],
            0 * re,
        )  # fmt: skip
    re = 10 ** rng.uniform(-12, 18, count)
    yield from by_residual("Reichardt", walllaw.Reichardt(0.41, 5.0), reichardt, y, re)
    with record():
        yield from by_residual("Werner-Wengle", walllaw.PowerLaw(), power, y, re)
    log = walllaw.LogLaw(0.41, 5.0)
    re = 10 ** rng.uniform(2, 18, count // 2)
    with record():
        got = log.u_plus_of_re_y(re)
    yield "log law: u+ of Re_y", ulps(
        got, [polished(lambda x, t=t: x - mpmath.log(mpmath.mpf(t) / x) / K - B, g) for t, g in zip(re, got, strict=True)],
        0 * re,
    )  # fmt: skip
    with record():
        e = 10 ** rng.uniform(-9, -1, count // 2)
        re = 10 ** rng.uniform(np.log10(2300), 12, count // 2)
        f = walllaw.friction.colebrook(re, e)
    yield "Colebrook-White: f", ulps(f, [
        1 / polished(lambda x, r=r, q=q: x + 2 * mpmath.log10(mpmath.mpf(q) / mpmath.mpf("3.7") + mpmath.mpf("2.51") * x / mpmath.mpf(r)), v**-0.5) ** 2
        for r, q, v in zip(re, e, f, strict=True)
    ], 0 * re)  # fmt: skip
    few, re = 10 ** rng.uniform(-6, 8, 60), 10 ** rng.uniform(-12, 9, 60)
    yield from by_residual(
        "van Driest (60 points)", walllaw.VanDriest(0.41, 26.0), van_driest, few, re
    )


def main() -> None:
    count = int(sys.argv[1]) if len(sys.argv) > 1 else 2000
    lines = [
        "# Accuracy", "",
        f"Written by `tests/benchmarks/accuracy.py {count}`: largest, 99th percentile and median error against",
        "50-digit arithmetic, in units in the last place divided by 1 + condition number; random points, log-uniform",
        "over y+ 1e-8..1e12, Re_y 1e-12..1e18, Re 2300..1e12. Largest found, not a proof.", "",
        "| function | points | largest | 99 % | median |", "|---|---:|---:|---:|---:|",
    ]  # fmt: skip
    for name, errors in rows(count):
        lines.append(
            f"| {name} | {errors.size} | {errors.max():.2f} | {np.quantile(errors, 0.99):.2f} | {np.median(errors):.2f} |"
        )
        print(lines[-1], flush=True)
    if count >= 100_000:  # smaller runs are trials
        (ROOT / "docs" / "accuracy.md").write_text("\n".join(lines) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
