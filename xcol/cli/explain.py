"""``xcol explain``."""

from __future__ import annotations

from typing import Annotated

import typer

from xcol.cli.output import ForceOption, Format, FormatOption, Forms, OutputOption, deliver

EXAMPLE = """
Example, the model behind a tube's line; without a topic, the list of topics:

\b
  xcol explain tube
  xcol explain
"""


def explain(
    topic: Annotated[str | None, typer.Argument(help="A kind of part, or a word of a report.")] = None,
    form: FormatOption = Format.TEXT,
    output: OutputOption = None,
    force: ForceOption = False,
) -> None:
    """Explain the model behind a line of a report: formula, range, sources and a worked number."""
    from xcol.report.explain import (
        find,
        topics_csv,
        topics_markdown,
        topics_record,
        topics_text,
    )

    topics = find(topic)
    forms = Forms(
        record=lambda: topics_record(topics),
        csv=lambda: topics_csv(topics),
        markdown=lambda: topics_markdown(topics),
        text=lambda sheet: topics_text(topics, sheet, in_full=topic is not None),
    )
    deliver(forms, form, output, force)
