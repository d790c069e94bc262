"""Fully developed flow by mixing length: channel, pipe, open channel, plane Couette.

The momentum balance gives the velocity gradient in closed form, so that the flow is one quadrature
(flow_quadrature).
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from functools import partial
from typing import Any

import numpy as np
from numpy.typing import NDArray

from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Floats, Interval, Shape
from walllaw.errors import InputError, unknown_name
from walllaw.flow_drive import GEOMETRIES
from walllaw.flow_quadrature import PANELS, SINGLE, Grid, in_blocks, running, single, total
from walllaw.flow_quadrature import grid as make_grid
from walllaw.mixing_lengths import MixingLength, MixingModel, constants
from walllaw.roots import secant


@dataclass(frozen=True, slots=True, kw_only=True)
class _Model(MixingModel):
    """A mixing length in a passage."""

    geometry: str

    def stress(self, grid: Grid) -> Floats:
        """Return tau/tau_w."""
        return np.ones_like(grid.rest) if self.geometry == "couette" else grid.rest

    def closing(self, grid: Grid, re_tau: Floats) -> tuple[Floats, Floats]:
        """Return the stress at the nodes and the fall of pressure in wall units."""
        share = {"pipe": 2.0, "couette": 0.0}.get(self.geometry, 1.0)
        return self.stress(grid), share / re_tau


def _weight(model: _Model, grid: Grid) -> Floats:
    """Return the weight of U in the bulk mean: 2 r (pipe) or 1, in d(eta)."""
    return 2.0 * grid.rest if model.geometry == "pipe" else np.ones_like(grid.rest)


def _bulk(model: _Model, re_tau: Floats, ks: Floats, even: bool) -> tuple[Floats, Floats]:
    """Return U_b+ and U_c+ by parts: one integral each, no profile needed."""
    shift = model.shift(ks * re_tau) if np.any(ks > 0) else np.zeros_like(re_tau)
    grid = single(re_tau) if even else make_grid(re_tau, model.split)
    part = model.slope(grid, re_tau, shift, *model.closing(grid, re_tau)) * grid.width
    centre = re_tau * total(part)
    if model.geometry == "couette":  # the mean over the whole gap is the speed halfway
        return centre, centre
    part *= grid.rest
    if model.geometry == "pipe":
        part *= grid.rest
    return re_tau * total(part), centre


def _by_wall(
    model: _Model, kernel: Callable[..., tuple[Floats, ...]], first: Floats, ks: Floats
) -> list[Floats]:
    """Evaluate a kernel for smooth walls, where one panel may do, and for the others."""
    even = (ks == 0.0) & model.even
    found: list[Floats] = []
    for which, nodes in ((even, SINGLE), (~even, PANELS)):
        if which.any():
            alike = bool(which.all())
            some = (first, ks) if alike else (first[which], ks[which])
            results = in_blocks(partial(kernel, even=nodes == SINGLE), *some, nodes=nodes)
            if alike:
                return results
            found = found or [np.empty_like(first) for _ in results]
            for column, values in zip(found, results, strict=True):
                column[which] = values
    return found


def _reynolds(model: _Model, re_tau: Floats, bulk: Floats) -> Floats:
    """Return the Reynolds number on the hydraulic diameter (4 h for channels, 2 R for a pipe)."""
    factor = 2.0 if model.geometry == "pipe" else 4.0
    return factor * re_tau * bulk


def _solve(model: _Model, reynolds: Floats, ks: Floats, even: bool) -> tuple[Floats]:
    """Return Re_tau for a Reynolds number: secant in logarithms, where they are near linear."""

    def miss(x: Floats) -> Floats:
        re_tau = np.exp(x)
        return np.log(_reynolds(model, re_tau, _bulk(model, re_tau, ks, even)[0]) / reynolds)

    # start: the larger of the laminar wall stress and that of Haaland's explicit friction factor
    factor = 2.0 if model.geometry == "pipe" else 4.0
    laminar = np.sqrt(8.0 / factor * reynolds) if factor == 2.0 else np.sqrt(0.75 * reynolds)
    height = ks / (7.4 if factor == 2.0 else 14.8)
    inverse = -1.8 * np.log10(np.power(height, 1.11) + np.minimum(6.9 / reynolds, 0.05))
    turbulent = reynolds / (np.sqrt(8.0) * factor * inverse)
    start = np.log(laminar if model.mixing_length == "laminar" else np.maximum(laminar, turbulent))
    return (np.exp(secant(miss, start, 1.1)),)


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class DevelopedFlow:
    """A developed flow, or many; floats for one case, arrays over the cases.

    Profiles (``eta``, ``y_plus``, ``u_plus``, ``nu_t``, ``stress``) have one more dimension: the
    nodes from the wall to the axis.

    Attributes
    ----------
    re_tau, reynolds : float or ndarray
        Friction Reynolds number on R or h; Reynolds number on the hydraulic diameter [1].
    bulk_u_plus, centreline_u_plus : float or ndarray
        U_b/u_tau and U_c/u_tau [1] (Couette: half the speed of the moving wall).
    """

    geometry: str
    mixing_length: str
    kappa: float
    A_plus: float
    re_tau: Any
    reynolds: Any
    bulk_u_plus: Any
    centreline_u_plus: Any
    _shape: Shape
    _flat: tuple[Floats, Floats]
    _model: _Model

    @property
    def darcy_friction(self) -> Any:
        """Darcy friction factor 8/U_b+^2 [1]."""
        return 8.0 / (self.bulk_u_plus * self.bulk_u_plus)

    @property
    def skin_friction(self) -> Any:
        """c_f = 2/U_b+^2 [1]."""
        return 2.0 / (self.bulk_u_plus * self.bulk_u_plus)

    @property
    def centreline_ratio(self) -> Any:
        """U_c/U_b [1]."""
        return self.centreline_u_plus / self.bulk_u_plus

    def profiles(self) -> dict[str, NDArray[np.float64]]:
        """Return eta, y_plus, u_plus, slope, nu_t (over nu), mixing_length (wall units), stress.

        Arrays of the case's shape with one more dimension, from the wall to the axis.
        """
        names = ("eta", "y_plus", "u_plus", "slope", "nu_t", "mixing_length", "stress")
        found = in_blocks(lambda *c: _profiles(self._model, *c), *self._flat)
        dims = self._shape.dims
        return {n: v.reshape(*dims, v.shape[-1]) for n, v in zip(names, found, strict=True)}

    def flux_coefficients(self) -> tuple[Any, Any]:
        """Return the momentum-flux and the kinetic-energy-flux coefficient, beta and alpha [1]."""
        beta, alpha = in_blocks(lambda *c: _fluxes(self._model, *c), *self._flat)
        return self._shape(beta), self._shape(alpha)

    def nusselt(self, prandtl: FloatLike, turbulent_prandtl: float = 0.85) -> tuple[Any, Any]:
        """Return the Nusselt numbers for uniform heat flux and for uniform wall temperature [1].

        On the hydraulic diameter, both walls heated alike; ``prandtl`` is one number or one a case.
        """
        flux, temperature, _, _ = self._heat(prandtl, turbulent_prandtl)
        return self._shape(flux), self._shape(temperature)

    def temperature(
        self, prandtl: FloatLike, turbulent_prandtl: float = 0.85
    ) -> dict[str, NDArray[np.float64]]:
        """Return (T_w - T)/(T_w - T_b) at the nodes: uniform_flux and uniform_temperature."""
        _, _, flux, temperature = self._heat(prandtl, turbulent_prandtl)
        dims = (*self._shape.dims, flux.shape[-1])
        return {
            "uniform_flux": flux.reshape(dims),
            "uniform_temperature": temperature.reshape(dims),
        }

    def _heat(self, prandtl: FloatLike, turbulent_prandtl: float) -> list[Floats]:
        if self.geometry == "couette":
            raise InputError("geometry", "couette", "a passage whose bulk carries the heat away")
        pr = np.broadcast_to(arrays.check("prandtl", prandtl, POSITIVE), self._shape.dims)
        flat = np.ascontiguousarray(pr).reshape(-1)
        turbulent = float(arrays.check("turbulent_prandtl", turbulent_prandtl, POSITIVE))
        return in_blocks(
            lambda r, k, p: _nusselt(self._model, r, k, p, turbulent), *self._flat, flat
        )

    def si(self, size: FloatLike, kinematic_viscosity: FloatLike) -> dict[str, Any]:
        """Return the flow in SI units for a radius or half height and a viscosity.

        Keys: friction_velocity, bulk_velocity, centreline_velocity [m/s], volume_flow [m3/s; m2/s
        in plane passages], kinematic_pressure_gradient (-dp/dx/rho, m/s2), wall_strain_rate [1/s].
        """
        r = arrays.check("size", size, POSITIVE)
        nu = arrays.check("kinematic_viscosity", kinematic_viscosity, POSITIVE)
        u_tau = self.re_tau * nu / r
        area = {"pipe": np.pi * r * r, "open-channel": r}.get(self.geometry, 2.0 * r)
        sides = {"pipe": 2.0, "couette": 0.0}.get(self.geometry, 1.0)
        found = {
            "friction_velocity": u_tau,
            "bulk_velocity": self.bulk_u_plus * u_tau,
            "centreline_velocity": self.centreline_u_plus * u_tau,
            "volume_flow": self.bulk_u_plus * u_tau * area,
            "kinematic_pressure_gradient": sides * u_tau * u_tau / r,
            "wall_strain_rate": u_tau * u_tau / nu,
        }
        return {n: float(v) if np.ndim(v) == 0 else v for n, v in found.items()}

    def log_law(self, low: float = 100.0, share: float = 0.15) -> tuple[Any, Any]:
        """Return kappa and B fitted to low < y+ < share Re_tau (least squares in ln y+)."""
        p = in_blocks(lambda *c: _profiles(self._model, *c)[1:3], *self._flat)
        y, u = p
        use = (y > low) & (y < share * self._flat[0][:, np.newaxis])
        if (use.sum(axis=1) < 3).any():
            raise InputError("re_tau", f"{self._flat[0].min():.4g}", "a log layer with three nodes")
        x, n = np.where(use, np.log(y), 0.0), use.sum(axis=1)
        mx, mu = x.sum(axis=1) / n, np.where(use, u, 0.0).sum(axis=1) / n
        dx = np.where(use, x - mx[:, np.newaxis], 0.0)
        slope = (dx * np.where(use, u, 0.0)).sum(axis=1) / (dx * dx).sum(axis=1)
        return self._shape(1.0 / slope), self._shape(mu - slope * mx)

    def __repr__(self) -> str:
        return (
            f"DevelopedFlow({self.geometry}, {self.mixing_length}, kappa={self.kappa:g}, "
            f"A_plus={self.A_plus:g}: re_tau={self.re_tau!r}, reynolds={self.reynolds!r}, "
            f"bulk_u_plus={self.bulk_u_plus!r})"
        )


def _nodes(model: _Model, re_tau: Floats, ks: Floats) -> tuple[Grid, Floats, Floats, Floats]:
    shift = model.shift(ks * re_tau) if np.any(ks > 0) else np.zeros_like(re_tau)
    grid = make_grid(re_tau, model.split)
    slope, nu_t = model.gradient(grid, re_tau, shift, *model.closing(grid, re_tau))
    velocity = re_tau[:, np.newaxis, np.newaxis] * running(slope, grid)
    return grid, slope, nu_t, velocity


def _lines(values: Floats) -> Floats:
    """Return (cases, panels, nodes) as (cases, all nodes)."""
    cases, panels, nodes = values.shape
    return np.ascontiguousarray(values).reshape(cases, panels * nodes)


def _profiles(model: _Model, re_tau: Floats, ks: Floats) -> tuple[Floats, ...]:
    grid, slope, nu_t, velocity = _nodes(model, re_tau, ks)
    length = np.sqrt(nu_t / np.maximum(slope, 1e-300))
    found = (grid.eta, grid.y_plus, velocity, slope, nu_t, length, model.stress(grid))
    # panels beyond Re_tau have no width: their nodes repeat the last edge and are kept, harmlessly
    return tuple(_lines(v) for v in found)


def _fluxes(model: _Model, re_tau: Floats, ks: Floats) -> tuple[Floats, Floats]:
    grid, _, _, u = _nodes(model, re_tau, ks)
    if model.geometry == "couette":  # the other half of the gap: twice the middle's speed less u
        middle = _bulk(model, re_tau, ks, even=False)[1]
        v = 2.0 * middle[:, np.newaxis, np.newaxis] - u
        square, cube = total(grid.width * (u * u + v * v)), total(grid.width * (u**3 + v**3))
        return 0.5 * square / (middle * middle), 0.5 * cube / (middle * middle * middle)
    weight = grid.width * _weight(model, grid)
    mean = total(weight * u)
    beta, alpha = total(weight * u * u), total(weight * u * u * u)
    return beta / (mean * mean), alpha / (mean * mean * mean)


def _nusselt(
    model: _Model, re_tau: Floats, ks: Floats, pr: Floats, pr_t: float
) -> tuple[Floats, Floats, Floats, Floats]:
    """Lyon's integral for uniform flux; power iteration of the energy balance for the other."""
    grid, _, nu_t, u = _nodes(model, re_tau, ks)
    conductivity = 1.0 + pr[:, np.newaxis, np.newaxis] * nu_t / pr_t
    pipe = model.geometry == "pipe"
    weight = _weight(model, grid)
    u = u / total(grid.width * weight * u)[:, np.newaxis, np.newaxis]
    area = grid.rest if pipe else np.ones_like(grid.rest)

    def inside(theta: Floats) -> Floats:
        """Share of the heat carried between the axis and each node."""
        carried = weight * u * theta
        return total(grid.width * carried)[:, np.newaxis, np.newaxis] - running(carried, grid)

    ones = np.ones_like(u)
    heat = inside(ones)
    resistance = total(grid.width * heat * heat / (area * conductivity))
    size = 0.5 if pipe else 0.25
    flux = 1.0 / (size * resistance)
    uniform = running(heat / (area * conductivity), grid) / resistance[:, np.newaxis, np.newaxis]
    theta = ones
    for _ in range(24):  # the second eigenvalue is six times the first: 24 rounds reach 1e-16
        theta = running(inside(theta) / (area * conductivity), grid)
        bulk = total(grid.width * weight * u * theta)
        theta = theta / bulk[:, np.newaxis, np.newaxis]
    # with bulk 1, the flux at the wall is 1/eigenvalue of one more round
    again = running(inside(theta) / (area * conductivity), grid)
    temperature = 1.0 / (size * total(grid.width * weight * u * again))
    return flux, temperature, _lines(uniform), _lines(theta)


