"""Heat at walls: first-cell fluxes and temperatures, and by name the modules beside this one.

Temperature laws are in :mod:`walllaw.thermal_laws` and :mod:`walllaw.thermal_integral`, turbulent
Prandtl numbers in :mod:`walllaw.turbulent_prandtl`, ducts in :mod:`walllaw.nusselt`, plates and the
analogies in :mod:`walllaw.plate_heat`.
T+ = (T_w - T) rho c_p u_tau/q_w; the flux q_w is positive into the fluid. With a k-based wall
function u_tau is C_mu^(1/4) sqrt(k) and y+ is y*.
"""

from __future__ import annotations

from typing import Any

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    SIGNED,
    FloatLike,
    Floats,
)
from walllaw.nusselt import (
    colburn,
    dittus_boelter,
    gnielinski,
    laminar,
    petukhov,
    petukhov_friction,
    sieder_tate,
)
from walllaw.plate_heat import (
    chilton_colburn,
    plate_laminar,
    plate_mixed,
    plate_turbulent,
    reynolds_analogy,
)
from walllaw.relation import relation
from walllaw.thermal_integral import integrated
from walllaw.thermal_laws import (
    conduction_layer,
    jayatilleke,
    jayatilleke_resistance,
    kader,
    thermal_intersection,
    two_layer,
)
from walllaw.turbulent_prandtl import jischa_rieke, kays, kays_crawford, reynolds_mean, weigand

__all__ = [
    "chilton_colburn",
    "colburn",
    "conduction_layer",
    "dittus_boelter",
    "gnielinski",
    "heat_transfer_coefficient",
    "integrated",
    "jayatilleke",
    "jayatilleke_resistance",
    "jischa_rieke",
    "kader",
    "kays",
    "kays_crawford",
    "laminar",
    "petukhov",
    "petukhov_friction",
    "plate_laminar",
    "plate_mixed",
    "plate_turbulent",
    "reynolds_analogy",
    "reynolds_mean",
    "sieder_tate",
    "thermal_intersection",
    "two_layer",
    "wall_heat_flux",
    "wall_temperature",
    "weigand",
]


def _cell(
    friction_velocity: FloatLike,
    density: FloatLike,
    specific_heat: FloatLike,
    t_plus: FloatLike,
    **more: Any,
) -> tuple[arrays.Shape, Floats, list[Floats]]:
    """Return the shape, the heat-transfer coefficient and the other arguments, flat."""
    shape, (u, rho, cp, t, *rest) = arrays.columns(
        friction_velocity=(friction_velocity, AMOUNT_OR_ZERO),
        density=(density, AMOUNT),
        specific_heat=(specific_heat, AMOUNT),
        t_plus=(t_plus, AMOUNT),
        **more,
    )
    return shape, rho * cp * u / t, rest


def heat_transfer_coefficient(
    friction_velocity: FloatLike, density: FloatLike, specific_heat: FloatLike, t_plus: FloatLike
) -> Any:
    """Return the heat-transfer coefficient between the wall and the first unknown.

    Parameters
    ----------
    friction_velocity : float or array
        Friction velocity [m/s].
    density : float or array
        Density at the wall [kg/m3].
    specific_heat : float or array
        Specific heat capacity at constant pressure [J/(kg K)].
    t_plus : float or array
        T+ of the first unknown by a law of this module [1].

    Returns
    -------
    float or ndarray
        h = q_w/(T_w - T_P) [W/(m2 K)].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    h = rho c_p u_tau/T+.

    References
    ----------
    common practice

    Examples
    --------
    >>> heat_transfer_coefficient(0.5, 1.2, 1000.0, 12.0)
    50.0
    """
    c = relation("heat", "heat_transfer_coefficient")
    shape, h, _ = _cell(friction_velocity, density, specific_heat, t_plus)
    c.use()
    return shape(h)


def wall_heat_flux(
    wall_temperature: FloatLike,
    temperature: FloatLike,
    friction_velocity: FloatLike,
    density: FloatLike,
    specific_heat: FloatLike,
    t_plus: FloatLike,
) -> Any:
    """Return the wall heat flux from the temperatures of the wall and of the first unknown.

    Parameters
    ----------
    wall_temperature, temperature : float or array
        Temperatures of the wall and of the first unknown [K].
    friction_velocity, density, specific_heat, t_plus : float or array
        As in :func:`heat_transfer_coefficient`.

    Returns
    -------
    float or ndarray
        Heat flux into the fluid [W/m2].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    q_w = rho c_p u_tau (T_w - T_P)/T+.

    References
    ----------
    common practice

    Examples
    --------
    >>> wall_heat_flux(330.0, 300.0, 0.5, 1.2, 1000.0, 12.0)
    1500.0
    """
    c = relation("heat", "wall_heat_flux")
    shape, h, (t_w, t_p) = _cell(
        friction_velocity,
        density,
        specific_heat,
        t_plus,
        wall_temperature=(wall_temperature, AMOUNT),
        temperature=(temperature, AMOUNT),
    )
    c.use()
    return shape(h * (t_w - t_p))


def wall_temperature(
    heat_flux: FloatLike,
    temperature: FloatLike,
    friction_velocity: FloatLike,
    density: FloatLike,
    specific_heat: FloatLike,
    t_plus: FloatLike,
) -> Any:
    """Return the wall temperature that a given heat flux sets.

    Parameters
    ----------
    heat_flux : float or array
        Heat flux into the fluid [W/m2].
    temperature : float or array
        Temperature of the first unknown [K].
    friction_velocity : float or array
        Friction velocity, above 0 [m/s].
    density, specific_heat, t_plus : float or array
        As in :func:`heat_transfer_coefficient`.

    Returns
    -------
    float or ndarray
        Wall temperature [K].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    T_w = T_P + q_w T+/(rho c_p u_tau).

    References
    ----------
    common practice

    Examples
    --------
    >>> wall_temperature(1500.0, 300.0, 0.5, 1.2, 1000.0, 12.0)
    330.0
    """
    c = relation("heat", "wall_temperature")
    arrays.check("friction_velocity", friction_velocity, AMOUNT)
    shape, h, (q, t_p) = _cell(
        friction_velocity,
        density,
        specific_heat,
        t_plus,
        heat_flux=(heat_flux, SIGNED),
        temperature=(temperature, AMOUNT),
    )
    c.use()
    return shape(t_p + q / h)
