"""Flow inside a pipe, channel, rectangular duct or annulus."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np

from closures.inputs import Inputs
from closures.ledger import Ledger
from walllaw import ducts, friction
from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.relation import relation

_DRIVES = ("bulk_velocity", "volume_flow", "mass_flow", "reynolds", "friction_velocity",
           "pressure_gradient")  # fmt: skip
_GEOMETRY = {
    "pipe": ("diameter",),
    "channel": ("height", "width"),
    "duct": ("width", "height"),
    "annulus": ("inner_diameter", "outer_diameter"),
}
_PASSAGE: dict[str, Callable[..., ducts.Passage]] = {
    "pipe": ducts.pipe,
    "channel": ducts.channel,
    "duct": ducts.rectangle,
    "annulus": ducts.annulus,
}


def _flow(name: str, ledger: Ledger, values: Floats, relation_name: str, **paths: str) -> Floats:
    return ledger.put(f"flow.{name}", values, relation("flow", relation_name), **paths)


def _geometry(kind: str, inputs: Inputs, ledger: Ledger) -> ducts.Passage:
    names = _GEOMETRY[kind]
    sides = {}
    for name in names:
        if kind == "channel" and name == "width" and "flow.width" not in inputs:
            continue
        sides[name] = inputs.need(f"flow.{name}")
        ledger.given(f"flow.{name}", sides[name])
    passage = _PASSAGE[kind](**sides)
    paths = {name: f"flow.{name}" for name in sides}
    if passage.area is not None:
        _flow("area", ledger, passage.area, "area", **paths)
    _flow("hydraulic_diameter", ledger, passage.hydraulic_diameter, "hydraulic_diameter", **paths)
    _flow("passage", ledger, passage.gap, "passage", **paths)
    ledger.put(
        "flow.laminar_equivalent_diameter",
        passage.shape_factor * passage.hydraulic_diameter,
        relation("ducts", "laminar_equivalent_diameter"),
        hydraulic_diameter="flow.hydraulic_diameter",
    )
    _flow(
        "boundary_layer_thickness",
        ledger,
        0.5 * passage.gap,
        "half_passage",
        passage="flow.passage",
    )
    if "flow.roughness" in ledger:
        k_s = ledger["flow.roughness"]
        if (k_s >= 0.5 * passage.gap).any():
            raise InputError("flow.roughness", f"{k_s.max():g} m", "less than half the passage")
        _flow(
            "relative_roughness",
            ledger,
            k_s / passage.hydraulic_diameter,
            "relative_roughness",
            roughness="flow.roughness",
            hydraulic_diameter="flow.hydraulic_diameter",
        )
    return passage


def _area(kind: str, passage: ducts.Passage) -> Floats:
    if passage.area is None:
        raise InputError("flow.width", "nothing", "the width of the channel, to use a flow rate")
    return np.asarray(passage.area)


def _density(ledger: Ledger, path: str) -> Floats:
    if "fluid.density" not in ledger:
        raise InputError(path, "a fluid without density", "a fluid with density")
    return ledger["fluid.density"]


def _velocity(kind: str, passage: ducts.Passage, inputs: Inputs, ledger: Ledger) -> Floats:
    drive = inputs.one_of("flow", _DRIVES)
    value, nu = inputs.number(f"flow.{drive}"), ledger["fluid.kinematic_viscosity"]
    path = f"flow.{drive}"
    if drive == "bulk_velocity":
        ledger.given("flow.velocity", value)
        return value
    ledger.given(path, value)
    d_h = passage.hydraulic_diameter
    if drive == "reynolds":
        return _flow(
            "velocity",
            ledger,
            value * nu / d_h,
            "velocity_from_reynolds",
            reynolds=path,
            kinematic_viscosity="fluid.kinematic_viscosity",
            hydraulic_diameter="flow.hydraulic_diameter",
        )
    if drive == "volume_flow":
        return _flow(
            "velocity",
            ledger,
            value / _area(kind, passage),
            "velocity_from_volume_flow",
            volume_flow=path,
            area="flow.area",
        )
    if drive == "mass_flow":
        rho = _density(ledger, path)
        return _flow(
            "velocity",
            ledger,
            value / (rho * _area(kind, passage)),
            "velocity_from_mass_flow",
            mass_flow=path,
            density="fluid.density",
            area="flow.area",
        )
    u_tau = value
    if drive == "pressure_gradient":
        u_tau = np.sqrt(0.25 * d_h * value / _density(ledger, path))
    velocity = _from_friction(passage, u_tau, inputs, ledger, path)
    return _flow("velocity", ledger, velocity, "velocity_from_friction", friction_velocity=path)


def _from_friction(
    passage: ducts.Passage, u_tau: Floats, inputs: Inputs, ledger: Ledger, path: str
) -> Floats:
    """Turn a wall stress into a velocity: explicit in both regimes; refuse the gap between them."""
    nu, d_h = ledger["fluid.kinematic_viscosity"], passage.hydraulic_diameter
    critical = relation("ducts", "regime")["laminar"]
    slow = 8.0 * (u_tau * u_tau) * d_h / (passage.laminar_constant * nu)
    d_f = _friction_diameter(passage, inputs)
    inner = np.maximum(u_tau * d_f / nu, 50.0)  # laminar anyway below
    f = friction.colebrook_from_friction_velocity(inner, _roughness(ledger, d_f))
    fast = u_tau * np.sqrt(8.0 / f)
    laminar = slow * d_h / nu <= critical
    gap = ~laminar & (fast * d_h / nu < critical)
    if np.any(gap):
        raise InputError(
            path,
            "a wall stress between the laminar and the turbulent branch",
            "a velocity or a flow rate, which is unique",
        )
    return np.asarray(np.where(laminar, slow, fast))


def _friction_diameter(passage: ducts.Passage, inputs: Inputs) -> Floats:
    equivalent = inputs.text("flow.friction_diameter") == "laminar-equivalent"
    factor = passage.shape_factor if equivalent else 1.0
    return np.asarray(factor * passage.hydraulic_diameter)


def _roughness(ledger: Ledger, diameter: Floats) -> Floats:
    k_s = ledger["flow.roughness"] if "flow.roughness" in ledger else np.zeros(1)
    return np.minimum(k_s / diameter, 0.5)


def _turbulent_friction(ledger: Ledger, velocity: Floats, diameter: Floats) -> Floats:
    re = np.maximum(velocity * diameter / ledger["fluid.kinematic_viscosity"], 500.0)
    return np.asarray(friction.colebrook(re, _roughness(ledger, diameter)))


def internal_step(kind: str, inputs: Inputs, ledger: Ledger) -> None:
    """Enter geometry, velocity, Reynolds number, regime, friction and lengths of a passage."""
    passage = _geometry(kind, inputs, ledger)
    u = _velocity(kind, passage, inputs, ledger)
    nu, d_h = ledger["fluid.kinematic_viscosity"], np.asarray(passage.hydraulic_diameter)
    ledger.put(
        "flow.length",
        d_h,
        relation("flow", "hydraulic_diameter"),
        hydraulic_diameter="flow.hydraulic_diameter",
    )
    _flow(
        "reynolds",
        ledger,
        u * d_h / nu,
        "reynolds",
        velocity="flow.velocity",
        length="flow.hydraulic_diameter",
        kinematic_viscosity="fluid.kinematic_viscosity",
    )
    _regime(ledger)
    _friction(kind, passage, inputs, ledger)
    _rates(passage, ledger)
    _entrance(inputs, ledger)


def _regime(ledger: Ledger) -> None:
    r = relation("ducts", "regime")
    re = ledger["flow.reynolds"]
    codes = (re >= r["laminar"]).astype(np.int64) + (re > r["turbulent"])
    ledger.labels["flow.regime"] = codes, ("laminar", "transitional", "turbulent")
    ledger.put("flow.reynolds_critical", np.full(1, r["laminar"]), r)
    ledger.notes.append(f"regime: {r.formula} ({r.source}; {r.status})")


def _friction(kind: str, passage: ducts.Passage, inputs: Inputs, ledger: Ledger) -> None:
    u, re = ledger["flow.velocity"], ledger["flow.reynolds"]
    laminar = ledger.is_label("flow.regime", "laminar")
    d_h, d_l = ledger["flow.hydraulic_diameter"], ledger["flow.laminar_equivalent_diameter"]
    d_f = _friction_diameter(passage, inputs)
    slow = passage.laminar_constant / re
    paths = {"reynolds": "flow.reynolds"}
    if "flow.relative_roughness" in ledger:
        paths["relative_roughness"] = "flow.relative_roughness"
    turbulent = _turbulent_friction(ledger, u, d_f)
    f = np.where(laminar, slow, turbulent)
    rel = (
        relation("ducts", "friction_laminar")
        if laminar.all()
        else relation("friction", "colebrook")
    )
    ledger.put("flow.darcy_friction", f, rel, None if laminar.all() else ~laminar, **paths)
    ledger.put(
        "flow.darcy_friction_laminar_equivalent",
        np.where(laminar, slow, _turbulent_friction(ledger, u, d_l + 0.0 * d_h)),
        relation("friction", "colebrook"),
        ~laminar,
        **paths,
    )
    if kind != "pipe":
        ledger.texts["flow.friction_diameter"] = inputs.text("flow.friction_diameter", "hydraulic")
    _flow(
        "skin_friction",
        ledger,
        0.25 * f,
        "skin_friction_from_darcy",
        darcy_friction="flow.darcy_friction",
    )
    _flow(
        "friction_velocity",
        ledger,
        u * np.sqrt(0.125 * f),
        "friction_velocity",
        velocity="flow.velocity",
        skin_friction="flow.skin_friction",
    )


def _rates(passage: ducts.Passage, ledger: Ledger) -> None:
    u, u_tau = ledger["flow.velocity"], ledger["flow.friction_velocity"]
    if "fluid.density" in ledger:
        gradient = (
            4.0 * ledger["fluid.density"] * (u_tau * u_tau) / ledger["flow.hydraulic_diameter"]
        )
        _flow(
            "pressure_gradient",
            ledger,
            gradient,
            "pressure_gradient",
            density="fluid.density",
            friction_velocity="flow.friction_velocity",
            hydraulic_diameter="flow.hydraulic_diameter",
        )
    if passage.area is None:
        return
    if "flow.volume_flow" not in ledger:
        _flow(
            "volume_flow",
            ledger,
            u * passage.area,
            "volume_flow",
            velocity="flow.velocity",
            area="flow.area",
        )
    if "fluid.density" in ledger and "flow.mass_flow" not in ledger:
        _flow(
            "mass_flow",
            ledger,
            ledger["fluid.density"] * u * passage.area,
            "mass_flow",
            density="fluid.density",
            velocity="flow.velocity",
            area="flow.area",
        )


def _entrance(inputs: Inputs, ledger: Ledger) -> None:
    re, d_h = ledger["flow.reynolds"], ledger["flow.hydraulic_diameter"]
    laminar = ledger.is_label("flow.regime", "laminar")
    length = d_h * np.where(
        laminar, ducts.entrance_length_laminar(re), ducts.entrance_length_turbulent(re)
    )
    name = "entrance_laminar" if laminar.all() else "entrance_turbulent"
    ledger.put(
        "flow.entrance_length",
        length,
        relation("ducts", name),
        laminar if laminar.all() else ~laminar,
        reynolds="flow.reynolds",
        hydraulic_diameter="flow.hydraulic_diameter",
    )
    if "flow.length" in inputs:
        ledger.given("flow.distance", inputs.number("flow.length"))
