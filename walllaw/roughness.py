"""Rough walls: the shift of the log law, and by name what the two modules beside this one hold.

The roughness function is the downward shift dU+ of the log law, u+ = ln(y+)/kappa + B - dU+. Two
families exist and differ 13 times at k_s+ = 5: uniform sand (Nikuradse) stays smooth to 2.25,
commercial surfaces (Colebrook) leave the smooth law from the start. Which one a surface belongs to
is an input. ``roughness_plus`` is k_s+ = k_s u_tau/nu everywhere. Equivalent heights are in
:mod:`walllaw.roughness_heights`, wall values of k and omega in :mod:`walllaw.rough_wall_values`.
"""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    AMOUNT_OR_ZERO,
    INTERCEPT,
    KAPPA,
    SIGNED,
    FloatLike,
    Floats,
    Interval,
)
from walllaw.errors import unknown_name
from walllaw.relation import Relation, relation
from walllaw.rough_wall_values import (
    knopp_displacement,
    knopp_k_wall,
    knopp_omega_wall,
    omega_hellsten,
    omega_slightly_rough,
    omega_wilcox_1988,
    omega_wilcox_2006,
    spalart_allmaras_displacement,
)
from walllaw.roughness_heights import (
    aerodynamic_roughness,
    equivalent_roughness,
    flack_schultz,
    from_aerodynamic,
    nikuradse_constant,
    wall_function_height,
)

__all__ = [
    "aerodynamic_roughness",
    "cebeci_bradshaw",
    "equivalent_roughness",
    "flack_schultz",
    "from_aerodynamic",
    "fully_rough",
    "grigson",
    "intercept",
    "knopp_displacement",
    "knopp_k_wall",
    "knopp_omega_wall",
    "ligrani_moffat",
    "nikuradse_constant",
    "omega_hellsten",
    "omega_slightly_rough",
    "omega_wilcox_1988",
    "omega_wilcox_2006",
    "regime",
    "spalart_allmaras_displacement",
    "wall_function_height",
    "wall_function_shift",
]

_REGIMES = np.array(["smooth", "transitional", "fully rough"])


def regime(roughness_plus: FloatLike, criterion: str = "sand") -> Any:
    """Return the regime of a rough wall.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+ [1].
    criterion : str, optional
        ``sand``: limits of the fit to Nikuradse's sand; ``any-surface``: those of a review of many
        surfaces.

    Returns
    -------
    str or ndarray of str
        ``smooth`` (to 2.25; any surface: to 4), ``transitional`` or ``fully rough`` (from 90; 80).

    Raises
    ------
    InputError
        If k_s+ is negative, or the criterion is not known.

    Notes
    -----
    Commercial surfaces of Colebrook's type have no smooth regime. A log layer is left above the
    roughness only where the layer is some 40 times as thick as the elements are high.

    References
    ----------
    ligrani-moffat-1986, jimenez-2004

    Examples
    --------
    >>> regime(40.0), regime(3.0), regime(3.0, "any-surface")
    ('transitional', 'transitional', 'smooth')
    """
    rows = {"sand": "regimes", "any-surface": "regimes_any_surface"}
    if criterion not in rows:
        raise unknown_name("criterion", criterion, rows)
    c = relation("roughness", rows[criterion])
    shape, (ks,) = arrays.columns(roughness_plus=(roughness_plus, AMOUNT_OR_ZERO))
    c.use(roughness_plus=ks)
    index = (ks > c["smooth"]).astype(np.intp) + (ks >= c["rough"])
    names: NDArray[np.str_] = _REGIMES[index]
    return str(names[0]) if shape.dims == () else names.reshape(shape.dims)


def _shift_arguments(
    roughness_plus: FloatLike, kappa: FloatLike, B: FloatLike, interval: Interval
) -> tuple[arrays.Shape, list[Floats]]:
    return arrays.columns(
        roughness_plus=(roughness_plus, interval), kappa=(kappa, KAPPA), B=(B, INTERCEPT)
    )


