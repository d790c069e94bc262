"""What a closure table must hold; every fault is one line with file, key and what is wrong."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from walllaw import tables
from walllaw.errors import TableError, nearest
from walllaw.exact import evaluate

STATUS = ("confirmed", "secondary", "memory", "unsure", "derived", "common practice")
FAMILIES = (
    "k-epsilon",
    "low-re-k-epsilon",
    "elliptic-relaxation",
    "k-omega",
    "k-tau",
    "one-equation",
    "algebraic",
    "second-moment",
    "algebraic-stress",
    "transition",
    "heat",
)
VARIABLES = (
    "k",
    "epsilon",
    "epsilon_tilde",
    "omega",
    "tau",
    "nu_tilde",
    "v2",
    "zeta",
    "f",
    "gamma",
    "re_theta_t",
    "R",
    "reynolds_stresses",
    "laminar_k",
    "turbulent_k",
)
TREATMENTS = ("resolved", "wall-function", "blended")
DECAY = ("k-epsilon", "k-omega", "k-tau", "none")
SIGMA = ("divisor", "multiplier")
SETS = ("inner", "outer")
RULES = (
    "zero",
    "zero-gradient",
    "wall-function",
    "viscous-omega",
    "viscous-omega-10x",
    "rough-omega",
    "dissipation-from-k",
    "elliptic-wall",
    "shifted-distance",
    "base-closure",
)
_REQUIRED = ("name", "family", "variables", "source", "status", "summary", "evidence")
_TOP = {
    *_REQUIRED,
    "read_in",
    "base",
    "sigma_convention",
    "use",
    "misprints",
    "coefficients",
    "inner",
    "outer",
    "alternatives",
    "extensions",
    "functions",
    "algebra",
    "wall",
    "free_stream",
}
_ROW = {"value", "expression", "symbol", "source", "where", "status", "note", "read_in"}
_RESERVED = ("pi", "sqrt", "exp", "log", "cos", "acos")
_TEXT = {"formula", "rule", "source", "where", "status", "note", "read_in"}


def _fail(id_: str, key: str, fault: str) -> TableError:
    return TableError(f"closure {id_}: {key}: {fault}")


def _known(id_: str, key: str, value: object, accepted: tuple[str, ...]) -> None:
    if value not in accepted:
        near = nearest(str(value), accepted)
        hint = f"; did you mean {near!r}?" if near else ""
        raise _fail(id_, key, f"{value!r} is none of {', '.join(accepted)}{hint}")


def _source(id_: str, key: str, value: object) -> None:
    if value != "common practice" and not tables.known_source(value):
        raise _fail(id_, key, f"source {value!r} is not in the bibliography")


def _keys(id_: str, key: str, row: object, accepted: set[str]) -> Mapping[str, Any]:
    if not isinstance(row, dict):
        raise _fail(id_, key, "must be a table")
    for name in row:
        if name not in accepted:
            near = nearest(name, accepted)
            raise _fail(
                id_,
                f"{key}.{name}" if key else name,
                "unknown key" + (f"; did you mean {near!r}?" if near else ""),
            )
    return row


def _evidence(id_: str, key: str, row: Mapping[str, Any]) -> None:
    for name in ("symbol", "where", "note", "formula", "rule", "quantity"):
        if not isinstance(row.get(name, ""), str):
            raise _fail(id_, f"{key}.{name}", "must be a text")
    if "status" in row:
        _known(id_, f"{key}.status", row["status"], STATUS)
    for name in ("source", "read_in"):
        if name in row:
            _source(id_, f"{key}.{name}", row[name])


def _coefficient(id_: str, key: str, row: object) -> None:
    row = _keys(id_, key, row, _ROW)
    if ("value" in row) == ("expression" in row):
        raise _fail(id_, key, "needs either a value or an expression")
    if not isinstance(row.get("value", row.get("expression")), str):
        raise _fail(id_, key, "write the value as text, exactly as printed")
    if row.get("status") == "derived" and "value" in row:
        raise _fail(id_, key, "a derived value must be an expression of what it derives from")
    _evidence(id_, key, row)


def _coefficients(id_: str, part: str, rows: object) -> None:
    if not isinstance(rows, dict):
        raise _fail(id_, part, "must be a table")
    for name, row in rows.items():
        key = f"{part}.{name}"
        _coefficient(id_, key, row)
        if not name.isidentifier() or name in _RESERVED:
            raise _fail(id_, key, "the name must be a word that an expression can use")


def _texts(id_: str, part: str, rows: object) -> None:
    if not isinstance(rows, dict):
        raise _fail(id_, part, "must be a table")
    for name, row in rows.items():
        _keys(id_, f"{part}.{name}", row, _TEXT)
        if not ("formula" in row or "rule" in row):
            raise _fail(id_, f"{part}.{name}", "needs a formula or a rule")
        _evidence(id_, f"{part}.{name}", row)


def _head(id_: str, raw: Mapping[str, Any]) -> None:
    for name in _REQUIRED:
        if name not in raw:
            raise _fail(id_, name, "is missing")
    for name in ("name", "summary", "evidence"):
        if not isinstance(raw[name], str) or not raw[name].strip():
            raise _fail(id_, name, "must be a text")
    _known(id_, "family", raw["family"], FAMILIES)
    _evidence(id_, "head", raw)
    if not isinstance(raw["variables"], list):
        raise _fail(id_, "variables", "must be a list of names")
    for variable in raw["variables"]:
        _known(id_, "variables", variable, VARIABLES)
    if raw["family"] not in ("algebraic", "heat") and not raw["variables"]:
        raise _fail(id_, "variables", "is empty")
    if "sigma_convention" in raw:
        _known(id_, "sigma_convention", raw["sigma_convention"], SIGMA)
    for name in ("base", "use"):
        if not isinstance(raw.get(name, ""), str):
            raise _fail(id_, name, "must be a text")
    misprints = raw.get("misprints", [])
    if not isinstance(misprints, list) or not all(isinstance(text, str) for text in misprints):
        raise _fail(id_, "misprints", "must be a list of texts")


def _wall(id_: str, raw: Mapping[str, Any]) -> None:
    wall = _keys(
        id_, "wall", raw.get("wall", {}), {"treatments", "y_plus_max", "conditions", "rough"}
    )
    if raw["family"] != "heat" and not wall.get("treatments"):
        raise _fail(id_, "wall.treatments", "is missing")
    if not isinstance(wall.get("treatments", []), list):
        raise _fail(id_, "wall.treatments", "must be a list of names")
    for treatment in wall.get("treatments", []):
        _known(id_, "wall.treatments", treatment, TREATMENTS)
    if "y_plus_max" in wall:
        _coefficient(id_, "wall.y_plus_max", wall["y_plus_max"])
    for part in ("conditions", "rough"):
        _texts(id_, f"wall.{part}", wall.get(part, {}))
        for name, row in wall.get(part, {}).items():
            _known(id_, f"wall.{part}.{name}", name, tuple(raw["variables"]))
            _known(id_, f"wall.{part}.{name}.rule", row.get("rule"), RULES)


def _recommendation(id_: str, key: str, row: object) -> None:
    row = _keys(id_, key, row, {"quantity", "low", "high", *_TEXT})
    for name in ("quantity", "formula", "source", "status"):
        if name not in row:
            raise _fail(id_, f"{key}.{name}", "is missing")
    _evidence(id_, key, row)
    if ("low" in row) != ("high" in row):
        raise _fail(id_, f"{key}.{'high' if 'low' in row else 'low'}", "is missing")
    if "low" not in row:
        return
    try:
        low, high = (evaluate(str(row[name])) for name in ("low", "high"))
    except TableError as error:
        raise _fail(id_, key, str(error)) from None
    if low > high:
        raise _fail(id_, f"{key}.low", "is above high")


def _free_stream(id_: str, raw: Mapping[str, Any]) -> None:
    if "free_stream" not in raw:
        raise _fail(id_, "free_stream", "is missing")
    part = _keys(
        id_, "free_stream", raw["free_stream"], {"decay", "decay_set", "note", "recommendations"}
    )
    _known(id_, "free_stream.decay", part.get("decay"), DECAY)
    if "decay_set" in part:
        _known(id_, "free_stream.decay_set", part["decay_set"], SETS)
    if not isinstance(part.get("note", ""), str):
        raise _fail(id_, "free_stream.note", "must be a text")
    recommendations = part.get("recommendations", [])
    if not isinstance(recommendations, list):
        raise _fail(id_, "free_stream.recommendations", "must be a list of tables")
    for row in recommendations:
        _recommendation(id_, "free_stream.recommendations", row)


def check_closure(id_: str, raw: Mapping[str, Any]) -> None:
    """Check the content of a closure table.

    Raises
    ------
    TableError
        At the first fault.
    """
    _keys(id_, "", raw, _TOP)
    _head(id_, raw)
    for part in ("coefficients", *SETS, "alternatives", "extensions"):
        _coefficients(id_, part, raw.get(part, {}))
    if not (raw.get("coefficients") or raw.get("inner") or "base" in raw):
        raise _fail(id_, "coefficients", "is missing")
    _texts(id_, "functions", raw.get("functions", {}))
    algebra = _keys(id_, "algebra", raw.get("algebra", {}), {"C_mu", "note"})
    needed = "algebra" in raw or (raw["family"] != "heat" and "base" not in raw)
    if needed and not isinstance(algebra.get("C_mu"), str):
        raise _fail(id_, "algebra.C_mu", "is missing (a coefficient's name, or a value as text)")
    _wall(id_, raw)
    _free_stream(id_, raw)


def check_merged(
    id_: str, raw: Mapping[str, Any], parts: Mapping[str, Mapping[str, object]]
) -> None:
    """Check what only shows when a table and its base are put together.

    Raises
    ------
    TableError
        If a coefficient stands both in a set and beside the sets, the sets differ in what they
        hold, or the decay refers to a set that is not there.
    """
    for part in SETS:
        for name in parts[part]:
            if name in parts["coefficients"]:
                raise _fail(id_, f"coefficients.{name}", f"stands in {part} too: name the set")
    uneven = sorted(set(parts["inner"]) ^ set(parts["outer"]))
    if uneven:
        raise _fail(id_, f"inner, outer: {uneven[0]}", "stands in one of the two sets only")
    decay_set = raw["free_stream"].get("decay_set")
    if (decay_set is None) == bool(parts["outer"]) and raw["free_stream"]["decay"] != "none":
        raise _fail(id_, "free_stream.decay_set", "goes with a closure of two sets, and only there")
