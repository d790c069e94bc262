"""Flat plate without pressure gradient: local and mean skin friction, thicknesses, transition.

Functions without a suffix give local values by Re_x, ``_mean`` mean values by Re_L, ``_theta``
local values by Re_theta.
"""

from __future__ import annotations

from walllaw.plate_layer import (
    Layer,
    laminar_layer,
    re_tau,
    thickness_laminar,
    thickness_turbulent,
    turbulent_layer,
    turbulent_layer_1_7,
)
from walllaw.plate_local import (
    karman,
    karman_schoenherr,
    laminar,
    power_1_5,
    power_1_7,
    power_1_7_2011,
    schlichting,
    schultz_grunow,
    white,
)
from walllaw.plate_mean import (
    ittc_1957_mean,
    karman_schoenherr_mean,
    laminar_mean,
    power_1_5_mean,
    power_1_7_mean,
    prandtl_schlichting_mean,
    white_mean,
)
from walllaw.plate_theta import (
    karman_schoenherr_theta,
    ludwieg_tillmann,
    nagib_theta,
    osterlund_theta,
    power_1_6_theta,
    re_tau_theta,
)
from walllaw.plate_transition import transitional, transitional_mean

__all__ = [
    "Layer",
    "ittc_1957_mean",
    "karman",
    "karman_schoenherr",
    "karman_schoenherr_mean",
    "karman_schoenherr_theta",
    "laminar",
    "laminar_layer",
    "laminar_mean",
    "ludwieg_tillmann",
    "nagib_theta",
    "osterlund_theta",
    "power_1_5",
    "power_1_5_mean",
    "power_1_6_theta",
    "power_1_7",
    "power_1_7_2011",
    "power_1_7_mean",
    "prandtl_schlichting_mean",
    "re_tau",
    "re_tau_theta",
    "schlichting",
    "schultz_grunow",
    "thickness_laminar",
    "thickness_turbulent",
    "transitional",
    "transitional_mean",
    "turbulent_layer",
    "turbulent_layer_1_7",
    "white",
    "white_mean",
]
