"""The application: its commands, and what happens to errors."""

from __future__ import annotations

import sys
from typing import Annotated

import typer

from xcol import __version__
from xcol.cli import budget, catalog, check, explain
from xcol.cli.output import complain, silence_output
from xcol.errors import InputError

app = typer.Typer(
    name="xcol",
    help="Extra-column band broadening of a liquid chromatograph, part by part.",
    epilog="Every command shows a worked example with --help.",
    no_args_is_help=True,
    rich_markup_mode=None,
    pretty_exceptions_enable=False,
    context_settings={"help_option_names": ["-h", "--help"]},
)
app.command("budget", epilog=budget.EXAMPLE)(budget.budget)
app.command("check", epilog=check.EXAMPLE)(check.check)
app.command("catalog", epilog=catalog.EXAMPLE)(catalog.catalog)
app.command("explain", epilog=explain.EXAMPLE)(explain.explain)


def _show_version(wanted: bool) -> None:
    if wanted:
        typer.echo(f"xcol {__version__}")
        raise typer.Exit


@app.callback()
def options(
    version: Annotated[
        bool,
        typer.Option("--version", callback=_show_version, is_eager=True, help="Show the version."),
    ] = False,
) -> None:
    """Extra-column band broadening of a liquid chromatograph, part by part."""


def main() -> None:
    """Run the command line; exit 0 fine, 1 a requirement is not met, 2 bad input or usage."""
    if sys.stdout is None:  # closed by whoever started the program
        print("xcol: there is no standard output to write to", file=sys.stderr)
        sys.exit(2)
    try:
        app()
    except InputError as error:
        complain(_answer_to(error))
        sys.exit(2)
    except OSError as error:  # a full disk behind standard output, for instance
        print(f"xcol: the result could not be written: {error.strerror}", file=sys.stderr)
        silence_output()
        sys.exit(2)
    except KeyboardInterrupt:
        sys.exit(130)


def _answer_to(error: InputError) -> str:
    count = len(error.faults)
    return f"{error}\n\n{count} faults; nothing was computed." if count > 1 else str(error)
