"""Starts of the equations that laws of the wall pose: tables over even steps, and a safe solver.

A table is built once for each law: its nodes are solved one by one until nothing moves any more,
inside a bracket, so that the start holds over the whole domain for any monotone law. Between the
nodes a cubic through values and slopes is good to about 1e-8 of the law's own scale; a Newton
step of the law itself then reaches rounding.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from walllaw.arrays import Floats

STEP = 1.0 / 32.0  # of a table, in natural logarithms
_SMALL = 1e-6  # steps below are taken as they come: near the root, rounding decides their size

Residual = Callable[[Floats], tuple[Floats, Floats]]


def safe_root(residual: Residual, low: Floats, high: Floats, start: Floats, steps: int) -> Floats:
    """Return the root of a rising function by Newton steps inside a bracket, a fixed number.

    Parameters
    ----------
    residual : callable
        Takes t and returns f(t), rising through zero between low and high, and its slope.
    low, high, start : ndarray
        Bracket and first value of t.
    steps : int
        A Newton step that leaves the bracket, or is longer than half the one before, becomes a
        bisection.

    Examples
    --------
    >>> edge = np.array([0.0]), np.array([3.0])
    >>> safe_root(lambda t: (t * t - 2.0, 2.0 * t), *edge, np.array([3.0]), 12)
    array([1.41421356])
    """
    t, before = start, high - low
    for _ in range(steps):
        f, slope = residual(t)
        low, high = np.where(f <= 0.0, t, low), np.where(f <= 0.0, high, t)
        step = -f / np.maximum(slope, 1e-300)
        tame = np.abs(step) <= np.maximum(0.5 * np.abs(before), _SMALL)
        # the margin keeps rounding at the root from being taken for a step out of the bracket
        inside = (t + step > low - _SMALL) & (t + step < high + _SMALL)
        before = np.where(tame & inside, step, 0.5 * (low + high) - t)
        t = t + before
    return t


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class StartTable:
    """A smooth function by cubics over even steps; straight beyond its ends.

    Examples
    --------
    >>> x = np.arange(33) * STEP
    >>> table = StartTable.of(0.0, np.exp(x), np.exp(x))
    >>> np.abs(table(np.array([0.51])) - np.exp(0.51)) < 1e-8
    array([ True])
    """

    low: float
    count: int
    coefficients: tuple[Floats, Floats, Floats, Floats]
    ends: tuple[float, float]

    @classmethod
    def of(cls, low: float, value: Floats, slope: Floats) -> StartTable:
        """Return the table from values and slopes at low, low + STEP, ..."""
        d0, d1, rise = STEP * slope[:-1], STEP * slope[1:], np.diff(value)
        cubics = (value[:-1], d0, 3.0 * rise - 2.0 * d0 - d1, d0 + d1 - 2.0 * rise)
        return cls(low, value.size - 1, cubics, (float(slope[0]), float(slope[-1])))

    def __call__(self, x: Floats) -> Floats:
        """Return the function at x."""
        # worked in place: on whole blocks a new array costs as much as the arithmetic
        s = x - self.low
        s *= 1.0 / STEP
        inside = np.maximum(s, 0.0)
        np.minimum(inside, self.count - 1e-9, out=inside)
        place = inside.astype(np.int64)
        f = inside - place
        a, b, c, d = self.coefficients
        value = np.take(d, place)
        for column in (c, b, a):
            value *= f
            value += np.take(column, place)
        s -= inside
        if s.any():
            value += STEP * s * np.where(s < 0.0, *self.ends)
        return np.asarray(value)


def nodes(low: float, high: float) -> Floats:
    """Return the places of a table's nodes."""
    return np.asarray(low + STEP * np.arange(np.ceil((high - low) / STEP) + 1.0))
