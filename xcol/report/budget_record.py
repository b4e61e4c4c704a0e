"""A budget as the JSON object of the file format, and as CSV rows. Numbers are not rounded."""

from __future__ import annotations

import csv
import io
from typing import TYPE_CHECKING, Any

from xcol import __version__
from xcol.answers.budget import HALF_WIDTH
from xcol.answers.doubt import over_diffusion
from xcol.report.sureness import settle_in_words

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, DetectorBudget, PeakBudget
    from xcol.answers.doubt import Doubt
    from xcol.answers.likely import Likely, Sampler
    from xcol.answers.pressure import PressureRow
    from xcol.answers.rows import Row
    from xcol.flowpath.hydraulics import PressureRange
    from xcol.flowpath.model import Part, Peak

SCHEMA = "xcol.budget/1"


def budget_record(answer: Budget, sampler: Sampler | None = None) -> dict[str, Any]:
    """Return the budget as one JSON object; units stand in the key names. Intervals are null without draws."""
    instrument = answer.instrument
    return {
        "schema": SCHEMA,
        "version": __version__,
        "title": instrument.title,
        "flow_mL_min": instrument.flow * 60e6,
        "mobile_phase": instrument.mobile_phase or None,
        "draws": sampler.draws.count if sampler else None,
        "seed": sampler.draws.seed if sampler else None,
        "assumed": [assumption.text for assumption in instrument.assumed],
        "warnings": list(answer.warnings),
        "cautions": list(answer.cautions),
        "pressure": [_pressure(row) for row in answer.pressure.rows],
        "detectors": [
            _detector(answer, found, doubts, sampler)
            for found, doubts in zip(answer.detectors, over_diffusion(answer), strict=True)
        ],
    }


def budget_csv(answer: Budget, sampler: Sampler | None = None) -> str:
    """Return one line for each contribution to each peak at each detector, as CSV."""
    lines = []
    for detector in budget_record(answer, sampler)["detectors"]:
        for peak in detector["peaks"]:
            parts = peak.pop("parts")
            ahead = {"detector": detector["name"], "peak": peak["name"], "k": peak["k"]}
            ahead |= {key: peak[key] for key in ("diffusion_m2_s", "diffusion_uncertainty")}
            ahead |= {key: peak[key] for key in ("plates_column", "plates_observed", "plates_kept")}
            low, high = peak["interval_plates_kept"] or (None, None)
            ahead |= {"interval_plates_kept_low": low, "interval_plates_kept_high": high}
            lines += [ahead | part for part in parts]
    out = io.StringIO()
    if lines:
        writer = csv.DictWriter(out, fieldnames=list(lines[0]), lineterminator="\n")
        writer.writeheader()
        writer.writerows({key: spreadsheet_cell(value) for key, value in line.items()} for line in lines)
    return out.getvalue()


def spreadsheet_cell(value: Any) -> Any:
    """Keep a spreadsheet from taking a name for a formula."""
    return f"'{value}" if isinstance(value, str) and value[:1] in tuple("=+-@") else value


def _pressure(row: PressureRow) -> dict[str, Any]:
    limit = row.part.max_pressure
    return {
        "part": row.part.kind,
        "name": row.part.name or row.part.kind,
        "position": row.part.position,
        "flow_mL_min": row.flow * 60e6,
        "temperature_degC": row.part.temperature - 273.15 if row.part.temperature is not None else None,
        "viscosity_mPa_s": row.part.viscosity.value * 1e3 if row.part.viscosity else None,
        "drop_bar": _bar(row.drop),
        "inlet_bar": _bar(row.inlet),
        "inlet_low_bar": row.inlet.low / 1e5 if row.inlet else None,
        "inlet_high_bar": row.inlet.high / 1e5 if row.inlet else None,
        "max_pressure_bar": limit / 1e5 if limit is not None else None,
        "reynolds_number": row.reynolds,
        "max_drop_bar": row.part.max_drop / 1e5 if row.part.max_drop is not None else None,
    }


def _bar(drop: PressureRange | None) -> float | None:
    return drop.value / 1e5 if drop is not None else None


def _detector(
    answer: Budget, found: DetectorBudget, doubts: list[Doubt | None], sampler: Sampler | None
) -> dict[str, Any]:
    return {
        "name": found.detector.name or "detector",
        "position": found.detector.position,
        "delay_s": found.delay,
        "peaks": [
            _peak(answer, peak, doubt, sampler.of(found, peak) if sampler else None)
            for peak, doubt in zip(found.peaks, doubts, strict=True)
        ],
    }


