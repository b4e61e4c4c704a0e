"""``xcol check``."""

from __future__ import annotations

from xcol.cli.output import CatalogOption, FileArgument, ForceOption, Format, FormatOption, Forms, OutputOption, deliver

EXAMPLE = """
Example, what was understood of a path file, and everything that looks like a slip:

\b
  xcol check brewery-narrow.toml
"""


def check(
    file: FileArgument,
    catalogs: CatalogOption = None,
    form: FormatOption = Format.TEXT,
    output: OutputOption = None,
    force: ForceOption = False,
) -> None:
    """Show what was understood of a path file, in metric and inch, and what was assumed."""
    from xcol.answers.budget import budget
    from xcol.flowpath.reader import read
    from xcol.report.check import check_csv, check_markdown, check_record, check_text

    # what only the computation shows is a slip as well: a limit, a pump pressure, too few points
    answer = budget(read(file, catalogs or []))
    forms = Forms(
        record=lambda: check_record(answer),
        csv=lambda: check_csv(answer),
        markdown=lambda: check_markdown(answer),
        text=lambda sheet: check_text(answer, sheet),
    )
    deliver(forms, form, output, force, *answer.instrument.files, *(catalogs or []))
