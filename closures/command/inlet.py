"""``closures inlet``: inlet values from flags, for one closure or for all."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

import click

from closures.command.options import flag, named_fluid, output_options

if TYPE_CHECKING:
    from closures.inlets import Inlet

_NUMBERS = {
    "velocity": "what the intensity refers to",
    "kinematic_viscosity": "of the fluid",
    "temperature": "of the named fluid",
    "pressure": "of the named fluid, absolute",
    "intensity": "turbulence intensity",
    "k": "turbulence kinetic energy",
    "epsilon": "dissipation rate",
    "omega": "specific dissipation rate",
    "nu_t": "eddy viscosity",
    "nu_tilde": "Spalart-Allmaras variable",
    "viscosity_ratio": "eddy viscosity over kinematic viscosity",
    "time_scale": "k/epsilon",
    "mixing_length": "C_mu^(3/4) k^(3/2)/epsilon",
    "eddy_viscosity_length": "nu_t/k^(1/2)",
    "dissipation_length": "k^(3/2)/epsilon",
    "integral_length": "longitudinal integral length",
}
_ALWAYS = ("k", "epsilon", "omega", "nu_t", "viscosity_ratio", "mixing_length",
           "eddy_viscosity_length",
           "dissipation_length", "integral_length")  # fmt: skip


def _options(function: Any) -> Any:
    for name, words in reversed(_NUMBERS.items()):
        function = click.option(flag(name), name, metavar="QUANTITY", help=words)(function)
    return function


@click.command()
@click.option(
    "--closure",
    "name",
    default="all",
    show_default=True,
    metavar="ID",
    help="Id, alias or path of a closure; all for every one.",
)
@click.option("--fluid", metavar="NAME", help="air, water, or a fluid of the property library.")
@_options
@output_options("text", "json", "csv", "markdown")
def command(name: str, fluid: str | None, form: str, output: str, **given: str | None) -> int:
    """What to set at the inlet: two independent turbulence quantities give all the others."""
    from closures.files import emit
    from closures.inlets import inlet

    numbers = {n: _si(n, v) for n, v in given.items() if v is not None}
    found_fluid = named_fluid(fluid, numbers, ("kinematic_viscosity",))
    if found_fluid is not None:
        numbers["kinematic_viscosity"] = found_fluid.kinematic_viscosity
    if name != "all":
        found = [inlet(name, **numbers)]
    else:
        found = [inlet(id_, **numbers) for id_ in _every(numbers)]
    emit({"text": _text, "json": _json, "csv": _csv, "markdown": _markdown}[form](found), output)
    return 0


def _si(name: str, value: str) -> float:
    from closures.quantities import quantity as known
    from closures.units import quantity
    from walllaw.errors import InputError

    number = quantity(value, known(name).unit, flag(name))
    if name == "intensity" and number > 1:
        raise InputError("--intensity", value, "a fraction up to 1", f'did you mean "{value} %"?')
    return number


def _every(numbers: dict[str, float]) -> list[str]:
    """Return the closures that transport something and can be had from what is given."""
    from closures.closure_list import closure_heads

    return [
        head["id"]
        for head in closure_heads()
        if head["variables"]
        and not (
            {"nu_tilde", "R"} & set(head["variables"]) and "kinematic_viscosity" not in numbers
        )
        and not ("re_theta_t" in head["variables"] and "velocity" not in numbers)
    ]


def _record(inlet: Inlet) -> dict[str, Any]:
    c = inlet.closure
    state = (
        {}
        if inlet.state is None
        else {n: getattr(inlet.state, n) for n in _ALWAYS if n in inlet.state.available()}
    )
    values = {**state, **{n: getattr(inlet, n) for n in inlet.values}}
    return {
        "closure": {
            "id": c.id,
            "name": c.name,
            "family": c.family,
            "source": c.source,
            "C_mu": c.C_mu,
        },
        "inlet": {**values, "set": inlet.set},
        "assumptions": list(inlet.notes),
    }


def _json(found: list[Inlet]) -> str:
    import json

    rows = [_record(i) for i in found]
    return json.dumps(rows[0] if len(rows) == 1 else rows, indent=2, allow_nan=False)


def _rows(found: list[Inlet]) -> list[tuple[str, str, str, str]]:
    from closures.quantities import quantity

    rows = []
    for i in found:
        record = _record(i)["inlet"]
        own = record.pop("set")
        shown = {**own, **{n: v for n, v in record.items() if len(found) == 1 and n not in own}}
        for name, value in shown.items():
            unit = quantity(name).unit
            rows.append((i.closure.id, name, repr(float(value)), "" if unit == "1" else unit))
    return rows


def _text(found: list[Inlet]) -> str:
    lines = []
    last = ""
    for id_, name, value, unit in _rows(found):
        if id_ != last:
            i = next(x for x in found if x.closure.id == id_)
            own = ", ".join(i.set)
            lines += [f"{id_}  (set: {own}; C_mu {i.closure.C_mu:.4g}; source {i.closure.source})"]
            last = id_
        lines.append(f"  {name:<24}{float(value):>14.6g}  {unit}".rstrip())
    if len(found) == 1:
        lines += [f"  {note}" for note in found[0].notes]
    return "\n".join(lines)


def _csv(found: list[Inlet]) -> str:
    import csv
    import io

    buffer = io.StringIO()
    writer = csv.writer(buffer, lineterminator="\n")
    writer.writerow(["closure", "quantity", "value", "unit"])
    writer.writerows(_rows(found))
    return buffer.getvalue()


def _markdown(found: list[Inlet]) -> str:
    head = ["| closure | quantity | value | unit |", "|---|---|---:|---|"]
    return "\n".join(
        head + [f"| {c} | {n} | {float(v):.6g} | {u} |" for c, n, v, u in _rows(found)]
    )
