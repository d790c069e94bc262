"""Near-wall physics: wall functions, friction, roughness, heat, spacing of the first cells.

Sub-modules load when they are first used; importing the package costs next to nothing.
"""

from __future__ import annotations

from importlib import import_module
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from walllaw import (
        compressible,
        disc,
        ducts,
        friction,
        heat,
        near_wall_omega,
        plate,
        roughness,
        spacing,
        wall_function,
    )
    from walllaw.errors import InputError, RangeWarning, TableError
    from walllaw.log_law_constants import log_law_pair, log_law_pairs

_HOMES = {
    "InputError": "walllaw.errors",
    "RangeWarning": "walllaw.errors",
    "TableError": "walllaw.errors",
    "log_law_pair": "walllaw.log_law_constants",
    "log_law_pairs": "walllaw.log_law_constants",
}
_MODULES = {
    "compressible",
    "disc",
    "ducts",
    "friction",
    "heat",
    "near_wall_omega",
    "plate",
    "roughness",
    "spacing",
    "wall_function",
}

__all__ = [
    "InputError",
    "RangeWarning",
    "TableError",
    "compressible",
    "disc",
    "ducts",
    "friction",
    "heat",
    "log_law_pair",
    "log_law_pairs",
    "near_wall_omega",
    "plate",
    "roughness",
    "spacing",
    "wall_function",
]


def __getattr__(name: str) -> Any:
    if name in _MODULES:
        return import_module(f"walllaw.{name}")
    if name in _HOMES:
        return getattr(import_module(_HOMES[name]), name)
    raise AttributeError(f"module 'walllaw' has no attribute {name!r}")


def __dir__() -> list[str]:
    return list(__all__)
