"""Arguments in, results out: every public function works on contiguous float64 arrays.

A single number takes the same path as an array of one, so that one case and a million cases give
the same bits. Work is done in blocks that fit the processor's cache.
"""

from __future__ import annotations

import math
import sys
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import ArrayLike, NDArray

from walllaw.errors import InputError

Floats = NDArray[np.float64]
FloatLike = ArrayLike
Result = float | Floats

BLOCK = 16384  # points; 8k to 64k perform alike, shorter and longer blocks lose


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class Interval:
    """The values an argument may take."""

    low: float = -np.inf
    high: float = np.inf
    open_low: bool = False
    open_high: bool = False

    def bad(self, values: Floats) -> NDArray[np.bool_]:
        """Return where values are not finite or not inside."""
        below = values <= self.low if self.open_low else values < self.low
        above = values >= self.high if self.open_high else values > self.high
        return below | above | ~np.isfinite(values)

    def holds(self, value: float) -> bool:
        """Return whether a single number is finite and inside."""
        above = value > self.low if self.open_low else value >= self.low
        below = value < self.high if self.open_high else value <= self.high
        return above and below and -np.inf < value < np.inf

    def __str__(self) -> str:
        if np.isinf(self.low) and np.isinf(self.high):
            return "a finite number"
        if np.isinf(self.high):
            return f"a finite number {'above' if self.open_low else 'of at least'} {self.low:g}"
        if np.isinf(self.low):
            return f"a finite number {'below' if self.open_high else 'of at most'} {self.high:g}"
        return (
            f"{'above' if self.open_low else 'from'} {self.low:g} "
            f"{'to below' if self.open_high else 'to'} {self.high:g}"
        )


FINITE = Interval()
POSITIVE = Interval(0.0, open_low=True)
NONNEGATIVE = Interval(0.0)
# quantities of a flow, in SI or in wall units: products and powers of a few of them stay doubles
AMOUNT = Interval(1e-30, 1e30)
AMOUNT_OR_ZERO = Interval(0.0, 1e30)
SIGNED = Interval(-1e30, 1e30)
# log laws whose exponentials stay doubles
KAPPA = Interval(0.01, 1.0)
INTERCEPT = Interval(-100.0, 100.0)


def _convert(name: str, value: FloatLike) -> Floats:
    # importing numpy.ma costs 8 ms; without it nobody can hold a masked array
    if "numpy.ma" in sys.modules and np.ma.isMaskedArray(value):
        raise InputError(name, "a masked array", "plain numbers")
    try:
        raw = np.asarray(value)
    except (ValueError, TypeError):
        raise InputError(name, type(value).__name__, "numbers in a regular array") from None
    if raw.dtype.kind not in "iuf":
        given = f"{raw.item()!r}"[:60] if raw.ndim == 0 else f"an array of {raw.dtype}"
        raise InputError(name, given, "real numbers")
    return np.asarray(raw, dtype=np.float64, order="C")


def within(values: Floats, interval: Interval) -> bool:
    """Return whether all values are inside, by two passes over them (NaN is outside)."""
    return values.size == 0 or (
        interval.holds(float(values.min())) and interval.holds(float(values.max()))
    )


def check(name: str, value: FloatLike, interval: Interval = FINITE) -> Floats:
    """Return the value as float64 after testing it against an interval.

    Raises
    ------
    InputError
        Naming the argument, the first bad value, its index, how many are bad, and what is accepted.

    Examples
    --------
    >>> check("reynolds", [1e5, -2.0], POSITIVE)
    Traceback (most recent call last):
    walllaw.errors.InputError: reynolds: got -2 at index 1 (1 of 2 values); accepted: a finite ...
    """
    values = _convert(name, value)
    if within(values, interval):
        return values
    bad = interval.bad(values)
    if bad.any():
        index = np.unravel_index(int(np.argmax(bad)), bad.shape) if values.ndim else ()
        given = f"{values[index]:.6g}"
        if values.ndim:
            place = ", ".join(str(int(i)) for i in index)
            given += f" at index {place} ({int(bad.sum())} of {bad.size} values)"
        raise InputError(name, given, str(interval))
    return values


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class Shape:
    """How a result goes back to the shape its arguments had."""

    dims: tuple[int, ...]

    @property
    def size(self) -> int:
        """Number of points."""
        return math.prod(self.dims)

    def __call__(self, values: Floats) -> Any:
        """Return a float for scalar arguments, else an array of the broadcast shape."""
        if self.dims == ():
            return float(values[0])
        return np.broadcast_to(values, self.size).reshape(self.dims)


def columns(
    defer: bool = False, /, **arguments: tuple[FloatLike, Interval]
) -> tuple[Shape, list[Floats]]:
    """Check and flatten arguments that broadcast against each other.

    Parameters
    ----------
    defer : bool, optional
        Leave the test of arrays to the caller, who goes through them in blocks anyway.
    **arguments : (value, Interval)
        Each argument by name, with the values it may take.

    Returns
    -------
    shape : Shape
        Puts a flat result back into the broadcast shape.
    flat : list of ndarray
        One contiguous float64 array of one dimension for each argument: of length 1 if the
        argument is a single number, else of the full broadcast length.

    Raises
    ------
    InputError
        If a value is outside its interval or the shapes do not fit together.

    Examples
    --------
    >>> shape, (a, b) = columns(a=(2.0, POSITIVE), b=([1.0, 3.0], POSITIVE))
    >>> shape(a * b)
    array([2., 6.])
    """
    checked = {
        name: _convert(name, value) if defer and np.ndim(value) else check(name, value, interval)
        for name, (value, interval) in arguments.items()
    }
    try:
        dims = np.broadcast_shapes(*(values.shape for values in checked.values()))
    except ValueError:
        shapes = ", ".join(f"{name} {values.shape}" for name, values in checked.items())
        raise InputError("shapes", shapes, "shapes that broadcast together") from None
    flat = [
        values.reshape(1)
        if values.size == 1
        else np.ascontiguousarray(np.broadcast_to(values, dims)).reshape(-1)
        for values in checked.values()
    ]
    return Shape(dims), flat


def spread(values: Floats, size: int) -> Floats:
    """Return a flat array of the full length from one that may hold a single number."""
    return values if values.size == size else np.full(size, values[0])


def blocks(kernel: Callable[..., Floats], *arguments: Floats, out: Floats | None = None) -> Floats:
    """Evaluate a kernel of flat arrays block by block into one output array.

    Parameters
    ----------
    kernel : callable
        Takes the arguments (each of the block's length, or of length 1) and returns one array.
    *arguments : ndarray
        As :func:`columns` gives them.
    out : ndarray, optional
        Where to put the result.
    """
    size = max(values.size for values in arguments)
    if min(values.size for values in arguments) == 0:
        return np.empty(0)
    result = np.empty(size) if out is None else out
    for start in range(0, size, BLOCK):
        part = slice(start, start + BLOCK)
        result[part] = kernel(*(v if v.size == 1 else v[part] for v in arguments))
    return result
