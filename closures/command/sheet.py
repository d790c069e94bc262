"""``closures sheet``: evaluate a case file, review it, print the set-up sheet."""

from __future__ import annotations

import json

import click

from closures.command.options import output_options


@click.command()
@click.argument("case", required=False)
@output_options("text", "json", "markdown")
@click.option("--strict", is_flag=True, help="Exit with 1 on a warning too, not only on an error.")
@click.option(
    "--schema", type=click.Choice(["case", "sheet"]), help="Print a JSON Schema and leave."
)
def command(case: str | None, form: str, output: str, strict: bool, schema: str | None) -> int:
    """Evaluate the case file CASE (- for standard input), review it, print the sheet."""
    from closures.files import emit

    if schema:
        from closures import schemas

        made = schemas.case_schema() if schema == "case" else schemas.sheet_schema()
        emit(json.dumps(made, indent=2, ensure_ascii=False), output)
        return 0
    if case is None:
        raise click.UsageError("CASE is missing: name a case file, or - for standard input")
    from closures import report
    from closures.evaluation import sheet

    made_sheet = sheet(case)
    forms = {"text": report.text, "json": lambda s: s.to_json(), "markdown": report.markdown}
    emit(forms[form](made_sheet), output)
    return int(made_sheet.worst() in (("error", "warning") if strict else ("error",)))
