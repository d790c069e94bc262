"""Friction of smooth pipes; public names are reached as ``walllaw.friction``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike, Floats, Interval
from walllaw.relation import Relation, relation
from walllaw.roots import LN10, add_log10, inverse_square, log_law_friction, log_law_root

LAMINAR = Interval(1e-300)  # 64/Re is finite from here on
TURBULENT = Interval(100.0)  # turbulent laws have poles below Re = 1 to 20


def laminar(reynolds: FloatLike) -> Any:
    """Darcy friction factor of laminar flow in a round pipe (other passages: ``walllaw.ducts``).

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 1e-300.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Warns
    -----
    RangeWarning
        Above Re = 2300.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    f = 64/Re.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> laminar(1000.0)
    0.064
    """
    r = relation("friction", "laminar")
    shape, (re,) = arrays.columns(reynolds=(reynolds, LAMINAR))
    r.use(reynolds=re)
    return shape(r["constant"] / re)


def blasius(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe by the power law of Blasius.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 1e5.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    f = 0.3164 Re^(-1/4), by two square roots.

    References
    ----------
    blasius-1913

    Examples
    --------
    >>> round(blasius(1e4), 5)
    0.03164
    """
    r = relation("friction", "blasius")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.sqrt(np.sqrt(re)))


def _from_root(r: Relation, re: Floats) -> Floats:
    return log_law_friction(re, r["slope"], r["intercept"])


def prandtl_karman(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe: exact root of the Prandtl-Karman law.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1]; within 4 % of measurements from Re = 4e3 to 1e6.

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 3.2e6.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    1/sqrt(f) = 2 log10(Re sqrt(f)) - 0.8, closed form. Measured against 50 digits over Re 100 to
    1e30: at most 3 ulp.

    References
    ----------
    nikuradse-1932

    Examples
    --------
    >>> round(prandtl_karman(1e5), 8)
    0.01799259
    """
    r = relation("friction", "prandtl_karman")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(arrays.blocks(lambda v: _from_root(r, v), re))


def zagarola_smits(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe at high Reynolds number (Zagarola and Smits 1998).

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Warns
    -----
    RangeWarning
        Outside Re 1e5 to 3.5e7.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    1/sqrt(f) = 1.889 log10(Re sqrt(f)) - 0.3577, closed form, accurate as `prandtl_karman`. The
    same facility's later readings are met by `mckeon`.

    References
    ----------
    zagarola-smits-1998

    Examples
    --------
    >>> round(zagarola_smits(1e7), 8)
    0.00840876
    """
    r = relation("friction", "zagarola_smits")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(arrays.blocks(lambda v: _from_root(r, v), re))


def mckeon(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe at high Reynolds number, McKeon et al. 2005.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1]; within 0.8 % of the measurements it was fitted to.

    Warns
    -----
    RangeWarning
        Outside Re 3e5 to 3.5e7.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    1/sqrt(f) = 1.930 log10(Re sqrt(f)) - 0.537, closed form, accurate as `prandtl_karman`. The
    same paper's `mckeon_general` goes down to lower Reynolds numbers.

    References
    ----------
    mckeon-2005

    Examples
    --------
    >>> round(mckeon(1e7), 8)
    0.0083162
    """
    r = relation("friction", "mckeon")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(arrays.blocks(lambda v: _from_root(r, v), re))


def mckeon_general(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe, general relation of McKeon et al. 2005.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Warns
    -----
    RangeWarning
        Outside Re 1e4 to 3.5e7.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    1/sqrt(f) = 1.920 log10(Re sqrt(f)) - 0.475 - (7.04/(Re sqrt(f)))^0.55. In ln x, x = 1/sqrt(f),
    the law is convex and increasing; the start leaves the last term out and so lies above the
    root, from where Newton's steps fall to it without overshooting. Measured against 50 digits
    over Re 100 to 1e30: at most 3 ulp.

    References
    ----------
    mckeon-2005

    Examples
    --------
    >>> round(mckeon_general(8e5), 10)
    0.0122925396
    """
    r = relation("friction", "mckeon_general")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(arrays.blocks(lambda v: _general(r, v), re))


def _general(r: Relation, re: Floats) -> Floats:
    slope = r["slope"] / LN10
    x = log_law_root(re, r["slope"], r["intercept"])
    low = np.power(r["low"] * x / re, r["power"])
    for _ in range(3):
        residual = add_log10(x, r["slope"], x / re) - (r["intercept"] - low)
        x = x * np.exp(-residual / (x + slope + r["power"] * low))
        low = np.power(r["low"] * x / re, r["power"])
    residual = add_log10(x, r["slope"], x / re) - (r["intercept"] - low)
    return inverse_square(x, x * residual / (x + slope + r["power"] * low))


def pirozzoli_2021(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe fitted to direct simulations, Pirozzoli et al. 2021.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Warns
    -----
    RangeWarning
        Outside Re 5.3e3 to 2.85e5.

    Raises
    ------
    InputError
        If a value is below 100 or not finite.

    Notes
    -----
    1/sqrt(f) = 2.102 log10(Re sqrt(f)) - 1.148, closed form, accurate as `prandtl_karman`.

    References
    ----------
    pirozzoli-2021

    Examples
    --------
    >>> round(pirozzoli_2021(1e5), 8)
    0.01768254
    """
    r = relation("friction", "pirozzoli_2021")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(arrays.blocks(lambda v: _from_root(r, v), re))
