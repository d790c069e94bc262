"""Developed flow between two unlike walls, by mixing length: annulus, Couette-Poiseuille.

Each wall has its own friction velocity and its own layer; the layers meet where the stress is zero
or, if it never is, half way. The velocity there must be the same from both sides. Both walls have
the same roughness; each layer is shifted by its own k_s+.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from walllaw import arrays
from walllaw.arrays import FloatLike, Floats, Interval, Shape
from walllaw.errors import InputError
from walllaw.flow_quadrature import Grid, grid, in_blocks, running, total
from walllaw.mixing_lengths import MixingLength, MixingModel, constants
from walllaw.roots import secant

_ROUGH = Interval(0.0, 0.05)


@dataclass(frozen=True, slots=True)
class _Layer:
    """One wall's part of the flow, in wall units of that wall."""

    grid: Grid
    stress: Floats  # over the wall's
    slope: Floats
    nu_t: Floats  # over nu
    re: Floats  # friction velocity of this wall times the layer's thickness over nu

    @property
    def velocity(self) -> Floats:
        """U+ at the nodes, from the wall on."""
        return _wide(self.re) * running(self.slope, self.grid)

    @property
    def peak(self) -> Floats:
        """U+ at the end of the layer."""
        return self.re * total(self.grid.width * self.slope)


def _layer(
    model: MixingModel, re: Floats, tau: Callable[[Grid], Floats], p_plus: Floats, ks: Floats
) -> _Layer:
    """Return a layer for a stress over its nodes; ``ks`` is over its thickness."""
    nodes = grid(re, model.split)
    shift = model.shift(ks * re) if np.any(ks > 0.0) else np.zeros_like(re)
    stress = tau(nodes)
    return _Layer(nodes, stress, *model.gradient(nodes, re, shift, stress, p_plus), re)


def _across(first: Floats, second: Floats) -> Floats:
    """Return values of two layers in one line from wall to wall: (cases, nodes of both)."""
    lines = [v.reshape(v.shape[0], -1) for v in (first, second)]
    return np.concatenate([lines[0], lines[1][:, ::-1]], axis=1)


class _TwoWalls:
    """What both flows share: the profile from wall to wall."""

    __slots__ = ()
    _shape: Shape
    _flat: tuple[Floats, ...]
    _model: MixingModel

    def _kernel(self, *columns: Floats) -> tuple[Floats, ...]:
        raise NotImplementedError

    def profiles(self) -> dict[str, NDArray[np.float64]]:
        """Return ``place``, ``velocity``, ``stress`` and ``nu_t`` from wall to wall.

        place: distance from the inner wall, or from the wall at rest, over the gap; velocity over
        the bulk velocity; stress over that at the first wall, signed as du/dy; nu_t over nu. Arrays
        of the case's shape with one more dimension.
        """
        found = in_blocks(self._kernel, *self._flat)
        names = ("place", "velocity", "stress", "nu_t")
        dims = self._shape.dims
        return {n: v.reshape(*dims, v.shape[-1]) for n, v in zip(names, found, strict=True)}


@dataclass(frozen=True, slots=True, eq=False)
class AnnulusFlow(_TwoWalls):
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
    _shape: Shape
    _flat: tuple[Floats, ...]
    _model: MixingModel

    @property
    def darcy_friction(self) -> Any:
        """Darcy friction factor 8/U_b+^2 [1], on the hydraulic diameter."""
        return 8.0 / (self.bulk_u_plus * self.bulk_u_plus)

    def _kernel(self, *columns: Floats) -> tuple[Floats, ...]:
        ratio, end, re_tau, bulk, ks = columns
        core, shell, inner, outer = _sides(self._model, ratio, end, re_tau, ks)
        share = (end - ratio) / (1.0 - ratio)
        place = _across(_wide(share) * core.grid.eta, 1.0 - _wide(1.0 - share) * shell.grid.eta)
        scale = [_wide(v / bulk) for v in (inner, outer)]
        velocity = _across(scale[0] * core.velocity, scale[1] * shell.velocity)
        square = _wide((outer / inner) ** 2)
        return (
            place,
            velocity,
            _across(core.stress, -square * shell.stress),
            _across(core.nu_t, shell.nu_t),
        )


def _wide(values: Floats) -> Floats:
    return values[:, np.newaxis, np.newaxis]


def _side(
    model: MixingModel, wall: Floats, end: Floats, re: Floats, ks: Floats
) -> tuple[_Layer, Floats]:
    """Return a layer of an annulus and its share of the flow; radii over the outer one.

    The share is that of U_b A/(2 pi): the integral of |dU+/dr| |r_m^2 - r^2|/2 dr in wall units.
    """
    thickness = np.abs(end - wall)

    def both(nodes: Grid) -> Floats:
        """Return r_m + r."""
        return _wide(end + wall) + _wide(end - wall) * nodes.eta

    def tau(nodes: Grid) -> Floats:
        # (r_m^2 - r^2) r_w/((r_m^2 - r_w^2) r), with r_m - r = rest (r_m - r_w)
        radius = _wide(wall) + _wide(end - wall) * nodes.eta
        return nodes.rest * both(nodes) * _wide(wall / (end + wall)) / radius

    layer = _layer(model, re, tau, 2.0 * wall / ((end + wall) * re), ks / thickness)
    weight = layer.grid.rest * both(layer.grid) * 0.5 * layer.grid.width
    return layer, re * thickness * total(weight * layer.slope)


