"""Profiles through the whole layer: laws of the wall with a wake, and the profile of Cess.

Their thickness in wall units is a constant of the law; beyond it the velocity stays as it is.
"""

from __future__ import annotations

from abc import abstractmethod
from dataclasses import dataclass, field
from functools import lru_cache
from typing import ClassVar

import numpy as np

from walllaw.arrays import Floats, Interval
from walllaw.errors import InputError
from walllaw.fraction_laws import ChauhanMonkewitzNagib
from walllaw.law import Law, moments
from walllaw.laws import VanDriest
from walllaw.log_layer import checked, from_table
from walllaw.panels import Panels
from walllaw.relation import relation
from walllaw.start_table import safe_root

_THICKNESS = Interval(10.0, 1e12)
_STRENGTH = Interval(0.0, 10.0)
_SAFE_STEPS = 48  # of the inverse, whose slope falls to nothing at the edge


def _without_wake(inner: Law) -> None:
    if not isinstance(inner, Law) or isinstance(inner, Bounded):
        raise InputError("inner", type(inner).__name__, "a law of the wall without a wake")


class Bounded(Law):
    """A law that ends: constant velocity above its outer edge."""

    POLISH: ClassVar[int] = 8  # kinks at the edge and of an inner law: the table is coarse there

    @property
    @abstractmethod
    def edge(self) -> float:
        """y+ of the outer edge [1]."""

    @property
    def edge_velocity(self) -> float:
        """u+ at the outer edge [1]."""
        return float(self._u(np.full(1, self.edge))[0])

    def _u_range(self) -> Interval:
        return Interval(0.0, self.edge_velocity)

    def _y(self, u: Floats) -> Floats:
        def residual(t: Floats) -> tuple[Floats, Floats]:
            y = np.exp(t)
            return self._u(y) - u, y * self._slope(y)

        top = np.log(np.full_like(u, self.edge))
        low = np.minimum(np.log(u) - 4.0, top - 1.0)
        t = safe_root(residual, low, top, np.minimum(np.log(u), top), _SAFE_STEPS)
        y = np.exp(t)
        miss, slope = residual(t)
        fine = y * (1.0 - miss / np.maximum(slope, np.maximum(1e6 * np.abs(miss), 1e-30)))
        return np.minimum(fine, self.edge)

    def _integral(self, y: Floats) -> Floats:
        inside = np.minimum(y, self.edge)
        return self._inside(inside) + self.edge_velocity * (y - inside)

    def _inside(self, y: Floats) -> Floats:
        """Return the integral of u+ up to a y+ not above the edge."""
        return super()._integral(y)


