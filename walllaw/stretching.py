"""Two-sided point distributions with given spacings at both ends, for grids between two walls.

Both map a uniform parameter to 0..1 by tanh; they differ in how the end spacings are met.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import Floats, Interval
from walllaw.errors import InputError

_STEPS = (
    60  # Newton steps from Vinokur's approximate inverses converge in 6; the rest costs nothing
)


def _count(count: int) -> int:
    if isinstance(count, bool) or not isinstance(count, (int, np.integer)) or count < 3:
        raise InputError("count", repr(count), "a whole number of at least 3 points")
    return int(count)


def _sinh_ratio(y: float) -> float:
    """Return d with sinh(d)/d = y for y >= 1, or sin(d)/d = y below, by Newton on its logarithm.

    The start is Vinokur's polynomial in y - 1 near 1 and his logarithm far from it.
    """
    if y == 1.0:
        return 0.0
    x = np.array([y])
    if y > 1.0:
        d = np.sqrt(6.0 * np.minimum(x - 1.0, 1.0)) + np.log(np.maximum(x, 1.0))
        for _ in range(_STEPS):
            d = np.maximum(
                d - (np.log(np.sinh(d) / d) - np.log(x)) / (1.0 / np.tanh(d) - 1.0 / d), 1e-9
            )
        return float(d[0])
    d = np.pi * (1.0 - x) ** 0.5 * 0.9 + 1e-9
    for _ in range(_STEPS):
        d = np.clip(
            d - (np.sin(d) / d - x) / ((d * np.cos(d) - np.sin(d)) / (d * d)), 1e-9, np.pi - 1e-9
        )
    return float(d[0])


def tanh_two_sided(count: int, first: float) -> Any:
    """Points from 0 to 1 by the hyperbolic tangent, with the same first spacing at both ends.

    Parameters
    ----------
    count : int
        Number of points, at least 3.
    first : float
        Distance of the second point from the wall as a share of the whole [1]; below 1/(count-1).

    Returns
    -------
    ndarray
        ``count`` rising points, symmetric about 1/2 [1].

    Raises
    ------
    InputError
        If the count is below 3 or no tanh distribution has that spacing.

    Notes
    -----
    s = (1 + tanh(d (2 t - 1))/tanh(d))/2 with d such that the first spacing is met exactly
    (bisection to neighbouring doubles).

    References
    ----------
    vinokur-1983

    Examples
    --------
    >>> p = tanh_two_sided(65, 1e-4)
    >>> float(p[0]), round(float(p[1]), 12), float(p[-1])
    (0.0, 0.0001, 1.0)
    """
    n = _count(count)
    limit = Interval(1e-300, 1.0 / (n - 1), open_high=True)
    h = float(arrays.check("first", first, limit))
    low, high = 1e-8, 400.0
    for _ in range(120):
        d = 0.5 * (low + high)
        low, high = (d, high) if float(_tanh(np.array([1.0 / (n - 1)]), d)[0]) > h else (low, d)
    points = _tanh(np.arange(n) / (n - 1), 0.5 * (low + high))
    points[-1] = 1.0
    half = (n + 1) // 2
    points[n - half :] = 1.0 - points[:half][::-1]
    return points


def _tanh(t: Floats, d: float) -> Floats:
    """(1 + tanh(d (2t-1))/tanh(d))/2, written without cancellation near the wall t = 0."""
    # = sinh(2 d t)/(2 sinh(d) cosh(d (2t - 1)))
    a, b = 2.0 * d * t, d * np.abs(2.0 * t - 1.0)
    top = -np.expm1(-2.0 * a) * np.exp(a - b - d)
    bottom = -np.expm1(np.array([-2.0 * d])) * (1.0 + np.exp(-2.0 * b))
    return np.asarray(top / bottom)


def vinokur(count: int, first: float, last: float) -> Any:
    """Points from 0 to 1 with different spacings at the two ends, after Vinokur 1983.

    Parameters
    ----------
    count : int
        Number of points, at least 3.
    first, last : float
        Wanted spacings at 0 and at 1 as shares of the whole [1].

    Returns
    -------
    ndarray
        ``count`` rising points [1].

    Raises
    ------
    InputError
        If the count is below 3 or a spacing is not between 0 and 1.

    Notes
    -----
    With A = sqrt(last/first), B = 1/((count-1) sqrt(first last)) and sinh(d)/d = B (sin below 1):
    u = 1/2 + tanh(d (t - 1/2))/(2 tanh(d/2)), s = u/(A + (1 - A) u). The slopes at the ends are met
    exactly; the finite spacings follow to second order in 1/count.

    References
    ----------
    vinokur-1983

    Examples
    --------
    >>> p = vinokur(201, 1e-4, 1e-2)
    >>> f"{p[1]:.2e} {1 - p[-2]:.2e}"
    '1.02e-04 1.01e-02'
    """
    n = _count(count)
    inside = Interval(1e-300, 1.0, open_high=True)
    h0, h1 = (float(arrays.check(k, v, inside)) for k, v in (("first", first), ("last", last)))
    a = float(np.sqrt(np.array([h1 / h0]))[0])
    b = 1.0 / ((n - 1) * float(np.sqrt(np.array([h0 * h1]))[0]))
    t = np.arange(n) / (n - 1)
    d = _sinh_ratio(b)
    if d < 1e-6:
        u = t
    elif b > 1.0:
        u = _tanh(t, 0.5 * d)
    else:
        u = 0.5 * (1.0 + np.tan(d * (t - 0.5)) / np.tan(0.5 * d))
    points = u / (a + (1.0 - a) * u)
    points[0], points[-1] = 0.0, 1.0
    return points
