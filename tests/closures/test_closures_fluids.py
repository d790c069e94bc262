"""Fluids by name or as given, against the property library (CoolProp)."""

from __future__ import annotations

import csv
import subprocess
import sys
from pathlib import Path

import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI
from CoolProp.HumidAirProp import HAPropsSI
from hypothesis import given, settings
from hypothesis import strategies as st

from closures.fluids import fluid
from walllaw.errors import InputError, RangeWarning
from walllaw.relation import record

DATA = Path(__file__).parents[1] / "reference" / "data"


# The accuracy the tables state, against the reference equation of state and transport correlations
# of air (CoolProp): property, its letter there, pressure [Pa], from and to [K], largest difference
ACCURACY = [
    ("density", "D", 101325.0, 200.0, 1900.0, 3e-3), ("density", "D", 1e6, 250.0, 1900.0, 1e-2),
    ("density", "D", 1e6, 200.0, 250.0, 2.4e-2), ("density", "D", 1e4, 200.0, 1900.0, 3e-4),
    ("dynamic_viscosity", "V", 101325.0, 150.0, 400.0, 9e-3), ("dynamic_viscosity", "V", 101325.0, 400.0, 600.0, 2e-2),
    ("dynamic_viscosity", "V", 101325.0, 600.0, 1000.0, 4.1e-2),
    ("thermal_conductivity", "L", 101325.0, 200.0, 1000.0, 2.2e-2),
    ("specific_heat", "C", 101325.0, 200.0, 300.0, 3e-3), ("specific_heat", "C", 101325.0, 300.0, 500.0, 2.5e-2),
    ("speed_of_sound", "A", 101325.0, 200.0, 500.0, 5e-3),
]  # fmt: skip


@pytest.mark.parametrize(("name", "letter", "pressure", "low", "high", "band"), ACCURACY)
@pytest.mark.filterwarnings("ignore::walllaw.errors.RangeWarning")
def test_air_against_the_property_library(name, letter, pressure, low, high, band):
    t = np.linspace(low, high, 101)
    ours = getattr(fluid("air", temperature=t, pressure=pressure), name)
    other = PropsSI(letter, "T", t, "P", pressure, "Air")
    assert np.abs(ours / other - 1.0).max() < band


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


# set_1 is the law of ISO 2533; the two other sets in circulation stay within 0.03 % of it
@pytest.mark.parametrize("row", rows("sutherland_air.csv"), ids=lambda r: r["T_K"])
def test_sutherland(row):
    mu = fluid("air", temperature=float(row["T_K"])).dynamic_viscosity
    assert mu == pytest.approx(float(row["set_1"]), rel=1e-14)
    assert mu == pytest.approx(float(row["set_2"]), rel=3e-4)
    assert mu == pytest.approx(float(row["set_3"]), rel=3e-4)


@pytest.mark.parametrize("name", ["Nitrogen", "CO2", "R134a", "Methane"])
def test_any_fluid_of_the_library(name):
    n = fluid(name, temperature=310.0, pressure=2e5)
    state = ("T", 310.0, "P", 2e5, name)
    letters = {"density": "D", "dynamic_viscosity": "V", "specific_heat": "C", "thermal_conductivity": "L",
               "prandtl": "PRANDTL", "speed_of_sound": "A"}  # fmt: skip
    for field, letter in letters.items():
        assert getattr(n, field) == pytest.approx(PropsSI(letter, *state), rel=1e-12)
    assert n.heat_capacity_ratio == pytest.approx(
        PropsSI("C", *state) / PropsSI("O", *state), rel=1e-12
    )
    assert n.kinematic_viscosity == n.dynamic_viscosity / n.density
    assert n.source == ("bell-2014",)


def test_the_library_is_asked_by_its_own_names():
    assert fluid("CO2", temperature=300.0).name == "CarbonDioxide"
    assert fluid("WATER").name == "Water"


def test_a_fluid_without_a_conductivity_keeps_the_rest():
    n = fluid("HydrogenSulfide", temperature=300.0)
    assert n.kinematic_viscosity > 0.0
    assert n.thermal_conductivity is None
    assert n.prandtl is None
    assert "prandtl" not in n.properties()


def test_steam_through_the_library():
    s = fluid("Water", temperature=400.0)
    assert s.density == pytest.approx(PropsSI("D", "T", 400.0, "P", 101325.0, "Water"), rel=1e-12)


@pytest.mark.parametrize("humidity", [0.0, 0.5, 1.0])
def test_humid_air(humidity):
    moist = fluid("humid air", temperature=300.0, relative_humidity=humidity)
    state = ("T", 300.0, "P", 101325.0, "R", humidity)
    assert moist.density == pytest.approx(1.0 / HAPropsSI("Vha", *state), rel=1e-12)
    assert moist.dynamic_viscosity == pytest.approx(HAPropsSI("M", *state), rel=1e-12)
    # dry, it is the air of the other path: density and viscosity of the tables within 0.5 %
    if humidity == 0.0:
        dry = fluid("air", temperature=300.0)
        assert moist.density == pytest.approx(dry.density, rel=1e-3)
        assert moist.dynamic_viscosity == pytest.approx(dry.dynamic_viscosity, rel=5e-3)


def test_arrays():
    a = fluid("air", temperature=[280.0, 300.0])
    assert a.density.shape == (2,)
    assert a.density[1] == fluid("air", temperature=300.0).density
    w = fluid("water", temperature=300.0, pressure=[1e5, 1e6])
    assert w.density[1] > w.density[0]