def developed(
    geometry: str = "pipe",
    *,
    reynolds: FloatLike | None = None,
    re_tau: FloatLike | None = None,
    relative_roughness: FloatLike = 0.0,
    mixing_length: MixingLength = "nikuradse",
    kappa: float | None = None,
    A_plus: float | None = None,
    roughness_model: str = "colebrook",
    damping: str = "van-driest",
) -> DevelopedFlow:
    """Solve fully developed flow with a mixing length.

    Parameters
    ----------
    geometry : str
        ``pipe``, ``channel``, ``open-channel`` (half of one, free surface) or ``couette``.
    reynolds, re_tau : float or array
        One of the two: U_b D_h/nu (pipe 2 R, channel and open channel 4 h, Couette 4 h and half
        the wall speed), or u_tau R/nu [1]; re_tau 0.1 to 1e10.
    relative_roughness : float or array, optional
        Equivalent sand-grain height over the hydraulic diameter [1], 0 to 0.05.
    mixing_length : str or callable, optional
        ``nikuradse``, ``linear``, ``escudier``, ``cess``, ``laminar``; or a function of (y/R, y+)
        that returns the undamped length over R.
    kappa, A_plus : float, optional
        0.41 and 26 by default [1].
    roughness_model : str, optional
        ``colebrook`` or ``nikuradse``: the shift that returns this roughness function exactly under
        constant stress; ``cebeci-chang``: the published shift.
    damping : str, optional
        ``van-driest``, or ``cebeci``: damped more where the pressure falls steeply.

    Returns
    -------
    DevelopedFlow
        Bulk values; profiles, fluxes, heat and log-law fit by its methods.

    Warns
    -----
    RangeWarning
        Below Re = 8e3, where damped mixing lengths give 5 to 15 % too much friction.

    Raises
    ------
    InputError
        If not exactly one of reynolds and re_tau is given, or a value cannot be used.

    Notes
    -----
    (1 + nu_t+) dU+/dy+ = tau+, nu_t+ = l+^2 dU+/dy+: dU+/dy+ = 2 tau+/(1 + sqrt(1 + 4 l+^2 tau+)).
    Friction agrees with eight times the panels to 1e-13 for re_tau 1 to 1e8.

    References
    ----------
    van-driest-1956, nikuradse-1932, cess-1958, escudier-1966, cebeci-chang-1978

    Examples
    --------
    >>> flow = developed("pipe", re_tau=1000.0)
    >>> f"{flow.bulk_u_plus:.10f} {flow.reynolds:.4f}"
    '18.7396341808 37479.2684'
    """
    if geometry not in GEOMETRIES:
        raise unknown_name("geometry", geometry, GEOMETRIES)
    fields = constants(mixing_length, kappa, A_plus, roughness_model, damping)
    model = _Model(geometry=geometry, **fields)
    if (reynolds is None) == (re_tau is None):
        raise InputError(
            "reynolds", "both or neither of reynolds and re_tau", "exactly one of them"
        )
    given: dict[str, tuple[FloatLike, Interval]] = (
        {"re_tau": (re_tau, Interval(0.1, 1e10))}
        if re_tau is not None
        else {"reynolds": (reynolds if reynolds is not None else 0.0, Interval(1.0, 1e12))}
    )
    shape, (first, rough) = arrays.columns(
        **given, relative_roughness=(relative_roughness, Interval(0.0, 0.05))
    )
    size = shape.size
    first, rough = arrays.spread(first, size), arrays.spread(rough, size)
    ks = rough * (2.0 if geometry == "pipe" else 4.0)  # over R or h
    if size and re_tau is None:
        (first,) = _by_wall(model, partial(_solve, model), first, ks)
    bulk, centre = _by_wall(model, partial(_bulk, model), first, ks) if size else (first, first)
    re = _reynolds(model, first, bulk)
    model.use(re)
    return DevelopedFlow(
        geometry, model.name, model.kappa, model.A_plus, shape(first), shape(re), shape(bulk),
        shape(centre), shape, (first, ks), model,
    )  # fmt: skip
