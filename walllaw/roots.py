"""Roots that friction laws share: logarithmic laws to the last digits, inverse integer roots.

These are kernels: flat float64 arrays in and out, already checked by the caller.
"""

from __future__ import annotations

from fractions import Fraction
from functools import cache

import numpy as np

from walllaw.arrays import Floats
from walllaw.lambert import wright_omega

LN10 = 2.302585092994046
_LOG10_2 = Fraction("0.30102999566398119521373889472449302677")
_HEAD_BITS = 40  # leaves 13 bits for the binary exponent, which needs 11


@cache
def _octave(slope: float) -> tuple[float, float]:
    """Return slope log10(2) as a sum of two numbers, the first of 40 bits."""
    exact = Fraction(slope) * _LOG10_2
    scale = 2 ** (_HEAD_BITS - int(np.frexp(float(exact))[1]))
    head = float(Fraction(round(exact * scale), scale))
    return head, float(exact - Fraction(head))


def add_log10(x: Floats, slope: float, y: Floats) -> Floats:
    """Return x + slope log10(y) where the two nearly cancel, without the rounding of either.

    Notes
    -----
    With y = m 2^k the logarithm is k log10(2) + log10(m). The first product is exact in its head,
    so the sum keeps no rounding of a large logarithm.

    Examples
    --------
    >>> round(float(add_log10(np.array([3.0]), 2.0, np.array([0.1]))[0]), 12)
    1.0
    """
    head, tail = _octave(slope)
    m, k = np.frexp(y)
    low = m < 0.75  # 3/4 to 3/2 keeps the logarithm of the mantissa small
    m, k = np.where(low, 2.0 * m, m), np.where(low, k - 1, k)
    return (x + k * head) + (slope / LN10 * np.log(m) + k * tail)


def inverse_square(x: Floats, step: Floats) -> Floats:
    """Return 1/(x - step)^2 for a small step, without the rounding of the difference."""
    head = x - step
    tail = (x - head) - step
    f = 1.0 / (head * head)
    return f - 2.0 * f * (tail / head)


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
