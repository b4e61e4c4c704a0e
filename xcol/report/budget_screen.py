"""The first screen of a budget: at most 24 lines of 80 columns, whatever the path."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.report.budget_tables import bars, parts_grid, peaks_grid
from xcol.report.budget_text import heading, total_pressure, unchecked, verdict
from xcol.report.labels import name_of, show
from xcol.report.sheet import Sheet
from xcol.units import PRESSURE

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, DetectorBudget, PeakBudget
    from xcol.answers.pressure import PressureRow

LINES = 24
_CAVEAT = "No ranges yet (tubes at their worst, plugs at their best): what leads is open."
_CAUTION = "Before opening a line: pump off, pressure at zero, eye protection, site rules."
_LEAST_PARTS = 6  # lines of the table of parts that are kept whatever else there is to say


def first_screen(answer: Budget, at: DetectorBudget, peak: PeakBudget, sheet: Sheet) -> None:
    """Write the first screen for one peak at one detector."""
    heading(answer, sheet)
    for line in verdict(answer, at, peak):
        _at_most(2, line, sheet)
    _at_most(1, _CAVEAT, sheet)
    sheet.line()
    foot = _like(sheet)
    _footer(answer, foot)

    # header of the parts, a blank line and header of the peaks, one peak
    room = LINES - sheet.count() - foot.count() - 4
    urgent = _warnings(answer, sheet, room - _LEAST_PARTS)
    cut = len(at.peaks) > 1
    sheet.grid(parts_grid(answer, at, peak, room - urgent.count() - (1 if cut else 0)), indent=2)
    sheet.line()
    room = LINES - sheet.count() - foot.count() - 1 - urgent.count()
    shown = _peaks_that_fit(at.peaks, peak, room)
    sheet.grid(peaks_grid(shown, answer.instrument.flow), indent=2)
    if len(shown) < len(at.peaks):
        sheet.line(f"  {len(at.peaks) - len(shown)} more peaks: --full")
    _warnings(answer, sheet, LINES - sheet.count() - foot.count(), into=sheet)
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
        pieces.append(f"Nearest its limit: {_short(nearest)} {bars(nearest.inlet)} of {limit}{rest}.")
    if without := [name if len(name) <= 24 else f"{name[:21]}..." for name in unchecked(answer)]:
        more = f" and {len(without) - 2} more" if len(without) > 2 else ""
        pieces.append(f"Limits not checked (none entered): {', '.join(without[:2])}{more}.")
    return " ".join(pieces)


def _short(row: PressureRow) -> str:
    name = name_of(row.part)
    return name if len(name) <= 24 else f"{name[:21]}..."


def _share_of_limit(row: PressureRow) -> float:
    return row.inlet.high / row.part.max_pressure if row.inlet and row.part.max_pressure else 0.0


def _like(sheet: Sheet) -> Sheet:
    return Sheet(sheet.width, sheet.ascii_only, sheet.color)


def _at_most(lines: int, text: str, sheet: Sheet, style: str = "") -> None:
    """Add a paragraph of at most so many lines; what does not fit is cut with dots."""
    while True:
        trial = _like(sheet)
        trial.line(text, hang=2)
        if trial.count() <= lines or len(text) < 8:
            break
        text = f"{text[: len(text) - 8].rstrip(' .')}..."
    sheet.line(text, style, hang=2)


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
    return tuple(peak for peak in peaks if peak in kept)


def _warnings(answer: Budget, sheet: Sheet, room: int, into: Sheet | None = None) -> Sheet:
    """Write the warnings that fit, those of limits first, and how many are left; always one line.

    Without ``into`` only limits are written, in as little room as they take.
    """
    ordered = sorted(answer.warnings, key=lambda text: "limit" not in text)
    target = into if into is not None else _like(sheet)
    used = 0
    for index, warning in enumerate(ordered):
        left = len(ordered) - index
        urgent = "limit" in warning
        trial = _like(sheet)
        _at_most(2, f"! {warning}", trial)
        tail = 1 if left > 1 else 0
        if (into is None and not urgent) or used + trial.count() + tail > (
            max(room, 3) if urgent and not index else room
        ):
            target.line(f"! {_counted(left, index > 0)}: --full", "yellow")
            return target
        _at_most(2, f"! {warning}", target, "yellow")
        used += trial.count()
    return target


def _counted(left: int, more: bool) -> str:
    return f"{left}{' more' if more else ''} warning{'s' if left > 1 else ''}"
