"""A whole layer stack from three of its five numbers, and the stacks of a grid family.

Use these through :mod:`walllaw.spacing`.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    FloatLike,
    Floats,
    Interval,
    Shape,
)
from walllaw.errors import InputError
from walllaw.geometric_layers import (
    finite,
    out_of_reach,
    refuse,
    stack_count,
    stack_first,
    stack_growth,
    stack_last,
    stack_total,
)
from walllaw.relation import relation

_COUNT = Interval(1.0, 1e12)
_NAMES = ("first", "growth", "count", "total", "last")
_WHOLE = 1e-9  # a count this close above a whole number is that number: rounding of the inputs


@dataclass(frozen=True, slots=True)
class Layers:
    """A layer stack; floats for one stack, arrays for many.

    Attributes
    ----------
    first, last, total : float or ndarray
        Heights of the first layer, of the last one and of the stack [m].
    growth : float or ndarray
        Ratio of successive heights [1].
    count : float or ndarray
        Number of layers, whole [1].
    exact_count : float or ndarray
        The real number before it was made whole; equal to ``count`` when that was given [1].
    """

    first: Any
    growth: Any
    count: Any
    total: Any
    last: Any
    exact_count: Any


def layers(
    first: FloatLike | None = None,
    growth: FloatLike | None = None,
    count: FloatLike | None = None,
    total: FloatLike | None = None,
    last: FloatLike | None = None,
    *,
    adjust: str | None = None,
) -> Layers:
    """Return a whole layer stack from exactly three of its five numbers.

    Parameters
    ----------
    first, growth, count, total, last : float or array, optional
        Height of the first layer [m], ratio of successive heights [1], number of layers [1],
        height of the stack [m], height of the last layer [m]: exactly three of them.
    adjust : str, optional
        When no count is given it is rounded up, and one of the three given numbers has to give
        way: this one. Default: growth, or last where growth was not given.

    Returns
    -------
    Layers
        All five, and the real count before rounding up.

    Raises
    ------
    InputError
        If not exactly three are given, a count is broken, or no stack can have the numbers.

    References
    ----------
    common practice

    Examples
    --------
    >>> stack = layers(first=1e-5, growth=1.2, total=0.01)
    >>> stack.count, round(stack.growth, 13), stack.total
    (30.0, 1.1916854289268, 0.01)
    >>> layers(first=1e-5, growth=1.2)
    Traceback (most recent call last):
    walllaw.errors.InputError: layers: got first, growth; accepted: exactly three of first, ...
    """
    values = dict(zip(_NAMES, (first, growth, count, total, last), strict=True))
    given = {name: value for name, value in values.items() if value is not None}
    if len(given) != 3:
        accepted = f"exactly three of {', '.join(_NAMES)}"
        raise InputError("layers", ", ".join(given) or "nothing", accepted)
    checked: dict[str, Any] = {
        name: (value, _COUNT if name == "count" else AMOUNT) for name, value in given.items()
    }
    shape, flat = arrays.columns(**checked)
    v = dict(zip(given, flat, strict=True))
    if "count" in v:
        refuse("count", v["count"], v["count"] != np.rint(v["count"]), "a whole number")
        if adjust is not None:
            raise InputError("adjust", repr(adjust), "nothing when the count is given")
        return _record(shape, _complete(v), v["count"])
    way = adjust if adjust is not None else "growth" if "growth" in v else "last"
    if way not in v:
        raise InputError("adjust", repr(way), ", ".join(v))
    exact = _real_count(v)
    kept = {name: value for name, value in v.items() if name != way}
    return _record(shape, _complete(kept | {"count": np.ceil(exact * (1.0 - _WHOLE))}), exact)


def grid_family(
    first: float, growth: float, count: float, *, levels: int = 4, factor: float | None = None
) -> Layers:
    """Return the layer stacks of a family of grids, from the given one on.

    Parameters
    ----------
    first : float
        Height of the first layer of the starting grid [m].
    growth : float
        Its ratio of successive heights [1].
    count : float
        Its number of layers [1].
    levels : int, optional
        How many grids, the given one included.
    factor : float, optional
        First height, and so y+, of a grid over that of the one before [1]; below 1 refines.
        Default 2/3, the step of the fourth drag-prediction workshop.

    Returns
    -------
    Layers
        One entry a grid: the same total height, first heights times the factor, counts divided by
        it (rounded up), growth solved.

    Raises
    ------
    InputError
        If an argument cannot be used or coarsening leaves fewer than two layers.

    References
    ----------
    aiaa-dpw4-2008

    Examples
    --------
    >>> family = grid_family(3e-6, 1.2, 30)
    >>> (family.first / family.first[0]).round(4)
    array([1.    , 0.6667, 0.4444, 0.2963])
    >>> family.count
    array([ 30.,  45.,  68., 102.])
    """
    c = relation("spacing", "grid_family")
    if isinstance(levels, bool) or not isinstance(levels, int) or levels < 1:
        raise InputError("levels", repr(levels), "a whole number of at least 1")
    shape, (h, g, n, f) = arrays.columns(
        first=(first, AMOUNT),
        growth=(growth, AMOUNT),
        count=(count, Interval(2.0, 1e12)),
        factor=(c["factor"] if factor is None else factor, AMOUNT),
    )
    if shape.dims != ():
        raise InputError("grid_family", "arrays", "single numbers")
    c.use(first=h, growth=g, count=n)
    with np.errstate(over="ignore"):
        scale = finite("levels", np.power(f, np.arange(float(levels))))
    counts = np.ceil(n / scale * (1.0 - _WHOLE))
    refuse("levels", counts, counts < 2.0, "levels that leave at least two layers")
    return layers(first=h * scale, count=counts, total=stack_total(h, g, n))


def _real_count(v: dict[str, Floats]) -> Floats:
    """Return the real number of layers of a stack given by three numbers other than the count."""
    if "last" not in v:
        first, growth, total = v["first"], v["growth"], v["total"]
        refuse("total", total, total < first, "at least the height of the first layer")
        short = out_of_reach(first, growth, total)
        refuse("growth", growth, short, "a ratio with which the layers reach the total")
        relation("spacing", "count").use(first=first, growth=growth, total=total)
        return stack_count(first, growth, total)
    last = v["last"]
    if "total" not in v:
        first, growth = v["first"], v["growth"]
        climb, rise = np.log(growth), np.log(last / first)
        refuse("growth", growth, climb == 0.0, "a growth other than 1, or the total instead")
        equal = np.ones(1)
    elif "growth" not in v:
        first, total = v["first"], v["total"]
        small = (total < first + last) | (total <= first) | (total <= last)
        refuse("total", total, small, "more than the first and the last layer")
        # last - first, once and exactly: the two sides cancel alike where layers are nearly equal
        step = last - first
        climb = _log_ratio(total - first, total - last, step)
        rise = _log_ratio(last, first, step)
        equal = total / last
    else:
        growth, total = v["growth"], v["total"]
        refuse("total", total, total < last, "at least the height of the last layer")
        drop = (growth - 1.0) * ((total - last) / last)
        refuse("total", total, drop >= 1.0, "a height that layers of this growth can have")
        climb, rise = np.log(growth), -np.log1p(-drop)
        equal = total / last
    relation("spacing", "count_to_last").use(last=last)
    level = climb == 0.0
    count = np.where(level, equal, 1.0 + rise / np.where(level, 1.0, climb))
    refuse("last", last, count < 1.0, "a last layer that the growth leads to")
    return count


def _log_ratio(top: Floats, base: Floats, difference: Floats) -> Floats:
    """Return ln(top/base), by their difference where they are near each other."""
    x = difference / base
    near = np.abs(x) < 0.5
    return np.where(near, np.log1p(np.where(near, x, 0.0)), np.log(top / base))


def _complete(v: dict[str, Floats]) -> dict[str, Floats]:
    """Return first, growth, count, total and last from a whole count and two others."""
    n = v["count"]
    match sorted(set(v) - {"count"}):
        case ["last", "total"]:  # the stack upside down: last layer first, growth inverted
            turned = _fill(v["last"], v["total"], n)
            growth, first = 1.0 / turned, stack_last(v["last"], turned, n)
        case ["first", "total"]:
            first, growth = v["first"], _fill(v["first"], v["total"], n)
        case ["first", "last"]:
            first, growth = v["first"], _climb(v["first"], v["last"], n)
        case ["growth", "total"]:
            growth, first = v["growth"], stack_first(v["total"], v["growth"], n)
        case ["growth", "last"]:
            growth, first = v["growth"], stack_last(v["last"], 1.0 / v["growth"], n)
        case _:
            first, growth = v["first"], v["growth"]
    relation("spacing", "total").use(first=first, growth=growth, count=n)
    found = {"first": first, "growth": growth, "count": n}
    found["total"] = v["total"] if "total" in v else stack_total(first, growth, n)
    found["last"] = v["last"] if "last" in v else stack_last(first, growth, n)
    return found


def _fill(first: Floats, total: Floats, n: Floats) -> Floats:
    """Return the growth with which n layers fill the total; 1 for a single layer."""
    one = n == 1.0
    refuse("total", total, one & (total != first), "the height of the first layer for one layer")
    refuse("total", total, ~one & (total <= first), "a height above that of one layer")
    return np.where(one, 1.0, stack_growth(first, np.where(one, 2.0 * first, total), n + one))


def _climb(first: Floats, last: Floats, n: Floats) -> Floats:
    """Return the growth that leads from the first layer to the last; 1 for a single layer."""
    one = n == 1.0
    refuse("last", last, one & (last != first), "the height of the first layer for one layer")
    with np.errstate(over="ignore"):
        ratio = finite("last", last / first)
    return np.where(one, 1.0, np.power(ratio, 1.0 / np.where(one, 1.0, n - 1.0)))


def _record(shape: Shape, v: dict[str, Floats], exact: Floats) -> Layers:
    return Layers(**{name: shape(v[name]) for name in _NAMES}, exact_count=shape(exact))
