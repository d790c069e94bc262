"""Nusselt numbers of a flat plate, and the analogies between heat and momentum.

Use these through :mod:`walllaw.heat`.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    FloatLike,
)
from walllaw.errors import InputError
from walllaw.relation import relation


def plate_laminar(reynolds: FloatLike, prandtl: FloatLike, *, mean: bool = False) -> Any:
    """Return the Nusselt number of a laminar plate at uniform temperature.

    Parameters
    ----------
    reynolds : float or array
        Re_x with the distance from the leading edge [1].
    prandtl : float or array
        Prandtl number [1].
    mean : bool, optional
        Whether to average from the leading edge.

    Returns
    -------
    float or ndarray
        Nusselt number on that distance [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is above 5e5 or the Prandtl number outside 0.6 to 50.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    0.332 Re_x^(1/2) Pr^(1/3); the mean is twice that.

    References
    ----------
    pohlhausen-1921

    Examples
    --------
    >>> round(plate_laminar(1e4, 1.0), 6)
    33.2
    """
    c = relation("heat", "plate_laminar")
    shape, (re, pr) = arrays.columns(reynolds=(reynolds, AMOUNT_OR_ZERO), prandtl=(prandtl, AMOUNT))
    c.use(reynolds=re, prandtl=pr)
    return shape((2.0 if mean else 1.0) * c["factor"] * np.sqrt(re) * np.cbrt(pr))


def plate_turbulent(reynolds: FloatLike, prandtl: FloatLike, *, mean: bool = False) -> Any:
    """Return the Nusselt number of a plate that is turbulent from its leading edge.

    Parameters
    ----------
    reynolds : float or array
        Re_x with the distance from the leading edge [1].
    prandtl : float or array
        Prandtl number [1].
    mean : bool, optional
        Whether to average from the leading edge.

    Returns
    -------
    float or ndarray
        Nusselt number on that distance [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is outside 5e5 to 1e7 or the Prandtl number outside 0.6 to 60.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    0.0296 Re_x^(4/5) Pr^(1/3), the analogy with c_f = 0.0592 Re_x^(-1/5); the mean is 5/4 of that.

    References
    ----------
    chilton-colburn-1934, white-1974

    Examples
    --------
    >>> round(plate_turbulent(1e6, 1.0), 3)
    1867.634
    """
    c = relation("heat", "plate_turbulent")
    shape, (re, pr) = arrays.columns(reynolds=(reynolds, AMOUNT_OR_ZERO), prandtl=(prandtl, AMOUNT))
    c.use(reynolds=re, prandtl=pr)
    local = c["factor"] * np.power(re, c["exponent"]) * np.cbrt(pr)
    return shape(local / c["exponent"] if mean else local)


def plate_mixed(
    reynolds: FloatLike, prandtl: FloatLike, *, transition_reynolds: FloatLike | None = None
) -> Any:
    """Return the mean Nusselt number of a plate, laminar up to transition and turbulent behind.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number of the whole length [1].
    prandtl : float or array
        Prandtl number [1].
    transition_reynolds : float or array, optional
        Re_x at transition; 5e5 by default [1].

    Returns
    -------
    float or ndarray
        Mean Nusselt number on the length [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is outside 5e5 to 1e8 or the Prandtl number outside 0.6 to 60.

    Raises
    ------
    InputError
        If an argument cannot be used, or the plate ends before transition.

    Notes
    -----
    {0.037 Re^(4/5) - [0.037 Re_t^(4/5) - 0.664 Re_t^(1/2)]} Pr^(1/3): the integral of the two local
    laws; the bracket is 871 for 5e5.

    References
    ----------
    chilton-colburn-1934

    Examples
    --------
    >>> round(plate_mixed(5e6, 1.0), 1)
    7588.8
    """
    c = relation("heat", "plate_mixed")
    chosen = c["transition"] if transition_reynolds is None else transition_reynolds
    shape, (re, pr, start) = arrays.columns(
        reynolds=(reynolds, AMOUNT),
        prandtl=(prandtl, AMOUNT),
        transition_reynolds=(chosen, AMOUNT_OR_ZERO),
    )
    if (re < start).any():
        raise InputError("reynolds", f"{float(re.min()):.6g}", "at least the transition value")
    c.use(reynolds=re, prandtl=pr)
    turbulent, lam = relation("heat", "plate_turbulent"), relation("heat", "plate_laminar")
    power = turbulent["exponent"]
    rise = np.power(re, power) - np.power(start, power)
    front = 2.0 * lam["factor"] * np.sqrt(start)
    return shape((turbulent["factor"] / power * rise + front) * np.cbrt(pr))


def reynolds_analogy(skin_friction: FloatLike) -> Any:
    """Return the Stanton number by the Reynolds analogy.

    Parameters
    ----------
    skin_friction : float or array
        Skin-friction coefficient c_f [1].

    Returns
    -------
    float or ndarray
        Stanton number [1].

    Raises
    ------
    InputError
        If the coefficient is negative.

    Notes
    -----
    St = c_f/2, for Pr = 1.

    References
    ----------
    reynolds-1874

    Examples
    --------
    >>> reynolds_analogy(0.004)
    0.002
    """
    c = relation("heat", "reynolds_analogy")
    shape, (cf,) = arrays.columns(skin_friction=(skin_friction, AMOUNT_OR_ZERO))
    c.use(skin_friction=cf)
    return shape(cf / 2.0)


def chilton_colburn(skin_friction: FloatLike, prandtl: FloatLike) -> Any:
    """Return the Stanton number by the analogy of Chilton and Colburn.

    Parameters
    ----------
    skin_friction : float or array
        Skin-friction coefficient c_f [1].
    prandtl : float or array
        Prandtl number [1].

    Returns
    -------
    float or ndarray
        Stanton number; Nu = St Re Pr [1].

    Warns
    -----
    RangeWarning
        If the Prandtl number is outside 0.6 to 60.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    St = (c_f/2) Pr^(-2/3).

    References
    ----------
    chilton-colburn-1934

    Examples
    --------
    >>> chilton_colburn(0.004, 8.0)
    0.0005
    """
    c = relation("heat", "chilton_colburn")
    shape, (cf, pr) = arrays.columns(
        skin_friction=(skin_friction, AMOUNT_OR_ZERO), prandtl=(prandtl, AMOUNT)
    )
    c.use(skin_friction=cf, prandtl=pr)
    root = np.cbrt(pr)
    return shape(cf / 2.0 / (root * root))
