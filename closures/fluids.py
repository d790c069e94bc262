"""Fluids: air and water built in, others of the property library by name, or given properties."""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import dataclass, fields
from typing import Any

import numpy as np

from closures import water
from closures.standard_atmosphere import standard_atmosphere
from walllaw import arrays
from walllaw.arrays import AMOUNT, SIGNED, FloatLike, Floats, Interval, Shape
from walllaw.errors import InputError, nearest
from walllaw.relation import Relation, relation

ATMOSPHERE = 101325.0  # one standard atmosphere [Pa], a definition
_DEFAULT_TEMPERATURE = {"air": 288.15, "water": 293.15}  # 15 and 20 degC, stated in the manual
_TEMPERATURE = Interval(1.0, 6000.0)
_WATER = Interval(273.15, 423.15)
_WATER_PRESSURE = Interval(0.0, 1e8, open_low=True)  # density is off by 1 % there (see tests)
_HUMIDITY = Interval(0.0, 1.0)
_NAME = re.compile(r"[A-Za-z0-9][A-Za-z0-9(),. -]{0,40}")  # of one fluid: no mixture, no backend


@dataclass(frozen=True, slots=True, eq=False)
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

    @property
    def source(self) -> tuple[str, ...]:
        """The keys of the sources the properties came from, each once."""
        return tuple(dict.fromkeys(r.source for r in self.relations))

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
    arrays.check("temperature", shape(t), _WATER)
    arrays.check("pressure", shape(p), _WATER_PRESSURE)
    boiling = p < water.saturation_pressure(t)
    if boiling.any():
        i = int(np.argmax(boiling))
        raise InputError(
            "fluid",
            f"water at {t[i]:.6g} K and {p[i]:.6g} Pa, which is steam",
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


def _library_name(name: str) -> str:
    """Return the library's own name of a fluid; it knows aliases like CO2."""
    from CoolProp import CoolProp

    try:
        if _NAME.fullmatch(name):
            return str(CoolProp.get_fluid_param_string(name, "name"))
    except ValueError:  # no such fluid: below
        pass
    near = nearest(name[:60], ["air", "water", "humid air", *CoolProp.FluidsList()])
    raise InputError(
        "fluid.name",
        repr(name[:60]),
        "air, water, humid air, or a fluid of the property library",
        f"did you mean {near!r}?" if near else "",
    )


def _look_up(name: str, t: Floats, p: Floats) -> Callable[[str], Floats]:
    from CoolProp import CoolProp

    def get(key: str) -> Floats:
        if t.size == 0:
            return np.empty(0)
        values = np.atleast_1d(CoolProp.PropsSI(key, "T", t, "P", p, name))
        bad = ~np.isfinite(values)
        if bad.any():  # arrays get infinities where a number raises and says why
            i = int(np.argmax(bad))
            CoolProp.PropsSI(key, "T", float(t[i]), "P", float(p[i]), name)
            raise ValueError(f"no {key} at {t[i]:.6g} K and {p[i]:.6g} Pa")
        return values

    return get


def _library(name: str, shape: Shape, t: Floats, p: Floats) -> Fluid:
    from CoolProp import CoolProp

    name = _library_name(name)
    lowest, hottest, highest = (CoolProp.PropsSI(k, name) for k in ("TMIN", "TMAX", "PMAX"))
    arrays.check("temperature", shape(t), Interval(lowest, hottest))
    arrays.check("pressure", shape(p), Interval(0.0, highest, open_low=True))
    get = _look_up(name, t, p)
    try:
        rho, mu = get("DMASS"), get("VISCOSITY")
    except ValueError as error:
        reason = str(error).split(" : ")[0][:160]
        if "model is not available" in reason:
            reason = "the library has no viscosity of it: give density and dynamic_viscosity"
        raise InputError(
            "fluid", f"{name} at this state", "a state the library covers", reason
        ) from None
    optional = {
        "specific_heat": "CPMASS", "thermal_conductivity": "CONDUCTIVITY", "prandtl": "PRANDTL",
        "speed_of_sound": "SPEED_OF_SOUND", "heat_capacity_ratio": "CVMASS",
    }  # fmt: skip
    found: dict[str, Floats] = {}
    for field, key in optional.items():
        try:
            found[field] = get(key)
        except ValueError:  # no such model of this fluid: the property stays unknown
            continue
    if {"specific_heat", "heat_capacity_ratio"} <= found.keys():
        found["heat_capacity_ratio"] = found["specific_heat"] / found["heat_capacity_ratio"]
    else:
        found.pop("heat_capacity_ratio", None)
    return Fluid(
        name,
        shape(t),
        shape(p),
        shape(rho),
        shape(mu),
        shape(mu / rho),
        **{field: shape(values) for field, values in found.items()},
        relations=(relation("fluids", "library"),),
    )


def _humid_air(shape: Shape, t: Floats, p: Floats, humidity: Floats) -> Fluid:
    from CoolProp import HumidAirProp

    def get(key: str) -> Floats:
        if t.size == 0:
            return np.empty(0)
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


def _given(given: dict[str, FloatLike], state: dict[str, FloatLike]) -> Fluid:
    if len(given) > 2:
        raise InputError("fluid", ", ".join(given), "two of density and the two viscosities")
    if set(given) == {"density"} or set(given) == {"dynamic_viscosity"}:
        raise InputError(
            "fluid", f"{next(iter(given))} alone", "a kinematic viscosity, or two properties"
        )
    shape, flat = arrays.columns(**{n: (v, AMOUNT) for n, v in {**given, **state}.items()})
    v = dict(zip([*given, *state], flat, strict=True))
    if "kinematic_viscosity" not in v:
        v["kinematic_viscosity"] = v["dynamic_viscosity"] / v["density"]
    elif "dynamic_viscosity" in v:
        v["density"] = v["dynamic_viscosity"] / v["kinematic_viscosity"]
    elif "density" in v:
        v["dynamic_viscosity"] = v["kinematic_viscosity"] * v["density"]
    return Fluid("given properties", **{n: shape(x) for n, x in v.items()})


def _pressure(
    pressure: FloatLike | None, gauge: FloatLike | None, ambient: FloatLike | None
) -> FloatLike | None:
    """Return the absolute pressure, or None when nothing fixes it."""
    if pressure is not None:
        for name, other in (("gauge_pressure", gauge), ("ambient_pressure", ambient)):
            if other is not None:
                raise InputError(name, "pressure as well", f"either pressure or {name}")
        return pressure
    if gauge is None:
        return ambient
    shape, (above, outside) = arrays.columns(
        gauge_pressure=(gauge, SIGNED),
        ambient_pressure=(ATMOSPHERE if ambient is None else ambient, AMOUNT),
    )
    total = above + outside
    if (total <= 0.0).any():
        lowest = f"{float(total[total <= 0.0][0]):.6g} Pa absolute"
        raise InputError("gauge_pressure", lowest, "more than minus the ambient pressure")
    result: FloatLike = shape(total)
    return result


def _named(
    name: str, temperature: FloatLike | None, pressure: FloatLike | None, humidity: FloatLike | None
) -> Fluid:
    start = _DEFAULT_TEMPERATURE.get(name, 293.15)
    arguments: dict[str, tuple[FloatLike, Interval]] = {
        "temperature": (start if temperature is None else temperature, _TEMPERATURE),
        "pressure": (ATMOSPHERE if pressure is None else pressure, AMOUNT),
    }
    if name == "humid air":
        if humidity is None:
            raise InputError("relative_humidity", "nothing", "0 to 1 for humid air")
        arguments["relative_humidity"] = (humidity, _HUMIDITY)
    elif humidity is not None:
        raise InputError("relative_humidity", f"fluid {name!r}", "the fluid 'humid air'")
    shape, flat = arrays.columns(**arguments)
    t, p, *rest = (np.ascontiguousarray(np.broadcast_to(x, shape.size)) for x in flat)
    if name == "air":
        return _air(shape, t, p)
    if name == "water":
        return _water(shape, t, p)
    return _humid_air(shape, t, p, rest[0]) if rest else _library(name, shape, t, p)


def fluid(
    name: str | None = None,
    *,
    temperature: FloatLike | None = None,
    pressure: FloatLike | None = None,
    gauge_pressure: FloatLike | None = None,
    ambient_pressure: FloatLike | None = None,
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
        [K]; 288.15 for air and 293.15 for others by default. Liquid water: 273.15 to 423.15.
    pressure : float or array, optional
        Absolute [Pa]; 101325 by default. Liquid water: up to 1e8, and above the vapour pressure.
    gauge_pressure : float or array, optional
        Above the ambient pressure [Pa], instead of pressure.
    ambient_pressure : float or array, optional
        Absolute [Pa]; by default one standard atmosphere, or that of the altitude.
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
        extra = {"a name": name, "an altitude": altitude, "a humidity": relative_humidity}
        for other, value in extra.items():
            if value is not None:
                words = f"{other} and {', '.join(properties)}"
                raise InputError("fluid", words, f"either {other} or properties")
        total = _pressure(pressure, gauge_pressure, ambient_pressure)
        state = {"temperature": temperature, "pressure": total}
        return _given(properties, {n: v for n, v in state.items() if v is not None})
    if not isinstance(name, str):
        if name is not None:
            raise InputError("fluid.name", repr(name)[:60], "the name of a fluid")
        raise InputError("fluid", "neither a name nor properties", "one of the two")
    if altitude is not None:
        fixed = (temperature, pressure, ambient_pressure)
        if name not in ("air", "humid air") or any(x is not None for x in fixed):
            raise InputError(
                "altitude", "another fluid, a temperature or a pressure", "air, and altitude alone"
            )
        temperature, ambient_pressure = standard_atmosphere(altitude)
    absolute = _pressure(pressure, gauge_pressure, ambient_pressure)
    return _named(name, temperature, absolute, relative_humidity)
