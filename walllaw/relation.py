"""One published relation: formula, coefficients, unit, source and range, read from the tables.

Every correlation of the two packages is a row of ``tables/relations/<subject>.toml``. The function
that evaluates it takes its coefficients from here and calls :meth:`Relation.use` with its inputs:
outside the stated range that warns, and while a :func:`record` is open it notes the use, so that
a sheet can list, explain and check every relation that went into it.
"""

from __future__ import annotations

import warnings
from collections.abc import Iterator, Mapping
from contextlib import contextmanager
from contextvars import ContextVar
from dataclasses import dataclass, field
from functools import cache
from types import MappingProxyType
from typing import Any

import numpy as np
from numpy.typing import NDArray

from walllaw import tables
from walllaw.errors import RangeWarning, TableError
from walllaw.exact import Number, evaluate

STATUS = ("confirmed", "secondary", "memory", "unsure", "derived", "common practice")
_KEYS = {"title", "formula", "unit", "source", "where", "status", "note", "coefficients", "valid"}


@dataclass(frozen=True, slots=True, eq=False)
class Relation:
    """A published relation; index it for a coefficient (``r["slope"]``)."""

    id: str
    title: str
    formula: str
    unit: str
    source: str
    status: str
    where: str = ""
    note: str = ""
    coefficients: Mapping[str, float] = field(default_factory=dict)
    valid: Mapping[str, tuple[float, float]] = field(default_factory=dict)

    def __getitem__(self, name: str) -> float:
        return self.coefficients[name]

    def outside(self, name: str, values: NDArray[np.float64]) -> NDArray[np.bool_]:
        """Return where a named input lies outside the range of the source."""
        low, high = self.valid[name]
        return (values < low) | (values > high)

    def use(self, **inputs: NDArray[np.float64]) -> None:
        """Note the use of this relation; warn where an input is outside the stated range.

        Warns
        -----
        RangeWarning
            If no record is open and an input is outside the range.
        """
        uses = _RECORD.get()
        if uses is not None:
            uses.append(Use(self, inputs))
            return
        for name, values in inputs.items():
            if name not in self.valid:
                continue
            bad = self.outside(name, values)
            if bad.any():
                low, high = self.valid[name]
                first = float(values[bad][0])
                warnings.warn(
                    f"{self.title}: {name} = {first:.6g} is outside {low:g} to {high:g}"
                    f" ({int(bad.sum())} of {bad.size} values; source {self.source})",
                    RangeWarning,
                    stacklevel=3,
                )


@dataclass(frozen=True, slots=True, eq=False)
class Use:
    """One use of a relation, with the inputs it was given."""

    relation: Relation
    inputs: Mapping[str, NDArray[np.float64]]


_RECORD: ContextVar[list[Use] | None] = ContextVar("record", default=None)


@contextmanager
def record() -> Iterator[list[Use]]:
    """Collect the relations used inside the block, in order; no range warning is issued there.

    Examples
    --------
    >>> from walllaw import friction
    >>> with record() as uses:
    ...     f = friction.haaland(1e5, 1e-4)
    >>> [use.relation.id for use in uses]
    ['friction.haaland']
    """
    uses: list[Use] = []
    token = _RECORD.set(uses)
    try:
        yield uses
    finally:
        _RECORD.reset(token)


def _build(key: str, row: Mapping[str, Any]) -> Relation:
    unknown = set(row) - _KEYS
    if unknown:
        raise TableError(f"relation {key}: unknown key {sorted(unknown)[0]!r}")
    missing = {"title", "formula", "unit", "source", "status"} - set(row)
    if missing:
        raise TableError(f"relation {key}: {sorted(missing)[0]!r} is missing")
    if row["status"] not in STATUS:
        raise TableError(f"relation {key}: status {row['status']!r} is none of {', '.join(STATUS)}")
    if row["source"] != "common practice" and not tables.known_source(row["source"]):
        raise TableError(f"relation {key}: source {row['source']!r} is not in the bibliography")
    known: dict[str, Number] = {}
    for name, text in row.get("coefficients", {}).items():
        if not isinstance(text, str):
            raise TableError(
                f"relation {key}: write coefficient {name} as text, exactly as printed"
            )
        known[name] = evaluate(text, known)
    valid: dict[str, tuple[float, float]] = {}
    for name, limits in row.get("valid", {}).items():
        if len(limits) != 2 or not float(limits[0]) < float(limits[1]):
            raise TableError(f"relation {key}: range of {name} must be [low, high]")
        valid[name] = (float(limits[0]), float(limits[1]))
    fields = {k: v for k, v in row.items() if k not in ("coefficients", "valid")}
    return Relation(
        id=key,
        coefficients=MappingProxyType({name: float(value) for name, value in known.items()}),
        valid=MappingProxyType(valid),
        **fields,
    )


@cache
def relation(subject: str, name: str) -> Relation:
    """Return a relation of ``tables/relations/<subject>.toml``.

    Raises
    ------
    TableError
        If the row is missing, has no known source, or is damaged.

    Examples
    --------
    >>> relation("friction", "haaland")["slope"]
    1.8
    """
    rows = tables.read("relations", f"{subject}.toml")
    if name not in rows:
        raise TableError(f"relation {subject}.{name} is not in the tables")
    return _build(f"{subject}.{name}", rows[name])


def relations() -> list[Relation]:
    """Return every relation of the tables, sorted by id."""
    return [
        relation(subject, name)
        for subject in tables.names("relations")
        for name in sorted(tables.read("relations", f"{subject}.toml"))
    ]
