"""Disc that rotates in fluid at rest: local friction, layer thickness, moment.

The Reynolds number is omega r^2/nu, on the radius where the local value is wanted or on the rim
for the moment. The moment coefficient counts both sides: C_M = 2 M/(rho omega^2 R^5).
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Interval
from walllaw.relation import relation
from walllaw.roots import inverse_root, log_law_friction


def cochran(reynolds: FloatLike) -> Any:
    """Local circumferential skin friction of a laminar disc, Cochran 1934.

    Parameters
    ----------
    reynolds : array_like
        omega r^2/nu [1], positive.

    Returns
    -------
    float or ndarray
        tau_phi/(rho (omega r)^2/2) [1].

    Warns
    -----
    RangeWarning
        Above 3e5.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    2 * 0.616 Re^(-1/2): the exact similar solution, to the three printed digits.

    References
    ----------
    cochran-1934

    Examples
    --------
    >>> round(cochran(1e4), 6)
    0.01232
    """
    r = relation("disc", "cochran")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(2.0 * r["gradient"] / np.sqrt(re))


def cochran_moment(reynolds: FloatLike) -> Any:
    """Moment coefficient of a laminar disc, both sides, Cochran 1934.

    Parameters
    ----------
    reynolds : array_like
        omega R^2/nu [1], positive.

    Returns
    -------
    float or ndarray
        C_M = 2 M/(rho omega^2 R^5) [1].

    Warns
    -----
    RangeWarning
        Above 3e5.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    3.87 Re^(-1/2).

    References
    ----------
    cochran-1934

    Examples
    --------
    >>> round(cochran_moment(1e4), 6)
    0.0387
    """
    r = relation("disc", "cochran_moment")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] / np.sqrt(re))


def karman(reynolds: FloatLike) -> Any:
    """Local circumferential skin friction of a turbulent disc, von Karman 1921.

    Parameters
    ----------
    reynolds : array_like
        omega r^2/nu [1], positive.

    Returns
    -------
    float or ndarray
        tau_phi/(rho (omega r)^2/2) [1].

    Warns
    -----
    RangeWarning
        Outside 3e5 to 2e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    0.053356 Re^(-1/5); 20 % low at Re = 1e7, where `goldstein_moment` holds.

    References
    ----------
    karman-1921

    Examples
    --------
    >>> round(karman(1e6), 7)
    0.0033665
    """
    r = relation("disc", "karman")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * inverse_root(re, 5))


def karman_thickness(reynolds: FloatLike) -> Any:
    """Layer thickness of a turbulent disc over the radius, von Karman 1921.

    Parameters
    ----------
    reynolds : array_like
        omega r^2/nu [1], positive.

    Returns
    -------
    float or ndarray
        delta/r [1].

    Warns
    -----
    RangeWarning
        Outside 3e5 to 2e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    0.526 Re^(-1/5).

    References
    ----------
    karman-1921

    Examples
    --------
    >>> round(karman_thickness(1e6), 6)
    0.033188
    """
    r = relation("disc", "karman_thickness")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * inverse_root(re, 5))


def karman_moment(reynolds: FloatLike) -> Any:
    """Moment coefficient of a turbulent disc, both sides, von Karman 1921.

    Parameters
    ----------
    reynolds : array_like
        omega R^2/nu [1], positive.

    Returns
    -------
    float or ndarray
        C_M = 2 M/(rho omega^2 R^5) [1].

    Warns
    -----
    RangeWarning
        Outside 3e5 to 2e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    0.146 Re^(-1/5); 20 % low at Re = 1e7, where `goldstein_moment` holds.

    References
    ----------
    karman-1921

    Examples
    --------
    >>> round(karman_moment(1e6), 6)
    0.009212
    """
    r = relation("disc", "karman_moment")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * inverse_root(re, 5))


def goldstein_moment(reynolds: FloatLike) -> Any:
    """Moment coefficient of a turbulent disc, both sides: exact root of Goldstein's law.

    Parameters
    ----------
    reynolds : array_like
        omega R^2/nu [1], from 100.

    Returns
    -------
    float or ndarray
        C_M = 2 M/(rho omega^2 R^5) [1].

    Warns
    -----
    RangeWarning
        Outside 3e5 to 1e8.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    1/sqrt(C_M) = 1.97 log10(Re sqrt(C_M)) + 0.03, closed form. Measured against 50 digits over
    Re 100 to 1e30: 3 ulp.

    References
    ----------
    goldstein-1935

    Examples
    --------
    >>> round(goldstein_moment(1e7), 9)
    0.00728693
    """
    r = relation("disc", "goldstein_moment")
    shape, (re,) = arrays.columns(reynolds=(reynolds, Interval(100.0)))
    r.use(reynolds=re)
    return shape(log_law_friction(re, r["slope"], r["intercept"]))
