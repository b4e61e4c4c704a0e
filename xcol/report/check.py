"""What was understood of a path file, in metric and inch, with everything assumed."""

from __future__ import annotations

import csv
import io
from typing import TYPE_CHECKING, Any

from xcol import __version__
from xcol.report.budget_text import titled_lists
from xcol.report.labels import show, show_reading
from xcol.report.sheet import Grid, Sheet, markdown
from xcol.units import (
    DENSITY,
    DIFFUSION,
    FLOW,
    LENGTH,
    PRESSURE,
    TEMPERATURE,
    TIME,
    VISCOSITY,
    Quantity,
    significant,
)

if TYPE_CHECKING:
    from xcol.answers.budget import Budget
    from xcol.flowpath.model import Reading

SCHEMA = "xcol.check/1"


def check_text(answer: Budget, sheet: Sheet) -> None:
    """Write the check as text."""
    sheet.line(answer.instrument.title or "Path file", "bold")
    for title, grid in _grids(answer):
        sheet.line()
        sheet.line(title, "bold")
        sheet.grid(grid, indent=2, flexible=grid.headers.index("name") if "name" in grid.headers else 0)
    for title, lines in titled_lists(answer):
        sheet.line()
        sheet.line(title, "bold")
        for line in lines:
            sheet.line(f"- {line}", indent=2, hang=2)


def check_markdown(answer: Budget) -> str:
    """Return the check in Markdown."""
    pieces = [f"# {answer.instrument.title or 'Path file'}\n"]
    for title, grid in _grids(answer):
        pieces += [f"## {title}\n", markdown(grid)]
    for title, lines in titled_lists(answer):
        pieces += [f"## {title}\n", "\n".join(f"- {line}" for line in lines) + "\n"]
    return "\n".join(pieces)


def check_record(answer: Budget) -> dict[str, Any]:
    """Return the check as one JSON object; values in SI units, with the unit beside each."""
    instrument = answer.instrument
    return {
        "schema": SCHEMA,
        "version": __version__,
        "title": instrument.title,
        "flow_mL_min": instrument.flow * 60e6,
        "mobile_phase": instrument.mobile_phase or None,
        "viscosity_from": instrument.viscosity.stated if instrument.viscosity else None,
        "viscosity_mPa_s": _times(instrument.viscosity.value if instrument.viscosity else None, 1e3),
        "density_kg_m3": instrument.density,
        "temperature_degC": None if instrument.temperature is None else instrument.temperature - 273.15,
        "pump_pressure_bar": _times(instrument.pump_pressure, 1e-5),
        "bend_radius_mm": _times(instrument.bend_radius, 1e3),
        "parts": [
            {
                "position": part.position,
                "part": part.kind,
                "name": part.name or part.kind,
                "temperature_degC": None if part.temperature is None else part.temperature - 273.15,
                "viscosity_mPa_s": _times(part.viscosity.value if part.viscosity else None, 1e3),
                "values": [_value(reading) for reading in part.readings],
            }
            for part in instrument.parts
        ],
        "peaks": [
            {
                "name": peak.name,
                "k": peak.k,
                "retention_s": peak.retention,
                "diffusion_m2_s": peak.diffusion,
                "diffusion_from": peak.estimate.stated,
                "plates": peak.plates,
                "plates_column": columns.plates_column,
            }
            for peak, columns in zip(instrument.peaks, answer.detectors[-1].peaks, strict=True)
        ],
        "assumed": [assumption.text for assumption in instrument.assumed],
        "warnings": list(answer.warnings),
    }


def check_csv(answer: Budget) -> str:
    """Return one line for each value of each part, as CSV."""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(("position", "part", "name", "key", "value", "unit", "shown", "inch"))
    for part in check_record(answer)["parts"]:
        for value in part["values"]:
            writer.writerow((part["position"], part["part"], part["name"], *value.values()))
    return out.getvalue()


def _value(reading: Reading) -> dict[str, Any]:
    return {
        "key": reading.key,
        "value": reading.value,
        "unit": reading.quantity.si if reading.quantity else "",
        "shown": show_reading(reading),
        "inch": _inch(reading),
    }


def _grids(answer: Budget) -> list[tuple[str, Grid]]:
    instrument = answer.instrument
    conditions: list[tuple[str, float | None, Quantity]] = [
        ("flow", instrument.flow, FLOW),
        ("viscosity", instrument.viscosity.value if instrument.viscosity else None, VISCOSITY),
        ("density", instrument.density, DENSITY),
        ("temperature", instrument.temperature, TEMPERATURE),
        ("outside the columns", instrument.outside or instrument.temperature, TEMPERATURE),
        ("pump pressure", instrument.pump_pressure, PRESSURE),
        ("bend radius", instrument.bend_radius, LENGTH),
    ]
    flow = tuple(
        (name, show(value, quantity, 4) if value is not None else "not entered") for name, value, quantity in conditions
    )
    flow = (flow[0], ("mobile phase", instrument.mobile_phase or "not entered"), *flow[1:])
    rows: list[tuple[str, ...]] = []
    for part in instrument.parts:
        head = (str(part.position), part.kind, part.name)
        for reading in part.readings:
            rows.append((*head, reading.key, show_reading(reading), _inch(reading)))
            head = ("", "", "")
        if head[0]:
            rows.append((*head, "", "", ""))
    peaks = tuple(
        (
            peak.name,
            significant(peak.k, 4) if peak.k is not None else "-",
            show(peak.retention, TIME, 4) if peak.retention is not None else "-",
            show(peak.diffusion, DIFFUSION),
            peak.estimate.doubt or "as entered",
            significant(columns.plates_column, 3) if columns.plates_column is not None else "-",
        )
        for peak, columns in zip(instrument.peaks, answer.detectors[-1].peaks, strict=True)
    )
    return [
        ("Conditions", Grid(("", "value"), flow, (False, True))),
        (
            "Path, in order of flow",
            Grid(
                ("", "part", "name", "key", "value", "in inch"),
                tuple(rows),
                (True, False, False, False, True, True),
            ),
        ),
        (
            "Peaks",
            Grid(
                ("", "k", "recorded at", "diffusion", "", "column's N"),
                peaks,
                (False, True, True, True, True, True),
            ),
        ),
    ]


def _inch(reading: Reading) -> str:
    if reading.quantity is LENGTH and isinstance(reading.value, float):
        return f"{significant(reading.value / 0.0254)} in"
    return ""


def _times(value: float | None, factor: float) -> float | None:
    return None if value is None else value * factor