def fully_rough(roughness_plus: FloatLike, kappa: FloatLike = 0.41, B: FloatLike = 5.0) -> Any:
    """Return the roughness function of a fully rough wall.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+, above 0 [1].
    kappa, B : float or array, optional
        Smooth log law [1].

    Returns
    -------
    float or ndarray
        dU+ [1]; negative for small k_s+, where it does not apply.

    Warns
    -----
    RangeWarning
        If k_s+ is below 90.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    dU+ = ln(k_s+)/kappa + B - 8.5.

    References
    ----------
    nikuradse-1933

    Examples
    --------
    >>> round(fully_rough(1000.0), 10)
    13.3481836073
    """
    c = relation("roughness", "fully_rough")
    shape, (ks, kap, b) = _shift_arguments(roughness_plus, kappa, B, AMOUNT)
    c.use(roughness_plus=ks)
    return shape(_rough_line(c, ks, kap, b))


def ligrani_moffat(roughness_plus: FloatLike, kappa: FloatLike = 0.41, B: FloatLike = 5.0) -> Any:
    """Return the roughness function of sand, with the sine interpolation in its exact form.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+ [1].
    kappa, B : float or array, optional
        Smooth log law [1].

    Returns
    -------
    float or ndarray
        dU+, never below 0 [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    [ln(k_s+)/kappa + B - 8.5] sin{(pi/2) ln(k_s+/2.25)/ln(90/2.25)} from 2.25 to 90, 0 below, the
    bracket alone above. The bracket is negative below k_s+ = exp[kappa (8.5 - B)], 4.2 for
    (0.41, 5.0): there this function is clipped at 0, since no sand speeds the flow up.

    References
    ----------
    ligrani-moffat-1986

    Examples
    --------
    >>> round(ligrani_moffat(40.0), 10), ligrani_moffat(3.0)
    (5.1727667893, 0.0)
    """
    c = relation("roughness", "ligrani_moffat")
    shape, (ks, kap, b) = _shift_arguments(roughness_plus, kappa, B, AMOUNT_OR_ZERO)
    c.use(roughness_plus=ks)
    width = np.log(np.array([c["rough"] / c["smooth"]]))
    inside = np.clip(ks, c["smooth"], c["rough"])
    sine = np.sin(0.5 * np.pi * np.log(inside / c["smooth"]) / width)
    sine = np.where(ks < c["rough"], sine, 1.0)
    return shape(np.maximum(_rough_line(c, np.maximum(ks, c["smooth"]), kap, b) * sine, 0.0))


def cebeci_bradshaw(roughness_plus: FloatLike, kappa: FloatLike = 0.41, B: FloatLike = 5.0) -> Any:
    """Return the roughness function of sand, with the rounded constants in common use.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+ [1].
    kappa, B : float or array, optional
        Smooth log law [1].

    Returns
    -------
    float or ndarray
        dU+, never below 0 [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    [ln(k_s+)/kappa + B - 8.5] sin{0.4258 [ln(k_s+) - 0.811]} from 2.25 to 90, 0 below, the bracket
    alone above; clipped at 0 as :func:`ligrani_moffat` is, from which it differs by 2e-4.

    References
    ----------
    cebeci-bradshaw-1977

    Examples
    --------
    >>> round(cebeci_bradshaw(40.0), 10)
    5.1726077479
    """
    c = relation("roughness", "cebeci_bradshaw")
    shape, (ks, kap, b) = _shift_arguments(roughness_plus, kappa, B, AMOUNT_OR_ZERO)
    c.use(roughness_plus=ks)
    line = _rough_line(c, np.maximum(ks, c["smooth"]), kap, b)
    return shape(np.maximum(line * _rounded_sine(c, ks), 0.0))


def _rough_line(c: Relation, ks: Floats, kappa: Floats, b: Floats) -> Floats:
    return np.log(ks) / kappa + (b - c["B_rough"])


def _rounded_sine(c: Relation, ks: Floats) -> Floats:
    """Return 0 in the smooth regime, 1 in the fully rough one and the rounded sine between."""
    inside = np.clip(ks, c["smooth"], c["rough"])
    sine = np.where(ks < c["rough"], np.sin(c["slope"] * (np.log(inside) - c["shift"])), 1.0)
    return np.where(ks <= c["smooth"], 0.0, sine)


