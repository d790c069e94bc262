"""Wall functions: what a log law makes of the first cell.

Kinematic quantities throughout: the stress is tau_w/rho [m2/s2]. The log law is
u+ = ln(y+)/kappa + B = ln(E y+)/kappa; its intercept is given as ``B`` or as ``E``.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    FINITE,
    INTERCEPT,
    KAPPA,
    FloatLike,
    Floats,
    Shape,
)
from walllaw.errors import InputError, unknown_name
from walllaw.lambert import wright_omega, wright_omega_lower
from walllaw.near_wall_omega import blend, omega_blended, omega_log, omega_viscous, omega_wall
from walllaw.relation import relation

__all__ = [
    "FirstCell",
    "blend",
    "friction_velocity",
    "from_k",
    "from_velocity",
    "intersection",
    "omega_blended",
    "omega_log",
    "omega_viscous",
    "omega_wall",
]

Flags = NDArray[np.bool_]
_SUBLAYERS = ("two-layer", "scalable")


@dataclass(frozen=True, slots=True)
class FirstCell:
    """Wall-function values of the first cell; floats for one cell, arrays for many.

    Attributes
    ----------
    friction_velocity : float or ndarray
        sqrt(tau_w/rho) [m/s].
    wall_stress : float or ndarray
        tau_w/rho [m2/s2].
    y_plus : float or ndarray
        Distance of the unknown in the wall units of the form used: y u_tau/nu, or
        y* = y C_mu^(1/4) sqrt(k)/nu [1]. Not limited, whatever the treatment of the sublayer.
    k : float or ndarray
        Turbulence kinetic energy: as given, or its equilibrium value [m2/s2].
    production : float or ndarray
        Production of k [m2/s3].
    epsilon : float or ndarray
        Dissipation rate [m2/s3].
    omega : float or ndarray
        Specific dissipation rate epsilon/(C_mu k) [1/s].
    nu_t : float or ndarray
        Eddy viscosity at the unknown [m2/s].
    wall_viscosity : float or ndarray
        Total viscosity at the wall face with which (nu_w U/y) returns the wall stress [m2/s].
    log_layer : bool or ndarray
        Whether the unknown lies above the crossing of the viscous and the log law.
    """

    friction_velocity: Any
    wall_stress: Any
    y_plus: Any
    k: Any
    production: Any
    epsilon: Any
    omega: Any
    nu_t: Any
    wall_viscosity: Any
    log_layer: Any


def intersection(
    kappa: FloatLike = 0.41, B: FloatLike | None = None, E: FloatLike | None = None
) -> Any:
    """Return the y+ at which the viscous and the log law cross.

    Parameters
    ----------
    kappa : float or array, optional
        von Karman constant [1].
    B, E : float or array, optional
        Intercept of the log law or its factor exp(kappa B) [1]: one of the two; B = 5 by default.

    Returns
    -------
    float or ndarray
        The larger of the two roots of y+ = ln(E y+)/kappa [1].

    Raises
    ------
    InputError
        If both B and E are given, or the laws do not cross (E below e kappa).

    Notes
    -----
    y+ = -W_-1(-kappa/E)/kappa, in the logarithmic form of :mod:`walllaw.lambert`; within 3 ulp of
    50 digits for the pairs in use.

    References
    ----------
    launder-spalding-1974

    Examples
    --------
    >>> round(intersection(0.4187, E=9.793), 10)
    11.224708076
    """
    c = relation("wall_function", "intersection")
    shape, flat = arrays.columns(**_log_law(kappa, B, E))
    c.use(kappa=flat[0])
    return shape(_crossing(flat[0], _ln_E(*flat, factor=E is not None)))


def friction_velocity(
    velocity: FloatLike,
    distance: FloatLike,
    kinematic_viscosity: FloatLike,
    *,
    kappa: FloatLike = 0.41,
    B: FloatLike | None = None,
    E: FloatLike | None = None,
) -> Any:
    """Return the friction velocity of the log law, of the viscous law below their crossing.

    Parameters
    ----------
    velocity : float or array
        Velocity along the wall at the first unknown [m/s].
    distance : float or array
        Its distance from the wall [m].
    kinematic_viscosity : float or array
        Kinematic viscosity [m2/s].
    kappa, B, E : float or array, optional
        Log law as in :func:`intersection` [1].

    Returns
    -------
    float or ndarray
        Friction velocity [m/s]; 0 for velocity 0.

    Warns
    -----
    RangeWarning
        If y+ is outside 30 to 300, the usual window of a log-law wall function.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    u_tau = kappa U/W_0(kappa E U y/nu), exactly and without overflow; sqrt(nu U/y) where
    U y/nu is below the square of the crossing.

    References
    ----------
    launder-spalding-1974

    Examples
    --------
    >>> round(friction_velocity(8.0, 1e-3, 1.5e-5, kappa=0.4187, E=9.793), 14)
    0.56647567489899
    """
    c = relation("wall_function", "friction_velocity")
    shape, (u, y, nu, *law) = arrays.columns(
        velocity=(velocity, AMOUNT_OR_ZERO),
        distance=(distance, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
        **_log_law(kappa, B, E),
    )
    u_tau, _ = _log_or_viscous(u, y, nu, law[0], _ln_E(*law, factor=E is not None))
    c.use(y_plus=y * u_tau / nu)
    return shape(u_tau)


def from_velocity(
    velocity: FloatLike,
    distance: FloatLike,
    kinematic_viscosity: FloatLike,
    *,
    kappa: FloatLike = 0.41,
    B: FloatLike | None = None,
    E: FloatLike | None = None,
    C_mu: FloatLike = 0.09,
) -> FirstCell:
    """Return the first cell of a wall function that takes its scale from the velocity.

    Parameters
    ----------
    velocity : float or array
        Velocity along the wall at the first unknown, above 0 [m/s].
    distance : float or array
        Its distance from the wall [m].
    kinematic_viscosity : float or array
        Kinematic viscosity [m2/s].
    kappa, B, E : float or array, optional
        Log law as in :func:`intersection` [1].
    C_mu : float or array, optional
        Eddy-viscosity coefficient of the closure [1].

    Returns
    -------
    FirstCell
        With k at its equilibrium value u_tau^2/sqrt(C_mu).

    Warns
    -----
    RangeWarning
        If y+ is outside 30 to 300.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    u_tau as in :func:`friction_velocity`; fails at separation, where it goes to zero. Below the
    crossing: no production, epsilon = 2 nu k/y^2, no eddy viscosity.

    References
    ----------
    launder-spalding-1974

    Examples
    --------
    >>> cell = from_velocity(8.0, 1e-3, 1.5e-5, kappa=0.4187, E=9.793)
    >>> round(cell.wall_stress, 6), round(cell.y_plus, 4)
    (0.320895, 37.765)
    """
    c = relation("wall_function", "friction_velocity")
    shape, (u, y, nu, cmu, *law) = arrays.columns(
        velocity=(velocity, AMOUNT),
        distance=(distance, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
        C_mu=(C_mu, AMOUNT),
        **_log_law(kappa, B, E),
    )
    kap, ln_E = law[0], _ln_E(*law, factor=E is not None)
    u_tau, above = _log_or_viscous(u, y, nu, kap, ln_E)
    y_star = y * u_tau / nu
    c.use(y_plus=y_star)
    u_plus = np.where(above, u / u_tau, y_star)
    k = u_tau * u_tau / np.sqrt(cmu)
    return _cell(shape, _Cell(y, nu, cmu, kap, k, u_tau, y_star, u_plus, y), u, above, above)


def from_k(
    velocity: FloatLike,
    k: FloatLike,
    distance: FloatLike,
    kinematic_viscosity: FloatLike,
    *,
    kappa: FloatLike = 0.41,
    B: FloatLike | None = None,
    E: FloatLike | None = None,
    C_mu: FloatLike = 0.09,
    sublayer: str = "two-layer",
) -> FirstCell:
    """Return the first cell of a wall function that takes its velocity scale from k.

    Parameters
    ----------
    velocity : float or array
        Velocity along the wall at the first unknown [m/s]; may be 0 (separation).
    k : float or array
        Turbulence kinetic energy there, above 0 [m2/s2].
    distance : float or array
        Its distance from the wall [m].
    kinematic_viscosity : float or array
        Kinematic viscosity [m2/s].
    kappa, B, E : float or array, optional
        Log law as in :func:`intersection` [1].
    C_mu : float or array, optional
        Eddy-viscosity coefficient of the closure [1].
    sublayer : str, optional
        What happens below the crossing of the laws: ``two-layer`` (viscous law, no production,
        epsilon = 2 nu k/y^2) or ``scalable`` (y* never below the crossing, log law always).

    Returns
    -------
    FirstCell

    Warns
    -----
    RangeWarning
        If y* is outside 30 to 300.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    tau_w/rho = kappa U u_k/ln(E y*) with u_k = C_mu^(1/4) sqrt(k), y* = y u_k/nu. Equal to
    :func:`from_velocity` only where k = u_tau^2/sqrt(C_mu).

    References
    ----------
    launder-spalding-1974, grotjans-menter-1998

    Examples
    --------
    >>> cell = from_k(8.0, 0.75, 1e-3, 1.5e-5, kappa=0.4187, E=9.793)
    >>> round(cell.y_plus, 3), round(cell.wall_stress, 6)
    (31.623, 0.277019)
    """
    if sublayer not in _SUBLAYERS:
        raise unknown_name("sublayer", sublayer, _SUBLAYERS)
    c = relation("wall_function", "launder_spalding")
    shape, (u, k_p, y, nu, cmu, *law) = arrays.columns(
        velocity=(velocity, AMOUNT_OR_ZERO),
        k=(k, AMOUNT),
        distance=(distance, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
        C_mu=(C_mu, AMOUNT),
        **_log_law(kappa, B, E),
    )
    kap, ln_E = law[0], _ln_E(*law, factor=E is not None)
    u_k = np.sqrt(np.sqrt(cmu) * k_p)
    y_star = _finite("distance", y * (u_k / nu))
    c.use(y_plus=y_star)
    crossing = _crossing(kap, ln_E)
    above = y_star > crossing
    limited = np.maximum(y_star, crossing)
    u_plus = (np.log(limited) + ln_E) / kap
    if sublayer == "scalable":
        relation("wall_function", "scalable").use(y_plus=y_star)
        log_distance = np.where(above, y, crossing * nu / u_k)
        cell = _Cell(y, nu, cmu, kap, k_p, u_k, y_star, u_plus, log_distance)
        return _cell(shape, cell, u, above, np.ones_like(above))
    u_plus = np.where(above, u_plus, y_star)
    return _cell(shape, _Cell(y, nu, cmu, kap, k_p, u_k, y_star, u_plus, y), u, above, above)


@dataclass(frozen=True, slots=True)
class _Cell:
    """What both forms hand on, flat; ``log_distance`` is the distance the log law sees."""

    distance: Floats
    nu: Floats
    C_mu: Floats
    kappa: Floats
    k: Floats
    scale: Floats
    y_star: Floats
    u_plus: Floats
    log_distance: Floats


def _cell(shape: Shape, c: _Cell, velocity: Floats, above: Flags, by_log: Flags) -> FirstCell:
    """Evaluate the cell values, by the log layer where asked and by the sublayer elsewhere."""
    relation("wall_function", "cell_values").use(y_plus=c.y_star)
    if not by_log.all():
        relation("wall_function", "sublayer_values").use(y_plus=c.y_star)
    with np.errstate(over="ignore"):
        stress = velocity * (c.scale / c.u_plus)
        ky = c.kappa * c.log_distance
        production = np.where(by_log, stress * (stress / c.scale) / ky, 0.0)
        log_epsilon = c.scale * c.scale * (c.scale / ky)
        viscous_epsilon = 2.0 * (c.nu / c.distance) * (c.k / c.distance)
        epsilon = np.where(by_log, log_epsilon, viscous_epsilon)
        values = {
            "friction_velocity": np.sqrt(stress),
            "wall_stress": stress,
            "y_plus": c.y_star,
            "k": c.k,
            "production": production,
            "epsilon": epsilon,
            "omega": epsilon / (c.C_mu * c.k),
            "nu_t": np.where(by_log, ky * c.scale, 0.0),
            "wall_viscosity": c.distance * (c.scale / c.u_plus),
        }
    for name, flat in values.items():
        _finite(name, flat)
    flag = np.broadcast_to(above, shape.size).reshape(shape.dims)
    return FirstCell(
        **{name: shape(flat) for name, flat in values.items()},
        log_layer=bool(flag) if shape.dims == () else flag,
    )


def _finite(name: str, values: Floats) -> Floats:
    """Return the values, or refuse them when one has left the range of doubles."""
    if not arrays.within(values, FINITE):
        raise InputError(name, "", "", "the result is beyond double precision")
    return values


def _log_law(kappa: FloatLike, B: FloatLike | None, E: FloatLike | None) -> dict[str, Any]:
    """Return kappa and the intercept as arguments to check; the intercept is B or E."""
    if B is not None and E is not None:
        raise InputError("E", "both B and E", "one of them, E = exp(kappa B)")
    if E is not None:
        return {"kappa": (kappa, KAPPA), "E": (E, AMOUNT)}
    return {"kappa": (kappa, KAPPA), "B": (5.0 if B is None else B, INTERCEPT)}


def _ln_E(kappa: Floats, intercept: Floats, *, factor: bool) -> Floats:
    return np.log(intercept) if factor else kappa * intercept


def _crossing(kappa: Floats, ln_E: Floats) -> Floats:
    s = ln_E - np.log(kappa)
    if (s < 1.0).any():
        factor = float(np.exp(s[s < 1.0])[0])
        raise InputError(
            "E", f"E/kappa = {factor:.6g}", "E of at least e kappa: the laws must cross"
        )
    return wright_omega_lower(s) / kappa


def _log_or_viscous(
    u: Floats, y: Floats, nu: Floats, kappa: Floats, ln_E: Floats
) -> tuple[Floats, Flags]:
    """Return the friction velocity, and where it comes from the log law."""
    crossing = _crossing(kappa, ln_E)
    with np.errstate(over="ignore"):
        re_y = _finite("velocity", u * (y / nu))
    edge = crossing * crossing
    above = re_y > edge
    z = np.log(kappa * np.maximum(re_y, edge)) + ln_E
    return np.where(above, kappa * u / wright_omega(z), np.sqrt(u * (nu / y))), above
