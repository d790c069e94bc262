"""The incoming turbulence: two quantities, or an estimate, and the closure's inlet values."""

from __future__ import annotations

from fractions import Fraction

import numpy as np

from closures.case import Multiple
from closures.closure_tables import Closure
from closures.inlets import VISCOSITY_ONLY, Inlet, inlet
from closures.inputs import Inputs
from closures.ledger import Ledger
from closures.monomials import plan
from closures.quantities import quantity
from closures.situations import usual_intensity, usual_length
from closures.states import INPUTS
from walllaw.arrays import Floats
from walllaw.errors import InputError
from walllaw.relation import Relation, relation

_SHOWN = (
    "k",
    "epsilon",
    "omega",
    "nu_t",
    "nu_tilde",
    "viscosity_ratio",
    "time_scale",
    "mixing_length",
    "eddy_viscosity_length",
    "dissipation_length",
    "integral_length",
)
_SCALES = ("kolmogorov_length", "kolmogorov_time", "kolmogorov_velocity", "taylor_length",
           "rms_velocity", "re_lambda", "turbulence_reynolds")  # fmt: skip
# what a length may be a multiple of -> where it stands in the ledger
_LENGTHS = {
    "hydraulic_diameter": "flow.hydraulic_diameter", "diameter": "flow.diameter",
    "height": "flow.height", "gap": "flow.passage", "short_side": "flow.passage",
    "length": "flow.length", "chord": "flow.length",
    "boundary_layer_thickness": "flow.boundary_layer_thickness",
}  # fmt: skip


def _multiple(path: str, multiple: Multiple, ledger: Ledger) -> Floats:
    base = _LENGTHS.get(multiple.of, "")
    internal = "flow.passage" in ledger
    if base not in ledger or (multiple.of in ("chord", "length") and internal):
        kind = ledger.texts["flow.kind"]
        usable = [
            n for n, p in _LENGTHS.items() if p in ledger and not (internal and p == "flow.length")
        ]
        raise InputError(
            path, f"a multiple of {multiple.of}, which a {kind} does not have", ", ".join(usable)
        )
    return multiple.times * ledger[base]


def _given(inputs: Inputs, ledger: Ledger) -> dict[str, Floats]:
    found = {}
    for name in inputs.given("turbulence"):
        path = f"turbulence.{name}"
        if name not in INPUTS:
            continue
        multiple = inputs.multiple(path)
        found[name] = _multiple(path, multiple, ledger) if multiple else inputs.number(path)
        if multiple:
            ledger.notes.append(
                f"{name} = {multiple.times:g} x {multiple.of}, as the case gives it"
            )
    return found


def _developed(ledger: Ledger) -> dict[str, Floats]:
    if "flow.passage" not in ledger:
        raise InputError(
            "turbulence.estimate", "developed, for an external flow", "a situation of the table"
        )
    r = relation("inlet", "core_intensity")
    re = ledger["flow.reynolds"]
    length = usual_length(
        "developed-pipe" if ledger.texts["flow.kind"] == "pipe" else "developed-gap"
    )
    ledger.notes.append(f"intensity of developed flow: {r.formula} ({r.status})")
    ledger.notes.append(
        f"mixing length of developed flow: {length['times']:g} x {length.of} ({length.source})"
    )
    ledger.cite(length.source)
    return {
        "intensity": r["factor"] / np.sqrt(np.sqrt(np.sqrt(re))),
        "mixing_length": length["times"] * ledger[_LENGTHS[length.of]],
    }


