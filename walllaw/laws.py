"""The laws of the wall; each gives u+ and its slope, the rest is derived in ``law.py``."""

from __future__ import annotations

from dataclasses import dataclass, field
from functools import cache
from typing import Any

import numpy as np

from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.lambert import wright_omega, wright_omega_lower
from walllaw.law import Law, blend, panel_integral, panel_table
from walllaw.relation import relation


def _default(name: str) -> Any:
    return field(default_factory=lambda: relation("laws", "log_law")[name])


def _positive(name: str, value: float) -> float:
    number = float(value)
    if not 0.0 < number < np.inf:
        raise InputError(name, f"{value!r}", "a finite number above 0")
    return number


def _exp(x: float) -> float:
    return float(np.exp(np.array([x]))[0])


def _log(x: float) -> float:
    return float(np.log(np.array([x]))[0])


@dataclass(frozen=True)
class ViscousSublayer(Law):
    """u+ = y+.

    Examples
    --------
    >>> ViscousSublayer().u_plus(3.0)
    3.0
    """

    kappa: float = _default("kappa")
    B: float = _default("B")

    def _u(self, y: Floats) -> Floats:
        return y + 0.0

    def _slope(self, y: Floats) -> Floats:
        return np.ones_like(y)

    def _y(self, u: Floats) -> Floats:
        return u + 0.0

    def _u_of_re(self, re: Floats) -> Floats:
        return np.sqrt(re)

    def _integral(self, y: Floats) -> Floats:
        return 0.5 * y * y


@dataclass(frozen=True)
class LogLaw(Law):
    """u+ = ln(y+)/kappa + B; meant above y+ = 30, negative below exp(-kappa B).

    Examples
    --------
    >>> round(LogLaw(kappa=0.41, B=5.0).u_plus(100.0), 10)
    16.2321224048
    """

    kappa: float = _default("kappa")
    B: float = _default("B")

    def __post_init__(self) -> None:
        _positive("kappa", self.kappa)

    @classmethod
    def from_E(cls, kappa: float, E: float) -> LogLaw:
        """Return the law with E = exp(kappa B) given instead of B."""
        return cls(kappa, _log(_positive("E", E)) / kappa)

    @property
    def E(self) -> float:
        """exp(kappa B) [1]."""
        return _exp(self.kappa * self.B)

    @property
    def intersection(self) -> float:
        """y+ where the viscous and the log law cross (the larger of two roots) [1]."""
        s = self.kappa * self.B - _log(self.kappa)
        if s < 1.0:
            raise InputError("B", f"{self.B:g}", "an intercept with which the two laws cross")
        return float(wright_omega_lower(np.array([s]))[0]) / self.kappa

    def _near_wall(self, name: str, x: Floats) -> Floats:
        return np.zeros_like(x)  # no wall in this law: 0 stands for what lies below its range

    def _u(self, y: Floats) -> Floats:
        return np.log(y) / self.kappa + self.B

    def _slope(self, y: Floats) -> Floats:
        return 1.0 / (self.kappa * y)

    def _y(self, u: Floats) -> Floats:
        return np.exp(self.kappa * (u - self.B))

    def _u_of_re(self, re: Floats) -> Floats:
        return wright_omega(np.log(self.kappa * re) + self.kappa * self.B) / self.kappa

    def _integral(self, y: Floats) -> Floats:
        return y * (self._u(y) - 1.0 / self.kappa)


@dataclass(frozen=True)
class TwoLayer(Law):
    """Viscous law to the crossing, log law above.

    Examples
    --------
    >>> law = TwoLayer(kappa=0.41, B=5.2)
    >>> round(law.log_law.intersection, 10)
    11.0622997843
    """

    kappa: float = _default("kappa")
    B: float = _default("B")

    @property
    def log_law(self) -> LogLaw:
        """The log law of the outer layer."""
        return LogLaw(self.kappa, self.B)

    def _choose(self, y: Floats, edge: float, low: Floats, high: Floats) -> Floats:
        return np.where(y < edge, low, high)

    def _u(self, y: Floats) -> Floats:
        edge = self.log_law.intersection
        return self._choose(y, edge, y, self.log_law._u(np.maximum(y, edge)))

    def _slope(self, y: Floats) -> Floats:
        edge = self.log_law.intersection
        return self._choose(y, edge, np.ones_like(y), self.log_law._slope(y))

    def _y(self, u: Floats) -> Floats:
        edge = self.log_law.intersection
        return self._choose(u, edge, u, self.log_law._y(np.maximum(u, edge)))

    def _u_of_re(self, re: Floats) -> Floats:
        edge = self.log_law.intersection
        high = self.log_law._u_of_re(np.maximum(re, edge * edge))
        return self._choose(re, edge * edge, np.sqrt(re), high)

    def _integral(self, y: Floats) -> Floats:
        edge = self.log_law.intersection
        log = self.log_law
        start = 0.5 * edge * edge - log._integral(np.full(1, edge))
        return self._choose(y, edge, 0.5 * y * y, start + log._integral(np.maximum(y, edge)))


