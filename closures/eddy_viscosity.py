"""Eddy viscosity of the one-equation closures from their own variable, and the exact inverses.

All functions take and return flat float64 arrays; ``chi`` is the closure's variable over the
kinematic viscosity and ``ratio`` the eddy viscosity over the kinematic viscosity.
"""

from __future__ import annotations

import numpy as np

from walllaw.arrays import Floats

# Newton steps: from the start q + q^(1/4), an upper bound of a root right of which the function is
# convex, the error falls monotonically; it is below 2 ulp after 7 steps for every q (tested).
_STEPS = 8
# Above this ratio over c_v1 the first term of the expansion in 1/q is exact to double precision.
_LARGE = 1e6


def spalart_allmaras_ratio(chi: Floats, c_v1: float) -> Floats:
    """Return nu_t/nu = chi f_v1, f_v1 = chi^3/(chi^3 + c_v1^3) (spalart-allmaras-1994)."""
    s = np.asarray(chi / c_v1)
    # s^3/(1 + s^3) without overflow: below 1 directly, above through the inverse cube
    small = np.minimum(s, 1.0)
    inverse = 1.0 / np.maximum(s, 1.0)
    low = small * small * small
    high = inverse * inverse * inverse
    return np.asarray(np.where(s < 1.0, chi * (low / (1.0 + low)), chi / (1.0 + high)))


def spalart_allmaras_chi(ratio: Floats, c_v1: float) -> Floats:
    """Return chi = nu_tilde/nu for a given nu_t/nu = r: the root of chi^4 - r chi^3 = r c_v1^3.

    Notes
    -----
    With s = chi/c_v1 and q = r/c_v1 the root of f(s) = s^4 - q s^3 - q is wanted. The start
    s_0 = q + q^(1/4) has f(s_0) >= 0. For large q the expansion s = q + 1/q^2 is used.
    Largest error found against 50 digits: 2 ulp for nu_t/nu from 1e-12 to 1e8.
    """
    q = np.asarray(ratio / c_v1)
    near = np.minimum(q, _LARGE)
    s = near + np.sqrt(np.sqrt(near))
    for _ in range(_STEPS):
        cube = s * s * s
        # f/f' with s^3 divided out of both, so that tiny q does not underflow
        s = s - (s - near - near / cube) / (4.0 - 3.0 * near / s)
    inverse = 1.0 / np.maximum(q, 1.0)
    return np.asarray(c_v1 * np.where(q < _LARGE, s, q + inverse * inverse))


def menter_1997_ratio(chi: Floats, A_plus: float, kappa: float) -> Floats:
    """Return nu_t/nu = chi (1 - exp(-(chi/(A_plus kappa))^2)) (menter-1997)."""
    s = np.minimum(chi / (A_plus * kappa), 1e3)
    return np.asarray(-np.expm1(-s * s) * chi)


def menter_1997_chi(ratio: Floats, A_plus: float, kappa: float) -> Floats:
    """Return chi for a given nu_t/nu of the Menter 1997 closure.

    Notes
    -----
    With s = chi/(A_plus kappa), q = ratio/(A_plus kappa): s (1 - exp(-s^2)) = q. The function is
    increasing and lies below both s^3 and s, so max(q, q^(1/3)) is a lower bound; Newton steps from
    q + q^(1/3) converge from above.
    """
    scale = A_plus * kappa
    q = np.asarray(ratio / scale)
    s = q + np.cbrt(q)
    for _ in range(3 * _STEPS):
        square = np.minimum(s * s, 700.0)
        decay = np.exp(-square)
        value = -s * np.expm1(-square) - q
        s = s - value / (-np.expm1(-square) + 2.0 * square * decay)
    return s * scale
