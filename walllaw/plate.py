"""Flat plate without pressure gradient: local and mean skin friction, boundary-layer thickness."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Floats, Interval
from walllaw.lambert import wright_omega
from walllaw.relation import Relation, relation

_LN10 = np.log(10.0)
_ABOVE_ONE = Interval(1e3)  # the logarithmic laws have a pole near Re = 1 to 17


def _evaluate(
    name: str, reynolds: FloatLike, accepted: Interval, kernel: Callable[[Relation, Floats], Floats]
) -> Any:
    r = relation("plate", name)
    shape, (re,) = arrays.columns(reynolds=(reynolds, accepted))
    r.use(reynolds=re)
    return shape(kernel(r, re))


def laminar(reynolds: FloatLike) -> Any:
    """Local skin friction of the laminar plate (Blasius).

    Parameters
    ----------
    reynolds : float or array
        U x/nu on the distance from the leading edge [-], positive.

    Returns
    -------
    float or ndarray
        c_f [-].

    Warns
    -----
    RangeWarning
        Outside 1e3 to 3e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    blasius-1908

    Examples
    --------
    >>> round(laminar(1e6), 11)
    0.00066411467
    """
    return _evaluate("laminar", reynolds, POSITIVE, lambda r, re: r["local"] / np.sqrt(re))


def laminar_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the laminar plate up to x (Blasius): twice the local value.

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], positive.

    Returns
    -------
    float or ndarray
        C_F [-].

    Warns
    -----
    RangeWarning
        Outside 1e3 to 3e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    blasius-1908

    Examples
    --------
    >>> round(laminar_mean(1e6), 10)
    0.0013282293
    """
    return _evaluate("laminar", reynolds, POSITIVE, lambda r, re: r["mean"] / np.sqrt(re))


def schultz_grunow(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate, Schultz-Grunow 1940.

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], from 1e3; fitted for 1e6 to 1e9.

    Returns
    -------
    float or ndarray
        c_f [-]; 0.7 % standard deviation against the direct force readings of that paper.

    Warns
    -----
    RangeWarning
        Outside the fitted range.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    References
    ----------
    schultz-grunow-1940

    Examples
    --------
    >>> round(schultz_grunow(1e7), 12)
    0.002423641547
    """
    return _evaluate(
        "schultz_grunow",
        reynolds,
        _ABOVE_ONE,
        lambda r, re: r["factor"] / np.power(np.log10(re), r["power"]),
    )


def _schoenherr_mean(r: Relation, re: Floats) -> Floats:
    c = r["log"] / r["slope"]
    y = c * wright_omega(np.log10(re) / (r["slope"] * c) - np.log(np.full(1, c)))
    return 1.0 / (y * y)


def karman_schoenherr_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the turbulent plate: exact root of the Karman-Schoenherr line.

    Parameters
    ----------
    reynolds : float or array
        U L/nu [-], from 1e3.

    Returns
    -------
    float or ndarray
        C_F [-].

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
    0.242/sqrt(C_F) = log10(Re C_F), in closed form by the Wright omega function.

    References
    ----------
    schoenherr-1932

    Examples
    --------
    >>> round(karman_schoenherr_mean(1e7), 12)
    0.002934278609
    """
    return _evaluate("karman_schoenherr", reynolds, _ABOVE_ONE, _schoenherr_mean)


def karman_schoenherr(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate from the Karman-Schoenherr line.

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], from 1e3.

    Returns
    -------
    float or ndarray
        c_f = 0.242 C_F/(0.242 + 0.8686 sqrt(C_F)) [-].

    Warns
    -----
    RangeWarning
        Outside 1e6 to 1e10.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    References
    ----------
    schoenherr-1932

    Examples
    --------
    >>> round(karman_schoenherr(1e7), 12)
    0.002456642553
    """

    def kernel(r: Relation, re: Floats) -> Floats:
        mean = _schoenherr_mean(r, re)
        return r["slope"] * mean / (r["slope"] + r["local"] * np.sqrt(mean))

    return _evaluate("karman_schoenherr", reynolds, _ABOVE_ONE, kernel)


def white(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate, White 1974.

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], from 1e3.

    Returns
    -------
    float or ndarray
        c_f [-]; about 5 % above direct force readings.

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    References
    ----------
    white-1974, eq. 6-134

    Examples
    --------
    >>> round(white(1e7), 12)
    0.002570408848
    """
    return _evaluate(
        "white",
        reynolds,
        _ABOVE_ONE,
        lambda r, re: r["factor"] / np.square(np.log(r["inner"] * re)),
    )


