"""Accuracy of the Colebrook-White root over a million points, and its speed as ratios of one run.

Accuracy: every point is compared with a root in the processor's extended precision (64-bit
mantissa, error about 0.002 units in the last place of a double), which is itself compared with 50
digits on a sample; the ten worst points and points searched around them are then settled with 50
digits. That finds the largest error of this sample; it does not prove that no larger one exists.

Speed: time per point against loops over scipy.optimize.brentq (the law as printed, and in the
better variable) and against the vectorised
functions of the fluids library, alternating in the same process. Only the ratios are worth
quoting.

Run as ``python tests/benchmarks/colebrook.py [points]``.
"""

from __future__ import annotations

import math
import sys
import time
from collections.abc import Callable

import numpy as np

from walllaw import friction
from walllaw.relation import record

Array = np.ndarray
TARGETS = {"brentq loop on f": 500.0, "fluids.vectorized.Colebrook": 15.0}


def sample(count: int, seed: int = 0) -> tuple[Array, Array]:
    """Reynolds numbers 2300 to 1e12 and roughness 0 to 0.1, log-uniform, 15 % of it smooth."""
    rng = np.random.default_rng(seed)
    re = 10.0 ** rng.uniform(np.log10(2300.0), 12.0, count)
    rr = np.where(rng.random(count) < 0.15, 0.0, 10.0 ** rng.uniform(-12.0, -1.0, count))
    return np.maximum(re, 2300.0), rr


def root(re: Array, rr: Array) -> Array:
    with record():  # no range warnings
        return friction.colebrook(re, rr)


def extended(re: Array, rr: Array, start: Array) -> Array:
    """Root in extended precision by three Newton steps from a double that is close."""
    wide = np.longdouble
    a, b = rr.astype(wide) / wide("3.7"), wide("2.51") / re.astype(wide)
    x = 1 / np.sqrt(start.astype(wide))
    slope = 2 / np.log(wide(10))
    for _ in range(3):
        y = a + b * x
        x = x - (x + slope * np.log(y)) / (1 + slope * b / y)
    return 1 / (x * x)


def settled(re: float, rr: float, value: float) -> float:
    """Error of one value in units in the last place, by 50 digits."""
    import mpmath

    with mpmath.workdps(50):
        a = mpmath.mpf(rr) / mpmath.mpf("3.7")
        b = mpmath.mpf("2.51") / mpmath.mpf(re)
        x = 1 / mpmath.sqrt(mpmath.mpf(value))
        for _ in range(5):
            y = a + b * x
            x -= (x + 2 * mpmath.log10(y)) / (1 + 2 / mpmath.log(10) * b / y)
        exact = 1 / x**2
        return float(abs(mpmath.mpf(value) - exact) / mpmath.mpf(float(np.spacing(float(exact)))))


def errors(re: Array, rr: Array) -> tuple[Array, Array]:
    f = root(re, rr)
    exact = extended(re, rr, f)
    return f, np.asarray(abs(f - exact) / np.spacing(exact.astype(float)), dtype=float)


def accuracy(count: int) -> float:
    """Print the error statistics; return the largest error found and settled."""
    if np.finfo(np.longdouble).nmant < 63:
        print("accuracy: no extended precision on this processor; see the unit tests instead")
        return math.nan
    re, rr = sample(count)
    f, ulp = errors(re, rr)
    probe = np.linspace(0, count - 1, 300).astype(int)
    check = [settled(float(re[i]), float(rr[i]), float(f[i])) for i in probe]
    gap = float(np.max(np.abs(np.array(check) - ulp[probe])))
    print(f"accuracy over {count} points, Re 2300 to 1e12, roughness 0 to 0.1")
    print(
        f"  median {np.median(ulp):.3f}, 99 % {np.quantile(ulp, 0.99):.3f}, max {ulp.max():.3f} ulp"
    )
    print(f"  extended precision against 50 digits on {probe.size} points: {gap:.4f} ulp apart")
    order = np.argsort(ulp)[-10:]
    best_re, best_rr = re[order], rr[order]
    rng = np.random.default_rng(1)
    for turn in range(20):
        width = 10.0 ** (-1.0 - 0.6 * turn)
        near_re = np.repeat(best_re, 2000) * (1.0 + width * rng.standard_normal(20000))
        near_rr = np.repeat(best_rr, 2000) * (1.0 + width * rng.standard_normal(20000))
        near_re = np.clip(np.append(near_re, best_re), 2300.0, 1e12)
        near_rr = np.clip(np.append(near_rr, best_rr), 0.0, 0.1)
        _, near = errors(near_re, near_rr)
        keep = np.argsort(near)[-10:]
        best_re, best_rr = near_re[keep], near_rr[keep]
    f = root(best_re, best_rr)
    worst = [settled(*map(float, point)) for point in zip(best_re, best_rr, f, strict=True)]
    i = int(np.argmax(worst))
    print(f"  search round the ten worst (400000 points): {worst[i]:.3f} ulp by 50 digits at")
    print(f"  Re = {float(best_re[i])!r}, roughness = {float(best_rr[i])!r}")
    return worst[i]


