"""Friction factors of developed pipe and channel flow.

All are Darcy's factor (four times Fanning's) unless the name says otherwise. The implicit laws are
solved to the last digits by a closed form or a fixed number of steps from a proven start.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import NONNEGATIVE, POSITIVE, FloatLike, Floats
from walllaw.lambert import wright_omega
from walllaw.relation import Relation, relation

_LN10 = np.log(10.0)
# 2 log10(y) = k 2 log10(2) + (2/ln 10) ln(m) for y = m 2^k. The first constant is split so that
# k times its head is exact; what is left of the sum then carries no rounding of a large logarithm.
_SLOPE = 0.8685889638065036  # 2/ln 10
_OCTAVE_HEAD = 0.6020599913272235  # 2 log10 2, first 40 bits
_OCTAVE_TAIL = 7.388478154317862e-13  # the rest of it


def laminar(reynolds: FloatLike) -> Any:
    """Laminar Darcy friction factor of a round pipe, 64/Re.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Warns
    -----
    RangeWarning
        Above Re = 2300.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> laminar(1000.0)
    0.064
    """
    r = relation("friction", "laminar")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["constant"] / re)


def blasius(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe by the power law of Blasius.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive; stated for 4e3 to 1e5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Warns
    -----
    RangeWarning
        Outside the stated range.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    blasius-1913

    Examples
    --------
    >>> round(blasius(1e4), 5)
    0.03164
    """
    r = relation("friction", "blasius")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] / np.sqrt(np.sqrt(re)))


def _smooth_root(r: Relation, re: Floats) -> Floats:
    """Solve x = s log10(Re/x) + t for x = 1/sqrt(f) by the Wright omega function."""
    c = r["slope"] / _LN10
    z = np.log(re / c) + r["intercept"] / c
    x = c * wright_omega(z)
    return 1.0 / (x * x)