def _sides(
    model: MixingModel, ratio: Floats, end: Floats, re_tau: Floats, ks: Floats
) -> tuple[_Layer, _Layer, Floats, Floats]:
    """Return both layers and their friction velocities over that of the mean wall stress."""
    core, shell, inner, outer, _ = _annulus_layers(model, ratio, end, re_tau, ks)
    return core, shell, inner, outer


def _annulus_layers(
    model: MixingModel, ratio: Floats, end: Floats, re_tau: Floats, ks: Floats
) -> tuple[_Layer, _Layer, Floats, Floats, Floats]:
    """Return the same and U_b over that friction velocity."""
    # force balance: G D_h/4 is the mean stress; a wall's own is (G/2) |r_m^2 - r_w^2|/r_w
    gap = 1.0 - ratio
    inner = np.sqrt((end - ratio) * (end + ratio) / (ratio * gap))
    outer = np.sqrt((1.0 - end) * (1.0 + end) / gap)
    scale = re_tau / (0.5 * gap)  # mean friction velocity times the outer radius over nu
    height = ks * 2.0 * gap
    core, flow = _side(model, ratio, end, scale * inner * (end - ratio), height)
    shell, more = _side(model, np.ones_like(end), end, scale * outer * (1.0 - end), height)
    bulk = (flow * inner + more * outer) / (0.5 * gap * (1.0 + ratio))
    return core, shell, inner, outer, bulk


def _zero_stress(model: MixingModel, ratio: Floats, re_tau: Floats, ks: Floats) -> Floats:
    """Return the radius at which both layers reach the same velocity: secant in a logit."""

    def radius(q: Floats) -> Floats:
        share = 1.0 / (1.0 + np.exp(-q))
        return ratio + (1.0 - ratio) * share

    def miss(q: Floats) -> Floats:
        core, shell, inner, outer = _sides(model, ratio, radius(q), re_tau, ks)
        return np.log(core.peak * inner / (shell.peak * outer))

    # start: measured zero-stress radii follow (r_m - r_i)/(r_o - r_m) = ratio^0.343
    return radius(secant(miss, 0.343 * np.log(ratio)))


def _annulus(model: MixingModel, ratio: Floats, re_tau: Floats, ks: Floats) -> tuple[Floats, ...]:
    """Return U_b+, radius of zero stress, stress ratio, peak over U_b."""
    end = _zero_stress(model, ratio, re_tau, ks)
    _, shell, inner, outer, bulk = _annulus_layers(model, ratio, end, re_tau, ks)
    square = inner / outer
    return bulk, end, square * square, shell.peak * outer / bulk


def _reynolds_solve(model: MixingModel, ratio: Floats, reynolds: Floats, ks: Floats) -> Floats:
    def miss(x: Floats) -> Floats:
        re_tau = np.exp(x)
        return np.log(4.0 * re_tau * _annulus(model, ratio, re_tau, ks)[0] / reynolds)

    start = np.maximum(np.sqrt(0.75 * reynolds), 0.05 * np.power(reynolds, 0.875))
    return np.exp(secant(miss, np.log(start)))


