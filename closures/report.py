"""The sheet as text of at most 80 columns, and as Markdown."""

from __future__ import annotations

import textwrap
from collections.abc import Iterable, Iterator, Mapping
from typing import Any

from closures.quantities import quantity
from closures.sheets import Sheet

WIDTH = 80
HEADINGS = {
    "fluid": "Fluid",
    "flow": "Flow",
    "inlet": "Inlet",
    "wall": "Wall",
    "scales": "Scales at the inlet",
}
_SUBHEADINGS = {
    "inlet.set": "set at the inlet",
    "wall.layers": "layer stack",
    "wall.set": "first cell and wall",
}


def digits(value: float) -> str:
    """Return a number with five significant digits, plain where that is readable.

    Examples
    --------
    >>> digits(0.0210000), digits(1.5e-05), digits(1878.297), digits(24)
    ('0.021', '1.5e-05', '1878.3', '24')
    """
    return f"{value:.5g}"


def _rows(data: Mapping[str, Any], path: str) -> Iterator[tuple[str, str, str, str]]:
    """Yield (words, symbol, value, unit); a sub-table is announced by its heading."""
    for name, value in data.items():
        where = f"{path}.{name}"
        if isinstance(value, Mapping):
            if value:
                yield _SUBHEADINGS.get(where, name.replace("_", " ")), "", "", ""
                yield from _rows(value, where)
        elif isinstance(value, str):
            yield name.replace("_", " "), "", value, ""
        else:
            q = quantity(name)
            yield q.words, q.symbol, digits(float(value)), "" if q.unit == "1" else q.unit


def _wrapped(text: str, indent: int = 2, first: str | None = None) -> list[str]:
    pad = " " * indent
    return textwrap.wrap(
        text,
        WIDTH,
        initial_indent=pad if first is None else first,
        subsequent_indent=pad,
        break_long_words=True,
        break_on_hyphens=False,
    ) or [""]


def _line(words: str, symbol: str, value: str, unit: str) -> list[str]:
    if not value:
        return [f"  - {words} -"]
    if not symbol:
        return _wrapped(f"{words:<12}  {value}", 16, "  ")
    head = textwrap.wrap(words, 42)
    lines = [f"  {part}" for part in head[:-1]]
    lines.append(f"  {head[-1]:<42} {symbol:>11} {value:>12}  {unit}".rstrip())
    return lines


def _count(sheet: Sheet) -> str:
    parts = []
    for severity in ("error", "warning", "note"):
        n = sum(f.severity == severity for f in sheet.findings)
        if n:
            parts.append(f"{n} {severity}{'s' if n > 1 else ''}")
    return ", ".join(parts) or "none"


def text(sheet: Sheet) -> str:
    """Return the sheet as plain text, at most 80 columns wide."""
    closure = sheet["closure"]
    lines = [
        *_wrapped(sheet["title"], 0),
        *_wrapped(f"closure {closure['id']}: {closure['name']}", 2, ""),
        "=" * WIDTH,
        f"Findings: {_count(sheet)}",
    ]
    for finding in sheet.findings:
        lines += _wrapped(f"{finding.severity.upper()} {finding.id}: {finding.message}", 4, "  ")
        lines += _wrapped(f"why: {finding.why}", 4)
        lines += _wrapped(f"do: {finding.action}  [{finding.source}]", 4)
    for part, heading in HEADINGS.items():
        if part in sheet.data:
            lines += ["", heading, "-" * len(heading)]
            for row in _rows(sheet[part], part):
                lines += _line(*row)
    lines += _listing("Assumptions", sheet["assumptions"])
    lines += _listing("Ranges of the relations used", _ranges(sheet))
    lines += _listing("Sources", [f"{s['key']}: {s['citation']}" for s in sheet["sources"]])
    lines += _listing("Cautions", sheet["cautions"])
    return "\n".join(lines) + "\n"


def _ranges(sheet: Sheet) -> list[str]:
    return [
        f"{r['title']}: "
        + ", ".join(f"{n} {low:g} to {high:g}" for n, (low, high) in r["range"].items())
        + f"  [{r['source']}, {r['status']}]"
        for r in sheet["relations"]
    ]


def _listing(heading: str, items: Iterable[str]) -> list[str]:
    rows = list(items)
    if not rows:
        return []
    return ["", heading, "-" * len(heading), *(x for r in rows for x in _wrapped(r, 4, "  "))]


def _cell(text_: str) -> str:
    return text_.replace("\\", "\\\\").replace("|", "\\|").replace("<", "&lt;").replace("\n", " ")


def markdown(sheet: Sheet) -> str:
    """Return the sheet as Markdown (tables in the common pipe form)."""
    closure = sheet["closure"]
    lines = [
        f"# {_cell(sheet['title'])}",
        "",
        f"Closure `{closure['id']}`: {_cell(closure['name'])}",
        "",
        "## Findings",
        "",
    ]
    if sheet.findings:
        lines += ["| severity | finding | message | do | source |", "|---|---|---|---|---|"]
        lines += [
            f"| {f.severity} | `{f.id}` | {_cell(f.message)} | {_cell(f.action)} | {f.source} |"
            for f in sheet.findings
        ]
    else:
        lines.append("None.")
    for part, heading in HEADINGS.items():
        if part not in sheet.data:
            continue
        lines += [
            "",
            f"## {heading}",
            "",
            "| quantity | symbol | value | unit |",
            "|---|---|---:|---|",
        ]
        for words, symbol, value, unit in _rows(sheet[part], part):
            cells = [_cell(c) for c in (words, symbol, value, unit)]
            lines.append(
                "| " + " | ".join(cells if value else [f"**{cells[0]}**", "", "", ""]) + " |"
            )
    for heading, items in (
        ("Assumptions", sheet["assumptions"]),
        ("Ranges of the relations used", _ranges(sheet)),
        ("Sources", [f"`{s['key']}`: {s['citation']}" for s in sheet["sources"]]),
        ("Cautions", sheet["cautions"]),
    ):
        if items:
            lines += ["", f"## {heading}", "", *(f"- {_cell(item)}" for item in items)]
    return "\n".join(lines) + "\n"
