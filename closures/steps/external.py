"""Flow along a plate or around a body: the boundary layer at one distance from the leading edge."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np

from closures.inputs import Inputs
from closures.ledger import Ledger
from walllaw import plate
from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.relation import relation

_LAWS: dict[str, Callable[[Floats], Any]] = {
    "schultz-grunow": plate.schultz_grunow,
    "karman-schoenherr": plate.karman_schoenherr,
    "white": plate.white,
    "power-1-7": plate.power_1_7,
}


def external_step(kind: str, inputs: Inputs, ledger: Ledger) -> None:
    """Enter velocity, Reynolds number, regime, skin friction and thickness at the station."""
    _station(kind, inputs, ledger)
    re = ledger["flow.reynolds"]
    r = relation("plate", "regime")
    critical = np.full(1, r["transition"])
    if inputs.case.values.get("flow.tripped"):
        critical = np.zeros(1)
        ledger.notes.append("boundary layer tripped: turbulent from the leading edge")
    elif "flow.transition_reynolds" in inputs:
        critical = inputs.number("flow.transition_reynolds")
        ledger.given("flow.transition_reynolds", critical)
    else:
        ledger.notes.append(f"regime: {r.formula} ({r.source})")
    ledger.put("flow.reynolds_critical", critical, r)
    codes = (re >= critical).astype(np.int64)
    ledger.labels["flow.regime"] = codes, ("laminar", "turbulent")
    _friction(inputs, ledger, codes == 0)
    if kind == "external":
        ledger.notes.append("friction of a flat plate at the length of the body: within about 30 %")
    if "flow.roughness" in ledger:
        ledger.notes.append(
            "skin friction is that of the smooth plate; roughness enters at the wall only"
        )


def _station(kind: str, inputs: Inputs, ledger: Ledger) -> None:
    name = "length" if kind == "plate" else inputs.one_of("flow", ("length", "chord"))
    x = inputs.need(f"flow.{name}")
    ledger.given("flow.length", x)
    drive = inputs.one_of("flow", ("velocity", "reynolds"))
    nu, value = ledger["fluid.kinematic_viscosity"], inputs.number(f"flow.{drive}")
    paths = {"length": "flow.length", "kinematic_viscosity": "fluid.kinematic_viscosity"}
    if drive == "velocity":
        ledger.given("flow.velocity", value)
        ledger.put(
            "flow.reynolds",
            value * x / nu,
            relation("flow", "reynolds"),
            velocity="flow.velocity",
            **paths,
        )
    else:
        ledger.given("flow.reynolds", value)
        ledger.put(
            "flow.velocity",
            value * nu / x,
            relation("flow", "velocity_from_reynolds"),
            reynolds="flow.reynolds",
            **paths,
        )
    if (ledger["flow.reynolds"] < 1e3).any():
        raise InputError(
            "flow",
            f"Re = {ledger['flow.reynolds'].min():.3g} on the length",
            "a Reynolds number of at least 1000, where a boundary layer exists",
        )


def _friction(inputs: Inputs, ledger: Ledger, laminar: Any) -> None:
    re, x, u = ledger["flow.reynolds"], ledger["flow.length"], ledger["flow.velocity"]
    law = inputs.text("flow.friction_law", "schultz-grunow")
    c_f = np.where(laminar, plate.laminar(re), _LAWS[law](re))
    name = "laminar" if laminar.all() else law.replace("-", "_")
    where = laminar if laminar.all() else ~laminar
    ledger.put("flow.skin_friction", c_f, relation("plate", name), where, reynolds="flow.reynolds")
    ledger.put(
        "flow.friction_velocity",
        u * np.sqrt(0.5 * c_f),
        relation("flow", "friction_velocity"),
        velocity="flow.velocity",
        skin_friction="flow.skin_friction",
    )
    slow, fast = (relation("plate", f"thickness_{n}") for n in ("laminar", "turbulent"))
    thick = x * np.where(laminar, plate.thickness_laminar(re), plate.thickness_turbulent(re))
    thickness = slow if laminar.all() else fast
    ledger.put(
        "flow.boundary_layer_thickness",
        thick,
        thickness,
        where,
        reynolds="flow.reynolds",
        distance="flow.length",
    )
    root = x / np.sqrt(re)
    for part in ("displacement", "momentum"):
        values = np.where(laminar, slow[part] * root, fast[part] * thick)
        ledger.put(
            f"flow.{part}_thickness",
            values,
            thickness,
            where,
            reynolds="flow.reynolds",
            distance="flow.length",
        )
