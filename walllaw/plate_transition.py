"""Plates with a laminar run and a transition; public names are reached as ``walllaw.plate``."""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import FloatLike, Floats, Interval
from walllaw.plate_local import TURBULENT, schoenherr_local, schoenherr_mean
from walllaw.relation import Relation, relation

_TRANSITION = Interval(1e4, 1e9)  # before 1e4 the layer is too thin for the turbulent line


def transitional(reynolds: FloatLike, transition_reynolds: FloatLike) -> Any:
    """Local skin friction of a plate that is laminar up to a given transition.

    Parameters
    ----------
    reynolds : array_like
        U x/nu [1], from 1e3.
    transition_reynolds : array_like
        U x_t/nu at the transition [1], 1e4 to 1e9.

    Returns
    -------
    float or ndarray
        c_f [1], of the broadcast shape.

    Warns
    -----
    RangeWarning
        Outside Re 1e3 to 1e10 or a transition at 1e5 to 5e6.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    Blasius up to the transition, the Karman-Schoenherr line behind it. The momentum thickness is
    continuous: the turbulent layer starts at the virtual Reynolds number Re_v whose Re_v C_F(Re_v)
    equals the laminar drag up to the transition, M = 1.328 sqrt(Re_t); with
    sqrt(C_F) = 0.242/log10(M) that is explicit.

    References
    ----------
    schoenherr-1932, blasius-1908

    Examples
    --------
    >>> round(transitional(1e7, 5e5), 7)
    0.0024701
    """
    r = relation("plate", "transitional")
    shape, (re, start) = arrays.columns(
        reynolds=(reynolds, TURBULENT), transition_reynolds=(transition_reynolds, _TRANSITION)
    )
    r.use(reynolds=re, transition_reynolds=start)
    line = relation("plate", "karman_schoenherr")
    behind = _virtual(line, re, start)
    mixed = schoenherr_local(line, behind)
    laminar = relation("plate", "laminar")["local"] / np.sqrt(re)
    return shape(np.where(re > start, mixed, laminar))


def transitional_mean(reynolds: FloatLike, transition_reynolds: FloatLike) -> Any:
    """Mean skin friction of a plate that is laminar up to a given transition.

    Parameters
    ----------
    reynolds : array_like
        U L/nu [1], from 1e3.
    transition_reynolds : array_like
        U x_t/nu at the transition [1], 1e4 to 1e9.

    Returns
    -------
    float or ndarray
        C_F [1], of the broadcast shape.

    Warns
    -----
    RangeWarning
        Outside Re 1e3 to 1e10 or a transition at 1e5 to 5e6.

    Raises
    ------
    InputError
        If a value is outside its interval or not finite.

    Notes
    -----
    Blasius up to the transition, the Karman-Schoenherr line behind it. The momentum thickness is
    continuous: the turbulent layer starts at the virtual Reynolds number Re_v whose Re_v C_F(Re_v)
    equals the laminar drag up to the transition, M = 1.328 sqrt(Re_t); with
    sqrt(C_F) = 0.242/log10(M) that is explicit.

    References
    ----------
    schoenherr-1932, blasius-1908

    Examples
    --------
    >>> round(transitional_mean(1e7, 5e5), 7)
    0.002846
    """
    r = relation("plate", "transitional")
    shape, (re, start) = arrays.columns(
        reynolds=(reynolds, TURBULENT), transition_reynolds=(transition_reynolds, _TRANSITION)
    )
    r.use(reynolds=re, transition_reynolds=start)
    line = relation("plate", "karman_schoenherr")
    behind = _virtual(line, re, start)
    mixed = (behind / re) * schoenherr_mean(line, behind)
    laminar = relation("plate", "laminar")["mean"] / np.sqrt(re)
    return shape(np.where(re > start, mixed, laminar))


def _virtual(line: Relation, re: Floats, start: Floats) -> Floats:
    """Reynolds number from the virtual origin of the turbulent layer behind a transition."""
    drag = relation("plate", "laminar")["mean"] * np.sqrt(start)
    virtual = drag * np.square(np.log10(drag) / line["slope"])
    return np.maximum(re - start, 0.0) + virtual
