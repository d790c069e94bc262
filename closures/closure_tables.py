"""Closures as data: typed records of the closure tables, checked when they are loaded."""

from __future__ import annotations

import os
import re
from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import cache
from types import MappingProxyType
from typing import Any

from closures.closure_list import FOLDER, aliases, closure_ids, resolve
from closures.table_checks import SETS, check_closure, check_merged
from walllaw import tables
from walllaw.errors import InputError, TableError, nearest, unknown_name
from walllaw.exact import Number, evaluate

_NAME = re.compile(r"(?<![\w.])[A-Za-z_]\w*")
_SIZE = 1_000_000  # characters; a table of fifty coefficients has about 4000


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
    """One closure; index it for a coefficient: ``c["beta_star"]``, ``c["outer.beta"]``.

    ``alternatives`` holds other values in circulation and known misprints, ``extensions`` the
    constants of published variants; neither is used unless asked for by name.
    """

    id: str
    name: str
    family: str
    variables: tuple[str, ...]
    source: str
    status: str
    summary: str
    evidence: str
    coefficients: Coefficients
    treatments: tuple[str, ...] = ()
    base: str = ""
    read_in: str = ""
    sigma_convention: str = ""
    use: str = ""
    misprints: tuple[str, ...] = ()
    alternatives: Coefficients = field(default_factory=dict)
    extensions: Coefficients = field(default_factory=dict)
    functions: Mapping[str, Mapping[str, str]] = field(default_factory=dict)
    algebra: Mapping[str, str] = field(default_factory=dict)
    wall: Mapping[str, Any] = field(default_factory=dict)
    free_stream: Mapping[str, Any] = field(default_factory=dict)
    y_plus_max: Coefficient | None = None
    _C_mu: Number | None = None

    def __getitem__(self, name: str) -> float:
        if name in self.coefficients:
            return self.coefficients[name].value
        sets = [f"{part}.{name}" for part in SETS if f"{part}.{name}" in self.coefficients]
        if sets:
            raise InputError("coefficient", repr(name), " or ".join(sets))
        raise unknown_name("coefficient", name, self.coefficients)

    def __repr__(self) -> str:
        numbers = ", ".join(f"{n}={c.value:g}" for n, c in self.coefficients.items())
        return f"Closure({self.id}: {numbers}; source {self.source})"

    @property
    def C_mu(self) -> float:
        """The C_mu that relates k, epsilon, omega and nu_t in conversions.

        Raises
        ------
        InputError
            If the closure (of the heat flux) relates none of them.
        """
        if self._C_mu is None:
            raise InputError("closure", repr(self.id), "a closure that relates k and nu_t")
        return float(self._C_mu)

    @property
    def inner(self) -> Coefficients:
        """The set next to the wall of a blended closure, without prefix; empty if not blended."""
        return self._set("inner")

    @property
    def outer(self) -> Coefficients:
        """The set away from walls of a blended closure, without prefix; empty if not blended."""
        return self._set("outer")

    def _set(self, part: str) -> Coefficients:
        found = self.coefficients.items()
        return {n.partition(".")[2]: c for n, c in found if n.startswith(f"{part}.")}


def _own(name: str) -> dict[str, Any]:
    """Return the content of a user's table."""
    try:
        with open(name, encoding="utf-8") as file:
            content = file.read(_SIZE)
    except (OSError, UnicodeDecodeError, ValueError) as error:
        reason = getattr(error, "strerror", None) or "not UTF-8 text"
        raise InputError("closure", f"{name!r} ({reason})", "a closure table or an id") from None
    return tables.parse(content, name)


def _rows(raw: Mapping[str, Any], part: str) -> dict[str, dict[str, str]]:
    """Return the rows of one part of a table, with the defaults of the table filled in."""
    found = {}
    for name, row in raw.get(part, {}).items():
        head = {"source": raw["source"], "status": raw["status"]}
        if not {"source", "status"} & set(row):  # what was read there is the table's own evidence
            head["read_in"] = raw.get("read_in", "")
        if "expression" in row:
            head["status"] = "derived"
        found[name] = {**head, **row}
    return found


