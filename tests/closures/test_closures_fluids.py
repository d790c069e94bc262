"""Fluids against the property library (CoolProp), the IAPWS release and the ISO atmosphere."""

from __future__ import annotations

import subprocess
import sys
import warnings

import fluids as general
import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI
from CoolProp.HumidAirProp import HAPropsSI

from closures import water
from closures.fluids import fluid
from closures.standard_atmosphere import standard_atmosphere
from walllaw.errors import InputError, RangeWarning


# IAPWS R12-08 (2008), computer-program verification table without critical enhancement:
# T [K], rho [kg/m3], mu [1e-6 Pa s]; all printed digits
@pytest.mark.parametrize(
    ("temperature", "density", "viscosity"),
    [
        (298.15, 998, 889.735100), (373.15, 1000, 307.883622), (433.15, 1, 14.538324),
        (873.15, 1, 32.619287), (873.15, 100, 35.802262), (1173.15, 1, 44.217245),
        (1173.15, 100, 47.640433),
    ],
)  # fmt: skip
def test_iapws_viscosity_to_all_printed_digits(temperature, density, viscosity):
    mu = water.viscosity(np.array([temperature]), np.array([float(density)]))[0]
    assert round(mu * 1e6, 6) == viscosity


# Water at 0.101325 MPa, IAPWS-95 and R12-08: t [degC], rho, mu
@pytest.mark.parametrize(
    ("celsius", "density", "viscosity"),
    [
        (0.01, 999.843762, 0.001791132), (5, 999.966634, 0.0015181728),
        (15, 999.102621, 0.0011375676), (20, 998.207150, 0.0010015961),
        (30, 995.649454, 0.0007972218), (60, 983.195824, 0.00046603508),
    ],
)  # fmt: skip
def test_water_at_one_atmosphere(celsius, density, viscosity):
    w = fluid("water", temperature=celsius + 273.15)
    assert w.density == pytest.approx(density, rel=5e-6)
    assert w.dynamic_viscosity == pytest.approx(viscosity, rel=1e-5)


@pytest.mark.parametrize("temperature", [273.2, 300.0, 350.0, 373.0, 400.0, 423.0])
@pytest.mark.parametrize("pressure", [101325.0, 1e6, 1e7])
def test_water_against_the_property_library(temperature, pressure):
    if pressure < PropsSI("P", "T", temperature, "Q", 0, "Water"):
        with pytest.raises(InputError, match="steam"):
            fluid("water", temperature=temperature, pressure=pressure)
        return
    w = fluid("water", temperature=temperature, pressure=pressure)
    state = ("T", temperature, "P", pressure, "Water")
    assert w.density == pytest.approx(PropsSI("D", *state), rel=3e-4)
    assert w.dynamic_viscosity == pytest.approx(PropsSI("V", *state), rel=1e-3)


@pytest.mark.parametrize("temperature", [280.0, 320.0, 373.15, 420.0])
def test_vapour_pressure(temperature):
    p = water.saturation_pressure(np.array([temperature]))[0]
    assert p == pytest.approx(PropsSI("P", "T", temperature, "Q", 0, "Water"), rel=1e-4)


@pytest.mark.parametrize("temperature", [220.0, 260.0, 300.0, 350.0, 450.0])
@pytest.mark.parametrize("pressure", [1e4, 1e5, 5e5])
def test_air_against_the_property_library(temperature, pressure):
    a = fluid("air", temperature=temperature, pressure=pressure)
    state = ("T", temperature, "P", pressure, "Air")
    assert a.density == pytest.approx(PropsSI("D", *state), rel=1e-2)
    assert a.dynamic_viscosity == pytest.approx(PropsSI("V", *state), rel=1.5e-2)
    assert a.specific_heat == pytest.approx(PropsSI("C", *state), rel=2.5e-2)
    assert a.thermal_conductivity == pytest.approx(PropsSI("L", *state), rel=3e-2)
    assert a.speed_of_sound == pytest.approx(PropsSI("A", *state), rel=5e-3)


# Sutherland's law of ISO 2533: mu at T [K], 16 digits from the formula with 1.458e-6 and 110.4
@pytest.mark.parametrize(
    ("temperature", "viscosity"),
    [
        (216.65, 1.4216130796413358e-5),
        (288.15, 1.7893802780775829e-5),
        (500, 2.6705333479641984e-5),
    ],
)
def test_sutherland(temperature, viscosity):
    assert fluid("air", temperature=temperature).dynamic_viscosity == pytest.approx(
        viscosity, rel=1e-14
    )


