"""Rules about the flow: regime, ranges of correlations, compressibility, lengths."""

from __future__ import annotations

from collections.abc import Iterator

from closures.ledger import Ledger
from closures.rules import Hit
from walllaw.relation import relation

INTERNAL = ("pipe", "channel", "duct", "annulus")


def _regime(e: Ledger, name: str) -> Iterator[Hit]:
    if "flow.regime" in e.labels:
        yield Hit(e.is_label("flow.regime", name), "flow.reynolds", e["flow.reynolds_critical"])


def regime_laminar(e: Ledger) -> Iterator[Hit]:
    """The flow is laminar: a turbulence closure is out of place."""
    yield from _regime(e, "laminar")


def regime_transitional(e: Ledger) -> Iterator[Hit]:
    """Neither laminar nor reliably turbulent."""
    yield from _regime(e, "transitional")


def correlation_range(e: Ledger) -> Iterator[Hit]:
    """A correlation is used outside the range its source states (each input of it once)."""
    seen = set()
    for path, source_path, rel, rows in e.outside():
        name = next(n for n, p in e.entries[path].inputs.items() if p == source_path)
        if (rel.id, name) in seen:
            continue
        seen.add((rel.id, name))
        low, high = rel.valid[name]
        yield Hit(
            rows,
            source_path,
            None,
            {"title": rel.title, "name": name, "low": low, "high": high, "key": rel.source},
        )


def compressible(e: Ledger) -> Iterator[Hit]:
    """The Mach number is too high for incompressible friction and wall units."""
    if "flow.mach" in e:
        limit = relation("review", "incompressible")["mach"]
        yield Hit(e["flow.mach"] > limit, "flow.mach", limit)


def pipe_law_on_other_passage(e: Ledger) -> Iterator[Hit]:
    """A pipe friction law is given the plain hydraulic diameter of another passage."""
    if (
        e.texts.get("flow.kind") in ("channel", "duct", "annulus")
        and e.texts.get("flow.friction_diameter") == "hydraulic"
    ):
        turbulent = ~e.is_label("flow.regime", "laminar")
        other = e["flow.darcy_friction_laminar_equivalent"]
        change = 100.0 * (other / e["flow.darcy_friction"] - 1.0)
        yield Hit(turbulent, "flow.darcy_friction", None, {"other": other, "change": change})


def entrance(e: Ledger) -> Iterator[Hit]:
    """The place asked about lies in the entrance region."""
    if "flow.distance" in e and "flow.entrance_length" in e:
        rows = e["flow.distance"] < e["flow.entrance_length"]
        yield Hit(rows, "flow.distance", e["flow.entrance_length"])
