"""Regime and entrance lengths of passages; public names are reached as ``walllaw.ducts``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import NONNEGATIVE, POSITIVE, FloatLike, Interval
from walllaw.relation import relation


def regime(reynolds: FloatLike) -> Any:
    """Name of the flow regime of a passage.

    Parameters
    ----------
    reynolds : array_like
        On the hydraulic diameter [1], from 0.

    Returns
    -------
    str or ndarray of str
        "laminar" below Re = 2300, "turbulent" above 4000, else "transitional".

    Raises
    ------
    InputError
        If a value is negative or not finite.

    References
    ----------
    reynolds-1883

    Examples
    --------
    >>> regime(2500.0)
    'transitional'
    """
    r = relation("ducts", "regime")
    shape, (re,) = arrays.columns(reynolds=(reynolds, NONNEGATIVE))
    r.use(reynolds=re)
    names = np.where(
        re < r["laminar"], "laminar", np.where(re > r["turbulent"], "turbulent", "transitional")
    )
    return str(names[0]) if shape.dims == () else names.reshape(shape.dims)


def entrance_length_laminar(reynolds: FloatLike) -> Any:
    """Laminar entrance length of a pipe over its diameter, Durst et al. 2005.

    Parameters
    ----------
    reynolds : array_like
        On the diameter [1], from 0.

    Returns
    -------
    float or ndarray
        Length over diameter [1] at which the centreline reaches 99 % of its developed velocity.

    Warns
    -----
    RangeWarning
        Above Re = 2300.

    Raises
    ------
    InputError
        If a value is negative or not finite.

    Notes
    -----
    [0.619^1.6 + (0.0567 Re)^1.6]^(1/1.6).

    References
    ----------
    durst-2005

    Examples
    --------
    >>> round(entrance_length_laminar(1000.0), 2)
    56.73
    """
    return _durst("entrance_laminar", reynolds)


def entrance_length_laminar_channel(reynolds: FloatLike) -> Any:
    """Laminar entrance length of a plane channel over its height, Durst et al. 2005.

    Parameters
    ----------
    reynolds : array_like
        On the height (half the hydraulic diameter) [1], from 0.

    Returns
    -------
    float or ndarray
        Length over height [1] at which the centreline reaches 99 % of its developed velocity.

    Warns
    -----
    RangeWarning
        Above Re = 1150, i.e. 2300 on the hydraulic diameter.

    Raises
    ------
    InputError
        If a value is negative or not finite.

    Notes
    -----
    [0.631^1.6 + (0.0442 Re)^1.6]^(1/1.6).

    References
    ----------
    durst-2005

    Examples
    --------
    >>> round(entrance_length_laminar_channel(1000.0), 2)
    44.23
    """
    return _durst("entrance_laminar_channel", reynolds)


def _durst(name: str, reynolds: FloatLike) -> Any:
    r = relation("ducts", name)
    shape, (re,) = arrays.columns(reynolds=(reynolds, Interval(0.0, 1e150)))
    r.use(reynolds=re)
    n = r["power"]
    total = np.power(np.full(1, r["creeping"]), n) + np.power(r["slope"] * re, n)
    return shape(np.power(total, 1.0 / n))


def entrance_length_turbulent(reynolds: FloatLike) -> Any:
    """Turbulent entrance length of the mean profile over the diameter.

    Parameters
    ----------
    reynolds : array_like
        On the hydraulic diameter [1], positive.

    Returns
    -------
    float or ndarray
        Length over hydraulic diameter [1]; turbulence quantities take 40 to 60 diameters.

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 1e8.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    4.4 Re^(1/6).

    References
    ----------
    common practice

    Examples
    --------
    >>> round(entrance_length_turbulent(1e6), 6)
    44.0
    """
    r = relation("ducts", "entrance_turbulent")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * np.sqrt(np.cbrt(re)))
