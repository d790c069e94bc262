"""What every law of the wall can do, derived once from its u+(y+) and slope.

A law gives kernels on flat arrays: u+(y+) and du+/dy+ (Spalding's gives y+(u+) instead). The
inverse, the friction velocity, the eddy viscosity and mixing length that it implies and its
integral follow from them here. All equations are y+^a u+^b = x with a and b 0 or 1, and one scheme
solves them: a start from a table made once for the law, then a fixed number of Newton steps,
taken relative to the value so that nothing overflows. For the friction velocity the
scheme itself is tabulated to the last digits, and all points but those at kinks of the law take
their values from there.
"""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Callable
from functools import lru_cache
from typing import Any, ClassVar

import numpy as np

from walllaw import arrays
from walllaw.arrays import AMOUNT, AMOUNT_OR_ZERO, FloatLike, Floats, Interval
from walllaw.errors import InputError
from walllaw.octave_table import OctaveTable
from walllaw.panels import STRETCH, Panels
from walllaw.relation import relation
from walllaw.start_table import StartTable, nodes, safe_root

Y_PLUS = Interval(0.0, 1e30)
RE_Y = "velocity*distance/kinematic_viscosity"
_FLAT = 1e-100  # slope of a profile that has ended: its eddy viscosity is finite, and huge
_TABLE_STEPS = 40  # when a table is made, once for each law: bisection alone reaches 1e-9
_ROUGH_STEPS = 48
# natural logarithms of Re_y and of y+ or u+ that tables cover; straight beyond
_RE_SPAN, _SPAN = (-80.0, 70.0), (-40.0, 70.0)
_OCTAVES = (-64, 100)  # of Re_y, tabulated to the last digits: 5e-20 to 1e30
_LOW, _HIGH = 2.0 ** _OCTAVES[0], 2.0 ** _OCTAVES[1] * (1.0 - 2.0**-53)


def blend(viscous: Floats, log: Floats) -> Floats:
    """Return (viscous^-4 + log^-4)^(-1/4), without overflow."""
    ratio = np.minimum(viscous / log, 1e70)
    q = ratio * ratio
    return np.asarray(log * np.sqrt(q / np.sqrt(1.0 + q * q)))


