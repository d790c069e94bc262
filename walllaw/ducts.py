"""Passages of constant section: geometry, laminar constants, shape factors, entrance lengths."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import NONNEGATIVE, POSITIVE, FloatLike, Floats
from walllaw.errors import InputError
from walllaw.relation import relation

# Below this logarithm of the radius ratio the series is shorter than the loss by cancellation.
_SERIES_BELOW = 2.0
_SERIES_TERMS = 16  # L^(2n) 2n/(2n+1)! falls below 1e-17 of the sum for L = 2 after 13 terms
_ODD_TERMS = 8  # 1 - tanh(n pi/2) < 1e-17 for odd n above 13


@dataclass(frozen=True, slots=True)
class Passage:
    """A passage of constant section; all fields float or array of one shape.

    Attributes
    ----------
    area : float or ndarray or None
        Flow area [m2]; None for a plane channel of unknown width.
    hydraulic_diameter : float or ndarray
        Four times area over wetted perimeter [m].
    gap : float or ndarray
        Smallest distance between walls: diameter, height, shorter side, radial gap [m].
    laminar_constant : float or ndarray
        Darcy friction factor times Reynolds number in laminar flow, on the hydraulic diameter [-].
    """

    area: Any
    hydraulic_diameter: Any
    gap: Any
    laminar_constant: Any

    @property
    def shape_factor(self) -> Any:
        """Laminar-equivalent diameter over hydraulic diameter [-] (jones-1976)."""
        return relation("ducts", "laminar_equivalent_diameter")["pipe"] / self.laminar_constant


def pipe(diameter: FloatLike) -> Passage:
    """Round pipe.

    Parameters
    ----------
    diameter : float or array
        Inside diameter [m], positive.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Examples
    --------
    >>> pipe(0.1).hydraulic_diameter
    0.1
    """
    shape, (d,) = arrays.columns(diameter=(diameter, POSITIVE))
    constant = relation("ducts", "friction_laminar")["pipe"]
    return Passage(shape(0.25 * np.pi * d * d), shape(d), shape(d), shape(np.full(d.size, constant)))


def channel(height: FloatLike, width: FloatLike | None = None) -> Passage:
    """Plane channel between wide walls.

    Parameters
    ----------
    height : float or array
        Distance between the walls [m], positive.
    width : float or array, optional
        Only to have a flow area [m].

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Examples
    --------
    >>> channel(0.01).hydraulic_diameter
    0.02
    """
    shape, (h, w) = arrays.columns(
        height=(height, POSITIVE), width=(1.0 if width is None else width, POSITIVE)
    )
    constant = np.full(max(h.size, w.size), relation("ducts", "friction_laminar")["channel"])
    area = None if width is None else shape(h * w)
    return Passage(area, shape(2.0 * h + 0.0 * w), shape(h + 0.0 * w), shape(constant))


def _rectangle_constant(aspect: Floats) -> Floats:
    r = relation("ducts", "rectangle_series")
    odd = np.arange(1.0, 2.0 * _ODD_TERMS, 2.0)[:, np.newaxis]
    # the sum with tanh = 1 is known; only its small deficit is summed
    deficit = 2.0 / (np.exp(np.minimum(odd * np.pi / np.maximum(aspect, 1e-3), 700.0)) + 1.0)
    total = r["odd_sum"] - np.add.reduce(deficit / odd**5, axis=0)
    plane = relation("ducts", "friction_laminar")["channel"]
    return plane / (np.square(1.0 + aspect) * (1.0 - r["factor"] * aspect * total))


def rectangle(width: FloatLike, height: FloatLike) -> Passage:
    """Rectangular duct.

    Parameters
    ----------
    width, height : float or array
        The two sides [m], positive, in any order.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    Laminar constant by the exact series; 1e-15 relative for every aspect ratio.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> round(rectangle(0.1, 0.1).laminar_constant, 9)
    56.90830754
    """
    shape, (w, h) = arrays.columns(width=(width, POSITIVE), height=(height, POSITIVE))
    short, long = np.minimum(w, h), np.maximum(w, h)
    aspect = short / long
    return Passage(
        shape(w * h),
        shape(2.0 * short / (1.0 + aspect)),
        shape(short),
        shape(_rectangle_constant(aspect)),
    )


def _annulus_constant(ratio: Floats) -> Floats:
    """f Re = 128 sinh^2(L/2)/(cosh L - sinh(L)/L), L = -ln(ratio): no cancellation as ratio -> 1."""
    log = np.minimum(-np.log(ratio), 700.0)
    small = np.minimum(log, _SERIES_BELOW)
    square = small * small
    term, series = square / 3.0, square / 3.0
    for n in range(2, _SERIES_TERMS):
        # terms L^(2n) 2n/(2n+1)!
        term = term * square / ((2 * n - 2) * (2 * n + 1))
        series = series + term
    large = np.maximum(log, _SERIES_BELOW)
    direct = np.cosh(large) - np.sinh(large) / large
    bottom = np.where(log < _SERIES_BELOW, series, direct)
    return 2.0 * relation("ducts", "friction_laminar")["pipe"] * np.square(np.sinh(0.5 * log)) / bottom


def annulus(inner_diameter: FloatLike, outer_diameter: FloatLike) -> Passage:
    """Concentric annulus.

    Parameters
    ----------
    inner_diameter, outer_diameter : float or array
        Diameters of the two walls [m], 0 < inner < outer.

    Raises
    ------
    InputError
        If a value is not positive and finite, or inner is not below outer.

    Notes
    -----
    Laminar constant in closed form, 1e-15 relative for every radius ratio.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> round(annulus(0.05, 0.1).laminar_constant, 8)
    95.25016064
    """
    shape, (i, o) = arrays.columns(
        inner_diameter=(inner_diameter, POSITIVE), outer_diameter=(outer_diameter, POSITIVE)
    )
    if (i >= o).any():
        raise InputError("inner_diameter", f"{i.max():g}", "less than outer_diameter")
    gap = 0.5 * (o - i)
    area = 0.25 * np.pi * (o - i) * (o + i)
    return Passage(shape(area), shape(2.0 * gap), shape(gap), shape(_annulus_constant(i / o)))


def entrance_length_laminar(reynolds: FloatLike) -> Any:
    """Laminar entrance length over the diameter, Durst et al. 2005.

    Parameters
    ----------
    reynolds : float or array
        On the hydraulic diameter [-], from 0.

    Returns
    -------
    float or ndarray
        Entrance length over hydraulic diameter [-].

    Warns
    -----
    RangeWarning
        Above Re = 2300.

    Raises
    ------
    InputError
        If a value is negative or not finite.

    References
    ----------
    durst-2005

    Examples
    --------
    >>> round(entrance_length_laminar(1000.0), 2)
    56.72
    """
    r = relation("ducts", "entrance_laminar")
    shape, (re,) = arrays.columns(reynolds=(reynolds, NONNEGATIVE))
    r.use(reynolds=re)
    n = r["power"]
    total = np.power(np.full(1, r["creeping"]), n) + np.power(r["slope"] * re, n)
    return shape(np.power(total, 1.0 / n))


def entrance_length_turbulent(reynolds: FloatLike) -> Any:
    """Turbulent entrance length of the mean profile over the diameter, 4.4 Re^(1/6).

    Parameters
    ----------
    reynolds : float or array
        On the hydraulic diameter [-], positive.

    Returns
    -------
    float or ndarray
        Entrance length over hydraulic diameter [-]; turbulence itself takes 40 to 60 diameters.

    Warns
    -----
    RangeWarning
        Outside Re 4e3 to 1e8.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    common practice

    Examples
    --------
    >>> round(entrance_length_turbulent(1e6), 6)
    44.0
    """
    r = relation("ducts", "entrance_turbulent")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    return shape(r["factor"] * np.sqrt(np.cbrt(re)))
