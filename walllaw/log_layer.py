"""Constants that laws of the wall share, and the plain log law with everything in closed form."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Any, ClassVar

import numpy as np

from walllaw import arrays
from walllaw.arrays import INTERCEPT, KAPPA, POSITIVE, Floats, Interval
from walllaw.errors import InputError
from walllaw.lambert import wright_omega, wright_omega_lower
from walllaw.law import Law
from walllaw.relation import relation


def from_table(row: str, name: str) -> Any:
    """Return a dataclass field whose default is a coefficient of ``relations/laws.toml``."""
    return field(default_factory=lambda: relation("laws", row)[name])


def checked(name: str, value: float, interval: Interval = POSITIVE) -> float:
    """Return a law's constant as a float after testing it.

    Raises
    ------
    InputError
        If it is not a single number inside the interval.
    """
    number = arrays.check(name, value, interval)
    if number.ndim:
        raise InputError(name, f"{number.size} values", "a single number; a law has one set")
    return float(number)


def exp(x: float) -> float:
    """Return exp(x) of one number, the same bits as in an array."""
    return float(np.exp(np.array([x]))[0])


def log(x: float) -> float:
    """Return ln(x) of one number, the same bits as in an array."""
    return float(np.log(np.array([x]))[0])


@dataclass(frozen=True)
class LogLayer(Law):
    """A law with a log layer: kappa with the intercept B, or with E = exp(kappa B).

    Parameters
    ----------
    kappa : float, optional
        von Karman constant [1], 0.01 to 1.
    B : float, optional
        Intercept [1], -100 to 100; 5.0 if neither B nor E is given.
    E : float, optional
        exp(kappa B) [1], positive, instead of B.

    Raises
    ------
    InputError
        If a constant is outside its interval, or both B and E are given and disagree.
    """

    kappa: float = from_table("log_law", "kappa")
    B: float = field(default_factory=lambda: _NOT_GIVEN)
    E: float = field(default_factory=lambda: _NOT_GIVEN, kw_only=True, compare=False, repr=False)

    def __post_init__(self) -> None:
        kappa = checked("kappa", self.kappa, KAPPA)
        b: float | None = self.B
        e: float | None = self.E
        if b is None and e is None:
            b = relation("laws", "log_law")["B"]
        if b is None:
            b = log(checked("E", self.E)) / kappa
        elif e is not None and abs(log(checked("E", e)) - kappa * b) > 1e-12:
            raise InputError("E", "B as well, of another log law", "one of the two")
        b = checked("B", b, INTERCEPT)
        for name, value in (("kappa", kappa), ("B", b), ("E", exp(kappa * b))):
            object.__setattr__(self, name, value)


_NOT_GIVEN: Any = None


@dataclass(frozen=True)
class LogLaw(LogLayer):
    """u+ = ln(y+)/kappa + B; meant above y+ = 30, negative below y+ = 1/E, 0 for y+ = 0.

    Takes ``kappa`` and one of ``B`` and ``E``. Friction velocity by the Wright omega function:
    2.0 ulp found over 1e4 values of Re_y from 1 to 1e18 (11 at 1e-9, where u+ is a power of Re_y).

    Examples
    --------
    >>> round(LogLaw(kappa=0.41, B=5.0).u_plus(100.0), 10)
    16.2321224048
    >>> round(LogLaw(kappa=0.4187, E=9.793).B, 9)
    5.449409708
    """

    ROW: ClassVar[str] = "log_law"
    FLOOR: ClassVar[float] = 1e-300

    @property
    def intersection(self) -> float:
        """y+ where the viscous and the log law cross (the larger of two roots) [1]."""
        s = self.kappa * self.B - log(self.kappa)
        if s < 1.0:
            raise InputError("B", f"{self.B:g}", "an intercept with which the two laws cross")
        return float(wright_omega_lower(np.array([s]))[0]) / self.kappa

    def _wall(self, name: str, x: Floats) -> Floats:
        # no wall in this law: 0 stands for what lies below; but u+ = 0 has a place
        return np.full_like(x, exp(-self.kappa * self.B) if name == "u_plus" else 0.0)

    def _u(self, y: Floats) -> Floats:
        return np.log(y) / self.kappa + self.B

    def _slope(self, y: Floats) -> Floats:
        return 1.0 / (self.kappa * y)

    def _eddy(self, y: Floats) -> Floats:
        return self.kappa * y - 1.0

    def _y(self, u: Floats) -> Floats:
        return np.exp(self.kappa * (u - self.B))

    def _u_of_re(self, re: Floats) -> Floats:
        return wright_omega(np.log(self.kappa * re) + self.kappa * self.B) / self.kappa

    def _integral(self, y: Floats) -> Floats:
        return y * (self._u(y) - 1.0 / self.kappa)
