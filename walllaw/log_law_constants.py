"""Named pairs of log-law constants with their sources."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache
from math import exp, log

from walllaw import tables
from walllaw.errors import TableError, unknown_name
from walllaw.exact import evaluate

_KEYS = {"kappa", "B", "E", "source", "status", "note"}


@dataclass(frozen=True, slots=True)
class LogLawPair:
    """kappa, B and E = exp(kappa B) of one source; ``printed`` says which of B and E it gives."""

    name: str
    kappa: float
    B: float
    E: float
    printed: str
    source: str
    status: str
    note: str = ""


def log_law_pairs() -> tuple[str, ...]:
    """Return the names of all pairs."""
    return tuple(sorted(tables.read("log_law.toml")))


@cache
def log_law_pair(name: str) -> LogLawPair:
    """Return a pair of log-law constants by name.

    Raises
    ------
    InputError
        If there is no such pair; names the nearest.
    TableError
        If its row is damaged.

    Examples
    --------
    >>> pair = log_law_pair("coles-hirst-1968")
    >>> pair.kappa, pair.B, round(pair.E, 6)
    (0.41, 5.0, 7.767901)
    """
    rows = tables.read("log_law.toml")
    if name not in rows:
        raise unknown_name("log_law", name, rows)
    row = rows[name]
    if (
        set(row) - _KEYS
        or ("B" in row) == ("E" in row)
        or not {"kappa", "source", "status"} <= set(row)
    ):
        raise TableError(f"log_law.toml: {name}: needs kappa, one of B and E, source and status")
    if row["source"] != "common practice" and not tables.known_source(row["source"]):
        raise TableError(
            f"log_law.toml: {name}: source {row['source']!r} is not in the bibliography"
        )
    kappa = float(evaluate(row["kappa"]))
    printed = "B" if "B" in row else "E"
    value = float(evaluate(row[printed]))
    return LogLawPair(
        name=name,
        kappa=kappa,
        B=value if printed == "B" else log(value) / kappa,
        E=value if printed == "E" else exp(kappa * value),
        printed=printed,
        source=row["source"],
        status=row["status"],
        note=row.get("note", ""),
    )
