"""What a closure resolved to a rough wall is given there: omega, k and the displaced distance.

Use these through :mod:`walllaw.roughness`. Wall units: omega_w+ = omega nu/u_tau^2,
k_w+ = k/u_tau^2.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    KAPPA,
    FloatLike,
    Floats,
)
from walllaw.errors import unknown_name
from walllaw.relation import Relation, relation

_FORMS = ("k_omega", "low_re_k_omega", "stress_omega", "low_re_stress_omega")


def _two_powers(c: Relation, ks: Floats, limited: Floats) -> Floats:
    ratio = c["low"] / limited
    return np.where(ks < c["switch"], ratio * ratio, c["high"] / limited)


def omega_wilcox_1988(roughness_plus: FloatLike) -> Any:
    """Return omega at a rough wall by the rule of Wilcox's 1988 closure.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+, above 0 [1].

    Returns
    -------
    float or ndarray
        S_R = omega_w nu/u_tau^2 [1].

    Raises
    ------
    InputError
        If k_s+ is not above 0.

    Notes
    -----
    (50/k_s+)^2 below 25, 100/k_s+ from there. At k_s+ = 5 this is 16 times less than
    :func:`omega_wilcox_2006` gives: a rule belongs to its closure.

    References
    ----------
    wilcox-1988

    Examples
    --------
    >>> omega_wilcox_1988([5.0, 100.0])
    array([100.,   1.])
    """
    c = relation("roughness", "omega_wilcox_1988")
    shape, (ks,) = arrays.columns(roughness_plus=(roughness_plus, AMOUNT))
    c.use(roughness_plus=ks)
    return shape(_two_powers(c, ks, ks))


def omega_hellsten(roughness_plus: FloatLike, y_plus: FloatLike) -> Any:
    """Return omega at a rough or smooth wall by Hellsten's rule of 2005.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+; may be 0 (smooth) [1].
    y_plus : float or array
        y+ of the first point off the wall, above 0 [1].

    Returns
    -------
    float or ndarray
        S_R = omega_w nu/u_tau^2 [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    [50/max(k_s+, min(4.3 (y+)^0.85, 8))]^2 below 25, 100/k_s+ from there. The limit gives a smooth
    wall a value the mesh can resolve.

    References
    ----------
    hellsten-2005

    Examples
    --------
    >>> omega_hellsten(100.0, 1.0)
    1.0
    """
    c = relation("roughness", "omega_hellsten")
    shape, (ks, yp) = arrays.columns(
        roughness_plus=(roughness_plus, AMOUNT_OR_ZERO), y_plus=(y_plus, AMOUNT)
    )
    c.use(roughness_plus=ks, y_plus=yp)
    least = np.minimum(c["factor"] * np.power(yp, c["exponent"]), c["limit"])
    return shape(_two_powers(c, ks, np.maximum(ks, least)))


def omega_wilcox_2006(roughness_plus: FloatLike, form: str = "k_omega") -> Any:
    """Return omega at a rough wall by the rule of Wilcox's 2006 closures.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+, above 0 [1].
    form : str, optional
        ``k_omega``, ``low_re_k_omega``, ``stress_omega`` or ``low_re_stress_omega``.

    Returns
    -------
    float or ndarray
        S_R = omega_w nu/u_tau^2 [1].

    Raises
    ------
    InputError
        If k_s+ is not above 0 or the form is unknown.

    Notes
    -----
    (200/k_s+)^2 up to 5; K/k_s+ + [(200/k_s+)^2 - K/k_s+] exp(5 - k_s+) above, K = 100, 60, 70, 50
    in the order of the forms.

    References
    ----------
    wilcox-2006

    Examples
    --------
    >>> round(omega_wilcox_2006(10.0), 10)
    12.6277993296
    """
    if form not in _FORMS:
        raise unknown_name("form", form, _FORMS)
    c = relation("roughness", "omega_wilcox_2006")
    shape, (ks,) = arrays.columns(roughness_plus=(roughness_plus, AMOUNT))
    c.use(roughness_plus=ks)
    ratio = c["low"] / ks
    square = ratio * ratio
    rough = c[form] / np.maximum(ks, c["switch"])
    fade = np.exp(np.minimum(c["switch"] - ks, 0.0))
    return shape(np.where(ks <= c["switch"], square, rough + (square - rough) * fade))


def omega_slightly_rough(
    roughness: FloatLike, kinematic_viscosity: FloatLike, friction_velocity: FloatLike
) -> Any:
    """Return omega at a hydraulically smooth wall, made slightly rough to keep it finite.

    Parameters
    ----------
    roughness : float or array
        A small sand grain of the user's choice, above 0 [m].
    kinematic_viscosity : float or array
        Kinematic viscosity [m2/s].
    friction_velocity : float or array
        Friction velocity, for the range check [m/s].

    Returns
    -------
    float or ndarray
        omega_w [1/s].

    Warns
    -----
    RangeWarning
        If k_s+ is above 5.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    omega_w = 40000 nu/k_s^2, which is the rule of 2006 for k_s+ up to 5.

    References
    ----------
    wilcox-2006

    Examples
    --------
    >>> round(omega_slightly_rough(1e-4, 1.5e-5, 0.5))
    60000000
    """
    c = relation("roughness", "omega_slightly_rough")
    shape, (ks, nu, u) = arrays.columns(
        roughness=(roughness, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
        friction_velocity=(friction_velocity, AMOUNT_OR_ZERO),
    )
    c.use(roughness_plus=ks * u / nu)
    return shape(c["factor"] * (nu / ks / ks))


def knopp_k_wall(roughness_plus: FloatLike, beta_star: FloatLike = 0.09) -> Any:
    """Return k at a rough wall by Knopp, Eisfeld and Calvo.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+ [1].
    beta_star : float or array, optional
        Destruction coefficient of k [1].

    Returns
    -------
    float or ndarray
        k_w/u_tau^2 [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    min(1, k_s+/90)/sqrt(beta_star).

    References
    ----------
    knopp-eisfeld-calvo-2009

    Examples
    --------
    >>> round(knopp_k_wall(50.0), 9)
    1.851851852
    """
    c = relation("roughness", "knopp_k")
    shape, (ks, bs) = arrays.columns(
        roughness_plus=(roughness_plus, AMOUNT_OR_ZERO), beta_star=(beta_star, AMOUNT)
    )
    c.use(roughness_plus=ks)
    return shape(np.minimum(1.0, ks / c["rough"]) / np.sqrt(bs))


def knopp_displacement(roughness_plus: FloatLike) -> Any:
    """Return the displacement of the wall over the sand grain by Knopp, Eisfeld and Calvo.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+ [1].

    Returns
    -------
    float or ndarray
        d0/k_s [1].

    Raises
    ------
    InputError
        If k_s+ is negative.

    Notes
    -----
    0.03 min[1, (k_s+/30)^(2/3)] min[1, (k_s+/45)^(1/4)] min[1, (k_s+/60)^(1/4)].

    References
    ----------
    knopp-eisfeld-calvo-2009

    Examples
    --------
    >>> round(knopp_displacement(10.0), 11)
    0.00632702393
    """
    c = relation("roughness", "knopp_displacement")
    shape, (ks,) = arrays.columns(roughness_plus=(roughness_plus, AMOUNT_OR_ZERO))
    c.use(roughness_plus=ks)
    return shape(_knopp_share(c, ks))


def _knopp_share(c: Relation, ks: Floats) -> Floats:
    root = np.cbrt(np.minimum(1.0, ks / c["first"]))
    quarters = np.minimum(1.0, ks / c["second"]) * np.minimum(1.0, ks / c["third"])
    return np.asarray(c["share"] * root * root * np.sqrt(np.sqrt(quarters)))


def knopp_omega_wall(
    roughness_plus: FloatLike,
    y_plus: FloatLike,
    *,
    kappa: FloatLike = 0.41,
    beta_star: FloatLike = 0.09,
    beta: FloatLike = 0.075,
) -> Any:
    """Return omega at a rough or smooth wall by Knopp, Eisfeld and Calvo.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+ [1]; 0 gives the smooth value.
    y_plus : float or array
        y+ of the first point off the wall [1].
    kappa, beta_star, beta : float or array, optional
        von Karman constant and the closure's destruction coefficients [1].

    Returns
    -------
    float or ndarray
        omega_w nu/u_tau^2 [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    min[1/(sqrt(beta_star) kappa d0+), 60/(beta y+^2)] with d0 of :func:`knopp_displacement`.

    References
    ----------
    knopp-eisfeld-calvo-2009

    Examples
    --------
    >>> round(knopp_omega_wall(100.0, 0.1), 11)
    2.71002710027
    """
    c = relation("roughness", "knopp_omega")
    shape, (ks, yp, kap, bs, b) = arrays.columns(
        roughness_plus=(roughness_plus, AMOUNT_OR_ZERO),
        y_plus=(y_plus, AMOUNT),
        kappa=(kappa, KAPPA),
        beta_star=(beta_star, AMOUNT),
        beta=(beta, AMOUNT),
    )
    c.use(roughness_plus=ks, y_plus=yp)
    displacement = ks * _knopp_share(relation("roughness", "knopp_displacement"), ks)
    # a vanishing displacement leaves the smooth value; 1e-300 only keeps the quotient finite
    rough = 1.0 / (np.sqrt(bs) * kap * np.maximum(displacement, 1e-300))
    smooth = c["smooth_factor"] / (b * np.square(yp))
    return shape(np.minimum(rough, smooth))


def spalart_allmaras_displacement(roughness: FloatLike) -> Any:
    """Return the displacement of the wall in the Spalart-Allmaras closure.

    Parameters
    ----------
    roughness : float or array
        Equivalent sand grain k_s [m].

    Returns
    -------
    float or ndarray
        d0, to be added to the wall distance in every term [m].

    Raises
    ------
    InputError
        If the roughness is negative.

    Notes
    -----
    d0 = 0.03 k_s. The wall value of nu_tilde is then not zero: its normal derivative there is
    nu_tilde/d0.

    References
    ----------
    aupoix-spalart-2003

    Examples
    --------
    >>> spalart_allmaras_displacement(1e-3)
    3e-05
    """
    c = relation("roughness", "spalart_allmaras_displacement")
    shape, (ks,) = arrays.columns(roughness=(roughness, AMOUNT_OR_ZERO))
    c.use(roughness=ks)
    return shape(c["share"] * ks)
