"""A smooth function of a positive number by polynomials on even parts of each octave.

The place of a number in the table is read off its own bits, so that neither a logarithm nor an
exponential is needed and the local coordinate is exact: what remains is one rounding of the value
at the left edge of the part and the small error of a short polynomial.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from walllaw.arrays import Floats
from walllaw.panels import gauss

_BITS = 5  # of the fraction of a double: 32 parts an octave
_NODES = 6  # of the derivative in each part; the polynomial has one degree more
_SHIFT = 52 - _BITS
_REST = np.int64((1 << _SHIFT) - 1)
_CHECKS = np.array([0.4, 0.95])  # where a part is compared with the function, in its widths
_SMOOTH = 1.5e-15  # relative: somewhat above the rounding of laws of the wall, far below a kink
_ONE = np.int64(1023 << 52)  # the bits of 1.0, whose exponent is stored as 1023

Kernel = Callable[[Floats], Floats]


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class OctaveTable:
    """Polynomials from 2^low to 2^high.

    Examples
    --------
    >>> table = OctaveTable.of(np.sqrt, lambda x: 0.5 / np.sqrt(x), -4, 4)
    >>> float(table(np.array([2.0]))[0]) == 2.0**0.5
    True
    """

    low: int
    high: int
    columns: tuple[Floats, ...]
    kinks: NDArray[np.bool_]
    clear: float = 0.0  # from here on there are none

    @classmethod
    def of(cls, value: Kernel, slope: Kernel, low: int, high: int) -> OctaveTable:
        """Return the table of a function and its derivative, both of flat positive arrays.

        Parts that miss the function at a few places between, since it has a kink there, are marked.
        """
        size = np.exp2(np.arange(low, high, dtype=np.float64) - _BITS)[:, np.newaxis]
        parts = np.arange(1 << _BITS, 2 << _BITS, dtype=np.float64)
        left = (size * parts).reshape(-1, 1)
        width = np.repeat(size, 1 << _BITS, axis=0)
        x, _ = gauss(_NODES)
        rates = width * slope((left + width * x).reshape(-1)).reshape(left.size, _NODES)
        powers = np.vander(x, increasing=True)
        terms = np.linalg.solve(powers, rates.T)  # of the derivative, in parts of the width
        rises = [t / j * 2.0 ** (_BITS * j) for j, t in enumerate(terms, start=1)]
        polynomials = (np.ascontiguousarray(value(left.reshape(-1))), *rises)
        table = cls(low, high, polynomials, np.zeros(left.size, dtype=np.bool_))
        places = (left + width * _CHECKS).reshape(-1)
        miss = np.abs(table(places) / value(places) - 1.0).reshape(left.size, _CHECKS.size)
        kinks = ~(miss.max(axis=1) <= _SMOOTH)
        clear = float((left + width)[kinks].max(initial=0.0))
        return cls(low, high, polynomials, kinks, clear)

    def _place(self, bits: NDArray[np.int64]) -> NDArray[np.int64]:
        place = bits >> _SHIFT
        place -= (self.low + 1023) << _BITS
        return place

    def kinked(self, x: Floats) -> NDArray[np.bool_] | None:
        """Return where x lies in a part with a kink; nothing if all of x lies beyond the last."""
        if x.size == 0 or x.min() >= self.clear:
            return None
        return np.take(self.kinks, self._place(x.view(np.int64)))

    def __call__(self, x: Floats) -> Floats:
        """Return the function at x, from 2^low to below 2^high."""
        bits = x.view(np.int64)
        place = self._place(bits)
        local = ((bits & _REST) | _ONE).view(np.float64)
        local -= 1.0  # exact: the part of the fraction below the left edge
        found = np.take(self.columns[-1], place)
        for column in self.columns[-2::-1]:
            found *= local
            found += np.take(column, place)
        return found
