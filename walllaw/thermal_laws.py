"""Temperature laws of the wall: T+ = (T_w - T) rho c_p u_tau/q_w as a function of y+ and Pr.

Use these through :mod:`walllaw.heat`.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    INTERCEPT,
    KAPPA,
    FloatLike,
    Floats,
    Interval,
)
from walllaw.errors import InputError, unknown_name
from walllaw.lambert import wright_omega_lower
from walllaw.relation import Relation, relation

_FLOWS = ("duct", "boundary-layer")
_PRANDTL = Interval(1e-6, 1e8)
_DISTANCE = Interval(0.0, 1e12)
_SMALL = 1e-300  # keeps a quotient of a vanished term finite


def kader(
    y_plus: FloatLike,
    prandtl: FloatLike,
    *,
    relative_distance: FloatLike = 0.0,
    flow: str = "duct",
) -> Any:
    """Return T+ by Kader's law, at any Prandtl number and distance.

    Parameters
    ----------
    y_plus : float or array
        y+ [1].
    prandtl : float or array
        Prandtl number [1].
    relative_distance : float or array, optional
        y over the radius, half height or boundary-layer thickness [1]; 0 gives the wall law.
    flow : str, optional
        ``duct`` (pipe, channel) or ``boundary-layer``: the outer factor.

    Returns
    -------
    float or ndarray
        T+ [1].

    Warns
    -----
    RangeWarning
        If the Prandtl number is outside 6e-3 to 4e4.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    Pr y+ exp(-G) + {2.12 ln[(1 + y+) h] + beta} exp(-1/G), G = 0.01 (Pr y+)^4/(1 + 5 Pr^3 y+),
    beta = (3.85 Pr^(1/3) - 1.3)^2 + 2.12 ln Pr. About 10 %; at Pr = 100 and y+ = 1 the fit is 16 %
    below Pr y+.

    References
    ----------
    kader-1981

    Examples
    --------
    >>> round(kader(100.0, 0.71), 9)
    13.604990779
    """
    if flow not in _FLOWS:
        raise unknown_name("flow", flow, _FLOWS)
    c = relation("heat", "kader")
    shape, (y, pr, e) = arrays.columns(
        y_plus=(y_plus, _DISTANCE),
        prandtl=(prandtl, _PRANDTL),
        relative_distance=(relative_distance, Interval(0.0, 1.0)),
    )
    c.use(prandtl=pr, y_plus=y)
    name = "duct" if flow == "duct" else "boundary_layer"
    outer = (2.0 - e) * c[name] / (1.0 + c[f"{name}_inner"] * np.square(1.0 - e))
    return shape(arrays.blocks(_kader, y, pr, outer))


def _kader(y: Floats, pr: Floats, outer: Floats) -> Floats:
    c = relation("heat", "kader")
    root = c["root"] * np.cbrt(pr) - c["offset"]
    beta = root * root + c["slope"] * np.log(pr)
    py = pr * y
    g = c["damping"] * np.square(py * py) / (1.0 + c["ratio"] * pr * pr * py)
    log = c["slope"] * (np.log1p(y) + np.log(outer)) + beta
    return np.asarray(py * np.exp(-g) + log * np.exp(-1.0 / np.maximum(g, _SMALL)))


def jayatilleke_resistance(prandtl: FloatLike, turbulent_prandtl: FloatLike = 0.85) -> Any:
    """Return the extra resistance of the sublayer to heat, Jayatilleke's P.

    Parameters
    ----------
    prandtl : float or array
        Prandtl number [1].
    turbulent_prandtl : float or array, optional
        Turbulent Prandtl number [1].

    Returns
    -------
    float or ndarray
        P [1]; negative for Pr below Pr_t.

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    9.24 [(Pr/Pr_t)^(3/4) - 1] [1 + 0.28 exp(-0.007 Pr/Pr_t)].

    References
    ----------
    jayatilleke-1969

    Examples
    --------
    >>> round(jayatilleke_resistance(0.71), 11)
    -1.49146084477
    """
    c = relation("heat", "jayatilleke")
    shape, (pr, prt) = arrays.columns(
        prandtl=(prandtl, _PRANDTL), turbulent_prandtl=(turbulent_prandtl, AMOUNT)
    )
    c.use(prandtl=pr, turbulent_prandtl=prt)
    return shape(_resistance(c, pr / prt))


def _resistance(c: Relation, ratio: Floats) -> Floats:
    root = np.sqrt(ratio)
    power = root * np.sqrt(root)
    return c["factor"] * (power - 1.0) * (1.0 + c["amplitude"] * np.exp(-c["decay"] * ratio))


def thermal_intersection(
    prandtl: FloatLike,
    turbulent_prandtl: FloatLike = 0.85,
    kappa: FloatLike = 0.41,
    B: FloatLike = 5.0,
) -> Any:
    """Return the y+ at which the conductive and the logarithmic temperature law cross.

    Parameters
    ----------
    prandtl, turbulent_prandtl : float or array
        Molecular and turbulent Prandtl number [1].
    kappa, B : float or array, optional
        Log law of the velocity; B = ln(E)/kappa [1].

    Returns
    -------
    float or ndarray
        The larger root of Pr y+ = Pr_t [ln(E y+)/kappa + P] [1].

    Raises
    ------
    InputError
        If an argument cannot be used or the laws do not cross.

    Notes
    -----
    Closed: with a = kappa Pr/Pr_t it is v/a, where v - ln v = kappa (B + P) - ln a.

    References
    ----------
    jayatilleke-1969

    Examples
    --------
    >>> round(thermal_intersection(0.71, 0.85, 0.41, 5.359084334719), 9)
    11.849136033
    """
    c = relation("heat", "jayatilleke_law")
    shape, (pr, prt, kap, b) = _law_arguments(prandtl, turbulent_prandtl, kappa, B)
    c.use(prandtl=pr)
    return shape(_crossing(pr, prt, kap, b))


def _law_arguments(
    prandtl: FloatLike, turbulent_prandtl: FloatLike, kappa: FloatLike, B: FloatLike, **more: Any
) -> tuple[arrays.Shape, list[Floats]]:
    return arrays.columns(
        prandtl=(prandtl, _PRANDTL),
        turbulent_prandtl=(turbulent_prandtl, AMOUNT),
        kappa=(kappa, KAPPA),
        B=(B, INTERCEPT),
        **more,
    )


def _crossing(pr: Floats, prt: Floats, kappa: Floats, b: Floats) -> Floats:
    ratio = pr / prt
    a = kappa * ratio
    s = kappa * (b + _resistance(relation("heat", "jayatilleke"), ratio)) - np.log(a)
    if (s < 1.0).any():
        raise InputError("prandtl", "", "", "the temperature laws do not cross")
    return wright_omega_lower(s) / a


def jayatilleke(
    y_plus: FloatLike,
    prandtl: FloatLike,
    *,
    turbulent_prandtl: FloatLike = 0.85,
    kappa: FloatLike = 0.41,
    B: FloatLike = 5.0,
) -> Any:
    """Return T+ of the thermal wall function of Jayatilleke.

    Parameters
    ----------
    y_plus : float or array
        y+, or y* of a k-based wall function [1].
    prandtl : float or array
        Prandtl number [1].
    turbulent_prandtl : float or array, optional
        Turbulent Prandtl number [1].
    kappa, B : float or array, optional
        Log law of the velocity; B = ln(E)/kappa [1].

    Returns
    -------
    float or ndarray
        T+ [1].

    Raises
    ------
    InputError
        If an argument cannot be used or the laws do not cross.

    Notes
    -----
    Pr y+ up to the crossing (:func:`thermal_intersection`), Pr_t [ln(E y+)/kappa + P] above. Expect
    10 % between this and :func:`kader`; not for liquid metals.

    References
    ----------
    jayatilleke-1969

    Examples
    --------
    >>> round(jayatilleke(100.0, 0.71, kappa=0.4187, B=5.449409708), 6)
    12.713181
    """
    c = relation("heat", "jayatilleke_law")
    shape, (pr, prt, kap, b, y) = _law_arguments(
        prandtl, turbulent_prandtl, kappa, B, y_plus=(y_plus, AMOUNT_OR_ZERO)
    )
    c.use(prandtl=pr, y_plus=y)
    crossing = _crossing(pr, prt, kap, b)
    p = _resistance(relation("heat", "jayatilleke"), pr / prt)
    log = prt * (np.log(np.maximum(y, crossing)) / kap + b + p)
    return shape(np.where(y > crossing, log, pr * np.minimum(y, crossing)))


def two_layer(
    y_plus: FloatLike,
    prandtl: FloatLike,
    *,
    turbulent_prandtl: FloatLike = 0.85,
    kappa: FloatLike = 0.41,
    B: FloatLike = 5.0,
) -> Any:
    """Return T+ of the two-layer analogy of Prandtl and Taylor.

    Parameters
    ----------
    y_plus : float or array
        y+ [1].
    prandtl : float or array
        Prandtl number [1].
    turbulent_prandtl : float or array, optional
        Turbulent Prandtl number [1].
    kappa, B : float or array, optional
        Log law of the velocity [1].

    Returns
    -------
    float or ndarray
        T+ [1].

    Raises
    ------
    InputError
        If an argument cannot be used or the velocity laws do not cross.

    Notes
    -----
    Pr y+ up to the crossing y_v of the velocity laws, Pr y_v + Pr_t ln(y+/y_v)/kappa above: u+
    itself for Pr = Pr_t = 1. Far from Pr = 1 the sublayer of heat is not that of momentum.

    References
    ----------
    prandtl-1910

    Examples
    --------
    >>> round(two_layer(100.0, 1.0, turbulent_prandtl=1.0), 9)
    16.232122405
    """
    c = relation("heat", "two_layer")
    shape, (pr, prt, kap, b, y) = _law_arguments(
        prandtl, turbulent_prandtl, kappa, B, y_plus=(y_plus, AMOUNT_OR_ZERO)
    )
    c.use(prandtl=pr, y_plus=y)
    s = kap * b - np.log(kap)
    if (s < 1.0).any():
        raise InputError("B", f"{float(b.min()):.6g}", "an intercept with which the laws cross")
    edge = wright_omega_lower(s) / kap
    return shape(pr * np.minimum(y, edge) + prt * np.log(np.maximum(y, edge) / edge) / kap)


def conduction_layer(prandtl: FloatLike, departure: float = 0.01) -> Any:
    """Return the largest y+ at which a first cell still lies in the conduction layer.

    Parameters
    ----------
    prandtl : float or array
        Prandtl number [1].
    departure : float, optional
        How far T+ may be below Pr y+ there: 0.01 or 0.05 [1].

    Returns
    -------
    float or ndarray
        y+ [1].

    Warns
    -----
    RangeWarning
        If the Prandtl number is below 7, where the limit is higher than this.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    1.713 Pr^(-1/3) for 1 %, 2.949 Pr^(-1/3) for 5 %, from Kader's law.

    References
    ----------
    kader-1981

    Examples
    --------
    >>> round(conduction_layer(100.0), 3)
    0.369
    """
    c = relation("heat", "conduction_layer")
    factors = {0.01: c["one_percent"], 0.05: c["five_percent"]}
    if departure not in factors:
        raise InputError("departure", repr(departure), "0.01 or 0.05")
    shape, (pr,) = arrays.columns(prandtl=(prandtl, _PRANDTL))
    c.use(prandtl=pr)
    return shape(factors[departure] / np.cbrt(pr))
