"""``closures coefficients``: list and show coefficient sets with the source of each number."""

from __future__ import annotations

import json
from typing import TYPE_CHECKING, Any

import click

from closures.command.options import output_options

if TYPE_CHECKING:
    from closures.closure_tables import Closure


class _Group(click.Group):
    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        found = super().get_command(ctx, cmd_name)
        if found is None:
            from walllaw.errors import unknown_name

            raise click.UsageError(str(unknown_name("coefficients", cmd_name, self.commands)))
        return found


@click.command(cls=_Group)
def command() -> None:
    """List and show coefficient sets with the source of each number."""


@command.command("list")
@click.option("--family", metavar="NAME", help="Only the closures of one family.")
@output_options("text", "json", "csv", "markdown")
def list_(family: str | None, form: str, output: str) -> int:
    """List every closure: id, family, variables, status of evidence."""
    from closures.closure_list import closure_heads
    from closures.files import emit

    heads = closure_heads()
    families = sorted({h["family"] for h in heads})
    if family is not None:
        if family not in families:
            from walllaw.errors import unknown_name

            raise unknown_name("--family", family, families)
        heads = [h for h in heads if h["family"] == family]
    columns = ("id", "family", "variables", "status", "name")
    if form == "json":
        emit(json.dumps([{n: h[n] for n in columns} for h in heads], indent=2), output)
        return 0
    rows = [
        (h["id"], h["family"], " ".join(h["variables"]) or "-", h["status"], h["name"])
        for h in heads
    ]
    if form == "csv":
        lines = [",".join(columns), *(",".join(f'"{c}"' for c in row) for row in rows)]
    elif form == "markdown":
        lines = [
            f"| {' | '.join(columns)} |",
            "|---|---|---|---|---|",
            *(f"| {' | '.join(r)} |" for r in rows),
        ]
    else:
        short = [(i, f, v.replace("reynolds_stresses", "stresses")) for i, f, v, _, _ in rows]
        lines = [f"{i:<31}{f:<20}{v}".rstrip() for i, f, v in short]
    emit("\n".join(lines), output)
    return 0


@command.command()
@click.argument("name", metavar="ID")
@output_options("text", "json", "markdown")
def show(name: str, form: str, output: str) -> int:
    """Show one closure: every coefficient with source and status, wall and free-stream rules."""
    from closures.closure_tables import closure
    from closures.files import emit

    c = closure(name)
    emit({"text": _text, "json": _json, "markdown": _markdown}[form](c), output)
    return 0


_SETS = ("coefficients", "extensions", "alternatives")


def _coefficient_rows(c: Closure, part: str) -> list[tuple[str, str, str, str, str]]:
    """Return name, value, as printed, status and note; the note starts with a source of its own."""
    rows = []
    for n, k in getattr(c, part).items():
        notes = [k.source if k.source != c.source else "", k.note]
        rows.append((n, f"{k.value:.9g}", k.printed, k.status, "; ".join(x for x in notes if x)))
    return rows


def _json_set(c: Closure, part: str) -> dict[str, Any]:
    return {
        n: {
            "value": k.value,
            **{
                f: getattr(k, f)
                for f in ("source", "status", "read_in", "expression", "note")
                if getattr(k, f)
            },
        }
        for n, k in getattr(c, part).items()
    }


def _json(c: Closure) -> str:
    data: dict[str, Any] = {
        "id": c.id, "name": c.name, "family": c.family, "variables": list(c.variables),
        "source": c.source, "status": c.status, "summary": c.summary, "evidence": c.evidence,
        "sigma_convention": c.sigma_convention, **{part: _json_set(c, part) for part in _SETS},
        "functions": c.functions, "algebra": c.algebra, "wall": c.wall,
        "free_stream": c.free_stream,
        "misprints": list(c.misprints), "use": c.use,
    }  # fmt: skip
    return json.dumps(
        {k: v for k, v in data.items() if v}, indent=2, ensure_ascii=False, allow_nan=False
    )


def _rules(c: Closure) -> list[str]:
    lines = [f"{n} = {f['formula']}" for n, f in c.functions.items()]
    for part in ("conditions", "rough"):
        lines += [
            f"wall, {part}: {n}: {f['rule']} {f.get('formula', '')}".rstrip()
            for n, f in c.wall.get(part, {}).items()
        ]
    for row in c.free_stream.get("recommendations", []):
        lines.append(f"free stream: {row['formula']} [{row['source']}]")
    lines += [f"misprint: {text}" for text in c.misprints]
    return lines


def _text(c: Closure) -> str:
    import textwrap

    from closures.citations import citation

    def wrap(text: str) -> list[str]:
        return textwrap.wrap(text, 78, initial_indent="  ", subsequent_indent="    ") or []

    lines = [
        *textwrap.wrap(f"{c.id}: {c.name}", 80, subsequent_indent="  "),
        *wrap(c.summary),
        f"  family {c.family}; variables {' '.join(c.variables) or '-'}",
    ]
    if c.sigma_convention:
        lines.append(f"  sigma is a {c.sigma_convention} of the eddy viscosity")
    for part in _SETS:
        rows = _coefficient_rows(c, part)
        lines += [part] if rows else []
        for n, value, printed, status, note in rows:
            lines.append(f"  {n:<20} {value:>14}   {status}")
            shown = f"= {printed}" if "/" in printed or "*" in printed else ""
            for text in filter(None, (shown, note)):
                lines += textwrap.wrap(
                    text, 78, initial_indent=" " * 24, subsequent_indent=" " * 24
                )
    lines.append("rules")
    for row in _rules(c):
        lines += wrap(row)
    lines += ["evidence", *wrap(c.evidence), *wrap(citation(c.source))]
    if c.use:
        lines += ["use", *wrap(c.use)]
    return "\n".join(lines)


def _markdown(c: Closure) -> str:
    from closures.citations import citation

    head = [f"# {c.id}", "", c.name]
    rows = []
    for part in _SETS:
        cells = _coefficient_rows(c, part)
        if cells:
            rows += [
                "",
                f"| {part} | value | as printed | status | note |",
                "|---|---:|---|---|---|",
            ]
        rows += [
            f"| {' | '.join(cell.replace('|', chr(92) + '|') for cell in row)} |" for row in cells
        ]
    rules = ["", *(f"- {row}" for row in _rules(c)), "", f"Source: {citation(c.source)}"]
    return "\n".join([*head, *rows, *rules])
