"""Omega near a smooth wall: sublayer, log layer, their blends, and the value put on the wall.

Also reachable as ``walllaw.wall_function.omega_*``.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    KAPPA,
    SIGNED,
    FloatLike,
    Floats,
)
from walllaw.errors import unknown_name
from walllaw.relation import Relation, relation

_KINDS = ("quadratic", "exponential")


def blend(
    viscous: FloatLike, log: FloatLike, y_plus: FloatLike = 1.0, *, kind: str = "quadratic"
) -> Any:
    """Return a blend of the viscous and the log value of a quantity.

    Parameters
    ----------
    viscous, log : float or array
        The two values [any one unit].
    y_plus : float or array, optional
        y+ of the point, used by the exponential blend only [1].
    kind : str
        ``quadratic`` (root of the sum of squares) or ``exponential``.

    Returns
    -------
    float or ndarray
        The blended value [same unit].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    Exponential: phi_v exp(-G) + phi_l exp(-1/G), G = 0.01 y+^4/(1 + 5 y+). Between y+ 5 and 10 the
    two kinds differ by up to 1.9 times, and the exponential one dips below both values.

    References
    ----------
    popovac-hanjalic-2007

    Examples
    --------
    >>> blend(3.0, 4.0)
    5.0
    """
    c = _blend_relation(kind)
    shape, (v, lg, yp) = arrays.columns(
        viscous=(viscous, SIGNED), log=(log, SIGNED), y_plus=(y_plus, AMOUNT_OR_ZERO)
    )
    c.use(y_plus=yp)
    return shape(_blend(v, lg, yp, kind))


def _blend_relation(kind: str) -> Relation:
    if kind not in _KINDS:
        raise unknown_name("kind", kind, _KINDS)
    return relation("wall_function", f"blend_{kind}")


def _blend(viscous: Floats, log: Floats, y_plus: Floats, kind: str) -> Floats:
    if kind == "quadratic":
        return np.asarray(np.hypot(viscous, log))
    c = relation("wall_function", "blend_exponential")
    # G = 1e-22 and 2e24 there give the two limits to the last bit: the clip changes nothing
    y = np.clip(y_plus, 1e-5, 1e9)
    g = c["damping"] * y * (y * y * y / (1.0 + c["ratio"] * y))
    return viscous * np.exp(-g) + log * np.exp(-1.0 / g)


def omega_viscous(
    distance: FloatLike, kinematic_viscosity: FloatLike, *, beta: FloatLike | None = None
) -> Any:
    """Return omega of the viscous sublayer.

    Parameters
    ----------
    distance : float or array
        Distance from the wall [m].
    kinematic_viscosity : float or array
        Kinematic viscosity [m2/s].
    beta : float or array, optional
        Destruction coefficient of the closure; 3/40 by default [1].

    Returns
    -------
    float or ndarray
        Specific dissipation rate [1/s]: a solution to hold at interior points.

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    omega = 6 nu/(beta y^2).

    References
    ----------
    wilcox-1988

    Examples
    --------
    >>> round(omega_viscous(1.0, 1.0), 9)
    80.0
    """
    return _sublayer_omega("omega_viscous", distance, kinematic_viscosity, beta)


def omega_wall(
    distance: FloatLike, kinematic_viscosity: FloatLike, *, beta: FloatLike | None = None
) -> Any:
    """Return the wall value of omega on a resolved mesh, ten times the sublayer value.

    Parameters
    ----------
    distance : float or array
        Distance of the first point from the wall [m].
    kinematic_viscosity : float or array
        Kinematic viscosity [m2/s].
    beta : float or array, optional
        Destruction coefficient of the inner set of the closure; 3/40 by default [1].

    Returns
    -------
    float or ndarray
        Specific dissipation rate to put on the wall itself [1/s].

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    omega_w = 10 x 6 nu/(beta y_1^2); meant for y_1+ below 3.

    References
    ----------
    menter-1994

    Examples
    --------
    >>> round(omega_wall(1.0, 1.0), 9)
    800.0
    """
    return _sublayer_omega("omega_wall", distance, kinematic_viscosity, beta)


def _sublayer_omega(
    name: str, distance: FloatLike, kinematic_viscosity: FloatLike, beta: FloatLike | None
) -> Any:
    c = relation("wall_function", name)
    shape, (y, nu, b) = arrays.columns(
        distance=(distance, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
        beta=(c["beta"] if beta is None else beta, AMOUNT),
    )
    c.use(distance=y, kinematic_viscosity=nu, beta=b)
    return shape(c["factor"] * (nu / y / y) / b)


def omega_log(
    distance: FloatLike,
    friction_velocity: FloatLike,
    *,
    kappa: FloatLike = 0.41,
    beta_star: FloatLike = 0.09,
) -> Any:
    """Return omega of the log layer.

    Parameters
    ----------
    distance : float or array
        Distance from the wall [m].
    friction_velocity : float or array
        Friction velocity, or C_mu^(1/4) sqrt(k) [m/s].
    kappa, beta_star : float or array, optional
        von Karman constant and the closure's destruction coefficient of k [1].

    Returns
    -------
    float or ndarray
        Specific dissipation rate [1/s].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    omega = u_tau/(sqrt(beta_star) kappa y).

    References
    ----------
    wilcox-1988

    Examples
    --------
    >>> round(omega_log(1.0, 1.0), 9)
    8.130081301
    """
    c = relation("wall_function", "omega_log")
    shape, (y, u, kap, bs) = arrays.columns(
        distance=(distance, AMOUNT),
        friction_velocity=(friction_velocity, AMOUNT_OR_ZERO),
        kappa=(kappa, KAPPA),
        beta_star=(beta_star, AMOUNT),
    )
    c.use(distance=y, friction_velocity=u)
    return shape(u / (np.sqrt(bs) * kap * y))


def omega_blended(
    distance: FloatLike,
    friction_velocity: FloatLike,
    kinematic_viscosity: FloatLike,
    *,
    kind: str = "quadratic",
    beta: FloatLike | None = None,
    kappa: FloatLike = 0.41,
    beta_star: FloatLike = 0.09,
) -> Any:
    """Return omega near a smooth wall at any y+, blended from its two limits.

    Parameters
    ----------
    distance : float or array
        Distance from the wall [m].
    friction_velocity : float or array
        Friction velocity, or C_mu^(1/4) sqrt(k) [m/s].
    kinematic_viscosity : float or array
        Kinematic viscosity [m2/s].
    kind : str
        ``quadratic`` or ``exponential``, as in :func:`blend`.
    beta, kappa, beta_star : float or array, optional
        As in :func:`omega_viscous` and :func:`omega_log` [1].

    Returns
    -------
    float or ndarray
        Specific dissipation rate [1/s].

    Raises
    ------
    InputError
        If an argument cannot be used.

    References
    ----------
    wilcox-1988, popovac-hanjalic-2007

    Examples
    --------
    >>> round(omega_blended(10.0, 1.0, 1.0), 9)
    1.140606076
    """
    c = _blend_relation(kind)
    viscous = omega_viscous(distance, kinematic_viscosity, beta=beta)
    log = omega_log(distance, friction_velocity, kappa=kappa, beta_star=beta_star)
    shape, (v, lg, y, u, nu) = arrays.columns(
        viscous=(viscous, SIGNED),
        log=(log, SIGNED),
        distance=(distance, AMOUNT),
        friction_velocity=(friction_velocity, AMOUNT_OR_ZERO),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
    )
    yp = y * u / nu
    c.use(y_plus=yp)
    return shape(_blend(v, lg, yp, kind))
