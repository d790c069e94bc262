"""Turbulent plate layers by momentum thickness; public names are reached as ``walllaw.plate``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike, Interval
from walllaw.relation import relation
from walllaw.roots import inverse_root

THETA = Interval(10.0, 1e300)


def karman_schoenherr_theta(re_theta: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by Re_theta, Karman-Schoenherr.

    Parameters
    ----------
    re_theta : array_like
        Momentum-thickness Reynolds number U theta/nu [1], from 10.

    Returns
    -------
    float or ndarray
        c_f [1]; 4 to 5 % above modern data for Re_theta > 3000.

    Warns
    -----
    RangeWarning
        Outside 200 to 1e5.

    Raises
    ------
    InputError
        If a value is below 10 or not finite.

    Notes
    -----
    c_f = 1/(17.08 l^2 + 25.11 l + 6.012), l = log10(Re_theta).

    References
    ----------
    schoenherr-1932; nasa-tmr-2025

    Examples
    --------
    >>> round(karman_schoenherr_theta(1e4), 12)
    0.002633436213
    """
    r = relation("plate", "karman_schoenherr_theta")
    shape, (re,) = arrays.columns(re_theta=(re_theta, THETA))
    r.use(re_theta=re)
    log = np.log10(re)
    return shape(1.0 / ((r["square"] * log + r["slope"]) * log + r["constant"]))


def power_1_6_theta(re_theta: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by Re_theta, one-sixth power law.

    Parameters
    ----------
    re_theta : array_like
        Momentum-thickness Reynolds number U theta/nu [1], from 10.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 1e3 to 1e5.

    Raises
    ------
    InputError
        If a value is below 10 or not finite.

    Notes
    -----
    c_f = 0.012 Re_theta^(-1/6).

    References
    ----------
    white-1974, eq. 6-116

    Examples
    --------
    >>> round(power_1_6_theta(1e4), 11)
    0.00258532163
    """
    r = relation("plate", "power_1_6_theta")
    shape, (re,) = arrays.columns(re_theta=(re_theta, THETA))
    r.use(re_theta=re)
    return shape(r["factor"] * inverse_root(re, 6))


def osterlund_theta(re_theta: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by Re_theta, Osterlund et al. 2000.

    Parameters
    ----------
    re_theta : array_like
        Momentum-thickness Reynolds number U theta/nu [1], from 10.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 2.5e3 to 2.7e4.

    Raises
    ------
    InputError
        If a value is below 10 or not finite.

    Notes
    -----
    c_f = 2/[ln(Re_theta)/kappa + C]^2 with kappa = 0.38, C = 4.08.

    References
    ----------
    osterlund-2000

    Examples
    --------
    >>> round(osterlund_theta(1e4), 10)
    0.0024940944
    """
    r = relation("plate", "osterlund_theta")
    shape, (re,) = arrays.columns(re_theta=(re_theta, THETA))
    r.use(re_theta=re)
    return shape(2.0 / np.square(np.log(re) / r["kappa"] + r["constant"]))


def nagib_theta(re_theta: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by Re_theta, Nagib et al. 2007.

    Parameters
    ----------
    re_theta : array_like
        Momentum-thickness Reynolds number U theta/nu [1], from 10.

    Returns
    -------
    float or ndarray
        c_f [1]; within 2 % of simulations for Re_theta > 2000.

    Warns
    -----
    RangeWarning
        Outside 2e3 to 1e5.

    Raises
    ------
    InputError
        If a value is below 10 or not finite.

    Notes
    -----
    c_f = 2/[ln(Re_theta)/kappa + C]^2 with kappa = 0.384, C = 4.127.

    References
    ----------
    nagib-chauhan-monkewitz-2007

    Examples
    --------
    >>> round(nagib_theta(1e4), 10)
    0.002530687
    """
    r = relation("plate", "nagib_theta")
    shape, (re,) = arrays.columns(re_theta=(re_theta, THETA))
    r.use(re_theta=re)
    return shape(2.0 / np.square(np.log(re) / r["kappa"] + r["constant"]))


def ludwieg_tillmann(re_theta: FloatLike, shape_factor: FloatLike) -> Any:
    """Local skin friction of a turbulent layer with pressure gradient, Ludwieg and Tillmann.

    Parameters
    ----------
    re_theta : array_like
        Momentum-thickness Reynolds number U theta/nu [1], from 10.
    shape_factor : array_like
        H, displacement over momentum thickness [1], 1 to 5.

    Returns
    -------
    float or ndarray
        c_f [1], of the broadcast shape.

    Warns
    -----
    RangeWarning
        Outside Re_theta 1e3 to 4e4 or H 1.2 to 2.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    c_f = 0.246 10^(-0.678 H) Re_theta^(-0.268).

    References
    ----------
    ludwieg-tillmann-1950

    Examples
    --------
    >>> round(ludwieg_tillmann(14703.0, 1.3141), 5)
    0.00242
    """
    r = relation("plate", "ludwieg_tillmann")
    shape, (re, h) = arrays.columns(
        re_theta=(re_theta, THETA), shape_factor=(shape_factor, Interval(1.0, 5.0))
    )
    r.use(re_theta=re, shape_factor=h)
    exponent = r["shape"] * h + r["power"] * np.log10(re)
    return shape(r["factor"] * np.power(10.0, -exponent))


def re_tau_theta(re_theta: FloatLike) -> Any:
    """Friction Reynolds number of the turbulent plate by Re_theta, Schlatter and Orlu 2010.

    Parameters
    ----------
    re_theta : array_like
        Momentum-thickness Reynolds number U theta/nu [1], from 10.

    Returns
    -------
    float or ndarray
        delta_99 u_tau/nu [1]; within 9.5 % of the simulations of the same authors.

    Warns
    -----
    RangeWarning
        Outside 600 to 8e3.

    Raises
    ------
    InputError
        If a value is below 10 or not finite.

    Notes
    -----
    Re_tau = 1.13 Re_theta^0.843.

    References
    ----------
    schlatter-orlu-2010

    Examples
    --------
    >>> round(re_tau_theta(1e3), 5)
    382.01326
    """
    r = relation("plate", "re_tau_theta")
    shape, (re,) = arrays.columns(re_theta=(re_theta, THETA))
    r.use(re_theta=re)
    return shape(r["factor"] * np.power(re, r["power"]))