def annulus_flow(
    radius_ratio: FloatLike,
    *,
    reynolds: FloatLike | None = None,
    re_tau: FloatLike | None = None,
    relative_roughness: FloatLike = 0.0,
    mixing_length: MixingLength = "cess",
    kappa: float | None = None,
    A_plus: float | None = None,
    roughness_model: str = "colebrook",
    damping: str = "van-driest",
) -> AnnulusFlow:
    """Solve developed flow in a concentric annulus with a mixing length.

    Parameters
    ----------
    radius_ratio : float or array
        Inner over outer radius [1], 0.01 to 0.999.
    reynolds, re_tau : float or array
        One of the two [1], see :class:`AnnulusFlow`; re_tau 0.1 to 1e9.
    relative_roughness : float or array, optional
        Equivalent sand-grain height of both walls over the hydraulic diameter [1], 0 to 0.05.
    mixing_length, kappa, A_plus, roughness_model, damping : optional
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
    model = MixingModel(**constants(mixing_length, kappa, A_plus, roughness_model, damping))
    if (reynolds is None) == (re_tau is None):
        raise InputError(
            "reynolds", "both or neither of reynolds and re_tau", "exactly one of them"
        )
    name, value, bounds = (
        ("re_tau", re_tau, Interval(0.1, 1e9))
        if reynolds is None
        else ("reynolds", reynolds, Interval(1.0, 1e11))
    )
    given = {
        "radius_ratio": (radius_ratio, Interval(0.01, 0.999)),
        name: (value, bounds),
        "relative_roughness": (relative_roughness, _ROUGH),
    }
    shape, columns = arrays.columns(**given)  # type: ignore[arg-type]
    ratio, first, ks = (arrays.spread(c, shape.size) for c in columns)

    def kernel(r: Floats, x: Floats, k: Floats) -> tuple[Floats, ...]:
        friction = _reynolds_solve(model, r, x, k) if re_tau is None else x
        return friction, *_annulus(model, r, friction, k)

    friction, bulk, end, stress, peak = in_blocks(kernel, ratio, first, ks)
    re = 4.0 * friction * bulk
    model.use(re)
    return AnnulusFlow(
        shape(ratio), shape(re), shape(friction), shape(bulk), shape(end), shape(stress),
        shape(peak), shape, (ratio, end, friction, bulk, ks), model,
    )  # fmt: skip


@dataclass(frozen=True, slots=True, eq=False)
class CouettePoiseuilleFlow(_TwoWalls):
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
    _shape: Shape
    _flat: tuple[Floats, ...]
    _model: MixingModel

    def _kernel(self, *columns: Floats) -> tuple[Floats, ...]:
        re, ratio, ks, bulk, wall = columns
        still, moving, share, friction = _plane_layers(self._model, re, ratio, ks)
        place = _across(_wide(share) * still.grid.eta, 1.0 - _wide(1.0 - share) * moving.grid.eta)
        behind = _wide(wall) - _wide(np.sign(ratio) * friction) * moving.velocity
        return (
            place,
            _across(still.velocity, behind) / bulk[:, np.newaxis],
            _across(still.stress, _wide(ratio) * moving.stress),
            _across(still.nu_t, moving.nu_t),
        )


def _plane_layers(
    model: MixingModel, re: Floats, ratio: Floats, ks: Floats
) -> tuple[_Layer, _Layer, Floats, Floats]:
    """Return both layers, the first one's share of the gap, the moving wall's u_tau."""
    share = np.where(ratio < 0.0, 1.0 / (1.0 - np.minimum(ratio, 0.0)), 0.5)
    friction = np.sqrt(np.abs(ratio))
    middle = np.where(ratio < 0.0, 0.0, 0.5 * (1.0 + ratio))
    p_plus = 0.5 * (1.0 - ratio) / re
    height = 2.0 * ks  # D_h is twice the gap: over the gap

    def side(re: Floats, stress: Floats, p_plus: Floats, share: Floats) -> _Layer:
        return _layer(
            model, re, lambda nodes: nodes.rest + nodes.eta * _wide(stress), p_plus, height / share
        )

    still = side(2.0 * share * re, middle, p_plus, share)
    moving = side(
        2.0 * (1.0 - share) * re * friction,
        middle / np.abs(ratio),
        p_plus * np.sign(-ratio) / friction**3,
        1.0 - share,
    )
    return still, moving, share, friction


def couette_poiseuille_flow(
    re_tau: FloatLike,
    stress_ratio: FloatLike,
    *,
    relative_roughness: FloatLike = 0.0,
    mixing_length: MixingLength = "linear",
    kappa: float | None = None,
    A_plus: float | None = None,
    roughness_model: str = "colebrook",
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
    relative_roughness : float or array, optional
        Equivalent sand-grain height of both walls over twice the gap [1], 0 to 0.05.
    mixing_length, kappa, A_plus, roughness_model, damping : optional
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
    model = MixingModel(**constants(mixing_length, kappa, A_plus, roughness_model, damping))
    shape, columns = arrays.columns(
        re_tau=(re_tau, Interval(0.1, 1e9)),
        stress_ratio=(stress_ratio, Interval(-1.0, 1.0)),
        relative_roughness=(relative_roughness, _ROUGH),
    )
    re, ratio, ks = (arrays.spread(c, shape.size) for c in columns)
    near = (ratio > -1e-3) & (ratio < 0.05)
    if near.any():
        raise InputError("stress_ratio", f"{ratio[near][0]:g}", "-1 to -0.001 or 0.05 to 1")
    bulk, wall = in_blocks(lambda *c: _plane(model, *c), re, ratio, ks)
    reynolds = 4.0 * re * bulk
    model.use(reynolds)
    return CouettePoiseuilleFlow(
        shape(re), shape(ratio), shape(bulk), shape(wall), shape(reynolds),
        shape(0.5 * (1.0 - ratio)), shape, (re, ratio, ks, bulk, wall), model,
    )  # fmt: skip


def _plane(model: MixingModel, re: Floats, ratio: Floats, ks: Floats) -> tuple[Floats, Floats]:
    """Return U_b and the moving wall's velocity over u_tau of the wall at rest."""
    still, moving, share, friction = _plane_layers(model, re, ratio, ks)
    mean, lag = (total(v.grid.width * v.velocity) for v in (still, moving))
    # seen from the moving wall the fluid falls behind (ratio > 0) or runs ahead
    sign = np.sign(ratio) * friction
    wall = still.peak + sign * moving.peak
    return share * mean + (1.0 - share) * (wall - sign * lag), wall
