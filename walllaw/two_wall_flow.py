"""Developed flow between two unlike walls, by mixing length: annulus, Couette-Poiseuille.

Each wall has its own friction velocity and its own layer; the layers meet where the stress is zero
or, if it never is, half way. The velocity there must be the same from both sides.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike, Floats, Interval
from walllaw.errors import InputError
from walllaw.flow_quadrature import Grid, grid, in_blocks, running, total
from walllaw.mixing_lengths import MixingLength, MixingModel, constants
from walllaw.roots import secant


@dataclass(frozen=True, slots=True, eq=False)
class AnnulusFlow:
    """Developed flow in a concentric annulus; floats for one case, arrays over the cases.

    Attributes
    ----------
    reynolds : float or ndarray
        U_b D_h/nu with D_h twice the gap [1].
    re_tau : float or ndarray
        Friction velocity of the mean wall stress times half the gap over nu [1].
    bulk_u_plus : float or ndarray
        U_b over that friction velocity [1].
    zero_stress_radius : float or ndarray
        Where the stress is zero, over the outer radius [1].
    stress_ratio : float or ndarray
        Wall stress at the core over that at the shell [1].
    peak_ratio : float or ndarray
        Largest velocity over U_b [1].
    """

    radius_ratio: Any
    reynolds: Any
    re_tau: Any
    bulk_u_plus: Any
    zero_stress_radius: Any
    stress_ratio: Any
    peak_ratio: Any

    @property
    def darcy_friction(self) -> Any:
        """Darcy friction factor 8/U_b+^2 [1], on the hydraulic diameter."""
        return 8.0 / (self.bulk_u_plus * self.bulk_u_plus)


def _wide(values: Floats) -> Floats:
    return values[:, np.newaxis, np.newaxis]


@dataclass(frozen=True, slots=True)
class _Side:
    """One wall's layer in an annulus: r_w the wall, r_m the end, over the outer radius."""

    grid: Grid
    slope: Floats
    re: Floats  # friction velocity of this wall times the layer's thickness over nu
    thickness: Floats
    sum: Floats  # r_m + r at the nodes

    @property
    def peak(self) -> Floats:
        return self.re * total(self.grid.width * self.slope)

    @property
    def flow(self) -> Floats:
        """Integral of |dU+/dr| |r_m^2 - r^2|/2 dr: this side's part of U_b A/(2 pi), wall units."""
        weight = self.grid.rest * self.sum * 0.5 * self.grid.width
        return self.re * self.thickness * total(weight * self.slope)


def _side(model: MixingModel, wall: Floats, end: Floats, re: Floats) -> _Side:
    nodes = grid(re, model.split)
    radius = _wide(wall) + _wide(end - wall) * nodes.eta
    both = _wide(end) + radius
    # tau/tau_w = (r_m^2 - r^2) r_w/((r_m^2 - r_w^2) r), with r_m - r = rest (r_m - r_w)
    tau = nodes.rest * both * _wide(wall / (end + wall)) / radius
    thickness = np.abs(end - wall)
    p_plus = 2.0 * wall / ((end + wall) * re)
    slope, _ = model.gradient(nodes, re, np.zeros_like(re), tau, p_plus)
    return _Side(nodes, slope, re, thickness, both)


def _sides(
    model: MixingModel, ratio: Floats, end: Floats, re_tau: Floats
) -> tuple[_Side, _Side, Floats, Floats]:
    """Return both layers and their friction velocities over that of the mean wall stress."""
    # force balance: G D_h/4 is the mean stress; a wall's own is (G/2) |r_m^2 - r_w^2|/r_w
    gap = 1.0 - ratio
    inner = np.sqrt((end - ratio) * (end + ratio) / (ratio * gap))
    outer = np.sqrt((1.0 - end) * (1.0 + end) / gap)
    scale = re_tau / (0.5 * gap)  # mean friction velocity times the outer radius over nu
    return (
        _side(model, ratio, end, scale * inner * (end - ratio)),
        _side(model, np.ones_like(end), end, scale * outer * (1.0 - end)),
        inner,
        outer,
    )


def _zero_stress(model: MixingModel, ratio: Floats, re_tau: Floats) -> Floats:
    """Return the radius at which both layers reach the same velocity: secant in a logit."""

    def radius(q: Floats) -> Floats:
        share = 1.0 / (1.0 + np.exp(-q))
        return ratio + (1.0 - ratio) * share

    def miss(q: Floats) -> Floats:
        core, shell, inner, outer = _sides(model, ratio, radius(q), re_tau)
        return np.log(core.peak * inner / (shell.peak * outer))

    # start: measured zero-stress radii follow (r_m - r_i)/(r_o - r_m) = ratio^0.343
    return radius(secant(miss, 0.343 * np.log(ratio)))


