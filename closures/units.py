"""Units, parsed at the edge: a number, or a text of a number and a unit, becomes an SI float.

Number and unit are split by one strict pattern, and the unit is taken apart into names and small
whole exponents. Names come from ``tables/units.toml``, whose factors are exact; the result is the
double nearest to the exact product. Only a longer name that the table lacks is looked up in the
unit library (one name at a time, never a number or a combination).
"""

from __future__ import annotations

import math
import re
from collections.abc import Iterator, Mapping
from fractions import Fraction
from functools import cache, lru_cache
from numbers import Integral, Real
from typing import Any

from walllaw import tables
from walllaw.errors import InputError, nearest
from walllaw.exact import Number, evaluate

_NUMBER = r"([+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?)(.*)"
# a name may hold digits inside (inH2O); its exponent is one digit, so no tower of powers fits
_FACTOR = r"([A-Za-zµμ°]+(?:[0-9_][A-Za-z]+)*)(?:(?:\^|\*\*)?(-?[1-9]))?"
_OPERATOR = r"\s*(/)\s*|\s*[*·.]\s*|\s+"
_GAUGE = r"(psi|[a-zA-Z]{0,2}bar|[a-zA-Z]?Pa|atm)[ _]?\(?(g|gauge)\)?"
_MAX_TEXT, _MAX_UNIT, _MAX_FACTORS = 80, 40, 8
_SHORT = 3  # shorter names the table lacks are slips (M, C, F), though the unit library knows them
# superscripts, and the blanks and the minus that copied text holds
_PLAIN = str.maketrans("²³⁴¹⁻\u2212\u00a0\u2009\u202f", "2341--   ")
Dimension = tuple[int, int, int, int]  # exponents of length, time, mass, temperature
_BASE: Mapping[str, Dimension] = {
    "m": (1, 0, 0, 0), "s": (0, 1, 0, 0), "kg": (0, 0, 1, 0), "K": (0, 0, 0, 1)
}  # fmt: skip
_NONE: Dimension = (0, 0, 0, 0)
_WORDS: Mapping[Dimension, str] = {
    _NONE: "a plain number",
    (1, 0, 0, 0): "a length",
    (2, 0, 0, 0): "an area",
    (3, 0, 0, 0): "a volume",
    (0, 1, 0, 0): "a time",
    (0, -1, 0, 0): "a rate",
    (1, -1, 0, 0): "a velocity",
    (1, -2, 0, 0): "an acceleration",
    (3, -1, 0, 0): "a volume flow",
    (0, 0, 1, 0): "a mass",
    (0, -1, 1, 0): "a mass flow",
    (-3, 0, 1, 0): "a density",
    (2, -1, 0, 0): "a kinematic viscosity",
    (-1, -1, 1, 0): "a dynamic viscosity",
    (1, -2, 1, 0): "a force",
    (-1, -2, 1, 0): "a pressure",
    (-2, -2, 1, 0): "a pressure gradient or specific weight",
    (2, -2, 1, 0): "an energy",
    (2, -3, 1, 0): "a power",
    (2, -2, 0, 0): "an energy per mass",
    (2, -3, 0, 0): "a dissipation rate",
    (0, 0, 0, 1): "a temperature",
    (2, -2, 0, -1): "a specific heat",
    (1, -3, 1, -1): "a thermal conductivity",
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
    ("a density", "a pressure gradient or specific weight"):
        "this is a density: multiply by the acceleration of gravity",
}  # fmt: skip


def _spelled(rows: Mapping[str, Any]) -> Iterator[tuple[str, str]]:
    for key, row in rows.items():
        yield from ((name, key) for name in (key, *row.get("names", ())))


@cache
def _table() -> dict[str, tuple[Fraction, Dimension]]:
    """Return every unit name with factor and dimension, those with a prefix included."""
    raw = tables.read("units.toml")
    factors: dict[str, Number] = {}
    plain: dict[str, tuple[Fraction, Dimension]] = {}
    prefixed: dict[str, tuple[Fraction, Dimension]] = {}
    prefixes = [(n, Fraction(raw["prefixes"][k]["factor"])) for n, k in _spelled(raw["prefixes"])]
    for key, row in raw["units"].items():
        factors[key] = factor = Fraction(evaluate(row["factor"], factors))
        dimension = _combine(_BASE, row["unit"])
        for name, _ in _spelled({key: row}):
            plain[name] = (factor, dimension)
            if row.get("prefixes"):
                prefixed.update({p + name: (x * factor, dimension) for p, x in prefixes})
    return {**prefixed, **plain}


