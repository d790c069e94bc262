"""Citations of the bibliography as one line of text."""

from __future__ import annotations

from typing import Any

from walllaw import tables
from walllaw.errors import unknown_name


def _authors(item: dict[str, Any]) -> str:
    names = [
        a.get("literal") or f"{a.get('given', '')} {a['family']}".strip()
        for a in item.get("author", [])
    ]
    return ", ".join(names)


def citation(key: str) -> str:
    """Return author, title, place and year of a source; says when it is cited from memory.

    Raises
    ------
    InputError
        If the key is not in the bibliography.

    Examples
    --------
    >>> citation("chien-1982").partition(". ")[2].partition(". ")[2][-31:]
    'AIAA Journal 20(1), 33-38, 1982'
    """
    items = tables.sources()
    if key not in items:
        raise unknown_name("source", key, items, "the keys of the bibliography")
    item = items[key]
    place = item.get("container-title") or " ".join(
        str(item[k]) for k in ("publisher", "number") if k in item
    )
    if "volume" in item:
        place += f" {item['volume']}"
    if "issue" in item:
        place += f"({item['issue']})" if "volume" in item else f" no. {item['issue']}"
    if "page" in item:
        place += f", {item['page']}"
    year = item.get("issued", {}).get("date-parts", [[""]])[0][0]
    text = f"{_authors(item)}: {item['title']}. {place}, {year}".replace(" ,", ",")
    memory = item.get("custom", {}).get("status") == "memory"
    return f"{text} [cited from memory]" if memory else text
