"""Smooth laws of the wall, from the wall to the log layer: Spalding, Reichardt, van Driest.

Accuracy figures in the docstrings are the largest error found against 50 digits over 1e4 points
from y+ = 1e-8 to 1e12 or Re_y = 1e-12 to 1e18, powers of ten and seams included, in units in the
last place divided by 1 + condition number.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from typing import ClassVar

import numpy as np

from walllaw.arrays import Floats, Interval
from walllaw.errors import InputError
from walllaw.law import Law, blend
from walllaw.log_layer import LogLayer, checked, exp, from_table, log
from walllaw.panels import Panels
from walllaw.relation import relation

_FAR = 40.0  # times A+: van Driest's damping has ended to the last digit (exp(-40) of a length)


@dataclass(frozen=True)
class Spalding(LogLayer):
    """Spalding's single formula, bracket to the third power by default (``order=4``: the original).

    Takes ``kappa``, one of ``B`` and ``E``, and ``order`` 3 or 4; kappa B from -1 to 6.

    Notes
    -----
    y+ = u+ + exp(-kappa B) [exp(kappa u+) - sum of (kappa u+)^j/j!, j = 0 to order]. Measured for
    0.41 and 5.0: y+ 0.9, u+ 1.3, u+ of Re_y 1.2, friction velocity 2.6, slope 2.5, eddy viscosity
    2.2, integral 2.3 ulp.

    References
    ----------
    spalding-1961

    Examples
    --------
    >>> law = Spalding(kappa=0.41, B=5.0, order=3)
    >>> round(law.y_plus(10.0), 10), round(law.u_plus(100.0), 10)
    (14.5505798517, 16.0771010741)
    """

    order: int = 3
    ROW: ClassVar[str] = "spalding"

    def __post_init__(self) -> None:
        super().__post_init__()
        if self.order not in (3, 4):
            raise InputError("order", repr(self.order), "3 or 4")
        # below, the bracket cancels; above, the two branches meet in a kink
        checked("kappa*B", self.kappa * self.B, Interval(-1.0, 6.0))

    def _terms(self, u: Floats) -> tuple[Floats, Floats]:
        """Return y+ - u+ and u+ d(y+ - u+)/du+.

        By expm1 and subtractions: what cancels near the wall is kappa exp(-kappa B) ulp of u+.
        """
        x = np.minimum(self.kappa * u, 500.0)
        scale = self._scale
        half = (0.5 * x) * x
        bracket = np.expm1(x)
        bracket -= x
        bracket -= half
        last = half * x
        last *= 1.0 / 3.0
        if self.order == 4:
            bracket -= last
            last *= x
            last *= 0.25
        rate = bracket * x
        rate *= scale
        bracket -= last
        bracket *= scale
        return bracket, rate

    @property
    def _scale(self) -> float:
        return exp(-self.kappa * self.B)

    def _tail(self, u: Floats, first: int) -> Floats:
        """Return exp(x) less its series up to x^(first - 1), for x = kappa u+; no cancellation."""
        x = np.minimum(self.kappa * u, 500.0)
        direct, term = np.expm1(x), np.ones_like(x)
        small, tail, power = np.minimum(x, 2.0), np.zeros_like(x), np.ones_like(x)
        for j in range(1, first):
            term, power = term * x / j, power * small / j
            direct = direct - term
        for j in range(26, first - 1, -1):  # 2^26/26! is below 1e-18 of the first term
            tail = (1.0 + tail) * small / j
        return np.where(x < 2.0, power * tail, direct)

    def _pair(self, p: Floats) -> tuple[Floats, Floats, Floats, Floats]:
        """Here p is u+, of which y+ is an explicit function."""
        bracket, rate = self._terms(p)
        bracket += p
        rate += p
        return bracket, p, rate, p

    def _guess(self, x: Floats, a: int, b: int) -> tuple[Floats, Floats, Floats]:
        size = np.exp(x)
        start = (
            self._start(size)
            if b
            else blend(size, np.maximum(np.log(size) / self.kappa + self.B, 3.0))
        )
        high = (0.5 if b else 1.0) * x + 0.1
        return np.full_like(x, -120.0), high, np.minimum(np.log(start), high)

    def _u(self, y: Floats) -> Floats:
        return self._solve(y, 1, 0)

    def _y(self, u: Floats) -> Floats:
        return u + self._terms(u)[0]

    def _u_of_re(self, re: Floats) -> Floats:
        return self._solve(re, 1, 1)

    def _rate_of_re(self, re: Floats) -> Floats:
        y, _, rise, _ = self._pair(self._u_of_re(re))
        return 1.0 / (y + rise)

    def _slope(self, y: Floats) -> Floats:
        u = self._u(y)
        return 1.0 / (1.0 + self._terms(u)[1] / u)

    def _eddy(self, y: Floats) -> Floats:
        return self.kappa * self._scale * self._tail(self._u(y), self.order)

    def _integral(self, y: Floats) -> Floats:
        """u+ y+ less the integral of y+ du+, which is the next higher bracket over kappa."""
        u = self._u(y)
        return u * y - (0.5 * u * u + self._scale / self.kappa * self._tail(u, self.order + 2))


@dataclass(frozen=True)
class Reichardt(LogLayer):
    """Reichardt's law of 1951.

    Takes ``kappa``, 0.2 to 1, and one of ``B`` and ``E``; B of at least ln(kappa)/kappa, which
    keeps the law monotone, and kappa B to 8.

    Notes
    -----
    ln(1 + kappa y+)/kappa + (B - ln(kappa)/kappa) [1 - exp(-y+/11) - (y+/11) exp(-0.33 y+)]. It
    leaves u+ = y+ at second order: 0.2 % at y+ = 0.1. Measured for 0.41 and 5.0: u+ 2.6, slope 3.6,
    y+ 1.5, u+ of Re_y 2.5, integral 8.2 ulp.

    References
    ----------
    reichardt-1951

    Examples
    --------
    >>> round(Reichardt(kappa=0.41, B=5.0).u_plus(100.0), 10)
    16.2900884436
    """

    ROW: ClassVar[str] = "reichardt"

    def __post_init__(self) -> None:
        super().__post_init__()
        checked("kappa", self.kappa, Interval(0.2, 1.0))
        checked("B", self.B, Interval(log(self.kappa) / self.kappa, 8.0 / self.kappa))

    @property
    def _C(self) -> float:
        return self.B - log(self.kappa) / self.kappa

    def _u(self, y: Floats) -> Floats:
        r = relation("laws", "reichardt")
        x = y / r["a"]
        buffer = -np.expm1(-x) - x * np.exp(-r["b"] * y)
        return np.log1p(self.kappa * y) / self.kappa + self._C * buffer

    def _buffer(self, y: Floats) -> Floats:
        """Return the slope of the bracket: exp(-y/a)/a - (1 - b y) exp(-b y)/a."""
        r = relation("laws", "reichardt")
        a, b = r["a"], r["b"]
        y = np.minimum(y, 1e3)  # nothing is left of it there
        return np.exp(-b * y) * (np.expm1((b - 1.0 / a) * y) + b * y) / a

    def _slope(self, y: Floats) -> Floats:
        return 1.0 / (1.0 + self.kappa * y) + self._C * self._buffer(y)

    def _eddy(self, y: Floats) -> Floats:
        x = self.kappa * y
        return (x / (1.0 + x) - self._C * self._buffer(y)) / self._slope(y)


@dataclass(frozen=True)
class VanDriest(Law):
    """van Driest's law: mixing length kappa y+ (1 - exp(-y+/A+)) under constant stress.

    Parameters
    ----------
    kappa, A_plus : float, optional
        von Karman constant, 0.2 to 1, and damping constant, 1 to 200 [1]: 0.41 and 26.

    Notes
    -----
    By Gauss-Legendre panels stretched towards the wall, and in closed form beyond y+ = 40 A+.
    Measured against 30-digit quadrature, 2500 points: u+ 3.4, integral 6.3 ulp; for the extremes
    of the constants (60 points each) 7 and 7 ulp. B to 1e-14.

    References
    ----------
    van-driest-1956

    Examples
    --------
    >>> law = VanDriest(kappa=0.41, A_plus=26.0)
    >>> round(law.u_plus(100.0), 9), round(law.B, 6)
    (16.527843221, 5.277081)
    """

    kappa: float = from_table("van_driest", "kappa")
    A_plus: float = from_table("van_driest", "A_plus")
    ROW: ClassVar[str] = "van_driest"

    def __post_init__(self) -> None:
        checked("kappa", self.kappa, Interval(0.2, 1.0))
        checked("A_plus", self.A_plus, Interval(1.0, 200.0))

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the log law that the profile approaches [1]."""
        # of the undamped length, and what the damping adds
        return _van_driest(self)[1] + (log(4.0 * self.kappa) - 1.0) / self.kappa

    @property
    def stretch(self) -> float:
        """Scale of y+ on which the slope bends near the wall [1]."""
        return 1.9 * float(np.sqrt(np.array([self.A_plus / self.kappa]))[0])

    def _undamped(self, y: Floats) -> Floats:
        """Return u+ of the length kappa y+: (asinh(x) - tanh(asinh(x)/2))/kappa, x = 2 kappa y+."""
        x = 2.0 * self.kappa * y
        return (np.arcsinh(x) - x / (1.0 + np.sqrt(1.0 + x * x))) / self.kappa

    def _slope(self, y: Floats) -> Floats:
        length = self.kappa * y * -np.expm1(-y / self.A_plus)
        return 2.0 / (1.0 + np.sqrt(1.0 + 4.0 * (length * length)))

    def _eddy(self, y: Floats) -> Floats:
        length = self._length(y)
        square = length * length
        return 2.0 * square / (1.0 + np.sqrt(1.0 + 4.0 * square))

    def _length(self, y: Floats) -> Floats:
        return self.kappa * y * -np.expm1(-y / self.A_plus)

    def _u(self, y: Floats) -> Floats:
        panels, added = _van_driest(self)
        far = _FAR * self.A_plus
        if y.min() > far:
            return self._undamped(y) + added
        # within 1e-5 of the wall u+ = y+ to the last digit, for all constants allowed
        near = np.where(y < 1e-5, y, panels(np.minimum(y, far)))
        return near if y.max() <= far else np.where(y > far, self._undamped(y) + added, near)


@lru_cache(maxsize=64)
def _van_driest(law: VanDriest) -> tuple[Panels, float]:
    """Return the integrator, and how much faster than undamped the fluid is far from the wall."""
    panels = Panels.of(law._slope, law.stretch)
    edge = np.full(1, _FAR * law.A_plus)
    return panels, float((panels(edge) - law._undamped(edge))[0])