@cache
def _scales() -> dict[str, tuple[Fraction, Fraction]]:
    """Return every spelling of a temperature scale with zero and factor."""
    rows = tables.read("units.toml")["scales"]
    return {
        name: (Fraction(rows[key]["zero"]), Fraction(rows[key]["factor"]))
        for name, key in _spelled(rows)
    }


def _combine(base: Mapping[str, Dimension], unit: str) -> Dimension:
    total = list(_NONE)
    for name, power in () if unit == "1" else _factors(unit):
        total = [t + power * e for t, e in zip(total, base[name], strict=True)]
    return total[0], total[1], total[2], total[3]


@lru_cache(maxsize=256)
def _library(name: str) -> tuple[Fraction, Dimension] | None:
    """Look a name up in the unit library; None unless it is a plain multiple of SI units.

    Temperatures are left out: those of the table are all there is without an offset.
    """
    names = {"meter": "m", "second": "s", "kilogram": "kg"}
    try:
        registry = _registry()
        if registry.parse_unit_name(name)[0][0]:  # a prefix: "cfm" would be a centi-femtometre
            return None
        one, two = (registry.Quantity(x, name).to_base_units() for x in (1.0, 2.0))
        powers = {names[n]: power for n, power in one.unit_items()}
        whole = {n: int(p) for n, p in powers.items() if p == int(p)}
    except Exception:  # its parser alone raises some ten classes, none of which tells more
        return None
    linear = math.isclose(two.magnitude, 2.0 * one.magnitude, rel_tol=1e-12)  # rounding only
    if whole != powers or not powers or not linear:
        return None
    dimension = (powers.get("m", 0), powers.get("s", 0), powers.get("kg", 0), 0)
    return Fraction(one.magnitude), (int(dimension[0]), int(dimension[1]), int(dimension[2]), 0)


@cache
def _registry() -> Any:
    import pint

    return pint.UnitRegistry()


def _single(name: str) -> tuple[Fraction, Dimension] | None:
    """Return factor to SI and dimension of a unit name, or None when there is no such unit."""
    known = _table()
    if name in known:
        return known[name]
    if len(name) > _SHORT and name.endswith("s") and name[:-1] in known:
        return known[name[:-1]]
    if len(name) < _SHORT or not name.isascii() or name.startswith(("delta", "_")):
        return None
    return _library(name)


def _factors(unit: str) -> Iterator[tuple[str, int]]:
    """Take a unit apart into (name, exponent); ValueError for anything but a plain product."""
    factor, operator = re.compile(_FACTOR), re.compile(_OPERATOR)
    at, sign, outer = (2, -1, 0) if unit.startswith("1/") else (0, 1, 0)
    while True:
        if unit[at : at + 1] == "(" and not outer:
            at, sign, outer = at + 1, 1, sign
        match = factor.match(unit, at)
        if match is None:
            raise ValueError(unit)
        yield match[1], (outer or 1) * sign * int(match[2] or 1)
        at = match.end()
        if unit[at : at + 1] == ")" and outer:
            at, sign, outer = at + 1, outer, 0
        if at == len(unit) and not outer:
            return
        match = operator.match(unit, at)
        if match is None:
            raise ValueError(unit)
        if sign < 0 and not match[1]:  # kg/m s: nobody knows on which side of the slash s is
            raise ValueError("brackets or a second slash, like kg/(m*s) or kg/m/s")
        at, sign = match.end(), -1 if match[1] else 1


def _unknown(name: str, unit: str) -> InputError:
    if name in _scales():
        return InputError("unit", repr(unit), "kelvin in a compound unit")
    if name in ("C", "F"):
        return InputError("unit", repr(name), "a unit of the manual", f"did you mean 'deg{name}'?")
    same = [n for n in _table() if n.lower() == name.lower()]
    near = nearest(name, same or (n for n, _ in _spelled(tables.read("units.toml")["units"])))
    hint = f"did you mean {near!r}?" if near else ""
    if near and near.lower() == name.lower():
        hint += " Capital and small letters differ."
    return InputError("unit", repr(name), "a unit of the manual", hint)