def _merged(label: str, raw: Mapping[str, Any]) -> dict[str, dict[str, dict[str, str]]]:
    """Return the rows of all parts, those of the base first; expressions are evaluated later,
    so that a changed coefficient reaches whatever is derived from it."""
    check_closure(label, raw)
    parts: dict[str, dict[str, dict[str, str]]] = {}
    if "base" in raw:
        base = aliases().get(raw["base"], raw["base"])
        if base not in closure_ids():
            near = nearest(base, [*closure_ids(), *aliases()])
            hint = f"; did you mean {near!r}?" if near else ""
            raise TableError(f"closure {label}: base: {base!r} is no shipped closure{hint}")
        parts = _merged(base, tables.read(FOLDER, f"{base}.toml"))
    return {part: {**parts.get(part, {}), **_rows(raw, part)} for part in ("coefficients", *SETS)}


def _value(label: str, key: str, text: str, known: Mapping[str, Number]) -> Number:
    try:
        return evaluate(text, known)
    except TableError as error:
        raise TableError(f"closure {label}: {key}: {error}") from None


def _evaluated(
    label: str, prefix: str, rows: Mapping[str, Mapping[str, str]], known: Mapping[str, Number]
) -> dict[str, Coefficient]:
    """Evaluate rows in the order their expressions need; the result keeps the table's order."""
    values: dict[str, Number] = {}
    waiting = {n: row.get("value") or row.get("expression", "") for n, row in rows.items()}
    while waiting:
        ready = [n for n, text in waiting.items() if not waiting.keys() & _NAME.findall(text)]
        if not ready:
            names = ", ".join(waiting)
            raise TableError(f"closure {label}: {prefix}{names}: expressions need each other")
        for name in ready:
            text = waiting.pop(name)
            values[name] = _value(label, f"{prefix}{name}", text, {**known, **values})
    return {
        f"{prefix}{name}": Coefficient(
            value=float(values[name]),
            exact=values[name],
            printed=row.get("value") or row["expression"],
            **{k: text for k, text in row.items() if k != "value"},
        )
        for name, row in rows.items()
    }


def build(id_: str, raw: Mapping[str, Any], label: str = "") -> Closure:
    """Make the record of a closure from the content of its table.

    Parameters
    ----------
    id_ : str
        The id the closure gets.
    raw : mapping
        The content of the table.
    label : str, optional
        What errors call the table; the id unless given.

    Raises
    ------
    TableError
        If the table is damaged or incomplete; one line with file, key and fault.
    """
    label = label or id_
    parts = _merged(label, raw)
    inherited = closure(raw["base"]) if "base" in raw else None
    check_merged(label, raw, parts)
    coefficients = _evaluated(label, "", parts["coefficients"], {})
    shared = {name: c.exact for name, c in coefficients.items()}
    for part in SETS:
        coefficients |= _evaluated(label, f"{part}.", parts[part], shared)
    algebra = raw.get("algebra") or (inherited.algebra if inherited else {})
    C_mu = _value(label, "algebra.C_mu", algebra["C_mu"], shared) if algebra else None
    wall = dict(raw.get("wall", {}))
    first = {**raw, "wall": {n: wall[n] for n in ("y_plus_max",) if n in wall}}
    highest = _evaluated(label, "wall.", _rows(first, "wall"), {}).get("wall.y_plus_max")
    if highest:
        wall["y_plus_max"] = highest.printed
    fields = (
        "name", "family", "source", "status", "summary", "evidence", "base", "read_in",
        "sigma_convention", "use",
    )  # fmt: skip
    return Closure(
        id=id_,
        variables=tuple(raw["variables"]),
        coefficients=MappingProxyType(coefficients),
        treatments=tuple(wall.get("treatments", ())),
        misprints=tuple(raw.get("misprints", ())),
        alternatives=_evaluated(label, "", _rows(raw, "alternatives"), shared),
        extensions=_evaluated(label, "", _rows(raw, "extensions"), shared),
        functions=raw.get("functions", {}),
        algebra=algebra,
        wall=wall,
        free_stream=raw.get("free_stream", {}),
        y_plus_max=highest,
        _C_mu=C_mu,
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
        return build(os.path.basename(name).removesuffix(".toml"), _own(name), name)
    return _shipped(resolve(name))


def closures_all() -> list[Closure]:
    """Return every shipped closure, sorted by id."""
    return [closure(id_) for id_ in closure_ids()]
