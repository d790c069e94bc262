"""``closures wall``: friction velocity, first cell, layers and wall-function values from flags."""

from __future__ import annotations

import json
from typing import Any

import click

from closures.command.case_options import case_options, raw_case
from closures.command.options import output_options


@click.command()
@case_options("fluid", "flow", "wall")
@click.option(
    "--closure",
    "closure_name",
    default="menter-sst-2003",
    show_default=True,
    metavar="ID",
    help="Id, alias or path of a closure.",
)
@output_options("text", "json", "markdown")
def command(closure_name: str, form: str, output: str, **given: Any) -> int:
    """The wall of a stated flow: u_tau, first cell, layer stack, values at the wall."""
    from closures import report
    from closures.evaluation import evaluate
    from closures.files import emit
    from closures.sheets import make_sheet

    raw = raw_case(given)
    raw["closure"] = {"name": closure_name}
    # the wall does not depend on the incoming turbulence; a state is needed to evaluate at all
    raw["turbulence"] = {"intensity": 0.01, "viscosity_ratio": 1.0}
    raw["title"] = "Wall of a stated flow"
    ledger = evaluate(raw)
    sheet = make_sheet(ledger).without("inlet", "scales")
    if form == "json":
        emit(json.dumps(sheet.data, indent=2, ensure_ascii=False, allow_nan=False), output)
    else:
        emit(report.text(sheet) if form == "text" else report.markdown(sheet), output)
    return int(sheet.worst() == "error")
