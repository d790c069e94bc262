"""What every wall law can do, derived once from its u+(y+) and slope.

A law gives two kernels on flat arrays, u+(y+) and du+/dy+; the inverse, the friction velocity, the
implied eddy viscosity and mixing length and the integral follow from them here. All solutions take
a fixed number of steps from a start that works over the whole domain.
"""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Callable
from functools import cache
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import NONNEGATIVE, POSITIVE, FloatLike, Floats, Interval
from walllaw.errors import InputError

Y_PLUS = Interval(0.0, 1e30)
U_PLUS = Interval(0.0, 150.0)
_TINY = 1e-300  # stands in for 0, whose logarithm the kernels must not see
_FLAT = 1e-100  # slope of a profile that has ended: its eddy viscosity is finite, and huge
_VISCOUS = 1e-60  # below, u+ = y+ to the last digit for every law, and squares would underflow
_STEPS = 16  # steps of the inverse: Newton inside a bracket, bisection where Newton would leave it
_RE_STEPS = 5  # Newton steps for u+ y+ = Re_y, whose slope in logarithms lies between 1 and 2


@cache
def gauss(count: int) -> tuple[Floats, Floats]:
    """Return nodes and weights of Gauss-Legendre quadrature on 0 to 1."""
    x, w = np.polynomial.legendre.leggauss(count)
    return 0.5 * (x + 1.0), 0.5 * w


# Integrals: y+ = STRETCH (exp(s) - 1), panels of fixed width in s. The nearest singularity of the
# van Driest slope lies 0.21 off the real axis of s: 10 nodes on a width of 1/8 reach 1e-17.
STRETCH = 15.0
_PANEL, _PANELS, _NODES = 0.125, 1900, 10


def blend(viscous: Floats, log: Floats) -> Floats:
    """Return (viscous^-4 + log^-4)^(-1/4), without overflow."""
    ratio = np.minimum(viscous / log, 1e70)
    q = ratio * ratio
    return np.asarray(log * np.sqrt(q / np.sqrt(1.0 + q * q)))


def panel_table(integrand: Callable[[Floats], Floats]) -> Floats:
    """Return the integral of f(y+) dy+ from 0 to the start of each panel."""
    x, w = gauss(_NODES)
    s = _PANEL * (np.arange(_PANELS)[:, np.newaxis] + x)
    y = STRETCH * np.expm1(s)
    # summed node by node in one order, so that the table never depends on how it is used
    parts = np.zeros(_PANELS)
    values = integrand(y.reshape(-1)).reshape(y.shape) * (STRETCH * np.exp(s))
    for j in range(_NODES):
        parts = parts + w[j] * values[:, j]
    return np.concatenate([np.zeros(1), np.cumsum(_PANEL * parts)])


def panel_integral(y_plus: Floats, table: Floats, integrand: Callable[[Floats], Floats]) -> Floats:
    """Return the integral of f(y+) dy+ from 0 to each y+: table value and a partial panel."""
    s = np.log1p(y_plus / STRETCH)
    panel = np.floor(s / _PANEL)
    start = _PANEL * panel
    width = s - start
    total = np.zeros_like(y_plus)
    x, w = gauss(_NODES)
    for j in range(_NODES):
        node = start + x[j] * width
        total = total + w[j] * (integrand(STRETCH * np.expm1(node)) * (STRETCH * np.exp(node)))
    return table[panel.astype(np.int64)] + width * total


