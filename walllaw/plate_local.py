"""Local skin friction of a flat plate by Re_x; public names are reached as ``walllaw.plate``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Floats, Interval
from walllaw.relation import Relation, relation
from walllaw.roots import inverse_root, log_law_friction

TURBULENT = Interval(1e3)  # logarithmic laws have poles from Re = 1 (most) to 100 (ITTC)


def laminar(reynolds: FloatLike) -> Any:
    """Local skin friction of the laminar plate (Blasius).

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], positive.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 1e3 to 3e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    c_f = 0.66411 Re_x^(-1/2); the constant is the 20-digit one.

    References
    ----------
    blasius-1908

    Examples
    --------
    >>> round(laminar(1e6), 11)
    0.00066411467
    """
    r = relation("plate", "laminar")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["local"] / np.sqrt(re))


def power_1_5(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by the one-fifth power law.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], positive.

    Returns
    -------
    float or ndarray
        c_f [1]; within 3 % of direct force readings from Re_x = 1.6e6 to 1.5e7 on average.

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e7.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    c_f = 0.0592 Re_x^(-1/5).

    References
    ----------
    white-1974, eq. 6-112a

    Examples
    --------
    >>> round(power_1_5(1e7), 11)
    0.00235679445
    """
    r = relation("plate", "power_1_5")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * inverse_root(re, 5))


def power_1_7(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by the one-seventh power law, factor 0.026.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], positive.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    c_f = 0.026 Re_x^(-1/7), the factor of the 1974 edition; `power_1_7_2011` has the later one.

    References
    ----------
    white-1974, eq. 6-121

    Examples
    --------
    >>> round(power_1_7(1e7), 10)
    0.0026
    """
    r = relation("plate", "power_1_7")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * inverse_root(re, 7))


def power_1_7_2011(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by the one-seventh power law, factor 0.027.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], positive.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    c_f = 0.027 Re_x^(-1/7), the factor of later editions; about 10 % above direct force readings.

    References
    ----------
    white-2011

    Examples
    --------
    >>> round(power_1_7_2011(1e7), 10)
    0.0027
    """
    r = relation("plate", "power_1_7_2011")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * inverse_root(re, 7))


def white(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate, White 1974.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], from 1e3.

    Returns
    -------
    float or ndarray
        c_f [1]; 5 to 6 % above direct force readings, which makes a first cell a little thinner.

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    Notes
    -----
    c_f = 0.455/ln(0.06 Re_x)^2.

    References
    ----------
    white-1974, eq. 6-134

    Examples
    --------
    >>> round(white(1e7), 12)
    0.002570408848
    """
    r = relation("plate", "white")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.square(np.log(r["inner"] * re)))


def schlichting(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate, Schlichting's interpolation.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], from 1e3.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e9.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    Notes
    -----
    c_f = (2 log10(Re_x) - 0.65)^(-2.3).

    References
    ----------
    white-1974, eq. 6-135a; schlichting-1979

    Examples
    --------
    >>> round(schlichting(1e7), 12)
    0.002578654094
    """
    r = relation("plate", "schlichting")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(np.power(r["slope"] * np.log10(re) - r["shift"], -r["power"]))


def schultz_grunow(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate, Schultz-Grunow 1940.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], from 1e3.

    Returns
    -------
    float or ndarray
        c_f [1]; standard deviation 0.7 % from the direct force readings of that paper.

    Warns
    -----
    RangeWarning
        Outside 1e6 to 1e9.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    Notes
    -----
    c_f = 0.370 (log10 Re_x)^(-2.584).

    References
    ----------
    schultz-grunow-1940; white-1974, eq. 6-135c

    Examples
    --------
    >>> round(schultz_grunow(1e7), 12)
    0.002423641547
    """
    r = relation("plate", "schultz_grunow")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.power(np.log10(re), r["power"]))


def karman(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate: exact root of von Karman's logarithmic law.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], from 1e3.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    Notes
    -----
    1/sqrt(c_f) = 1.7 + 4.15 log10(Re_x c_f), closed form. Measured against 50 digits over
    Re_x 1e3 to 1e30: at most 4 ulp.

    References
    ----------
    white-1974, eq. 6-135b

    Examples
    --------
    >>> round(karman(1e7), 12)
    0.002510313961
    """
    r = relation("plate", "karman")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(log_law_friction(re, r["slope"], r["intercept"], 2.0))


def karman_schoenherr(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate from the Karman-Schoenherr line.

    Parameters
    ----------
    reynolds : array_like
        U x/nu on the distance from the leading edge [1], from 1e3.

    Returns
    -------
    float or ndarray
        c_f [1].

    Warns
    -----
    RangeWarning
        Outside 1e6 to 1e10.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    Notes
    -----
    c_f = 0.242 C_F/(0.242 + 0.8686 sqrt(C_F)) with the exact root C_F of `karman_schoenherr_mean`:
    the derivative of Re C_F.

    References
    ----------
    schoenherr-1932

    Examples
    --------
    >>> round(karman_schoenherr(1e7), 12)
    0.002456642553
    """
    r = relation("plate", "karman_schoenherr")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(schoenherr_local(r, re))


def schoenherr_local(r: Relation, re: Floats) -> Floats:
    """Local value of the Karman-Schoenherr line (kernel)."""
    mean = schoenherr_mean(r, re)
    return r["slope"] * mean / (r["slope"] + r["local"] * np.sqrt(mean))


def schoenherr_mean(r: Relation, re: Floats) -> Floats:
    """Exact root of the Karman-Schoenherr line (kernel)."""
    return log_law_friction(re, 1.0 / r["slope"], 0.0, 2.0)