def grigson(roughness_plus: FloatLike, kappa: FloatLike = 0.41, B: FloatLike = 5.0) -> Any:
    """Return the roughness function of commercial surfaces, of Colebrook's type.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+ [1].
    kappa, B : float or array, optional
        Smooth log law [1].

    Returns
    -------
    float or ndarray
        dU+ [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    ln(1 + a k_s+)/kappa with a = exp[kappa (B - 8.5)], the only factor that tends to the fully
    rough line: 0.238 for (0.41, 5.0), 0.301 for (0.40, 5.5).

    References
    ----------
    grigson-1992, colebrook-1939

    Examples
    --------
    >>> round(grigson(5.0), 10)
    1.9125973105
    """
    c = relation("roughness", "grigson")
    shape, (ks, kap, b) = _shift_arguments(roughness_plus, kappa, B, AMOUNT_OR_ZERO)
    c.use(roughness_plus=ks)
    return shape(np.log1p(ks * np.exp(kap * (b - c["B_rough"]))) / kap)


def wall_function_shift(
    roughness_plus: FloatLike, C_s: FloatLike = 0.5, kappa: FloatLike = 0.41
) -> Any:
    """Return the roughness function of a wall function with a roughness constant.

    Parameters
    ----------
    roughness_plus : float or array
        k+ of the height the wall function is given [1].
    C_s : float or array, optional
        Roughness constant, above 0 [1].
    kappa : float or array, optional
        von Karman constant [1].

    Returns
    -------
    float or ndarray
        dU+, never below 0 [1].

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    Three branches: 0 to 2.25; ln[(k+ - 2.25)/87.75 + C_s k+]/kappa sin{0.4258 [ln(k+) - 0.811]} to
    90, clipped at 0; ln(1 + C_s k+)/kappa above. With C_s = 0.5 the fully rough intercept is not
    Nikuradse's 8.5: :func:`equivalent_roughness` says which sand the wall really has.

    References
    ----------
    cebeci-bradshaw-1977

    Examples
    --------
    >>> round(wall_function_shift(30.0, 0.5, 0.4187), 9)
    5.817088219
    """
    c = relation("roughness", "wall_function_shift")
    shape, (ks, cs, kap) = arrays.columns(
        roughness_plus=(roughness_plus, AMOUNT_OR_ZERO), C_s=(C_s, AMOUNT), kappa=(kappa, KAPPA)
    )
    c.use(roughness_plus=ks)
    rise = np.clip((ks - c["smooth"]) / c["width"], 0.0, 1.0)
    line = np.log(rise + cs * np.maximum(ks, c["smooth"])) / kap
    return shape(np.maximum(line * _rounded_sine(c, ks), 0.0))


def intercept(
    roughness_plus: FloatLike,
    shift: FloatLike,
    kappa: FloatLike = 0.41,
    B: FloatLike = 5.0,
) -> Any:
    """Return the intercept of the log law written with the distance over the roughness.

    Parameters
    ----------
    roughness_plus : float or array
        k_s+, above 0 [1].
    shift : float or array
        Roughness function dU+ at that k_s+ [1].
    kappa, B : float or array, optional
        Smooth log law [1].

    Returns
    -------
    float or ndarray
        B_s of u+ = ln(y/k_s)/kappa + B_s [1]; 8.5 for fully rough sand.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    B_s = B + ln(k_s+)/kappa - dU+.

    References
    ----------
    nikuradse-1933

    Examples
    --------
    >>> round(intercept(200.0, fully_rough(200.0)), 10)
    8.5
    """
    c = relation("roughness", "intercept")
    shape, (ks, du, kap, b) = arrays.columns(
        roughness_plus=(roughness_plus, AMOUNT),
        shift=(shift, SIGNED),
        kappa=(kappa, KAPPA),
        B=(B, INTERCEPT),
    )
    c.use(roughness_plus=ks)
    return shape(b + np.log(ks) / kap - du)