@pytest.mark.parametrize(
    ("name", "extra"),
    [("air", {}), ("water", {}), ("Nitrogen", {}), ("humid air", {"relative_humidity": 0.4}),
     (None, {"density": 2.0, "dynamic_viscosity": 1e-5})],
)  # fmt: skip
@pytest.mark.parametrize("shape", [(0,), (1,), (3,), (2, 3)])
def test_every_property_has_the_broadcast_shape_and_the_bits_of_one(name, extra, shape):
    t = np.linspace(280.0, 320.0, int(np.prod(shape))).reshape(shape)
    many = fluid(name, temperature=t, pressure=2e5, **extra).properties()
    assert {v.shape for v in many.values()} == {shape}
    for i in np.ndindex(shape):
        one = fluid(name, temperature=float(t[i]), pressure=2e5, **extra).properties()
        assert one == {n: float(v[i]) for n, v in many.items()}


def test_given_properties():
    f = fluid(density=870.0, dynamic_viscosity=4.2e-3)
    assert f.kinematic_viscosity == 4.2e-3 / 870.0
    assert f.source == ()
    assert fluid(kinematic_viscosity=1e-6).properties() == {"kinematic_viscosity": 1e-6}
    assert fluid(kinematic_viscosity=1e-6, density=1e3).dynamic_viscosity == 1e-3
    assert fluid(kinematic_viscosity=2e-6, dynamic_viscosity=1e-3).density == 1e-3 / 2e-6
    state = fluid(density=2.0, dynamic_viscosity=1e-5, temperature=300.0, gauge_pressure=1e5)
    assert (state.temperature, state.pressure) == (300.0, 201325.0)


@given(st.floats(1e-6, 1e6), st.floats(1e-9, 1e3))
@settings(derandomize=True, deadline=None)
def test_any_two_of_three_agree(density, viscosity):
    f = fluid(density=density, dynamic_viscosity=viscosity)
    other = fluid(density=density, kinematic_viscosity=f.kinematic_viscosity)
    third = fluid(dynamic_viscosity=viscosity, kinematic_viscosity=f.kinematic_viscosity)
    assert other.dynamic_viscosity == pytest.approx(viscosity, rel=1e-15)
    assert third.density == pytest.approx(density, rel=1e-15)


def test_gauge_pressure_and_altitude():
    assert fluid("water", gauge_pressure=2e5).pressure == 301325.0
    assert fluid("water", gauge_pressure=2e5, ambient_pressure=9e4).pressure == 290000.0
    assert fluid("water", ambient_pressure=9e4).pressure == 90000.0
    high = fluid("air", altitude=5000.0)
    assert high.temperature == pytest.approx(255.65, rel=1e-12)  # ISO 2533
    assert fluid("air", altitude=5000.0, gauge_pressure=1e4).pressure == high.pressure + 1e4
    assert fluid("air", altitude=0.0).temperature == 288.15


def test_the_record_shows_what_it_came_from():
    with record() as uses:
        a = fluid("air")
        fluid("water")
    assert {u.relation.id for u in uses} >= {
        "fluids.air_density",
        "fluids.air_viscosity",
        "fluids.water_density",
    }
    assert a.source == ("iso-2533-1975",)
    assert fluid("water").source == ("kell-1975", "iapws-r12-08")


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
        ({"name": "Water", "temperature": 5000.0}, "temperature: got 5000;"),
        ({"name": "water", "pressure": 2e8}, "pressure: got 2e\\+08; accepted: above 0 to 1e\\+08"),
        ({"name": "water", "temperature": 260.0}, "temperature: got 260; accepted: from 273.15 to 423.15"),
        ({"name": "air", "pressure": 5e-324}, "pressure"), ({"name": "air", "temperature": 1e-300}, "temperature"),
        ({"name": "air", "temperature": [300.0, float("nan")]}, "nan at index 1"),
        ({"name": "air", "pressure": 1e5, "ambient_pressure": 1e5}, "ambient_pressure"),
        ({"name": "air", "altitude": 20000.0, "gauge_pressure": -5e4}, "gauge_pressure: got -44525.1 Pa absolute"),
        ({"name": "air", "altitude": [1.0, 2.0], "gauge_pressure": [1.0, 2.0, 3.0]}, "broadcast together"),
        ({"name": "air", "altitude": 1.0, "ambient_pressure": 1e5}, "altitude alone"),
        ({"name": 5}, "the name of a fluid"), ({"name": ""}, "property library"), ({"name": "x" * 500}, "property library"),
        ({"name": "R-134a"}, "did you mean 'R134a'"), ({"name": "Water[0.5]&Ethanol[0.5]"}, "property library"),
        ({"name": "INCOMP::DowQ"}, "property library"), ({"name": "Nitrogen\n"}, "did you mean 'Nitrogen'"),
        ({"name": "Xenon"}, "no viscosity of it: give density and dynamic_viscosity"),
        ({"name": "Nitrogen", "temperature": [300.0, 50.0]}, "got 50 at index 1"),
        ({"name": "Nitrogen", "pressure": 1e12}, "pressure"), ({"name": "Water", "temperature": 373.12429584}, "Saturation pressure"),
        ({"name": "humid air", "temperature": [300.0, 1000.0], "relative_humidity": 0.5}, "outside the range of validity"),
        ({"name": "humid air", "temperature": 380.0, "relative_humidity": 1.0}, "outside the range of validity"),
        ({"density": 1e-320, "dynamic_viscosity": 1.0}, "density"), ({"density": -1.0, "dynamic_viscosity": 1.0}, "density: got -1"),
        ({"density": 1.0, "dynamic_viscosity": 1.0, "altitude": 100.0}, "an altitude and density"),
        ({"density": 1.0, "dynamic_viscosity": 1.0, "relative_humidity": 0.5}, "a humidity and density"),
        ({"density": 1.0, "dynamic_viscosity": 1.0, "temperature": -5.0}, "temperature: got -5"),
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
