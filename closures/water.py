"""Liquid water: density, vapour pressure and viscosity by published correlations.

Against the reference equation of state: density within 2e-5 up to 100 degC and 1 MPa, within 3e-4
up to 150 degC and 10 MPa; viscosity within 0.1 % of IAPWS values there (see the tests).
"""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from walllaw.arrays import Floats
from walllaw.relation import relation

_ATMOSPHERE = 101325.0  # one standard atmosphere [Pa], a definition
_CELSIUS = 273.15  # zero of the Celsius scale [K], a definition


def _polynomial(coefficients: Sequence[float], x: Floats) -> Floats:
    result = np.full_like(x, coefficients[-1])
    for c in reversed(coefficients[:-1]):
        result = result * x + c
    return result


def density(temperature: Floats, pressure: Floats) -> Floats:
    """Return the density of liquid water [kg/m3] (kell-1975)."""
    r, k = relation("fluids", "water_density"), relation("fluids", "water_compressibility")
    r.use(temperature=temperature, pressure=pressure)
    t = temperature - _CELSIUS
    one = _polynomial([r[f"a{i}"] for i in range(6)], t) / (1.0 + r["b"] * t)
    compressibility = (
        k["scale"] * _polynomial([k[f"c{i}"] for i in range(6)], t) / (1.0 + k["d"] * t)
    )
    return one / (1.0 - compressibility * (pressure - _ATMOSPHERE))


def saturation_pressure(temperature: Floats) -> Floats:
    """Return the vapour pressure of water [Pa] (wagner-pruss-1993)."""
    r = relation("fluids", "water_saturation")
    s = np.maximum(1.0 - temperature / r["critical_temperature"], 0.0)
    h = np.sqrt(s)
    s3 = s * s * s
    total = (
        r["a1"] * s + r["a2"] * s * h + r["a3"] * s3 + r["a4"] * s3 * h + r["a5"] * s3 * s
        + r["a6"] * s3 * s3 * s * h
    )  # fmt: skip
    return np.asarray(
        r["critical_pressure"] * np.exp(r["critical_temperature"] / temperature * total)
    )


def viscosity(temperature: Floats, density: Floats) -> Floats:
    """Return the dynamic viscosity of water [Pa s] (iapws-r12-08, no critical enhancement)."""
    r = relation("fluids", "water_viscosity")
    r.use(temperature=temperature)
    t, d = temperature / r["temperature"], density / r["density"]
    inverse = 1.0 / t
    dilute = 100.0 * np.sqrt(t) / _polynomial([r[f"H_{i}"] for i in range(4)], inverse)
    outer = [
        _polynomial([r.coefficients.get(f"H_{i}_{j}", 0.0) for j in range(7)], d - 1.0)
        for i in range(6)
    ]
    x = inverse - 1.0
    total = np.zeros_like(x)
    for part in reversed(outer):
        total = total * x + part
    return 1e-6 * dilute * np.exp(d * total)
