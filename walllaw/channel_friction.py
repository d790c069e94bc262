"""Friction of plane channels; public names are reached as ``walllaw.friction``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike
from walllaw.relation import relation
from walllaw.smooth_friction import TURBULENT


def dean(reynolds: FloatLike) -> Any:
    """Skin-friction coefficient (not Darcy's factor) of a developed plane channel, Dean 1978.

    Parameters
    ----------
    reynolds : array_like
        2 h U_b/nu with the half height h [1], half the Reynolds number on the hydraulic diameter;
        from 100.

    Returns
    -------
    float or ndarray
        c_f = 2 (u_tau/U_b)^2 [1]; within 5.5 % of direct simulations. Darcy's factor is 4 c_f.

    Warns
    -----
    RangeWarning
        Outside Re 6e3 to 6e5.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    c_f = 0.073 Re^(-1/4).

    References
    ----------
    dean-1978

    Examples
    --------
    >>> round(dean(40000.0), 8)
    0.00516188
    """
    r = relation("friction", "dean")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.sqrt(np.sqrt(re)))


def zanoun(reynolds: FloatLike) -> Any:
    """Skin-friction coefficient (not Darcy's factor) of a developed plane channel, Zanoun et al.

    Parameters
    ----------
    reynolds : array_like
        2 h U_b/nu with the half height h [1], half the Reynolds number on the hydraulic diameter;
        from 100.

    Returns
    -------
    float or ndarray
        c_f = 2 (u_tau/U_b)^2 [1]. Darcy's factor is 4 c_f.

    Warns
    -----
    RangeWarning
        Outside Re 6e3 to 6e5.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    c_f = 0.0743 Re^(-1/4).

    References
    ----------
    zanoun-nagib-durst-2009

    Examples
    --------
    >>> round(zanoun(40000.0), 8)
    0.0052538
    """
    r = relation("friction", "zanoun")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.sqrt(np.sqrt(re)))


def dean_velocity_ratio(reynolds: FloatLike) -> Any:
    """Centreline over bulk velocity of a developed plane channel, Dean 1978.

    Parameters
    ----------
    reynolds : array_like
        2 h U_b/nu with the half height h [1], half the Reynolds number on the hydraulic diameter;
        from 100.

    Returns
    -------
    float or ndarray
        U_c/U_b [1]; within 0.6 % of direct simulations.

    Warns
    -----
    RangeWarning
        Outside Re 6e3 to 6e5.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    U_c/U_b = 1.28 Re^(-0.0116).

    References
    ----------
    dean-1978

    Examples
    --------
    >>> round(dean_velocity_ratio(40000.0), 4)
    1.1319
    """
    r = relation("friction", "dean_velocity_ratio")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.power(re, r["power"]))
