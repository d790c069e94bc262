"""Passages of constant section: geometry, laminar constants, shape factors, entrance lengths."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Floats, Interval
from walllaw.duct_flow import (
    entrance_length_laminar,
    entrance_length_laminar_channel,
    entrance_length_turbulent,
    regime,
)
from walllaw.errors import InputError
from walllaw.relation import relation

__all__ = [
    "Passage",
    "annulus",
    "annulus_constant",
    "channel",
    "entrance_length_laminar",
    "entrance_length_laminar_channel",
    "entrance_length_turbulent",
    "jones_rectangle",
    "pipe",
    "rectangle",
    "rectangle_constant",
    "regime",
]

_RATIO = Interval(0.0, 1.0)
# Up to this logarithm of the radius ratio the series is used: the direct form loses digits below.
_SERIES_UP_TO = 2.0
_SERIES_TERMS = 13  # L^(2n) 2n/(2n+1)! falls below 1e-17 of the sum for L = 2
_ODD_TERMS = 6  # 2/(exp(n pi) + 1)/n^5 falls below 1e-18 for odd n from 11


@dataclass(frozen=True, slots=True)
class Passage:
    """A passage of constant section; every field is a float or an array of one shape.

    Attributes
    ----------
    area : float or ndarray or None
        Flow area [m2]; None for a plane channel of unknown width.
    hydraulic_diameter : float or ndarray
        Four times area over wetted perimeter [m].
    gap : float or ndarray
        Smallest distance between walls: diameter, height, shorter side, radial gap [m].
    laminar_constant : float or ndarray
        Darcy friction factor times Reynolds number in laminar flow, on the hydraulic diameter [1].
    """

    area: Any
    hydraulic_diameter: Any
    gap: Any
    laminar_constant: Any

    @property
    def wetted_perimeter(self) -> Any:
        """Wetted perimeter [m]; None for a plane channel of unknown width."""
        return None if self.area is None else 4.0 * self.area / self.hydraulic_diameter

    @property
    def shape_factor(self) -> Any:
        """Laminar-equivalent diameter over hydraulic diameter, 64/(f Re) [1] (jones-1976)."""
        return relation("ducts", "laminar_equivalent_diameter")["pipe"] / self.laminar_constant

    @property
    def laminar_equivalent_diameter(self) -> Any:
        """Diameter with which a pipe's turbulent friction law fits the passage [m] (jones-1976)."""
        return self.shape_factor * self.hydraulic_diameter


def pipe(diameter: FloatLike) -> Passage:
    """Round pipe.

    Parameters
    ----------
    diameter : array_like
        Inside diameter [m], positive.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> pipe(0.1).hydraulic_diameter
    0.1
    """
    shape, (d,) = arrays.columns(diameter=(diameter, POSITIVE))
    constant = relation("ducts", "friction_laminar")["pipe"]
    return Passage(
        shape(0.25 * np.pi * d * d), shape(d), shape(d), shape(np.full(d.size, constant))
    )


def channel(height: FloatLike, width: FloatLike | None = None) -> Passage:
    """Plane channel between wide walls.

    Parameters
    ----------
    height : array_like
        Distance between the walls [m], positive.
    width : array_like, optional
        Only to have a flow area [m], positive; the side walls are not counted as wetted.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> channel(0.01).hydraulic_diameter
    0.02
    """
    shape, (h, w) = arrays.columns(
        height=(height, POSITIVE), width=(1.0 if width is None else width, POSITIVE)
    )
    ones = np.ones(max(h.size, w.size))
    constant = relation("ducts", "friction_laminar")["channel"] * ones
    area = None if width is None else shape(h * w)
    return Passage(area, shape(2.0 * h * ones), shape(h * ones), shape(constant))


def rectangle(width: FloatLike, height: FloatLike) -> Passage:
    """Rectangular duct.

    Parameters
    ----------
    width, height : array_like
        The two sides [m], positive, in any order.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> round(rectangle(0.1, 0.1).laminar_constant, 8)
    56.90830754
    """
    shape, (w, h) = arrays.columns(width=(width, POSITIVE), height=(height, POSITIVE))
    short = np.minimum(w, h)
    aspect = short / np.maximum(w, h)
    diameter = 2.0 * short / (1.0 + aspect)
    return Passage(shape(w * h), shape(diameter), shape(short), shape(_rectangle(aspect)))


def annulus(inner_diameter: FloatLike, outer_diameter: FloatLike) -> Passage:
    """Concentric annulus.

    Parameters
    ----------
    inner_diameter, outer_diameter : array_like
        Diameters of the two walls [m], 0 < inner < outer.

    Raises
    ------
    InputError
        If a value is not positive and finite, or inner is not below outer.

    References
    ----------
    shah-london-1978, jones-leung-1981

    Examples
    --------
    >>> round(annulus(0.05, 0.1).laminar_constant, 8)
    95.25016064
    """
    shape, (i, o) = arrays.columns(
        inner_diameter=(inner_diameter, POSITIVE), outer_diameter=(outer_diameter, POSITIVE)
    )
    bad = i >= o
    if bad.any():
        first = int(np.argmax(bad))
        given = f"{float(i[min(first, i.size - 1)]):g} inside {float(o[min(first, o.size - 1)]):g}"
        raise InputError("inner_diameter", given, "less than outer_diameter")
    area = 0.25 * np.pi * (o - i) * (o + i)
    return Passage(shape(area), shape(o - i), shape(0.5 * (o - i)), shape(_annulus(i / o)))


