"""Transformations of compressible velocity profiles to the incompressible law of the wall.

Profiles run from the wall outwards along the last axis, in wall units (density, viscosity and
friction velocity of the wall). The wall itself may be left out; it is added where the first
distance is above zero. Integrals use one secant per interval, which is of second order.
"""

from __future__ import annotations

import numpy as np

from walllaw import arrays
from walllaw.arrays import NONNEGATIVE, POSITIVE, FloatLike, Floats, Interval
from walllaw.errors import InputError
from walllaw.relation import relation

_UNIT = Interval(0.0, 1.5)  # total stress over wall stress; above 1 with an adverse gradient


def _profile(**columns: tuple[FloatLike, Interval]) -> dict[str, Floats]:
    """Return the columns in one shape, checked, with the wall in front of the last axis."""
    checked = {
        name: np.atleast_1d(arrays.check(name, value, accepted))
        for name, (value, accepted) in columns.items()
    }
    try:
        dims = np.broadcast_shapes(*(values.shape for values in checked.values()))
    except ValueError:
        shapes = ", ".join(f"{name} {values.shape}" for name, values in checked.items())
        raise InputError("shapes", shapes, "shapes that broadcast together") from None
    wall = {"y_plus": 0.0, "u_plus": 0.0}
    return {
        name: np.concatenate(
            [np.full((*dims[:-1], 1), wall.get(name, 1.0)), np.broadcast_to(values, dims)], axis=-1
        )
        for name, values in checked.items()
    }


def _rising(name: str, values: Floats) -> Floats:
    """Return the steps of a coordinate; only the added wall may coincide with the first point."""
    steps = np.diff(values, axis=-1)
    if (steps[..., 1:] <= 0.0).any():
        raise InputError(name, "values that do not increase", "values that increase from the wall")
    return steps


def _middle(values: Floats) -> Floats:
    return 0.5 * (values[..., 1:] + values[..., :-1])


def _slope(rise: Floats, run: Floats) -> Floats:
    """Return rise/run, and 0 over an interval of no length (a wall that was given)."""
    return np.where(run > 0.0, rise, 0.0) / np.where(run > 0.0, run, 1.0)


def van_driest_velocity(u_plus: FloatLike, density_ratio: FloatLike) -> Floats:
    """Velocity transformed by van Driest, for adiabatic walls; plotted against y+.

    Parameters
    ----------
    u_plus : array_like
        Profile of U/u_tau from the wall [1], from 0, last axis along the profile.
    density_ratio : array_like
        rho/rho_w at the same points [1], positive.

    Returns
    -------
    ndarray
        U_VD [1], of the broadcast shape.

    Raises
    ------
    InputError
        If a value is outside its interval or the shapes do not fit.

    Notes
    -----
    Integral of sqrt(rho/rho_w) over U+.

    References
    ----------
    van-driest-1951

    Examples
    --------
    >>> van_driest_velocity([5.0, 10.0], [1.0, 1.0])
    array([ 5., 10.])
    """
    relation("compressible", "van_driest_velocity").use()
    p = _profile(u_plus=(u_plus, NONNEGATIVE), density_ratio=(density_ratio, POSITIVE))
    weight = _middle(np.sqrt(p["density_ratio"]))
    return np.asarray(np.cumsum(weight * np.diff(p["u_plus"], axis=-1), axis=-1))


def semi_local_distance(
    y_plus: FloatLike, density_ratio: FloatLike, dynamic_viscosity_ratio: FloatLike
) -> Floats:
    """Semi-local wall distance y*, of local density and viscosity.

    Parameters
    ----------
    y_plus : array_like
        Wall distance in wall units [1], from 0.
    density_ratio, dynamic_viscosity_ratio : array_like
        rho/rho_w and mu/mu_w at the same points [1], positive.

    Returns
    -------
    ndarray
        y* = y sqrt(rho tau_w)/mu [1], of the broadcast shape.

    Raises
    ------
    InputError
        If a value is outside its interval or the shapes do not fit.

    References
    ----------
    trettel-larsson-2016

    Examples
    --------
    >>> semi_local_distance([100.0], [0.25], [2.0])
    array([25.])
    """
    relation("compressible", "semi_local_distance").use()
    p = _profile(
        y_plus=(y_plus, NONNEGATIVE),
        density_ratio=(density_ratio, POSITIVE),
        dynamic_viscosity_ratio=(dynamic_viscosity_ratio, POSITIVE),
    )
    return np.asarray(_semi_local(p)[..., 1:])


