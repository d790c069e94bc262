"""Usual values by situation: roughness of surfaces, terrain, intensities, lengths; each sourced."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cache
from typing import Any

from walllaw import tables
from walllaw.errors import TableError, unknown_name
from walllaw.exact import evaluate

_TEXT = ("title", "source", "status", "note", "of", "convention")


@dataclass(frozen=True, slots=True)
class Usual:
    """A usual value with range, source and status; which numbers it has depends on the table."""

    id: str
    title: str
    source: str
    status: str
    numbers: dict[str, float]
    note: str = ""
    of: str = ""
    convention: str = ""

    def __getitem__(self, name: str) -> float:
        return self.numbers[name]


def _build(table: str, id_: str, row: dict[str, Any], needed: str) -> Usual:
    for name in ("title", "source", "status", needed):
        if name not in row:
            raise TableError(f"{table}: {id_}: {name} is missing")
    if row["source"] != "common practice" and not tables.known_source(row["source"]):
        raise TableError(f"{table}: {id_}: source {row['source']!r} is not in the bibliography")
    numbers = {n: float(evaluate(v)) for n, v in row.items() if n not in _TEXT}
    if "low" in numbers and not numbers["low"] <= numbers[needed] <= numbers["high"]:
        raise TableError(f"{table}: {id_}: {needed} is not between low and high")
    return Usual(id=id_, numbers=numbers, **{n: row[n] for n in _TEXT if n in row})


@cache
def _usual(table: str, field: str, name: str, needed: str) -> Usual:
    rows = tables.read(table)
    if name not in rows:
        raise unknown_name(field, name, rows)
    return _build(table, name, rows[name], needed)


def surface(name: str, field: str = "surface") -> Usual:
    """Return the roughness of a surface: ``surface("commercial-steel")["value"]`` in metres.

    Raises
    ------
    InputError
        If the surface is not in the table; names the nearest.

    Examples
    --------
    >>> surface("commercial-steel")["value"]
    4.57e-05
    """
    return _usual("surfaces.toml", field, name, "value")


def terrain(name: str, field: str = "terrain") -> Usual:
    """Return the roughness length of a terrain: ``terrain("open-davenport")["z0"]`` in metres.

    Raises
    ------
    InputError
        If the terrain is not in the table.

    Examples
    --------
    >>> terrain("open-davenport")["z0"]
    0.03
    """
    return _usual("terrains.toml", field, name, "z0")


def usual_intensity(name: str, field: str = "estimate") -> Usual:
    """Return the usual intensity of a situation with its range, as fractions.

    Raises
    ------
    InputError
        If the situation is not in the table.

    Examples
    --------
    >>> usual_intensity("wind-tunnel")["value"]
    0.002
    """
    return _usual("intensities.toml", field, name, "value")


def usual_length(name: str, field: str = "length_estimate") -> Usual:
    """Return the usual length of a situation: a multiple, of what, in which convention.

    Raises
    ------
    InputError
        If the situation is not in the table.

    Examples
    --------
    >>> u = usual_length("developed-pipe")
    >>> u["times"], u.of, u.convention
    (0.07, 'hydraulic_diameter', 'mixing_length')
    """
    return _usual("lengths.toml", field, name, "times")


def listing(table: str) -> list[Usual]:
    """Return every row of ``surfaces``, ``terrains``, ``intensities`` or ``lengths``."""
    needed = {"surfaces": "value", "terrains": "z0", "intensities": "value", "lengths": "times"}
    return [
        _build(f"{table}.toml", n, row, needed[table])
        for n, row in tables.read(f"{table}.toml").items()
    ]