@lru_cache(maxsize=256)
def _unit(unit: str) -> tuple[Fraction, Dimension]:
    """Return factor to SI and dimension of a unit text; raises InputError without a field."""
    if re.fullmatch(_GAUGE, unit):
        hint = "give a gauge reading as gauge_pressure, without the g"
        raise InputError("unit", repr(unit), "an absolute unit", hint)
    try:
        parts = list(_factors(unit))
    except ValueError as error:
        accepted = "a unit like m/s, kg/m3, m2.s-2" if str(error) == unit else str(error)
        raise InputError("unit", repr(unit), accepted) from None
    if len(parts) > _MAX_FACTORS:
        raise InputError("unit", repr(unit), f"at most {_MAX_FACTORS} factors")
    factor, total = Fraction(1), list(_NONE)
    for name, power in parts:
        known = None if name in _scales() else _single(name)
        if known is None:
            raise _unknown(name, unit)
        factor *= known[0] ** power
        total = [t + power * e for t, e in zip(total, known[1], strict=True)]
    return factor, (total[0], total[1], total[2], total[3])


def _finite(value: Real | Fraction, field: str, given: str) -> float:
    try:
        number = float(value)
    except OverflowError:
        number = math.inf
    if not math.isfinite(number):
        raise InputError(field, given[:60], "a finite number")
    if number == 0.0 and value != 0:
        raise InputError(field, given[:60], "a number of usual size")
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
        The value in that SI unit, the double nearest to the exact product.

    Raises
    ------
    InputError
        If the text is no number and unit, the unit is not known, or it measures something else.

    References
    ----------
    bipm-2019, nist-sp811-2008

    Examples
    --------
    >>> quantity("260 mm", "m", "flow.diameter"), quantity("5 %", "1", "turbulence.intensity")
    (0.26, 0.05)
    >>> quantity("25 degC", "K", "fluid.temperature")
    298.15
    """
    if isinstance(value, str):
        return _text(value, unit, field)
    if isinstance(value, bool) or not isinstance(value, Real):
        raise InputError(field, repr(value)[:60], f"a number, or a text like {_example(unit)}")
    # the digits of a huge integer cannot always be printed
    return _finite(value, field, "a huge number" if isinstance(value, Integral) else repr(value))


def _text(value: str, unit: str, field: str) -> float:
    text = value.translate(_PLAIN).strip() if len(value) <= _MAX_TEXT else ""
    match = re.fullmatch(_NUMBER, text)
    if match is None or len(match[2].strip()) > _MAX_UNIT:
        raise InputError(field, repr(value[:60]), f"a number and a unit, like {_example(unit)}")
    number, given = Fraction(match[1]), match[2].strip()
    if not given or (given == unit and unit != "1"):
        return _finite(number, field, repr(value))
    if unit == "1" and given == "%":
        return _finite(number / 100, field, repr(value))
    return _finite(_convert(number, given, unit, field, value), field, repr(value))


def _convert(number: Fraction, given: str, unit: str, field: str, text: str) -> Fraction:
    wanted = _NONE if unit == "1" else _unit(unit)[1]
    zero, factor = _scales().get(given, (Fraction(0), Fraction(1)))
    dimension = _BASE["K"]
    if given not in _scales():
        try:
            factor, dimension = _unit(given)
        except InputError as error:
            raise InputError(
                field, f"{text!r}: unit {error.given}", error.accepted, error.hint
            ) from None
    if dimension != wanted:
        words, accepted = _words(dimension), _words(wanted)
        hint = _HINTS.get((words, accepted), "")
        raise InputError(field, f"{text!r}, {words}", f"{accepted} ({_example(unit)})", hint)
    return (number + zero) * factor


def _words(dimension: Dimension) -> str:
    if dimension in _WORDS:
        return _WORDS[dimension]
    powers = zip(_BASE, dimension, strict=True)
    return "something in " + " ".join(f"{n}{p if p != 1 else ''}" for n, p in powers if p)


def _example(unit: str) -> str:
    return '"5 %" or 0.05' if unit == "1" else f'"1.5 {unit}"'
