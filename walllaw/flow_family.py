"""Friction of smooth developed flow as an interpolated family, for millions of cases.

The solutions for one geometry and one mixing length are a curve: ln U_b+ over ln Re_tau or over
ln Re. It is held as Chebyshev series on equal pieces, made from solutions of `developed`.
"""

from __future__ import annotations

import warnings
from functools import cached_property
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike, Floats, Interval
from walllaw.developed_flow import developed
from walllaw.errors import RangeWarning
from walllaw.mixing_lengths import MixingLength

_PIECES = 128
_TERMS = 9


class FlowFamily:
    """Bulk velocity and friction of smooth developed flow, interpolated.

    Parameters
    ----------
    geometry : str, optional
        ``pipe``, ``channel``, ``open-channel`` or ``couette``.
    mixing_length, kappa, A_plus, damping : optional
        As in :func:`walllaw.developed`.

    Notes
    -----
    128 pieces of 9 terms over Re_tau 2 to 1e9: within 1e-13 of the solutions themselves. The two
    curves are made when first asked for, in about 20 and 300 ms.

    Examples
    --------
    >>> family = FlowFamily("pipe")
    >>> f"{family.bulk_u_plus(1000.0):.10f}"
    '18.7396341808'
    """

    def __init__(
        self,
        geometry: str = "pipe",
        *,
        mixing_length: MixingLength = "nikuradse",
        kappa: float | None = None,
        A_plus: float | None = None,
        damping: str = "van-driest",
    ) -> None:
        self._geometry = geometry
        self._closing: dict[str, Any] = {
            "mixing_length": mixing_length,
            "kappa": kappa,
            "A_plus": A_plus,
            "damping": damping,
        }
        ends = self._solved(re_tau=np.array([2.0, 1e9])).reynolds
        self._re_tau = Interval(2.0, 1e9)
        top = min(float(ends[1]) * (1.0 - 1e-12), 1e12)  # laminar flow would go further
        self._reynolds = Interval(float(ends[0]) * (1.0 + 1e-12), top)

    def _solved(self, **given: Any) -> Any:
        with warnings.catch_warnings():
            warnings.simplefilter("ignore", RangeWarning)
            return developed(self._geometry, **given, **self._closing)

    def _curve(self, name: str, bounds: Interval) -> tuple[float, float, Floats]:
        """Return the low end and the width of a piece in ln x, and the series, term by piece."""
        low, high = np.log([bounds.low, bounds.high])
        width = (high - low) / _PIECES
        nodes = np.polynomial.chebyshev.chebpts1(_TERMS)
        x = low + width * (np.arange(_PIECES) + 0.5)[:, np.newaxis] + 0.5 * width * nodes
        x = np.clip(x, low, high)
        y = np.log(self._solved(**{name: np.exp(x)}).bulk_u_plus)
        series = np.linalg.solve(np.polynomial.chebyshev.chebvander(nodes, _TERMS - 1), y.T)
        return float(low), float(width), np.ascontiguousarray(series)

    @cached_property
    def _over_re_tau(self) -> tuple[float, float, Floats]:
        return self._curve("re_tau", self._re_tau)

    @cached_property
    def _over_reynolds(self) -> tuple[float, float, Floats]:
        return self._curve("reynolds", self._reynolds)

    @staticmethod
    def _bulk(curve: tuple[float, float, Floats], values: Floats) -> Floats:
        low, width, series = curve
        place = (np.log(values) - low) / width
        piece = np.minimum(np.maximum(place, 0.0), _PIECES - 1.0).astype(np.intp)
        twice = 4.0 * (place - piece) - 2.0
        b1 = series[_TERMS - 1].take(piece)
        b2 = np.zeros_like(b1)
        for term in range(_TERMS - 2, 0, -1):  # Clenshaw
            b1, b2 = series[term].take(piece) + twice * b1 - b2, b1
        return np.asarray(np.exp(series[0].take(piece) + 0.5 * twice * b1 - b2))

    def bulk_u_plus(self, re_tau: FloatLike) -> Any:
        """Return U_b+ for a friction Reynolds number, 2 to 1e9 [1]."""
        shape, (x,) = arrays.columns(re_tau=(re_tau, self._re_tau))
        curve = self._over_re_tau
        return shape(arrays.blocks(lambda v: self._bulk(curve, v), x))

    def darcy_friction(self, reynolds: FloatLike) -> Any:
        """Return the Darcy friction factor for a Reynolds number on the hydraulic diameter [1]."""
        shape, (x,) = arrays.columns(reynolds=(reynolds, self._reynolds))
        curve = self._over_reynolds

        def kernel(v: Floats) -> Floats:
            bulk = self._bulk(curve, v)
            return 8.0 / (bulk * bulk)

        return shape(arrays.blocks(kernel, x))
