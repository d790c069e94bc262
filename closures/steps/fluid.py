"""The fluid: properties by name or as given."""

from __future__ import annotations

import numpy as np

from closures import fluids
from closures.inputs import Inputs
from closures.ledger import Ledger
from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.relation import relation

_AIR = {"density": "air_density", "dynamic_viscosity": "air_viscosity",
        "thermal_conductivity": "air_conductivity"}  # fmt: skip
_WATER = {"density": "water_density", "dynamic_viscosity": "water_viscosity"}


def fluid_step(inputs: Inputs, ledger: Ledger) -> None:
    """Enter the properties of the fluid."""
    given = inputs.given("fluid")
    if not given:
        raise InputError("fluid", "nothing", "the name of a fluid, or its properties")
    name = inputs.text("fluid.name") or None
    numbers = {n: inputs.number(f"fluid.{n}") for n in given if n != "name"}
    try:
        found = fluids.fluid(name, **numbers)
    except InputError as error:
        field = error.field if error.field.startswith("fluid") else f"fluid.{error.field}"
        raise InputError(field, error.given, error.accepted, error.hint) from None
    ledger.texts["fluid.name"] = found.name
    for quantity, values in found.properties().items():
        path, flat = f"fluid.{quantity}", np.atleast_1d(np.asarray(values, dtype=np.float64))
        if quantity in numbers:
            ledger.given(path, flat)
        elif quantity == "kinematic_viscosity" and "fluid.density" in ledger:
            ledger.put(
                path,
                flat,
                relation("flow", "kinematic_viscosity"),
                dynamic_viscosity="fluid.dynamic_viscosity",
                density="fluid.density",
            )
        elif found.name in ("air", "water"):
            _built_in(ledger, found.name, path, quantity, flat)
        elif found.relations:
            ledger.put(
                path,
                flat,
                found.relations[0],
                temperature="fluid.temperature",
                pressure="fluid.pressure",
            )
        else:
            ledger.given(path, flat, "from the given properties")
    if "fluid.altitude" in inputs:
        ledger.notes.append("temperature and pressure of the standard atmosphere at the altitude")
        ledger.cite("iso-2533-1975")


def _built_in(ledger: Ledger, name: str, path: str, quantity: str, flat: Floats) -> None:
    if quantity in ("temperature", "pressure"):
        ledger.given(path, flat, "usual value, or of the standard atmosphere")
        return
    row = (_AIR if name == "air" else _WATER).get(quantity, "air_heat")
    ledger.put(
        path,
        flat,
        relation("fluids", row),
        temperature="fluid.temperature",
        pressure="fluid.pressure",
    )
