"""Liquid water against the IAPWS release and the property library (CoolProp)."""

from __future__ import annotations

import csv
from pathlib import Path

import numpy as np
import pytest
from CoolProp.CoolProp import PropsSI

from closures import water
from closures.fluids import fluid
from walllaw.errors import InputError, RangeWarning

DATA = Path(__file__).parents[1] / "reference" / "data"


def rows(name: str) -> list[dict[str, str]]:
    lines = (DATA / name).read_text(encoding="utf-8").splitlines()
    return list(csv.DictReader(line for line in lines if not line.startswith("#")))


@pytest.mark.parametrize("row", rows("iapws_r12_08_viscosity.csv"), ids=lambda r: r["T_K"])
def test_viscosity_to_all_printed_digits_of_the_release(row):
    t, rho = (np.array([float(row[n])]) for n in ("T_K", "rho_kg_m3"))
    assert f"{water.viscosity(t, rho)[0] * 1e6:.6f}" == row["mu_1e-6_Pa_s"]


@pytest.mark.parametrize("row", rows("water_properties.csv"), ids=lambda r: r["t_C"])
def test_at_one_atmosphere(row):
    w = fluid("water", temperature=float(row["t_C"]) + 273.15)
    assert w.density == pytest.approx(float(row["rho_kg_m3"]), rel=5e-6)
    assert w.dynamic_viscosity == pytest.approx(float(row["mu_Pa_s"]), rel=1e-5)
    assert w.kinematic_viscosity == pytest.approx(float(row["nu_m2_s"]), rel=1.5e-5)


# largest difference from the reference equation of state (CoolProp) over every degree:
# pressure [Pa], from and to [K], density, viscosity; the accuracy the module and the manual state
@pytest.mark.parametrize(
    ("pressure", "low", "high", "density", "viscosity"),
    [
        (1e4, 273.16, 318.0, 2e-5, 5e-5),
        (101325.0, 273.16, 373.0, 2e-5, 5e-5),
        (1e6, 273.16, 373.0, 2e-5, 5e-5),
        (1e6, 374.0, 423.0, 1e-4, 2e-4),
        (1e7, 273.16, 373.0, 2e-4, 5e-4),
        (1e7, 374.0, 423.0, 2e-4, 5e-4),
    ],
)
def test_against_the_property_library(pressure, low, high, density, viscosity):
    t = np.arange(low, high, 1.0)
    w = fluid("water", temperature=t, pressure=pressure)
    assert np.abs(w.density / PropsSI("D", "T", t, "P", pressure, "Water") - 1.0).max() < density
    exact = PropsSI("V", "T", t, "P", pressure, "Water")
    assert np.abs(w.dynamic_viscosity / exact - 1.0).max() < viscosity


def test_far_above_the_range_it_warns_and_stays_near():
    with pytest.warns(RangeWarning, match="pressure = 1e\\+08 is outside"):
        w = fluid("water", temperature=300.0, pressure=1e8)
    assert w.density == pytest.approx(PropsSI("D", "T", 300.0, "P", 1e8, "Water"), rel=1e-2)


def test_vapour_pressure():
    t = np.arange(273.16, 423.0, 1.0)
    exact = PropsSI("P", "T", t, "Q", 0, "Water")
    assert np.abs(water.saturation_pressure(t) / exact - 1.0).max() < 1e-4


# triple point 611.657 Pa and normal boiling 373.124 K of the IAPWS formulation (Wagner & Pruss)
def test_vapour_pressure_at_the_fixed_points():
    triple, boiling = water.saturation_pressure(np.array([273.16, 373.1243]))
    assert triple == pytest.approx(611.657, abs=0.02)
    assert boiling == pytest.approx(101325.0, rel=2e-5)


def test_steam_is_refused_at_its_boundary():
    boiling = PropsSI("T", "P", 101325.0, "Q", 0, "Water")
    assert fluid("water", temperature=boiling - 0.02).density < 959.0
    with pytest.raises(InputError, match=r"which is steam.*'Water' of the property library"):
        fluid("water", temperature=boiling + 0.02)
    with pytest.raises(InputError, match="400 K and 101325 Pa"):
        fluid("water", temperature=[300.0, 400.0])


# Kell's polynomial was fitted with its maximum at 3.98 degC, 999.97 kg/m3
def test_density_is_largest_at_four_degrees():
    t = 273.15 + np.arange(0.0, 10.0, 0.01)
    rho = fluid("water", temperature=t).density
    assert t[np.argmax(rho)] - 273.15 == pytest.approx(3.98, abs=0.02)
    assert rho.max() == pytest.approx(999.97, abs=0.01)