# ISO 2533:1975 at geopotential altitude: T [K], p [Pa], rho
@pytest.mark.parametrize(
    ("altitude", "temperature", "pressure", "density"),
    [
        (0, 288.15, 101325.0, 1.22499915589), (1000, 281.65, 89874.5705022, 1.11164181169),
        (5000, 255.65, 54019.9121038, 0.736115355164), (11000, 216.65, 22632.0639735, 0.363917775912),
        (20000, 216.65, 5474.88866968, 0.0880348036471),
    ],
)  # fmt: skip
def test_standard_atmosphere(altitude, temperature, pressure, density):
    t, p = standard_atmosphere(altitude)
    assert t == pytest.approx(temperature, rel=1e-12)
    assert p == pytest.approx(pressure, rel=5e-6)  # R* = 8314.32 there, R = 287.05287 here
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", RangeWarning)
        air = fluid("air", altitude=altitude)
    assert air.density == pytest.approx(density, rel=3e-6)


@pytest.mark.parametrize("geopotential", [500.0, 8000.0, 15000.0, 25000.0, 31000.0])
def test_standard_atmosphere_against_a_general_library(geopotential):
    radius = 6356766.0
    geometric = radius * geopotential / (radius - geopotential)
    other = general.ATMOSPHERE_1976(geometric)
    t, p = standard_atmosphere(geopotential)
    assert t == pytest.approx(other.T, rel=1e-7)
    assert p == pytest.approx(other.P, rel=1e-5)


def test_any_fluid_of_the_library_and_humid_air():
    n = fluid("Nitrogen", temperature=300.0, pressure=1e5)
    assert n.density == pytest.approx(PropsSI("D", "T", 300, "P", 1e5, "Nitrogen"), rel=1e-12)
    moist = fluid("humid air", temperature=300.0, relative_humidity=0.5)
    volume = HAPropsSI("Vha", "T", 300, "P", 101325, "R", 0.5)
    assert moist.density == pytest.approx(1 / volume, rel=1e-12)
    assert moist.density < fluid("air", temperature=300.0).density


def test_arrays():
    a = fluid("air", temperature=[280.0, 300.0])
    assert a.density.shape == (2,)
    assert a.density[1] == fluid("air", temperature=300.0).density
    w = fluid("water", temperature=300.0, pressure=[1e5, 1e6])
    assert w.density[1] > w.density[0]


def test_given_properties():
    f = fluid(density=870.0, dynamic_viscosity=4.2e-3)
    assert f.kinematic_viscosity == 4.2e-3 / 870.0
    assert fluid(kinematic_viscosity=1e-6).density is None
    assert fluid(kinematic_viscosity=1e-6, density=1e3).dynamic_viscosity == 1e-3


def test_gauge_pressure_and_altitude():
    assert fluid("water", gauge_pressure=2e5).pressure == 301325.0
    assert fluid("air", altitude=0.0).temperature == 288.15


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        ({}, "neither"), ({"name": "watr"}, "did you mean 'water'"), ({"name": "Nitrogn"}, "Nitrogen"),
        ({"name": "air", "density": 1.0}, "either a name or properties"), ({"density": 1.0}, "alone"),
        ({"density": 1.0, "dynamic_viscosity": 1.0, "kinematic_viscosity": 1.0}, "two of"),
        ({"name": "water", "temperature": 260.0}, "temperature"),
        ({"name": "water", "temperature": 450.0}, "temperature"),
        ({"name": "water", "temperature": 400.0}, "steam"),
        ({"name": "air", "temperature": -5.0}, "temperature"),
        ({"name": "air", "pressure": 0.0}, "pressure"),
        ({"name": "air", "pressure": 1e5, "gauge_pressure": 1e4}, "gauge_pressure"),
        ({"name": "air", "gauge_pressure": -2e5}, "gauge_pressure"),
        ({"name": "water", "altitude": 100.0}, "altitude"),
        ({"name": "air", "altitude": 100.0, "temperature": 300.0}, "altitude"),
        ({"name": "air", "altitude": 1e6}, "altitude"),
        ({"name": "humid air"}, "relative_humidity"),
        ({"name": "air", "relative_humidity": 0.5}, "humid air"),
        ({"name": "humid air", "relative_humidity": 1.5}, "relative_humidity"),
        ({"name": "Water", "temperature": 5000.0}, "temperature: got 5000"),
    ],
)  # fmt: skip
def test_what_cannot_be_used_is_named(arguments, words):
    with pytest.raises(InputError, match=words) as caught:
        fluid(**arguments)
    assert "\n" not in str(caught.value)


def test_out_of_range_warns():
    with pytest.warns(RangeWarning, match="Sutherland"):
        fluid("air", temperature=1500.0)
    with pytest.warns(RangeWarning, match="pressure"):
        fluid("air", pressure=1e7)


def test_built_in_fluids_need_no_library():
    code = (
        "import sys; from closures.fluids import fluid; fluid('air'); fluid('water');"
        "assert not {'CoolProp', 'pint', 'scipy'} & set(sys.modules)"
    )
    subprocess.run([sys.executable, "-c", code], check=True)
