"""The case file: read, checked against ``tables/case.toml``, every value in SI.

Each fault is one line that names the key, what was given, what is accepted and the nearest valid
name. Nothing is evaluated here.
"""

from __future__ import annotations

import os
import sys
import tomllib
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from functools import cache
from typing import Any

from closures.quantities import quantity
from walllaw import tables
from walllaw.errors import InputError, unknown_name

MAX_BYTES = 1_000_000
_LENGTHS = (
    "hydraulic_diameter",
    "diameter",
    "height",
    "gap",
    "short_side",
    "length",
    "chord",
    "boundary_layer_thickness",
)


@dataclass(frozen=True, slots=True)
class Multiple:
    """A length given as a multiple of a length of the flow."""

    times: float
    of: str


Value = float | str | bool | Multiple


@dataclass(frozen=True, slots=True)
class Key:
    """One key a case file may hold."""

    path: str
    kind: str
    help: str
    quantity: str = ""
    choices: tuple[str, ...] = ()
    flows: tuple[str, ...] = ()


@cache
def keys() -> dict[str, Key]:
    """Return every key of a case file by its path (``flow.diameter``)."""
    rows = tables.read("case.toml")["keys"]
    return {path: _key(path, row) for path, row in rows.items()}


def _key(path: str, row: dict[str, Any]) -> Key:
    fields: dict[str, Any] = {k: tuple(v) if isinstance(v, list) else v for k, v in row.items()}
    return Key(path=path, **fields)


@dataclass(frozen=True, slots=True)
class Case:
    """A checked case: values by path, in SI units."""

    values: Mapping[str, Value]

    def __contains__(self, path: str) -> bool:
        return path in self.values

    def text(self, path: str, default: str = "") -> str:
        """Return a text or a choice."""
        value = self.values.get(path, default)
        return str(value)

    def number(self, path: str) -> float:
        """Return a number in SI."""
        value = self.values[path]
        if not isinstance(value, float):
            raise InputError(path, repr(value), "a number")
        return value

    def given(self, table: str) -> list[str]:
        """Return the names of the keys of one table that are present."""
        return [p.partition(".")[2] for p in self.values if p.startswith(f"{table}.")]


def _number(key: Key, value: object) -> float:
    from closures.units import quantity as in_si

    q = quantity(key.quantity)
    number = in_si(value, q.unit, key.path)
    if q.name == "intensity" and number > q.high:
        raise InputError(key.path, f"{value!r}", "a fraction above 0 and up to 1", _percent(value))
    low = number <= q.low if q.open_low else number < q.low
    if low or number > q.high:
        accepted = f"{'above' if q.open_low else 'from'} {q.low:g} to {q.high:g} {q.unit}"
        raise InputError(key.path, f"{value!r}", accepted)
    return number


def _percent(value: object) -> str:
    return f'did you mean "{value:g} %"?' if isinstance(value, (int, float)) else ""


def _length(key: Key, value: object) -> Value:
    if not isinstance(value, dict):
        return _number(key, value)
    if set(value) != {"times", "of"}:
        raise InputError(key.path, repr(value), 'a length, or { times = 0.07, of = "diameter" }')
    times, of = value["times"], value["of"]
    if isinstance(times, bool) or not isinstance(times, (int, float)) or not 0 < times <= 1e3:
        raise InputError(f"{key.path}.times", repr(times), "a number above 0 to 1000")
    if not isinstance(of, str) or of not in _LENGTHS:
        raise unknown_name(f"{key.path}.of", str(of), _LENGTHS)
    return Multiple(float(times), of)


def _count(key: Key, value: object) -> float:
    q = quantity(key.quantity)
    if isinstance(value, bool) or not isinstance(value, int) or not q.low <= value <= q.high:
        raise InputError(key.path, repr(value), f"a whole number from {q.low:g} to {q.high:g}")
    return float(value)


def _text(key: Key, value: object) -> str:
    if not isinstance(value, str):
        raise InputError(key.path, repr(value)[:60], "a text in quotes")
    if len(value) > 10_000 or any(ord(c) < 32 and c not in "\n\t" for c in value):
        raise InputError(key.path, "a text with control characters or over 10000 long", "a text")
    return value


