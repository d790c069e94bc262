"""Profiles through the whole layer: a law of the wall with a wake added to it."""

from __future__ import annotations

from dataclasses import dataclass, field

import numpy as np

from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.fraction_laws import ChauhanMonkewitzNagib
from walllaw.law import Law
from walllaw.relation import relation


@dataclass(frozen=True)
class WithWake(Law):
    """A law of the wall plus the wake of Coles up to delta+; constant beyond.

    Examples
    --------
    >>> from walllaw.laws import LogLaw
    >>> law = WithWake(LogLaw(0.41, 5.0), delta_plus=1000.0, Pi=0.55)
    >>> round(law.u_plus(1000.0) - LogLaw(0.41, 5.0).u_plus(1000.0), 6)
    2.682927
    """

    inner: Law
    delta_plus: float
    Pi: float = field(default_factory=lambda: relation("laws", "wake")["Pi"])

    def __post_init__(self) -> None:
        if not 0.0 < self.delta_plus < np.inf:
            raise InputError("delta_plus", f"{self.delta_plus!r}", "a finite number above 0")

    @property
    def kappa(self) -> float:  # type: ignore[override]
        """von Karman constant of the inner law [1]."""
        return self.inner.kappa

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the inner law [1]."""
        return self.inner.B

    def _eta(self, y: Floats) -> Floats:
        return np.minimum(y / self.delta_plus, 1.0)

    def _u(self, y: Floats) -> Floats:
        s = np.sin(0.5 * np.pi * self._eta(y))
        inside = np.minimum(y, self.delta_plus)
        return self.inner._u(inside) + 2.0 * self.Pi / self.kappa * s * s

    def _slope(self, y: Floats) -> Floats:
        wake = self.Pi * np.pi / (self.kappa * self.delta_plus) * np.sin(np.pi * self._eta(y))
        return np.where(y < self.delta_plus, self.inner._slope(y) + wake, 0.0)


@dataclass(frozen=True)
class Composite(Law):
    """Composite profile of Chauhan, Monkewitz and Nagib: their inner law and exponential wake.

    Examples
    --------
    >>> round(Composite(delta_plus=2000.0).u_plus(2000.0), 2)
    26.31
    """

    delta_plus: float
    Pi: float = field(default_factory=lambda: relation("laws", "composite_wake")["Pi"])
    inner: Law = field(default_factory=ChauhanMonkewitzNagib)

    @property
    def kappa(self) -> float:  # type: ignore[override]
        """von Karman constant [1]."""
        return self.inner.kappa

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the inner law [1]."""
        return self.inner.B

    def _wake(self, n: Floats) -> tuple[Floats, Floats]:
        """Return the wake function and its derivative in n = y/delta."""
        r = relation("laws", "composite_wake")
        a2, a3, a4 = r["a2"], r["a3"], r["a4"]
        c = 0.25 * (5.0 * a2 + 6.0 * a3 + 7.0 * a4)
        n2 = n * n
        n4 = n2 * n2
        exponent = n4 * (-c + n * (a2 + n * (a3 + n * a4)))
        rate = n2 * n * (-4.0 * c + n * (5.0 * a2 + n * (6.0 * a3 + n * 7.0 * a4)))
        bottom = -np.expm1(np.full(1, -0.25 * (a2 + 2.0 * a3 + 3.0 * a4)))
        top = -np.expm1(exponent)
        log = 1.0 - np.log(n) / (2.0 * self.Pi)
        slope = (-rate * np.exp(exponent) * log - top / (2.0 * self.Pi * n)) / bottom
        return top * log / bottom, slope

    def _u(self, y: Floats) -> Floats:
        n = np.clip(y / self.delta_plus, 1e-12, 1.0)
        inner = self.inner._u(np.minimum(y, self.delta_plus))
        return inner + 2.0 * self.Pi / self.kappa * self._wake(n)[0]

    def _slope(self, y: Floats) -> Floats:
        n = np.clip(y / self.delta_plus, 1e-12, 1.0)
        wake = 2.0 * self.Pi / (self.kappa * self.delta_plus) * self._wake(n)[1]
        return np.where(y < self.delta_plus, self.inner._slope(y) + wake, 0.0)
