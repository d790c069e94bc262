"""Near-wall physics: wall laws and functions, friction, roughness, heat, spacing of cells.

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
        pressure_gradient,
        roughness,
        spacing,
        stretching,
        wall_function,
    )
    from walllaw.composite import Cess, Composite, WithWake
    from walllaw.developed_flow import DevelopedFlow, developed
    from walllaw.errors import InputError, RangeWarning, TableError
    from walllaw.flow_family import FlowFamily
    from walllaw.fraction_laws import ChauhanMonkewitzNagib, Musker, SpalartAllmaras
    from walllaw.law import Law
    from walllaw.laws import Reichardt, Spalding, VanDriest
    from walllaw.layered_laws import PowerLaw, ThreeLayer, TwoLayer, ViscousSublayer
    from walllaw.log_law_constants import log_law_pair, log_law_pairs
    from walllaw.log_layer import LogLaw
    from walllaw.two_wall_flow import annulus_flow, couette_poiseuille_flow

_HOMES = {
    "Cess": "walllaw.composite",
    "ChauhanMonkewitzNagib": "walllaw.fraction_laws",
    "Composite": "walllaw.composite",
    "DevelopedFlow": "walllaw.developed_flow",
    "FlowFamily": "walllaw.flow_family",
    "InputError": "walllaw.errors",
    "Law": "walllaw.law",
    "LogLaw": "walllaw.log_layer",
    "Musker": "walllaw.fraction_laws",
    "PowerLaw": "walllaw.layered_laws",
    "RangeWarning": "walllaw.errors",
    "Reichardt": "walllaw.laws",
    "SpalartAllmaras": "walllaw.fraction_laws",
    "Spalding": "walllaw.laws",
    "TableError": "walllaw.errors",
    "ThreeLayer": "walllaw.layered_laws",
    "TwoLayer": "walllaw.layered_laws",
    "VanDriest": "walllaw.laws",
    "ViscousSublayer": "walllaw.layered_laws",
    "WithWake": "walllaw.composite",
    "annulus_flow": "walllaw.two_wall_flow",
    "couette_poiseuille_flow": "walllaw.two_wall_flow",
    "developed": "walllaw.developed_flow",
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
    "pressure_gradient",
    "roughness",
    "spacing",
    "stretching",
    "wall_function",
}

__all__ = [
    "Cess",
    "ChauhanMonkewitzNagib",
    "Composite",
    "DevelopedFlow",
    "FlowFamily",
    "InputError",
    "Law",
    "LogLaw",
    "Musker",
    "PowerLaw",
    "RangeWarning",
    "Reichardt",
    "SpalartAllmaras",
    "Spalding",
    "TableError",
    "ThreeLayer",
    "TwoLayer",
    "VanDriest",
    "ViscousSublayer",
    "WithWake",
    "annulus_flow",
    "compressible",
    "couette_poiseuille_flow",
    "developed",
    "disc",
    "ducts",
    "friction",
    "heat",
    "log_law_pair",
    "log_law_pairs",
    "near_wall_omega",
    "plate",
    "pressure_gradient",
    "roughness",
    "spacing",
    "stretching",
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
