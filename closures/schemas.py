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


def sheet_schema() -> dict[str, Any]:
    """Return the schema of a sheet."""
    leaf = {"anyOf": [{"type": "number"}, {"type": "string"}]}
    part = {
        "type": "object",
        "additionalProperties": {
            "anyOf": [*leaf["anyOf"], {"type": "object", "additionalProperties": leaf}]
        },
    }
    finding = {
        "type": "object",
        "properties": {
            "id": {"type": "string"},
            "severity": {"enum": list(SEVERITIES)},
            "quantity": {"type": "string"},
            "value": {"type": "number"},
            "limit": {"type": "number"},
            **{n: {"type": "string"} for n in ("message", "why", "action", "source")},
        },
        "required": ["id", "severity", "quantity", "message", "source"],
        "additionalProperties": False,
    }
    text = {"type": "string"}
    source = {
        "type": "object",
        "properties": {"key": text, "citation": text},
        "required": ["key", "citation"],
        "additionalProperties": False,
    }
    relation = {
        "type": "object",
        "properties": {
            **dict.fromkeys(("id", "title", "formula", "source", "status"), text),
            "range": {
                "type": "object",
                "additionalProperties": {
                    "type": "array",
                    "items": {"type": "number"},
                    "minItems": 2,
                    "maxItems": 2,
                },
            },
        },
        "required": ["id", "title", "formula", "source", "status", "range"],
        "additionalProperties": False,
    }
    closure = dict.fromkeys(("id", "name", "family", "source"), text)
    return {
        "$schema": DRAFT,
        "$id": "urn:closures:sheet:1",
        "title": "Set-up sheet",
        "type": "object",
        "properties": {
            "schema": {"const": SCHEMA},
            "title": text,
            "version": text,
            "closure": {"type": "object", "properties": closure, "required": list(closure)},
            **dict.fromkeys(PARTS, part),
            "findings": {"type": "array", "items": finding},
            "assumptions": {"type": "array", "items": text},
            "relations": {"type": "array", "items": relation},
            "sources": {"type": "array", "items": source},
            "cautions": {"type": "array", "items": text, "minItems": 1},
            "units": {"type": "object", "additionalProperties": text},
        },
        "required": [
            "schema",
            "title",
            "version",
            "closure",
            "findings",
            "sources",
            "cautions",
            "units",
        ],
        "additionalProperties": False,
    }
