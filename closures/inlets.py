"""Inlet values: what a closure's own variables are for a given state of turbulence."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import TYPE_CHECKING, Any

import numpy as np

from closures import eddy_viscosity
from closures.closure_tables import Closure, closure
from closures.states import State, dependence, interval, state
from closures.transition import onset_momentum_reynolds
from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Floats
from walllaw.errors import InputError

if TYPE_CHECKING:
    from walllaw.arrays import Shape

# Variables that are fixed by the eddy viscosity alone: for these one quantity is enough.
VISCOSITY_ONLY = {"nu_tilde", "R"}
_VISCOSITIES = ("nu_t", "viscosity_ratio", "nu_tilde")


def _isotropic(c: Closure, s: State) -> Floats:
    return s.flat("k") * 2.0 / 3.0


def _two_thirds(c: Closure, s: State) -> Floats:
    return np.full(s.flat("k").size, 2.0 / 3.0)


def _zero(c: Closure, s: State) -> Floats:
    return np.zeros(s.flat("k").size)


def _one(c: Closure, s: State) -> Floats:
    return np.ones(s.flat("k").size)


def _quantity(name: str) -> Callable[[Closure, State], Floats]:
    return lambda c, s: s.flat(name)


def _nu_tilde(c: Closure, s: State) -> Floats:
    return viscosity_variable(c, s.flat("viscosity_ratio")) * s.values["kinematic_viscosity"]


def _onset(c: Closure, s: State) -> Floats:
    return np.asarray(onset_momentum_reynolds(s.flat("intensity")))


def _baldwin_barth(c: Closure, s: State) -> Floats:
    return s.flat("nu_t") / c.C_mu


# variable of a closure table -> names and values of what the inlet gets
_RULES: dict[str, dict[str, Callable[[Closure, State], Floats]]] = {
    "k": {"k": _quantity("k")},
    "turbulent_k": {"turbulent_k": _quantity("k")},
    "laminar_k": {"laminar_k": _zero},
    "epsilon": {"epsilon": _quantity("epsilon")},
    "epsilon_tilde": {"epsilon_tilde": _quantity("epsilon")},
    "omega": {"omega": _quantity("omega")},
    "tau": {"tau": _quantity("time_scale")},
    "nu_tilde": {"nu_tilde": _nu_tilde},
    "R": {"R": _baldwin_barth},
    "v2": {"v2": _isotropic},
    "zeta": {"zeta": _two_thirds},
    "gamma": {"gamma": _one},
    "re_theta_t": {"re_theta_t": _onset},
    "reynolds_stresses": {
        "uu": _isotropic,
        "vv": _isotropic,
        "ww": _isotropic,
        "uv": _zero,
        "uw": _zero,
        "vw": _zero,
    },
    "f": {},
}
# what a reader must know about a variable's inlet value
NOTES = {
    "f": "f: zero normal gradient at the inlet",
    "v2": "v2 = 2k/3: isotropic turbulence assumed",
    "zeta": "zeta = 2/3: isotropic turbulence assumed",
    "reynolds_stresses": "Reynolds stresses: isotropic turbulence assumed, 2k/3 each and no shear",
    "epsilon_tilde": "epsilon_tilde = epsilon: the wall term vanishes away from walls",
    "gamma": "gamma = 1 at the inlet",
    "re_theta_t": "re_theta_t from the intensity at this inlet, zero pressure gradient",
    "laminar_k": "no laminar fluctuation energy in the stream",
}


def viscosity_variable(c: Closure, ratio: Floats) -> Floats:
    """Return the closure's viscosity variable over nu for a given nu_t/nu (flat arrays)."""
    if "c_v1" in c.coefficients:
        return eddy_viscosity.spalart_allmaras_chi(ratio, c["c_v1"])
    return eddy_viscosity.menter_1997_chi(ratio, c["A_plus"], c["kappa"])


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class Inlet:
    """Inlet values of one closure; the closure's own variables are in ``set``.

    Quantities of the state (``k``, ``viscosity_ratio``, ...) are attributes.
    """

    closure: Closure
    state: State | None
    values: Mapping[str, Floats]
    flat_set: Mapping[str, Floats]
    shape: Shape
    notes: tuple[str, ...] = field(default=())

    @property
    def set(self) -> dict[str, Any]:
        """The closure's own variables and nothing else, in SI."""
        return {name: self.shape(values) for name, values in self.flat_set.items()}

    def __getattr__(self, name: str) -> Any:
        if name.startswith("_"):
            raise AttributeError(name)
        if name in self.values:
            return self.shape(self.values[name])
        if self.state is None:
            raise InputError(name, "an inlet of the eddy viscosity alone", ", ".join(self.values))
        return getattr(self.state, name)

    def __repr__(self) -> str:
        rows = ", ".join(f"{name}={value!r}" for name, value in self.set.items())
        return f"Inlet({self.closure.id}: {rows}; source {self.closure.source})"


