"""Nusselt numbers of ducts, on the hydraulic diameter; the friction factor is Darcy's.

Use these through :mod:`walllaw.heat`.
"""

from __future__ import annotations

from typing import Any

import numpy as np

from walllaw import arrays
from walllaw.arrays import (
    AMOUNT,
    FloatLike,
    Floats,
    Interval,
)
from walllaw.errors import InputError, unknown_name
from walllaw.relation import relation

_TURBULENT = Interval(1e3, 1e30, open_low=True)
_GEOMETRIES = ("pipe", "plates")
_WALLS = ("heat_flux", "temperature")


def laminar(geometry: str = "pipe", wall: str = "heat_flux") -> float:
    """Return the Nusselt number of laminar developed flow.

    Parameters
    ----------
    geometry : str, optional
        ``pipe`` or ``plates`` (parallel, both heated alike).
    wall : str, optional
        Uniform ``heat_flux`` or uniform ``temperature`` of the wall.

    Returns
    -------
    float
        Nusselt number on the hydraulic diameter [1].

    Raises
    ------
    InputError
        If a name is unknown.

    Notes
    -----
    48/11, 3.6568; 140/17, 7.5407.

    References
    ----------
    shah-london-1978

    Examples
    --------
    >>> round(laminar("pipe", "temperature"), 4)
    3.6568
    """
    if geometry not in _GEOMETRIES:
        raise unknown_name("geometry", geometry, _GEOMETRIES)
    if wall not in _WALLS:
        raise unknown_name("wall", wall, _WALLS)
    c = relation("heat", "laminar")
    c.use()
    return c[f"{geometry}_{wall}"]


def _duct(reynolds: FloatLike, prandtl: FloatLike) -> tuple[arrays.Shape, list[Floats]]:
    return arrays.columns(reynolds=(reynolds, AMOUNT), prandtl=(prandtl, AMOUNT))


def dittus_boelter(reynolds: FloatLike, prandtl: FloatLike, *, cooled: bool = False) -> Any:
    """Return the Nusselt number of a smooth duct by Dittus and Boelter.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number [1].
    prandtl : float or array
        Prandtl number [1].
    cooled : bool, optional
        Whether the fluid is cooled (exponent 0.3) instead of heated (0.4).

    Returns
    -------
    float or ndarray
        Nusselt number [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is below 1e4 or the Prandtl number outside 0.6 to 160.

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    0.023 Re^0.8 Pr^n; 25 %.

    References
    ----------
    dittus-boelter-1930

    Examples
    --------
    >>> round(dittus_boelter(1e4, 0.7), 6)
    31.605819
    """
    c = relation("heat", "dittus_boelter")
    shape, (re, pr) = _duct(reynolds, prandtl)
    c.use(reynolds=re, prandtl=pr)
    power = np.power(pr, c["cooling"] if cooled else c["heating"])
    return shape(c["factor"] * np.power(re, c["reynolds"]) * power)


def colburn(reynolds: FloatLike, prandtl: FloatLike) -> Any:
    """Return the Nusselt number of a smooth duct by Colburn.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number [1].
    prandtl : float or array
        Prandtl number [1].

    Returns
    -------
    float or ndarray
        Nusselt number [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is below 1e4 or the Prandtl number outside 0.6 to 160.

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    0.023 Re^0.8 Pr^(1/3).

    References
    ----------
    colburn-1933

    Examples
    --------
    >>> round(colburn(1e4, 0.7), 6)
    32.366359
    """
    c = relation("heat", "colburn")
    shape, (re, pr) = _duct(reynolds, prandtl)
    c.use(reynolds=re, prandtl=pr)
    return shape(c["factor"] * np.power(re, c["reynolds"]) * np.cbrt(pr))


def sieder_tate(
    reynolds: FloatLike, prandtl: FloatLike, wall_viscosity_ratio: FloatLike = 1.0
) -> Any:
    """Return the Nusselt number of a smooth duct by Sieder and Tate, for viscous fluids.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number with the properties at the bulk temperature [1].
    prandtl : float or array
        Prandtl number at the bulk temperature [1].
    wall_viscosity_ratio : float or array, optional
        Dynamic viscosity at the bulk over that at the wall temperature [1].

    Returns
    -------
    float or ndarray
        Nusselt number [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is below 1e4 or the Prandtl number outside 0.7 to 16700.

    Raises
    ------
    InputError
        If an argument is not above 0.

    Notes
    -----
    0.027 Re^0.8 Pr^(1/3) (mu/mu_w)^0.14.

    References
    ----------
    sieder-tate-1936

    Examples
    --------
    >>> round(sieder_tate(1e5, 1.0), 6)
    270.0
    """
    c = relation("heat", "sieder_tate")
    shape, (re, pr, ratio) = arrays.columns(
        reynolds=(reynolds, AMOUNT),
        prandtl=(prandtl, AMOUNT),
        wall_viscosity_ratio=(wall_viscosity_ratio, AMOUNT),
    )
    c.use(reynolds=re, prandtl=pr)
    plain = c["factor"] * np.power(re, c["reynolds"]) * np.cbrt(pr)
    return shape(plain * np.power(ratio, c["viscosity"]))


