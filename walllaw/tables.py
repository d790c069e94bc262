"""The only module that opens a data table: where tables are, how TOML and text are read."""

from __future__ import annotations

import os
import tomllib
from functools import cache
from typing import Any

from walllaw.errors import TableError

_MARKER = "sources.json"


@cache
def root() -> str:
    """Return the folder that holds the tables.

    An installed wheel carries them inside the package (``walllaw/_tables``); a checkout or an
    editable install has them beside it (``tables``). A folder counts only when it holds the
    bibliography, since ``site-packages/tables`` may be somebody else's library.

    Raises
    ------
    TableError
        If neither folder holds the bibliography.
    """
    package = os.path.dirname(os.path.abspath(__file__))
    beside = os.path.join(os.path.dirname(package), "tables")
    for folder in (os.path.join(package, "_tables"), beside):
        if os.path.isfile(os.path.join(folder, _MARKER)):
            return folder
    raise TableError(
        "the data tables of walllaw are missing from this installation: install the package again"
    )


def path(*parts: str) -> str:
    """Return the full path of a table, given its parts below the table folder."""
    return os.path.join(root(), *parts)


def names(folder: str, suffix: str = ".toml") -> list[str]:
    """Return the sorted stems of the table files in a sub-folder."""
    return sorted(
        name.removesuffix(suffix) for name in os.listdir(path(folder)) if name.endswith(suffix)
    )


def text(*parts: str) -> str:
    """Return a table file as text."""
    with open(path(*parts), encoding="utf-8") as file:
        return file.read()


def parse(content: str, name: str) -> dict[str, Any]:
    """Parse TOML text; a syntax error names the table.

    Raises
    ------
    TableError
        If the text is not valid TOML.
    """
    try:
        return tomllib.loads(content)
    except (tomllib.TOMLDecodeError, RecursionError) as error:
        raise TableError(f"table {name}: not valid TOML: {error}") from None


@cache
def read(*parts: str) -> dict[str, Any]:
    """Read one TOML table by its parts below the table folder (callers must not change it)."""
    return parse(text(*parts), "/".join(parts))


@cache
def _bibliography() -> str:
    return text(_MARKER)


def known_source(key: object) -> bool:
    """Return whether a key is in the bibliography, without parsing it (that needs 4 ms)."""
    return f'"id": "{key}"' in _bibliography()


@cache
def sources() -> dict[str, dict[str, Any]]:
    """Return the bibliography: CSL-JSON items by key.

    Examples
    --------
    >>> sources()["colebrook-1939"]["issued"]["date-parts"][0][0]
    1939
    """
    import json

    items: list[dict[str, Any]] = json.loads(_bibliography())
    return {item["id"]: item for item in items}
