"""``xcol catalog``."""

from __future__ import annotations

from typing import Annotated

import typer

from xcol.cli.output import CatalogOption, ForceOption, Format, FormatOption, Forms, OutputOption, complain, deliver

EXAMPLE = """
Example, what is known of a solute, of all liquids, and the stock bores that exist in one material:

\b
  xcol catalog solutes caffeine
  xcol catalog solvents
  xcol catalog tubing "fused silica"
"""


def catalog(
    kind: Annotated[str | None, typer.Argument(help="solvents, solutes, columns, tubing, ...; all without it.")] = None,
    word: Annotated[str | None, typer.Argument(help="Only rows with this word.")] = None,
    catalogs: CatalogOption = None,
    form: FormatOption = Format.TEXT,
    output: OutputOption = None,
    force: ForceOption = False,
) -> None:
    """List and search the liquids, solutes, columns and parts that are known, with their sources."""
    from xcol.flowpath.catalog_files import read_catalogs
    from xcol.flowpath.findings import Findings
    from xcol.report.catalog import (
        find,
        kinds_text,
        listings_csv,
        listings_markdown,
        listings_record,
        listings_text,
    )

    findings = Findings()
    known = read_catalogs(catalogs or [], findings)
    findings.raise_faults()
    for warning in findings.warnings:
        complain(warning)
    listings = find(known, kind, word)
    forms = Forms(
        record=lambda: listings_record(listings),
        csv=lambda: listings_csv(listings),
        markdown=lambda: listings_markdown(listings),
        text=lambda sheet: kinds_text(known, sheet) if kind is None else listings_text(listings, sheet),
    )
    deliver(forms, form, output, force, *(catalogs or []))
