"""Closures as data: typed records of the closure tables, checked when they are loaded."""

from __future__ import annotations

import os
from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import cache
from types import MappingProxyType
from typing import Any

from closures.closure_list import FOLDER, closure_ids, resolve
from closures.table_checks import check_closure
from walllaw import tables
from walllaw.errors import InputError, TableError
from walllaw.exact import Number, evaluate


@dataclass(frozen=True, slots=True, eq=False)
class Coefficient:
    """One coefficient with its source.

    ``printed`` is the text of the table, ``exact`` its value before the one rounding to double.
    """

    value: float
    exact: Number
    printed: str
    source: str
    status: str
    symbol: str = ""
    where: str = ""
    note: str = ""
    expression: str = ""
    read_in: str = ""


Coefficients = Mapping[str, Coefficient]


@dataclass(frozen=True, slots=True, eq=False, repr=False)
class Closure:
    """One closure; index it for a coefficient: ``c["beta_star"]``, ``c["outer.beta"]``."""

    id: str
    name: str
    family: str
    variables: tuple[str, ...]
    source: str
    status: str
    summary: str
    evidence: str
    C_mu: float
    coefficients: Coefficients
    treatments: tuple[str, ...] = ()
    base: str = ""
    read_in: str = ""
    sigma_convention: str = ""
    use: str = ""
    misprints: tuple[str, ...] = ()
    alternatives: Coefficients = field(default_factory=dict)
    functions: Mapping[str, Mapping[str, str]] = field(default_factory=dict)
    algebra: Mapping[str, str] = field(default_factory=dict)
    wall: Mapping[str, Any] = field(default_factory=dict)
    free_stream: Mapping[str, Any] = field(default_factory=dict)

    def __getitem__(self, name: str) -> float:
        return self.coefficients[name].value

    def __repr__(self) -> str:
        numbers = ", ".join(f"{n}={c.value:g}" for n, c in self.coefficients.items())
        return f"Closure({self.id}: {numbers}; source {self.source})"


def _own(name: str) -> tuple[str, dict[str, Any]]:
    """Return id and content of a user's table."""
    try:
        with open(name, encoding="utf-8") as file:
            content = file.read(1_000_000)
    except (OSError, UnicodeDecodeError, ValueError) as error:
        reason = getattr(error, "strerror", None) or "not UTF-8 text"
        raise InputError("closure", f"{name!r} ({reason})", "a closure table or an id") from None
    return os.path.basename(name).removesuffix(".toml"), tables.parse(content, name)


def _rows(
    raw: Mapping[str, Any], head: Mapping[str, Any], known: dict[str, Number], prefix: str, id_: str
) -> dict[str, Coefficient]:
    found = {}
    for name, row in raw.items():
        text = row.get("value") or row.get("expression", "")
        try:
            exact = evaluate(text, known)
        except TableError as error:
            raise TableError(f"closure {id_}: {prefix}{name}: {error}") from None
        known[name] = exact
        found[f"{prefix}{name}"] = Coefficient(
            value=float(exact),
            exact=exact,
            printed=text,
            source=row.get("source", head["source"]),
            status=row.get("status", "derived" if "expression" in row else head["status"]),
            read_in=row.get("read_in", head.get("read_in", "")),
            **{k: row[k] for k in ("symbol", "where", "note", "expression") if k in row},
        )
    return found


def _ordered(raw: Mapping[str, Any]) -> dict[str, Any]:
    """Put plain values before expressions, which may refer to any of them."""
    return dict(sorted(raw.items(), key=lambda item: "expression" in item[1]))


def build(id_: str, raw: Mapping[str, Any]) -> Closure:
    """Make the record of a closure from the content of its table.

    Raises
    ------
    TableError
        If the table is damaged or incomplete; one line with file, key and fault.
    """
    check_closure(id_, raw)
    inherited = closure(raw["base"]) if "base" in raw else None
    coefficients = dict(inherited.coefficients) if inherited else {}
    known: dict[str, Number] = {n: c.exact for n, c in coefficients.items() if "." not in n}
    rows = _ordered(raw.get("coefficients", {}))
    coefficients |= _rows(rows, raw, known, "", id_)
    for part in ("inner", "outer"):
        if part in raw:
            coefficients = {n: c for n, c in coefficients.items() if not n.startswith(f"{part}.")}
            coefficients |= _rows(_ordered(raw[part]), raw, dict(known), f"{part}.", id_)
    numbers = {name: c.exact for name, c in coefficients.items() if "." not in name}
    algebra = raw.get("algebra") or (inherited.algebra if inherited else {})
    fields = (
        "name",
        "family",
        "source",
        "status",
        "summary",
        "evidence",
        "base",
        "read_in",
        "sigma_convention",
        "use",
    )
    wall = raw.get("wall", {})
    return Closure(
        id=id_,
        variables=tuple(raw["variables"]),
        C_mu=float(evaluate(algebra["C_mu"], numbers)) if algebra else float("nan"),
        coefficients=MappingProxyType(coefficients),
        treatments=tuple(wall.get("treatments", ())),
        misprints=tuple(raw.get("misprints", ())),
        alternatives=MappingProxyType(_rows(raw.get("alternatives", {}), raw, {}, "", id_)),
        functions=raw.get("functions", {}),
        algebra=algebra,
        wall=wall,
        free_stream=raw.get("free_stream", {}),
        **{k: raw[k] for k in fields if k in raw},
    )


@cache
def _shipped(id_: str) -> Closure:
    return build(id_, tables.read(FOLDER, f"{id_}.toml"))


def closure(name: str) -> Closure:
    """Return a closure by id, alias, or path of an own table.

    Parameters
    ----------
    name : str
        ``"menter-sst-2003"``, ``"sst"``, or ``"./mine.toml"``.

    Returns
    -------
    Closure
        Coefficients with sources, wall and free-stream rules.

    Raises
    ------
    InputError
        If there is no such closure; names the nearest.
    TableError
        If the table is damaged.

    Examples
    --------
    >>> c = closure("wilcox-1988")
    >>> c["alpha"], c.coefficients["alpha"].exact, c.source
    (0.5555555555555556, Fraction(5, 9), 'wilcox-1988')
    """
    if name.endswith(".toml") or "/" in name or os.sep in name:
        return build(*_own(name))
    return _shipped(resolve(name))


def closures_all() -> list[Closure]:
    """Return every shipped closure, sorted by id."""
    return [closure(id_) for id_ in closure_ids()]