def _annulus(model: MixingModel, ratio: Floats, re_tau: Floats) -> tuple[Floats, ...]:
    """Return U_b+, radius of zero stress, stress ratio, peak over U_b."""
    end = _zero_stress(model, ratio, re_tau)
    core, shell, inner, outer = _sides(model, ratio, end, re_tau)
    area = 0.5 * (1.0 - ratio) * (1.0 + ratio)
    bulk = (core.flow * inner + shell.flow * outer) / area
    square = inner / outer
    return bulk, end, square * square, shell.peak * outer / bulk


def _reynolds_solve(model: MixingModel, ratio: Floats, reynolds: Floats) -> Floats:
    def miss(x: Floats) -> Floats:
        re_tau = np.exp(x)
        return np.log(4.0 * re_tau * _annulus(model, ratio, re_tau)[0] / reynolds)

    start = np.maximum(np.sqrt(0.75 * reynolds), 0.05 * np.power(reynolds, 0.875))
    return np.exp(secant(miss, np.log(start)))


def annulus_flow(
    radius_ratio: FloatLike,
    *,
    reynolds: FloatLike | None = None,
    re_tau: FloatLike | None = None,
    mixing_length: MixingLength = "cess",
    kappa: float | None = None,
    A_plus: float | None = None,
    damping: str = "van-driest",
) -> AnnulusFlow:
    """Solve developed flow in a smooth concentric annulus with a mixing length.

    Parameters
    ----------
    radius_ratio : float or array
        Inner over outer radius [1], 0.01 to 0.999.
    reynolds, re_tau : float or array
        One of the two [1], see :class:`AnnulusFlow`; re_tau 0.1 to 1e9.
    mixing_length, kappa, A_plus, damping : optional
        As in :func:`walllaw.developed`; the length belongs to each layer's own thickness.

    Returns
    -------
    AnnulusFlow

    Warns
    -----
    RangeWarning
        Below Re = 8e3, where damped mixing lengths give too much friction.

    Raises
    ------
    InputError
        If not exactly one of reynolds and re_tau is given, or a value cannot be used.

    Notes
    -----
    tau(r) = (G/2)(r_m^2 - r^2)/r on both sides of r_m; r_m is where both sides have the same U.

    References
    ----------
    kays-leung-1963

    Examples
    --------
    >>> flow = annulus_flow(0.5, reynolds=1e5, kappa=0.421, A_plus=27.316)
    >>> f"{flow.zero_stress_radius:.5f} {flow.darcy_friction:.6f} {flow.stress_ratio:.4f}"
    '0.72079 0.018470 1.1220'
    """
    model = MixingModel(**constants(mixing_length, kappa, A_plus, damping=damping))
    if (reynolds is None) == (re_tau is None):
        raise InputError(
            "reynolds", "both or neither of reynolds and re_tau", "exactly one of them"
        )
    name, value, bounds = (
        ("re_tau", re_tau, Interval(0.1, 1e9))
        if reynolds is None
        else ("reynolds", reynolds, Interval(1.0, 1e11))
    )
    given = {"radius_ratio": (radius_ratio, Interval(0.01, 0.999)), name: (value, bounds)}
    shape, (ratio, first) = arrays.columns(**given)  # type: ignore[arg-type]
    size = shape.size
    ratio, first = arrays.spread(ratio, size), arrays.spread(first, size)

    def kernel(r: Floats, x: Floats) -> tuple[Floats, ...]:
        friction = _reynolds_solve(model, r, x) if re_tau is None else x
        return friction, *_annulus(model, r, friction)

    friction, bulk, end, stress, peak = in_blocks(kernel, ratio, first)
    re = 4.0 * friction * bulk
    model.use(re)
    return AnnulusFlow(*(shape(v) for v in (ratio, re, friction, bulk, end, stress, peak)))


@dataclass(frozen=True, slots=True, eq=False)
class CouettePoiseuilleFlow:
    """Developed flow between a wall at rest and a moving one, with a pressure gradient.

    Attributes
    ----------
    bulk_u_plus, wall_u_plus : float or ndarray
        Mean and moving wall's velocity over the friction velocity of the wall at rest [1].
    reynolds : float or ndarray
        4 h U_b/nu, h half the gap [1].
    pressure_gradient_plus : float or ndarray
        -(dp/dx) h/(rho u_tau^2) = (1 - stress_ratio)/2 [1].
    """

    re_tau: Any
    stress_ratio: Any
    bulk_u_plus: Any
    wall_u_plus: Any
    reynolds: Any
    pressure_gradient_plus: Any


