"""A budget as text: the first screen, the full report, and Markdown."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from xcol.answers.doubt import over_diffusion
from xcol.report.budget_tables import (
    bars,
    figures,
    peaks_grid,
    percent,
    plates,
    pressure_grid,
    shares,
    span,
    three,
)
from xcol.report.detail_tables import detail_grid, reasons_grid, tubes_grid, unknowns_grid
from xcol.report.labels import name_of, show
from xcol.report.sheet import Grid, Sheet, fitted, markdown
from xcol.report.sureness import (
    beyond,
    ends_line,
    interval_line,
    verdict_on_parts,
)
from xcol.units import FLOW, PRESSURE, TEMPERATURE, VISCOSITY, VOLUME, significant

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, DetectorBudget, PeakBudget
    from xcol.answers.doubt import Doubt
    from xcol.answers.likely import Likely, Sampler

HARDLY = 0.03  # of the plates: what an uncertain diffusion coefficient may move without mattering


def full_report(
    answer: Budget, at: DetectorBudget, peak: PeakBudget, sheet: Sheet, sampler: Sampler | None = None
) -> None:
    """Write everything: all detectors and peaks, pressure, warnings, assumptions, cautions."""
    heading(answer, sheet)
    if liquid := liquid_line(answer, peak):
        sheet.line(liquid, hang=2)
    for line in verdict(answer, at, peak, sampler):
        sheet.line(line, hang=2)
    for found, doubts in zip(answer.detectors, over_diffusion(answer), strict=True):
        sheet.line()
        volume = found.delay * answer.instrument.flow
        sheet.line(
            f"Detector {name_of(found.detector)}: {three(found.delay)} s from the valve's turn to "
            f"the record outside the column ({show(volume, VOLUME)} at the column's flow)",
            "bold",
        )
        sheet.grid(peaks_grid(answer, found.peaks, likely_of(sampler, found)), indent=2)
        for one, doubt in zip(found.peaks, doubts, strict=True):
            sheet.line()
            sheet.line(_peak_line(one, doubt, answer), indent=2)
            likely = sampler.of(found, one) if sampler is not None else None
            sheet.grid(detail_grid(answer, one, likely, wide=sheet.width >= 110), indent=2)
            for line in how_sure(answer, one, likely, sampler):
                sheet.line(line, indent=2, hang=2)
            for title, grid in _further(answer, one, likely):
                sheet.line(title, indent=2, hang=2)
                sheet.grid(grid, indent=4, flexible=len(grid.headers) - 1 if grid.right[-1] is False else 0)
        sheet.line()
        sheet.line("What the ends of the ranges are", "bold")
        for label, best, worst in reasons_grid(found.peaks[0]).rows:
            sheet.line(f"{label}: best {best}; worst {worst}", indent=2, hang=2)
    sheet.line()
    sheet.line("Pressure", "bold")
    sheet.grid(pressure_grid(answer), indent=2)
    sheet.line(_pressure_line(answer), hang=2)
    for title, lines in titled_lists(answer):
        sheet.line()
        sheet.line(title, "bold")
        for line in lines:
            sheet.line(f"- {line}", hang=2, indent=2)
    sheet.line()
    sheet.line(
        "µL² is s² times the square of the column's flow. More: xcol explain TOPIC (tube, fitting, "
        "detector, column, pressure, ...)",
        "dim",
        hang=2,
    )


def likely_of(sampler: Sampler | None, at: DetectorBudget) -> list[Likely | None]:
    """Return how sure the answer for each peak at a detector is; None without draws."""
    return [sampler.of(at, peak) if sampler is not None else None for peak in at.peaks]


def how_sure(answer: Budget, peak: PeakBudget, likely: Likely | None, sampler: Sampler | None) -> list[str]:
    """Return how sure the answer for a peak is, in lines: its intervals, and its ends."""
    lines = [ends_line(peak)]
    if likely is not None and sampler is not None:
        lines.insert(0, interval_line(likely, peak, answer, sampler.draws.count, sampler.draws.seed))
    return [line for line in lines if line]


def _further(answer: Budget, peak: PeakBudget, likely: Likely | None) -> list[tuple[str, Grid]]:
    """Return the tables below the one of a peak's contributions, those that have rows."""
    found = []
    if likely is not None:
        what = "plates kept" if likely.plates_kept is not None else "variance added"
        found.append(
            (
                f"What the scatter of the {what} comes from",
                unknowns_grid(likely, has_column=peak.plates_column is not None),
            )
        )
    found.append(
        ("Tubes by themselves, µL²; De, De²Sc and bent at the bend entered, or at 3 cm", tubes_grid(answer, peak))
    )
    return [(title, grid) for title, grid in found if grid.rows]