@dataclass(frozen=True)
class ThreeLayer(Law):
    """The three layers of von Karman: viscous to 5, buffer 5 + 5 ln(y+/5), log law above.

    Examples
    --------
    >>> round(ThreeLayer(kappa=0.40, B=5.5).edge, 2)
    30.54
    """

    kappa: float = _default("kappa")
    B: float = _default("B")

    @property
    def edge(self) -> float:
        """y+ where buffer and log law cross [1]."""
        r = relation("laws", "three_layer")
        a, s = r["edge"], r["slope"]
        return _exp((a - s * _log(a) - self.B) / (1.0 / self.kappa - s))

    def _u(self, y: Floats) -> Floats:
        r = relation("laws", "three_layer")
        buffer = r["edge"] + r["slope"] * np.log(np.maximum(y, r["edge"]) / r["edge"])
        log = np.log(np.maximum(y, 1.0)) / self.kappa + self.B
        return np.where(y < r["edge"], y, np.where(y < self.edge, buffer, log))

    def _slope(self, y: Floats) -> Floats:
        r = relation("laws", "three_layer")
        outer = np.where(y < self.edge, r["slope"], 1.0 / self.kappa) / y
        return np.where(y < r["edge"], 1.0, outer)

    def _y(self, u: Floats) -> Floats:
        r = relation("laws", "three_layer")
        a, s = r["edge"], r["slope"]
        top = a + s * _log(self.edge / a)
        buffer = a * np.exp((np.minimum(u, top) - a) / s)
        log = np.exp(self.kappa * (np.maximum(u, top) - self.B))
        return np.where(u < a, u, np.where(u < top, buffer, log))

    def _integral(self, y: Floats) -> Floats:
        r = relation("laws", "three_layer")
        a, s, b = r["edge"], r["slope"], self.edge

        def buffer(x: Floats) -> Floats:
            return x * (a + s * np.log(x / a) - s)

        def log(x: Floats) -> Floats:
            return x * (np.log(x) / self.kappa + self.B - 1.0 / self.kappa)

        start, join = np.full(1, a), np.full(1, b)
        middle = 0.5 * a * a + buffer(np.clip(y, a, b)) - buffer(start)
        outer = log(np.maximum(y, b)) - log(join)
        return np.where(y < a, 0.5 * y * y, np.where(y < b, middle, middle + outer))


@dataclass(frozen=True)
class PowerLaw(Law):
    """u+ = A y+^n above the crossing with the viscous law (Werner and Wengle 1991).

    Examples
    --------
    >>> round(PowerLaw().intersection, 7)
    11.8102142
    """

    A: float = field(default_factory=lambda: relation("laws", "power_law")["A"])
    n: float = field(default_factory=lambda: relation("laws", "power_law")["n"])
    kappa: float = _default("kappa")
    B: float = _default("B")

    @property
    def intersection(self) -> float:
        """y+ where the viscous and the power law cross [1]."""
        return _exp(_log(self.A) / (1.0 - self.n))

    def _u(self, y: Floats) -> Floats:
        return np.where(y < self.intersection, y, self.A * np.power(y, self.n))

    def _slope(self, y: Floats) -> Floats:
        return np.where(y < self.intersection, 1.0, self.n * self.A * np.power(y, self.n - 1.0))

    def _y(self, u: Floats) -> Floats:
        return np.where(u < self.intersection, u, np.power(u / self.A, 1.0 / self.n))

    def _u_of_re(self, re: Floats) -> Floats:
        m = 1.0 / (1.0 + self.n)
        high = np.power(np.full(1, self.A), m) * np.power(re, self.n * m)
        return np.where(re < self.intersection * self.intersection, np.sqrt(re), high)

    def _integral(self, y: Floats) -> Floats:
        edge = self.intersection
        rest = (self._u(y) * y - edge * edge) / (1.0 + self.n)
        return np.where(y < edge, 0.5 * y * y, 0.5 * edge * edge + rest)


