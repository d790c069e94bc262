"""Roots that friction laws share: logarithmic laws to the last digits, inverse integer roots.

These are kernels: flat float64 arrays in and out, already checked by the caller.
"""

from __future__ import annotations

from collections.abc import Callable
from fractions import Fraction
from functools import cache

import numpy as np

from walllaw.arrays import Floats
from walllaw.lambert import wright_omega

LN10 = 2.302585092994046
_LN10 = Fraction("2.30258509299404568401799145468436420760")
_GRAIN = 1.5 * 2.0**36  # adding and taking it away rounds to a multiple of 2^-16
_HEAD_BITS = 26  # of a factor whose product with such a multiple is exact


@cache
def _inverse_slope(slope: float) -> tuple[float, float]:
    """Return ln(10)/slope as a sum of two numbers, the first of 26 bits after the point."""
    exact = _LN10 / Fraction(slope)
    head = float(Fraction(round(exact * 2**_HEAD_BITS), 2**_HEAD_BITS))
    return head, float(exact - Fraction(head))


def secant(
    miss: Callable[[Floats], Floats], start: Floats, slope: float = 1.0, rounds: int = 24
) -> Floats:
    """Return the roots of near-linear functions, one for each element, by the secant method.

    ``slope`` is that of the functions, roughly. An element that has converged stays as it is, so
    that its bits do not depend on its neighbours.

    Examples
    --------
    >>> secant(lambda x: x * x - np.array([2.0, 9.0]), np.array([1.0, 2.0]))
    array([1.41421356, 3.        ])
    """
    a, fa = start, miss(start)
    step = np.clip(fa / slope, -1.0, 1.0)
    b = a - np.where(np.abs(step) < 1e-6, 1e-6, step)  # apart, for a difference that counts
    fb = miss(b)
    active = np.ones(b.shape, dtype=bool)
    for _ in range(rounds):
        change = fb - fa
        step = fb * (b - a) / np.where(change == 0.0, 1.0, change)
        step = np.clip(np.where((change != 0.0) & active, step, 0.0), -1.0, 1.0)
        a, fa, b = np.where(active, b, a), np.where(active, fb, fa), b - step
        # the error after a step is near the product of the last two: below 1e-15
        active &= np.abs(step) > 1e-9
        if not active.any():
            break
        fb = np.where(active, miss(b), fb)
    return b


def add_log10(x: Floats, slope: float, y: Floats) -> Floats:
    r"""Return x + slope log10(y) where the two nearly cancel, without the rounding of either.

    Notes
    -----
    With x = t + d, t of few bits, the sum is d + (slope/ln 10) ln(y exp(t ln(10)/slope)): the
    product t ln(10)/slope is exact in its head up to \|x\| = 1024, and the logarithm is that of a
    number near 1.

    Examples
    --------
    >>> round(float(add_log10(np.array([3.0]), 2.0, np.array([0.1]))[0]), 12)
    1.0
    """
    head, tail = _inverse_slope(slope)
    # worked in place: on whole blocks a new array costs as much as the arithmetic
    short = x + _GRAIN
    short -= _GRAIN
    near_one = short * head
    np.exp(near_one, out=near_one)
    near_one *= y
    total = np.log(near_one, out=near_one)
    rest = x - short
    short *= tail
    total += short
    total *= slope / LN10
    total += rest
    return total


def inverse_square(x: Floats, step: Floats) -> Floats:
    """Return 1/(x - step)^2 for a small step, without the rounding of the difference."""
    head = x - step
    tail = x - head
    tail -= step
    f = head * head
    np.divide(1.0, f, out=f)
    tail /= head
    tail *= 2.0 * f
    f -= tail
    return f


def log_law_root(reynolds: Floats, slope: float, intercept: float, power: float = 1.0) -> Floats:
    """Return the root x of x = slope log10(Re/x^power) + intercept, to a few units of rounding.

    Parameters
    ----------
    reynolds : ndarray, at least one dimension
        Positive [1].
    slope, intercept : float
        Of the law in decimal logarithms [1].
    power : float, optional
        Of x inside the logarithm [1]: 1 when x is 1/sqrt(f) and the argument is Re sqrt(f), 2 when
        the argument is Re f.

    Returns
    -------
    ndarray
        x [1].

    Notes
    -----
    With c = power slope/ln 10 and x = c w the law is w + ln w = z with
    z = ln(Re)/power + intercept/c - ln c: the Wright omega function, defined for every z.

    Examples
    --------
    >>> log_law_root(np.array([1e5]), 2.0, -0.8) ** -2.0
    array([0.01799259])
    """
    c = power * slope / LN10
    return np.asarray(c * wright_omega(np.log(reynolds) / power + (intercept / c - np.log(c))))


def log_law_friction(
    reynolds: Floats, slope: float, intercept: float, power: float = 1.0
) -> Floats:
    """Return the friction coefficient 1/x^2 of the law of :func:`log_law_root`.

    Notes
    -----
    One Newton step, with the residual summed by :func:`add_log10`, takes out what the rounding of
    a large logarithm left in the closed form. The power is 1 or 2.

    Examples
    --------
    >>> log_law_friction(np.array([1e5]), 2.0, -0.8)
    array([0.01799259])
    """
    x = log_law_root(reynolds, slope, intercept, power)
    inside = x / reynolds if power == 1.0 else x * (x / reynolds)
    residual = add_log10(x, slope, inside) - intercept
    return inverse_square(x, residual / (1.0 + power * slope / LN10 / x))


def inverse_root(values: Floats, degree: int) -> Floats:
    """Return values^(-1/degree) of positive values.

    Notes
    -----
    One Newton step after the library's power takes out the rounding of the exponent, which would
    cost ln(values)/degree units in the last place. Measured against 50 digits, 1e-30 to 1e30,
    degrees 5 to 7: 1 ulp.

    Examples
    --------
    >>> inverse_root(np.array([32.0]), 5)
    array([0.5])
    """
    y = np.power(values, -1.0 / degree)
    product = values
    for _ in range(degree):
        product = product * y
    return y + y * (1.0 - product) / degree