@dataclass(frozen=True)
class WithWake(Bounded):
    """A law of the wall plus the wake of Coles up to delta+; constant beyond.

    Parameters
    ----------
    inner : Law
        Any law of the wall.
    delta_plus : float
        Thickness of the layer in wall units [1], 10 to 1e12.
    Pi : float, optional
        Strength of the wake [1], 0 to 10: 0.55.

    Notes
    -----
    inner + (2 Pi/kappa) sin^2(pi y/(2 delta)). The slope at the edge is that of the inner law.

    References
    ----------
    coles-1956

    Examples
    --------
    >>> from walllaw.log_layer import LogLaw
    >>> law = WithWake(LogLaw(0.41, 5.0), delta_plus=1000.0, Pi=0.55)
    >>> round(law.u_plus(1000.0) - LogLaw(0.41, 5.0).u_plus(1000.0), 6)
    2.682927
    """

    inner: Law
    delta_plus: float
    Pi: float = from_table("wake", "Pi")
    ROW: ClassVar[str] = "wake"

    def __post_init__(self) -> None:
        _without_wake(self.inner)
        checked("delta_plus", self.delta_plus, _THICKNESS)
        checked("Pi", self.Pi, _STRENGTH)

    @property
    def kappa(self) -> float:  # type: ignore[override]
        """von Karman constant of the inner law [1]."""
        return self.inner.kappa

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the inner law [1]."""
        return self.inner.B

    @property
    def edge(self) -> float:
        """y+ of the outer edge [1]: delta+."""
        return self.delta_plus

    @property
    def FLOOR(self) -> float:  # type: ignore[override]
        """Floor of the inner law."""
        return self.inner.FLOOR

    def _wall(self, name: str, x: Floats) -> Floats:
        return self.inner._wall(name, x)

    def _note(self, y: Floats) -> None:
        self.inner._note(np.minimum(y, self.delta_plus))
        super()._note(y)

    def _wake_slope(self, y: Floats) -> Floats:
        eta = np.minimum(y / self.delta_plus, 1.0)
        return self.Pi * np.pi / (self.kappa * self.delta_plus) * np.sin(np.pi * eta)

    def _u(self, y: Floats) -> Floats:
        s = np.sin(0.5 * np.pi * np.minimum(y / self.delta_plus, 1.0))
        inside = np.minimum(y, self.delta_plus)
        return self.inner._u(inside) + 2.0 * self.Pi / self.kappa * s * s

    def _slope(self, y: Floats) -> Floats:
        return np.where(y < self.delta_plus, self.inner._slope(y) + self._wake_slope(y), 0.0)

    def _eddy(self, y: Floats) -> Floats:
        # 1/(s + w) - 1 with 1/s - 1 known
        slope, wake = self.inner._slope(y), self._wake_slope(y)
        eddy = (slope * self.inner._eddy(y) - wake) / (slope + wake)
        return np.where(y < self.delta_plus, eddy, super()._eddy(y))

    def _inside(self, y: Floats) -> Floats:
        x = np.pi * (y / self.delta_plus)
        square = x * x
        # x - sin(x): by its series below 1, where the difference would cancel
        tail = np.zeros_like(x)
        for j in range(17, 2, -2):
            tail = (1.0 - tail) * np.minimum(square, 1.0) / (j * (j - 1.0))
        rest = np.where(x < 1.0, x * tail, x - np.sin(x))
        wake = self.Pi / self.kappa * (self.delta_plus / np.pi) * rest
        return np.asarray(self.inner._integral(y) + wake)


@dataclass(frozen=True)
class Composite(Bounded):
    """Composite profile of Chauhan, Monkewitz and Nagib: their inner law and exponential wake.

    Parameters
    ----------
    delta_plus : float
        Thickness of the layer in wall units [1], 200 to 1e12.
    Pi : float, optional
        Strength of the wake [1], 0.05 to 10: 0.45.
    inner : Law, optional
        Their own inner law.

    Notes
    -----
    As published, u+ has its maximum just inside the edge, because the inner law there rises a
    little less than its log law: by 2e-4 at delta+ = 200, 1e-6 at 2000. Between, ``y_plus`` returns
    either of the two distances.

    References
    ----------
    chauhan-monkewitz-nagib-2009

    Examples
    --------
    >>> round(Composite(delta_plus=2000.0).u_plus(2000.0), 2)
    26.31
    """

    delta_plus: float
    Pi: float = from_table("composite_wake", "Pi")
    inner: Law = field(default_factory=ChauhanMonkewitzNagib)
    ROW: ClassVar[str] = "composite_wake"

    def __post_init__(self) -> None:
        _without_wake(self.inner)
        checked("delta_plus", self.delta_plus, Interval(200.0, _THICKNESS.high))
        checked("Pi", self.Pi, Interval(0.05, _STRENGTH.high))

    @property
    def kappa(self) -> float:  # type: ignore[override]
        """von Karman constant [1]."""
        return self.inner.kappa

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of the inner law [1]."""
        return self.inner.B

    @property
    def edge(self) -> float:
        """y+ of the outer edge [1]: delta+."""
        return self.delta_plus

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
        n = np.minimum(y / self.delta_plus, 1.0)
        inner = self.inner._u(np.minimum(y, self.delta_plus))
        return inner + 2.0 * self.Pi / self.kappa * self._wake(n)[0]

    def _slope(self, y: Floats) -> Floats:
        n = np.minimum(y / self.delta_plus, 1.0)
        wake = 2.0 * self.Pi / (self.kappa * self.delta_plus) * self._wake(n)[1]
        return np.where(y < self.delta_plus, self.inner._slope(y) + wake, 0.0)

    def _moment(self, y: Floats) -> Floats:
        """Of the wake alone: the inner law knows its own integral."""
        n = np.minimum(np.maximum(y, self.FLOOR) / self.delta_plus, 1.0)
        return 2.0 * self.Pi / self.kappa * n * self._wake(n)[1]

    def _inside(self, y: Floats) -> Floats:
        wake = 2.0 * self.Pi / self.kappa * self._wake(y / self.delta_plus)[0]
        return self.inner._integral(y) + (y * wake - moments(self)(y))