class Law(ABC):
    """A monotone law of the wall u+(y+); arguments broadcast, scalars give floats.

    Every law has the methods of this class. y+ and u+ are accepted from 0, which gives 0; negative,
    infinite and NaN values are refused. Where a law's source states a range of y+, values outside
    it give a RangeWarning.

    A law of one's own gives ``kappa`` and ``B`` (of the log layer, for starts), ``ROW``, ``_u`` and
    ``_slope``, both for flat positive arrays, and ``stretch`` if its slope bends on a scale much
    below y+ = 15; it must be hashable and never fall.
    """

    kappa: float
    B: float
    ROW: ClassVar[str] = ""  # of tables/relations/laws.toml
    POLISH: ClassVar[int] = 1  # Newton steps after the table, one more for the inverse
    FLOOR: ClassVar[float] = 1e-60  # below, u+ = y+ to the last digit; squares would underflow

    @property
    def stretch(self) -> float:
        """Scale of y+ on which the slope bends near the wall, for the panels of integrals [1]."""
        return STRETCH

    @abstractmethod
    def _u(self, y: Floats) -> Floats:
        """Return u+ for flat positive y+."""

    @abstractmethod
    def _slope(self, y: Floats) -> Floats:
        """Return du+/dy+ for flat positive y+."""

    def _eddy(self, y: Floats) -> Floats:
        """Return nu_t/nu; laws that know it without the difference from 1 say so themselves."""
        return 1.0 / np.maximum(self._slope(y), _FLAT) - 1.0

    def _length(self, y: Floats) -> Floats:
        """Return the mixing length l+ from l+^2 = nu_t+ (1 + nu_t+)."""
        eddy = np.maximum(self._eddy(y), 0.0)
        return np.asarray(np.sqrt(eddy) * np.sqrt(1.0 + eddy))

    # -- the one scheme --------------------------------------------------------------------------

    def _pair(self, p: Floats) -> tuple[Floats, Floats, Floats, Floats]:
        """Return y+, u+ and their derivatives by ln p along the law, here with p = y+."""
        return p, self._u(p), p, p * self._slope(p)

    def _guess(self, x: Floats, a: int, b: int) -> tuple[Floats, Floats, Floats]:
        """Return a bracket of ln p and a first value in it where y+^a u+^b = exp(x)."""
        if a:
            return 0.5 * x - 3.0, np.maximum(x, 5.0) + 3.0, x - np.log(self._start(np.exp(x)))
        log = self.kappa * (np.exp(x) - self.B)
        return x - 5.0, np.maximum(x, log) + 20.0, np.maximum(x, log)

    def _start(self, re: Floats) -> Floats:
        """Return u+ within 15 % where u+ y+ = Re_y: viscous and log values blended."""
        z = np.maximum(np.log(self.kappa * re) + self.kappa * self.B, 1.2)
        ln = np.log(z)
        return blend(np.sqrt(re), (z - ln + ln / z) / self.kappa)

    def _solve(self, x: Floats, a: int, b: int) -> Floats:
        """Return p where y+^a u+^b = x."""
        p = np.exp(_table(self, a, b)(np.log(x)))
        for _ in range(self.POLISH if a else self.POLISH + 1):
            y, u, dy, du = self._pair(p)
            if a and b:
                miss, rate = x - y * u, dy * u + y * du
            else:
                miss, rate = (x - y, dy) if a else (x - u, du)
            step = miss / np.maximum(rate, 1e-90)
            np.minimum(np.maximum(step, -0.5, out=step), 1.0, out=step)
            step *= p
            p = p + step
        return p

    def _y(self, u: Floats) -> Floats:
        """Return y+ for flat positive u+."""
        return self._solve(u, 0, 1)

    def _u_of_re(self, re: Floats) -> Floats:
        """Return u+ where u+ y+ = Re_y, for flat positive Re_y."""
        return re / self._solve(re, 1, 1)

    def _rate_of_re(self, re: Floats) -> Floats:
        """Return the derivative of the same."""
        u = self._u_of_re(re)
        y = re / u
        rise = y * self._slope(y)
        return rise / (y * (u + rise))

    def _u_of_any_re(self, re: Floats) -> Floats:
        """Return u+ of Re_y from the table of the scheme; near its kinks, from the scheme."""
        table = _octaves(self)
        inside = np.minimum(np.maximum(re, _LOW), _HIGH)
        found = table(inside)
        kinked = table.kinked(inside)
        if kinked is not None or re.min() < _LOW:
            left = re < _LOW if kinked is None else kinked | (re < _LOW)
            if left.any():
                found[left] = self._u_of_re(re[left])
        return found

    def _moment(self, y: Floats) -> Floats:
        return y * self._slope(np.maximum(y, self.FLOOR))

    def _integral(self, y: Floats) -> Floats:
        """Return the integral of u+ dy+ from 0: y+ u+ less the integral of y+ du+."""
        return y * self._u(y) - moments(self)(y)

    def _note(self, y: Floats) -> None:
        """Note the use of the law's relation; warn where y+ is outside the range of its source."""
        relation("laws", self.ROW).use(y_plus=y)

    # -- public methods --------------------------------------------------------------------------

    def _wall(self, name: str, x: Floats) -> Floats:
        """Return the result at the wall for y+, u+ or Re_y below the floor."""
        return np.asarray(np.sqrt(x) if name == "re_y" else x)

    def _guarded(self, name: str, kernel: Callable[[Floats], Floats]) -> Callable[..., Floats]:
        def guarded(part: Floats) -> Floats:
            if part.min() >= self.FLOOR:  # the same bits, without the two selections
                return kernel(part)
            near = part < self.FLOOR
            wall = self._wall(name, np.minimum(part, self.FLOOR))
            return np.where(near, wall, kernel(np.where(near, 1.0, part)))

        return guarded

    def _of_y(self, y_plus: FloatLike, kernel: Callable[[Floats], Floats]) -> Any:
        """Evaluate a kernel that has a limit at the wall."""
        shape, (y,) = arrays.columns(y_plus=(y_plus, Y_PLUS))
        self._note(y)
        return shape(arrays.blocks(lambda part: kernel(np.maximum(part, self.FLOOR)), y))

    def u_plus(self, y_plus: FloatLike) -> Any:
        """Return the velocity at a distance.

        Parameters
        ----------
        y_plus : float or array
            Distance in wall units [1], 0 to 1e30.

        Returns
        -------
        float or ndarray
            u+ [1].

        Warns
        -----
        RangeWarning
            Outside the range of the law's source.

        Raises
        ------
        InputError
            If a value is negative, too large or not finite.
        """
        shape, (y,) = arrays.columns(y_plus=(y_plus, Y_PLUS))
        self._note(y)
        return shape(arrays.blocks(self._guarded("y_plus", self._u), y))

    def slope(self, y_plus: FloatLike) -> Any:
        """Return du+/dy+ [1] at y+, 0 to 1e30; 1 at the wall."""
        return self._of_y(y_plus, self._slope)

    def y_plus(self, u_plus: FloatLike) -> Any:
        """Return the distance at which the law has a velocity.

        Parameters
        ----------
        u_plus : float or array
            Velocity in wall units [1], from 0 to that at y+ = 1e30.

        Returns
        -------
        float or ndarray
            y+ [1].

        Warns
        -----
        RangeWarning
            If the y+ found is outside the range of the law's source.

        Raises
        ------
        InputError
            If a value is negative, above the largest velocity of the law, or not finite.
        """
        shape, (u,) = arrays.columns(u_plus=(u_plus, self._u_range()))
        y = arrays.blocks(self._guarded("u_plus", self._y), u)
        self._note(y)
        return shape(y)

    def _u_range(self) -> Interval:
        return Interval(0.0, float(self._u(np.full(1, Y_PLUS.high))[0]))

    def integral(self, y_plus: FloatLike) -> Any:
        """Return the integral of u+ dy+ from the wall to y+ [1]; y+ from 0 to 1e30."""
        shape, (y,) = arrays.columns(y_plus=(y_plus, Y_PLUS))
        self._note(y)

        def guarded(part: Floats) -> Floats:
            near = part < self.FLOOR
            return np.where(near, 0.0, self._integral(np.where(near, 1.0, part)))

        return shape(arrays.blocks(guarded, y))

    def eddy_viscosity(self, y_plus: FloatLike) -> Any:
        """Return nu_t/nu [1] implied under constant stress, 1/slope - 1; y+ from 0 to 1e30."""
        return self._of_y(y_plus, lambda y: np.maximum(self._eddy(y), 0.0))

    def mixing_length(self, y_plus: FloatLike) -> Any:
        """Return the mixing length l+ [1] implied under constant stress; y+ from 0 to 1e30.

        Notes
        -----
        l+^2 (du+/dy+)^2 = 1 - du+/dy+.
        """
        return self._of_y(y_plus, self._length)

    def u_plus_of_re_y(self, re_y: FloatLike) -> Any:
        """Return u+ [1] where u+ y+ = U y/nu = Re_y; Re_y from 0 to 1e30."""
        shape, (re,) = arrays.columns(re_y=(re_y, Y_PLUS))
        u = arrays.blocks(self._guarded("re_y", self._u_of_any_re), re)
        self._note_solved(lambda r, v: r / np.maximum(v, 1e-150), (re, u), re_y=re)
        return shape(u)

    def _note_solved(
        self, y_plus: Callable[..., Floats], solved: tuple[Floats, ...], **inputs: Floats
    ) -> None:
        """Note the use after a solution; y+ is worked out only where the source limits it."""
        if relation("laws", self.ROW).valid:
            self._note(arrays.blocks(y_plus, *solved))
        else:
            relation("laws", self.ROW).use(**inputs)

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
            Velocity along the wall [m/s], 0 to 1e30.
        distance : float or array
            Distance from the wall [m], positive.
        kinematic_viscosity : float or array
            [m2/s], positive.
        roughness : float or array, optional
            Equivalent sand-grain height [m]; with a roughness function.
        roughness_function : callable, optional
            Delta U+ of an array of k_s+, rising; taken off the law: u+ = law(y+) - Delta U+(k_s+).

        Returns
        -------
        float or ndarray
            u_tau [m/s]; 0 where the velocity is 0.

        Warns
        -----
        RangeWarning
            If the y+ found is outside the range of the law's source.

        Raises
        ------
        InputError
            If a value is outside its interval, Re_y = U y/nu is above 1e30, one of the two
            roughness arguments is missing, or no friction velocity fits the roughness.
        """
        if (roughness is None) != (roughness_function is None):
            raise InputError("roughness", "one of the two", "roughness with a roughness_function")
        given: dict[str, tuple[FloatLike, Interval]] = {
            "velocity": (velocity, AMOUNT_OR_ZERO),
            "distance": (distance, AMOUNT),
            "kinematic_viscosity": (kinematic_viscosity, AMOUNT),
        }
        if roughness is not None:
            given["roughness"] = (roughness, AMOUNT_OR_ZERO)
        shape, flat = arrays.columns(True, **given)

        def kernel(u: Floats, y: Floats, nu: Floats, *rough: Floats) -> Floats:
            for part, (name, (value, interval)) in zip(
                (u, y, nu, *rough), given.items(), strict=True
            ):
                if not arrays.within(part, interval):
                    arrays.check(name, value, interval)
            re = u * (y / nu)
            if not arrays.within(re, Y_PLUS):
                arrays.check(RE_Y, flat[0] * (flat[1] / flat[2]), Y_PLUS)
            if roughness_function is None and re.min() >= self.FLOOR:  # the same bits, sooner
                return u / self._u_of_any_re(re)
            if roughness_function is None:
                found = self._guarded("re_y", self._u_of_any_re)(re)
            else:
                found = self._rough(re, rough[0] / y, roughness_function)
            return np.where(re > 0.0, u / np.maximum(found, 1e-300), 0.0)

        u_tau = arrays.blocks(kernel, *flat)
        inputs = dict(zip(given, flat, strict=True))
        self._note_solved(lambda u, y, nu: u * (y / nu), (u_tau, *flat[1:3]), **inputs)
        return shape(u_tau)

    def _rough(self, re: Floats, ratio: Floats, shift: Callable[[Floats], Any]) -> Floats:
        """Return u+ where (law(y+) - Delta U+(ratio y+)) y+ = Re_y."""
        x = np.where(re > 0.0, np.maximum(re, self.FLOOR), 1.0)
        k = np.maximum(ratio, 1e-60)
        h = 1e-5  # of the difference quotient: good to 1e-5, so a Newton step gains five digits

        def residual(t: Floats) -> tuple[Floats, Floats]:
            y = np.exp(t)
            taken = np.asarray(shift(k * y))
            rate = (np.asarray(shift(k * (y * (1.0 + h)))) - taken) / h
            return self._u(y) - taken - x / y, y * self._slope(y) - rate + x / y

        smooth = self._guarded("re_y", self._u_of_any_re)(x)
        low = np.log(x / smooth) - 1e-3
        # as far as u+ = 0.001; a law with a greater shift than velocity has no flow
        t = safe_root(residual, low, np.maximum(np.log(x) + 7.0, low + 1.0), low, _ROUGH_STEPS)
        y = np.exp(t)
        miss, rate = residual(t)
        y = y * (1.0 - miss / np.maximum(rate, 1e-30))
        lost = ~((np.abs(miss) <= 1e-6 * (x / y)) & (re >= 0.0))
        if lost.any():
            worst = f"{float((ratio + 0.0 * re)[lost][0]):.4g} of the distance"
            raise InputError("roughness", worst, "a height that leaves a velocity above it")
        return np.where(re < self.FLOOR, np.sqrt(np.maximum(re, 0.0)), x / y)


@lru_cache(maxsize=64)
def _table(law: Law, a: int, b: int) -> StartTable:
    """Return ln p against ln x where y+^a u+^b = x."""
    low, high = _RE_SPAN if a and b else _SPAN
    if not a:
        high = float(np.log(np.array([law._u_range().high]))[0])
    x = nodes(low, high)

    def residual(t: Floats) -> tuple[Floats, Floats]:
        y, u, dy, du = law._pair(np.exp(t))
        here = u > 0.0  # a log law without a wall is negative near it: bisection leads out
        u = np.where(here, u, 1e-300)
        rate = a * dy / y + b * np.where(here, du / u, 1.0)
        return a * np.log(y) + b * np.log(u) - x, rate

    t = safe_root(residual, *law._guess(x, a, b), _TABLE_STEPS)
    return StartTable.of(low, t, 1.0 / np.maximum(residual(t)[1], 1e-30))


@lru_cache(maxsize=64)
def _octaves(law: Law) -> OctaveTable:
    """Return u+ against Re_y to the last digits."""
    return OctaveTable.of(
        lambda re: arrays.blocks(law._u_of_re, re),
        lambda re: arrays.blocks(law._rate_of_re, re),
        *_OCTAVES,
    )


@lru_cache(maxsize=64)
def moments(law: Law) -> Panels:
    """Return the integrator of y+ du+ of a law, made once."""
    return Panels.of(law._moment, law.stretch)
