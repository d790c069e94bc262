"""The wall: first cell, layers, window of y+, and the values at the wall and in the first cell."""

from __future__ import annotations

from typing import Any

import numpy as np

from closures.closure_tables import Closure
from closures.inputs import Inputs
from closures.ledger import Ledger
from walllaw import near_wall_omega, roughness, wall_function
from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.layer_stack import Layers, layers
from walllaw.log_law_constants import LogLawPair, log_law_pair
from walllaw.relation import relation

_DEFAULT_PAIR = "coles-hirst-1968"


def wall_step(inputs: Inputs, ledger: Ledger, c: Closure) -> None:
    """Enter everything about the wall."""
    if not c.treatments:
        return
    treatment = inputs.text("wall.treatment", c.treatments[0])
    ledger.texts["wall.treatment"] = treatment
    ledger.texts["closure.treatments"] = ", ".join(c.treatments)
    pair = _pair(inputs)
    stack = _stack_without_first(inputs)
    _first_cell(inputs, ledger, c, treatment, stack)
    _layers(inputs, ledger, stack)
    _window(ledger, c, treatment)
    if "flow.roughness" in ledger:
        ledger.put(
            "wall.roughness_plus",
            ledger["flow.roughness"]
            * ledger["flow.friction_velocity"]
            / ledger["fluid.kinematic_viscosity"],
            relation("flow", "roughness_plus"),
            roughness="flow.roughness",
            friction_velocity="flow.friction_velocity",
            kinematic_viscosity="fluid.kinematic_viscosity",
        )
    if treatment == "wall-function":
        _wall_function(ledger, c, pair)
    else:
        _resolved(ledger, c, treatment)


def _stack_without_first(inputs: Inputs) -> dict[str, Floats]:
    """Return growth, count and total as far as they are given."""
    names = {"growth": "growth", "layers": "count", "total_thickness": "total"}
    found = {n: inputs.number(f"wall.{key}") for key, n in names.items() if f"wall.{key}" in inputs}
    first = [n for n in ("y_plus", "first_cell_height") if f"wall.{n}" in inputs]
    if len(first) == 2:
        raise InputError("wall", "y_plus and first_cell_height", "one of the two")
    if len(found) == 3 and first:
        raise InputError(
            "wall", f"{first[0]}, growth, layers and total_thickness", "any three of them"
        )
    return found


def _complete(given: dict[str, Floats]) -> Layers:
    values: dict[str, Any] = dict(given)
    try:
        return layers(**values)
    except InputError as error:
        raise InputError(
            f"wall.layers: {error.field}", error.given, error.accepted, error.hint
        ) from None


def _first_cell(
    inputs: Inputs, ledger: Ledger, c: Closure, treatment: str, stack: dict[str, Floats]
) -> None:
    nu, u_tau = ledger["fluid.kinematic_viscosity"], ledger["flow.friction_velocity"]
    at_node = inputs.text("wall.first_unknown", "centre") == "node"
    factor = 1.0 if at_node else 2.0
    if at_node:
        ledger.notes.append(
            "first unknown at the first node: its distance is the height of the cell"
        )
    paths = {
        "friction_velocity": "flow.friction_velocity",
        "kinematic_viscosity": "fluid.kinematic_viscosity",
    }
    height = None
    if len(stack) == 3:
        height = np.atleast_1d(_complete(stack).first)
    elif "wall.first_cell_height" in inputs:
        height = inputs.number("wall.first_cell_height")
    if height is not None:
        centre = height / factor
        ledger.given("wall.first_cell_height", height)
        ledger.put(
            "wall.first_cell_centre",
            centre,
            relation("flow", "first_cell_height"),
            first_cell_height="wall.first_cell_height",
        )
        ledger.put(
            "wall.y_plus",
            centre * u_tau / nu,
            relation("flow", "y_plus"),
            first_cell_centre="wall.first_cell_centre",
            **paths,
        )
        return
    ledger.given("wall.y_plus", _target(inputs, ledger, c, treatment))
    centre = ledger.put(
        "wall.first_cell_centre",
        ledger["wall.y_plus"] * nu / u_tau,
        relation("flow", "first_cell_centre"),
        y_plus="wall.y_plus",
        **paths,
    )
    ledger.put(
        "wall.first_cell_height",
        factor * centre,
        relation("flow", "first_cell_height"),
        first_cell_centre="wall.first_cell_centre",
    )


def _target(inputs: Inputs, ledger: Ledger, c: Closure, treatment: str) -> Floats:
    if "wall.y_plus" in inputs:
        return inputs.number("wall.y_plus")
    r = relation("wall_sheet", "default_y_plus")
    values = {"resolved": float(c.wall.get("y_plus_max", "1")), "wall-function": r["wall_function"],
              "blended": r["blended"]}  # fmt: skip
    ledger.notes.append(f"target y+ = {values[treatment]:g} for treatment {treatment} ({r.status})")
    return np.array([values[treatment]])


def _layers(inputs: Inputs, ledger: Ledger, stack: dict[str, Floats]) -> None:
    given = dict(stack)
    if len(given) < 2 and "flow.passage" not in ledger and "count" not in given:
        r = relation("wall_sheet", "default_stack")
        given.setdefault("growth", np.array([r["growth"]]))
        given.setdefault("total", r["share"] * ledger["flow.boundary_layer_thickness"])
        ledger.notes.append(f"layer stack: {r.formula} where the case leaves it open ({r.status})")
    if len(given) == 3:
        found = _complete(given)
    elif len(given) == 2:
        found = _complete({"first": ledger["wall.first_cell_height"], **given})
    else:
        if given:
            ledger.notes.append("no layer stack: it needs two of growth, layers, total_thickness")
        return
    rel = relation("wall_sheet", "layers")
    for name in ("first", "growth", "count", "total", "last"):
        ledger.put(
            f"wall.layers.{name}",
            np.atleast_1d(getattr(found, name)),
            rel,
            first="wall.first_cell_height",
        )
    if "count" not in given:
        ledger.notes.append(
            "number of layers rounded up; the growth was adjusted to keep the height"
        )


