"""Laws made of layers: viscous, log, buffer and power law, each to where it crosses the next.

All in closed form. Friction velocity by the Wright omega function or a power: 2.4 ulp found over
1e4 values of Re_y from 1 to 1e18 and 40 neighbouring doubles at each seam, where no law falls.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import ClassVar

import numpy as np

from walllaw.arrays import Floats, Interval
from walllaw.errors import InputError
from walllaw.lambert import wright_omega
from walllaw.law import Law
from walllaw.log_layer import LogLaw, LogLayer, checked, exp, from_table, log
from walllaw.relation import relation


@dataclass(frozen=True)
class ViscousSublayer(Law):
    """u+ = y+; meant below y+ = 5. Exact.

    Examples
    --------
    >>> ViscousSublayer().u_plus(3.0)
    3.0
    """

    kappa: float = from_table("log_law", "kappa")
    B: float = from_table("log_law", "B")
    ROW: ClassVar[str] = "viscous"

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
class TwoLayer(LogLayer):
    """Viscous law to the crossing, log law above; 25 % too high at the crossing.

    Takes ``kappa`` and one of ``B`` and ``E``; the two laws must cross.

    Examples
    --------
    >>> law = TwoLayer(kappa=0.41, B=5.2)
    >>> round(law.log_law.intersection, 10)
    11.0622997843
    """

    ROW: ClassVar[str] = "two_layer"

    def __post_init__(self) -> None:
        super().__post_init__()
        _ = self.log_law.intersection

    @property
    def log_law(self) -> LogLaw:
        """The log law of the outer layer."""
        return LogLaw(self.kappa, self.B)

    def _u(self, y: Floats) -> Floats:
        edge = self.log_law.intersection
        # never below the edge: rounding must not make the law fall at the seam
        high = np.maximum(self.log_law._u(np.maximum(y, edge)), edge)
        return np.where(y < edge, y, high)

    def _slope(self, y: Floats) -> Floats:
        return np.where(y < self.log_law.intersection, 1.0, self.log_law._slope(y))

    def _eddy(self, y: Floats) -> Floats:
        return np.where(y < self.log_law.intersection, 0.0, self.log_law._eddy(y))

    def _y(self, u: Floats) -> Floats:
        edge = self.log_law.intersection
        return np.where(u < edge, u, np.maximum(self.log_law._y(np.maximum(u, edge)), edge))

    def _u_of_re(self, re: Floats) -> Floats:
        edge = self.log_law.intersection
        high = np.maximum(self.log_law._u_of_re(np.maximum(re, edge * edge)), edge)
        return np.where(re < edge * edge, np.sqrt(re), high)

    def _integral(self, y: Floats) -> Floats:
        edge = self.log_law.intersection
        log_law = self.log_law
        start = 0.5 * edge * edge - log_law._integral(np.full(1, edge))
        return np.where(y < edge, 0.5 * y * y, start + log_law._integral(np.maximum(y, edge)))


@dataclass(frozen=True)
class ThreeLayer(LogLayer):
    """The three layers of von Karman: viscous to 5, buffer 5 + 5 ln(y+/5), log law above.

    Takes ``kappa`` (below 0.2 the buffer would be flatter than the log law) and one of ``B`` and
    ``E``; buffer and log law must cross above y+ = 5.

    Examples
    --------
    >>> round(ThreeLayer(kappa=0.40, B=5.5).edge, 2)
    30.54
    """

    ROW: ClassVar[str] = "three_layer"

    def __post_init__(self) -> None:
        super().__post_init__()
        r = relation("laws", "three_layer")
        checked("kappa", self.kappa, Interval(1.0 / r["slope"], open_low=True))
        if not r["edge"] <= self.edge <= 1e12:
            raise InputError("B", f"{self.B:g}", "an intercept with which buffer and log law cross")

    @property
    def edge(self) -> float:
        """y+ where buffer and log law cross [1]."""
        r = relation("laws", "three_layer")
        a, s = r["edge"], r["slope"]
        exponent = (self.B - a + s * log(a)) / (s - 1.0 / self.kappa)
        return exp(min(max(exponent, -500.0), 500.0))

    @property
    def _parts(self) -> tuple[float, float, float, float, LogLaw]:
        """Return first edge, slope and top of the buffer, second edge, and the log law."""
        r = relation("laws", "three_layer")
        a, s, edge = r["edge"], r["slope"], self.edge
        return a, s, a + s * log(edge / a), edge, LogLaw(self.kappa, self.B)

    def _u(self, y: Floats) -> Floats:
        a, s, top, edge, far = self._parts
        buffer = np.minimum(a + s * np.log(np.maximum(y, a) / a), top)
        return np.where(
            y < a, y, np.where(y < edge, buffer, np.maximum(far._u(np.maximum(y, 1.0)), top))
        )

    def _slope(self, y: Floats) -> Floats:
        a, s, _, edge, _ = self._parts
        return np.where(y < a, 1.0, np.where(y < edge, s, 1.0 / self.kappa) / np.maximum(y, a))

    def _eddy(self, y: Floats) -> Floats:
        a, s, _, edge, far = self._parts
        return np.where(y < a, 0.0, np.where(y < edge, y / s - 1.0, far._eddy(y)))

    def _y(self, u: Floats) -> Floats:
        a, s, top, edge, far = self._parts
        buffer = a * np.exp((np.clip(u, a, top) - a) / s)
        log_y = np.maximum(far._y(np.maximum(u, top)), edge)
        return np.where(u < a, u, np.where(u < top, buffer, log_y))

    def _u_of_re(self, re: Floats) -> Floats:
        a, s, top, edge, far = self._parts
        # u+ = s ln(y+) + b with y+ = Re_y/u+ is a log law of its own
        b = a - s * log(a)
        inner = np.clip(re, a * a, top * edge)
        buffer = s * wright_omega(np.log(inner / s) + b / s)
        outer = np.maximum(far._u_of_re(np.maximum(re, top * edge)), top)
        buffer = np.clip(buffer, a, top)
        return np.where(re < a * a, np.sqrt(re), np.where(re < top * edge, buffer, outer))

    def _integral(self, y: Floats) -> Floats:
        a, s, _, edge, far = self._parts

        def buffer(x: Floats) -> Floats:
            return x * (a + s * np.log(x / a) - s)

        start, join = np.full(1, a), np.full(1, edge)
        middle = 0.5 * a * a + buffer(np.clip(y, a, edge)) - buffer(start)
        outer = far._integral(np.maximum(y, edge)) - far._integral(join)
        return np.where(y < a, 0.5 * y * y, np.where(y < edge, middle, middle + outer))


@dataclass(frozen=True)
class PowerLaw(Law):
    """u+ = A y+^n above the crossing with the viscous law, meant to y+ = 1000 (Werner, Wengle).

    Parameters
    ----------
    A, n : float, optional
        Factor, positive, and exponent [1], 0.01 to 0.9: 8.3 and 1/7.
    kappa, B : float, optional
        Of the log law that a wake added to it refers to [1].

    Examples
    --------
    >>> round(PowerLaw().intersection, 7)
    11.8102142
    """

    A: float = from_table("power_law", "A")
    n: float = from_table("power_law", "n")
    kappa: float = from_table("log_law", "kappa")
    B: float = from_table("log_law", "B")
    ROW: ClassVar[str] = "power_law"

    def __post_init__(self) -> None:
        checked("A", self.A, Interval(0.1, 100.0))
        checked("n", self.n, Interval(0.01, 0.9))

    @property
    def intersection(self) -> float:
        """y+ where the viscous and the power law cross [1]."""
        return exp(log(self.A) / (1.0 - self.n))

    def _u(self, y: Floats) -> Floats:
        edge = self.intersection
        high = np.maximum(self.A * np.power(np.maximum(y, edge), self.n), edge)
        return np.where(y < edge, y, high)

    def _slope(self, y: Floats) -> Floats:
        edge = self.intersection
        high = self.n * self.A * np.power(np.maximum(y, edge), self.n - 1.0)
        return np.where(y < edge, 1.0, high)

    def _y(self, u: Floats) -> Floats:
        edge = self.intersection
        high = np.maximum(np.power(np.maximum(u, edge) / self.A, 1.0 / self.n), edge)
        return np.where(u < edge, u, high)

    def _u_of_re(self, re: Floats) -> Floats:
        edge = self.intersection
        m = 1.0 / (1.0 + self.n)
        # A^m Re^(n m), in one power and the rest of the other: both factors stay near the result
        high = np.power(np.full(1, self.A), m) * np.power(np.maximum(re, edge * edge), self.n * m)
        return np.where(re < edge * edge, np.sqrt(re), np.maximum(high, edge))

    def _integral(self, y: Floats) -> Floats:
        edge = self.intersection
        rest = (self._u(y) * y - edge * edge) / (1.0 + self.n)
        return np.where(y < edge, 0.5 * y * y, 0.5 * edge * edge + rest)
