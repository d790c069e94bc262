"""``closures developed``: developed flow by mixing length; the friction chart."""

from __future__ import annotations

import json
import textwrap
from typing import TYPE_CHECKING, Any

import click

from closures.command.options import flag, named_fluid, output_options, range_warnings

if TYPE_CHECKING:
    from walllaw.developed_flow import DevelopedFlow

GEOMETRIES = ("pipe", "channel", "open-channel", "couette", "annulus")
_QUANTITIES = {
    "diameter": ("m", "of the pipe; outer one of the annulus"),
    "height": ("m", "of the channel or gap; depth of the open channel"),
    "roughness": ("m", "equivalent sand-grain height"),
    "bulk_velocity": ("m/s", "mean over the area; half the speed of the wall of a couette flow"),
    "volume_flow": ("m3/s", "of the pipe or annulus"),
    "pressure_gradient": ("Pa/m", "fall of pressure per length; needs a density"),
    "kinematic_viscosity": ("m2/s", "of the fluid"),
    "density": ("kg/m3", "of the fluid"),
    "temperature": ("K", "of the named fluid"),
    "pressure": ("Pa", "of the named fluid, absolute"),
}
_NUMBERS = {
    "reynolds": "on bulk velocity and hydraulic diameter",
    "re_tau": "friction Reynolds number on radius or half height",
    "relative_roughness": "equivalent sand-grain height over hydraulic diameter",
    "kappa": "von Karman constant [0.41]",
    "A_plus": "damping constant [26]",
    "prandtl": "adds the Nusselt numbers",
    "radius_ratio": "inner over outer radius of the annulus",
    "stress_ratio": "couette with a pressure gradient: stress at the moving wall over the other's",
}
_FLOW = "--reynolds, --re-tau, or a size, a viscosity and --bulk-velocity or the like"
_FAMILY = (0.0, 1e-5, 1e-4, 1e-3, 1e-2)


def _options(function: Any) -> Any:
    for name, help_text in reversed(_NUMBERS.items()):
        function = click.option(flag(name), name, type=float, help=help_text)(function)
    for name, (_, help_text) in reversed(_QUANTITIES.items()):
        function = click.option(flag(name), name, metavar="QUANTITY", help=help_text)(function)
    return function


@click.command()
@click.argument("geometry", default="pipe")
@click.option("--mixing-length", default=None, metavar="NAME",
              help="nikuradse, linear, escudier, cess or laminar.")  # fmt: skip
@click.option("--roughness-model", default="colebrook", show_default=True, metavar="NAME",
              help="colebrook, nikuradse or cebeci-chang.")  # fmt: skip
@click.option("--damping", default="van-driest", show_default=True, metavar="NAME",
              help="van-driest or cebeci (with the pressure gradient).")  # fmt: skip
@click.option("--fluid", metavar="NAME", help="air, water, or a fluid of the property library.")
@click.option("--moody", is_flag=True, help="Friction of pipes against Re for a family of k_s/D.")
@_options
@output_options("text", "csv", "json", "markdown", "svg", "png")
def command(
    geometry: str, mixing_length: str | None, roughness_model: str, damping: str,
    fluid: str | None, moody: bool, form: str, output: str, **given: Any,
) -> int:  # fmt: skip
    """Fully developed flow in GEOMETRY by mixing length; the profile with csv, json, svg or png.

    GEOMETRY is one of pipe, channel, open-channel, couette, annulus.

    The flow by --reynolds or --re-tau, or by a size (--diameter, --height), a viscosity and one of
    --bulk-velocity, --volume-flow, --pressure-gradient. In pipes, --mixing-length cess with --kappa
    0.421 --A-plus 27.316 keeps within 1 % of McKeon et al. 2005 in friction from Re 3e4 to 1e8; in
    channels nikuradse keeps within 1.2 % of direct simulations.
    """
    from closures.files import emit, emit_bytes
    from walllaw.errors import unknown_name

    if geometry not in GEOMETRIES:
        raise unknown_name("geometry", geometry, GEOMETRIES)
    asked = {n: v for n, v in given.items() if v is not None}
    length = mixing_length or ("linear" if geometry == "couette" else "nikuradse")
    closing = {"mixing_length": length, "damping": damping}
    closing |= {n: asked.pop(n) for n in ("kappa", "A_plus") if n in asked}
    closing["roughness_model"] = roughness_model
    with range_warnings():
        amounts = _si(asked, fluid)
        if moody:
            content = _moody(geometry, amounts, closing, form)
        elif geometry == "annulus" or "stress_ratio" in asked:
            from closures.command.two_walls import two_walls

            content = two_walls(geometry, amounts, closing, form)
        else:
            content = _passage(geometry, amounts, closing, form)
    if isinstance(content, bytes):
        emit_bytes(content, output)
    else:
        emit(content, output)
    return 0


def _si(asked: dict[str, Any], name: str | None) -> dict[str, float]:
    from closures.units import quantity

    amounts = {
        n: quantity(v, _QUANTITIES[n][0], n) if n in _QUANTITIES else v for n, v in asked.items()
    }
    found = named_fluid(name, amounts, ("kinematic_viscosity", "density"))
    if found is not None:
        amounts["kinematic_viscosity"] = float(found.kinematic_viscosity)
        amounts["density"] = float(found.density)
    return amounts


