"""Conversion of a million points: blocks of products and roots against the formula in NumPy powers."""

from __future__ import annotations

import statistics
import time

import numpy as np

from closures.states import convert

N, REPEATS = 1_000_000, 25
NAMES = ("k", "epsilon", "omega", "nu_t")


def main() -> None:
    rng = np.random.default_rng(0)
    u, tu, length = rng.uniform(1, 100, N), rng.uniform(0.001, 0.2, N), 10 ** rng.uniform(-3, 0, N)
    out = {name: np.empty(N) for name in NAMES}

    def powers():
        k = 1.5 * (tu * u) ** 2
        epsilon = 0.09**0.75 * k**1.5 / length
        return k, epsilon, k**0.5 / (0.09**0.25 * length), 0.09 * k**2 / epsilon

    def blocks():
        return convert(NAMES, out=out, intensity=tu, velocity=u, mixing_length=length)

    def fresh():
        return convert(NAMES, intensity=tu, velocity=u, mixing_length=length)

    for name, values in zip(NAMES, powers(), strict=True):
        assert np.allclose(blocks()[name], values, rtol=1e-14)
    times: dict[str, list[float]] = {f.__name__: [] for f in (powers, blocks, fresh)}
    for _ in range(REPEATS):
        for f in (powers, blocks, fresh):
            start = time.perf_counter()
            f()
            times[f.__name__].append(time.perf_counter() - start)
    base = statistics.median(times["powers"])
    for name, values in times.items():
        print(
            f"{name:8} {statistics.median(values) * 1e3:8.2f} ms   {statistics.median(values) / base:.2f}"
        )


if __name__ == "__main__":
    main()
