"""Laws whose slope is a rational function of y+, in closed form.

Musker, the composite inner law of Chauhan et al., and the law of the Spalart-Allmaras closure.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import lru_cache
from typing import ClassVar

import numpy as np

from walllaw.arrays import Floats, Interval
from walllaw.law import Law
from walllaw.log_layer import LogLayer, checked, from_table
from walllaw.relation import relation


@dataclass(frozen=True)
class _Fraction:
    """u+ of (y^2/kappa + s)/(y^3 + y^2/kappa + s) in partial fractions; -a is the real root."""

    kappa: float
    a: float

    @property
    def s(self) -> float:
        """The constant term: a^3 - a^2/kappa."""
        return self.a * self.a * (self.a - 1.0 / self.kappa)

    def _parts(self) -> tuple[float, float, float, float, float]:
        """Return p, q of the quadratic y^2 + p y + q, and the weights of its three terms."""
        a, k = self.a, 1.0 / self.kappa
        p, q = k - a, self.s / a
        # (y^2 k + s)/((y + a)(y^2 + p y + q)) = w0/(y + a) + (w1 y + w2)/(y^2 + p y + q)
        w0 = (a * a * k + self.s) / (a * a - p * a + q)
        w1 = k - w0
        w2 = (self.s - w0 * q) / a
        return p, q, w0, w1, w2

    def u(self, y: Floats) -> Floats:
        """Return u+; by its series very near the wall, where the closed form cancels."""
        p, q, _, w1, w2 = self._parts()
        root = float(np.sqrt(np.array([q - 0.25 * p * p]))[0])
        angle = np.arctan2(y * root, q + 0.5 * p * y)  # atan((y+p/2)/root) - atan(p/(2 root))
        far = np.log1p(y / self.a)
        # the two logarithms far from the wall make ln(y)/kappa: their weights differ from it there
        rest = 0.5 * np.log1p(y * (y + p) / q) - far
        closed = far / self.kappa + (w1 * rest + (w2 - 0.5 * w1 * p) / root * angle)
        near = np.minimum(y, 1.0)
        cube = near * near * near / self.s
        series = near - near * cube * (
            0.25 - near * near / (self.kappa * self.s) / 6.0 - cube / 7.0
        )
        return np.where(cube < 1e-6, series, closed)

    def intercept(self) -> float:
        """Return the limit of u+ - ln(y+)/kappa, from the parts themselves."""
        p, q, w0, w1, w2 = self._parts()
        root = np.sqrt(np.array([q - 0.25 * p * p]))
        angle = np.arctan2(root, np.array([0.5 * p]))
        log_a, log_q = np.log(np.array([self.a])), np.log(np.array([q]))
        return float((-w0 * log_a - 0.5 * w1 * log_q + (w2 - 0.5 * w1 * p) / root * angle)[0])

    def eddy(self, y: Floats) -> Floats:
        """Return nu_t/nu, y^3/(y^2/kappa + s), written without overflow."""
        low = np.minimum(y, 1.0)
        x = 1.0 / np.maximum(y, 1.0)
        near = low * low * low / (low * low / self.kappa + self.s)
        return np.where(y < 1.0, near, y / (1.0 / self.kappa + self.s * x * x))

    def slope(self, y: Floats) -> Floats:
        """Return du+/dy+."""
        return 1.0 / (1.0 + self.eddy(y))


@lru_cache(maxsize=256)
def _musker(kappa: float, B: float) -> _Fraction:
    """Return the fraction whose log law has the intercept B."""
    low, high = (1.0 + 1e-9) / kappa, 400.0 / kappa
    for _ in range(200):  # bisection to neighbouring doubles; done once for each pair of constants
        middle = 0.5 * (low + high)
        below = _Fraction(kappa, middle).intercept() < B
        low, high = (middle, high) if below else (low, middle)
    return _Fraction(kappa, 0.5 * (low + high))


@dataclass(frozen=True)
class Musker(LogLayer):
    """Musker's law of 1979, its integral in closed form by partial fractions in real numbers.

    Takes ``kappa``, 0.2 to 1, and one of ``B``, -5 to 30, and ``E``.

    Notes
    -----
    nu_t/nu is y+^3/(y+^2/kappa + 1/C), with C such that the log law has the intercept B. Largest
    errors over 1e4 points against 50 digits, y+ 1e-8 to 1e12: u+ 3.7, slope 4.1, y+ 3.0, u+ of Re_y
    5.0, eddy viscosity 7.2 ulp (its condition number is 3); integral 4.9 ulp (800 points).

    References
    ----------
    musker-1979

    Examples
    --------
    >>> round(Musker(kappa=0.41, B=5.0).u_plus(100.0), 9)
    16.24661037
    """

    ROW: ClassVar[str] = "musker"

    def __post_init__(self) -> None:
        super().__post_init__()
        checked("kappa", self.kappa, Interval(0.2, 1.0))
        checked("B", self.B, Interval(-5.0, 30.0))

    @property
    def C(self) -> float:
        """Coefficient of the near-wall eddy viscosity, nu_t/nu = C y+^3 [1]."""
        return 1.0 / _musker(self.kappa, self.B).s

    def _u(self, y: Floats) -> Floats:
        return _musker(self.kappa, self.B).u(y)

    def _slope(self, y: Floats) -> Floats:
        return _musker(self.kappa, self.B).slope(y)

    def _eddy(self, y: Floats) -> Floats:
        return _musker(self.kappa, self.B).eddy(y)


@dataclass(frozen=True)
class ChauhanMonkewitzNagib(Law):
    """Inner law of Chauhan, Monkewitz and Nagib: a Musker-type fraction and a hump at y+ = 30.

    Parameters
    ----------
    kappa : float, optional
        von Karman constant [1]: 0.384.
    a : float, optional
        Real root of the fraction's denominator [1]: -10.3061; from -20 to -1.5/kappa.

    Notes
    -----
    Largest errors over 800 points against 30-digit quadrature, y+ 1e-6 to 1e12: u+ 3.6, integral
    8.5 ulp.

    References
    ----------
    chauhan-monkewitz-nagib-2009

    Examples
    --------
    >>> law = ChauhanMonkewitzNagib()
    >>> round(law.B, 2)
    4.17
    """

    kappa: float = from_table("chauhan", "kappa")
    a: float = from_table("chauhan", "a")
    ROW: ClassVar[str] = "chauhan"

    def __post_init__(self) -> None:
        kappa = checked("kappa", self.kappa, Interval(0.3, 0.5))
        checked("a", self.a, Interval(-20.0, -1.5 / kappa))

    @property
    def _fraction(self) -> _Fraction:
        return _Fraction(self.kappa, -self.a)

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the log law [1]."""
        return self._fraction.intercept()

    @property
    def stretch(self) -> float:
        """Scale of y+ for the panels of integrals [1]: the hump is smooth in ln(y+) only."""
        return 0.3

    def _hump(self, y: Floats) -> tuple[Floats, Floats]:
        r = relation("laws", "chauhan")
        x = np.log(y / r["centre"])
        hump = np.exp(-x * x) / r["hump"]
        return hump, -2.0 * x * hump / y

    def _u(self, y: Floats) -> Floats:
        return self._fraction.u(y) + self._hump(y)[0]

    def _slope(self, y: Floats) -> Floats:
        return self._fraction.slope(y) + self._hump(y)[1]

    def _eddy(self, y: Floats) -> Floats:
        smooth, hump = self._fraction.slope(y), self._hump(y)[1]
        return (smooth * self._fraction.eddy(y) - hump) / (smooth + hump)


