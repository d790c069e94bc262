"""Thicknesses of a flat-plate boundary layer; public names are reached as ``walllaw.plate``."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import NONNEGATIVE, POSITIVE, FloatLike, Floats
from walllaw.relation import Relation, relation
from walllaw.roots import inverse_root


@dataclass(frozen=True, slots=True)
class Layer:
    """Thicknesses of a boundary layer at one distance, or at many.

    Attributes
    ----------
    thickness : float or ndarray
        Laminar: where the velocity is 99 % of the edge's; turbulent: the power law's own [m].
    displacement_thickness : float or ndarray
        [m].
    momentum_thickness : float or ndarray
        [m].
    """

    thickness: Any
    displacement_thickness: Any
    momentum_thickness: Any

    @property
    def shape_factor(self) -> Any:
        """H, displacement over momentum thickness [1]."""
        return self.displacement_thickness / self.momentum_thickness


def laminar_layer(reynolds: FloatLike, distance: FloatLike = 1.0) -> Layer:
    """Thicknesses of the laminar plate layer (Blasius).

    Parameters
    ----------
    reynolds : array_like
        U x/nu [1], positive.
    distance : array_like, optional
        x, from the leading edge [m], from 0; left out: thicknesses over x.

    Returns
    -------
    Layer
        delta_99 = 4.90999 x/sqrt(Re_x), displacement 1.72079, momentum 0.66411.

    Warns
    -----
    RangeWarning
        Outside 1e3 to 3e6.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    References
    ----------
    blasius-1908

    Examples
    --------
    >>> round(laminar_layer(1e5).shape_factor, 9)
    2.591100195
    """
    r = relation("plate", "thickness_laminar")
    shape, (re, x) = arrays.columns(reynolds=(reynolds, POSITIVE), distance=(distance, NONNEGATIVE))
    r.use(reynolds=re)
    scale = x / np.sqrt(re)
    return Layer(
        shape(r["delta_99"] * scale), shape(r["displacement"] * scale), shape(r["momentum"] * scale)
    )


def turbulent_layer(reynolds: FloatLike, distance: FloatLike = 1.0) -> Layer:
    """Thicknesses of the turbulent plate layer by the one-fifth power law.

    Parameters
    ----------
    reynolds : array_like
        U x/nu [1], positive.
    distance : array_like, optional
        x, from the leading edge [m], from 0; left out: thicknesses over x.

    Returns
    -------
    Layer
        delta = 0.37 x Re_x^(-1/5), displacement delta/8, momentum 7 delta/72 (1/7 profile).

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e7.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    References
    ----------
    schlichting-1979

    Examples
    --------
    >>> round(turbulent_layer(1e6).thickness, 11)
    0.02334542175
    """
    r = relation("plate", "thickness_turbulent")
    return _power_layer(r, 5, reynolds, distance)


def turbulent_layer_1_7(reynolds: FloatLike, distance: FloatLike = 1.0) -> Layer:
    """Thicknesses of the turbulent plate layer by the one-seventh power law.

    Parameters
    ----------
    reynolds : array_like
        U x/nu [1], positive.
    distance : array_like, optional
        x, from the leading edge [m], from 0; left out: thicknesses over x.

    Returns
    -------
    Layer
        delta = 0.16 x Re_x^(-1/7), displacement delta/8, momentum 7 delta/72 (1/7 profile).

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    References
    ----------
    white-2011

    Examples
    --------
    >>> round(turbulent_layer_1_7(1e6).thickness, 11)
    0.02223192791
    """
    r = relation("plate", "thickness_turbulent_1_7")
    return _power_layer(r, 7, reynolds, distance)


def _power_layer(r: Relation, degree: int, reynolds: FloatLike, distance: FloatLike) -> Layer:
    shape, (re, x) = arrays.columns(reynolds=(reynolds, POSITIVE), distance=(distance, NONNEGATIVE))
    r.use(reynolds=re)
    delta: Floats = r["factor"] * x * inverse_root(re, degree)
    return Layer(shape(delta), shape(r["displacement"] * delta), shape(r["momentum"] * delta))


def thickness_laminar(reynolds: FloatLike) -> Any:
    """Thickness delta_99 of the laminar plate layer over the distance (see `laminar_layer`).

    Parameters
    ----------
    reynolds : array_like
        U x/nu [1], positive.

    Returns
    -------
    float or ndarray
        delta_99/x [1].

    Warns
    -----
    RangeWarning
        Outside 1e3 to 3e6.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    blasius-1908

    Examples
    --------
    >>> round(thickness_laminar(1e6), 8)
    0.00490999
    """
    return laminar_layer(reynolds).thickness


def thickness_turbulent(reynolds: FloatLike) -> Any:
    """Thickness of the turbulent plate layer over the distance (see `turbulent_layer`).

    Parameters
    ----------
    reynolds : array_like
        U x/nu [1], positive.

    Returns
    -------
    float or ndarray
        delta/x = 0.37 Re_x^(-1/5) [1].

    Warns
    -----
    RangeWarning
        Outside 5e5 to 1e7.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    References
    ----------
    schlichting-1979

    Examples
    --------
    >>> round(thickness_turbulent(1e6), 11)
    0.02334542175
    """
    return turbulent_layer(reynolds).thickness


def re_tau(reynolds: FloatLike) -> Any:
    """Friction Reynolds number of the turbulent plate by the one-seventh power laws.

    Parameters
    ----------
    reynolds : array_like
        U x/nu [1], positive.

    Returns
    -------
    float or ndarray
        delta u_tau/nu [1].

    Warns
    -----
    RangeWarning
        Outside 1e5 to 1e9.

    Raises
    ------
    InputError
        If a value is not positive and finite.

    Notes
    -----
    From delta = 0.16 x Re_x^(-1/7) and c_f = 0.027 Re_x^(-1/7): 0.01859 Re_x^(11/14).

    References
    ----------
    white-2011

    Examples
    --------
    >>> round(re_tau(1e6), 5)
    962.88092
    """
    r = relation("plate", "re_tau")
    shape, (re,) = arrays.columns(reynolds=(reynolds, POSITIVE))
    r.use(reynolds=re)
    root = inverse_root(re, 7)
    return shape(r["factor"] * re * root * np.sqrt(root))
