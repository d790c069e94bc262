"""The quantities of the project by name: words, symbol, unit, accepted range, and their algebra."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import cache
from typing import TYPE_CHECKING, Any

from walllaw import tables
from walllaw.errors import TableError, unknown_name

if TYPE_CHECKING:
    from collections.abc import Mapping

_KEYS = {"words", "symbol", "unit", "monomial", "source", "low", "high", "open_low"}


@dataclass(frozen=True, slots=True, eq=False)
class Quantity:
    """One quantity of ``tables/quantities.toml``."""

    name: str
    words: str
    symbol: str
    unit: str
    monomial: Mapping[str, Fraction] | None = None
    source: str = ""
    low: float = float("-inf")
    high: float = float("inf")
    open_low: bool = False


def _build(name: str, row: dict[str, Any]) -> Quantity:
    fields = dict(row)
    if not fields.keys() <= _KEYS or not {"words", "symbol", "unit"} <= fields.keys():
        raise TableError(f"quantities.toml: {name}: needs words, symbol, unit; may hold {_KEYS}")
    if "source" in fields and not tables.known_source(fields["source"]):
        raise TableError(f"quantities.toml: {name}: unknown source {fields['source']!r}")
    if "monomial" in fields:
        fields["monomial"] = {base: Fraction(p) for base, p in fields["monomial"].items()}
    return Quantity(name=name, **fields)


@cache
def quantity(name: str) -> Quantity:
    """Return a quantity by name.

    Raises
    ------
    InputError
        If the name is not known; names the nearest.

    Examples
    --------
    >>> quantity("omega").unit
    '1/s'
    """
    rows = tables.read("quantities.toml")
    if name not in rows:
        raise unknown_name("quantity", name, rows, "the names of the nomenclature page")
    return _build(name, rows[name])


@cache
def algebraic() -> tuple[str, ...]:
    """Return the names of all quantities that are monomials in k and epsilon."""
    rows = tables.read("quantities.toml")
    return tuple(name for name, row in rows.items() if "monomial" in row)
