"""The ledger of one evaluation: every quantity with its values and where it came from.

Values are flat float64 arrays, one entry a row; a sheet is an evaluation of one row. Each entry
knows the relation that gave it and the entries that went in, so that a sheet can list its sources,
check the range of every relation and explain each number back to the inputs.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

import numpy as np
from numpy.typing import NDArray

from walllaw.arrays import Floats
from walllaw.relation import Relation

Mask = NDArray[np.bool_]
Codes = NDArray[np.int64]


@dataclass(frozen=True, slots=True)
class Entry:
    """One quantity: its values, the relation behind it (None: given), and what went in."""

    values: Floats
    relation: Relation | None = None
    inputs: Mapping[str, str] = field(default_factory=dict)
    where: Mask | None = None
    origin: str = ""


class Ledger:
    """Quantities by path (``inlet.omega``), in the order they were found, and texts by path."""

    def __init__(self, rows: int = 1) -> None:
        self.rows = rows
        self.entries: dict[str, Entry] = {}
        self.texts: dict[str, str] = {}
        self.labels: dict[str, tuple[Codes, tuple[str, ...]]] = {}
        self.sources: dict[str, None] = {}
        self.notes: list[str] = []

    def given(self, path: str, values: Floats, origin: str = "given") -> None:
        """Enter a quantity that was given, or estimated as ``origin`` says."""
        self.entries[path] = Entry(values, origin=origin)

    def put(
        self,
        path: str,
        values: Floats,
        relation: Relation,
        where: Mask | None = None,
        /,
        **inputs: str,
    ) -> Floats:
        """Enter a quantity found by a relation from the entries whose paths are named.

        ``where`` marks the rows for which this relation was really used.
        """
        self.entries[path] = Entry(values, relation, inputs, where)
        self.cite(relation.source)
        return values

    def label(self, path: str, row: int = 0) -> str:
        """Return a text that may differ from row to row (``flow.regime``)."""
        codes, names = self.labels[path]
        return names[int(codes[0 if codes.size == 1 else row])]

    def is_label(self, path: str, name: str) -> Mask:
        """Return the rows whose label has a name."""
        codes, names = self.labels[path]
        return np.asarray(codes == (names.index(name) if name in names else -1))

    def cite(self, key: str) -> None:
        """Note a source of the bibliography."""
        if key != "common practice":
            self.sources[key] = None

    def __getitem__(self, path: str) -> Floats:
        return self.entries[path].values

    def __contains__(self, path: str) -> bool:
        return path in self.entries

    def outside(self) -> list[tuple[str, str, Relation, Mask]]:
        """Return (path, input path, relation, rows) wherever a relation's range was left."""
        found = []
        for path, entry in self.entries.items():
            if entry.relation is None:
                continue
            for name, source_path in entry.inputs.items():
                if name not in entry.relation.valid or source_path not in self.entries:
                    continue
                bad = entry.relation.outside(name, self[source_path])
                if entry.where is not None:
                    bad = bad & entry.where
                if bad.any():
                    found.append((path, source_path, entry.relation, bad))
        return found