def petukhov_friction(reynolds: FloatLike) -> Any:
    """Return the Darcy friction factor of a smooth pipe that goes with the laws of this module.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number, above 1000 [1].

    Returns
    -------
    float or ndarray
        Darcy friction factor [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is outside 3e3 to 5e6.

    Raises
    ------
    InputError
        If the Reynolds number is not above 1000.

    Notes
    -----
    (0.79 ln Re - 1.64)^(-2).

    References
    ----------
    petukhov-1970

    Examples
    --------
    >>> round(petukhov_friction(1e5), 10)
    0.0179920275
    """
    c = relation("heat", "petukhov_friction")
    shape, (re,) = arrays.columns(reynolds=(reynolds, _TURBULENT))
    c.use(reynolds=re)
    root = c["slope"] * np.log(re) - c["offset"]
    return shape(1.0 / (root * root))


def petukhov(
    reynolds: FloatLike, prandtl: FloatLike, *, darcy_friction: FloatLike | None = None
) -> Any:
    """Return the Nusselt number of a duct by Petukhov.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number, above 1000 [1].
    prandtl : float or array
        Prandtl number [1].
    darcy_friction : float or array, optional
        Friction factor; :func:`petukhov_friction` when left out [1].

    Returns
    -------
    float or ndarray
        Nusselt number [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is outside 1e4 to 5e6 or the Prandtl number outside 0.5 to 2000.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    (f/8) Re Pr/[1.07 + 12.7 sqrt(f/8) (Pr^(2/3) - 1)]; 6 to 10 %.

    References
    ----------
    petukhov-1970

    Examples
    --------
    >>> round(petukhov(1e5, 0.7), 6)
    167.027384
    """
    c = relation("heat", "petukhov")
    shape, (re, pr, f) = _with_friction(reynolds, prandtl, darcy_friction)
    c.use(reynolds=re, prandtl=pr)
    return shape(f / 8.0 * re * pr / _resistance(c["one"], c["factor"], f, pr))


def gnielinski(
    reynolds: FloatLike, prandtl: FloatLike, *, darcy_friction: FloatLike | None = None
) -> Any:
    """Return the Nusselt number of a duct by Gnielinski, down to the end of transition.

    Parameters
    ----------
    reynolds : float or array
        Reynolds number, above 1000 [1].
    prandtl : float or array
        Prandtl number [1].
    darcy_friction : float or array, optional
        Friction factor, also of a rough duct; :func:`petukhov_friction` when left out [1].

    Returns
    -------
    float or ndarray
        Nusselt number [1].

    Warns
    -----
    RangeWarning
        If the Reynolds number is outside 3e3 to 5e6 or the Prandtl number outside 0.5 to 2000.

    Raises
    ------
    InputError
        If an argument cannot be used.

    Notes
    -----
    (f/8) (Re - 1000) Pr/[1 + 12.7 sqrt(f/8) (Pr^(2/3) - 1)]; 10 %.

    References
    ----------
    gnielinski-1976

    Examples
    --------
    >>> round(gnielinski(1e5, 0.7), 6)
    178.622952
    """
    c = relation("heat", "gnielinski")
    shape, (re, pr, f) = _with_friction(reynolds, prandtl, darcy_friction)
    c.use(reynolds=re, prandtl=pr)
    effective = re - c["transition"]
    return shape(f / 8.0 * effective * pr / _resistance(1.0, c["factor"], f, pr))


def _with_friction(
    reynolds: FloatLike, prandtl: FloatLike, darcy_friction: FloatLike | None
) -> tuple[arrays.Shape, list[Floats]]:
    """Check the arguments and fill in the smooth friction factor where none is given.

    At Prandtl numbers of liquid metals the denominator of both laws vanishes, hence the limit.
    """
    if darcy_friction is None:
        darcy_friction = petukhov_friction(reynolds)
    return arrays.columns(
        reynolds=(reynolds, _TURBULENT),
        prandtl=(prandtl, Interval(0.1, 1e30)),
        darcy_friction=(darcy_friction, Interval(0.0, 0.25, open_low=True)),
    )


def _resistance(one: float, factor: float, f: Floats, pr: Floats) -> Floats:
    root = np.cbrt(pr)
    denominator = one + factor * np.sqrt(f / 8.0) * (root * root - 1.0)
    if (denominator <= 0.0).any():
        raise InputError("prandtl", "", "", "too low for this law with so much friction")
    return denominator