def _plane_side(
    model: MixingModel, re: Floats, stress: Floats, p_plus: Floats
) -> tuple[Floats, Floats]:
    """Return U+ at the end of a layer, where tau is ``stress`` times the wall's, and its mean."""
    nodes = grid(re, model.split)
    tau = nodes.rest + nodes.eta * _wide(stress)
    slope, _ = model.gradient(nodes, re, np.zeros_like(re), tau, p_plus)
    end = re * total(nodes.width * slope)
    return end, re * total(nodes.width * running(slope, nodes))


def couette_poiseuille_flow(
    re_tau: FloatLike,
    stress_ratio: FloatLike,
    *,
    mixing_length: MixingLength = "linear",
    kappa: float | None = None,
    A_plus: float | None = None,
    damping: str = "van-driest",
) -> CouettePoiseuilleFlow:
    """Solve developed flow driven by a moving wall and a pressure gradient together.

    Parameters
    ----------
    re_tau : float or array
        Friction velocity of the wall at rest times half the gap over nu [1], 0.1 to 1e9.
    stress_ratio : float or array
        dU/dy nu + turbulent stress at the moving wall over that at the wall at rest [1]: -1 is
        Poiseuille flow (no wall moves), 1 is Couette flow (no pressure gradient). Not between
        -0.001 and 0.05: the damping supposes a wall that bears stress.
    mixing_length, kappa, A_plus, damping : optional
        As in :func:`walllaw.developed`. Layers end where the stress is zero, else half way; a
        length made for pipes does not suit the latter.

    Returns
    -------
    CouettePoiseuilleFlow

    Raises
    ------
    InputError
        If a value cannot be used.

    Notes
    -----
    tau/tau_w = 1 - (1 - stress_ratio) y/(2 h); everything follows without a root. The layers meet
    at different places on the two sides of ratio 0, where the result jumps.

    References
    ----------
    van-driest-1956

    Examples
    --------
    >>> flow = couette_poiseuille_flow(507.0, 1.0)
    >>> f"{flow.wall_u_plus / 2:.3f}"
    '20.474'
    """
    model = MixingModel(**constants(mixing_length, kappa, A_plus, damping=damping))
    ratio_range = Interval(-1.0, 1.0)
    shape, (re, ratio) = arrays.columns(
        re_tau=(re_tau, Interval(0.1, 1e9)), stress_ratio=(stress_ratio, ratio_range)
    )
    near = (ratio > -1e-3) & (ratio < 0.05)
    if near.any():
        raise InputError("stress_ratio", f"{ratio[near][0]:g}", "-1 to -0.001 or 0.05 to 1")
    size = shape.size
    re, ratio = arrays.spread(re, size), arrays.spread(ratio, size)
    bulk, wall = in_blocks(lambda r, s: _plane(model, r, s), re, ratio)
    reynolds = 4.0 * re * bulk
    model.use(reynolds)
    gradient = 0.5 * (1.0 - ratio)
    return CouettePoiseuilleFlow(*(shape(v) for v in (re, ratio, bulk, wall, reynolds, gradient)))


def _plane(model: MixingModel, re: Floats, ratio: Floats) -> tuple[Floats, Floats]:
    """Return U_b and the moving wall's velocity over u_tau of the wall at rest."""
    share = np.where(ratio < 0.0, 1.0 / (1.0 - np.minimum(ratio, 0.0)), 0.5)  # of the gap
    friction = np.sqrt(np.abs(ratio))  # of the moving wall
    middle = np.where(ratio < 0.0, 0.0, 0.5 * (1.0 + ratio))
    p_plus = 0.5 * (1.0 - ratio) / re
    end, mean = _plane_side(model, 2.0 * share * re, middle, p_plus)
    far = 2.0 * (1.0 - share) * re * friction
    end_2, mean_2 = _plane_side(
        model, far, middle / np.abs(ratio), p_plus * np.sign(-ratio) / friction**3
    )
    # seen from the moving wall the fluid falls behind (ratio > 0) or runs ahead
    sign = np.sign(ratio)
    wall = end + sign * friction * end_2
    bulk = share * mean + (1.0 - share) * (wall - sign * friction * mean_2)
    return bulk, wall
