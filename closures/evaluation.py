"""The evaluation of a case: one path for one case and for the rows of a table."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import numpy as np

from closures.case import Case, read_case
from closures.closure_tables import Closure, closure
from closures.inputs import Inputs
from closures.ledger import Ledger
from closures.sheets import Sheet, make_sheet
from closures.steps.flow import flow_step
from closures.steps.fluid import fluid_step
from closures.steps.turbulence import turbulence_step
from closures.steps.wall import wall_step
from walllaw.errors import InputError
from walllaw.relation import record


def chosen_closure(inputs: Inputs) -> Closure:
    """Return the closure of a case; a heat relation is none."""
    if "closure.name" not in inputs:
        raise InputError("closure.name", "nothing", "the id or alias of a closure")
    try:
        c = closure(inputs.text("closure.name"))
    except InputError as error:
        raise InputError("closure.name", error.given, error.accepted, error.hint) from None
    if c.family == "heat":
        raise InputError("closure.name", repr(c.id), "a closure of the flow, not a heat relation")
    return c


def _closure_step(ledger: Ledger, c: Closure) -> None:
    ledger.texts |= {
        "closure.id": c.id, "closure.name": c.name, "closure.family": c.family,
        "closure.source": c.source,
    }  # fmt: skip
    ledger.cite(c.source)
    if "c_v1" in c.coefficients:
        ledger.given("closure.c_v1", np.array([c["c_v1"]]))


def evaluate(case: Case | Mapping[str, Any], table: Mapping[str, Any] | None = None) -> Ledger:
    """Evaluate a case, or every row of a table put into it.

    Parameters
    ----------
    case : Case or mapping
        A checked case, or the nested mapping of a case file.
    table : mapping of str to array, optional
        Columns by path (``"flow.bulk_velocity"``) that take the place of single numbers, in SI.

    Returns
    -------
    Ledger
        Every quantity by path, each an array of one entry a row (or of one entry for all rows).

    Raises
    ------
    InputError
        If the case cannot be evaluated; names the field.

    Examples
    --------
    >>> e = evaluate({"fluid": {"kinematic_viscosity": 1.5e-5}, "flow": {"kind": "pipe",
    ...     "diameter": 0.3, "bulk_velocity": 40.0}, "turbulence": {"intensity": "5 %",
    ...     "mixing_length": 0.021}, "closure": {"name": "sst"}})
    >>> round(float(e["inlet.k"][0]), 9)
    6.0
    """
    checked = case if isinstance(case, Case) else read_case(case)
    inputs = Inputs(checked, table)
    for name in ("fluid", "flow", "turbulence", "closure"):
        if not inputs.given(name):
            raise InputError(name, "nothing", f"a table [{name}]")
    ledger = Ledger(inputs.rows)
    ledger.texts["title"] = inputs.text("title", "untitled case")
    with record(), np.errstate(all="ignore"):
        c = chosen_closure(inputs)
        _closure_step(ledger, c)
        fluid_step(inputs, ledger)
        flow_step(inputs, ledger)
        turbulence_step(inputs, ledger, c)
        wall_step(inputs, ledger, c)
    return ledger


def sheet(source: Any) -> Sheet:
    """Return the set-up sheet of a case file, of standard input (``"-"``), or of a mapping.

    Raises
    ------
    InputError
        If the case cannot be read or evaluated.

    Examples
    --------
    >>> s = sheet({"fluid": {"name": "air"}, "flow": {"kind": "plate", "length": 1.0,
    ...     "velocity": 40.0, "tripped": True}, "turbulence": {"viscosity_ratio": 1.0},
    ...     "closure": {"name": "sa"}})
    >>> round(s["inlet"]["set"]["nu_tilde"], 9)
    6.7527e-05
    """
    return make_sheet(evaluate(read_case(source)))
