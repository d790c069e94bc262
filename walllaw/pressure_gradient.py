"""The law of the wall under a pressure gradient: total stress tau/tau_w = 1 + p+ y+.

``pressure_gradient_plus`` is p+ = (dp/dx) nu/(rho u_tau^3), positive where the pressure rises
(adverse). The stress varies linearly near the wall, where inertia is small; the mixing length is
that of the flow without gradient. Nothing here describes separated flow: where no positive wall
stress fits, the functions say so.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import AMOUNT, INTERCEPT, KAPPA, SIGNED, FloatLike, Floats, Interval
from walllaw.errors import InputError, unknown_name
from walllaw.laws import VanDriest
from walllaw.log_layer import LogLaw
from walllaw.panels import gauss
from walllaw.relation import relation
from walllaw.start_table import safe_root

__all__ = ["LAWS", "friction_velocity", "log_law", "van_driest"]

LAWS = ("van-driest", "cebeci", "log")
_Y_PLUS = Interval(1e-30, 1e12)
_A_PLUS = Interval(1.0, 200.0)
# panels in ln(1 + y+/15): as for developed flow, the last of them to y+ = 1e12
_STRETCH = 15.0
_EDGES = np.array(
    [0.0, 0.2, 0.4, 0.6, 0.9, 1.3, 1.9, 2.7, 3.9, 5.4, 7.4, 9.9, 12.9, 16.5, 21.0, 25.0]
)
_NODES = 20
_SCAN, _STEPS = 43, 16  # places at which the root is looked for, steps of the bracketed scheme
_CASES = 64  # in a block; each has 300 nodes
_LOG_FROM = 5.0  # lowest y+ at which the log law, which has no wall, is solved


def _no_reversal(y: Floats, p: Floats) -> None:
    """Refuse a stress that changes sign below y+."""
    if np.any(p * y < -1.0):
        worst = float((p * y).min())
        raise InputError(
            "pressure_gradient_plus",
            f"p+ y+ = {worst:.4g}",
            "p+ y+ of at least -1 (stress above 0)",
        )


def _log(y: Floats, product: Floats, kappa: Floats, b: Floats) -> Floats:
    """Return u+ of the log law for p+ y+; both corrections without cancellation."""
    s = np.sqrt(1.0 + product)
    rise = product / (1.0 + s)  # s - 1
    return np.asarray((np.log(y) + 2.0 * rise - 2.0 * np.log1p(0.5 * rise)) / kappa + b)


def log_law(
    y_plus: FloatLike,
    pressure_gradient_plus: FloatLike,
    kappa: FloatLike = 0.41,
    B: FloatLike = 5.0,
) -> Any:
    """Return u+ of the log law under a pressure gradient.

    Parameters
    ----------
    y_plus : float or array
        Distance in wall units, above 0 [1]; meant above 30.
    pressure_gradient_plus : float or array
        p+ [1], positive for rising pressure; p+ y+ of at least -1.
    kappa, B : float or array, optional
        Log law without gradient [1].

    Returns
    -------
    float or ndarray
        u+ [1].

    Warns
    -----
    RangeWarning
        Outside y+ 30 to 1e12.

    Raises
    ------
    InputError
        If an argument cannot be used, or the stress changes sign below y+.

    Notes
    -----
    The integral of sqrt(1 + p+ y+)/(kappa y+): with s = sqrt(1 + p+ y+),
    [ln(y+) + 2 (s - 1) - 2 ln((s + 1)/2)]/kappa + B. Far out it is the half-power law of a layer
    about to separate.

    References
    ----------
    townsend-1961, mcdonald-1969, stratford-1959

    Examples
    --------
    >>> round(log_law(100.0, 0.01), 6), round(log_law(100.0, 0.0), 6)
    (17.334499, 16.232122)
    """
    r = relation("laws", "pressure_gradient_log")
    shape, (y, p, k, b) = arrays.columns(
        y_plus=(y_plus, _Y_PLUS),
        pressure_gradient_plus=(pressure_gradient_plus, SIGNED),
        kappa=(kappa, KAPPA),
        B=(B, INTERCEPT),
    )
    _no_reversal(y, p)
    r.use(y_plus=y)
    return shape(_log(y, p * y, k, b))


def _integral(y: Floats, p: Floats, kappa: Floats, damping: Floats) -> Floats:
    """Return u+ by panels that crowd towards the far end, where a falling stress may vanish."""
    x, w = gauss(_NODES)
    share, weight = x * (2.0 - x), w * 2.0 * (1.0 - x)
    # panels shrink with the sublayer
    stretch = _STRETCH / np.maximum(26.0 * damping, 1.0)
    top = np.log1p(y / stretch)[:, np.newaxis]
    edges = np.minimum(_EDGES, top)
    edges[:, -1:] = top
    width = (edges[:, 1:] - edges[:, :-1])[:, :, np.newaxis]
    p, kappa, damping, stretch = (
        arrays.spread(v, y.size)[:, np.newaxis, np.newaxis] for v in (p, kappa, damping, stretch)
    )
    at = stretch * np.expm1(edges[:, :-1, np.newaxis] + width * share)
    length = kappa * at * -np.expm1(-at * damping)
    tau = np.maximum(1.0 + p * at, 0.0)
    slope = 2.0 * tau / (1.0 + np.sqrt(1.0 + 4.0 * length * length * tau))
    parts = width * weight * (slope * (at + stretch))
    return np.asarray(parts.reshape(y.size, -1).sum(axis=1))


def _damping(p: Floats, a: Floats, law: str) -> Floats:
    """Return 1/A+ with the published dependence on the gradient, if wanted."""
    if law != "cebeci":
        return 1.0 / a + 0.0 * p
    factor = relation("mixing_length", "cebeci_damping")["factor"]
    return np.sqrt(np.maximum(1.0 + factor * p, 0.0)) / a


def _blocks(kernel: Callable[..., Floats], *columns: Floats) -> Floats:
    size = max(c.size for c in columns)
    full = [arrays.spread(c, size) for c in columns]
    parts = [kernel(*(c[i : i + _CASES] for c in full)) for i in range(0, max(size, 1), _CASES)]
    return np.concatenate(parts)


def van_driest(
    y_plus: FloatLike,
    pressure_gradient_plus: FloatLike,
    kappa: FloatLike = 0.41,
    A_plus: FloatLike = 26.0,
    damping: str = "van-driest",
) -> Any:
    """Return u+ of van Driest's mixing length under a pressure gradient, from the wall on.

    Parameters
    ----------
    y_plus : float or array
        Distance in wall units, 1e-30 to 1e12 [1].
    pressure_gradient_plus : float or array
        p+ [1], positive for rising pressure; p+ y+ of at least -1.
    kappa, A_plus : float or array, optional
        Constants of the length [1].
    damping : str, optional
        ``van-driest`` (A+ as it is) or ``cebeci`` (A+ over sqrt(1 + 11.8 p+)).

    Returns
    -------
    float or ndarray
        u+ [1].

    Raises
    ------
    InputError
        If an argument cannot be used, or the stress changes sign below y+.

    Notes
    -----
    dU+/dy+ = 2 tau+/(1 + sqrt(1 + 4 l+^2 tau+)), tau+ = 1 + p+ y+, by Gauss-Legendre panels: within
    1e-13 of adaptive quadrature, within 1e-10 where the stress has just fallen to nothing.

    References
    ----------
    van-driest-1956, cebeci-smith-1974

    Examples
    --------
    >>> round(van_driest(100.0, 0.01), 6), round(van_driest(100.0, 0.0), 6)
    (18.14999, 16.527843)
    """
    if damping not in LAWS[:2]:
        raise unknown_name("damping", damping, LAWS[:2])
    shape, (y, p, k, a) = arrays.columns(
        y_plus=(y_plus, _Y_PLUS),
        pressure_gradient_plus=(pressure_gradient_plus, SIGNED),
        kappa=(kappa, Interval(0.2, 1.0)),
        A_plus=(A_plus, _A_PLUS),
    )
    _no_reversal(y, p)
    relation("laws", "pressure_gradient_van_driest").use(y_plus=y)
    return shape(_blocks(_integral, y, p, k, _damping(p, a, damping)))


def friction_velocity(
    velocity: FloatLike,
    distance: FloatLike,
    kinematic_viscosity: FloatLike,
    kinematic_pressure_gradient: FloatLike,
    law: str = "van-driest",
    kappa: float = 0.41,
    B: float = 5.0,
    A_plus: float = 26.0,
) -> Any:
    """Return the friction velocity that fits a velocity at a distance under a pressure gradient.

    Parameters
    ----------
    velocity : float or array
        Along the wall, in the direction in which the gradient is taken, above 0 [m/s].
    distance : float or array
        From the wall [m].
    kinematic_viscosity : float or array
        [m2/s].
    kinematic_pressure_gradient : float or array
        (dp/dx)/rho [m/s2]; positive where the pressure rises along the velocity.
    law : str, optional
        ``van-driest``, ``cebeci`` (both from the wall on) or ``log`` (y+ of at least 5).
    kappa, B, A_plus : float, optional
        Constants [1]; B for ``log``, A_plus for the others.

    Returns
    -------
    float or ndarray
        u_tau [m/s].

    Raises
    ------
    InputError
        If an argument cannot be used, or no positive wall stress fits: the flow would be separated
        there, or (rising stress towards the wall) driven faster than the velocity allows.

    Notes
    -----
    With K = (dp/dx) y^3/(rho nu^2), p+ y+ = K/y+^2, and u+(y+, K) y+ = U y/nu is solved for the
    largest ln y+ by a scan and Newton steps inside a bracket. The constant A+ of ``van-driest``
    damps too much where the gradient rules (p+ above 0.05 or so); ``cebeci`` follows it.

    References
    ----------
    townsend-1961, mcdonald-1969, van-driest-1956, cebeci-smith-1974

    Examples
    --------
    >>> round(friction_velocity(8.0, 1e-3, 1.5e-5, 0.0), 6)
    0.573135
    >>> round(friction_velocity(8.0, 1e-3, 1.5e-5, 300.0), 6)
    0.488297
    """
    if law not in LAWS:
        raise unknown_name("law", law, LAWS)
    shape, (u, y, nu, g) = arrays.columns(
        velocity=(velocity, AMOUNT),
        distance=(distance, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
        kinematic_pressure_gradient=(kinematic_pressure_gradient, SIGNED),
    )
    k = arrays.check("kappa", kappa, Interval(0.2, 1.0)).reshape(1)
    b = arrays.check("B", B, INTERCEPT).reshape(1)
    a = arrays.check("A_plus", A_plus, _A_PLUS).reshape(1)
    re = arrays.check("velocity*distance/kinematic_viscosity", u * (y / nu), Interval(1e-12, 1e12))
    drive = g * (y / nu) * (y / nu) * y

    def solve(re: Floats, drive: Floats) -> Floats:
        return _solve(re, drive, law, k, b, a)

    y_plus = _blocks(solve, re, drive)
    lost = np.isnan(y_plus)
    if lost.any():
        place = int(np.argmax(lost))
        given = (
            f"U y/nu = {float(arrays.spread(re, lost.size)[place]):.4g} with (dp/dx) y^3/(rho nu^2)"
        )
        raise InputError(
            "kinematic_pressure_gradient",
            f"{given} = {float(arrays.spread(drive, lost.size)[place]):.4g} at index {place}"
            f" ({int(lost.sum())} of {lost.size} values)",
            "a gradient with which some wall stress above 0 fits the velocity",
        )
    name = "pressure_gradient_log" if law == "log" else "pressure_gradient_van_driest"
    relation("laws", name).use(y_plus=y_plus)
    return shape(y_plus * (nu / y))


def _solve(re: Floats, drive: Floats, law: str, k: Floats, b: Floats, a: Floats) -> Floats:
    """Return y+, or NaN where no positive wall stress fits.

    u+ y+ need not rise all the way: where A+ thickens with the falling friction, or where the log
    law is used close to its zero, a second root far below has no meaning. The largest is taken.
    """

    def moment(t: Floats) -> Floats:
        """Return u+ y+ at ln y+ = t."""
        y = np.exp(t)
        product = np.maximum(drive / (y * y), -1.0)
        if law == "log":
            return y * _log(y, product, k, b)
        p = product / y
        return y * _integral(y, p, k + 0.0 * y, _damping(p, a, law))

    def residual(t: Floats) -> tuple[Floats, Floats]:
        here, h = moment(t), 1e-6
        return here / re - 1.0, (moment(t + h) - here) / (h * re)

    smooth = (
        LogLaw(float(k[0]), float(b[0])) if law == "log" else VanDriest(float(k[0]), float(a[0]))
    )
    without = np.log(re / smooth.u_plus_of_re_y(re))
    # below the first the stress would change its sign, below the second the log law has no meaning,
    # and friction a thousand times below that without gradient is none
    least = np.maximum(0.5 * np.log(np.maximum(-drive, 1e-300)), without - 7.0)
    if law == "log":
        least = np.maximum(least, np.log(_LOG_FROM))
    top = np.maximum(without, least) + 1.5
    low, high, found = least, top, np.zeros(re.size, dtype=np.bool_)
    for share in np.linspace(1.0, 0.0, _SCAN):
        t = least + share * (top - least)
        below = moment(t) <= re
        low, high = np.where(below & ~found, t, low), np.where(~below & ~found, t, high)
        found = found | below
    return np.where(
        found, np.exp(safe_root(residual, low, high, 0.5 * (low + high), _STEPS)), np.nan
    )
