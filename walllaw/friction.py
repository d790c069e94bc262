"""Friction factors of developed pipe and channel flow.

All are Darcy's factor (four times Fanning's) unless the name or the docstring's first line says
otherwise. The implicit laws are solved to the last digits by a closed form or a fixed number of
steps from a proven start.
"""

from __future__ import annotations

from typing import Any

from walllaw import arrays
from walllaw.arrays import NONNEGATIVE, FloatLike, Interval
from walllaw.channel_friction import dean, dean_velocity_ratio, zanoun
from walllaw.rough_friction import (
    churchill,
    colebrook,
    colebrook_from_friction_reynolds,
    colebrook_from_friction_velocity,
    haaland,
    nikuradse_rough,
    swamee_jain,
)
from walllaw.smooth_friction import (
    blasius,
    laminar,
    mckeon,
    mckeon_general,
    pirozzoli_2021,
    prandtl_karman,
    zagarola_smits,
)

__all__ = [
    "blasius",
    "churchill",
    "colebrook",
    "colebrook_from_friction_reynolds",
    "colebrook_from_friction_velocity",
    "darcy_from_fanning",
    "dean",
    "dean_velocity_ratio",
    "fanning_from_darcy",
    "haaland",
    "laminar",
    "mckeon",
    "mckeon_general",
    "nikuradse_rough",
    "pirozzoli_2021",
    "prandtl_karman",
    "swamee_jain",
    "zagarola_smits",
    "zanoun",
]

_SAFE = Interval(0.0, 1e307)  # four times it is still finite


def fanning_from_darcy(darcy_friction: FloatLike) -> Any:
    """Fanning friction factor, a quarter of Darcy's (exact).

    Parameters
    ----------
    darcy_friction : array_like
        Darcy friction factor [1], from 0.

    Returns
    -------
    float or ndarray
        Fanning friction factor, equal to the skin-friction coefficient on the bulk velocity [1].

    Raises
    ------
    InputError
        If a value is negative or not finite.

    Examples
    --------
    >>> fanning_from_darcy(0.02)
    0.005
    """
    shape, (f,) = arrays.columns(darcy_friction=(darcy_friction, NONNEGATIVE))
    return shape(0.25 * f)


def darcy_from_fanning(fanning_friction: FloatLike) -> Any:
    """Darcy friction factor, four times Fanning's (exact).

    Parameters
    ----------
    fanning_friction : array_like
        Fanning friction factor [1], from 0.

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Raises
    ------
    InputError
        If a value is negative or not finite.

    Examples
    --------
    >>> darcy_from_fanning(0.005)
    0.02
    """
    shape, (f,) = arrays.columns(fanning_friction=(fanning_friction, _SAFE))
    return shape(4.0 * f)