def _estimates(inputs: Inputs, ledger: Ledger) -> dict[str, Floats]:
    found: dict[str, Floats] = {}
    name = inputs.text("turbulence.estimate")
    if name:
        ledger.texts["turbulence.estimate"] = name
    if name == "developed":
        found |= _developed(ledger)
    elif name:
        try:
            usual = usual_intensity(name, "turbulence.estimate")
        except InputError as error:
            from walllaw import tables
            from walllaw.errors import unknown_name

            rows = tables.read("intensities.toml")
            raise unknown_name(
                error.field, name, ["developed", *rows], "developed, " + ", ".join(rows)
            ) from None
        found["intensity"] = np.array([usual["value"]])
        ledger.notes.append(
            f"intensity {100 * usual['value']:.3g} % estimated for: {usual.title}"
            f" (usual range {100 * usual['low']:.3g} to {100 * usual['high']:.3g} %;"
            f" {usual.source})"
        )
        ledger.cite(usual.source)
    if "turbulence.length_estimate" in inputs:
        length = usual_length(
            inputs.text("turbulence.length_estimate"), "turbulence.length_estimate"
        )
        multiple = Multiple(length["times"], length.of)
        found[length.convention] = _multiple("turbulence.length_estimate", multiple, ledger)
        ledger.notes.append(
            f"{length.convention} = {length['times']:g} x {length.of}: {length.title}"
            f" ({length.source})"
        )
        ledger.cite(length.source)
    return found


def _quantities(inputs: Inputs, ledger: Ledger, c: Closure) -> dict[str, Floats]:
    given, estimated = _given(inputs, ledger), _estimates(inputs, ledger)
    both = set(given) & set(estimated)
    if both:
        raise InputError("turbulence", f"{both.pop()} given and estimated", "one of the two")
    found = {**given, **estimated}
    if len(found) == 1 and c.variables and set(c.variables) <= VISCOSITY_ONLY:
        return found
    if len(found) != 2:
        raise InputError(
            "turbulence",
            ", ".join(found) or "nothing",
            f"exactly two independent quantities of {', '.join(INPUTS)}, or an estimate",
        )
    return found


def monomial_relation(name: str, pair: tuple[str, str]) -> Relation:
    """Return the relation that gives a quantity of the state from the pair that was given."""
    q = quantity(name)

    def power(base: str, p: Fraction) -> str:
        return (
            base if p == 1 else f"{base}^{p}" if p.denominator == 1 and p > 0 else f"{base}^({p})"
        )

    formula = " ".join(power(b, p) for b, p in plan(name, *pair))
    return Relation(f"state.{name}", q.words, f"{q.symbol} = {formula}", q.unit, q.source, "memory")


def turbulence_step(inputs: Inputs, ledger: Ledger, c: Closure) -> None:
    """Enter the state at the inlet, the closure's own set, and the scales of turbulence."""
    given = _quantities(inputs, ledger, c)
    nu, u = ledger["fluid.kinematic_viscosity"], ledger["flow.velocity"]
    try:
        result = inlet(c, velocity=u, kinematic_viscosity=nu, **given)
    except InputError as error:
        field = error.field if error.field.startswith("turbulence") else f"turbulence.{error.field}"
        raise InputError(field, error.given, error.accepted, error.hint) from None
    ledger.given("inlet.velocity", u, "velocity of the flow")
    if result.state is None:
        for name, values in result.values.items():
            ledger.given(f"inlet.{name}", values, "from the eddy viscosity")
    else:
        _state(result, given, ledger)
    for name, values in result.flat_set.items():
        ledger.given(f"inlet.set.{name}", values, "the closure's own variable")
    ledger.notes.extend(result.notes)


def _state(result: Inlet, given: dict[str, Floats], ledger: Ledger) -> None:
    s = result.state
    if s is None:
        return
    paths = {
        "kinematic_viscosity": "fluid.kinematic_viscosity", "velocity": "flow.velocity",
        **{n: f"inlet.{n}" for n in given},
    }  # fmt: skip
    for name in ("intensity", *_SHOWN):
        values = s.flat(name)
        if name in given:
            ledger.given(f"inlet.{name}", values)
        elif name == "nu_tilde":
            ledger.put(
                "inlet.nu_tilde",
                values,
                relation("state", "spalart_allmaras_f_v1"),
                viscosity_ratio="inlet.viscosity_ratio",
            )
        else:
            ledger.put(
                f"inlet.{name}",
                values,
                monomial_relation(name, s.given),
                None,
                **{b: paths[b] for b, _ in plan(name, *s.given) if b in paths},
            )
    for name in _SCALES:
        ledger.put(
            f"scales.{name}",
            s.flat(name),
            monomial_relation(name, s.given),
            None,
            **{b: paths[b] for b, _ in plan(name, *s.given) if b in paths},
        )
