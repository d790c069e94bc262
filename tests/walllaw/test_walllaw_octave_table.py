"""Tables over octaves, against the functions themselves."""

from __future__ import annotations

import numpy as np
import pytest
import scipy.special

from walllaw.octave_table import OctaveTable

RNG = np.random.default_rng(4)


@pytest.mark.parametrize(
    ("value", "slope"),
    [
        (np.cbrt, lambda x: 1.0 / (3.0 * np.cbrt(x * x))),
        (np.arctan, lambda x: 1.0 / (1.0 + x * x)),
        (
            lambda x: scipy.special.lambertw(x).real,
            lambda x: 1.0 / (x + np.exp(scipy.special.lambertw(x).real)),
        ),
    ],
)
def test_three_ulp_of_smooth_functions(value, slope):
    table = OctaveTable.of(value, slope, -40, 60)
    x = np.exp2(RNG.uniform(-40, 60, 200_000))
    assert table.kinked(x) is None
    assert np.max(np.abs(table(x) / value(x) - 1.0)) <= 3 * 2.22e-16


def test_edges_of_parts_are_exact_and_order_does_not_matter():
    table = OctaveTable.of(np.sqrt, lambda x: 0.5 / np.sqrt(x), 0, 2)
    edges = np.arange(32, 128) / 32.0
    edges = edges[(edges < 2.0) | (edges * 16.0 % 1.0 == 0.0)]
    assert np.array_equal(table(edges), np.sqrt(edges))
    x = RNG.uniform(1.0, 4.0, 1000)
    assert np.array_equal(table(np.ascontiguousarray(x[::-1])), table(x)[::-1])
    assert all(table(x[i : i + 1])[0] == table(x)[i] for i in range(50))


def test_a_kink_is_marked_and_nothing_else():
    def value(x):
        return np.where(x < 3.01, x, 3.01 + 0.5 * (x - 3.01))

    table = OctaveTable.of(value, lambda x: np.where(x < 3.01, 1.0, 0.5), -3, 8)
    assert table.kinks.sum() == 1
    assert table.kinked(np.array([2.9, 3.005, 3.2])).tolist() == [False, True, False]
