"""Fluids: air and water built in, others of the property library by name, or given properties."""

from __future__ import annotations

from dataclasses import dataclass, fields
from typing import Any

import numpy as np

from closures import water
from closures.standard_atmosphere import standard_atmosphere
from walllaw import arrays
from walllaw.arrays import POSITIVE, FloatLike, Floats, Interval, Shape
from walllaw.errors import InputError, nearest
from walllaw.relation import Relation, relation

ATMOSPHERE = 101325.0  # one standard atmosphere [Pa], a definition
_DEFAULT_TEMPERATURE = {"air": 288.15, "water": 293.15}  # 15 and 20 degC, stated in the manual
_WATER = Interval(273.15, 423.15)


@dataclass(frozen=True, slots=True)
class Fluid:
    """Properties of a fluid; floats, or arrays when temperature or pressure are arrays.

    A property that is not known is None. ``relations`` tells what each property came from.
    """

    name: str
    temperature: Any = None
    pressure: Any = None
    density: Any = None
    dynamic_viscosity: Any = None
    kinematic_viscosity: Any = None
    specific_heat: Any = None
    thermal_conductivity: Any = None
    prandtl: Any = None
    speed_of_sound: Any = None
    heat_capacity_ratio: Any = None
    relations: tuple[Relation, ...] = ()

    def properties(self) -> dict[str, Any]:
        """Return the properties that are known, by name."""
        names = [f.name for f in fields(self) if f.name not in ("name", "relations")]
        return {n: getattr(self, n) for n in names if getattr(self, n) is not None}


def _air(shape: Shape, t: Floats, p: Floats) -> Fluid:
    names = ("air_density", "air_viscosity", "air_conductivity", "air_heat")
    gas, sutherland, conductivity, heat = (relation("fluids", n) for n in names)
    gas.use(temperature=t, pressure=p)
    sutherland.use(temperature=t)
    rho = p / (gas["gas_constant"] * t)
    root = t * np.sqrt(t)
    mu = sutherland["factor"] * root / (t + sutherland["sutherland"])
    shift = conductivity["temperature"] * np.power(10.0, -conductivity["exponent"] / t)
    k = conductivity["factor"] * root / (t + shift)
    ratio = heat["ratio"]
    cp = ratio / (ratio - 1.0) * gas["gas_constant"]
    return Fluid(
        "air", shape(t), shape(p), shape(rho), shape(mu), shape(mu / rho),
        shape(np.full(t.size, cp)), shape(k), shape(mu * cp / k),
        shape(np.sqrt(ratio * gas["gas_constant"] * t)), shape(np.full(t.size, ratio)),
        (gas, sutherland, conductivity, heat),
    )  # fmt: skip


def _water(shape: Shape, t: Floats, p: Floats) -> Fluid:
    arrays.check("temperature", t, _WATER)
    boiling = p < water.saturation_pressure(t)
    if boiling.any():
        i = int(np.argmax(boiling))
        raise InputError(
            "fluid",
            f"water at {t[i]:.6g} K and {p[min(i, p.size - 1)]:.6g} Pa, which is steam",
            "liquid water",
            "name the fluid 'Water' of the property library for steam",
        )
    rho = water.density(t, p)
    mu = water.viscosity(t, rho)
    names = ("water_density", "water_compressibility", "water_viscosity")
    return Fluid(
        "water",
        shape(t),
        shape(p),
        shape(rho),
        shape(mu),
        shape(mu / rho),
        relations=tuple(relation("fluids", n) for n in names),
    )