def _window(ledger: Ledger, c: Closure, treatment: str) -> None:
    rel, re_tau = relation("wall_sheet", "window"), ledger["flow.re_tau"]
    if treatment == "resolved":
        high = np.array([float(c.wall.get("y_plus_max", "1"))])
    else:
        r = relation("review", f"y_plus_{treatment.replace('-', '_')}")
        high = np.minimum(r["high"], r["outer"] * re_tau)
        if treatment == "wall-function":
            ledger.put("wall.y_plus_low", np.array([r["low"]]), rel)
    ledger.put("wall.y_plus_high", high, rel, re_tau="flow.re_tau")


def _pair(inputs: Inputs) -> LogLawPair:
    try:
        return log_law_pair(inputs.text("wall.log_law", _DEFAULT_PAIR))
    except InputError as error:
        raise InputError("wall.log_law", error.given, error.accepted, error.hint) from None


def _wall_function(ledger: Ledger, c: Closure, pair: LogLawPair) -> None:
    ledger.notes.append(
        f"log law {pair.name}: kappa = {pair.kappa:g}, B = {pair.B:.4g}, E = {pair.E:.4g}"
        f" ({pair.source})"
    )
    ledger.cite(pair.source)
    y_plus, u_tau = ledger["wall.y_plus"], ledger["flow.friction_velocity"]
    y, nu = ledger["wall.first_cell_centre"], ledger["fluid.kinematic_viscosity"]
    crossing = np.array([wall_function.intersection(pair.kappa, pair.B)])
    ledger.put("wall.y_plus_intersection", crossing, relation("wall_function", "intersection"))
    u_plus = np.where(y_plus > crossing, np.log(y_plus) / pair.kappa + pair.B, y_plus)
    paths = {"y_plus": "wall.y_plus"}
    if "wall.roughness_plus" in ledger:
        shift = np.atleast_1d(roughness.grigson(ledger["wall.roughness_plus"], pair.kappa, pair.B))
        ledger.put(
            "wall.roughness_function",
            shift,
            relation("roughness", "grigson"),
            roughness_plus="wall.roughness_plus",
        )
        u_plus = np.maximum(u_plus - shift, 1e-3 * y_plus)
        paths["roughness_function"] = "wall.roughness_function"
    ledger.put("wall.u_plus", u_plus, relation("wall_sheet", "u_plus_log"), **paths)
    if c.family in ("algebraic", "one-equation"):
        return
    smooth = np.where(y_plus > crossing, np.log(y_plus) / pair.kappa + pair.B, y_plus)
    cell = wall_function.from_velocity(
        smooth * u_tau, y, nu, kappa=pair.kappa, B=pair.B, C_mu=c.C_mu
    )
    rel = relation("wall_function", "friction_velocity")
    for name in ("k", "epsilon", "omega", "nu_t", "production"):
        ledger.put(
            f"wall.set.{name}",
            np.atleast_1d(getattr(cell, name)),
            rel,
            None,
            friction_velocity="flow.friction_velocity",
            first_cell_centre="wall.first_cell_centre",
        )
    ledger.put("wall.set.wall_viscosity", u_tau * y / u_plus, rel, None, u_plus="wall.u_plus")
    ledger.notes.append("first cell in equilibrium: production equals dissipation in the log layer")


_ZERO = {"k", "epsilon_tilde", "nu_tilde", "v2", "zeta", "tau", "R", "turbulent_k", "laminar_k"}


def _resolved(ledger: Ledger, c: Closure, treatment: str) -> None:
    for variable, row in c.wall.get("conditions", {}).items():
        rule, formula = row["rule"], row.get("formula", "")
        if rule == "zero" and variable in _ZERO:
            ledger.given(f"wall.set.{variable}", np.zeros(1), "wall condition of the closure")
        elif rule in ("viscous-omega", "viscous-omega-10x"):
            _omega(ledger, c, rule, treatment)
        else:
            ledger.notes.append(
                f"{variable} at the wall: {rule.replace('-', ' ')} {formula}".strip()
            )


def _omega(ledger: Ledger, c: Closure, rule: str, treatment: str) -> None:
    beta = c["inner.beta"] if "inner.beta" in c.coefficients else c["beta"]
    y, nu = ledger["wall.first_cell_centre"], ledger["fluid.kinematic_viscosity"]
    paths = {
        "distance": "wall.first_cell_centre",
        "kinematic_viscosity": "fluid.kinematic_viscosity",
    }
    viscous = np.atleast_1d(near_wall_omega.omega_viscous(y, nu, beta=beta))
    ledger.put("wall.set.omega", viscous, relation("wall_function", "omega_viscous"), None, **paths)
    if rule == "viscous-omega-10x":
        ten = np.atleast_1d(near_wall_omega.omega_wall(y, nu, beta=beta))
        ledger.put("wall.omega_wall", ten, relation("wall_function", "omega_wall"), None, **paths)
        ledger.notes.append(
            "omega_wall is put on the wall itself; the first cell holds a tenth of it"
        )
    if treatment == "blended":
        ledger.notes.append("blended treatment: the values are those of the viscous end")
