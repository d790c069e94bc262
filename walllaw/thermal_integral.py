"""The temperature law that a damped mixing length and a turbulent Prandtl number imply.

Use this through :mod:`walllaw.heat`.
"""

from __future__ import annotations

from collections.abc import Callable
from functools import cache
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    KAPPA,
    FloatLike,
    Floats,
    Interval,
)
from walllaw.relation import relation

# equal panels of the stretched coordinate and Gauss points in each: 20 panels are enough for a
# constant turbulent Prandtl number, 28 for the laws that vary quickly in the sublayer
_PANELS = 28
_NODES = 16
_SMALL = 1e-30  # of nu_t/nu, for laws that divide by it: nothing is left of it beside 1/Pr

TurbulentPrandtl = float | Callable[[Floats, Floats], Any]


def integrated(
    y_plus: FloatLike,
    prandtl: FloatLike,
    *,
    turbulent_prandtl: TurbulentPrandtl = 0.85,
    kappa: FloatLike = 0.41,
    A_plus: FloatLike = 26.0,
) -> Any:
    """Return T+ by integrating a damped mixing length with any turbulent Prandtl number.

    Parameters
    ----------
    y_plus : float or array
        y+ up to 1e12 [1].
    prandtl : float or array
        Prandtl number [1].
    turbulent_prandtl : float or callable, optional
        A constant, or a function of the arrays nu_t/nu and Pr such as
        :func:`walllaw.heat.kays_crawford` [1].
    kappa : float or array, optional
        von Karman constant [1].
    A_plus : float or array, optional
        Damping constant of the mixing length [1].

    Returns
    -------
    float or ndarray
        T+ [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    Integral of dy+/[1/Pr + (nu_t/nu)/Pr_t] with nu_t/nu = [sqrt(1 + 4 l^2) - 1]/2 and
    l = kappa y+ [1 - exp(-y+/A+)] (constant stress and heat flux), by 28 Gauss panels of 16 points
    in t, y+ = s sinh t, where s follows the conduction layer. Relative error against 60-digit
    quadrature for Pr 1e-3 to 1e4 and y+ to 1e12: 2e-15 with a constant turbulent Prandtl number,
    3e-14 with those of Kays and Crawford and of Kays.

    References
    ----------
    van-driest-1956

    Examples
    --------
    >>> round(integrated(100.0, 1.0, turbulent_prandtl=1.0), 9)
    16.527843221
    """
    c = relation("heat", "integrated")
    shape, (y, pr, kap, a) = arrays.columns(
        y_plus=(y_plus, Interval(0.0, 1e12)),
        prandtl=(prandtl, Interval(1e-6, 1e8)),
        kappa=(kappa, KAPPA),
        A_plus=(A_plus, AMOUNT),
    )
    c.use(y_plus=y, prandtl=pr)
    if not callable(turbulent_prandtl):
        arrays.check("turbulent_prandtl", turbulent_prandtl, AMOUNT)

    def kernel(y: Floats, pr: Floats, kap: Floats, a: Floats) -> Floats:
        return _integral(y, pr, kap, a, turbulent_prandtl)

    return shape(arrays.blocks(kernel, y, pr, kap, a))


@cache
def _gauss() -> tuple[Floats, Floats]:
    """Return nodes and weights of all panels together on [0, 1]."""
    x, w = np.polynomial.legendre.leggauss(_NODES)
    starts = np.arange(_PANELS)[:, None]
    return ((starts + 0.5 * (x + 1.0)) / _PANELS).ravel(), np.tile(0.5 * w / _PANELS, _PANELS)


def _integral(
    y: Floats, pr: Floats, kappa: Floats, a: Floats, turbulent_prandtl: TurbulentPrandtl
) -> Floats:
    # scale of the stretching: inside the conduction layer, whose edge goes like Pr^(-1/3)
    scale = 1.0 / np.cbrt(np.maximum(pr, 1.0))
    t_end = np.arcsinh(y / scale)
    total = np.zeros(np.broadcast_shapes(y.shape, pr.shape, kappa.shape, a.shape))
    for node, weight in zip(*_gauss(), strict=True):
        t = node * t_end
        here = scale * np.sinh(t)
        length = kappa * here * -np.expm1(-here / a)
        square = length * length
        ratio = 2.0 * square / (1.0 + np.sqrt(1.0 + 4.0 * square))
        if callable(turbulent_prandtl):
            ratio = np.maximum(ratio, _SMALL)
            prt = turbulent_prandtl(ratio, pr)
        else:
            prt = turbulent_prandtl
        total = total + weight * scale * np.cosh(t) / (1.0 / pr + ratio / prt)
    return total * t_end