def inlet(
    name: str | Closure,
    *,
    kinematic_viscosity: FloatLike | None = None,
    velocity: FloatLike | None = None,
    C_L: FloatLike | None = None,
    **given: FloatLike,
) -> Inlet:
    """Return what to set at the inlet for one closure.

    Parameters
    ----------
    name : str or Closure
        Id, alias or path of a closure table.
    kinematic_viscosity : float or array, optional
        [m2/s]; needed by closures of an eddy-viscosity variable and with viscosity_ratio.
    velocity : float or array, optional
        [m/s]; what intensity refers to.
    C_L : float or array, optional
        integral_length over dissipation_length [-].
    **given : float or array
        Two independent quantities, as for :func:`closures.state`; for a closure whose variables
        are fixed by the eddy viscosity, nu_t, viscosity_ratio or nu_tilde alone is enough.

    Returns
    -------
    Inlet
        With ``set`` (the closure's own variables), ``state``, ``notes`` (what was assumed).

    Raises
    ------
    InputError
        If the closure is unknown, or the quantities do not fix what it needs.

    Notes
    -----
    The eddy viscosity is formed with the closure's own C_mu.

    References
    ----------
    pope-2000; each closure's own source

    Examples
    --------
    >>> inlet("spalart-allmaras-1994", kinematic_viscosity=1.5e-5, viscosity_ratio=1.0).set
    {'nu_tilde': 6.934...e-05}
    """
    c = closure(name) if isinstance(name, str) else name
    if len(given) == 1 and set(c.variables) <= VISCOSITY_ONLY and c.variables:
        return _from_viscosity(c, kinematic_viscosity, given)
    s = state(
        C_mu=c.C_mu,
        C_L=C_L,
        c_v1=c.coefficients["c_v1"].value if "c_v1" in c.coefficients else None,
        kinematic_viscosity=kinematic_viscosity,
        velocity=velocity,
        **given,
    )
    return inlet_from_state(c, s)


def inlet_from_state(c: Closure, s: State) -> Inlet:
    """Return the inlet values of a closure for a state made with the closure's C_mu."""
    for variable in c.variables:
        if variable == "nu_tilde" and "kinematic_viscosity" not in s.values:
            raise InputError("nu_tilde", "no kinematic_viscosity", "the viscosity of the fluid")
        if variable == "re_theta_t" and "velocity" not in s.values:
            raise InputError("re_theta_t", "no velocity", "the velocity that intensity refers to")
    flat = {name: rule(c, s) for variable in c.variables for name, rule in _RULES[variable].items()}
    notes = tuple(NOTES[v] for v in c.variables if v in NOTES)
    if not c.variables:
        notes = ("an algebraic closure transports nothing: the inlet needs the mean flow only",)
    return Inlet(c, s, {}, flat, s.shape, notes)


def _from_viscosity(
    c: Closure, kinematic_viscosity: FloatLike | None, given: Mapping[str, FloatLike]
) -> Inlet:
    ((name, value),) = given.items()
    if name not in _VISCOSITIES:
        reason = dependence(name, "nu_t") if name in ("k", "epsilon", "omega") else None
        raise InputError(
            "turbulence", reason or name, f"one of {', '.join(_VISCOSITIES)}, or two quantities"
        )
    if kinematic_viscosity is None:
        raise InputError(name, "no kinematic_viscosity", "the viscosity of the fluid")
    shape, (x, nu) = arrays.columns(
        **{name: (value, interval(name)), "kinematic_viscosity": (kinematic_viscosity, POSITIVE)}
    )
    if name == "nu_tilde":
        chi = x / nu
        ratio = (
            eddy_viscosity.spalart_allmaras_ratio(chi, c["c_v1"])
            if "c_v1" in c.coefficients
            else eddy_viscosity.menter_1997_ratio(chi, c["A_plus"], c["kappa"])
        )
    else:
        ratio = x if name == "viscosity_ratio" else x / nu
    values = {"nu_t": ratio * nu, "viscosity_ratio": ratio}
    if "R" in c.variables:
        flat = {"R": ratio * nu / c.C_mu}
    else:
        flat = {"nu_tilde": x if name == "nu_tilde" else viscosity_variable(c, ratio) * nu}
        values["nu_tilde"] = flat["nu_tilde"]
    return Inlet(c, None, values, flat, shape)
