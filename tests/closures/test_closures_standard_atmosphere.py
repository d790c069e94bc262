"""The standard atmosphere against the 1976 tables and a general-purpose library (fluids)."""

from __future__ import annotations

import csv
import warnings
from pathlib import Path

import fluids as general
import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from closures.fluids import fluid
from closures.standard_atmosphere import standard_atmosphere
from walllaw.errors import InputError, RangeWarning

DATA = Path(__file__).parents[1] / "reference" / "data"
# gas constant 287.05287 (ISO 2533) against 8314.32/28.9644 = 287.05307 (US 1976): 7e-7, times
# ln(p0/p) = 2.9 at 20 km
OTHER_GAS_CONSTANT = 3e-6


def rows() -> list[dict[str, float]]:
    lines = (DATA / "standard_atmosphere.csv").read_text(encoding="utf-8").splitlines()
    table = csv.DictReader(line for line in lines if not line.startswith("#"))
    return [{name: float(value) for name, value in row.items()} for row in table]


@pytest.mark.parametrize("row", rows(), ids=lambda r: f"{r['geopotential_m']:g}")
def test_table(row):
    t, p = standard_atmosphere(row["geopotential_m"])
    assert t == pytest.approx(row["T_K"], rel=1e-12)
    assert p == pytest.approx(row["p_Pa"], rel=OTHER_GAS_CONSTANT)
    air = fluid("air", altitude=row["geopotential_m"])
    assert air.density == pytest.approx(row["rho_kg_m3"], rel=OTHER_GAS_CONSTANT)
    assert air.speed_of_sound == pytest.approx(row["a_m_s"], rel=OTHER_GAS_CONSTANT)
    assert air.dynamic_viscosity == pytest.approx(row["mu_Pa_s"], rel=1e-11)
    assert air.kinematic_viscosity == pytest.approx(row["nu_m2_s"], rel=OTHER_GAS_CONSTANT)


# the other library takes the geometric altitude z: H = r z/(r + z), r = 6356766 m
@pytest.mark.parametrize(
    "geopotential", [-1000.0, 500.0, 8000.0, 11000.0, 15000.0, 25000.0, 31000.0]
)
def test_against_a_general_library(geopotential):
    radius = 6356766.0
    other = general.ATMOSPHERE_1976(radius * geopotential / (radius - geopotential))
    t, p = standard_atmosphere(geopotential)
    assert t == pytest.approx(other.T, rel=1e-7)
    assert p == pytest.approx(other.P, rel=1e-5)


# printed in the 1976 tables for the top of the third layer, 32 km: 228.65 K, 868.02 Pa
def test_thirty_two_kilometres():
    t, p = standard_atmosphere(32000.0)
    assert t == pytest.approx(228.65, rel=1e-12)
    assert p == pytest.approx(868.02, abs=0.005)


@given(st.floats(-4999.0, 31999.0))
@settings(derandomize=True, deadline=None)
def test_hydrostatic_equilibrium(altitude):
    """dp/dH = -rho g0 with p = rho R T, by a central difference that may straddle a layer."""
    with warnings.catch_warnings():
        warnings.simplefilter("ignore", RangeWarning)
        t, p = standard_atmosphere(altitude + np.array([-0.5, 0.0, 0.5]))
    assert p[2] - p[0] == pytest.approx(-p[1] / (287.05287 * t[1]) * 9.80665, rel=2e-5)


def test_single_values_and_arrays_have_the_same_bits():
    h = np.linspace(0.0, 32000.0, 50)
    t, p = standard_atmosphere(h)
    one = [standard_atmosphere(float(x)) for x in h]
    assert [x for x, _ in one] == t.tolist()
    assert [x for _, x in one] == p.tolist()


def test_outside():
    with pytest.warns(RangeWarning, match="altitude = -3000 is outside"):
        standard_atmosphere(-3000.0)
    for altitude in (32001.0, -5001.0, np.nan):
        with pytest.raises(InputError, match="altitude: got"):
            standard_atmosphere(altitude)