def _library(name: str, shape: Shape, t: Floats, p: Floats) -> Fluid:
    from CoolProp import CoolProp

    known = CoolProp.FluidsList()
    if name not in known and name.lower() not in {n.lower() for n in known}:
        near = nearest(name, ["air", "water", "humid air", *known])
        hint = f"did you mean {near!r}?" if near else ""
        raise InputError(
            "fluid.name",
            repr(name),
            "air, water, humid air, or a fluid of the property library",
            hint,
        )

    def get(key: str) -> Any:
        values = np.atleast_1d(CoolProp.PropsSI(key, "T", t, "P", p, name))
        if not np.isfinite(values).all():  # arrays get infinities where a number would raise
            CoolProp.PropsSI(key, "T", float(t[0]), "P", float(p[0]), name)
            raise ValueError(f"no {key} at one of the states")
        return shape(values)

    for key, field, values in (("T", "temperature", t), ("P", "pressure", p)):
        low = CoolProp.PropsSI("TMIN", name) if key == "T" else 0.0
        high = CoolProp.PropsSI(f"{key}MAX", name)
        arrays.check(field, values, Interval(low, high))
    keys = {
        "density": "DMASS", "dynamic_viscosity": "VISCOSITY", "specific_heat": "CPMASS",
        "thermal_conductivity": "CONDUCTIVITY", "prandtl": "PRANDTL",
        "speed_of_sound": "SPEED_OF_SOUND",
    }  # fmt: skip
    try:
        found = {n: get(k) for n, k in keys.items()}
    except ValueError as error:
        reason = str(error).split(" : ")[0].replace("\n", " ")[:160]
        raise InputError(
            "fluid", f"{name} at this state", "a state the library covers", reason
        ) from None
    nu = shape(np.atleast_1d(found["dynamic_viscosity"]) / np.atleast_1d(found["density"]))
    return Fluid(
        name,
        shape(t),
        shape(p),
        kinematic_viscosity=nu,
        **found,
        relations=(relation("fluids", "library"),),
    )


def _humid_air(shape: Shape, t: Floats, p: Floats, humidity: Floats) -> Fluid:
    from CoolProp import HumidAirProp

    def get(key: str) -> Floats:
        return np.atleast_1d(HumidAirProp.HAPropsSI(key, "T", t, "P", p, "R", humidity))

    try:
        moist, mu, k, cp = get("Vha"), get("M"), get("K"), get("Cha")
    except ValueError as error:
        raise InputError(
            "fluid", "humid air at this state", "a state the library covers", str(error)[:160]
        ) from None
    rho = 1.0 / moist
    return Fluid(
        "humid air",
        shape(t),
        shape(p),
        shape(rho),
        shape(mu),
        shape(mu / rho),
        shape(cp),
        shape(k),
        shape(mu * cp / k),
        relations=(relation("fluids", "library"),),
    )


def _given(
    given: dict[str, FloatLike], temperature: FloatLike | None, pressure: FloatLike | None
) -> Fluid:
    if len(given) > 2:
        raise InputError("fluid", ", ".join(given), "two of density and the two viscosities")
    if set(given) == {"density"} or set(given) == {"dynamic_viscosity"}:
        raise InputError(
            "fluid", f"{next(iter(given))} alone", "a kinematic viscosity, or two properties"
        )
    shape, flat = arrays.columns(**{n: (v, POSITIVE) for n, v in given.items()})
    v = dict(zip(given, flat, strict=True))
    if "kinematic_viscosity" not in v:
        v["kinematic_viscosity"] = v["dynamic_viscosity"] / v["density"]
    elif "dynamic_viscosity" in v:
        v["density"] = v["dynamic_viscosity"] / v["kinematic_viscosity"]
    elif "density" in v:
        v["dynamic_viscosity"] = v["kinematic_viscosity"] * v["density"]
    return Fluid("given properties", temperature, pressure, **{n: shape(x) for n, x in v.items()})


def _pressure(pressure: FloatLike | None, gauge: FloatLike | None, ambient: FloatLike) -> FloatLike:
    if gauge is None:
        return ambient if pressure is None else pressure
    if pressure is not None:
        raise InputError("gauge_pressure", "pressure as well", "either pressure or gauge_pressure")
    above = arrays.check("gauge_pressure", gauge, Interval(-ATMOSPHERE, open_low=True))
    return np.asarray(above + np.asarray(ambient, dtype=np.float64))


