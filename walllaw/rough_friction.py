"""Friction of smooth or rough pipes; public names are reached as ``walllaw.friction``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike, Floats, Interval
from walllaw.relation import relation
from walllaw.roots import LN10, add_log10, inverse_square
from walllaw.smooth_friction import LAMINAR, TURBULENT

ROUGHNESS = Interval(0.0, 0.5)  # a grain as high as the radius closes the pipe

_START = 7.0  # 1/sqrt(f) inside the logarithm of the start
_EASY = 2300.0  # from here on two steps reach the last digits; below a third one is taken


def _first_step(a: Floats, b: Floats, x: Floats) -> Floats:
    """Step of fourth order towards the root of r = x + 2 log10(a + b x), to be taken from x.

    With t = r/r1 the step is t + r2/(2 r1) t^2 + (3 r2^2 - r1 r3)/(6 r1^2) t^3, where the
    derivatives are r1 = 1 + q, r2 = -p q, r3 = 2 p^2 q with p = b/(a + b x), q = 2 p/ln 10.
    """
    y = b * x  # worked in place: on whole blocks a new array costs as much as the arithmetic
    y += a
    t = np.log10(y)
    t *= 2.0
    t += x
    p = np.divide(b, y, out=y)
    q = (2.0 / LN10) * p
    over = q + 1.0
    np.divide(1.0, over, out=over)
    t *= over
    p *= t
    share = q * over
    q -= 2.0
    q *= over
    q *= p
    q *= 1.0 / 6.0
    third = np.subtract(0.5, q, out=q)
    third *= p
    third *= share
    t *= np.subtract(1.0, third, out=third)
    return t


def _last_step(a: Floats, b: Floats, x: Floats) -> Floats:
    """Step of third order from a point that is within 1e-5, its residual free of rounding."""
    y = b * x
    y += a
    t = add_log10(x, 2.0, y)
    p = np.divide(b, y, out=y)
    q = (2.0 / LN10) * p
    slope = q + 1.0
    t /= slope
    p *= t
    p *= q
    p /= slope
    p *= 0.5
    t *= np.subtract(1.0, p, out=p)
    return t


def _colebrook(re: Floats, rough: Floats, rough_constant: float, smooth_constant: float) -> Floats:
    a = rough / rough_constant
    b = smooth_constant / re
    x = np.log10(_START * b + a)
    x *= -2.0
    low = re < _EASY
    if low.any():
        x = np.where(low, x - _first_step(a, b, x), x)
    x -= _first_step(a, b, x)
    return inverse_square(x, _last_step(a, b, x))


def colebrook(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor of a smooth or rough pipe: exact root of the Colebrook-White law.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.
    relative_roughness : array_like, optional
        Equivalent sand-grain height over the diameter [1], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1], of the broadcast shape.

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 1e8 or above a relative roughness of 0.05.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    1/sqrt(f) = -2 log10(e/3.7 + 2.51/(Re sqrt(f))). The residual is concave and increasing in
    x = 1/sqrt(f). From x = 7 inside the logarithm one step of fourth and one of third order reach
    the last digits; points below Re = 2300 take one more. No exponential, so nothing overflows.
    Largest error found against 50 digits: 3.3 ulp over Re 2300 to 1e12 and roughness 0 to 0.1
    (a million points and a search round the worst), 3 ulp on samples of Re 100 to 1e300 and
    roughness 0 to 0.5.

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
        reynolds=(reynolds, TURBULENT), relative_roughness=(relative_roughness, ROUGHNESS)
    )
    r.use(reynolds=re, relative_roughness=rr)
    return shape(arrays.blocks(lambda u, v: _colebrook(u, v, r["rough"], r["smooth"]), re, rr))


def colebrook_from_friction_reynolds(
    friction_reynolds: FloatLike, relative_roughness: FloatLike = 0.0
) -> Any:
    """Darcy friction factor by Colebrook-White when the pressure gradient is known: explicit.

    Parameters
    ----------
    friction_reynolds : array_like
        Re sqrt(f) [1], from 20: sqrt(8) u_tau D/nu, or sqrt(2 D^3 (-dp/dx)/rho)/nu.
    relative_roughness : array_like, optional
        Equivalent sand-grain height over the diameter [1], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1]; the bulk velocity is u_tau sqrt(8/f).

    Warns
    -----
    RangeWarning
        Outside the range of `colebrook`.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    References
    ----------
    colebrook-1939

    Examples
    --------
    >>> f = colebrook(1e5, 1e-4)
    >>> round(colebrook_from_friction_reynolds(1e5 * f**0.5, 1e-4) / f, 12)
    1.0
    """
    r = relation("friction", "colebrook")
    shape, (v, rr) = arrays.columns(
        friction_reynolds=(friction_reynolds, Interval(20.0)),
        relative_roughness=(relative_roughness, ROUGHNESS),
    )
    x = -2.0 * np.log10(rr / r["rough"] + r["smooth"] / v)
    r.use(reynolds=v * x, relative_roughness=rr)
    return shape(1.0 / (x * x))


def colebrook_from_friction_velocity(
    friction_reynolds: FloatLike, relative_roughness: FloatLike = 0.0
) -> Any:
    """Darcy friction factor by Colebrook-White when the wall stress is known: explicit.

    Parameters
    ----------
    friction_reynolds : array_like
        u_tau D/nu on the diameter [1], from 10: twice the friction Reynolds number on the radius.
    relative_roughness : array_like, optional
        Equivalent sand-grain height over the diameter [1], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1]; the bulk velocity is u_tau sqrt(8/f).

    Warns
    -----
    RangeWarning
        Outside the range of `colebrook`.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    Re sqrt(f) = sqrt(8) u_tau D/nu, so that the law needs no solution.

    References
    ----------
    colebrook-1939

    Examples
    --------
    >>> f = colebrook(1e5, 1e-4)
    >>> round(colebrook_from_friction_velocity(1e5 * (f / 8) ** 0.5, 1e-4) / f, 12)
    1.0
    """
    shape, (u,) = arrays.columns(friction_reynolds=(friction_reynolds, Interval(10.0)))
    return colebrook_from_friction_reynolds(shape(np.sqrt(8.0) * u), relative_roughness)


def haaland(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor by the explicit approximation of Haaland 1983.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.
    relative_roughness : array_like, optional
        Equivalent sand-grain height over the diameter [1], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1]; within 1.5 % of Colebrook-White over the stated range.

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 1e8 or above a relative roughness of 0.05.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    1/sqrt(f) = -1.8 log10[(e/3.7)^1.11 + 6.9/Re].

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
        reynolds=(reynolds, TURBULENT), relative_roughness=(relative_roughness, ROUGHNESS)
    )
    r.use(reynolds=re, relative_roughness=rr)
    log = np.log10(np.power(rr / r["rough"], r["power"]) + r["smooth"] / re)
    return shape(1.0 / (r["slope"] * r["slope"]) / (log * log))


def swamee_jain(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor by the explicit approximation of Swamee and Jain 1976.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 100.
    relative_roughness : array_like, optional
        Equivalent sand-grain height over the diameter [1], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1]; within 3 % of Colebrook-White over the stated range.

    Warns
    -----
    RangeWarning
        Outside Re 5e3 to 1e8 or above a relative roughness of 0.01.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    f = 0.25/[log10(e/3.7 + 5.74/Re^0.9)]^2.

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
        reynolds=(reynolds, TURBULENT), relative_roughness=(relative_roughness, ROUGHNESS)
    )
    r.use(reynolds=re, relative_roughness=rr)
    x = np.log10(rr / r["rough"] + r["smooth"] / np.power(re, r["power"]))
    return shape(r["factor"] / (x * x))


def churchill(reynolds: FloatLike, relative_roughness: FloatLike = 0.0) -> Any:
    """Darcy friction factor in all regimes by the explicit formula of Churchill 1977.

    Parameters
    ----------
    reynolds : array_like
        Bulk Reynolds number on the diameter [1], from 1e-300.
    relative_roughness : array_like, optional
        Equivalent sand-grain height over the diameter [1], 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Warns
    -----
    RangeWarning
        Above Re = 1e8 or a relative roughness of 0.05.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    f = 8 [(8/Re)^12 + (A + B)^(-3/2)]^(1/12), A = {2.457 ln(1/[(7/Re)^0.9 + 0.27 e])}^16,
    B = (37530/Re)^16. Each sum of powers is written as its larger term times a power of one plus
    a ratio below one, so that no power can overflow.

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
        reynolds=(reynolds, LAMINAR), relative_roughness=(relative_roughness, ROUGHNESS)
    )
    r.use(reynolds=re, relative_roughness=rr)
    with np.errstate(under="ignore"):  # the smaller of two terms may vanish
        inside = np.power(r["smooth"] / re, r["power"]) + r["rough"] * rr
        turbulent = np.abs(r["factor"] * np.log(inside))
        inverse = 1.0 / _power_sum(turbulent, r["transition"] / re, 16)
        return shape(8.0 * _power_sum(r["laminar"] / re, inverse * inverse, 12))


def _power_sum(x: Floats, y: Floats, degree: int) -> Floats:
    """Return (x^n + y^n)^(1/n) of numbers from 0, not both 0; n a multiple of 4."""
    large = np.maximum(x, y)
    fourth = np.square(np.square(np.minimum(x, y) / large))
    power = fourth
    for _ in range(degree // 4 - 1):
        power = power * fourth
    return np.asarray(large * np.exp(np.log1p(power) / degree))


def nikuradse_rough(relative_roughness: FloatLike) -> Any:
    """Darcy friction factor of a fully rough pipe, Nikuradse 1933.

    Parameters
    ----------
    relative_roughness : array_like
        Sand-grain height over the diameter [1], above 0 to 0.5.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1], independent of the Reynolds number.

    Warns
    -----
    RangeWarning
        Outside the grains that were tried, 9e-4 to 0.034.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    1/sqrt(f) = 2 log10(r/k_s) + 1.74 with the radius r.

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
        relative_roughness=(relative_roughness, Interval(0.0, 0.5, open_low=True))
    )
    r.use(relative_roughness=rr)
    x = r["intercept"] - r["slope"] * np.log10(2.0 * rr)
    return shape(1.0 / (x * x))