@dataclass(frozen=True)
class Cess(Bounded):
    """Profile of Cess, Reynolds and Tiederman of a developed pipe or channel, wall to centre.

    Parameters
    ----------
    re_tau : float
        u_tau R/nu with the radius or half height [1], 10 to 1e12.
    kappa, A_plus : float, optional
        0.2 to 1 and 1 to 200 [1]: 0.426 and 25.4, a fit to channels of Re_tau near 2000.

    Notes
    -----
    nu_t/nu = (sqrt(1 + [kappa y+ (2 - e)(3 - 4 e + 2 e^2)/3 (1 - exp(-y+/A+))]^2) - 1)/2 with
    e = y/R, under the stress tau/tau_w = 1 - e, which falls to 0 at the centre: eddy viscosity and
    mixing length are those of this stress, not of constant stress. Near the wall it is van
    Driest's law. Bulk values come from ``walllaw.developed(mixing_length="cess")``. Measured for
    Re_tau = 5000 against 30-digit quadrature, 800 points: u+ 3.7, integral 6.6 ulp.

    References
    ----------
    cess-1958

    Examples
    --------
    >>> round(Cess(re_tau=1000.0, kappa=0.421, A_plus=27.316).u_plus(1000.0), 10)
    22.9278017044
    """

    re_tau: float
    kappa: float = from_table("cess", "kappa")
    A_plus: float = from_table("cess", "A_plus")
    ROW: ClassVar[str] = "cess"

    def __post_init__(self) -> None:
        checked("re_tau", self.re_tau, _THICKNESS)
        _ = VanDriest(self.kappa, self.A_plus)

    @property
    def B(self) -> float:  # type: ignore[override]
        """Intercept of van Driest's law near the wall [1]."""
        return VanDriest(self.kappa, self.A_plus).B

    @property
    def edge(self) -> float:
        """y+ of the centre [1]: Re_tau."""
        return self.re_tau

    def _parts(self, y: Floats) -> tuple[Floats, Floats]:
        """Return the stress over that at the wall and nu_t/nu."""
        e = np.minimum(y / self.re_tau, 1.0)
        inside = np.minimum(y, self.re_tau)
        length = self.kappa * inside * -np.expm1(-inside / self.A_plus)
        x = length * ((2.0 - e) * (3.0 - e * (4.0 - 2.0 * e)) / 3.0)
        return 1.0 - e, 0.5 * (x * x) / (1.0 + np.sqrt(1.0 + x * x))

    def _slope(self, y: Floats) -> Floats:
        stress, eddy = self._parts(y)
        return stress / (1.0 + eddy)

    def _eddy(self, y: Floats) -> Floats:
        return self._parts(y)[1]

    def _length(self, y: Floats) -> Floats:
        stress, eddy = self._parts(y)
        return np.asarray(np.sqrt(eddy) * np.sqrt((1.0 + eddy) / np.maximum(stress, 1e-100)))

    def _u(self, y: Floats) -> Floats:
        inside = np.minimum(y, self.re_tau)
        near = inside * (1.0 - 0.5 * np.minimum(inside, 1.0) / self.re_tau)  # no eddies there
        return np.where(y < 1e-5, near, _cess(self)(inside))

    @property
    def stretch(self) -> float:
        """Scale of y+ on which the slope bends near the wall [1]."""
        return VanDriest(self.kappa, self.A_plus).stretch


@lru_cache(maxsize=64)
def _cess(law: Cess) -> Panels:
    return Panels.of(law._slope, law.stretch)