@dataclass(frozen=True)
class Spalding(Law):
    """Spalding's single formula, bracket to the third power by default (``order=4``: the original).

    Examples
    --------
    >>> law = Spalding(kappa=0.41, B=5.0, order=3)
    >>> round(law.y_plus(10.0), 10), round(law.u_plus(100.0), 10)
    (14.5505798517, 16.0771010741)
    """

    kappa: float = _default("kappa")
    B: float = _default("B")
    order: int = 3

    def __post_init__(self) -> None:
        _positive("kappa", self.kappa)
        if self.order not in (3, 4):
            raise InputError("order", repr(self.order), "3 or 4")

    def _brackets(self, u: Floats) -> list[Floats]:
        """Return exp(-kappa B) times exp(x) less its series to x^n/n!, n = order to order - 3.

        By expm1 and subtractions: what cancels near the wall is kappa exp(-kappa B) ulp of u+.
        """
        x = np.minimum(self.kappa * u, 700.0)
        scale = _exp(-self.kappa * self.B)
        terms = [x]
        for j in range(2, self.order + 1):
            terms.append(terms[-1] * x / j)
        bracket = np.expm1(x)
        for term in terms:
            bracket = bracket - term
        found = [scale * bracket]
        for term in reversed(terms[-3:]):
            bracket = bracket + term
            found.append(scale * bracket)
        return found

    def _y(self, u: Floats) -> Floats:
        return u + self._brackets(u)[0]

    def _solve(self, target: Floats, u: Floats, power: float, steps: int) -> Floats:
        """Solve y+(u+) u+^power = target: Householder steps of fourth order in the logarithm."""
        k = self.kappa
        for _ in range(steps):
            b0, b1, b2, b3 = self._brackets(u)
            y = u + b0
            x = k * u
            r0 = np.log(y / (target if power == 0.0 else target / u))
            p, q, s = (u + x * b1) / y, x * x * b2 / y, x * x * x * b3 / y
            # derivatives of the logarithm by u, each scaled by its power of u: nothing overflows
            r1 = p + power
            r2 = q - p * p - power
            r3 = s - 3.0 * p * q + 2.0 * p * p * p + 2.0 * power
            half = r1 * r1 - 0.5 * r0 * r2
            u = u - u * (r0 * half / (r1 * (half - 0.5 * r0 * r2) + r0 * r0 * r3 / 6.0))
        return u

    def _u(self, y: Floats) -> Floats:
        log = np.maximum(np.log(y) / self.kappa + self.B, 3.0)
        return self._solve(y, blend(y, log), 0.0, 3)

    def _u_of_re(self, re: Floats) -> Floats:
        return self._solve(re, self._start(re), 1.0, 2)

    def _slope(self, y: Floats) -> Floats:
        return 1.0 / (1.0 + self.kappa * self._brackets(self._u(y))[1])

    def _integral(self, y: Floats) -> Floats:
        """u+ y+ less the integral of y+ du+, which is the next higher bracket over kappa."""
        u = self._u(y)
        x = np.minimum(self.kappa * u, 700.0)
        direct, term = np.expm1(x), np.ones_like(x)
        small, tail, power = np.minimum(x, 2.0), np.zeros_like(x), np.ones_like(x)
        for j in range(1, self.order + 2):
            term, power = term * x / j, power * small / j
            direct = direct - term
        for j in range(26, self.order + 1, -1):  # 2^26/26! is below 1e-18 of the first term
            tail = (1.0 + tail) * small / j
        higher = np.where(x < 2.0, power * tail, direct)
        return u * y - (0.5 * u * u + _exp(-self.kappa * self.B) / self.kappa * higher)


@dataclass(frozen=True)
class Reichardt(Law):
    """Reichardt's law of 1951.

    Examples
    --------
    >>> round(Reichardt(kappa=0.41, B=5.0).u_plus(100.0), 10)
    16.2900884436
    """

    kappa: float = _default("kappa")
    B: float = _default("B")

    def __post_init__(self) -> None:
        _positive("kappa", self.kappa)

    @property
    def _C(self) -> float:
        return self.B - _log(self.kappa) / self.kappa

    def _u(self, y: Floats) -> Floats:
        r = relation("laws", "reichardt")
        x = y / r["a"]
        buffer = -np.expm1(-x) - x * np.exp(-r["b"] * y)
        return np.log1p(self.kappa * y) / self.kappa + self._C * buffer

    def _slope(self, y: Floats) -> Floats:
        r = relation("laws", "reichardt")
        a, b = r["a"], r["b"]
        buffer = (np.exp(-y / a) - (1.0 - b * y) * np.exp(-b * y)) / a
        return 1.0 / (1.0 + self.kappa * y) + self._C * buffer


@dataclass(frozen=True)
class VanDriest(Law):
    """van Driest's law: mixing length kappa y+ (1 - exp(-y+/A+)) under constant stress.

    Examples
    --------
    >>> law = VanDriest(kappa=0.41, A_plus=26.0)
    >>> round(law.u_plus(100.0), 9), round(law.B, 6)
    (16.527843221, 5.277081)
    """

    kappa: float = field(default_factory=lambda: relation("laws", "van_driest")["kappa"])
    A_plus: float = field(default_factory=lambda: relation("laws", "van_driest")["A_plus"])

    def __post_init__(self) -> None:
        _positive("kappa", self.kappa)
        _positive("A_plus", self.A_plus)

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the log law that the profile approaches [1]."""
        y = 1e10  # beyond, the profile is the log law to the last digit
        return float(self._u(np.array([y]))[0]) - _log(y) / self.kappa

    def _slope(self, y: Floats) -> Floats:
        length = self.kappa * y * -np.expm1(-y / self.A_plus)
        return 2.0 / (1.0 + np.sqrt(1.0 + 4.0 * (length * length)))

    def _u(self, y: Floats) -> Floats:
        return panel_integral(y, _van_driest_table(self), self._slope)


@cache
def _van_driest_table(law: VanDriest) -> Floats:
    return panel_table(law._slope)
