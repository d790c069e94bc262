"""Laws whose slope is a rational function of y+, in closed form: Musker, Chauhan et al., and
the law of the wall of the Spalart-Allmaras closure."""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cache
from typing import Any

import numpy as np

from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.law import Law
from walllaw.relation import relation


def _default(name: str) -> Any:
    return field(default_factory=lambda: relation("laws", "log_law")[name])


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
        p, q, w0, w1, w2 = self._parts()
        root = float(np.sqrt(np.array([q - 0.25 * p * p]))[0])
        angle = np.arctan2(y * root, q + 0.5 * p * y)  # atan((y+p/2)/root) - atan(p/(2 root))
        closed = (
            w0 * np.log1p(y / self.a)
            + 0.5 * w1 * np.log1p(y * (y + p) / q)
            + (w2 - 0.5 * w1 * p) / root * angle
        )
        cube = y * y * y / self.s
        series = y - y * cube * (0.25 - y * y / (self.kappa * self.s) / 6.0 - cube / 7.0)
        return np.where(cube < 1e-6, series, closed)

    def intercept(self) -> float:
        """Return the limit of u+ - ln(y+)/kappa, from the parts themselves."""
        p, q, w0, w1, w2 = self._parts()
        root = np.sqrt(np.array([q - 0.25 * p * p]))
        angle = np.arctan2(root, np.array([0.5 * p]))
        log_a, log_q = np.log(np.array([self.a])), np.log(np.array([q]))
        return float((-w0 * log_a - 0.5 * w1 * log_q + (w2 - 0.5 * w1 * p) / root * angle)[0])

    def slope(self, y: Floats) -> Floats:
        """Return du+/dy+, written without overflow."""
        x = 1.0 / np.maximum(y, 1.0)
        small = np.minimum(y, 1.0)
        top = small * small / self.kappa + self.s
        low = top / (small * small * small + top)
        far = 1.0 / self.kappa + self.s * x * x
        return np.where(y < 1.0, low, far * x / (1.0 + far * x))


@cache
def _musker(kappa: float, B: float) -> _Fraction:
    """Return the fraction whose log law has the intercept B: Newton on ln(a), fixed steps."""
    if kappa <= 0.0 or not -5.0 <= B <= 30.0:
        raise InputError("B", f"{B:g}", "kappa above 0 and B from -5 to 30")
    low, high = (1.0 + 1e-9) / kappa, 400.0 / kappa
    for _ in range(200):  # bisection to neighbouring doubles; done once for each pair of constants
        middle = 0.5 * (low + high)
        below = _Fraction(kappa, middle).intercept() < B
        low, high = (middle, high) if below else (low, middle)
    return _Fraction(kappa, 0.5 * (low + high))


@dataclass(frozen=True)
class Musker(Law):
    """Musker's law of 1979, its integral in closed form.

    Examples
    --------
    >>> round(Musker(kappa=0.41, B=5.0).u_plus(100.0), 9)
    16.24661037
    """

    kappa: float = _default("kappa")
    B: float = _default("B")

    @property
    def C(self) -> float:
        """Coefficient of the near-wall eddy viscosity, nu_t/nu = C y+^3 [1]."""
        return 1.0 / _musker(self.kappa, self.B).s

    def _u(self, y: Floats) -> Floats:
        return _musker(self.kappa, self.B).u(y)

    def _slope(self, y: Floats) -> Floats:
        return _musker(self.kappa, self.B).slope(y)


@dataclass(frozen=True)
class ChauhanMonkewitzNagib(Law):
    """Inner law of Chauhan, Monkewitz and Nagib: a Musker-type fraction and a hump at y+ = 30.

    Examples
    --------
    >>> law = ChauhanMonkewitzNagib()
    >>> round(law.B, 2)
    4.17
    """

    kappa: float = field(default_factory=lambda: relation("laws", "chauhan")["kappa"])
    a: float = field(default_factory=lambda: relation("laws", "chauhan")["a"])

    @property
    def _fraction(self) -> _Fraction:
        return _Fraction(self.kappa, -self.a)

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the log law [1]."""
        return self._fraction.intercept()

    def _hump(self, y: Floats) -> tuple[Floats, Floats]:
        r = relation("laws", "chauhan")
        x = np.log(y / r["centre"])
        hump = np.exp(-x * x) / r["hump"]
        return hump, -2.0 * x * hump / np.maximum(y, 1e-30)

    def _u(self, y: Floats) -> Floats:
        return self._fraction.u(y) + self._hump(y)[0]

    def _slope(self, y: Floats) -> Floats:
        return self._fraction.slope(y) + np.where(
            y > 1e-30, self._hump(np.maximum(y, 1e-30))[1], 0.0
        )


@dataclass(frozen=True)
class SpalartAllmaras(Law):
    """Law of the wall of the Spalart-Allmaras closure, closed form of Allmaras et al. 2012.

    Examples
    --------
    >>> round(SpalartAllmaras().u_plus(100.0), 6)
    16.320216
    """

    kappa: float = field(default_factory=lambda: relation("laws", "spalart_allmaras")["kappa"])
    B: float = field(default_factory=lambda: relation("laws", "spalart_allmaras")["B"])

    def _u(self, y: Floats) -> Floats:
        r = relation("laws", "spalart_allmaras")
        total = np.zeros_like(y)
        for n, (log, angle) in (("1", (r["c1"], r["c3"])), ("2", (-r["c2"], r["c4"]))):
            a, b = r[f"a{n}"], r[f"b{n}"]
            square = a * a + b * b
            # differences from the wall, so that nothing cancels near it
            total = total + log * np.log1p(y * (y + 2.0 * a) / square)
            total = total + angle * np.arctan2(y * b, square + y * a)
        near = self.kappa * y / r["c_v1"]
        series = y * (1.0 - self.kappa * y * (near * near * near) / 5.0)
        return np.where(y < 1e-2, series, total)

    def _slope(self, y: Floats) -> Floats:
        r = relation("laws", "spalart_allmaras")
        chi = self.kappa * y
        x = np.minimum(chi, 1e30) / r["c_v1"]
        cube = x * x * x
        return 1.0 / (1.0 + chi * (cube / (1.0 + cube)))
