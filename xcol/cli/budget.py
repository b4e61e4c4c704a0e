"""``xcol budget``."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated

import typer

from xcol.cli.output import CatalogOption, FileArgument, ForceOption, Format, FormatOption, Forms, OutputOption, deliver
from xcol.errors import InputError, Place, refusal
from xcol.units import quote

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, DetectorBudget, PeakBudget
    from xcol.answers.likely import Sampler
    from xcol.report.sheet import Sheet

FEWEST, MOST = 100, 100_000  # draws: fewer say nothing of 90 %, more take seconds

EXAMPLE = """
Example, a path file of a few lines and the first screen of its budget:

\b
  xcol budget brewery-narrow.toml
  xcol budget brewery-narrow.toml --peak early --full
  xcol budget brewery-narrow.toml --format json --output budget.json
"""


def budget(
    file: FileArgument,
    peak: Annotated[str | None, typer.Option("--peak", help="Peak of the first screen, by name or k.")] = None,
    detector: Annotated[str | None, typer.Option("--detector", help="Detector of the first screen, by name.")] = None,
    full: Annotated[bool, typer.Option("--full", help="Everything, not the first screen (of text).")] = False,
    draws: Annotated[
        int, typer.Option("--draws", help="Draws of what is unknown, for the intervals.", min=FEWEST, max=MOST)
    ] = 2000,
    seed: Annotated[int, typer.Option("--seed", help="Seed of the draws: the same one gives the same text.")] = 1,
    no_interval: Annotated[bool, typer.Option("--no-interval", help="No draws, and no intervals.")] = False,
    catalogs: CatalogOption = None,
    form: FormatOption = Format.TEXT,
    output: OutputOption = None,
    force: ForceOption = False,
) -> None:
    """Show what each part of the path adds to the width of the peaks, and what it costs in plates."""
    from xcol.answers.budget import budget as answer_of
    from xcol.answers.likely import Sampler
    from xcol.flowpath.reader import read

    answer = answer_of(read(file, catalogs or []))
    at = _chosen_detector(answer, detector, file)
    chosen = _chosen_peak(at, peak, file)
    sampler = None if no_interval else Sampler(answer, draws, seed)
    forms = _forms(answer, at, chosen, full, sampler)
    deliver(forms, form, output, force, *answer.instrument.files, *(catalogs or []))


def _forms(answer: Budget, at: DetectorBudget, chosen: PeakBudget, full: bool, sampler: Sampler | None) -> Forms:
    from xcol.report.budget_record import budget_csv, budget_record

    def markdown() -> str:
        from xcol.report.budget_text import budget_markdown

        return budget_markdown(answer, at, chosen, sampler)

    def text(sheet: Sheet) -> None:
        from xcol.report.budget_screen import first_screen
        from xcol.report.budget_text import full_report

        (full_report if full else first_screen)(answer, at, chosen, sheet, sampler)

    return Forms(lambda: budget_record(answer, sampler), lambda: budget_csv(answer, sampler), markdown, text)


def _chosen_detector(answer: Budget, name: str | None, file: str) -> DetectorBudget:
    """Return the detector of that name; the last one, which the whole path leads to, by default."""
    if name is None:
        return answer.detectors[-1]
    from xcol.report.labels import name_of

    found = [d for d in answer.detectors if name_of(d.detector).lower() == name.strip().lower()]
    if not found:
        known = ", ".join(f'"{name_of(d.detector)}"' for d in answer.detectors)
        raise _unknown(file, "--detector", name, f"one of {known}")
    return found[0]


def _chosen_peak(at: DetectorBudget, name: str | None, file: str) -> PeakBudget:
    """Return the peak of that name or k; the middle one in order of k by default."""
    if name is None:
        ordered = sorted(at.peaks, key=lambda peak: peak.peak.k or 0.0)
        return ordered[(len(ordered) - 1) // 2]
    word = name.strip().lower()
    for peak in at.peaks:
        if word == peak.peak.name.lower():
            return peak
    try:
        wanted = float(word.removeprefix("k").strip(" ="))
    except ValueError:
        wanted = None
    for peak in at.peaks:  # k as it is shown has three digits
        if wanted is not None and peak.peak.k is not None and abs(peak.peak.k - wanted) <= 5e-3 * wanted:
            return peak
    known = ", ".join(f'"{peak.peak.name}"' for peak in at.peaks)
    raise _unknown(file, "--peak", name, f"one of {known}, or a k that is shown")


def _unknown(file: str, option: str, read: str, expected: str) -> InputError:
    return refusal(Place(file, key=option), quote(read), expected, f"{option} with one of these names")
