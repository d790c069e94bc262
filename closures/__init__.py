"""RANS closures and the job of setting up a run: coefficients, states, inlets, sheets.

The public names load when they are first used; importing the package costs next to nothing.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

from closures._version import __version__

if TYPE_CHECKING:
    from closures.case import read_case
    from closures.closure_tables import Closure, closure
    from closures.evaluation import evaluate, sheet
    from closures.fluids import Fluid, fluid
    from closures.inlets import Inlet, inlet
    from closures.ledger import Ledger
    from closures.sheets import Sheet
    from closures.standard_atmosphere import standard_atmosphere
    from closures.states import State, convert, state
    from walllaw.errors import InputError, RangeWarning, TableError

_HOMES = {
    "Closure": "closures.closure_tables",
    "Fluid": "closures.fluids",
    "Inlet": "closures.inlets",
    "InputError": "walllaw.errors",
    "Ledger": "closures.ledger",
    "RangeWarning": "walllaw.errors",
    "Sheet": "closures.sheets",
    "State": "closures.states",
    "TableError": "walllaw.errors",
    "closure": "closures.closure_tables",
    "convert": "closures.states",
    "evaluate": "closures.evaluation",
    "fluid": "closures.fluids",
    "inlet": "closures.inlets",
    "read_case": "closures.case",
    "sheet": "closures.evaluation",
    "standard_atmosphere": "closures.standard_atmosphere",
    "state": "closures.states",
}

__all__ = [
    "Closure",
    "Fluid",
    "Inlet",
    "InputError",
    "Ledger",
    "RangeWarning",
    "Sheet",
    "State",
    "TableError",
    "__version__",
    "closure",
    "convert",
    "evaluate",
    "fluid",
    "inlet",
    "read_case",
    "sheet",
    "standard_atmosphere",
    "state",
]


def __getattr__(name: str) -> Any:
    if name in _HOMES:
        return getattr(import_module(_HOMES[name]), name)
    raise AttributeError(f"module 'closures' has no attribute {name!r}")


def __dir__() -> list[str]:
    return list(__all__)
