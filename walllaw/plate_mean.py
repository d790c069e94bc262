"""Mean skin friction of a flat plate by Re_L; public names are reached as ``walllaw.plate``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike
from walllaw.plate_local import TURBULENT, schoenherr_mean
from walllaw.relation import relation
from walllaw.roots import inverse_root


def laminar_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the laminar plate (Blasius): twice the local value at its end.

    Parameters
    ----------
    reynolds : array_like
        U L/nu on the length of the plate [1], positive.

    Returns
    -------
    float or ndarray
        C_F [1].

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
    C_F = 1.32823 Re_L^(-1/2); the constant is the 20-digit one.

    References
    ----------
    blasius-1908

    Examples
    --------
    >>> round(laminar_mean(1e6), 10)
    0.0013282293
    """
    r = relation("plate", "laminar")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["mean"] / np.sqrt(re))


def power_1_5_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the turbulent plate by the one-fifth power law.

    Parameters
    ----------
    reynolds : array_like
        U L/nu on the length of the plate [1], positive.

    Returns
    -------
    float or ndarray
        C_F [1].

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
    C_F = 0.074 Re_L^(-1/5) = 5/4 of the local value.

    References
    ----------
    white-1974

    Examples
    --------
    >>> round(power_1_5_mean(1e7), 10)
    0.0029459931
    """
    r = relation("plate", "power_1_5")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["mean"] * inverse_root(re, 5))


def power_1_7_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the turbulent plate by the one-seventh power law.

    Parameters
    ----------
    reynolds : array_like
        U L/nu on the length of the plate [1], positive.

    Returns
    -------
    float or ndarray
        C_F [1].

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
    C_F = 7/6 of the local value with the factor 0.026: 0.0303 Re_L^(-1/7).

    References
    ----------
    white-1974

    Examples
    --------
    >>> round(power_1_7_mean(1e7), 10)
    0.0030333333
    """
    r = relation("plate", "power_1_7")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["mean"] * inverse_root(re, 7))


def white_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the turbulent plate, White 1974.

    Parameters
    ----------
    reynolds : array_like
        U L/nu on the length of the plate [1], from 1e3.

    Returns
    -------
    float or ndarray
        C_F [1].

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
    C_F = 0.523/ln(0.06 Re_L)^2.

    References
    ----------
    white-1974

    Examples
    --------
    >>> round(white_mean(1e7), 12)
    0.002954557863
    """
    r = relation("plate", "white_mean")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.square(np.log(r["inner"] * re)))


def karman_schoenherr_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the turbulent plate: exact root of the Karman-Schoenherr line.

    Parameters
    ----------
    reynolds : array_like
        U L/nu on the length of the plate [1], from 1e3.

    Returns
    -------
    float or ndarray
        C_F [1].

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
    0.242/sqrt(C_F) = log10(Re_L C_F), closed form. Measured against 50 digits over Re_L 1e3 to
    1e30: at most 4 ulp.

    References
    ----------
    schoenherr-1932

    Examples
    --------
    >>> round(karman_schoenherr_mean(1e7), 12)
    0.002934278609
    """
    r = relation("plate", "karman_schoenherr")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(schoenherr_mean(r, re))


def ittc_1957_mean(reynolds: FloatLike) -> Any:
    """Model-ship correlation line of the ITTC 1957: a mean value, neither local nor a plate law.

    Parameters
    ----------
    reynolds : array_like
        U L/nu on the length of the plate [1], from 1e3.

    Returns
    -------
    float or ndarray
        C_F [1].

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
    C_F = 0.075/(log10 Re_L - 2)^2.

    References
    ----------
    ittc-1957

    Examples
    --------
    >>> round(ittc_1957_mean(1e7), 10)
    0.003
    """
    r = relation("plate", "ittc_1957")
    shape, (re,) = arrays.columns(reynolds=(reynolds, TURBULENT))
    r.use(reynolds=re)
    return shape(r["factor"] / np.square(np.log10(re) - r["shift"]))


def prandtl_schlichting_mean(
    reynolds: FloatLike, transition_reynolds: FloatLike | None = None
) -> Any:
    """Mean skin friction of the turbulent plate, Prandtl-Schlichting, with a laminar run if wanted.

    Parameters
    ----------
    reynolds : array_like
        U L/nu on the length of the plate [1], from 1e3.
    transition_reynolds : array_like, optional
        U x_t/nu at the transition [1], from 1e3; left out: turbulent from the leading edge.

    Returns
    -------
    float or ndarray
        C_F [1], of the broadcast shape; the laminar value where the plate ends before transition.

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e9.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    C_F = 0.455/(log10 Re_L)^2.58 - A/Re_L with A = Re_t (C_F,turbulent(Re_t) - C_F,laminar(Re_t)):
    behind the transition the layer is taken as turbulent from the leading edge on.

    References
    ----------
    schlichting-1979

    Examples
    --------
    >>> round(prandtl_schlichting_mean(1e7), 10)
    0.0030037131
    """
    r = relation("plate", "prandtl_schlichting")
    given = 1e3 if transition_reynolds is None else transition_reynolds
    shape, (re, start) = arrays.columns(
        reynolds=(reynolds, TURBULENT), transition_reynolds=(given, TURBULENT)
    )
    r.use(reynolds=re)
    turbulent = r["factor"] / np.power(np.log10(re), r["power"])
    if transition_reynolds is None:
        return shape(turbulent)
    laminar = relation("plate", "laminar")["mean"]
    at_start = r["factor"] / np.power(np.log10(start), r["power"]) - laminar / np.sqrt(start)
    mixed = turbulent - start / re * at_start
    return shape(np.where(re > start, mixed, laminar / np.sqrt(re)))
