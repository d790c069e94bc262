"""Recovery temperature and viscosity of air; reached by users as ``walllaw.compressible``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Floats, Interval
from walllaw.relation import relation

MACH = Interval(0.0, 100.0)
RECOVERY = Interval(0.0, 1.0)
GAMMA = Interval(1.0, 2.0, open_low=True)
KELVIN = Interval(1.0, 1e5)


def recovery_factor(prandtl: FloatLike) -> Any:
    """Recovery factor of a turbulent layer.

    Parameters
    ----------
    prandtl : array_like
        Prandtl number [1], positive.

    Returns
    -------
    float or ndarray
        Pr^(1/3) [1]; 0.89 for air.

    Warns
    -----
    RangeWarning
        Outside Pr 0.5 to 2.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    eckert-1955

    Examples
    --------
    >>> round(recovery_factor(0.71), 4)
    0.8921
    """
    shape, (pr,) = arrays.columns(prandtl=(prandtl, POSITIVE))
    relation("compressible", "recovery_factor").use(prandtl=pr)
    return shape(np.cbrt(pr))


def recovery_factor_laminar(prandtl: FloatLike) -> Any:
    """Recovery factor of a laminar layer.

    Parameters
    ----------
    prandtl : array_like
        Prandtl number [1], positive.

    Returns
    -------
    float or ndarray
        sqrt(Pr) [1].

    Warns
    -----
    RangeWarning
        Outside Pr 0.5 to 2.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    eckert-1955

    Examples
    --------
    >>> round(recovery_factor_laminar(0.71), 4)
    0.8426
    """
    shape, (pr,) = arrays.columns(prandtl=(prandtl, POSITIVE))
    relation("compressible", "recovery_factor_laminar").use(prandtl=pr)
    return shape(np.sqrt(pr))


def adiabatic_wall_ratio(
    mach: FloatLike, recovery_factor: FloatLike = 0.89, heat_capacity_ratio: FloatLike = 1.4
) -> Any:
    """Adiabatic wall temperature over the edge temperature.

    Parameters
    ----------
    mach : array_like
        Edge Mach number [1], 0 to 100.
    recovery_factor : array_like, optional
        [1], 0 to 1.
    heat_capacity_ratio : array_like, optional
        gamma [1], above 1 to 2.

    Returns
    -------
    float or ndarray
        T_aw/T_e = 1 + r (gamma - 1)/2 M^2 [1].

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    References
    ----------
    van-driest-1956-compressible

    Examples
    --------
    >>> round(adiabatic_wall_ratio(2.0), 3)
    1.712
    """
    shape, (m, r, g) = arrays.columns(
        mach=(mach, MACH),
        recovery_factor=(recovery_factor, RECOVERY),
        heat_capacity_ratio=(heat_capacity_ratio, GAMMA),
    )
    relation("compressible", "adiabatic_wall_ratio").use(mach=m)
    return shape(1.0 + heating(m, r, g))


def heating(mach: Floats, recovery: Floats, gamma: Floats) -> Floats:
    """Return r (gamma - 1)/2 M^2 (kernel)."""
    return 0.5 * recovery * (gamma - 1.0) * (mach * mach)


def sutherland_ratio(temperature: FloatLike, reference_temperature: FloatLike) -> Any:
    """Dynamic viscosity of air over its value at a reference temperature (Sutherland).

    Parameters
    ----------
    temperature, reference_temperature : array_like
        [K], 1 to 1e5.

    Returns
    -------
    float or ndarray
        mu(T)/mu(T_0) [1], of the broadcast shape.

    Warns
    -----
    RangeWarning
        Outside 100 K to 1900 K.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    (T/T_0)^(3/2) (T_0 + S)/(T + S), S = 110.4 K.

    References
    ----------
    nasa-tmr-2025

    Examples
    --------
    >>> round(sutherland_ratio(300.0, 513.6), 10)
    0.6787683711
    """
    r = relation("compressible", "sutherland_ratio")
    shape, (t, t0) = arrays.columns(
        temperature=(temperature, KELVIN), reference_temperature=(reference_temperature, KELVIN)
    )
    r.use(temperature=t, reference_temperature=t0)
    return shape(sutherland(t, t0))


def sutherland(t: Floats, t0: Floats) -> Floats:
    """Viscosity of air at t over that at t0 (kernel)."""
    constant = relation("compressible", "sutherland_ratio")["constant"]
    ratio = t / t0
    return ratio * np.sqrt(ratio) * ((t0 + constant) / (t + constant))