@dataclass(frozen=True)
class SpalartAllmaras(Law):
    """Law of the wall of the Spalart-Allmaras closure, closed form of Allmaras et al. 2012.

    For the closure's own constants (kappa 0.41, c_v1 7.1) only: there is nothing to choose.

    Notes
    -----
    nu_t/nu is chi chi^3/(chi^3 + c_v1^3) with chi = kappa y+. Largest errors over 800 points
    against 30-digit quadrature of the slope, y+ 1e-6 to 1e12: u+ 4.1, integral 10.8 ulp; so the
    published 17 digits are those of the exact solution.

    References
    ----------
    allmaras-2012

    Examples
    --------
    >>> round(SpalartAllmaras().u_plus(100.0), 6)
    16.320216
    """

    kappa: float = field(
        init=False, default_factory=lambda: relation("laws", "spalart_allmaras")["kappa"]
    )
    B: float = field(init=False, default_factory=lambda: relation("laws", "spalart_allmaras")["B"])
    ROW: ClassVar[str] = "spalart_allmaras"

    def _u(self, y: Floats) -> Floats:
        r = relation("laws", "spalart_allmaras")
        logs, angles = [], np.zeros_like(y)
        for n, angle in (("1", r["c3"]), ("2", r["c4"])):
            a, b = r[f"a{n}"], r[f"b{n}"]
            square = a * a + b * b
            # differences from the wall, so that nothing cancels near it
            logs.append(np.log1p(y * (y + 2.0 * a) / square))
            angles = angles + angle * np.arctan2(y * b, square + y * a)
        # c1 is 1/(2 kappa) + c2: written so, far from the wall, where the logarithms grow alike
        closed = logs[0] * (0.5 / self.kappa) + (r["c2"] * (logs[0] - logs[1]) + angles)
        chi = self.kappa * np.minimum(y, 0.5)
        x = chi / r["c_v1"]
        cube = x * x * x
        inner = chi / 8.0 + chi * chi / 9.0
        inner = inner - cube * chi * (1.0 / 11.0 + chi * (1.0 / 6.0 + chi / 13.0))
        series = y * (1.0 - cube * (chi / 5.0 - cube * inner))
        return np.where(y < 0.5, series, closed)

    def _eddy(self, y: Floats) -> Floats:
        c = relation("laws", "spalart_allmaras")["c_v1"]
        chi = self.kappa * y
        x = np.minimum(chi / c, 1e30)
        cube = x * x * x
        return chi * (cube / (1.0 + cube))

    def _slope(self, y: Floats) -> Floats:
        return 1.0 / (1.0 + self._eddy(y))