class Law(ABC):
    """A monotone law of the wall u+(y+); arguments broadcast, scalars give floats.

    y+ and u+ are accepted from 0 (which gives 0); negative, infinite and NaN values are refused.
    """

    kappa: float
    B: float

    @abstractmethod
    def _u(self, y: Floats) -> Floats:
        """Return u+ for flat positive y+."""

    @abstractmethod
    def _slope(self, y: Floats) -> Floats:
        """Return du+/dy+ for flat positive y+."""

    def _y(self, u: Floats) -> Floats:
        """Return y+ for flat positive u+: Newton on ln y+ with the own slope, in a bracket."""
        x = self.kappa * u
        # Spalding's formula as the start: u itself near the wall, the log law far from it
        series = np.exp(np.array([-self.kappa * self.B])) * (1.0 + x * (1.0 + x * (0.5 + x / 6.0)))
        rise = np.exp(np.minimum(x - self.kappa * self.B, 230.0)) - series
        low = np.log(u) - 0.5
        high = np.log(u + np.maximum(rise, 0.0)) + 1.0
        t = high - 1.0
        for _ in range(_STEPS):
            y = np.exp(t)
            miss, slope = u - self._u(y), self._slope(y) * y
            low, high = np.where(miss > 0.0, t, low), np.where(miss > 0.0, high, t)
            step = t + miss / np.maximum(slope, _TINY)
            # the margin keeps rounding at the root from being taken for a step out of the bracket
            inside = (step > low - 1e-6) & (step < high + 1e-6)
            t = np.where(inside, step, 0.5 * (low + high))
        y = np.exp(t)
        return np.asarray(y + (u - self._u(y)) / np.maximum(self._slope(y), 1e-30))

    def _start(self, re: Floats) -> Floats:
        """Return u+ within a few per cent where u+ y+ = Re_y: viscous and log values blended."""
        z = np.maximum(np.log(self.kappa * re) + self.kappa * self.B, 1.2)
        ln = np.log(z)
        return blend(np.sqrt(re), (z - ln + ln / z) / self.kappa)

    def _u_of_re(self, re: Floats) -> Floats:
        """Return u+ where u+ y+ = Re_y, for flat positive Re_y."""
        y = re / self._start(re)
        for _ in range(_RE_STEPS):
            u = self._u(y)
            y = y * np.exp(-np.log(y * u / re) / (1.0 + y * self._slope(y) / u))
        return re / y

    def _integral(self, y: Floats) -> Floats:
        """Return the integral of u+ dy+ from 0: y+ u+ less the integral of y+ du+."""
        return y * self._u(y) - panel_integral(y, self._moment_table(), self._moment)

    def _moment(self, y: Floats) -> Floats:
        return y * self._slope(np.maximum(y, _VISCOUS))

    def _moment_table(self) -> Floats:
        return _moment_tables(self)

    def _near_wall(self, name: str, x: Floats) -> Floats:
        """Return the limit u+ = y+ at the wall, as a function of y+, u+ or Re_y."""
        return np.sqrt(x) if name == "re_y" else x

    def _apply(self, name: str, value: FloatLike, interval: Interval, kernel: Any) -> Any:
        shape, (x,) = arrays.columns(**{name: (value, interval)})

        def guarded(part: Floats) -> Floats:
            near = part < _VISCOUS
            limit = self._near_wall(name, np.minimum(part, _VISCOUS))
            return np.where(near, limit, kernel(np.where(near, 1.0, part)))

        return shape(arrays.blocks(guarded, x))

    def u_plus(self, y_plus: FloatLike) -> Any:
        """Return u+ at y+ [1]; y+ from 0 to 1e30."""
        return self._apply("y_plus", y_plus, Y_PLUS, self._u)

    def slope(self, y_plus: FloatLike) -> Any:
        """Return du+/dy+ at y+ [1]; 1 at the wall."""
        shape, (y,) = arrays.columns(y_plus=(y_plus, Y_PLUS))
        return shape(arrays.blocks(lambda part: self._slope(np.maximum(part, _VISCOUS)), y))

    def y_plus(self, u_plus: FloatLike) -> Any:
        """Return y+ where the law has u+ [1]; u+ from 0 to 150."""
        return self._apply("u_plus", u_plus, U_PLUS, self._y)

    def integral(self, y_plus: FloatLike) -> Any:
        """Return the integral of u+ dy+ from the wall to y+ [1]."""
        shape, (y,) = arrays.columns(y_plus=(y_plus, Y_PLUS))

        def guarded(part: Floats) -> Floats:
            near = part < _VISCOUS
            return np.where(near, 0.0, self._integral(np.where(near, 1.0, part)))

        return shape(arrays.blocks(guarded, y))

    def eddy_viscosity(self, y_plus: FloatLike) -> Any:
        """Return nu_t/nu implied by the law under constant stress, 1/slope - 1 [1]."""
        shape, (y,) = arrays.columns(y_plus=(y_plus, Y_PLUS))
        return shape(
            arrays.blocks(
                lambda p: np.maximum(
                    1.0 / np.maximum(self._slope(np.maximum(p, _VISCOUS)), _FLAT) - 1.0, 0.0
                ),
                y,
            )
        )

    def mixing_length(self, y_plus: FloatLike) -> Any:
        """Return the mixing length in wall units implied under constant stress [1]."""

        def kernel(part: Floats) -> Floats:
            slope = np.clip(self._slope(np.maximum(part, _VISCOUS)), _FLAT, 1.0)
            return np.sqrt(1.0 - slope) / slope

        shape, (y,) = arrays.columns(y_plus=(y_plus, Y_PLUS))
        return shape(arrays.blocks(kernel, y))

    def u_plus_of_re_y(self, re_y: FloatLike) -> Any:
        """Return u+ where u+ y+ = U y/nu = Re_y [1]; Re_y from 0 to 1e30."""
        return self._apply("re_y", re_y, Y_PLUS, self._u_of_re)

    def friction_velocity(
        self,
        velocity: FloatLike,
        distance: FloatLike,
        kinematic_viscosity: FloatLike,
        *,
        roughness: FloatLike | None = None,
        roughness_function: Callable[[Floats], Any] | None = None,
    ) -> Any:
        """Return the friction velocity that the law gives for a velocity at a distance.

        Parameters
        ----------
        velocity : float or array
            Velocity along the wall [m/s], from 0.
        distance : float or array
            Distance from the wall [m], positive.
        kinematic_viscosity : float or array
            [m2/s], positive.
        roughness : float or array, optional
            Equivalent sand-grain height [m]; with a roughness function.
        roughness_function : callable, optional
            Delta U+ of an array of k_s+, rising; taken off the law.

        Returns
        -------
        float or ndarray
            u_tau [m/s]; 0 where the velocity is 0.

        Raises
        ------
        InputError
            If a value is outside its interval, or one of the two roughness arguments is missing.
        """
        if (roughness is None) != (roughness_function is None):
            raise InputError("roughness", "one of the two", "roughness with a roughness_function")
        shape, (u, y, nu, *rough) = arrays.columns(
            velocity=(velocity, NONNEGATIVE),
            distance=(distance, POSITIVE),
            kinematic_viscosity=(kinematic_viscosity, POSITIVE),
            **({} if roughness is None else {"roughness": (roughness, NONNEGATIVE)}),
        )
        re = u * (y / nu)
        arrays.check("velocity*distance/kinematic_viscosity", re, Y_PLUS)
        if roughness_function is None:
            return shape(u / np.atleast_1d(np.where(re > 0, self.u_plus_of_re_y(re), 1.0)))
        ratio = rough[0] / y
        positive = np.where(re > 0, re, 1.0)
        return shape(u / self._rough(positive, ratio, roughness_function))

    def _rough(self, re: Floats, ratio: Floats, shift: Callable[[Floats], Any]) -> Floats:
        """Return u+ where (law(y+) - Delta U+(ratio y+)) y+ = Re_y: bisection in ln y+.

        The left side rises with y+ wherever it is positive; 60 halvings of 50 decades reach the
        rounding of the logarithm, whatever the roughness function is.
        """
        low = np.log(np.sqrt(re)) - 1.0 + 0.0 * ratio
        high = low + 60.0 + 0.5 * np.abs(low)
        for _ in range(64):
            middle = 0.5 * (low + high)
            y = np.exp(middle)
            above = y * (self._u(y) - np.asarray(shift(ratio * y))) > re
            low, high = np.where(above, low, middle), np.where(above, middle, high)
        return re / np.exp(0.5 * (low + high))


@cache
def _moment_tables(law: Law) -> Floats:
    return panel_table(law._moment)
