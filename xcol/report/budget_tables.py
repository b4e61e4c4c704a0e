"""The tables of a budget as text, for the screen and for Markdown."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from xcol.report.labels import column_label, contribution_label, name_of
from xcol.report.sheet import Grid
from xcol.units import significant

if TYPE_CHECKING:
    from collections.abc import Sequence

    from xcol.answers.budget import Budget, ColumnBand, DetectorBudget, PeakBudget
    from xcol.answers.likely import Likely
    from xcol.answers.rows import Row
    from xcol.flowpath.hydraulics import PressureRange

MOST_ROWS = 7  # of parts on the first screen; with more, the small ones fold
SMALL_SHARE = 0.02
_BAR = 6  # characters of a full share bar


def parts_grid(answer: Budget, at: DetectorBudget, peak: PeakBudget, most: int) -> Grid:
    """Return the parts in flow order, columns among them, for one peak at one detector.

    At most ``most`` lines (4 or more): with more than seven contributions those under 2 % fold into
    one line, and then the smallest, until the rest fits.
    """
    inlets = {row.part.position: row.inlet for row in answer.pressure.rows}
    columns = {band.part.position: band for band in peak.columns}
    room = most - min(len(columns), 3)
    folded = _folded(peak, room)
    largest = max((row.share_extra for row in peak.rows), default=0.0)
    lines: list[tuple[str, ...]] = []
    shown: set[int] = set()
    for part in answer.instrument.parts[: at.detector.position]:
        band = columns.get(part.position)
        if band is not None and (len(columns) <= 3 or band is peak.columns[0]):
            lines.append(_column_line(answer, band, peak, inlets[part.position]))
        for row in peak.rows:
            if row.part is part and row not in folded:
                inlet = inlets[part.position] if part.position not in shown else None
                shown.add(part.position)
                lines.append(_part_line(answer, row, peak, inlet, largest))
    if folded:
        total = sum(row.variance for row in folded)
        share = total / peak.variance_extra if peak.variance_extra else 0.0
        label = f"{len(folded)} others, {percent(max(row.share_extra for row in folded))} or less each"
        ends = span_of(answer, sum(row.low for row in folded), sum(row.high for row in folded))
        lines.append((label, three(answer.in_uL2(total)), ends, percent(share), "", "", ""))
    gone = "N if gone" if peak.plates_column is not None else "µL² if gone"
    headers = ("in flow order", "µL²", "best-worst", "share", "", gone, "bar")
    return Grid(headers, tuple(lines), (False, True, True, True, False, True, True))


def peaks_grid(answer: Budget, peaks: tuple[PeakBudget, ...], likely: Sequence[Likely | None]) -> Grid:
    """Return what is recorded of each peak, with the interval of what is kept where there is one."""
    headers: tuple[str, ...]
    rows: tuple[tuple[str, ...], ...]
    if all(peak.plates_column is None for peak in peaks):
        headers = ("peak", "σ, µL", "σ², µL²", "σ, s", "4σ, s")
        rows = tuple(
            (
                peak.peak.name,
                three(math.sqrt(answer.in_uL2(peak.variance_total))),
                three(answer.in_uL2(peak.variance_total)),
                three(peak.sigma),
                three(4 * peak.sigma),
            )
            for peak in peaks
        )
        return Grid(headers, rows, (False, True, True, True, True))
    headers = ("peak", "k", "t_R, min", "plates", "kept", "likely", "W½, s", "alone", "Rs")
    rows = tuple(
        (
            peak.peak.name,
            significant(peak.peak.k or 0.0),
            three(peak.retention / 60),
            f"{plates(peak.plates_observed)} of {plates(peak.plates_column)}",
            percent(peak.plates_kept),
            shares(one.plates_kept) if one is not None and one.plates_kept is not None else "",
            three(peak.width_half),
            three(peak.width_half_column),
            percent(peak.resolution_kept),
        )
        for peak, one in zip(peaks, likely, strict=True)
    )
    whole = Grid(headers, rows, (False, *(True,) * 8))
    return whole if any(one is not None for one in likely) else whole.without("likely")


def pressure_grid(answer: Budget) -> Grid:
    """Return flow, Reynolds number, drop, inlet pressure with its range, and limit of each part."""
    headers = ("part", "mL/min", "Re", "drop, bar", "inlet, bar", "range", "limit, bar")
    rows = tuple(
        (
            name_of(row.part),
            significant(row.flow * 60e6),
            or_dash(row.reynolds),
            bars(row.drop),
            bars(row.inlet),
            span(row.inlet),
            significant(row.part.max_pressure / 1e5) if row.part.max_pressure else "not checked",
        )
        for row in answer.pressure.rows
    )
    return Grid(headers, rows, (False, *(True,) * 6))


def span_of(answer: Budget, low: float, high: float) -> str:
    """Return the ends of a variance [s²] in µL², "" where it has none."""
    if math.isclose(low, high, rel_tol=5e-3):
        return ""
    return figures((answer.in_uL2(low), answer.in_uL2(high)))


def figures(interval: tuple[float, float]) -> str:
    """Return an interval of figures with three digits: '103-208'."""
    low, high = (three(end) for end in interval)
    return high if low == high else f"{low}-{high}"


def shares(interval: tuple[float, float]) -> str:
    """Return an interval of shares in per cent: '16-27 %'."""
    low, high = (percent(end) for end in interval)
    if low == high:
        return high
    return f"{low.removesuffix(' %')}-{'99 %' if high == '>99 %' else high}"


def three(value: float) -> str:
    """Return a computed figure: three significant digits, zeros at the end kept."""
    return significant(value, zeros=True)


def percent(share: float | None) -> str:
    """Return a share in per cent; "<1 %" where it would round to nothing."""
    if share is None:
        return "-"
    if 0 < share < 0.005:
        return "<1 %"
    if -0.005 < share < 0:
        return "0 %"
    if 0.995 <= share < 1:
        return ">99 %"
    return f"{100 * share:.0f} %"


def of_draws(share: float) -> str:
    """Return a share of the draws in whole per cent, rounded down: nine of ten are nine of ten."""
    return f"{math.floor(100 * share + 1e-9)} %"


def plates(number: float | None) -> str:
    """Return a plate number with three significant digits."""
    return three(number) if number is not None else "-"


def bars(drop: PressureRange | None) -> str:
    """Return a pressure in bar, '-' where it is not computed."""
    return three(drop.value / 1e5) if drop is not None else "-"


def span(drop: PressureRange | None) -> str:
    """Return the range of a pressure in bar, '' where it has none."""
    if drop is None or math.isclose(drop.low, drop.high, rel_tol=0.01):
        return ""
    return figures((drop.low / 1e5, drop.high / 1e5))


def or_dash(value: float | None) -> str:
    """Return a figure, '-' where there is none."""
    return three(value) if value is not None else "-"


def _part_line(answer: Budget, row: Row, peak: PeakBudget, inlet: PressureRange | None, most: float) -> tuple[str, ...]:
    gone = three(answer.in_uL2(row.extra_without))
    if peak.plates_column is not None and row.plates_kept_without is not None:
        gone = plates(peak.plates_column * row.plates_kept_without)
    bar = "█" * round(_BAR * row.share_extra / most) if most else ""
    return (
        contribution_label(row.part, row.contribution),
        three(answer.in_uL2(row.variance)),
        span_of(answer, row.low, row.high),
        percent(row.share_extra),
        bar,
        gone,
        bars(inlet) if inlet is not None else "",
    )


def _column_line(answer: Budget, band: ColumnBand, peak: PeakBudget, inlet: PressureRange | None) -> tuple[str, ...]:
    """Return a column's line; the first of more than three stands for all of them."""
    name, own, number = column_label(band.part), band.variance, band.plates
    if len(peak.columns) > 3:
        name, own, number = f"{len(peak.columns)} columns", peak.variance_column, peak.plates_column or 0.0
    return (f"[ {name} ]", three(answer.in_uL2(own)), f"N {plates(number)}", "own", "", "", bars(inlet))


def _folded(peak: PeakBudget, room: int) -> list[Row]:
    """Return the rows that fold into one line, for the rest to fit in ``room`` lines with it."""
    if len(peak.rows) <= min(MOST_ROWS, room):
        return []
    ordered = sorted(peak.rows, key=lambda row: row.high)  # what may be large is not hidden
    small = sum(row.high < SMALL_SHARE * peak.variance_extra for row in ordered)
    needed = len(ordered) - min(MOST_ROWS, room - 1)
    return ordered[: max(small, needed, 2)]
