"""``closures developed`` between unlike walls: annulus, Couette flow with a pressure gradient."""

from __future__ import annotations

from typing import Any

import numpy as np

from closures.command.developed import columns_and_summary, refuse, table
from walllaw.errors import InputError
from walllaw.two_wall_flow import (
    AnnulusFlow,
    CouettePoiseuilleFlow,
    annulus_flow,
    couette_poiseuille_flow,
)

_ANNULUS = ("radius_ratio", "reynolds", "re_tau", "darcy_friction", "bulk_u_plus",
            "zero_stress_radius", "stress_ratio", "peak_ratio")  # fmt: skip
_COUETTE = ("stress_ratio", "reynolds", "re_tau", "bulk_u_plus", "wall_u_plus",
            "pressure_gradient_plus")  # fmt: skip


def two_walls(
    geometry: str, amounts: dict[str, Any], closing: dict[str, Any], form: str
) -> str | bytes:
    """Solve the flow and return it in the wanted form."""
    if geometry not in ("annulus", "couette"):
        raise InputError("--stress-ratio", geometry, "couette")
    solve = _annulus if geometry == "annulus" else _couette
    flow, si, names, rough = solve(amounts, closing)
    refuse(amounts, f"{geometry} flow between unlike walls")
    summary = {n: (float(getattr(flow, n)), "1") for n in names} | si
    head = f"developed {geometry} flow, mixing length {closing['mixing_length']}"
    if form in ("text", "markdown"):
        shown = head + (f", k_s/D_h {rough:g}" if rough else "")
        return table(shown, summary, form, closing["mixing_length"])
    profile = flow.profiles()
    if form in ("svg", "png"):
        from closures import pictures

        return pictures.two_wall_flow(profile, f"{head}: Re = {flow.reynolds:.4g}", form)
    # panels that a small Re_tau does not need repeat a node
    keep = np.concatenate([[True], np.diff(profile["place"]) > 0.0])
    if "gap" in si:
        profile["wall_distance"] = si["gap"][0] * profile["place"]
        profile["si_velocity"] = si["bulk_velocity"][0] * profile["velocity"]
    columns = {n: v[keep].tolist() for n, v in profile.items()}
    data = {"geometry": geometry, **closing, "relative_roughness": rough}
    return columns_and_summary(columns, data, summary, form)


_Solved = tuple[
    AnnulusFlow | CouettePoiseuilleFlow, dict[str, tuple[float, str]], tuple[str, ...], float
]


def _length(amounts: dict[str, Any], name: str) -> float | None:
    value: float | None = amounts.pop(name, None)
    if value is not None and not 0.0 < value < 1e30:
        raise InputError(f"--{name}", f"{value:g}", "a length above 0")
    return value


def _roughness(amounts: dict[str, Any], hydraulic: float | None) -> float:
    if "roughness" not in amounts:
        return float(amounts.pop("relative_roughness", 0.0))
    if "relative_roughness" in amounts:
        raise InputError("--roughness", "a relative roughness as well", "one of the two")
    if hydraulic is None:
        raise InputError("--roughness", "no size", "--diameter or --height with it")
    return float(amounts.pop("roughness") / hydraulic)


def _annulus(amounts: dict[str, Any], closing: dict[str, Any]) -> _Solved:
    ratio = amounts.pop("radius_ratio", None)
    if ratio is None:
        raise InputError("--radius-ratio", "nothing", "inner over outer radius")
    diameter, nu = _length(amounts, "diameter"), amounts.pop("kinematic_viscosity", None)
    amounts.pop("density", None)
    numbers = {n: amounts.pop(n) for n in ("reynolds", "re_tau") if n in amounts}
    drives = {n: amounts.pop(n) for n in ("bulk_velocity", "volume_flow") if n in amounts}
    gap = None if diameter is None else 0.5 * diameter * (1.0 - ratio)
    area = 0.0 if diameter is None else 0.25 * np.pi * diameter * diameter * (1.0 - ratio * ratio)
    if drives:
        if len(drives) + len(numbers) != 1:
            raise InputError("--bulk-velocity", "another flow as well", "one of them")
        if gap is None or nu is None:
            raise InputError("--bulk-velocity", "no more", "--diameter and --fluid or a viscosity")
        ((name, value),) = drives.items()
        numbers = {
            "reynolds": (value if name == "bulk_velocity" else value / area) * 2.0 * gap / nu
        }
    rough = _roughness(amounts, None if gap is None else 2.0 * gap)
    flow = annulus_flow(ratio, **numbers, relative_roughness=rough, **closing)
    si: dict[str, tuple[float, str]] = {}
    if gap is not None and nu is not None:
        u_tau = flow.re_tau * nu / (0.5 * gap)
        bulk = flow.bulk_u_plus * u_tau
        si = {"gap": (gap, "m"), "bulk_velocity": (bulk, "m/s"),
              "friction_velocity": (u_tau, "m/s"),
              "volume_flow": (bulk * area, "m3/s"),
              "kinematic_pressure_gradient": (2.0 * u_tau * u_tau / gap, "m/s2")}  # fmt: skip
    return flow, si, _ANNULUS, rough


def _couette(amounts: dict[str, Any], closing: dict[str, Any]) -> _Solved:
    stress_ratio = amounts.pop("stress_ratio")
    if "re_tau" not in amounts:
        raise InputError("--stress-ratio", "no flow", "--re-tau of the wall at rest with it")
    re_tau = amounts.pop("re_tau")
    gap, nu = _length(amounts, "height"), amounts.pop("kinematic_viscosity", None)
    amounts.pop("density", None)
    rough = _roughness(amounts, None if gap is None else 2.0 * gap)
    flow = couette_poiseuille_flow(re_tau, stress_ratio, relative_roughness=rough, **closing)
    si: dict[str, tuple[float, str]] = {}
    if gap is not None and nu is not None:
        u_tau = re_tau * nu / (0.5 * gap)
        si = {"gap": (gap, "m"), "bulk_velocity": (flow.bulk_u_plus * u_tau, "m/s"),
              "wall_velocity": (flow.wall_u_plus * u_tau, "m/s"),
              "friction_velocity": (u_tau, "m/s")}  # fmt: skip
    return flow, si, _COUETTE, rough
