"""``closures profile``: a law of the wall as a table or a picture."""

from __future__ import annotations

import json
from typing import TYPE_CHECKING, Any

import click

from closures.command.options import flag, output_options, range_warnings

if TYPE_CHECKING:
    from walllaw.law import Law

# name on the command line -> name in walllaw, and the constants it takes
LAWS = {
    "viscous": ("ViscousSublayer", ()),
    "log": ("LogLaw", ("kappa", "B")),
    "two-layer": ("TwoLayer", ("kappa", "B")),
    "three-layer": ("ThreeLayer", ("kappa", "B")),
    "power": ("PowerLaw", ()),
    "spalding": ("Spalding", ("kappa", "B", "order")),
    "reichardt": ("Reichardt", ("kappa", "B")),
    "musker": ("Musker", ("kappa", "B")),
    "van-driest": ("VanDriest", ("kappa", "A_plus")),
    "spalart-allmaras": ("SpalartAllmaras", ()),
    "chauhan": ("ChauhanMonkewitzNagib", ()),
}
COLUMNS = ("y_plus", "u_plus", "slope", "eddy_viscosity", "mixing_length")


def _law(name: str, given: dict[str, float | int | None], pair: str | None) -> tuple[Law, str]:
    import walllaw
    from walllaw.errors import InputError, unknown_name

    if name not in LAWS:
        raise unknown_name("law", name, LAWS)
    class_name, takes = LAWS[name]
    constants = {k: v for k, v in given.items() if v is not None}
    source = ""
    if pair is not None:
        if {"kappa", "B"} & set(constants):
            raise InputError("--log-law", "kappa or B as well", "one of the two")
        found = walllaw.log_law_pair(pair)
        constants |= (
            {"kappa": found.kappa, "B": found.B} if "B" in takes else {"kappa": found.kappa}
        )
        source = found.source
    for k in constants:
        if k not in takes:
            raise InputError(flag(k), f"a {name} law", ", ".join(takes) or "no constant")
    return getattr(walllaw, class_name)(**constants), source


@click.command()
@click.argument("law", default="spalding")
@click.option("--kappa", type=float, help="von Karman constant.")
@click.option("--B", "B", type=float, help="Intercept of the log law.")
@click.option("--A-plus", "A_plus", type=float, help="Damping constant of van Driest.")
@click.option("--order", type=int, help="Power to which Spalding's bracket goes: 3 or 4.")
@click.option("--log-law", "pair", metavar="NAME", help="A named pair of kappa and B.")
@click.option("--delta-plus", type=float, help="Thickness in wall units: adds the wake of Coles.")
@click.option("--Pi", "Pi", type=float, help="Strength of the wake.")
@click.option("--from", "low", type=float, default=0.1, show_default=True, help="Smallest y+.")
@click.option("--to", "high", type=float, default=1000.0, show_default=True, help="Largest y+.")
@click.option("--points", type=int, default=41, show_default=True, help="Number of points.")
@click.option("--y-plus", type=float, help="Picture: y+ of the first unknown, marked.")
@click.option(
    "--growth", type=float, default=1.2, show_default=True, help="Picture: growth of the layers."
)
@click.option("--layers", type=int, help="Picture: number of layers, marked.")
@output_options("text", "csv", "json", "markdown", "svg", "png")
def command(
    law: str, pair: str | None, delta_plus: float | None, Pi: float | None, low: float, high: float,
    points: int, y_plus: float | None, growth: float, layers: int | None, form: str, output: str,
    **constants: Any,
) -> int:  # fmt: skip
    """The law of the wall LAW: u+, slope, implied eddy viscosity and mixing length against y+.

    LAW is one of viscous, log, two-layer, three-layer, power, spalding, reichardt, musker,
    van-driest, spalart-allmaras, chauhan.
    """
    from closures.files import emit, emit_bytes
    from walllaw.errors import InputError

    made, source = _law(law, constants, pair)
    if delta_plus is not None or Pi is not None:
        made = _with_wake(made, delta_plus, Pi)
    if not 0.0 < low < high <= 1e12:
        raise InputError("--from", f"{low:g} to {high:g}", "0 < from < to <= 1e12")
    if not 2 <= points <= 100_000:
        raise InputError("--points", str(points), "2 to 100000")
    marks = _marks(y_plus, growth, layers) if form in ("svg", "png") else []
    with range_warnings():
        if form in ("svg", "png"):
            from closures import pictures

            picture = pictures.wall_law(made, law, low, high, marks, form)
        else:
            table = _table(made, low, high, points)
    if form in ("svg", "png"):
        emit_bytes(picture, output)
        return 0
    emit(
        {"text": _text, "csv": _csv, "json": _json, "markdown": _markdown}[form](
            table, made, source
        ),
        output,
    )
    return 0


def _with_wake(law: Law, delta_plus: float | None, Pi: float | None) -> Law:
    import walllaw
    from walllaw.errors import InputError

    if delta_plus is None:
        raise InputError("--Pi", "no thickness", "--delta-plus with it")
    return (
        walllaw.WithWake(law, delta_plus) if Pi is None else walllaw.WithWake(law, delta_plus, Pi)
    )


def _marks(y_plus: float | None, growth: float, layers: int | None) -> list[float]:
    """Return the outer faces of the layers in wall units, the first cell's first."""
    import numpy as np

    from walllaw import spacing
    from walllaw.errors import InputError

    if y_plus is None:
        return []
    if not 0.0 < y_plus < 1e6:
        raise InputError("--y-plus", f"{y_plus:g}", "a number above 0 and below 1e6")
    counts = np.arange(1.0, float(layers or 1) + 1.0)
    return [float(x) for x in spacing.layer_total(2.0 * y_plus, growth, counts)]


def _table(law: Law, low: float, high: float, points: int) -> dict[str, Any]:
    import numpy as np

    y = np.geomspace(low, high, points)
    return {"y_plus": y, **{name: getattr(law, name)(y) for name in COLUMNS[1:]}}


def _rows(table: dict[str, Any]) -> list[tuple[float, ...]]:
    return [tuple(float(v) for v in row) for row in zip(*table.values(), strict=True)]


def _text(table: dict[str, Any], law: Law, source: str) -> str:
    head = [repr(law) + (f"  [{source}]" if source else ""), "".join(f"{n:>15}" for n in table)]
    return "\n".join(head + ["".join(f"{v:>15.6g}" for v in row) for row in _rows(table)])


def _csv(table: dict[str, Any], law: Law, source: str) -> str:
    return "\n".join([",".join(table), *(",".join(repr(v) for v in row) for row in _rows(table))])


def _json(table: dict[str, Any], law: Law, source: str) -> str:
    data = {"law": repr(law), **{n: [float(v) for v in x] for n, x in table.items()}}
    return json.dumps(data, indent=1, allow_nan=False)


def _markdown(table: dict[str, Any], law: Law, source: str) -> str:
    head = [f"`{law!r}`", "", f"| {' | '.join(table)} |", f"|{'---:|' * len(table)}"]
    return "\n".join(head + [f"| {' | '.join(f'{v:.6g}' for v in row)} |" for row in _rows(table)])
