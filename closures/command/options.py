"""Options that every sub-command shares: form and place of the output."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import click

Decorator = Callable[[Callable[..., Any]], Callable[..., Any]]


def output_options(*formats: str) -> Decorator:
    """Add ``--format`` with the given choices (the first is the default) and ``--output``."""

    def decorate(function: Callable[..., Any]) -> Callable[..., Any]:
        function = click.option(
            "--output",
            "-o",
            default="-",
            metavar="FILE",
            help="File to write; - for standard output.",
        )(function)
        return click.option(
            "--format",
            "form",
            type=click.Choice(formats),
            default=formats[0],
            show_default=True,
            help="Form of the output.",
        )(function)

    return decorate
