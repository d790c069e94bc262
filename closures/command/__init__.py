"""The command ``closures``: names and one-line helps as data; a sub-command loads when called."""

from __future__ import annotations

import gc
import importlib
import os
import sys
from collections.abc import Sequence

import click

COMMANDS = {
    "sheet": "Evaluate a case file, review it, print the set-up sheet.",
    "inlet": "Inlet values from flags, for one closure or for all.",
    "wall": "Friction velocity, first cell, layers and wall-function values from flags.",
    "profile": "A law of the wall as a table or a picture.",
    "developed": "Developed flow by mixing length: friction, profile, friction chart.",
    "coefficients": "List and show coefficient sets with the source of each number.",
}
CAUTION = (
    "A set-up aid: local codes and the judgement of a licensed engineer decide. "
    "Each correlation holds in its stated range only."
)


class _Commands(click.Group):
    """A group whose members are imported when they are called, not before."""

    def list_commands(self, ctx: click.Context) -> list[str]:
        return list(COMMANDS)

    def get_command(self, ctx: click.Context, cmd_name: str) -> click.Command | None:
        if cmd_name not in COMMANDS:
            from walllaw.errors import unknown_name

            raise click.UsageError(str(unknown_name("command", cmd_name, COMMANDS)))
        command: click.Command = importlib.import_module(f"closures.command.{cmd_name}").command
        return command

    def format_commands(self, ctx: click.Context, formatter: click.HelpFormatter) -> None:
        with formatter.section("Commands"):
            formatter.write_dl(list(COMMANDS.items()))


def _version(ctx: click.Context, param: click.Parameter, value: bool) -> None:
    if value and not ctx.resilient_parsing:
        from closures._version import __version__

        click.echo(f"closures {__version__}")
        ctx.exit()


@click.command(
    cls=_Commands,
    epilog=CAUTION,
    context_settings={"help_option_names": ["-h", "--help"], "max_content_width": 100},
)
@click.option(
    "--version",
    is_flag=True,
    callback=_version,
    expose_value=False,
    is_eager=True,
    help="Print the version and leave.",
)
def closures() -> None:
    """Set-up numbers for a turbulent-flow run, each with its source.

    Quantities are written "25 m/s", "0.3 mm", "5 %", or as a bare number in SI units. Results go
    to standard output, messages to standard error. Exit status: 0 done; 1 done, but the review
    found an error (with --strict, also a warning); 2 the input cannot be used.
    """


def _fail(message: str) -> int:
    line = " ".join(message.split())
    print(f"closures: {line}", file=sys.stderr)  # noqa: T201 - the one place that reports errors
    return 2


def run(arguments: Sequence[str] | None = None) -> int:
    """Run the command and return its exit status; never a traceback for wrong input."""
    from walllaw.errors import InputError, TableError

    try:
        result = closures.main(
            args=None if arguments is None else list(arguments),
            prog_name="closures",
            standalone_mode=False,
        )
        sys.stdout.flush()
    except click.UsageError as error:
        return _fail(error.format_message())
    except click.exceptions.Exit as error:
        return int(error.exit_code)
    except click.ClickException as error:
        return _fail(error.format_message())
    except (InputError, TableError) as error:
        return _fail(str(error))
    except (KeyboardInterrupt, click.Abort):
        print("closures: interrupted", file=sys.stderr)  # noqa: T201
        return 130
    except BrokenPipeError:
        return _reader_gone()
    except OSError as error:
        return _fail(f"{error.filename or 'output'}: {error.strerror or error}")
    return int(result) if isinstance(result, int) else 0


def _reader_gone() -> int:
    """Leave quietly when the reader of standard output closed it: output was lost, so not 0."""
    os.dup2(os.open(os.devnull, os.O_WRONLY), 1)
    return 1


def main() -> None:
    """Entry point of the installed command."""
    # imports make many objects and no rubbish: collecting less often saves 5 % of a quick command
    gc.set_threshold(50_000, 20, 20)
    sys.exit(run())