def _peak(answer: Budget, peak: PeakBudget, doubt: Doubt | None, likely: Likely | None) -> dict[str, Any]:
    return {
        "name": peak.peak.name,
        "k": peak.peak.k,
        "retention_s": peak.retention,
        "delay_s": peak.delay,
        "diffusion_m2_s": peak.peak.diffusion,
        "diffusion_from": peak.peak.estimate.stated,
        "diffusion_uncertainty": None if peak.peak.estimate.entered else peak.peak.estimate.uncertainty,
        "plates_column": peak.plates_column,
        "plates_column_range": list(peak.columns_range) if peak.columns_range else None,
        "plates_observed": peak.plates_observed,
        "plates_observed_over_diffusion": list(doubt.plates) if doubt and doubt.plates else None,
        "plates_kept": peak.plates_kept,
        "plates_kept_range": list(peak.plates_kept_range) if peak.plates_kept_range else None,
        "resolution_kept": peak.resolution_kept,
        **_intervals(answer, likely),
        "variance_column_uL2": answer.in_uL2(peak.variance_column),
        "variance_extra_uL2": answer.in_uL2(peak.variance_extra),
        "variance_total_uL2": answer.in_uL2(peak.variance_total),
        "variance_total_s2": peak.variance_total,
        "sigma_total_s": peak.sigma,
        "width_half_s": peak.width_half,
        "width_base_s": 4 * peak.sigma,
        "extra_volume_uL": peak.delay * answer.instrument.flow * 1e9,
        "points_4sigma": peak.points,
        "parts": [_row(answer, row, peak.peak) for row in peak.rows],
    }


def _intervals(answer: Budget, likely: Likely | None) -> dict[str, Any]:
    """Return the 90 % intervals, which part leads in what share of the draws, and what moves the answer most."""
    kept = likely.plates_kept if likely else None
    total = likely.variance_total if likely else None
    return {
        "interval_plates_kept": _ends(kept),
        "interval_resolution_kept": _ends(kept, power=0.5),
        "interval_plates_observed": _ends(likely.plates_observed if likely else None),
        "interval_plates_column": _ends(likely.plates_column if likely else None),
        "interval_variance_extra_uL2": _ends(likely.variance_extra if likely else None, answer.in_uL2(1.0)),
        "interval_variance_total_uL2": _ends(total, answer.in_uL2(1.0)),
        "interval_sigma_total_s": _ends(total, power=0.5),
        "interval_width_half_s": _ends(total, HALF_WIDTH, 0.5),
        "leaders": [
            {**_whose(row.part), "contribution": row.contribution, "share_of_draws": share}
            for row, share in (likely.leaders if likely else ())
        ],
        "influences": [
            {
                "what": one.what,
                **_whose(one.part),
                "share_of_scatter": one.share,
                "settle": settle_in_words(one, has_column=likely is not None and likely.plates_kept is not None)
                or None,
            }
            for one in (likely.influences if likely else ())
        ],
    }


def _ends(interval: tuple[float, float] | None, factor: float = 1.0, power: float = 1.0) -> list[float] | None:
    return None if interval is None else [factor * end**power for end in interval]


def _whose(part: Part | None) -> dict[str, Any]:
    if part is None:
        return {"part": None, "name": None, "position": None}
    return {"part": part.kind, "name": part.name or part.kind, "position": part.position}


def _row(answer: Budget, row: Row, peak: Peak) -> dict[str, Any]:
    tube = row.tube
    return {
        "part": row.part.kind,
        "name": row.part.name or row.part.kind,
        "position": row.part.position,
        "contribution": row.contribution,
        "diffusion_m2_s": peak.diffusion_in(row.part),
        "side": row.side,
        "volume_uL": row.volume * 1e9,
        "tstar": tube.t_star if tube else None,
        "bend_De2Sc": tube.strength if tube else None,
        "bent_De": tube.bent_dean if tube else None,  # at the bend entered, or at the one assumed
        "bent_De2Sc": tube.bent_strength if tube else None,
        "variance_straight_uL2": answer.in_uL2(tube.straight_variance) if tube else None,
        "variance_bent_uL2": answer.in_uL2(tube.bent_variance) if tube else None,
        "compression": row.compression,
        "variance_uL2": answer.in_uL2(row.variance),
        "variance_low_uL2": answer.in_uL2(row.low),
        "variance_high_uL2": answer.in_uL2(row.high),
        "low_because": row.at_low,
        "high_because": row.at_high,
        "variance_s2": row.variance,
        "variance_longtube_uL2": answer.in_uL2(tube.longtube_variance) if tube else None,
        "share_extra": row.share_extra,
        "share_total": row.share_total,
        "plates_kept_without": row.plates_kept_without,
    }
