"""Turbulent Prandtl numbers: local ones of nu_t/nu, and section means of the Reynolds number.

Use these through :mod:`walllaw.heat`. A constant needs no function: 0.85 in air wall layers, 0.9 in
common use.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    FloatLike,
    Floats,
)
from walllaw.relation import relation

_TERMS = 18  # of the series of _relaxation below t = 1; the next one is 1/20!, below rounding


def kays_crawford(viscosity_ratio: FloatLike, prandtl: FloatLike, far: FloatLike = 0.85) -> Any:
    """Return the local turbulent Prandtl number of Kays and Crawford.

    Parameters
    ----------
    viscosity_ratio : float or array
        nu_t/nu [1].
    prandtl : float or array
        Prandtl number [1].
    far : float or array, optional
        Value far from the wall [1].

    Returns
    -------
    float or ndarray
        Pr_t, from twice ``far`` at the wall to ``far`` [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    1/Pr_t = 1/(2P) + C Pe/sqrt(P) - (C Pe)^2 {1 - exp[-1/(C Pe sqrt(P))]} with Pe = Pr nu_t/nu and
    C = 0.3.
    With t = 1/(C Pe sqrt(P)) this is P/Pr_t = 1/2 + (t - 1 + exp(-t))/t^2, evaluated by its series
    below t = 1, where the printed form loses all digits at large Pe.

    References
    ----------
    kays-crawford-1993

    Examples
    --------
    >>> kays_crawford([0.0, 1.0, 100.0], 1.0).round(6)
    array([1.7     , 1.210577, 0.855107])
    """
    c = relation("heat", "kays_crawford")
    shape, (ratio, pr, p) = arrays.columns(
        viscosity_ratio=(viscosity_ratio, AMOUNT_OR_ZERO),
        prandtl=(prandtl, AMOUNT),
        far=(far, AMOUNT),
    )
    c.use(viscosity_ratio=ratio, prandtl=pr)
    return shape(arrays.blocks(_kays_crawford, pr * ratio, p))


def _kays_crawford(peclet: Floats, far: Floats) -> Floats:
    c = relation("heat", "kays_crawford")
    b = c["C"] * peclet * np.sqrt(far)
    return far / (0.5 + _relaxation(1.0 / np.maximum(b, 1e-300)))


def _relaxation(t: Floats) -> Floats:
    """Return (t - 1 + exp(-t))/t^2: 1/2 at t = 0, 0 far out."""
    small = np.minimum(t, 1.0)
    series = np.zeros_like(small)
    for k in range(_TERMS, 0, -1):
        series = (1.0 - small * series) / (k + 1.0)
    large = np.maximum(t, 1.0)
    return np.where(t < 1.0, series, (1.0 + np.expm1(-large) / large) / large)


def weigand(
    viscosity_ratio: FloatLike, prandtl: FloatLike, reynolds: FloatLike, far: FloatLike = 0.85
) -> Any:
    """Return the local turbulent Prandtl number of Weigand, Ferguson and Crawford.

    Parameters
    ----------
    viscosity_ratio : float or array
        nu_t/nu [1].
    prandtl : float or array
        Prandtl number [1].
    reynolds : float or array
        Bulk Reynolds number on the hydraulic diameter [1].
    far : float or array, optional
        Value far from the wall at high Reynolds number [1].

    Returns
    -------
    float or ndarray
        Pr_t [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    :func:`kays_crawford` with P = 0.85 + 100/(Pr Re^0.888); meant for liquid metals.

    References
    ----------
    weigand-1997

    Examples
    --------
    >>> round(weigand(1e9, 0.025, 1e5), 6)
    0.995231
    """
    c = relation("heat", "weigand")
    shape, (ratio, pr, re, p) = arrays.columns(
        viscosity_ratio=(viscosity_ratio, AMOUNT_OR_ZERO),
        prandtl=(prandtl, AMOUNT),
        reynolds=(reynolds, AMOUNT),
        far=(far, AMOUNT),
    )
    c.use(viscosity_ratio=ratio, prandtl=pr, reynolds=re)
    limit = p + c["factor"] / (pr * np.power(re, c["exponent"]))
    return shape(arrays.blocks(_kays_crawford, pr * ratio, limit))


def kays(viscosity_ratio: FloatLike, prandtl: FloatLike, *, liquid_metal: bool = False) -> Any:
    """Return the local turbulent Prandtl number of Kays.

    Parameters
    ----------
    viscosity_ratio : float or array
        nu_t/nu, above 0 [1].
    prandtl : float or array
        Prandtl number [1].
    liquid_metal : bool, optional
        Take the constant fitted to liquid metals.

    Returns
    -------
    float or ndarray
        Pr_t [1]; without bound towards the wall, where it does not matter.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    0.85 + c/Pe, Pe = Pr nu_t/nu; c = 0.7, or 2.0 for liquid metals.

    References
    ----------
    kays-1994

    Examples
    --------
    >>> round(kays(10.0, 0.7), 4)
    0.95
    """
    c = relation("heat", "kays")
    shape, (ratio, pr) = arrays.columns(
        viscosity_ratio=(viscosity_ratio, AMOUNT), prandtl=(prandtl, AMOUNT)
    )
    c.use(viscosity_ratio=ratio, prandtl=pr)
    factor = c["liquid_metal"] if liquid_metal else c["fluid"]
    return shape(c["far"] + factor / np.maximum(pr * ratio, 1e-300))


def reynolds_mean(reynolds: FloatLike, prandtl: FloatLike) -> Any:
    """Return the section-mean turbulent Prandtl number of A. J. Reynolds.

    Parameters
    ----------
    reynolds : float or array
        Bulk Reynolds number [1].
    prandtl : float or array
        Prandtl number [1].

    Returns
    -------
    float or ndarray
        Pr_t [1].

    Raises
    ------
    InputError
        If an argument cannot be used; the Reynolds number must be at least 1000, since the formula
        turns negative at low ones.

    Notes
    -----
    [1 + 100/sqrt(Pr Re)] [1/(1 + 120/sqrt(Re)) - 0.15].

    References
    ----------
    reynolds-1975

    Examples
    --------
    >>> round(reynolds_mean(1e5, 0.025), 4)
    1.7247
    """
    c = relation("heat", "reynolds")
    shape, (re, pr) = arrays.columns(
        reynolds=(reynolds, arrays.Interval(1e3, 1e30)), prandtl=(prandtl, AMOUNT)
    )
    c.use(reynolds=re, prandtl=pr)
    molecular = 1.0 + c["peclet"] / np.sqrt(pr * re)
    return shape(molecular * (1.0 / (1.0 + c["reynolds"] / np.sqrt(re)) - c["offset"]))


def jischa_rieke(reynolds: FloatLike, prandtl: FloatLike) -> Any:
    """Return the section-mean turbulent Prandtl number of Jischa and Rieke.

    Parameters
    ----------
    reynolds : float or array
        Bulk Reynolds number [1].
    prandtl : float or array
        Prandtl number [1].

    Returns
    -------
    float or ndarray
        Pr_t [1].

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    0.9 + 182.4/(Pr Re^0.888).

    References
    ----------
    jischa-rieke-1979

    Examples
    --------
    >>> round(jischa_rieke(1e5, 0.025), 4)
    1.1649
    """
    c = relation("heat", "jischa_rieke")
    shape, (re, pr) = arrays.columns(reynolds=(reynolds, AMOUNT), prandtl=(prandtl, AMOUNT))
    c.use(reynolds=re, prandtl=pr)
    return shape(c["far"] + c["factor"] / (pr * np.power(re, c["exponent"])))