def prandtl_karman(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe: exact root of the Prandtl-Karman law.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive; stated for 4e3 to 3.2e6.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Warns
    -----
    RangeWarning
        Outside the stated range.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    1/sqrt(f) = 2 log10(Re sqrt(f)) - 0.8, in closed form by the Wright omega function; no overflow
    at any Reynolds number.

    References
    ----------
    nikuradse-1932

    Examples
    --------
    >>> round(prandtl_karman(1e5), 8)
    0.01799259
    """
    r = relation("friction", "prandtl_karman")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(_smooth_root(r, re))


def mckeon(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe at high Reynolds number, McKeon et al. 2005.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive; fitted for 3e5 to 3.5e7.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Warns
    -----
    RangeWarning
        Outside the fitted range.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    mckeon-2005

    Examples
    --------
    >>> round(mckeon(1e7), 8)
    0.0083162
    """
    r = relation("friction", "mckeon")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(_smooth_root(r, re))


def zagarola_smits(reynolds: FloatLike) -> Any:
    """Darcy friction factor of a smooth pipe, Zagarola and Smits 1998.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Warns
    -----
    RangeWarning
        Outside 1e5 to 3.5e7.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    zagarola-smits-1998

    Examples
    --------
    >>> round(zagarola_smits(1e7), 8)
    0.00840876
    """
    r = relation("friction", "zagarola_smits")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(_smooth_root(r, re))


def _add_two_log10(x: Floats, y: Floats) -> Floats:
    """Return x + 2 log10(y) when the two nearly cancel, without the rounding of either."""
    m, k = np.frexp(y)
    low = m < 0.75  # 3/4 to 3/2 keeps the logarithm of the mantissa small
    m, k = np.where(low, 2.0 * m, m), np.where(low, k - 1, k)
    return (x + k * _OCTAVE_HEAD) + (_SLOPE * np.log(m) + k * _OCTAVE_TAIL)


def _colebrook(re: Floats, rough: Floats, rough_constant: float, smooth_constant: float) -> Floats:
    a = rough / rough_constant
    b = smooth_constant / re
    # The law is concave in x = 1/sqrt(f); with x = 7 inside the logarithm the start is close enough
    # for two Householder steps of fourth order. The last step is kept apart from x (head + tail),
    # so that f carries no rounding of x.
    x = -_SLOPE * np.log(a + 7.0 * b)
    for last in (False, True):
        y = a + b * x
        p = b / y
        f0 = _add_two_log10(x, y) if last else x + _SLOPE * np.log(y)
        f1 = 1.0 + _SLOPE * p
        f2 = -_SLOPE * p * p
        f3 = -2.0 * f2 * p
        half = f1 * f1 - 0.5 * f0 * f2
        step = f0 * half / (f1 * (half - 0.5 * f0 * f2) + f0 * f0 * f3 / 6.0)
        head = x - step
        tail = (x - head) - step
        x = head
    f = 1.0 / (x * x)
    return f - 2.0 * f * (tail / x)


def colebrook(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor of a smooth or rough pipe: exact root of the Colebrook-White law.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive; turbulent flow.
    relative_roughness : float or array, optional
        Equivalent sand-grain height over the diameter [-], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 1e8 or above a relative roughness of 0.05.

    Raises
    ------
    InputError
        If a value is not finite, the Reynolds number is below 500, or the roughness is not from
        0 to 0.5.

    Notes
    -----
    1/sqrt(f) = -2 log10(e/3.7 + 2.51/(Re sqrt(f))). A fixed start and two Householder steps of
    fourth order on x = 1/sqrt(f); no exponential, so nothing overflows. Largest error found against
    50 digits: 2 ulp over Re 2300 to 1e12 and roughness 0 to 0.1 (a million points against extended precision).

    References
    ----------
    colebrook-1939

    Examples
    --------
    >>> round(colebrook(1e5, 1e-4), 10)
    0.0185138661
    """
    r = relation("friction", "colebrook")
    shape, (re, rr) = arrays.columns(
        reynolds=(reynolds, arrays.Interval(500.0)),
        relative_roughness=(relative_roughness, arrays.Interval(0.0, 0.5)),
    )
    r.use(reynolds=re, relative_roughness=rr)
    return shape(arrays.blocks(lambda x, y: _colebrook(x, y, r["rough"], r["smooth"]), re, rr))


def colebrook_from_friction_velocity(
    friction_reynolds: FloatLike, relative_roughness: FloatLike = 0.0
) -> Any:
    """Darcy friction factor by Colebrook-White when the wall stress is known: explicit.

    Parameters
    ----------
    friction_reynolds : float or array
        u_tau D/nu on the diameter [-], positive.
    relative_roughness : float or array, optional
        Equivalent sand-grain height over the diameter [-], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Raises
    ------
    InputError
        If a value is outside its interval.

    Notes
    -----
    Re sqrt(f) = sqrt(8) u_tau D/nu, so that the law needs no solution.

    References
    ----------
    colebrook-1939

    Examples
    --------
    >>> f = colebrook(1e5, 1e-4)
    >>> bool(abs(colebrook_from_friction_velocity(1e5 * (f / 8) ** 0.5, 1e-4) / f - 1) < 1e-14)
    True
    """
    r = relation("friction", "colebrook")
    shape, (u, rr) = arrays.columns(
        friction_reynolds=(friction_reynolds, arrays.Interval(50.0)),
        relative_roughness=(relative_roughness, arrays.Interval(0.0, 0.5)),
    )
    y = rr / r["rough"] + r["smooth"] / (u * np.sqrt(np.array([8.0])))
    x = -2.0 * np.log10(y)
    return shape(1.0 / (x * x))


def haaland(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor by the explicit approximation of Haaland 1983.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive.
    relative_roughness : float or array, optional
        Roughness over diameter [-], from 0.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-]; within 2 % of Colebrook-White.

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 1e8 or above a relative roughness of 0.05.

    Raises
    ------
    InputError
        If a value is outside its interval.

    References
    ----------
    haaland-1983

    Examples
    --------
    >>> round(haaland(1e5, 1e-3), 8)
    0.02196621
    """
    r = relation("friction", "haaland")
    shape, (re, rr) = arrays.columns(
        reynolds=(reynolds, arrays.Interval(10.0)),
        relative_roughness=(relative_roughness, arrays.Interval(0.0, 0.5)),
    )
    r.use(reynolds=re, relative_roughness=rr)
    x = r["slope"] * np.log10(np.power(rr / r["rough"], r["power"]) + r["smooth"] / re)
    return shape(1.0 / (x * x))


def swamee_jain(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor by the explicit approximation of Swamee and Jain 1976.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive.
    relative_roughness : float or array, optional
        Roughness over diameter [-], from 0.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-]; within 3 % of Colebrook-White.

    Warns
    -----
    RangeWarning
        Outside Re 5e3 to 1e8 or above a relative roughness of 0.01.

    Raises
    ------
    InputError
        If a value is outside its interval.

    References
    ----------
    swamee-jain-1976

    Examples
    --------
    >>> round(swamee_jain(1e5, 1e-3), 8)
    0.02234241
    """
    r = relation("friction", "swamee_jain")
    shape, (re, rr) = arrays.columns(
        reynolds=(reynolds, arrays.Interval(10.0)),
        relative_roughness=(relative_roughness, arrays.Interval(0.0, 0.5)),
    )
    r.use(reynolds=re, relative_roughness=rr)
    x = np.log10(rr / r["rough"] + r["smooth"] / np.power(re, r["power"]))
    return shape(r["factor"] / (x * x))


def churchill(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor in all regimes by the explicit formula of Churchill 1977.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number on the diameter [-], positive.
    relative_roughness : float or array, optional
        Roughness over diameter [-], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-].

    Warns
    -----
    RangeWarning
        Outside Re 1 to 1e8 or above a relative roughness of 0.05.

    Raises
    ------
    InputError
        If a value is outside its interval.

    Notes
    -----
    Below Re = 0.1 the formula is 64/Re to the last digit and is evaluated so.

    References
    ----------
    churchill-1977

    Examples
    --------
    >>> round(churchill(1e5, 1e-3), 8)
    0.02234324
    """
    r = relation("friction", "churchill")
    shape, (re, rr) = arrays.columns(
        reynolds=(reynolds, POSITIVE), relative_roughness=(relative_roughness, arrays.Interval(0.0, 0.5))
    )
    r.use(reynolds=re, relative_roughness=rr)
    # below Re = 0.1 only the laminar term is left, and the powers would overflow
    inner = np.maximum(re, 0.1)
    log = -np.log(np.power(r["smooth"] / inner, r["power"]) + r["rough"] * rr)
    a = _sixteenth_power(r["factor"] * np.maximum(log, 0.0))
    b = _sixteenth_power(r["transition"] / inner)
    s = np.sqrt(a + b)
    low = np.square(np.square(r["laminar"] / inner))
    blend = np.power(low * low * low + 1.0 / (s * s * s), 1.0 / 12.0)
    return shape(8.0 * np.where(re < 0.1, r["laminar"] / re, blend))


def _sixteenth_power(x: Floats) -> Floats:
    return np.square(np.square(np.square(np.square(x))))


def nikuradse_rough(relative_roughness: FloatLike) -> Any:
    """Darcy friction factor of a fully rough pipe, Nikuradse 1933.

    Parameters
    ----------
    relative_roughness : float or array
        Sand-grain height over diameter [-], above 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [-], independent of the Reynolds number.

    Warns
    -----
    RangeWarning
        Outside the grains that were tried, 9e-4 to 0.034.

    Raises
    ------
    InputError
        If a value is outside its interval.

    References
    ----------
    nikuradse-1933

    Examples
    --------
    >>> round(nikuradse_rough(1 / 120), 8)
    0.03564958
    """
    r = relation("friction", "nikuradse_rough")
    shape, (rr,) = arrays.columns(
        relative_roughness=(relative_roughness, arrays.Interval(0.0, 0.5, open_low=True))
    )
    r.use(relative_roughness=rr)
    x = r["intercept"] - r["slope"] * np.log10(2.0 * rr)
    return shape(1.0 / (x * x))


def dean(reynolds: FloatLike) -> Any:
    """Skin-friction coefficient of developed plane channel flow, Dean 1978.

    Parameters
    ----------
    reynolds : float or array
        2 h U_b/nu with the half height h, i.e. half the Reynolds number on the hydraulic diameter
        [-], positive.

    Returns
    -------
    float or ndarray
        c_f = 2 (u_tau/U_b)^2 [-]; within 5 % of direct simulations.

    Warns
    -----
    RangeWarning
        Outside 6e3 to 6e5.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    dean-1978

    Examples
    --------
    >>> round(dean(40000.0), 8)
    0.00516188
    """
    r = relation("friction", "dean")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] / np.sqrt(np.sqrt(re)))


def fanning_from_darcy(darcy_friction: FloatLike) -> Any:
    """Fanning friction factor, a quarter of Darcy's (exact).

    Parameters
    ----------
    darcy_friction : float or array
        [-], from 0.

    Returns
    -------
    float or ndarray
        Fanning friction factor, equal to the skin-friction coefficient on the bulk velocity [-].

    Raises
    ------
    InputError
        If a value is negative or not finite.

    Examples
    --------
    >>> fanning_from_darcy(0.02)
    0.005
    """
    shape, (f,) = arrays.columns(darcy_friction=(darcy_friction, NONNEGATIVE))
    return shape(0.25 * f)
