"""The set-up sheet: the results of one case as nested plain data, with findings and sources."""

from __future__ import annotations

import json
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from closures import citations
from closures._version import __version__
from closures.ledger import Ledger
from closures.quantities import quantity
from closures.rules import SEVERITIES, Finding, review

SCHEMA = "closures-sheet/1"
CAUTIONS = (
    "This sheet is a set-up aid. Local codes and the judgement of a licensed engineer decide.",
    "Each correlation holds in the range its source states; use outside is a finding above.",
    "Estimated inlet turbulence must be replaced by measurements where results depend on it.",
)
# parts of the sheet in the order they are shown; entries below other heads stay internal
PARTS = ("fluid", "flow", "inlet", "wall", "scales")
_INTERNAL = {
    "flow.passage",
    "flow.reynolds_critical",
    "flow.darcy_friction_laminar_equivalent",
}


@dataclass(frozen=True, slots=True)
class Sheet:
    """The sheet of one case; index it like the JSON it becomes (``sheet["inlet"]["k"]``)."""

    data: Mapping[str, Any]
    findings: tuple[Finding, ...]

    def __getitem__(self, name: str) -> Any:
        return self.data[name]

    def worst(self) -> str | None:
        """Return the severity of the gravest finding, or None when there is none."""
        found = {finding.severity for finding in self.findings}
        return next((severity for severity in SEVERITIES if severity in found), None)

    def without(self, *parts: str) -> Sheet:
        """Return the sheet less some parts, and less the findings about them."""
        data = {k: v for k, v in self.data.items() if k not in parts}
        kept = tuple(f for f in self.findings if f.quantity.partition(".")[0] not in parts)
        data["findings"] = [f.as_dict() for f in kept]
        data["units"] = {k: v for k, v in data["units"].items() if k.partition(".")[0] not in parts}
        return Sheet(data, kept)

    def to_json(self) -> str:
        """Return the sheet as JSON text: SI numbers, no NaN, no null."""
        return json.dumps(self.data, indent=2, ensure_ascii=False, allow_nan=False)


def _put(data: dict[str, Any], path: str, value: Any) -> None:
    *heads, name = path.split(".")
    for head in heads:
        data = data.setdefault(head, {})
    data[name] = value


def make_sheet(ledger: Ledger, row: int = 0) -> Sheet:
    """Gather the entries of one row of an evaluation into a sheet."""
    data: dict[str, Any] = {
        "schema": SCHEMA,
        "title": ledger.texts["title"],
        "version": __version__,
    }
    units: dict[str, str] = {}
    data["closure"] = {
        name: ledger.texts[f"closure.{name}"] for name in ("id", "name", "family", "source")
    }
    for part in PARTS:
        for path, text in ledger.texts.items():
            if path.startswith(f"{part}."):
                _put(data, path, text)
        for path in ledger.labels:
            if path.startswith(f"{part}."):
                _put(data, path, ledger.label(path, row))
        for path, entry in ledger.entries.items():
            if path.startswith(f"{part}.") and path not in _INTERNAL:
                values = entry.values
                value = float(values[0 if values.size == 1 else row])
                name = path.rpartition(".")[2]
                _put(data, path, int(value) if name == "count" else value)
                units[path] = unit_of(path)
    findings = tuple(review(ledger, row))
    keys = dict.fromkeys([*ledger.sources, *(f.source for f in findings)])
    data["findings"] = [finding.as_dict() for finding in findings]
    data["assumptions"] = list(ledger.notes)
    data["relations"] = _relations(ledger)
    data["sources"] = [
        {"key": key, "citation": citations.citation(key)}
        for key in keys
        if key != "common practice"
    ]
    data["cautions"] = list(CAUTIONS)
    data["units"] = units
    return Sheet(data, findings)


def _relations(ledger: Ledger) -> list[dict[str, Any]]:
    """Return every relation that has a stated range and went into the sheet, each once."""
    used = {e.relation.id: e.relation for e in ledger.entries.values() if e.relation}
    return [
        {
            "id": r.id,
            "title": r.title,
            "formula": r.formula,
            "source": r.source,
            "status": r.status,
            "range": {name: list(limits) for name, limits in r.valid.items()},
        }
        for r in used.values()
        if r.valid
    ]


def unit_of(path: str) -> str:
    """Return the SI unit of a quantity of the sheet by its path."""
    return quantity(path.rpartition(".")[2]).unit