def budget_markdown(answer: Budget, at: DetectorBudget, peak: PeakBudget, sampler: Sampler | None = None) -> str:
    """Return the report in Markdown."""
    pieces = [f"# {answer.instrument.title or 'Budget'}\n", _conditions(answer) + "\n"]
    pieces += [liquid + "\n"] if (liquid := liquid_line(answer, peak)) else []
    pieces += [line + "\n" for line in verdict(answer, at, peak, sampler)]
    for found, doubts in zip(answer.detectors, over_diffusion(answer), strict=True):
        pieces.append(f"## Detector {name_of(found.detector)}\n")
        pieces.append(markdown(peaks_grid(answer, found.peaks, likely_of(sampler, found))))
        for one, doubt in zip(found.peaks, doubts, strict=True):
            pieces.append(f"### {one.peak.name}\n")
            pieces.append(_peak_line(one, doubt, answer) + "\n")
            likely = sampler.of(found, one) if sampler is not None else None
            pieces.append(markdown(detail_grid(answer, one, likely, wide=True)))
            pieces += [line + "\n" for line in how_sure(answer, one, likely, sampler)]
            for title, grid in _further(answer, one, likely):
                pieces += [title + "\n", markdown(grid)]
        pieces += ["### What the ends of the ranges are\n", markdown(reasons_grid(found.peaks[0]))]
    pieces += ["## Pressure\n", markdown(pressure_grid(answer)), _pressure_line(answer) + "\n"]
    for title, lines in titled_lists(answer):
        pieces.append(f"## {title}\n")
        pieces.append("\n".join(f"- {line}" for line in lines) + "\n")
    return "\n".join(pieces)


def verdict(answer: Budget, at: DetectorBudget, peak: PeakBudget, sampler: Sampler | None = None) -> list[str]:
    """Return the answer in a few sentences: plates recorded of the column's, how sure that is, what to change."""
    extra = answer.in_uL2(peak.variance_extra)
    likely = sampler.of(at, peak) if sampler is not None else None
    interval = figures(_in_uL2(answer, likely.variance_extra)) if likely else ""
    added = _likely(interval) if interval else ""
    on_parts = verdict_on_parts(likely, peak, sampler.draws.count) if likely and sampler else []
    if peak.plates_column is None:
        sigma = math.sqrt(extra)
        return [
            f"Without a column, {_the(at)} records a band of σ = {three(sigma)} µL "
            f"({three(extra)} µL²{f', likely {interval}' if interval else ''}) or {three(peak.sigma)} s"
            f"{f'; {beyond(likely, peak)}' if likely and beyond(likely, peak) else ''}. Compare moments: its width at "
            "half height says little.",
            *on_parts,
        ]
    whose = "column's" if len(peak.columns) == 1 else "columns'"
    kept, remark, own = percent(peak.plates_kept), "", three(answer.in_uL2(peak.variance_column))
    if likely and likely.plates_kept and peak.plates_kept is not None:
        kept += _likely(shares(likely.plates_kept))
        remark = beyond(likely, peak)
    lines = [
        f"{_which(peak)}: {_the(at)} records {plates(peak.plates_observed)} of "
        f"{plates(peak.plates_column)} plates, {kept}.",
        f"The path adds {three(extra)} µL²{added}{f': {remark}' if remark else f' to the {whose} own {own}'}.",
    ]
    others = [
        f"{name_of(found.detector)} {plates(same.plates_observed)} ({percent(same.plates_kept)})"
        for found in answer.detectors
        if found is not at
        for same in found.peaks
        if same.peak is peak.peak
    ]
    return [*lines, *on_parts, *([f"Other detectors, same peak: {', '.join(others)}."] if others else [])]


def _likely(interval: str) -> str:
    return f" (likely {interval})"


def _in_uL2(answer: Budget, interval: tuple[float, float]) -> tuple[float, float]:
    return answer.in_uL2(interval[0]), answer.in_uL2(interval[1])


def _the(at: DetectorBudget) -> str:
    return at.detector.name or f"the {name_of(at.detector)}"


def _which(peak: PeakBudget) -> str:
    k = f"k = {significant(peak.peak.k or 0.0)}"
    return f"At {k}" if peak.peak.name == k else f'"{peak.peak.name}", {k}'


def _conditions(answer: Budget) -> str:
    instrument = answer.instrument
    pieces = [show(instrument.flow, FLOW)]
    if instrument.temperature is not None:
        pieces.append(show(instrument.temperature, TEMPERATURE))
    if instrument.outside is not None:
        pieces.append(f"{show(instrument.outside, TEMPERATURE)} outside")
    return ", ".join(["isocratic", *pieces])