def fluid(
    name: str | None = None,
    *,
    temperature: FloatLike | None = None,
    pressure: FloatLike | None = None,
    gauge_pressure: FloatLike | None = None,
    altitude: FloatLike | None = None,
    relative_humidity: FloatLike | None = None,
    density: FloatLike | None = None,
    dynamic_viscosity: FloatLike | None = None,
    kinematic_viscosity: FloatLike | None = None,
) -> Fluid:
    """Return the properties of a fluid.

    Parameters
    ----------
    name : str, optional
        ``air`` (ideal gas, Sutherland), ``water`` (liquid), ``humid air``, or a fluid of CoolProp.
    temperature : float or array, optional
        [K]; 288.15 for air and 293.15 for others by default.
    pressure : float or array, optional
        Absolute [Pa]; 101325 by default.
    gauge_pressure : float or array, optional
        Above the ambient pressure (standard, or that of the altitude) [Pa], instead of pressure.
    altitude : float or array, optional
        Geopotential [m]: temperature and pressure of the standard atmosphere, for air.
    relative_humidity : float or array, optional
        0 to 1, for humid air.
    density, dynamic_viscosity, kinematic_viscosity : float or array, optional
        Given properties, two of them or the last, without a name [kg/m3], [Pa s], [m2/s].

    Returns
    -------
    Fluid
        Properties in SI; unknown ones are None.

    Warns
    -----
    RangeWarning
        If a correlation is used outside its range.

    Raises
    ------
    InputError
        If the fluid is unknown, the state is not covered, or too much or too little is given.

    References
    ----------
    iso-2533-1975, kell-1975, iapws-r12-08, bell-2014

    Examples
    --------
    >>> air = fluid("air", temperature=298.15)
    >>> f"{air.density:.4f} {air.kinematic_viscosity:.4e}"
    '1.1839 1.5518e-05'
    """
    given = {
        "density": density, "dynamic_viscosity": dynamic_viscosity,
        "kinematic_viscosity": kinematic_viscosity,
    }  # fmt: skip
    properties = {n: v for n, v in given.items() if v is not None}
    if properties:
        if name is not None:
            raise InputError(
                "fluid", f"name and {', '.join(properties)}", "either a name or properties"
            )
        return _given(properties, temperature, pressure)
    if name is None:
        raise InputError("fluid", "neither a name nor properties", "one of the two")
    ambient: FloatLike = ATMOSPHERE
    if altitude is not None:
        if name not in ("air", "humid air") or temperature is not None or pressure is not None:
            raise InputError(
                "altitude", "another fluid, a temperature or a pressure", "air, and altitude alone"
            )
        temperature, ambient = standard_atmosphere(altitude)
    start = _DEFAULT_TEMPERATURE.get(name, 293.15)
    arguments: dict[str, tuple[FloatLike, Interval]] = {
        "temperature": (start if temperature is None else temperature, Interval(0.0, 6000.0, True)),
        "pressure": (_pressure(pressure, gauge_pressure, ambient), POSITIVE),
    }
    if name == "humid air":
        if relative_humidity is None:
            raise InputError("relative_humidity", "nothing", "0 to 1 for humid air")
        arguments["relative_humidity"] = (relative_humidity, Interval(0.0, 1.0))
    elif relative_humidity is not None:
        raise InputError("relative_humidity", f"fluid {name!r}", "the fluid 'humid air'")
    shape, flat = arrays.columns(**arguments)
    size = max(x.size for x in flat)
    t, p, *humidity = (np.ascontiguousarray(np.broadcast_to(x, size)) for x in flat)
    if name == "air":
        return _air(shape, t, p)
    if name == "water":
        return _water(shape, t, p)
    return _humid_air(shape, t, p, humidity[0]) if humidity else _library(name, shape, t, p)