def rectangle_constant(aspect_ratio: FloatLike) -> Any:
    """Laminar Darcy friction factor times Reynolds number of a rectangular duct.

    Parameters
    ----------
    aspect_ratio : array_like
        Shorter over longer side [1], 0 (parallel plates) to 1 (square).

    Returns
    -------
    float or ndarray
        f Re on the hydraulic diameter [1], 96 to 56.9.

    Raises
    ------
    InputError
        If a value is not from 0 to 1.

    Notes
    -----
    f Re = 96/{(1 + a)^2 [1 - (192 a/pi^5) sum tanh(n pi/(2a))/n^5]}, n odd. The sum with tanh = 1
    is known in closed form; six terms of the deficit reach double precision for every aspect
    ratio. Measured against 50 digits: 5 ulp.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> round(rectangle_constant(0.5) / 4, 9)
    15.548056147
    >>> rectangle_constant(0.0)
    96.0
    """
    shape, (a,) = arrays.columns(aspect_ratio=(aspect_ratio, _RATIO))
    relation("ducts", "rectangle_constant").use(aspect_ratio=a)
    return shape(_rectangle(a))


def _rectangle(aspect: Floats) -> Floats:
    r = relation("ducts", "rectangle_constant")
    safe = np.maximum(aspect, 1e-3)  # below, every term of the deficit is exactly nothing
    deficit = np.zeros(aspect.size)
    for n in range(2 * _ODD_TERMS - 1, 0, -2):  # smallest first
        weight = 2.0 / float(n**5)
        deficit = deficit + weight / (np.exp(np.minimum(n * np.pi / safe, 600.0)) + 1.0)
    inner = 1.0 - r["factor"] * aspect * (r["odd_sum"] - deficit)
    return np.asarray(r["plates"] / (np.square(1.0 + aspect) * inner))


def annulus_constant(radius_ratio: FloatLike) -> Any:
    """Laminar Darcy friction factor times Reynolds number of a concentric annulus.

    Parameters
    ----------
    radius_ratio : array_like
        Inner over outer radius [1], 0 (limit of a vanishing wire: a pipe) to 1 (parallel plates).

    Returns
    -------
    float or ndarray
        f Re on the hydraulic diameter [1], 64 to 96.

    Raises
    ------
    InputError
        If a value is not from 0 to 1.

    Notes
    -----
    f Re = 64 (1 - r)^2/[1 + r^2 + (1 - r^2)/ln r]. With L = -ln r this is
    64 (cosh L - 1)/(cosh L - sinh(L)/L), of which both parts have series of positive terms: nothing
    cancels as r -> 1. Measured against 50 digits: 4 ulp.

    References
    ----------
    shah-london-1978, jones-leung-1981

    Examples
    --------
    >>> round(annulus_constant(0.5) / 4, 9)
    23.812540159
    >>> annulus_constant([0.0, 1.0])
    array([64., 96.])
    """
    shape, (ratio,) = arrays.columns(radius_ratio=(radius_ratio, _RATIO))
    relation("ducts", "annulus_constant").use(radius_ratio=ratio)
    return shape(_annulus(ratio))


def _annulus(ratio: Floats) -> Floats:
    pipe_constant = relation("ducts", "friction_laminar")["pipe"]
    log = -np.log(np.where(ratio > 0.0, ratio, 1.0))
    square = np.square(np.minimum(log, _SERIES_UP_TO))
    top, bottom, term = np.zeros(log.size), np.zeros(log.size), np.full(log.size, 0.5)
    for n in range(1, _SERIES_TERMS + 1):
        # L^(2n-2)/(2n)!, and the same times 2n/(2n+1)
        top = top + term
        bottom = bottom + term * (2 * n / (2 * n + 1))
        term = term * square / ((2 * n + 1) * (2 * n + 2))
    far = np.maximum(log, _SERIES_UP_TO)
    r = np.minimum(ratio, np.exp(-_SERIES_UP_TO))
    far_bottom = (1.0 + r * r) - (1.0 - r * r) / far
    near = log < _SERIES_UP_TO
    value = np.where(near, top, np.square(1.0 - r)) / np.where(near, bottom, far_bottom)
    return pipe_constant * np.where(ratio > 0.0, value, 1.0)


def jones_rectangle(aspect_ratio: FloatLike) -> Any:
    """Laminar-equivalent over hydraulic diameter of a rectangular duct, approximation of Jones.

    Parameters
    ----------
    aspect_ratio : array_like
        Shorter over longer side [1], 0 to 1.

    Returns
    -------
    float or ndarray
        Shape factor [1], within 1.9 % of the exact 64/(f Re).

    Raises
    ------
    InputError
        If a value is not from 0 to 1.

    Notes
    -----
    2/3 + (11/24) a (2 - a).

    References
    ----------
    jones-1976

    Examples
    --------
    >>> round(jones_rectangle(1.0), 6)
    1.125
    """
    r = relation("ducts", "jones_rectangle")
    shape, (a,) = arrays.columns(aspect_ratio=(aspect_ratio, _RATIO))
    r.use(aspect_ratio=a)
    return shape(r["plates"] + r["slope"] * a * (2.0 - a))
