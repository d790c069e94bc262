"""The ISO 2533 standard atmosphere up to 32 km."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike
from walllaw.relation import relation


def standard_atmosphere(altitude: FloatLike) -> tuple[Any, Any]:
    """Return temperature and pressure of the standard atmosphere.

    Parameters
    ----------
    altitude : float or array
        Geopotential altitude [m], -5000 to 32000.

    Returns
    -------
    temperature, pressure : float or ndarray
        [K] and [Pa].

    Warns
    -----
    RangeWarning
        Below -2000 m.

    Raises
    ------
    InputError
        If an altitude is outside -5000 to 32000 m.

    References
    ----------
    iso-2533-1975

    Examples
    --------
    >>> t, p = standard_atmosphere(11000.0)
    >>> round(t, 2), round(p)
    (216.65, 22632)
    """
    r = relation("fluids", "standard_atmosphere")
    accepted = arrays.Interval(-5000.0, r["top"])
    shape, (h,) = arrays.columns(altitude=(altitude, accepted))
    r.use(altitude=h)
    g_over_r = r["gravity"] / r["gas_constant"]
    # troposphere, then the isothermal layer, then the first warming layer: each from its base
    low = np.minimum(h, r["base_1"])
    t1 = r["temperature"] + r["lapse_0"] * low
    p1 = r["pressure"] * np.power(t1 / r["temperature"], -g_over_r / r["lapse_0"])
    middle = np.clip(h, r["base_1"], r["base_2"]) - r["base_1"]
    p2 = p1 * np.exp(-g_over_r * middle / t1)
    high = np.maximum(h - r["base_2"], 0.0)
    t3 = t1 + r["lapse_2"] * high
    p3 = p2 * np.power(t3 / t1, -g_over_r / r["lapse_2"])
    return shape(t3), shape(p3)
