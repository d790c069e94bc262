"""Units at the edge: good texts, bad texts, definitions against the unit library's own registry."""

from __future__ import annotations

import subprocess
import sys

import pint
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from closures.units import quantity
from walllaw.errors import InputError

GOOD = [
    ("25 degC", "K", 298.15), ("25 °C", "K", 298.15), ("-40 degF", "K", 233.15), ("300 K", "K", 300.0),
    ("491.67 degR", "K", 273.15), ("5 %", "1", 0.05), ("0.05", "1", 0.05), (".5", "1", 0.5),
    ("3 bar", "Pa", 3e5), ("1 atm", "Pa", 101325.0), ("14.7 psi", "Pa", 101352.93220950977),
    ("1013.25 hPa", "Pa", 101325.0), ("250 mmHg", "Pa", 33330.59685575), ("2 kPa", "Pa", 2000.0),
    ("6 m2/s2", "m2/s2", 6.0), ("6 m^2/s^2", "m2/s2", 6.0), ("6 m2.s-2", "m2/s2", 6.0),
    ("6 m2 s-2", "m2/s2", 6.0), ("6 m**2/s**2", "m2/s2", 6.0), ("6 m²/s²", "m2/s2", 6.0),
    ("6 J/kg", "m2/s2", 6.0), ("6 m·m/s/s", "m2/s2", 6.0), ("1e2 mm", "m", 0.1), ("1E-3 km", "m", 1.0),
    ("+2 m", "m", 2.0), ("12 in", "m", 0.3048), ("3 ft", "m", 0.9144), ("1 yd", "m", 0.9144),
    ("5 um", "m", 5e-6), ("5 µm", "m", 5e-6), ("5 μm", "m", 5e-6), ("1 nmi", "m", 1852.0),
    ("36 km/h", "m/s", 10.0), ("10 mph", "m/s", 4.4704), ("10 kn", "m/s", 5.144444444444445),
    ("100 ft/min", "m/s", 0.508), ("4200 m3/h", "m3/s", 1.1666666666666667), ("2 L/s", "m3/s", 0.002),
    ("60 L/min", "m3/s", 0.001), ("100 gpm", "m3/s", 0.00630901964), ("1000 cfm", "m3/s", 0.4719474432),
    ("3.6 t/h", "kg/s", 1.0), ("3600 kg/h", "kg/s", 1.0), ("1 lb/s", "kg/s", 0.45359237),
    ("1 cSt", "m2/s", 1e-6), ("1 St", "m2/s", 1e-4), ("15 mm2/s", "m2/s", 1.5e-5),
    ("1 cP", "Pa*s", 1e-3), ("1 mPa s", "Pa*s", 1e-3), ("1 mPa.s", "Pa*s", 1e-3), ("1 N*s/m2", "Pa*s", 1.0),
    ("1 kg/(m*s)", "Pa*s", 1.0), ("1 kg/(m s)", "Pa*s", 1.0), ("7.536e-4 lb/ft/s", "Pa*s", 7.536e-4 * 0.45359237 / 0.3048),
    ("62.36 lb/ft3", "kg/m3", 62.36 * 0.45359237 / 0.3048**3), ("1.2 kg/m3", "kg/m3", 1.2), ("1.2 kg m-3", "kg/m3", 1.2),
    ("1 g/cm3", "kg/m3", 1000.0), ("10 1/s", "1/s", 10.0), ("10 s-1", "1/s", 10.0), ("10 Hz", "1/s", 10.0),
    ("200 Pa/m", "Pa/m", 200.0), ("1 mbar/m", "Pa/m", 100.0), (40, "m/s", 40.0), (1.5e-5, "m2/s", 1.5e-5),
    ("  7   m ", "m", 7.0), ("7m", "m", 7.0), ("3 W/kg", "m2/s3", 3.0),
]  # fmt: skip


@pytest.mark.parametrize(("text", "unit", "value"), GOOD)
def test_good(text, unit, value):
    assert quantity(text, unit, "x") == pytest.approx(value, rel=1e-9)