def refuse(amounts: dict[str, Any], subject: str) -> None:
    """Refuse flags that nothing has used."""
    from walllaw.errors import InputError

    if amounts:
        raise InputError(flag(next(iter(amounts))), f"a flag that {subject} does not take", "none")


def _passage(
    geometry: str, amounts: dict[str, float], closing: dict[str, Any], form: str
) -> str | bytes:
    """Solve one passage and return it in the wanted form."""
    from walllaw.developed_flow import developed
    from walllaw.errors import InputError
    from walllaw.flow_drive import driven

    length = amounts.pop("diameter" if geometry == "pipe" else "height", None)
    if length is not None and not 0.0 < length < 1e30:
        name = "--diameter" if geometry == "pipe" else "--height"
        raise InputError(name, f"{length:g}", "a length above 0")
    nu, density = amounts.pop("kinematic_viscosity", None), amounts.pop("density", None)
    prandtl = amounts.pop("prandtl", None)
    size = None if length is None else length * (1.0 if geometry == "open-channel" else 0.5)
    drives: dict[str, Any] = {
        n: amounts.pop(n) for n in ("bulk_velocity", "volume_flow", "pressure_gradient")
        if n in amounts
    }  # fmt: skip
    numbers: dict[str, Any] = {n: amounts.pop(n) for n in ("reynolds", "re_tau") if n in amounts}
    if "volume_flow" in drives and geometry != "pipe":
        raise InputError("--volume-flow", f"a {geometry}, whose width is not known", "pipe")
    if drives:
        if numbers:
            raise InputError(flag(next(iter(numbers))), f"{flag(next(iter(drives)))} too", "one")
        if size is None or nu is None:
            missing = "--diameter or --height" if size is None else "--fluid or a viscosity"
            raise InputError(flag(next(iter(drives))), "no more", f"{missing} with it")
        if "pressure_gradient" in drives:
            if density is None:
                raise InputError("--pressure-gradient", "no density", "--density or --fluid")
            drives["kinematic_pressure_gradient"] = drives.pop("pressure_gradient") / density
        numbers = driven(geometry, size, nu, **drives)
    elif len(numbers) != 1:
        raise InputError("--reynolds", "no flow" if not numbers else "--re-tau too", _FLOW)
    if "roughness" in amounts:
        if size is None:
            raise InputError("--roughness", "no size", "--diameter or --height with it")
        hydraulic = size * (2.0 if geometry == "pipe" else 4.0)
        if "relative_roughness" in amounts:
            raise InputError("--roughness", "a relative roughness as well", "one of the two")
        amounts["relative_roughness"] = amounts.pop("roughness") / hydraulic
    rough = amounts.pop("relative_roughness", 0.0)
    refuse(amounts, f"a {geometry} flow")
    flow = developed(geometry, **numbers, relative_roughness=rough, **closing)
    if form in ("svg", "png"):
        from closures import pictures

        return pictures.developed_flow(flow, form)
    scale = None if size is None or nu is None else (size, flow.si(size, nu)["friction_velocity"])
    return _written(flow, _summary(flow, size, nu, density, prandtl), rough, form, scale)


def _summary(
    flow: DevelopedFlow, size: float | None, nu: float | None, density: float | None,
    prandtl: float | None,
) -> dict[str, tuple[float, str]]:  # fmt: skip
    """Return name -> (value, unit)."""
    beta, alpha = flow.flux_coefficients()
    found: dict[str, tuple[float, str]] = {
        "reynolds": (flow.reynolds, "1"),
        "re_tau": (flow.re_tau, "1"),
        "darcy_friction": (flow.darcy_friction, "1"),
        "skin_friction": (flow.skin_friction, "1"),
        "bulk_u_plus": (flow.bulk_u_plus, "1"),
        "centreline_u_plus": (flow.centreline_u_plus, "1"),
        "centreline_ratio": (flow.centreline_ratio, "1"),
        "momentum_flux_coefficient": (beta, "1"),
        "energy_flux_coefficient": (alpha, "1"),
    }
    if flow.re_tau > 2000.0 and flow.mixing_length != "laminar":
        kappa, intercept = flow.log_law()
        found |= {"fitted_kappa": (kappa, "1"), "fitted_B": (intercept, "1")}
    if prandtl is not None:
        flux, temperature = flow.nusselt(prandtl)
        found["nusselt_uniform_flux"] = (flux, "1")
        found["nusselt_uniform_temperature"] = (temperature, "1")
    if size is not None and nu is not None:
        si = flow.si(size, nu)
        units = {"volume_flow": "m3/s" if flow.geometry == "pipe" else "m2/s",
                 "kinematic_pressure_gradient": "m/s2", "wall_strain_rate": "1/s"}  # fmt: skip
        found |= {n: (v, units.get(n, "m/s")) for n, v in si.items()}
        if density is not None:
            gradient = si["kinematic_pressure_gradient"] * density
            stress = si["friction_velocity"] ** 2 * density
            found |= {"pressure_gradient": (gradient, "Pa/m"), "wall_shear_stress": (stress, "Pa")}
    return found


