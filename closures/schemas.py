"""JSON Schemas (draft 2020-12) of the case file and of the sheet, made from the tables."""

from __future__ import annotations

from typing import Any

from closures.case import Key, keys
from closures.quantities import quantity
from closures.rules import SEVERITIES
from closures.sheets import PARTS, SCHEMA
from walllaw import tables

DRAFT = "https://json-schema.org/draft/2020-12/schema"


def _key(key: Key) -> dict[str, Any]:
    if key.kind == "choice":
        body: dict[str, Any] = {"enum": list(key.choices)}
    elif key.kind == "flag":
        body = {"type": "boolean"}
    elif key.kind == "text":
        body = {"type": "string"}
    elif key.kind == "count":
        q = quantity(key.quantity)
        body = {"type": "integer", "minimum": int(q.low), "maximum": int(q.high)}
    else:
        q = quantity(key.quantity)
        body = {
            "anyOf": [{"type": "number"}, {"type": "string", "maxLength": 80}],
            "x-unit": q.unit,
        }
        if key.kind == "length":
            multiple = {
                "type": "object",
                "properties": {"times": {"type": "number"}, "of": {"type": "string"}},
                "required": ["times", "of"],
                "additionalProperties": False,
            }
            body["anyOf"].append(multiple)
    return {"description": key.help, **body}


def case_schema() -> dict[str, Any]:
    """Return the schema of a case file (as the JSON that its TOML amounts to)."""
    properties: dict[str, Any] = {}
    for name, help_ in tables.read("case.toml")["tables"].items():
        properties[name] = {
            "type": "object",
            "description": help_,
            "properties": {},
            "additionalProperties": False,
        }
    for path, key in keys().items():
        table, _, name = path.rpartition(".")
        (properties[table]["properties"] if table else properties)[name] = _key(key)
    return {
        "$schema": DRAFT,
        "$id": "urn:closures:case:1",
        "title": "Case file",
        "type": "object",
        "properties": properties,
        "required": ["fluid", "flow", "turbulence", "closure"],
        "additionalProperties": False,
    }


_TEXT = {"type": "string"}
_NUMBER = {"type": "number"}


def _object(required: list[str], **properties: Any) -> dict[str, Any]:
    return {
        "type": "object",
        "properties": properties,
        "required": required,
        "additionalProperties": False,
    }


def _part() -> dict[str, Any]:
    leaf = {"anyOf": [_NUMBER, _TEXT]}
    table = {"type": "object", "additionalProperties": leaf}
    return {"type": "object", "additionalProperties": {"anyOf": [_NUMBER, _TEXT, table]}}


def _finding() -> dict[str, Any]:
    texts = dict.fromkeys(("id", "quantity", "message", "why", "action", "source"), _TEXT)
    return _object(
        ["id", "severity", "quantity", "message", "source"],
        severity={"enum": list(SEVERITIES)},
        value=_NUMBER,
        limit=_NUMBER,
        **texts,
    )


def _relation() -> dict[str, Any]:
    names = ["id", "title", "formula", "source", "status"]
    limits = {"type": "array", "items": _NUMBER, "minItems": 2, "maxItems": 2}
    ranges = {"type": "object", "additionalProperties": limits}
    return _object([*names, "range"], range=ranges, **dict.fromkeys(names, _TEXT))


def sheet_schema() -> dict[str, Any]:
    """Return the schema of a sheet."""
    closure = ["id", "name", "family", "source"]
    source = ["key", "citation"]
    properties = {
        "schema": {"const": SCHEMA},
        "title": _TEXT,
        "version": _TEXT,
        "closure": _object(closure, **dict.fromkeys(closure, _TEXT)),
        **{part: _part() for part in PARTS},
        "findings": {"type": "array", "items": _finding()},
        "assumptions": {"type": "array", "items": _TEXT},
        "relations": {"type": "array", "items": _relation()},
        "sources": {"type": "array", "items": _object(source, **dict.fromkeys(source, _TEXT))},
        "cautions": {"type": "array", "items": _TEXT, "minItems": 1},
        "units": {"type": "object", "additionalProperties": _TEXT},
    }
    optional = {*PARTS, "assumptions", "relations"}
    body = _object([name for name in properties if name not in optional], **properties)
    return {"$schema": DRAFT, "$id": "urn:closures:sheet:1", "title": "Set-up sheet", **body}