def liquid_line(answer: Budget, peak: PeakBudget) -> str:
    """Return what flows and what of one peak was estimated, each with its doubt; "" where all was entered."""
    instrument, estimated, liquid = answer.instrument, [], ""
    if instrument.mobile_phase and instrument.viscosity is not None:
        shown = show(instrument.viscosity.value, VISCOSITY)
        liquid = f"{instrument.mobile_phase}: {shown} {instrument.viscosity.doubt or 'as entered'}"
    if peak.peak.estimate.doubt:
        estimated.append(f"D {peak.peak.estimate.doubt}")
    if peak.columns_range:
        fewest, most = peak.columns_range
        estimated.append(f"N {plates(fewest)}-{plates(most)}")
    return "; ".join(piece for piece in (liquid, f"estimated: {', '.join(estimated)}" if estimated else "") if piece)


def heading(answer: Budget, sheet: Sheet) -> None:
    """Write title and conditions on one line."""
    conditions = sheet.spelled(_conditions(answer))
    title = sheet.spelled(answer.instrument.title or "Budget")
    room = sheet.width - len(conditions) - 2
    sheet.line(f"{fitted(title, room)}  {conditions}", "bold")


def _peak_line(peak: PeakBudget, doubt: Doubt | None, answer: Budget) -> str:
    points = f", {significant(peak.points)} data points across 4σ" if peak.points is not None else ""
    from_retention = ""
    if peak.peak.retention is not None:
        from_retention = f", from {significant(peak.peak.retention, 4)} s recorded less the transit outside the column"
    k = f", k = {significant(peak.peak.k, 4)}{from_retention}" if peak.peak.k is not None else ""
    return (
        f'Peak "{peak.peak.name}"{k}, D = {significant(peak.peak.diffusion)} m²/s ({peak.peak.estimate.stated}): '
        f"{three(answer.in_uL2(peak.variance_extra))} µL² added, "
        f"{three(answer.in_uL2(peak.variance_total))} µL² in all{points}"
        f"{_over_diffusion(peak, doubt, answer)}{_of_columns(peak)}"
    )


def _over_diffusion(peak: PeakBudget, doubt: Doubt | None, answer: Budget) -> str:
    """Say how far the answer hangs on an estimated diffusion coefficient."""
    if doubt is None:
        return ""
    if doubt.plates:
        ends = f"{plates(doubt.plates[0])} to {plates(doubt.plates[1])} plates recorded"
    else:
        ends = " to ".join(three(answer.in_uL2(end)) for end in doubt.variance) + " µL² in all"
    matters = "it hardly matters" if doubt.spread < HARDLY else "it matters: measure D or look it up"
    return f"; over the ±{100 * peak.peak.estimate.uncertainty:.0f} % of D {ends}, so {matters}"


def _of_columns(peak: PeakBudget) -> str:
    """Say how far the plates of a column may be off, where they come from a reduced plate height curve."""
    if peak.columns_range is None:
        return ""
    fewest, most = peak.columns_range
    return f"; the column's own N, {plates(peak.plates_column)}, is {plates(fewest)} to {plates(most)} in such columns"


def _pressure_line(answer: Budget) -> str:
    limited = [row for row in answer.pressure.rows if row.part.max_pressure is not None]
    checked = ", ".join(
        f"{name_of(row.part)} {bars(row.inlet)} of {show(row.part.max_pressure or 0.0, PRESSURE)}" for row in limited
    )
    text = total_pressure(answer)
    if checked:
        text += f" Inlet against limit: {checked}."
    if answer.unchecked:
        text += f" Limits not checked (none entered): {', '.join(map(name_of, answer.unchecked))}."
    return text


def total_pressure(answer: Budget) -> str:
    """Return the pressure at the pump's side in a sentence."""
    total = answer.pressure.total
    if total is None:
        return "Pressure: not computed (viscosity or a drop is missing)."
    viscosity = answer.instrument.viscosity
    beds = any(bed.porosity_is_assumed for bed in answer.instrument.beds)
    unsure = ["bed porosity"] if beds else []
    unsure += ["viscosity"] if viscosity and not viscosity.entered else []
    ends = f" ({span(total)} over {' and '.join(unsure)})" if span(total) else ""
    return f"Pressure {bars(total)} bar{ends}."


def titled_lists(answer: Budget) -> list[tuple[str, list[str]]]:
    """Return what is listed at the end of a report, each list with its title."""
    found = [
        ("Warnings", list(answer.warnings)),
        ("Assumed", [assumption.text for assumption in answer.instrument.assumed]),
        ("Cautions", list(answer.cautions)),
    ]
    return [(title, lines) for title, lines in found if lines]
