"""Equivalent roughness heights: sand grain, aerodynamic, of a wall function, from statistics.

Use these through :mod:`walllaw.roughness`.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    INTERCEPT,
    KAPPA,
    FloatLike,
    Interval,
)
from walllaw.relation import relation


def nikuradse_constant(kappa: FloatLike = 0.41, B: FloatLike = 5.0) -> Any:
    """Return the roughness constant with which a wall function reproduces Nikuradse's sand.

    Parameters
    ----------
    kappa, B : float or array, optional
        Smooth log law of the wall function; B = ln(E)/kappa [1].

    Returns
    -------
    float or ndarray
        C_s [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    C_s = E exp(-8.5 kappa), from ln(E/C_s)/kappa = 8.5: 0.279 for (0.4187, E = 9.793), not 0.5.

    References
    ----------
    nikuradse-1933

    Examples
    --------
    >>> round(nikuradse_constant(0.4187, 5.449409708), 6)
    0.278794
    """
    c = relation("roughness", "equivalent_roughness")
    shape, (kap, b) = arrays.columns(kappa=(kappa, KAPPA), B=(B, INTERCEPT))
    c.use(kappa=kap)
    return shape(np.exp(kap * (b - c["B_rough"])))


def equivalent_roughness(
    height: FloatLike, C_s: FloatLike, kappa: FloatLike = 0.41, B: FloatLike = 5.0
) -> Any:
    """Return the sand grain that a wall function with a roughness constant stands for.

    Parameters
    ----------
    height : float or array
        Height given to the wall function [m].
    C_s : float or array
        Roughness constant given to it [1].
    kappa, B : float or array, optional
        Its smooth log law; B = ln(E)/kappa [1].

    Returns
    -------
    float or ndarray
        Equivalent sand grain k_s in the fully rough limit [m].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    k_s = k C_s exp(8.5 kappa)/E: 1.79 k for C_s = 0.5 and (0.4187, E = 9.793).

    References
    ----------
    nikuradse-1933

    Examples
    --------
    >>> round(equivalent_roughness(1.0, 0.5, 0.4187, 5.449409708), 4)
    1.7934
    """
    c = relation("roughness", "equivalent_roughness")
    shape, (k, cs, kap, b) = arrays.columns(
        height=(height, AMOUNT_OR_ZERO), C_s=(C_s, AMOUNT), kappa=(kappa, KAPPA), B=(B, INTERCEPT)
    )
    c.use(height=k, C_s=cs)
    return shape(k * cs * np.exp(kap * (c["B_rough"] - b)))


def aerodynamic_roughness(roughness: FloatLike, kappa: FloatLike = 0.41) -> Any:
    """Return the aerodynamic roughness length of a sand grain, fully rough.

    Parameters
    ----------
    roughness : float or array
        Equivalent sand grain k_s [m].
    kappa : float or array, optional
        von Karman constant [1].

    Returns
    -------
    float or ndarray
        z0 of u+ = ln(y/z0)/kappa [m].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    z0 = k_s exp(-8.5 kappa): k_s/30 for 0.40, k_s/32.6 for 0.41.

    References
    ----------
    nikuradse-1933

    Examples
    --------
    >>> round(aerodynamic_roughness(1.0, 0.40), 10)
    0.03337327
    """
    c = relation("roughness", "aerodynamic")
    shape, (ks, kap) = arrays.columns(roughness=(roughness, AMOUNT_OR_ZERO), kappa=(kappa, KAPPA))
    c.use(roughness=ks)
    return shape(ks * np.exp(-c["B_rough"] * kap))


def from_aerodynamic(aerodynamic_roughness: FloatLike, kappa: FloatLike = 0.41) -> Any:
    """Return the sand grain of an aerodynamic roughness length, fully rough.

    Parameters
    ----------
    aerodynamic_roughness : float or array
        z0 [m].
    kappa : float or array, optional
        von Karman constant [1].

    Returns
    -------
    float or ndarray
        Equivalent sand grain k_s, about 30 z0 [m].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    k_s = z0 exp(8.5 kappa). A wall function with a roughness constant needs
    :func:`wall_function_height` instead.

    References
    ----------
    nikuradse-1933

    Examples
    --------
    >>> round(from_aerodynamic(0.03, 0.40), 6)
    0.898923
    """
    c = relation("roughness", "aerodynamic")
    shape, (z0, kap) = arrays.columns(
        aerodynamic_roughness=(aerodynamic_roughness, AMOUNT_OR_ZERO), kappa=(kappa, KAPPA)
    )
    c.use(aerodynamic_roughness=z0)
    return shape(z0 * np.exp(c["B_rough"] * kap))


def wall_function_height(
    aerodynamic_roughness: FloatLike,
    C_s: FloatLike = 0.5,
    kappa: FloatLike = 0.41,
    B: FloatLike = 5.0,
) -> Any:
    """Return the height to give a wall function for an aerodynamic roughness length.

    Parameters
    ----------
    aerodynamic_roughness : float or array
        z0 [m].
    C_s : float or array, optional
        Roughness constant of the wall function [1].
    kappa, B : float or array, optional
        Its smooth log law; B = ln(E)/kappa [1].

    Returns
    -------
    float or ndarray
        Roughness height k; about 20 z0 for C_s = 0.5 and E = 9.793 [m].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    k = E z0/C_s: the two log laws agree for C_s k+ well above 1. The first unknown must lie above
    the height.

    References
    ----------
    blocken-2007

    Examples
    --------
    >>> round(wall_function_height(0.03, 0.5, 0.4187, 5.449409708), 5)
    0.58758
    """
    c = relation("roughness", "aerodynamic_wall_function")
    shape, (z0, cs, kap, b) = arrays.columns(
        aerodynamic_roughness=(aerodynamic_roughness, AMOUNT_OR_ZERO),
        C_s=(C_s, AMOUNT),
        kappa=(kappa, KAPPA),
        B=(B, INTERCEPT),
    )
    c.use(aerodynamic_roughness=z0, C_s=cs)
    return shape(z0 * np.exp(kap * b) / cs)


def flack_schultz(rms_height: FloatLike, skewness: FloatLike) -> Any:
    """Return the equivalent sand grain of a surface from its height statistics, fully rough.

    Parameters
    ----------
    rms_height : float or array
        Root-mean-square height of the surface about its mean [m].
    skewness : float or array
        Skewness of the heights, above -1 [1].

    Returns
    -------
    float or ndarray
        Equivalent sand grain k_s [m].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    k_s = 4.43 k_rms (1 + Sk)^1.37.

    References
    ----------
    flack-schultz-2010

    Examples
    --------
    >>> round(flack_schultz(1e-4, 0.5), 7)
    0.0007721
    """
    c = relation("roughness", "flack_schultz")
    shape, (rms, skew) = arrays.columns(
        rms_height=(rms_height, AMOUNT_OR_ZERO),
        skewness=(skewness, Interval(-1.0, 1e30, open_low=True)),
    )
    c.use(rms_height=rms, skewness=skew)
    return shape(c["factor"] * rms * np.power(1.0 + skew, c["exponent"]))
