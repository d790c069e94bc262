"""The flow: geometry, what drives it, Reynolds number, regime, friction, thickness."""

from __future__ import annotations

import numpy as np

from closures.inputs import Inputs
from closures.ledger import Ledger
from closures.situations import surface
from closures.steps.external import external_step
from closures.steps.internal import internal_step
from walllaw.errors import InputError
from walllaw.relation import relation

INTERNAL = ("pipe", "channel", "duct", "annulus")


def flow_step(inputs: Inputs, ledger: Ledger) -> None:
    """Enter everything about the mean flow."""
    kind = inputs.text("flow.kind")
    if not kind:
        raise InputError("flow.kind", "nothing", "pipe, channel, duct, annulus, plate, external")
    ledger.texts["flow.kind"] = kind
    _roughness(inputs, ledger)
    if kind in INTERNAL:
        internal_step(kind, inputs, ledger)
    else:
        external_step(kind, inputs, ledger)
    u, nu = ledger["flow.friction_velocity"], ledger["fluid.kinematic_viscosity"]
    if "fluid.density" in ledger:
        ledger.put(
            "flow.wall_shear_stress",
            ledger["fluid.density"] * (u * u),
            relation("flow", "wall_shear_stress"),
            density="fluid.density",
            friction_velocity="flow.friction_velocity",
        )
    ledger.put(
        "flow.re_tau",
        ledger["flow.boundary_layer_thickness"] * u / nu,
        relation("flow", "re_tau"),
        boundary_layer_thickness="flow.boundary_layer_thickness",
        friction_velocity="flow.friction_velocity",
        kinematic_viscosity="fluid.kinematic_viscosity",
    )
    if "fluid.speed_of_sound" in ledger:
        ledger.put(
            "flow.mach",
            ledger["flow.velocity"] / ledger["fluid.speed_of_sound"],
            relation("flow", "mach"),
            velocity="flow.velocity",
            speed_of_sound="fluid.speed_of_sound",
        )


def _roughness(inputs: Inputs, ledger: Ledger) -> None:
    if "flow.surface" in inputs:
        if "flow.roughness" in inputs:
            raise InputError("flow.surface", "roughness as well", "either a surface or a roughness")
        found = surface(inputs.text("flow.surface"), "flow.surface")
        ledger.texts["flow.surface"] = found.id
        ledger.put(
            "flow.roughness", np.array([found["value"]]), relation("flow", "roughness_of_surface")
        )
        ledger.cite(found.source)
    elif "flow.roughness" in inputs:
        ledger.given("flow.roughness", inputs.number("flow.roughness"))
