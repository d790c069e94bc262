"""Compressible turbulent plate: recovery, friction by van Driest II and Eckert, wall units.

Temperatures are ratios to the edge of the layer unless given in K; pressure is constant across
the layer, so that density goes with the inverse temperature. Velocity transformations stand in
``walllaw.velocity_transformation`` and are reached from here as well.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from walllaw import arrays, plate
from walllaw.arrays import NONNEGATIVE, POSITIVE, FloatLike, Floats, Interval, Shape
from walllaw.recovery import (
    GAMMA,
    KELVIN,
    MACH,
    RECOVERY,
    adiabatic_wall_ratio,
    heating,
    recovery_factor,
    recovery_factor_laminar,
    sutherland,
    sutherland_ratio,
)
from walllaw.relation import relation
from walllaw.velocity_transformation import (
    semi_local_distance,
    total_stress_velocity,
    trettel_larsson_velocity,
    van_driest_velocity,
)

__all__ = [
    "Factors",
    "adiabatic_wall_ratio",
    "eckert",
    "first_cell_centre",
    "recovery_factor",
    "recovery_factor_laminar",
    "reference_temperature_ratio",
    "semi_local_distance",
    "sutherland_ratio",
    "total_stress_velocity",
    "trettel_larsson_velocity",
    "van_driest_2",
    "van_driest_2_factors",
    "van_driest_2_theta",
    "van_driest_velocity",
]

_RATIO = Interval(1e-3, 1e3)


@dataclass(frozen=True, slots=True)
class Factors:
    """Factors between a compressible layer and the incompressible law it is transformed to.

    Attributes
    ----------
    friction : float or ndarray
        F_c, incompressible over compressible skin friction [1].
    momentum : float or ndarray
        F_theta, incompressible over compressible Re_theta: mu_e/mu_w [1].
    """

    friction: Any
    momentum: Any

    @property
    def distance(self) -> Any:
        """F_x = F_theta/F_c, incompressible over compressible Re_x [1]."""
        return self.momentum / self.friction


def _state(
    mach: FloatLike,
    wall_temperature_ratio: FloatLike,
    edge_temperature: FloatLike,
    recovery_factor: FloatLike,
    heat_capacity_ratio: FloatLike,
) -> tuple[Shape, Floats, Floats, Floats, Floats]:
    """Return Mach number, r (gamma - 1)/2 M^2, T_w/T_e and T_e as flat arrays."""
    shape, (m, t, edge, r, g) = arrays.columns(
        mach=(mach, MACH),
        wall_temperature_ratio=(wall_temperature_ratio, _RATIO),
        edge_temperature=(edge_temperature, KELVIN),
        recovery_factor=(recovery_factor, RECOVERY),
        heat_capacity_ratio=(heat_capacity_ratio, GAMMA),
    )
    return shape, m, heating(m, r, g), t, edge


def van_driest_2_factors(
    mach: FloatLike,
    wall_temperature_ratio: FloatLike,
    edge_temperature: FloatLike,
    recovery_factor: FloatLike = 0.89,
    heat_capacity_ratio: FloatLike = 1.4,
) -> Factors:
    """Transformation factors of van Driest's second method.

    Parameters
    ----------
    mach : array_like
        Edge Mach number [1], 0 to 100.
    wall_temperature_ratio : array_like
        T_w/T_e [1], 1e-3 to 1e3.
    edge_temperature : array_like
        T_e [K], for Sutherland's viscosity of air.
    recovery_factor : array_like, optional
        [1], 0 to 1.
    heat_capacity_ratio : array_like, optional
        gamma [1], above 1 to 2.

    Returns
    -------
    Factors
        F_c and F_theta, each of the broadcast shape.

    Warns
    -----
    RangeWarning
        Outside M 0 to 8 or T_w/T_aw 0.2 to 1 (friction too high on strongly cooled walls).

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    Printed: F_c = m/(asin A + asin B)^2, m = r (gamma - 1)/2 M^2. That is the square of the mean
    of sqrt(T_e/T) over the velocity, inverted; the integral of one over the root of a quadratic
    also reads F_c = m/(4 atan^2 u), u = sqrt(m)/(1 + sqrt(T_w/T_e)), where nothing cancels and
    m -> 0 gives ((1 + sqrt(T_w/T_e))/2)^2.

    References
    ----------
    van-driest-1956-compressible

    Examples
    --------
    >>> f = van_driest_2_factors(2.0, 1.712, 300.0)
    >>> round(f.friction, 10), round(f.momentum, 10)
    (1.4493975097, 0.6787683711)
    """
    r = relation("compressible", "van_driest_2")
    shape, mach_, m, t, edge = _state(
        mach, wall_temperature_ratio, edge_temperature, recovery_factor, heat_capacity_ratio
    )
    r.use(mach=mach_, wall_to_adiabatic=t / (1.0 + m))
    root = 1.0 + np.sqrt(t)
    u = np.sqrt(m) / root
    safe = np.where(u > 0.0, u, 1.0)
    stretch = np.where(u > 0.0, safe / np.arctan(safe), 1.0)
    friction = np.square(0.5 * root * stretch)
    return Factors(shape(friction), shape(sutherland(edge, t * edge)))


def van_driest_2_theta(
    re_theta: FloatLike,
    mach: FloatLike,
    wall_temperature_ratio: FloatLike,
    edge_temperature: FloatLike,
    recovery_factor: FloatLike = 0.89,
    heat_capacity_ratio: FloatLike = 1.4,
) -> Any:
    """Local skin friction of a compressible plate by Re_theta: van Driest II, Karman-Schoenherr.

    Parameters
    ----------
    re_theta : array_like
        U_e theta/nu_e [1].
    mach, wall_temperature_ratio, edge_temperature, recovery_factor, heat_capacity_ratio
        As in `van_driest_2_factors`.

    Returns
    -------
    float or ndarray
        c_f = tau_w/(rho_e U_e^2/2) [1].

    Warns
    -----
    RangeWarning
        Outside the ranges of the factors or of the incompressible law.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    References
    ----------
    van-driest-1956-compressible

    Examples
    --------
    >>> round(van_driest_2_theta(1e4, 2.0, 1.712, 300.0), 8)
    0.00195453
    """
    f = van_driest_2_factors(
        mach, wall_temperature_ratio, edge_temperature, recovery_factor, heat_capacity_ratio
    )
    shape, (re, c, s) = arrays.columns(
        re_theta=(re_theta, POSITIVE),
        friction=(f.friction, POSITIVE),
        momentum=(f.momentum, POSITIVE),
    )
    return shape(plate.karman_schoenherr_theta(s * re) / c)


def van_driest_2(
    reynolds: FloatLike,
    mach: FloatLike,
    wall_temperature_ratio: FloatLike,
    edge_temperature: FloatLike,
    recovery_factor: FloatLike = 0.89,
    heat_capacity_ratio: FloatLike = 1.4,
) -> Any:
    """Local skin friction of a compressible plate by Re_x: van Driest II on White's law.

    Parameters
    ----------
    reynolds : array_like
        U_e x/nu_e [1].
    mach, wall_temperature_ratio, edge_temperature, recovery_factor, heat_capacity_ratio
        As in `van_driest_2_factors`.

    Returns
    -------
    float or ndarray
        c_f = tau_w/(rho_e U_e^2/2) [1].

    Warns
    -----
    RangeWarning
        Outside the ranges of the factors or of the incompressible law.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    References
    ----------
    van-driest-1956-compressible, white-1974

    Examples
    --------
    >>> round(van_driest_2(1e7, 2.0, 1.712, 300.0), 6)
    0.001994
    """
    f = van_driest_2_factors(
        mach, wall_temperature_ratio, edge_temperature, recovery_factor, heat_capacity_ratio
    )
    shape, (re, c, s) = arrays.columns(
        reynolds=(reynolds, POSITIVE),
        friction=(f.friction, POSITIVE),
        distance=(f.distance, POSITIVE),
    )
    return shape(plate.white(s * re) / c)


def reference_temperature_ratio(
    mach: FloatLike,
    wall_temperature_ratio: FloatLike,
    recovery_factor: FloatLike = 0.89,
    heat_capacity_ratio: FloatLike = 1.4,
) -> Any:
    """Reference temperature of Eckert over the edge temperature.

    Parameters
    ----------
    mach, wall_temperature_ratio, recovery_factor, heat_capacity_ratio
        As in `van_driest_2_factors`.

    Returns
    -------
    float or ndarray
        T*/T_e [1].

    Warns
    -----
    RangeWarning
        Outside M 0 to 8.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    T* = T_e + 0.5 (T_w - T_e) + 0.22 (T_aw - T_e).

    References
    ----------
    eckert-1955

    Examples
    --------
    >>> round(reference_temperature_ratio(2.0, 1.712), 7)
    1.51264
    """
    shape, mach_, m, t, _ = _state(
        mach, wall_temperature_ratio, 300.0, recovery_factor, heat_capacity_ratio
    )
    r = relation("compressible", "eckert")
    r.use(mach=mach_)
    return shape(1.0 + r["wall"] * (t - 1.0) + r["recovery"] * m)


def eckert(
    reynolds: FloatLike,
    mach: FloatLike,
    wall_temperature_ratio: FloatLike,
    edge_temperature: FloatLike,
    recovery_factor: FloatLike = 0.89,
    heat_capacity_ratio: FloatLike = 1.4,
) -> Any:
    """Local skin friction of a compressible plate: Eckert's reference temperature, White's law.

    Parameters
    ----------
    reynolds : array_like
        U_e x/nu_e [1].
    mach, wall_temperature_ratio, edge_temperature, recovery_factor, heat_capacity_ratio
        As in `van_driest_2_factors`.

    Returns
    -------
    float or ndarray
        c_f = tau_w/(rho_e U_e^2/2) [1]; 5 % (M 2) to 16 % (M 5) below van Driest II.

    Warns
    -----
    RangeWarning
        Outside the ranges of the method or of the incompressible law.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    c_f = (rho*/rho_e) c_f,i(Re_x (rho*/rho_e)(mu_e/mu*)).

    References
    ----------
    eckert-1955, white-1974

    Examples
    --------
    >>> round(eckert(1e7, 2.0, 1.712, 300.0), 6)
    0.001898
    """
    ratio = reference_temperature_ratio(
        mach, wall_temperature_ratio, recovery_factor, heat_capacity_ratio
    )
    shape, (re, t, edge) = arrays.columns(
        reynolds=(reynolds, POSITIVE),
        ratio=(ratio, POSITIVE),
        edge_temperature=(edge_temperature, KELVIN),
    )
    return shape(plate.white(re / t * sutherland(edge, t * edge)) / t)


def first_cell_centre(
    y_plus: FloatLike,
    skin_friction: FloatLike,
    velocity: FloatLike,
    kinematic_viscosity: FloatLike,
    wall_temperature_ratio: FloatLike,
    edge_temperature: FloatLike,
) -> Any:
    """Wall distance of a given y+ of a compressible layer.

    Parameters
    ----------
    y_plus : array_like
        y u_tau/nu_w, with wall properties [1], from 0.
    skin_friction : array_like
        tau_w/(rho_e U_e^2/2) [1], positive.
    velocity : array_like
        U_e [m/s], positive.
    kinematic_viscosity : array_like
        nu_e, at the edge [m2/s], positive.
    wall_temperature_ratio : array_like
        T_w/T_e [1], 1e-3 to 1e3.
    edge_temperature : array_like
        T_e [K], for Sutherland's viscosity of air.

    Returns
    -------
    float or ndarray
        y [m], of the broadcast shape.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    u_tau = sqrt(tau_w/rho_w) = U_e sqrt(c_f/2 T_w/T_e), nu_w = nu_e (mu_w/mu_e)(T_w/T_e).

    References
    ----------
    nasa-tmr-2025

    Examples
    --------
    >>> round(first_cell_centre(1.0, 0.002, 600.0, 1.5e-5, 1.712, 300.0) * 1e6, 3)
    1.524
    """
    shape, (y, cf, u, nu, t, edge) = arrays.columns(
        y_plus=(y_plus, NONNEGATIVE),
        skin_friction=(skin_friction, POSITIVE),
        velocity=(velocity, POSITIVE),
        kinematic_viscosity=(kinematic_viscosity, POSITIVE),
        wall_temperature_ratio=(wall_temperature_ratio, _RATIO),
        edge_temperature=(edge_temperature, KELVIN),
    )
    relation("compressible", "first_cell_centre").use(y_plus=y)
    viscosity = nu * t * sutherland(t * edge, edge)
    return shape(y * viscosity / (u * np.sqrt(0.5 * cf * t)))
