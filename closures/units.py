"""Units, parsed at the edge: a number, or a text of a number and a unit, becomes an SI float.

Number and unit are split by one strict pattern, and the unit is taken apart into names and small
whole exponents, before the unit library sees any of it; it is asked for single names only. A plain
number and the SI unit itself need no library at all.
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterator
from functools import cache
from typing import Any

from walllaw import tables
from walllaw.errors import InputError, nearest

_TEXT = re.compile(
    r"\s*([+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?)\s*(.*?)\s*", re.ASCII
)
# name with exponent | slash | product | bracket; compiled when the first unit is met
_PIECE = (
    r"([A-Za-zµμ°%][A-Za-zµμ°0-9_]*?)(?:(?:\^|\*\*)?(-?[0-9]))?(?=[\s.*·/()]|$)"
    r"|(/)|([.*·\s]+)|([()])"
)
_MAX_TEXT, _MAX_UNIT, _MAX_FACTORS = 80, 40, 8
_TEMPERATURES = {
    "degC",
    "°C",
    "celsius",
    "degF",
    "°F",
    "fahrenheit",
    "degree_Celsius",
    "degree_Fahrenheit",
}
_GAUGE = {"psig", "barg", "bar_g", "Pag", "kPag"}
# what a dimension measures, by the exponents of length, time, mass, temperature
_WORDS = {
    (0, 0, 0, 0): "a plain number",
    (1, 0, 0, 0): "a length",
    (2, 0, 0, 0): "an area",
    (3, 0, 0, 0): "a volume",
    (0, 1, 0, 0): "a time",
    (0, -1, 0, 0): "a rate",
    (1, -1, 0, 0): "a velocity",
    (3, -1, 0, 0): "a volume flow",
    (0, 0, 1, 0): "a mass",
    (0, -1, 1, 0): "a mass flow",
    (-3, 0, 1, 0): "a density",
    (2, -1, 0, 0): "a kinematic viscosity",
    (-1, -1, 1, 0): "a dynamic viscosity",
    (-1, -2, 1, 0): "a pressure",
    (-2, -2, 1, 0): "a pressure gradient or specific weight",
    (2, -2, 0, 0): "an energy per mass",
    (2, -3, 0, 0): "a dissipation rate",
    (0, 0, 0, 1): "a temperature",
}
_HINTS = {
    ("a dynamic viscosity", "a kinematic viscosity"):
        "this is a dynamic viscosity: give it as dynamic_viscosity, or divide by the density",
    ("a kinematic viscosity", "a dynamic viscosity"):
        "this is a kinematic viscosity: give it as kinematic_viscosity, or multiply by the density",
    ("a mass flow", "a volume flow"): "this is a mass flow: give it as mass_flow",
    ("a volume flow", "a mass flow"): "this is a volume flow: give it as volume_flow",
    ("a pressure gradient or specific weight", "a density"):
        "this is a specific weight: divide by the acceleration of gravity",
}  # fmt: skip
Dimension = tuple[int, int, int, int]


@cache
def _registry() -> Any:
    import pint

    return pint.UnitRegistry(tables.path("units.txt"), on_redefinition="raise")


@cache
def _names() -> tuple[str, ...]:
    lines = tables.text("units.txt").splitlines()
    rows = [line.split(";")[0].split("=") for line in lines if line and line[0] not in "#"]
    return tuple(
        name.strip()
        for row in rows
        if not row[0].strip().endswith("-")
        for name in [row[0], *row[2:]]
    )


@cache
def _single(name: str) -> tuple[float, Dimension] | None:
    """Return factor to SI and dimension of a unit name, or None when there is no such unit."""
    registry = _registry()
    try:
        one = registry.Quantity(1.0, registry.parse_units(name.replace("°", "deg")))
        if name in _TEMPERATURES:
            return 1.0, (0, 0, 0, 1)
        base = one.to_base_units()
        dims = {str(k).strip("[]"): int(v) for k, v in base.dimensionality.items()}
    except Exception:
        return None
    mass = dims.get("mass", 0)
    factor = float(base.magnitude) * 1000.0**-mass  # its base of mass is the gram
    return factor, (dims.get("length", 0), dims.get("time", 0), mass, dims.get("temperature", 0))


def _factors(unit: str) -> Iterator[tuple[str, int]]:
    """Take a unit apart into (name, exponent); ValueError for anything but a plain product."""
    token = re.compile(_PIECE)
    position, sign, depth, expect = 0, 1, 0, True
    while position < len(unit):
        match = token.match(unit, position)
        if match is None:
            raise ValueError(unit[position:])
        name, power, slash, _, bracket = match.groups()
        if name:
            yield name, sign * int(power or 1)
            if depth == 0:
                sign = 1
            expect = False
        elif slash:
            if expect and position > 0:
                raise ValueError(unit[position:])
            sign, expect = -1, True
        elif bracket:
            depth += 1 if bracket == "(" else -1
            if depth not in (0, 1):
                raise ValueError(unit[position:])
            if depth == 0:
                sign = 1
        position = match.end()
    if depth or expect:
        raise ValueError(unit)


def _normal(unit: str) -> str:
    unit = unit.removeprefix("1") if unit.startswith("1/") else unit
    return unit.replace("²", "2").replace("³", "3").replace("⁻", "-").replace("¹", "1")


@cache
def _unit(unit: str) -> tuple[float, Dimension]:
    """Return factor to SI and dimension of a unit text; raises InputError without a field."""
    parts = []
    try:
        parts = list(_factors(_normal(unit)))
    except ValueError:
        raise InputError("unit", repr(unit), "a unit like m/s, kg/m3, m2.s-2") from None
    if len(parts) > _MAX_FACTORS:
        raise InputError("unit", repr(unit), f"at most {_MAX_FACTORS} factors")
    factor, dimension = 1.0, [0, 0, 0, 0]
    for name, power in parts:
        if name in _GAUGE:
            raise InputError(
                "unit", repr(name), "an absolute unit", "use gauge_pressure for a gauge reading"
            )
        if name == "%":
            factor *= 0.01**power
            continue
        if name in _TEMPERATURES and len(parts) > 1:
            raise InputError("unit", repr(unit), "K in a compound unit")
        known = _single(name)
        if known is None:
            near = nearest(name, _names())
            raise InputError(
                "unit",
                repr(name),
                "a unit of the manual",
                f"did you mean {near!r}?" if near else "",
            )
        factor *= known[0] ** power
        dimension = [d + power * e for d, e in zip(dimension, known[1], strict=True)]
    return factor, (dimension[0], dimension[1], dimension[2], dimension[3])


def _celsius(value: float, unit: str) -> float:
    """Turn a temperature reading into kelvin; the scales are definitions."""
    if "C" in unit or unit == "celsius":
        return value + 273.15
    return (value + 459.67) * 5.0 / 9.0


def _number(value: float | int, field: str) -> float:
    try:
        number = float(value)
    except OverflowError:
        number = math.inf
    if not math.isfinite(number):
        raise InputError(field, f"{value!r}"[:40], "a finite number")
    return number


def quantity(value: object, unit: str, field: str) -> float:
    """Return a value in SI.

    Parameters
    ----------
    value : int, float or str
        A bare number is SI already; a text is a number with or without a unit.
    unit : str
        The SI unit of the quantity (``"m/s"``; ``"1"`` for a plain number).
    field : str
        What the value is for, as the error names it.

    Returns
    -------
    float
        The value in that SI unit.

    Raises
    ------
    InputError
        If the text is no number and unit, the unit is not known, or it measures something else.

    Examples
    --------
    >>> quantity("260 mm", "m", "flow.diameter"), quantity("5 %", "1", "turbulence.intensity")
    (0.26, 0.05)
    >>> quantity("25 degC", "K", "fluid.temperature")
    298.15
    """
    if isinstance(value, bool) or not isinstance(value, (int, float, str)):
        raise InputError(field, repr(value)[:60], f"a number, or a text like {_example(unit)}")
    if not isinstance(value, str):
        return _number(value, field)
    match = _TEXT.fullmatch(value) if len(value) <= _MAX_TEXT else None
    if match is None or len(match[2]) > _MAX_UNIT:
        raise InputError(field, repr(value[:60]), f"a number and a unit, like {_example(unit)}")
    number, given = _number(float(match[1]), field), match[2]
    if given in ("", unit):
        return number
    if unit == "1" and given == "%":
        return number / 100.0
    return _convert(number, given, unit, field, value)


def _convert(number: float, given: str, unit: str, field: str, text: str) -> float:
    try:
        factor, dimension = _unit(given)
    except InputError as error:
        raise InputError(
            field, f"{text!r}: unit {error.given}", error.accepted, error.hint
        ) from None
    wanted = (0, 0, 0, 0) if unit == "1" else _unit(unit)[1]
    if dimension != wanted:
        words = _WORDS.get(dimension, "something else")
        accepted = _WORDS.get(wanted, unit)
        hint = _HINTS.get((words, accepted), "")
        raise InputError(field, f"{text!r}, {words}", f"{accepted} ({_example(unit)})", hint)
    result = _celsius(number, given) if given in _TEMPERATURES else number * factor
    return _number(result, field)


def _example(unit: str) -> str:
    return '"5 %" or 0.05' if unit == "1" else f'"1.5 {unit}"'