def _value(key: Key, value: object) -> Value:
    if key.kind == "text":
        return _text(key, value)
    if key.kind == "choice":
        text = _text(key, value)
        if text not in key.choices:
            raise unknown_name(key.path, text, key.choices)
        return text
    if key.kind == "flag":
        if not isinstance(value, bool):
            raise InputError(key.path, repr(value), "true or false")
        return value
    if key.kind == "count":
        return _count(key, value)
    return _length(key, value) if key.kind == "length" else _number(key, value)


def _unknown(path: str) -> InputError:
    table, _, name = path.rpartition(".")
    same = [p.rpartition(".")[2] for p in keys() if p.rpartition(".")[0] == table]
    error = unknown_name(path, name, same)
    elsewhere = [p for p in keys() if p.rpartition(".")[2] == name]
    hint = error.hint or (f"did you mean {elsewhere[0]}?" if elsewhere else "")
    if name == "length_scale" or name == "turbulence_length":
        hint = "a length names its convention: mixing_length, eddy_viscosity_length, ..."
    return InputError(path, "a key that does not exist", ", ".join(same), hint)


def _walk(raw: Mapping[str, Any]) -> Iterator[tuple[str, Any]]:
    known = tables.read("case.toml")["tables"]
    for name, value in raw.items():
        if name in known:
            if not isinstance(value, dict):
                raise InputError(name, repr(value)[:60], f"a table, [{name}]")
            yield from ((f"{name}.{key}", item) for key, item in value.items())
        elif name in keys():
            yield name, value
        else:
            tops = [*known, *(p for p in keys() if "." not in p)]
            raise unknown_name(name, name, tops)


def case_from(raw: Mapping[str, Any]) -> Case:
    """Check a nested mapping, as a case file holds it.

    Parameters
    ----------
    raw : mapping
        ``{"flow": {"kind": "pipe", "diameter": "260 mm", ...}, ...}``

    Returns
    -------
    Case
        Values by path, in SI.

    Raises
    ------
    InputError
        At the first fault, naming the path, what was given and what is accepted.

    Examples
    --------
    >>> case_from({"flow": {"kind": "pipe", "diameter": "260 mm"}}).number("flow.diameter")
    0.26
    """
    values: dict[str, Value] = {}
    for path, item in _walk(raw):
        if path not in keys():
            raise _unknown(path)
        values[path] = _value(keys()[path], item)
    _check_flow(values)
    return Case(values)


def _check_flow(values: Mapping[str, Value]) -> None:
    kind = values.get("flow.kind")
    if kind is None:
        return
    for path in values:
        flows = keys()[path].flows
        if flows and kind not in flows:
            own = [p.partition(".")[2] for p, k in keys().items() if k.flows and kind in k.flows]
            raise InputError(path, f"a key of {', '.join(flows)}", f"for {kind}: {', '.join(own)}")


def load(content: bytes, name: str) -> dict[str, Any]:
    """Parse the bytes of a case file.

    Raises
    ------
    InputError
        If they are too many, not UTF-8, or not TOML; one line with the place.
    """
    if len(content) > MAX_BYTES:
        raise InputError(name, f"{len(content)} bytes", f"a case file of at most {MAX_BYTES} bytes")
    try:
        text = content.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        raise InputError(name, f"byte {error.start} that is not UTF-8", "UTF-8 text") from None
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        raise InputError(name, "text that is not TOML", "TOML 1.0", str(error)) from None
    except (RecursionError, ValueError, OverflowError):
        raise InputError(name, "numbers too long or tables too deep", "TOML 1.0") from None


def read_case(source: str | os.PathLike[str] | Mapping[str, Any]) -> Case:
    """Read a case from a file, from standard input (``-``), or from a mapping.

    Raises
    ------
    InputError
        If the file cannot be read or a value cannot be used.
    """
    if isinstance(source, Mapping):
        return case_from(source)
    name = os.fspath(source)
    try:
        if name == "-":
            content = sys.stdin.buffer.read(MAX_BYTES + 1)
        else:
            with open(name, "rb") as file:
                content = file.read(MAX_BYTES + 1)
    except (OSError, ValueError) as error:
        reason = getattr(error, "strerror", None) or str(error)
        raise InputError(name, f"no readable file ({reason})", "a case file") from None
    return case_from(load(content, "standard input" if name == "-" else name))