def _written(
    flow: DevelopedFlow, summary: dict[str, tuple[float, str]], rough: float, form: str,
    scale: tuple[float, float] | None,
) -> str:  # fmt: skip
    import numpy as np

    if form in ("text", "markdown"):
        head = (
            f"developed {flow.geometry} flow, mixing length {flow.mixing_length}, "
            f"kappa {flow.kappa:g}, A+ {flow.A_plus:g}"
        )
        return table(
            head + (f", k_s/D_h {rough:g}" if rough else ""), summary, form, flow.mixing_length
        )
    profile = flow.profiles()
    # panels that a small Re_tau does not need repeat a node
    keep = np.concatenate([[True], np.diff(profile["eta"]) > 0.0])
    if scale is not None:
        size, friction_velocity = scale
        profile["wall_distance"] = size * profile["eta"]
        profile["velocity"] = friction_velocity * profile["u_plus"]
    columns = {n: v[keep].tolist() for n, v in profile.items()}
    data = {
        "geometry": flow.geometry, "mixing_length": flow.mixing_length, "kappa": flow.kappa,
        "A_plus": flow.A_plus, "relative_roughness": rough,
    }  # fmt: skip
    return columns_and_summary(columns, data, summary, form)


def columns_and_summary(
    columns: dict[str, list[float]], head: dict[str, Any], summary: dict[str, tuple[float, str]],
    form: str,
) -> str:  # fmt: skip
    """Return a profile as csv, or with its summary as json; SI where a name has no wall unit."""
    if form == "csv":
        rows = zip(*columns.values(), strict=True)
        return "\n".join([",".join(columns), *(",".join(map(repr, row)) for row in rows)])
    data = {
        **head,
        "summary": {n: {"value": v, "unit": u} for n, (v, u) in summary.items()},
        "profile": columns,
    }
    return json.dumps(data, indent=1, allow_nan=False)


def table(head: str, summary: dict[str, tuple[float, str]], form: str, length: str) -> str:
    """Return a summary as text or markdown, with the evidence of the mixing length."""
    from closures.command import CAUTION

    tail = [_evidence(length), CAUTION]
    shown = {n: (f"{v:.6g}", "" if u == "1" else u) for n, (v, u) in summary.items()}
    if form == "markdown":
        lines = [head, "", "| quantity | value | unit |", "|---|---:|---|"]
        lines += [f"| {n} | {v} | {u} |" for n, (v, u) in shown.items()]
        return "\n".join([*lines, "", "\n\n".join(tail)])
    lines = [head, *(f"  {n:<30}{v:>14}  {u}".rstrip() for n, (v, u) in shown.items())]
    return "\n".join(lines + [line for t in tail for line in textwrap.wrap(t, 80)])


def _evidence(length: str) -> str:
    from walllaw.relation import relation

    if length == "laminar":
        return "Exact laminar flow."
    r = relation("mixing_length", length)
    low, high = r.valid["reynolds"]
    return f"{r.title} (source {r.source}, {r.status}); Re {low:g} to {high:g}."


def _moody(geometry: str, asked: dict[str, Any], closing: dict[str, Any], form: str) -> str | bytes:
    """Return friction against Re for a family of roughnesses, with Colebrook-White beside it."""
    import numpy as np

    from walllaw import friction
    from walllaw.developed_flow import developed
    from walllaw.errors import InputError

    if geometry != "pipe":
        raise InputError("--moody", geometry, "pipe")
    refuse(asked, "the chart")
    re, rough = np.geomspace(1e4, 1e8, 41), np.array(_FAMILY)
    found = developed("pipe", reynolds=re[:, np.newaxis], relative_roughness=rough, **closing)
    colebrook = friction.colebrook(re[:, np.newaxis], rough)
    if form in ("svg", "png"):
        from closures import pictures

        return pictures.friction_chart(re, rough, found.darcy_friction, colebrook, form)
    names = ("reynolds", "relative_roughness", "darcy_friction", "colebrook")
    table = np.broadcast_arrays(re[:, np.newaxis], rough, found.darcy_friction, colebrook)
    rows = np.stack([c.reshape(-1) for c in table], axis=1).tolist()
    if form == "json":
        data = {**closing, **{n: [r[i] for r in rows] for i, n in enumerate(names)}}
        return json.dumps(data, indent=1, allow_nan=False)
    if form == "csv":
        return "\n".join([",".join(names), *(",".join(map(repr, r)) for r in rows)])
    if form == "markdown":
        body = [f"| {' | '.join(f'{v:.6g}' for v in r)} |" for r in rows]
        return "\n".join([f"| {' | '.join(names)} |", "|---:|---:|---:|---:|", *body])
    return "\n".join(
        ["".join(f"{n:>19}" for n in names), *("".join(f"{v:>19.6g}" for v in r) for r in rows)]
    )
