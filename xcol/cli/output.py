"""Where results go: standard output or a file, whole or not at all; messages to standard error."""

from __future__ import annotations

import os
import shutil
import sys
import tempfile
from collections.abc import Callable
from dataclasses import dataclass
from enum import StrEnum
from pathlib import Path
from typing import TYPE_CHECKING, Annotated, TextIO

import typer

from xcol.errors import Place, refusal

if TYPE_CHECKING:
    from xcol.report.sheet import Sheet


class Format(StrEnum):
    """The forms of a result."""

    TEXT = "text"
    JSON = "json"
    CSV = "csv"
    MARKDOWN = "markdown"


FormatOption = Annotated[Format, typer.Option("--format", help="Form of the result.")]
OutputOption = Annotated[str | None, typer.Option("--output", help="Write to this file; never over an existing one.")]
ForceOption = Annotated[bool, typer.Option("--force", help="Let --output replace a file.")]
FileArgument = Annotated[str, typer.Argument(metavar="FILE", help='Path file; "-": standard input.')]

CatalogOption = Annotated[
    list[str] | None, typer.Option("--catalog", metavar="FILE", help="A catalog of your own; may be given again.")
]

_SYMBOLS = "µ²°½█σθ−–"  # what a text report may need


def can_show_symbols(stream: TextIO) -> bool:
    """Return whether the stream's encoding has the symbols of a report."""
    try:
        _SYMBOLS.encode(stream.encoding or "ascii")
    except (UnicodeEncodeError, LookupError):
        return False
    return True


@dataclass(frozen=True)
class Forms:
    """How one answer is made into each form; only the one that is asked for is called."""

    record: Callable[[], object]
    csv: Callable[[], str]
    markdown: Callable[[], str]
    text: Callable[[Sheet], None]


def deliver(forms: Forms, form: Format, output: str | None, force: bool, *sources: str) -> None:
    """Write an answer in this form to standard output (None or "-"), or whole to a file.

    Raises ``InputError`` where the file exists (without ``force``), is one of the files ``sources`` that
    the answer was made from, or cannot be written.
    """
    target = None if output == "-" else output
    if form is Format.JSON:
        result = _json(forms.record(), target)
    elif form is Format.CSV:
        result = forms.csv()
    elif form is Format.MARKDOWN:
        result = forms.markdown()
    else:
        sheet = _new_sheet(target)
        forms.text(sheet)
        result = sheet.text()
    if target is None:
        _print(result)
    else:
        _write(result, target, force, sources)


def complain(text: str) -> None:
    """Write a message to standard error, in ASCII where it must be."""
    if not can_show_symbols(sys.stderr):
        from xcol.report.sheet import to_ascii

        text = to_ascii(text)
    print(text, file=sys.stderr)


def _new_sheet(output: str | None) -> Sheet:
    """Return the sheet for a text report: width, colour and symbols as the destination allows."""
    from xcol.report.sheet import Sheet

    if output is not None:
        return Sheet()
    terminal = sys.stdout.isatty()
    width = min(max(shutil.get_terminal_size((80, 24)).columns, 80), 140) if terminal else 80
    color = terminal and not os.environ.get("NO_COLOR") and os.environ.get("TERM") != "dumb"
    return Sheet(width=width, ascii_only=not can_show_symbols(sys.stdout), color=color)


def _json(record: object, output: str | None) -> str:
    """Return a record as JSON text, with escapes where the terminal has no symbols."""
    import json

    plain = output is None and not can_show_symbols(sys.stdout)
    return json.dumps(record, indent=2, ensure_ascii=plain, allow_nan=False) + "\n"


def _print(text: str) -> None:
    encoding = sys.stdout.encoding or "ascii"
    try:
        sys.stdout.write(text.encode(encoding, "replace").decode(encoding))
        sys.stdout.flush()
    except BrokenPipeError:  # the reader has what it wanted, or has gone: no error of ours
        silence_output()


def _write(text: str, output: str, force: bool, sources: tuple[str, ...]) -> None:
    target = Path(output)
    place = Place(file=output, key="--output")
    if target.is_dir():
        raise refusal(place, "a directory", "the name of a file", f"{target / 'budget.txt'}")
    if target.exists() and not target.is_file():
        raise refusal(place, "a device or pipe", "the name of a file", "standard output, redirected")
    read = (source for source in sources if source != "-" and Path(source).exists())
    if target.exists() and any(target.samefile(source) for source in read):
        raise refusal(place, "a file that was read for it", "another file", "another name for the result")
    if target.exists() and not force:
        raise refusal(place, "a file that exists", "a new file", "another name, or --force")
    try:
        _write_whole(target, text)
    except OSError as error:
        words = (error.strerror or str(error)).lower()
        raise refusal(place, words, "a file that can be written", "check folder and rights") from None


def silence_output() -> None:
    """Send what is still to be written nowhere, so that the interpreter's last flush is no error."""
    os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())


def _write_whole(target: Path, text: str) -> None:
    """Write beside the target and move into place, so that no half-written file is ever seen."""
    mode = target.stat().st_mode & 0o777 if target.exists() else 0o666 & ~_umask()
    handle, name = tempfile.mkstemp(dir=target.parent, prefix=f".{target.name}.")
    try:
        with os.fdopen(handle, "w", encoding="utf-8", newline="\n") as stream:
            stream.write(text)
        os.chmod(name, mode)
        os.replace(name, target)
    except BaseException:
        Path(name).unlink(missing_ok=True)
        raise


def _umask() -> int:
    current = os.umask(0)
    os.umask(current)
    return current
