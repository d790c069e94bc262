"""Which closures there are: ids, aliases and the heads of the tables, read without NumPy."""

from __future__ import annotations

from functools import cache
from typing import Any

from walllaw import tables
from walllaw.errors import unknown_name

FOLDER = "closures"


@cache
def closure_ids() -> tuple[str, ...]:
    """Return the ids of all closures, sorted."""
    return tuple(tables.names(FOLDER))


@cache
def aliases() -> dict[str, str]:
    """Return the id behind each alias a practitioner may type."""
    return dict(tables.read("aliases.toml"))


def resolve(name: str) -> str:
    """Return the id that an id or an alias stands for.

    Raises
    ------
    InputError
        If there is no such closure; names the nearest.

    Examples
    --------
    >>> resolve("sst")
    'menter-sst-2003'
    """
    if name in closure_ids():
        return name
    if name in aliases():
        return aliases()[name]
    raise unknown_name(
        "closure", name, [*closure_ids(), *aliases()], "the ids of `closures coefficients list`"
    )


def closure_heads() -> list[dict[str, Any]]:
    """Return id, name, family, variables, status ... of every closure.

    Only the text before the first table of each file is parsed.
    """
    heads = []
    for id_ in closure_ids():
        head = tables.text(FOLDER, f"{id_}.toml").split("\n\n[", 1)[0]
        heads.append({"id": id_, **tables.parse(head, f"{id_}.toml")})
    return heads