def brentq_on_f(re: Array, rr: Array) -> Array:
    """The law as it is printed, solved for f point by point."""
    from scipy.optimize import brentq

    def residual(f: float, r: float, e: float) -> float:
        x = 1.0 / math.sqrt(f)
        return x + 2.0 * math.log10(e / 3.7 + 2.51 * x / r)

    return np.array(
        [
            brentq(residual, 1e-4, 1.0, args=point, xtol=1e-15)
            for point in zip(re.tolist(), rr.tolist(), strict=True)
        ]
    )


def brentq_on_root(re: Array, rr: Array) -> Array:
    """The same loop in the better variable 1/sqrt(f), constants taken out."""
    from scipy.optimize import brentq

    def residual(x: float, a: float, b: float) -> float:
        return x + 2.0 * math.log10(a + b * x)

    return np.array(
        [
            brentq(residual, 1.0, 100.0, args=(e / 3.7, 2.51 / r), xtol=1e-14, rtol=1e-14) ** -2.0
            for r, e in zip(re.tolist(), rr.tolist(), strict=True)
        ]
    )


def per_point(work: Callable[[], object], count: int) -> float:
    start = time.perf_counter()
    work()
    return (time.perf_counter() - start) / count


def speed(count: int) -> dict[str, float]:
    """Print and return how many times longer each rival takes per point."""
    import fluids.vectorized

    re, rr = sample(count, seed=2)
    few, some = slice(0, 2000), slice(0, 20000)
    rivals: dict[str, tuple[Callable[[], object], int]] = {
        "brentq loop on f": (lambda: brentq_on_f(re[few], rr[few]), 2000),
        "brentq loop on 1/sqrt(f)": (lambda: brentq_on_root(re[few], rr[few]), 2000),
        "fluids.vectorized.Colebrook": (
            lambda: fluids.vectorized.Colebrook(re[some], rr[some]),
            20000,
        ),
        "fluids.vectorized.friction_factor": (
            lambda: fluids.vectorized.friction_factor(re[some], rr[some]),
            20000,
        ),
    }
    mine = {"colebrook": (lambda: root(re, rr), count)}
    times: dict[str, list[float]] = {name: [] for name in [*mine, *rivals]}
    for _ in range(7):
        for name, (work, points) in (mine | rivals).items():
            times[name].append(per_point(work, points))
    middle = {name: float(np.median(values)) for name, values in times.items()}
    print(
        f"speed, median of 7 alternating runs: colebrook {middle['colebrook'] * 1e9:.1f} ns/point"
    )
    ratios = {name: middle[name] / middle["colebrook"] for name in rivals}
    for name, ratio in ratios.items():
        target = f" (target {TARGETS[name]:.0f})" if name in TARGETS else ""
        print(f"  {name}: {ratio:.0f} times the time per point{target}")
    return ratios


def main(arguments: list[str]) -> int:
    count = int(arguments[0]) if arguments else 1_000_000
    worst = accuracy(count)
    ratios = speed(count)
    met = not worst > 4.0 and all(ratios[name] >= target for name, target in TARGETS.items())
    print("targets met" if met else "targets MISSED")
    return 0 if met else 1


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
