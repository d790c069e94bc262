"""Sums of a geometric series and their inverses: the arithmetic under a layer stack.

Kernels of flat float64 arrays, already checked by the caller; exact on both sides of growth 1 and
at 1 itself. h is the first layer, g the growth, n the count, t the total. A result that leaves
double precision is refused.
"""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from walllaw import arrays
from walllaw.arrays import POSITIVE, Floats
from walllaw.errors import InputError

_TINY = 1e-300  # stands for ln g = 0 where a quotient of two vanishing terms has a limit
# Newton steps for ln g. The function is increasing and convex, so that from the second step on they
# only descend to the root. Of 4e5 random stacks (count 2 to 1e6, total/first - 1 from 1e-12 to
# 1e300) none moved by more than 1e-9 of ln g in the fourth step; the fifth is in hand.
_STEPS = 5


def finite(name: str, values: Floats) -> Floats:
    """Return the values, or refuse them when one has left the range of doubles."""
    if not arrays.within(values, POSITIVE):
        raise InputError(name, "", "", "the result is beyond double precision")
    return values


def refuse(name: str, values: Floats, bad: NDArray[np.bool_], want: str) -> None:
    """Raise for the first bad value, with how many there are."""
    if bad.any():
        value = float(values[min(int(np.argmax(bad)), values.size - 1)])
        raise InputError(name, f"{value:.6g} ({int(bad.sum())} of {bad.size} values)", want)


def series_sum(g: Floats, n: Floats) -> Floats:
    """Return (g^n - 1)/(g - 1), the height of n layers over the first one.

    Near g^n = 1 the numerator is expm1(n ln g), elsewhere the power itself: the first does not
    cancel, the second does not carry the rounding of n ln g.
    """
    with np.errstate(over="ignore"):
        x = g - 1.0
        exponent = n * np.log(g)
        near = np.expm1(np.clip(exponent, -1.0, 1.0))
        top = np.where(np.abs(exponent) < 0.5, near, np.power(g, n) - 1.0)
        level = x == 0.0
        return np.where(level, n, top / np.where(level, 1.0, x))


def stack_total(h: Floats, g: Floats, n: Floats) -> Floats:
    """Return the total height."""
    with np.errstate(over="ignore"):
        return finite("count", h * series_sum(g, n))


def stack_first(t: Floats, g: Floats, n: Floats) -> Floats:
    """Return the first height from the total."""
    return finite("count", t / series_sum(g, n))


def stack_last(h: Floats, g: Floats, n: Floats) -> Floats:
    """Return the last height."""
    with np.errstate(over="ignore"):
        return finite("count", h * np.power(g, n - 1.0))


def out_of_reach(h: Floats, g: Floats, t: Floats) -> NDArray[np.bool_]:
    """Return where shrinking layers never add up to the total."""
    with np.errstate(over="ignore"):
        return np.asarray((g - 1.0) * (t / h) <= -1.0)


def stack_count(h: Floats, g: Floats, t: Floats) -> Floats:
    """Return the real count, ln[1 + (g - 1) t/h]/ln g."""
    with np.errstate(over="ignore"):
        ratio = finite("total", t / h)
        x = g - 1.0
        level = x == 0.0
        top = np.log1p(np.where(level, 0.0, x) * ratio)
        return finite("total", np.where(level, ratio, top / np.where(level, 1.0, np.log(g))))


def stack_growth(h: Floats, t: Floats, n: Floats) -> Floats:
    """Return the growth for t > h, n >= 2: with l = ln g, l + ln S(l) = ln(t/h - 1).

    S is the sum of the n - 1 powers g^0 .. g^(n-2); its logarithm is convex in l, with slopes from
    0 to n - 2. A last step on the unlogged equation removes the rounding of the logarithms.
    """
    with np.errstate(over="ignore"):
        rest = finite("total", (t - h) / h)
    goal = np.log(rest)
    m = n - 1.0
    # upper bounds of the root: S >= 1, S >= exp((m-1) l), and the tangent at l = 0; far below g = 1
    # the endless series, which bounds it from below, is the nearer start
    above = np.minimum(np.minimum(goal, goal / m), 2.0 * np.log(rest / m) / n)
    ln_g = np.where(m > 2.0 * rest, -np.log1p(1.0 / rest), above)
    for _ in range(_STEPS):
        value, slope = _log_sum(ln_g, m)
        ln_g = ln_g - (ln_g + value - goal) / (1.0 + slope)
    g = np.exp(ln_g)
    return finite("total", g - g * (g * (series_sum(g, m) / rest) - 1.0) / (1.0 + slope))


def _log_sum(ln_g: Floats, m: Floats) -> tuple[Floats, Floats]:
    """Return ln of the sum of g^0 .. g^(m-1), and its derivative with respect to ln g."""
    a = np.maximum(np.abs(ln_g), _TINY)
    short, long = -np.expm1(-a), -np.expm1(-m * a)
    value = (m - 1.0) * np.maximum(ln_g, 0.0) + np.log(long / short)
    # d/da ln(long/short); both terms grow like 1/a near 0, so their difference is a series there
    series = -(m - 1.0) / 2.0 + a * (m * m - 1.0) / 12.0
    small = m * a < 1e-3  # the next term of the series is below 1e-8 of it: enough for a slope
    exact = m * (1.0 - long) / long - (1.0 - short) / short
    down = np.where(small, series, exact)
    return value, np.where(ln_g > 0.0, m - 1.0 + down, -down)
