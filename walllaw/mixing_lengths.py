"""Mixing lengths and what they make of a given stress: the gradient of the mean velocity."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

import numpy as np

from walllaw import arrays, roughness
from walllaw.arrays import Floats, Interval
from walllaw.errors import unknown_name
from walllaw.flow_quadrature import Grid
from walllaw.laws import VanDriest
from walllaw.relation import relation

LENGTHS = ("nikuradse", "linear", "escudier", "cess", "laminar")
ROUGHNESS = ("colebrook", "nikuradse", "cebeci-chang")
DAMPING = ("van-driest", "cebeci")
MixingLength = str | Callable[[Floats, Floats], Floats]


@dataclass(frozen=True, slots=True)
class MixingModel:
    """What closes the momentum balance next to one wall."""

    mixing_length: MixingLength
    kappa: float
    A_plus: float
    roughness: str = "colebrook"
    damping: str = "van-driest"

    @property
    def split(self) -> float:
        """Where inner panels end, over R: at the kink of the length, if it has one."""
        if self.mixing_length == "escudier":
            return relation("mixing_length", "escudier")["limit"] / self.kappa
        return 0.5

    @property
    def even(self) -> bool:
        """Whether the length has no kink, and constants of the usual size."""
        usual = 0.3 <= self.kappa <= 0.6 and 15.0 <= self.A_plus <= 60.0
        return usual and self.mixing_length in ("nikuradse", "linear", "cess")

    @property
    def law(self) -> VanDriest:
        """The law of the wall under constant stress."""
        return VanDriest(self.kappa, self.A_plus)

    @property
    def name(self) -> str:
        """Name of the mixing length; ``own`` for a function."""
        return self.mixing_length if isinstance(self.mixing_length, str) else "own"

    def shift(self, ks_plus: Floats) -> Floats:
        """Return the rough-wall shift of y+; by the roughness function it is exact.

        Under constant stress the shifted profile is the smooth one from the shift on, so the shift
        is where the smooth law has u+ = Delta U+.
        """
        if self.roughness == "cebeci-chang":
            r = relation("mixing_length", "cebeci_chang")
            r.use(roughness_plus=ks_plus)
            root = np.sqrt(ks_plus) - ks_plus * np.exp(-ks_plus / r["decay"])
            return np.maximum(r["factor"] * root, 0.0)
        function = roughness.grigson if self.roughness == "colebrook" else roughness.ligrani_moffat
        return np.asarray(self.law.y_plus(function(ks_plus, self.kappa, self.law.B)))

    def gradient(
        self, grid: Grid, re_tau: Floats, shift: Floats, tau: Floats, p_plus: Floats
    ) -> tuple[Floats, Floats]:
        """Return dU+/dy+ and nu_t/nu at the nodes, for a stress tau over that at the wall.

        ``p_plus`` is -(dp/dx) nu/(rho u_tau^3); only the damping of Cebeci needs it.
        """
        if self.mixing_length == "laminar":
            return tau, np.zeros_like(tau)
        square = self._square(grid, re_tau, shift, p_plus)
        slope = self._slope(square, tau)
        if self.mixing_length == "cess":
            return slope, 2.0 * square / (1.0 + np.sqrt(1.0 + 4.0 * square))
        return slope, square * slope

    def slope(
        self, grid: Grid, re_tau: Floats, shift: Floats, tau: Floats, p_plus: Floats
    ) -> Floats:
        """Return the first of these alone, the same to the last digit."""
        if self.mixing_length == "laminar":
            return tau
        return self._slope(self._square(grid, re_tau, shift, p_plus), tau)

    def _slope(self, square: Floats, tau: Floats) -> Floats:
        # in place: on whole blocks a new array costs as much as the arithmetic
        root = 4.0 * square
        if self.mixing_length != "cess":
            root *= tau
        root += 1.0
        np.sqrt(root, out=root)
        root += 1.0
        root *= 0.5
        return np.divide(tau, root, out=root)

    def _square(self, grid: Grid, re_tau: Floats, shift: Floats, p_plus: Floats) -> Floats:
        """Return the square of the length in wall units; of Cess, of that which gives nu_t."""
        y, e = grid.y_plus, grid.eta
        if np.any(shift != 0.0):
            d = shift[:, np.newaxis, np.newaxis]
            y, e = y + d, e + d / re_tau[:, np.newaxis, np.newaxis]
        damping = y * (-1.0 / self.A_plus * self._sharpened(p_plus))
        np.expm1(damping, out=damping)
        if self.mixing_length == "cess":
            r = np.minimum(e, 1.0)
            length = (self.kappa / 6.0) * y * (2.0 - r) * (3.0 - r * (4.0 - 2.0 * r))
        else:
            length = self._length(e, y)
        damping *= length
        damping *= damping
        return damping

    def _sharpened(self, p_plus: Floats) -> Floats | float:
        """Return N of Cebeci: falling pressure thickens the sublayer, until none but it is left."""
        if self.damping == "van-driest":
            return 1.0
        factor = relation("mixing_length", "cebeci_damping")["factor"]
        n = np.sqrt(np.maximum(1.0 - factor * p_plus, 0.0))
        return np.asarray(n[:, np.newaxis, np.newaxis])

    def _length(self, e: Floats, y: Floats) -> Floats:
        """Return the undamped mixing length in wall units."""
        if callable(self.mixing_length):
            return np.asarray(self.mixing_length(e, y)) * (y / e)
        if self.mixing_length == "linear":
            return self.kappa * y
        if self.mixing_length == "escudier":
            limit = relation("mixing_length", "escudier")["limit"]
            return np.minimum(self.kappa * y, limit * (y / e))
        r = relation("mixing_length", "nikuradse")
        e = np.minimum(e, 1.0)
        length = r["c4"] * e
        for name in ("c3", "c2", "c1"):
            length += r[name]
            length *= y if name == "c1" else e
        length *= self.kappa / r["c1"]
        return length

    def use(self, reynolds: Floats) -> None:
        """Note the relations in use; warn outside their range."""
        if self.name not in ("laminar", "own"):
            relation("mixing_length", self.name).use(reynolds=reynolds)


def constants(
    mixing_length: MixingLength,
    kappa: float | None,
    A_plus: float | None,
    rough: str = "colebrook",
    damping: str = "van-driest",
) -> dict[str, Any]:
    """Return the checked fields of a :class:`MixingModel`.

    Raises
    ------
    InputError
        If a name is not known or a constant is out of bounds.
    """
    if not callable(mixing_length) and mixing_length not in LENGTHS:
        raise unknown_name("mixing_length", str(mixing_length), LENGTHS)
    if rough not in ROUGHNESS:
        raise unknown_name("roughness_model", rough, ROUGHNESS)
    if damping not in DAMPING:
        raise unknown_name("damping", damping, DAMPING)
    defaults = relation("mixing_length", "defaults")
    k = arrays.check("kappa", defaults["kappa"] if kappa is None else kappa, Interval(0.2, 1.0))
    wanted = defaults["A_plus"] if A_plus is None else A_plus
    a = arrays.check("A_plus", wanted, Interval(1.0, 200.0))
    return {
        "mixing_length": mixing_length,
        "kappa": float(k),
        "A_plus": float(a),
        "roughness": rough,
        "damping": damping,
    }
