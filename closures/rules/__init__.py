"""The review: rules that look at evaluated quantities and report findings.

A rule is one function here and one row of ``tables/rules.toml``: the function says where it fires
(a mask over the rows) and with which numbers; the row says how severe it is, what it means, what to
do and where that stands. The function's name is the rule's id with underscores.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from functools import cache
from importlib import import_module
from typing import Any

import numpy as np

from closures.ledger import Ledger, Mask
from walllaw import tables
from walllaw.arrays import Floats
from walllaw.errors import TableError

SEVERITIES = ("error", "warning", "note")
_KEYS = {"module", "severity", "title", "message", "why", "action", "source", "status"}


@dataclass(frozen=True, slots=True)
class Hit:
    """Where a rule fires: rows, the quantity judged, its limit, and numbers for the message."""

    rows: Mask
    quantity: str
    limit: Floats | float | None = None
    numbers: Mapping[str, Floats | float | str] = field(default_factory=dict)


@dataclass(frozen=True, slots=True)
class Rule:
    """One rule of the review."""

    id: str
    severity: str
    title: str
    message: str
    why: str
    action: str
    source: str
    check: Callable[[Ledger], Iterable[Hit]]


@dataclass(frozen=True, slots=True)
class Finding:
    """One finding about one row."""

    id: str
    severity: str
    quantity: str
    message: str
    why: str
    action: str
    source: str
    value: float | None = None
    limit: float | None = None

    def as_dict(self) -> dict[str, Any]:
        """Return what the sheet's JSON holds; what does not apply is absent."""
        names = (
            "id",
            "severity",
            "quantity",
            "value",
            "limit",
            "message",
            "why",
            "action",
            "source",
        )
        rows = {name: getattr(self, name) for name in names}
        return {name: value for name, value in rows.items() if value not in (None, "")}


@cache
def rules() -> tuple[Rule, ...]:
    """Return every rule of the tables, errors first, each with its function.

    Raises
    ------
    TableError
        If a row lacks a field, has an unknown source, or has no function.
    """
    found = []
    for id_, row in tables.read("rules.toml").items():
        if set(row) - _KEYS or not {
            "module",
            "severity",
            "title",
            "message",
            "why",
            "action",
            "source",
        } <= set(row):
            raise TableError(f"rules.toml: {id_}: needs {', '.join(sorted(_KEYS))}")
        if row["severity"] not in SEVERITIES:
            raise TableError(f"rules.toml: {id_}: severity is none of {', '.join(SEVERITIES)}")
        if row["source"] != "common practice" and not tables.known_source(row["source"]):
            raise TableError(f"rules.toml: {id_}: unknown source {row['source']!r}")
        module = import_module(f"closures.rules.{row['module']}")
        check = getattr(module, id_.replace("-", "_"), None)
        if check is None:
            raise TableError(f"rules.toml: {id_}: no function {id_.replace('-', '_')}")
        fields = {k: row[k] for k in ("severity", "title", "message", "why", "action", "source")}
        found.append(Rule(id=id_, check=check, **fields))
    return tuple(sorted(found, key=lambda rule: SEVERITIES.index(rule.severity)))


def _at(value: Floats | float | str, row: int) -> float | str:
    if isinstance(value, str):
        return value
    flat = np.atleast_1d(np.asarray(value, dtype=np.float64))
    return float(flat[0] if flat.size == 1 else flat[row])


def review(ledger: Ledger, row: int = 0) -> Iterator[Finding]:
    """Yield the findings about one row, errors first."""
    for rule in rules():
        for hit in rule.check(ledger):
            rows = np.atleast_1d(hit.rows)
            if not rows[0 if rows.size == 1 else row]:
                continue
            value = _at(ledger[hit.quantity], row) if hit.quantity in ledger else None
            limit = None if hit.limit is None else _at(hit.limit, row)
            numbers = {name: _at(x, row) for name, x in hit.numbers.items()}
            yield Finding(
                id=rule.id,
                severity=rule.severity,
                quantity=hit.quantity,
                message=rule.message.format(value=value, limit=limit, **numbers),
                why=rule.why,
                action=rule.action,
                source=rule.source,
                value=value if isinstance(value, float) else None,
                limit=limit if isinstance(limit, float) else None,
            )
