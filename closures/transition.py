"""Onset of transition from the intensity of the stream."""

from __future__ import annotations

from typing import Any

import numpy as np

from closures.closure_tables import closure
from walllaw import arrays
from walllaw.arrays import FloatLike, Interval


def onset_momentum_reynolds(intensity: FloatLike) -> Any:
    """Momentum-thickness Reynolds number at onset, zero pressure gradient, Langtry and Menter 2009.

    Parameters
    ----------
    intensity : float or array
        Turbulence intensity as a fraction [-], above 0 to 1; below 0.027 % that value is used.

    Returns
    -------
    float or ndarray
        Re_theta_t [-], at least 20.

    Raises
    ------
    InputError
        If an intensity is outside its interval.

    Notes
    -----
    1173.51 - 589.428 Tu + 0.2196/Tu^2 up to Tu = 1.3 %, 331.5 (Tu - 0.5658)^-0.671 above.

    References
    ----------
    langtry-menter-2009

    Examples
    --------
    >>> round(onset_momentum_reynolds(0.01), 4)
    584.3016
    """
    c = closure("langtry-menter-2009")
    shape, (tu,) = arrays.columns(intensity=(intensity, Interval(0.0, 1.0, open_low=True)))
    percent = np.maximum(100.0 * tu, c["Tu_min"])
    low = np.minimum(percent, c["Tu_switch"])
    below = c["Re_theta_t_a"] + c["Re_theta_t_b"] * low + c["Re_theta_t_c"] / (low * low)
    high = np.maximum(percent, c["Tu_switch"])
    above = c["Re_theta_t_d"] * np.power(high - c["Re_theta_t_e"], c["Re_theta_t_f"])
    onset = np.where(percent <= c["Tu_switch"], below, above)
    return shape(np.maximum(onset, c["Re_theta_t_min"]))
