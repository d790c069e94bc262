"""What drives a developed flow: bulk velocity, flow rate or pressure gradient in SI."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike
from walllaw.errors import InputError, unknown_name

GEOMETRIES = ("pipe", "channel", "open-channel", "couette")


def driven(
    geometry: str,
    size: FloatLike,
    kinematic_viscosity: FloatLike,
    *,
    bulk_velocity: FloatLike | None = None,
    volume_flow: FloatLike | None = None,
    kinematic_pressure_gradient: FloatLike | None = None,
) -> dict[str, Any]:
    """Return the Reynolds number that :func:`developed` takes, from what drives the flow.

    Parameters
    ----------
    geometry : str
        As there.
    size : float or array
        Radius of the pipe, half height, depth of the open channel, half gap [m].
    kinematic_viscosity : float or array
        [m2/s].
    bulk_velocity, volume_flow, kinematic_pressure_gradient : float or array, optional
        One of them: [m/s]; [m3/s], for a plane passage per width [m2/s]; -(dp/dx)/rho [m/s2], for
        an open channel gravity times slope.

    Returns
    -------
    dict
        ``{"reynolds": ...}`` or ``{"re_tau": ...}``.

    Raises
    ------
    InputError
        If not exactly one drive is given, or a value is not positive.

    Notes
    -----
    Force balance: u_tau^2 = g R/2 (pipe) or g h.

    Examples
    --------
    >>> driven("pipe", 0.5, 0.001, kinematic_pressure_gradient=4.0)
    {'re_tau': 500.0}
    """
    if geometry not in GEOMETRIES:
        raise unknown_name("geometry", geometry, GEOMETRIES)
    given = {
        "bulk_velocity": bulk_velocity,
        "volume_flow": volume_flow,
        "kinematic_pressure_gradient": kinematic_pressure_gradient,
    }
    named = {n: v for n, v in given.items() if v is not None}
    if len(named) != 1:
        raise InputError("drive", ", ".join(named) or "nothing", f"one of {', '.join(given)}")
    ((name, value),) = named.items()
    if geometry == "couette" and name != "bulk_velocity":
        raise InputError(name, "a flow between moving walls", "bulk_velocity, half the wall's")
    amounts = {"size": size, "kinematic_viscosity": kinematic_viscosity, name: value}
    shape, (r, nu, x) = arrays.columns(**{n: (v, arrays.AMOUNT) for n, v in amounts.items()})
    pipe = geometry == "pipe"
    if name == "kinematic_pressure_gradient":
        return {"re_tau": shape(np.sqrt(x * r / (2.0 if pipe else 1.0)) * r / nu)}
    if name == "volume_flow":
        x = x / (np.pi * r * r if pipe else (r if geometry == "open-channel" else 2.0 * r))
    return {"reynolds": shape(x * (2.0 if pipe else 4.0) * r / nu)}
