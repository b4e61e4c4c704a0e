"""The first screen of a budget: at most 24 lines of 80 columns, whatever the path."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.report.budget_tables import bars, parts_grid, peaks_grid
from xcol.report.budget_text import heading, liquid_line, total_pressure, verdict
from xcol.report.labels import short_name, show
from xcol.report.sheet import Sheet
from xcol.units import PRESSURE

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, DetectorBudget, PeakBudget
    from xcol.answers.likely import Sampler
    from xcol.answers.pressure import PressureRow

LINES = 24
_CAUTION = "Before opening a line: pump off, pressure at zero, eye protection, site rules."
_SAID = 8  # lines of the liquid and the verdict together
_HANG = 2  # indent of the lines of a paragraph after its first
_LEAST_PARTS = 6  # lines of the table of parts that are kept whatever else there is to say


def first_screen(
    answer: Budget, at: DetectorBudget, peak: PeakBudget, sheet: Sheet, sampler: Sampler | None = None
) -> None:
    """Write the first screen for one peak at one detector."""
    heading(answer, sheet)
    said = verdict(answer, at, peak, sampler)
    if liquid := liquid_line(answer, peak):
        said.insert(0, liquid)
    for index, line in enumerate(said):
        left = _SAID - (sheet.count() - 1) - (len(said) - index - 1)
        _at_most(max(1, min(2, left)), line, sheet)
    sheet.line()
    foot = Sheet(sheet.width, sheet.ascii_only)
    _footer(answer, foot)

    # header of the parts, a blank line and header of the peaks, one peak, one line for those left out
    room = LINES - sheet.count() - foot.count() - 5
    kept = _lines_for_warnings(answer, sheet, room - _LEAST_PARTS)
    sheet.grid(parts_grid(answer, at, peak, room - kept), indent=2)
    sheet.line()
    shown = _peaks_that_fit(at.peaks, peak, LINES - sheet.count() - foot.count() - 1 - kept)
    likely = [sampler.of(at, one) if sampler is not None else None for one in shown]
    sheet.grid(peaks_grid(answer, shown, likely), indent=2)
    if len(shown) < len(at.peaks):
        sheet.line(f"  {len(at.peaks) - len(shown)} more peaks: --full")
    _warnings(answer, sheet, LINES - sheet.count() - foot.count())
    _footer(answer, sheet)


def _footer(answer: Budget, sheet: Sheet) -> None:
    _at_most(2, _pressure(answer), sheet)
    short = list(dict.fromkeys(assumption.short for assumption in answer.instrument.assumed))
    sheet.line(_fitting_list("Assumed: ", short, sheet.width))
    sheet.line(_CAUTION, "dim")


def _pressure(answer: Budget) -> str:
    """Return the pressure, what is nearest to its limit, and what has none, for two lines."""
    pieces = [total_pressure(answer)]
    limited = [row for row in answer.pressure.rows if row.part.max_pressure and row.inlet is not None]
    if limited:
        nearest = max(limited, key=_share_of_limit)
        limit = show(nearest.part.max_pressure or 0.0, PRESSURE)
        rest = f", {len(limited) - 1} more: --full" if len(limited) > 1 else ""
        word = "Above its limit" if _share_of_limit(nearest) > 1 else "Nearest its limit"
        pieces.append(f"{word}: {short_name(nearest.part)} {bars(nearest.inlet)} of {limit}{rest}.")
    if without := [short_name(part) for part in answer.unchecked]:
        more = f" and {len(without) - 2} more" if len(without) > 2 else ""
        pieces.append(f"Limits not checked: {', '.join(without[:2])}{more}.")
    return " ".join(pieces)


def _share_of_limit(row: PressureRow) -> float:
    return row.inlet.value / row.part.max_pressure if row.inlet and row.part.max_pressure else 0.0


def _at_most(lines: int, text: str, sheet: Sheet, style: str = "") -> int:
    """Add a paragraph of at most so many lines, cut with dots where it must be; return its lines."""
    text = _cut(lines, text, sheet)
    sheet.line(text, style, hang=_HANG)
    return sheet.height(text, _HANG)


def _cut(lines: int, text: str, sheet: Sheet) -> str:
    while sheet.height(text, _HANG) > lines and len(text) >= 8:
        text = f"{text[: len(text) - 8].rstrip(' .')}..."
    return text


def _fitting_list(head: str, items: list[str], width: int) -> str:
    """Return a list that fits one line, with the number of what did not fit."""
    kept: list[str] = []
    for index, item in enumerate(items):
        left = len(items) - index - 1
        tail = f", {left} more: --full" if left else ""
        if len(head + ", ".join([*kept, item]) + tail) > width:
            return f"{head}{', '.join(kept)}, {len(items) - index} more: --full"
        kept.append(item)
    return head + ", ".join(kept)


def _peaks_that_fit(peaks: tuple[PeakBudget, ...], chosen: PeakBudget, room: int) -> tuple[PeakBudget, ...]:
    """Return as many peaks as there are lines for: the chosen one, and those that lose most."""
    if len(peaks) <= room:
        return peaks
    others = sorted((p for p in peaks if p is not chosen), key=lambda p: p.plates_kept or 0.0)
    kept = [chosen, *others[: max(room - 2, 0)]]  # one line says how many are left out
    return tuple(peak for peak in peaks if any(peak is one for one in kept))


def _lines_for_warnings(answer: Budget, sheet: Sheet, room: int) -> int:
    """Return the lines that warnings get whatever else there is to say.

    Limits and contradictions of pressure, as many as ``room`` has lines for, one at least; of other
    warnings only their number.
    """
    if not answer.warnings:
        return 0
    urgent = len(answer.pressure.limits) + len(answer.pressure.warnings)
    lines = 0
    for index, warning in enumerate(answer.warnings[:urgent]):
        height = _warning_height(warning, sheet)
        if index and lines + height + 1 > room:
            return lines + 1
        lines += height
    return lines + (1 if urgent < len(answer.warnings) else 0)


def _warning_height(warning: str, sheet: Sheet) -> int:
    return min(sheet.height(f"! {warning}", _HANG), 2)


def _warnings(answer: Budget, sheet: Sheet, room: int) -> None:
    """Write the warnings that fit, in their order, and how many are left."""
    left = len(answer.warnings)
    for warning in answer.warnings:
        if _warning_height(warning, sheet) + (1 if left > 1 else 0) > room:
            more = " more" if left < len(answer.warnings) else ""
            sheet.line(f"! {left}{more} warning{'s' if left > 1 else ''}: --full", "yellow")
            return
        room -= _at_most(2, f"! {warning}", sheet, "yellow")
        left -= 1
