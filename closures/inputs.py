"""The inputs of an evaluation: a case, and columns of a table in place of some of its numbers."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import numpy as np

from closures.case import Case, Multiple, keys
from closures.quantities import quantity
from walllaw import arrays
from walllaw.arrays import Floats, Interval
from walllaw.errors import InputError


class Inputs:
    """Values of a case by path, as flat arrays; columns of a table override single numbers."""

    def __init__(self, case: Case, columns: Mapping[str, Any] | None = None) -> None:
        self.case = case
        self.columns: dict[str, Floats] = {}
        for path, values in (columns or {}).items():
            key = keys().get(path)
            if key is None or not key.quantity:
                raise InputError(path, "a column that is no number of a case", "flow.velocity, ...")
            q = quantity(key.quantity)
            interval = Interval(q.low, q.high, open_low=q.open_low)
            self.columns[path] = np.atleast_1d(arrays.check(path, values, interval)).reshape(-1)
        sizes = {v.size for v in self.columns.values()} - {1}
        if len(sizes) > 1:
            raise InputError("table", f"columns of {sorted(sizes)} rows", "columns of one length")
        self.rows = sizes.pop() if sizes else 1

    def __contains__(self, path: str) -> bool:
        return path in self.columns or path in self.case

    def number(self, path: str) -> Floats:
        """Return a number of the case or a column of the table."""
        if path in self.columns:
            return self.columns[path]
        return np.array([self.case.number(path)])

    def text(self, path: str, default: str = "") -> str:
        """Return a text or choice of the case."""
        return self.case.text(path, default)

    def multiple(self, path: str) -> Multiple | None:
        """Return a length given as a multiple, or None."""
        value = self.case.values.get(path)
        return value if isinstance(value, Multiple) and path not in self.columns else None

    def given(self, table: str) -> list[str]:
        """Return the names of the keys of one table that are present."""
        columns = [p.partition(".")[2] for p in self.columns if p.startswith(f"{table}.")]
        return list(dict.fromkeys([*self.case.given(table), *columns]))

    def need(self, path: str, why: str = "") -> Floats:
        """Return a number, or say which key is missing."""
        if path not in self:
            raise InputError(path, "nothing", keys()[path].help, why)
        return self.number(path)

    def one_of(self, table: str, names: tuple[str, ...]) -> str:
        """Return which one of several keys of a table is present; exactly one must be."""
        found = [n for n in names if f"{table}.{n}" in self]
        if len(found) != 1:
            raise InputError(
                table, " and ".join(found) or "none of them", f"exactly one of {', '.join(names)}"
            )
        return found[0]
