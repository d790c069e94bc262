"""First cell and layer stack: heights from y+, and any of the five numbers of a stack.

A stack has layers of height h_i = h_1 g^(i-1), i = 1..N: five numbers (``first``, ``growth``,
``count``, ``total``, ``last``), two equations. The functions are exact on both sides of g = 1 and
at g = 1 itself.
"""

from __future__ import annotations

from typing import Any

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    FloatLike,
    Interval,
)
from walllaw.geometric_layers import (
    finite,
    out_of_reach,
    refuse,
    stack_count,
    stack_first,
    stack_growth,
    stack_last,
    stack_total,
)
from walllaw.layer_stack import Layers, grid_family, layers
from walllaw.relation import relation

__all__ = [
    "Layers",
    "first_cell_centre",
    "first_cell_height",
    "grid_family",
    "layer_count",
    "layer_first",
    "layer_growth",
    "layer_last",
    "layer_total",
    "layers",
    "y_plus",
]

_COUNT = Interval(1.0, 1e12)
_SEVERAL = Interval(2.0, 1e12)


def first_cell_centre(
    y_plus: FloatLike, friction_velocity: FloatLike, kinematic_viscosity: FloatLike
) -> Any:
    """Return the distance from the wall to the first unknown for a given y+.

    Parameters
    ----------
    y_plus : float or array
        Target y+ of the first unknown [1].
    friction_velocity : float or array
        Friction velocity [m/s].
    kinematic_viscosity : float or array
        Kinematic viscosity at the wall [m2/s].

    Returns
    -------
    float or ndarray
        Wall to cell centre (or to the first node of a node-centred scheme) [m].

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    y_1 = y+ nu/u_tau.

    References
    ----------
    common practice

    Examples
    --------
    >>> f"{first_cell_centre(1.0, 1.59216364199, 1.5e-5):.8e}"
    '9.42114215e-06'
    """
    c = relation("flow", "first_cell_centre")
    shape, (y, u, nu) = arrays.columns(
        y_plus=(y_plus, AMOUNT),
        friction_velocity=(friction_velocity, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
    )
    c.use(y_plus=y, friction_velocity=u, kinematic_viscosity=nu)
    return shape(finite("y_plus", y * nu / u))


def first_cell_height(
    y_plus: FloatLike, friction_velocity: FloatLike, kinematic_viscosity: FloatLike
) -> Any:
    """Return the height of the first cell whose *centre* lies at a given y+.

    Parameters
    ----------
    y_plus : float or array
        Target y+ of the cell centre [1].
    friction_velocity : float or array
        Friction velocity [m/s].
    kinematic_viscosity : float or array
        Kinematic viscosity at the wall [m2/s].

    Returns
    -------
    float or ndarray
        Wall to the outer face of the first cell, twice the centre's distance [m].

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    h_1 = 2 y+ nu/u_tau. A node-centred scheme takes :func:`first_cell_centre` as its height.

    References
    ----------
    common practice

    Examples
    --------
    >>> f"{first_cell_height(1.0, 1.59216364199, 1.5e-5):.8e}"
    '1.88422843e-05'
    """
    c = relation("flow", "first_cell_height")
    shape, (y, u, nu) = arrays.columns(
        y_plus=(y_plus, AMOUNT),
        friction_velocity=(friction_velocity, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
    )
    c.use(y_plus=y, friction_velocity=u, kinematic_viscosity=nu)
    return shape(finite("y_plus", 2.0 * (y * nu / u)))


def y_plus(
    distance: FloatLike, friction_velocity: FloatLike, kinematic_viscosity: FloatLike
) -> Any:
    """Return y+ of a distance from the wall.

    Parameters
    ----------
    distance : float or array
        Distance of the first unknown (not the cell height) from the wall [m].
    friction_velocity : float or array
        Friction velocity [m/s].
    kinematic_viscosity : float or array
        Kinematic viscosity at the wall [m2/s].

    Returns
    -------
    float or ndarray
        y+ [1].

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    y+ = y u_tau/nu.

    References
    ----------
    common practice

    Examples
    --------
    >>> y_plus(0.25, 2.0, 0.5)
    1.0
    """
    c = relation("flow", "y_plus")
    shape, (y, u, nu) = arrays.columns(
        distance=(distance, AMOUNT),
        friction_velocity=(friction_velocity, AMOUNT),
        kinematic_viscosity=(kinematic_viscosity, AMOUNT),
    )
    c.use(distance=y, friction_velocity=u, kinematic_viscosity=nu)
    return shape(finite("distance", y * u / nu))


def layer_total(first: FloatLike, growth: FloatLike, count: FloatLike) -> Any:
    """Return the height of a stack of layers.

    Parameters
    ----------
    first : float or array
        Height of the first layer [m].
    growth : float or array
        Ratio of successive heights [1]; may be below 1.
    count : float or array
        Number of layers, at least 1 [1]; a broken number interpolates.

    Returns
    -------
    float or ndarray
        Height of the stack [m].

    Raises
    ------
    InputError
        If an argument cannot be used or the stack is taller than a double can say.

    Notes
    -----
    H = h_1 (g^N - 1)/(g - 1). Where g^N is near 1 the numerator is expm1(N ln g), elsewhere
    the power itself, so that neither cancels nor amplifies: 3 ulp measured against 50 digits for
    growth 0.5 to 2 and counts to 1000 (and NaN nowhere).

    References
    ----------
    common practice

    Examples
    --------
    >>> f"{layer_total(1e-5, 1.2, 30):.12f}"
    '0.011818815690'
    >>> layer_total(2.0, 1.0, 5)
    10.0
    """
    c = relation("spacing", "total")
    shape, (h, g, n) = arrays.columns(
        first=(first, AMOUNT), growth=(growth, AMOUNT), count=(count, _COUNT)
    )
    c.use(first=h, growth=g, count=n)
    return shape(arrays.blocks(stack_total, h, g, n))


def layer_last(first: FloatLike, growth: FloatLike, count: FloatLike) -> Any:
    """Return the height of the last layer of a stack.

    Parameters
    ----------
    first : float or array
        Height of the first layer [m].
    growth : float or array
        Ratio of successive heights [1].
    count : float or array
        Number of layers, at least 1 [1].

    Returns
    -------
    float or ndarray
        Height of the last layer [m].

    Raises
    ------
    InputError
        If an argument cannot be used or the result is beyond a double.

    Notes
    -----
    h_N = h_1 g^(N-1).

    References
    ----------
    common practice

    Examples
    --------
    >>> layer_last(1.0, 2.0, 5)
    16.0
    """
    c = relation("spacing", "last")
    shape, (h, g, n) = arrays.columns(
        first=(first, AMOUNT), growth=(growth, AMOUNT), count=(count, _COUNT)
    )
    c.use(first=h, growth=g, count=n)
    return shape(arrays.blocks(stack_last, h, g, n))


def layer_first(total: FloatLike, growth: FloatLike, count: FloatLike) -> Any:
    """Return the height of the first layer of a stack of given height.

    Parameters
    ----------
    total : float or array
        Height of the stack [m].
    growth : float or array
        Ratio of successive heights [1].
    count : float or array
        Number of layers, at least 1 [1].

    Returns
    -------
    float or ndarray
        Height of the first layer [m].

    Raises
    ------
    InputError
        If an argument cannot be used or the first layer vanishes.

    Notes
    -----
    h_1 = H (g - 1)/(g^N - 1), accurate as :func:`layer_total` is.

    References
    ----------
    common practice

    Examples
    --------
    >>> f"{layer_first(0.01, 1.2, 25):.12e}"
    '2.118728982054e-05'
    """
    c = relation("spacing", "first")
    shape, (t, g, n) = arrays.columns(
        total=(total, AMOUNT), growth=(growth, AMOUNT), count=(count, _COUNT)
    )
    c.use(total=t, growth=g, count=n)
    return shape(arrays.blocks(stack_first, t, g, n))


def layer_count(first: FloatLike, growth: FloatLike, total: FloatLike) -> Any:
    """Return how many layers reach a given height, as a real number.

    Parameters
    ----------
    first : float or array
        Height of the first layer [m].
    growth : float or array
        Ratio of successive heights [1].
    total : float or array
        Height of the stack, at least ``first`` [m].

    Returns
    -------
    float or ndarray
        Number of layers [1]; :func:`layers` makes it whole and adjusts another number.

    Raises
    ------
    InputError
        If an argument cannot be used, or layers that shrink never reach the height.

    Notes
    -----
    N = log1p[(g - 1) H/h_1]/ln g; H/h_1 at g = 1.

    References
    ----------
    common practice

    Examples
    --------
    >>> round(layer_count(1e-5, 1.2, 0.01), 10)
    29.0876460322
    """
    c = relation("spacing", "count")
    shape, (h, g, t) = arrays.columns(
        first=(first, AMOUNT), growth=(growth, AMOUNT), total=(total, AMOUNT)
    )
    c.use(first=h, growth=g, total=t)
    refuse("total", t, t < h, "at least the height of the first layer")
    refuse("growth", g, out_of_reach(h, g, t), "a ratio with which the layers reach the total")
    return shape(arrays.blocks(stack_count, h, g, t))


def layer_growth(first: FloatLike, total: FloatLike, count: FloatLike) -> Any:
    """Return the ratio of successive layer heights that fills a given height.

    Parameters
    ----------
    first : float or array
        Height of the first layer [m].
    total : float or array
        Height of the stack, above ``first`` [m].
    count : float or array
        Number of layers, at least 2 [1].

    Returns
    -------
    float or ndarray
        Growth ratio [1]; above 1 if and only if total/first is above count.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    With l = ln g, H/h_1 - 1 = e^l (e^((N-1) l) - 1)/(e^l - 1) in logarithms is increasing and
    convex in l, with slopes from 1 to N - 1, so that Newton's steps descend to the root. A fixed
    number of steps; 1 ulp x (1 + condition) measured against 50 digits for counts 2 to 1e6.

    References
    ----------
    common practice

    Examples
    --------
    >>> round(layer_growth(1e-5, 0.01, 30), 13)
    1.1916854289268
    >>> layer_growth(1.0, 5.0, 5)
    1.0
    """
    c = relation("spacing", "growth")
    shape, (h, t, n) = arrays.columns(
        first=(first, AMOUNT), total=(total, AMOUNT), count=(count, _SEVERAL)
    )
    c.use(first=h, total=t, count=n)
    refuse("total", t, t <= h, "a height above that of the first layer")
    return shape(arrays.blocks(stack_growth, h, t, n))