BAD = [
    ("1,5 m", "m"), ("1_000 m", "m"), ("25 m/s 3", "m/s"), ("25 M/S", "m/s"), ("m/s 25", "m/s"),
    ("25 m/s # note", "m/s"), ("nan m", "m"), ("inf m", "m"), ("1e400 m", "m"), ("9**9**9 m", "m"),
    ("1 m^2^3^4", "m"), ("1 m^22", "m"), ("1 m//s", "m/s"), ("1 m/", "m"), ("1 /s/", "1/s"),
    ("1 (m", "m"), ("1 m)", "m"), ("1 ((m))", "m"), ("", "m"), (" ", "m"), ("m", "m"), ("1.2.3 m", "m"),
    ("1 mete", "m"), ("1 degX", "K"), ("1 degC/m", "K"), ("1 degC", "m"), ("20 C", "K"),
    ("3 barg", "Pa"), ("3 psig", "Pa"), ("1.8e-5 Pa*s", "m2/s"), ("1e-6 m2/s", "Pa*s"),
    ("5 kg/h", "m3/s"), ("5 m3/h", "kg/s"), ("9.8 kN/m3", "kg/m3"), ("5 m", "1"), ("5 %", "m"),
    ("40 ms", "m/s"), ("1 m*m*m*m*m*m*m*m*m", "m"), ("1 " + "m" * 60, "m"), ("1" * 90, "m"),
    ("１ m", "m"), ("١ m", "m"), ("1 m\n", "s"), ("1 m; import os", "m"), ("1 lambda", "m"),
    ("1 __import__", "m"), ("0x10 m", "m"), ("1e m", "m"), ("1e+ m", "m"), ("--1 m", "m"), ("1 m-", "m"),
    ("1 -m", "m"), ("1 m^", "m"), ("1 m^x", "m"), ("1 3 m", "m"), (True, "m"), (None, "m"), ([1], "m"),
    ({"a": 1}, "m"), (float("nan"), "m"), (float("inf"), "m"), (10**400, "m"), (1 + 2j, "m"), (b"1 m", "m"),
]  # fmt: skip


@pytest.mark.parametrize(("text", "unit"), BAD, ids=lambda x: repr(x)[:30])
def test_bad(text, unit):
    with pytest.raises(InputError, match="flow.x") as caught:
        quantity(text, unit, "flow.x")
    assert "\n" not in str(caught.value)
    assert len(str(caught.value)) < 400


def test_the_usual_slips_are_named():
    with pytest.raises(InputError, match="this is a dynamic viscosity"):
        quantity("1.8e-5 Pa*s", "m2/s", "x")
    with pytest.raises(InputError, match="gauge_pressure"):
        quantity("3 barg", "Pa", "x")
    with pytest.raises(InputError, match="give it as mass_flow"):
        quantity("3 kg/h", "m3/s", "x")
    with pytest.raises(InputError, match="did you mean 'meter'"):
        quantity("3 mete", "m", "x")


# our short list of definitions against the default registry of the unit library (pint)
@pytest.mark.parametrize(
    "unit",
    ["inch", "foot", "yard", "mile", "nautical_mile", "liter", "gallon", "minute", "hour", "day",
     "pound", "slug", "tonne", "newton", "pound_force", "pascal", "bar", "atmosphere", "torr",
     "mmHg", "psi", "joule", "watt", "poise", "stokes", "knot", "mph", "gallon / minute",
     "foot**3 / minute"],
)  # fmt: skip
def test_definitions_agree_with_the_library(unit):
    base = pint.UnitRegistry().Quantity(1.0, unit).to_base_units()
    si = {"meter": "m", "kilogram": "kg", "second": "s"}
    dims = "*".join(f"{si[name]}{int(power)}" for name, power in base.unit_items())
    ours = unit.replace(" ", "").replace("**", "^")
    assert quantity(f"1 {ours}", dims, "x") == pytest.approx(base.magnitude, rel=1e-8)


@given(st.text(max_size=40), st.sampled_from(["m", "K", "m2/s", "1", "Pa"]))
@settings(derandomize=True, deadline=None, max_examples=400)
def test_any_text_gives_a_number_or_an_input_error(text, unit):
    try:
        value = quantity(text, unit, "x")
    except InputError:
        return
    assert isinstance(value, float)


@given(
    st.from_regex(r"[0-9]{1,3}(\.[0-9])? ?[a-zA-Z%°/*.^0-9() -]{1,14}", fullmatch=True),
    st.sampled_from(["m", "K", "m2/s", "1", "Pa"]),
)
@settings(derandomize=True, deadline=None, max_examples=400)
def test_near_misses_give_a_number_or_an_input_error(text, unit):
    try:
        value = quantity(text, unit, "x")
    except InputError:
        return
    assert isinstance(value, float)


def test_plain_numbers_need_no_unit_library():
    code = (
        "import sys; from closures.units import quantity as q;"
        "q('40', 'm/s', 'x'); q('40 m/s', 'm/s', 'x'); q('5 %', '1', 'x'); q(3, 'm', 'x');"
        "assert 'pint' not in sys.modules and 'numpy' not in sys.modules"
    )
    subprocess.run([sys.executable, "-c", code], check=True)