def power_1_7(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by the one-seventh power law.

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], positive.

    Returns
    -------
    float or ndarray
        c_f = 0.026 Re_x^(-1/7) [-].

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    white-1974, eq. 6-121

    Examples
    --------
    >>> round(power_1_7(1e7), 10)
    0.0026
    """
    return _evaluate(
        "power_1_7", reynolds, POSITIVE, lambda r, re: r["factor"] * np.power(re, -1.0 / 7.0)
    )


def power_1_5(reynolds: FloatLike) -> Any:
    """Local skin friction of the turbulent plate by the one-fifth power law.

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], positive.

    Returns
    -------
    float or ndarray
        c_f = 0.0592 Re_x^(-1/5) [-].

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e7.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    white-1974, eq. 6-112a

    Examples
    --------
    >>> round(power_1_5(1e7), 11)
    0.00235679445
    """
    return _evaluate("power_1_5", reynolds, POSITIVE, lambda r, re: r["factor"] * np.power(re, -0.2))


def prandtl_schlichting_mean(reynolds: FloatLike) -> Any:
    """Mean skin friction of the turbulent plate, Prandtl-Schlichting.

    Parameters
    ----------
    reynolds : float or array
        U L/nu [-], from 1e3.

    Returns
    -------
    float or ndarray
        C_F = 0.455/(log10 Re)^2.58 [-].

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e9.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    References
    ----------
    schlichting-1979

    Examples
    --------
    >>> round(prandtl_schlichting_mean(6e5), 10)
    0.0049271527
    """
    return _evaluate(
        "prandtl_schlichting",
        reynolds,
        _ABOVE_ONE,
        lambda r, re: r["factor"] / np.power(np.log10(re), r["power"]),
    )


def ittc_1957_mean(reynolds: FloatLike) -> Any:
    """Model-ship line of the ITTC 1957; a mean value, neither local nor a plate law.

    Parameters
    ----------
    reynolds : float or array
        U L/nu [-], from 1e3.

    Returns
    -------
    float or ndarray
        C_F = 0.075/(log10 Re - 2)^2 [-].

    Warns
    -----
    RangeWarning
        Outside 1e6 to 1e10.

    Raises
    ------
    InputError
        If a value is below 1e3 or not finite.

    References
    ----------
    ittc-1957

    Examples
    --------
    >>> round(ittc_1957_mean(1e7), 10)
    0.003
    """
    return _evaluate(
        "ittc_1957",
        reynolds,
        _ABOVE_ONE,
        lambda r, re: r["factor"] / np.square(np.log10(re) - r["shift"]),
    )


def thickness_turbulent(reynolds: FloatLike) -> Any:
    """Thickness of the turbulent plate layer over the distance, 0.37 Re_x^(-1/5).

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], positive.

    Returns
    -------
    float or ndarray
        delta/x [-].

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e7.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    schlichting-1979

    Examples
    --------
    >>> round(thickness_turbulent(1e6), 11)
    0.02334542175
    """
    return _evaluate(
        "thickness_turbulent", reynolds, POSITIVE, lambda r, re: r["factor"] * np.power(re, -0.2)
    )


def thickness_laminar(reynolds: FloatLike) -> Any:
    """Thickness delta_99 of the laminar plate layer over the distance (Blasius).

    Parameters
    ----------
    reynolds : float or array
        U x/nu [-], positive.

    Returns
    -------
    float or ndarray
        delta_99/x [-].

    Warns
    -----
    RangeWarning
        Outside 1e3 to 3e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    blasius-1908

    Examples
    --------
    >>> round(thickness_laminar(1e6), 8)
    0.00490999
    """
    return _evaluate(
        "thickness_laminar", reynolds, POSITIVE, lambda r, re: r["delta_99"] / np.sqrt(re)
    )
