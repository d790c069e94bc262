"""Options made from the keys of a case file (``tables/case.toml``)."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import click

from closures.case import keys

Decorator = Callable[[Callable[..., Any]], Callable[..., Any]]


def case_options(*tables: str) -> Decorator:
    """Add one option for every key of the named tables of a case file."""

    def decorate(function: Callable[..., Any]) -> Callable[..., Any]:
        for path, key in reversed(keys().items()):
            table, _, name = path.partition(".")
            if table not in tables:
                continue
            word = table if name == "name" else name  # --fluid water, not --name water
            flag, parameter = f"--{word.replace('_', '-')}", path.replace(".", "__")
            if key.kind == "flag":
                option = click.option(flag, parameter, is_flag=True, default=None, help=key.help)
            else:
                metavar = "|".join(key.choices) or key.kind.upper()
                option = click.option(flag, parameter, metavar=metavar, help=key.help)
            function = option(function)
        return function

    return decorate


def raw_case(values: dict[str, Any]) -> dict[str, Any]:
    """Turn the options that were given into the nested mapping of a case file."""
    raw: dict[str, Any] = {}
    for parameter, value in values.items():
        if value is None:
            continue
        path = parameter.replace("__", ".")
        table, _, name = path.partition(".")
        if keys()[path].kind == "count":
            value = int(value) if str(value).isdigit() else value
        raw.setdefault(table, {})[name] = value
    return raw