def _semi_local(p: dict[str, Floats]) -> Floats:
    return p["y_plus"] * np.sqrt(p["density_ratio"]) / p["dynamic_viscosity_ratio"]


def trettel_larsson_velocity(
    y_plus: FloatLike,
    u_plus: FloatLike,
    density_ratio: FloatLike,
    dynamic_viscosity_ratio: FloatLike,
) -> Floats:
    """Velocity transformed by Trettel and Larsson; plotted against the semi-local distance.

    Parameters
    ----------
    y_plus, u_plus : array_like
        Profile in wall units from the wall [1], from 0, last axis along the profile.
    density_ratio, dynamic_viscosity_ratio : array_like
        rho/rho_w and mu/mu_w at the same points [1], positive.

    Returns
    -------
    ndarray
        U_TL [1], of the broadcast shape.

    Raises
    ------
    InputError
        If a value is outside its interval, the shapes do not fit, or y+ does not increase.

    Notes
    -----
    Integral of (mu/mu_w) (dy*/dy+) over U+.

    References
    ----------
    trettel-larsson-2016

    Examples
    --------
    >>> trettel_larsson_velocity([5.0, 10.0], [5.0, 9.0], 1.0, 1.0)
    array([5., 9.])
    """
    relation("compressible", "trettel_larsson_velocity").use()
    p = _profile(
        y_plus=(y_plus, NONNEGATIVE),
        u_plus=(u_plus, NONNEGATIVE),
        density_ratio=(density_ratio, POSITIVE),
        dynamic_viscosity_ratio=(dynamic_viscosity_ratio, POSITIVE),
    )
    run = _rising("y_plus", p["y_plus"])
    stretch = _slope(np.diff(_semi_local(p), axis=-1), run)
    weight = _middle(p["dynamic_viscosity_ratio"]) * stretch
    return np.asarray(np.cumsum(weight * np.diff(p["u_plus"], axis=-1), axis=-1))


def total_stress_velocity(
    y_plus: FloatLike,
    u_plus: FloatLike,
    density_ratio: FloatLike,
    dynamic_viscosity_ratio: FloatLike,
    total_stress: FloatLike = 1.0,
) -> Floats:
    """Velocity transformed by Griffin, Fu and Moin; plotted against the semi-local distance.

    Parameters
    ----------
    y_plus, u_plus : array_like
        Profile in wall units from the wall [1], from 0, last axis along the profile.
    density_ratio, dynamic_viscosity_ratio : array_like
        rho/rho_w and mu/mu_w at the same points [1], positive.
    total_stress : array_like, optional
        Viscous plus turbulent shear stress over the wall's [1], 0 to 1.5; 1 near the wall.

    Returns
    -------
    ndarray
        U_t [1], of the broadcast shape.

    Raises
    ------
    InputError
        If a value is outside its interval, the shapes do not fit, y+ or y* does not increase, or
        the stress balance has no solution.

    Notes
    -----
    Integral over y* of S_t = tau S_eq/(tau + S_eq - S_TL) with S_eq = (dU+/dy*)/(mu/mu_w) and
    S_TL = (mu/mu_w) dU+/dy+.

    References
    ----------
    griffin-fu-moin-2021

    Examples
    --------
    >>> total_stress_velocity([5.0, 10.0], [5.0, 9.0], 1.0, 1.0)
    array([5., 9.])
    """
    relation("compressible", "total_stress_velocity").use()
    p = _profile(
        y_plus=(y_plus, NONNEGATIVE),
        u_plus=(u_plus, NONNEGATIVE),
        density_ratio=(density_ratio, POSITIVE),
        dynamic_viscosity_ratio=(dynamic_viscosity_ratio, POSITIVE),
        total_stress=(total_stress, _UNIT),
    )
    run = _rising("y_plus", p["y_plus"])
    star = _rising("y_star", _semi_local(p))
    rise, mu = np.diff(p["u_plus"], axis=-1), _middle(p["dynamic_viscosity_ratio"])
    equilibrium, viscous = _slope(rise, star) / mu, _slope(rise, run) * mu
    tau = _middle(p["total_stress"])
    balance = tau + equilibrium - viscous
    if (balance <= 0.0).any():
        raise InputError("total_stress", f"{tau.min():g}", "a stress above its viscous part")
    return np.asarray(np.cumsum(tau * equilibrium / balance * star, axis=-1))
