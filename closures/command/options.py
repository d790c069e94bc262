"""Options that every sub-command shares: form and place of the output."""

from __future__ import annotations

import warnings
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from typing import TYPE_CHECKING, Any

import click

if TYPE_CHECKING:
    from closures.fluids import Fluid

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


def flag(name: str) -> str:
    """Return the option of a quantity: ``--bulk-velocity`` of ``bulk_velocity``."""
    return f"--{name.replace('_', '-')}"


@contextmanager
def range_warnings() -> Iterator[None]:
    """Say once, on standard error, each range that was left inside."""
    with warnings.catch_warnings(record=True) as caught:
        warnings.simplefilter("always")
        yield
    for note in dict.fromkeys(str(w.message) for w in caught):
        click.echo(f"closures: warning: {note}", err=True)


def named_fluid(
    name: str | None, amounts: dict[str, Any], gives: tuple[str, ...]
) -> Fluid | None:  # fmt: skip
    """Return the fluid of ``--fluid``; take temperature and pressure out of the amounts.

    ``gives`` are the amounts that a named fluid settles and that may not stand beside it.
    """
    from walllaw.errors import InputError

    conditions = {n: amounts.pop(n) for n in ("temperature", "pressure") if n in amounts}
    if name is None:
        if conditions:
            raise InputError(flag(next(iter(conditions))), "no fluid", "a fluid by --fluid")
        return None
    for n in gives:
        if n in amounts:
            raise InputError("--fluid", f"a {n.replace('_', ' ')} as well", "one of the two")
    from closures.fluids import fluid

    return fluid(name, **conditions)
