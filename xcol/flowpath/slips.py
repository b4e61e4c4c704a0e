"""Slips: what reads well and is probably not meant.

What is certainly wrong is a fault, what is only odd a warning.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterable
from dataclasses import replace
from typing import TYPE_CHECKING

from xcol.catalog_kinds import MATERIALS, SOLVENTS, TUBING
from xcol.flowpath.elements import Cell, InBore
from xcol.flowpath.hydraulics import LAMINAR_LIMIT, reynolds_number
from xcol.flowpath.model import beds_of
from xcol.flowpath.shorthand import loop_of
from xcol.units import FLOW, LENGTH, PRESSURE, TEMPERATURE, VISCOSITY, VOLUME, significant, write

if TYPE_CHECKING:
    from xcol.catalogs import Catalogs
    from xcol.errors import Place
    from xcol.flowpath.conditions import Conditions
    from xcol.flowpath.findings import Draft, Findings
    from xcol.flowpath.model import Instrument, Part, Peak
    from xcol.liquids.estimate import Estimate
    from xcol.liquids.mobile_phase import MobilePhase

_OUTSIDE_DIAMETERS = {"1/32 in": 0.0254 / 32, "1/16 in": 0.0254 / 16, "1/8 in": 0.0254 / 8}
_COLUMN_RADII = {1.05e-3: 2.1e-3, 1.6e-3: 3.2e-3, 2.3e-3: 4.6e-3}

WIDEST_USUAL_BORE = 1.2e-3
FASTEST, SLOWEST = 0.3, 2e-6  # m/s of the mobile phase in a column: beyond is certainly wrong
FAST, SLOW = 0.03, 1e-5  # beyond is odd


def of_part(draft: Draft) -> None:
    """Look for slips in one part, once its values have been read."""
    if check := _CHECKS.get(draft.kind):
        check(draft)
    for key in ("max_pressure", "max_drop"):
        limit = draft.number(key)
        if limit is not None and not 0.5e5 <= limit <= 2000e5:
            draft.warn(f"{key} of {write(limit, 'bar', PRESSURE)} is unusual: is the unit meant?")


def of_path(instrument: Instrument, flow_place: Place, findings: Findings) -> None:
    """Look for slips between parts."""
    flow_in_columns(instrument.flow, instrument.parts, flow_place, findings)
    _injection_and_columns(instrument, findings)
    _cells_and_columns(instrument, findings)
    _blocks(instrument, findings)
    _order(instrument, findings)
    if instrument.viscosity is None:
        findings.warn(
            "no viscosity entered: pressures, Reynolds numbers and bends are not computed (tubes count as straight, "
            "in the intervals, too)"
        )
    else:
        _viscosity(instrument, instrument.viscosity, findings)


def of_temperatures(conditions: Conditions, parts: Iterable[Part], findings: Findings) -> None:
    """Warn of temperatures that one figure of the report cannot stand for."""
    columns = {part.temperature or conditions.temperature for part in parts if part.kind == "column"}
    if len(columns) > 1 and None not in columns:
        shown = write(conditions.reference, "degC", TEMPERATURE, 4)
        findings.warn(f"the columns have different temperatures: viscosity and D are stated for {shown}")
    if conditions.entered is not None and conditions.ambient not in (None, conditions.temperature):
        findings.warn(
            "the viscosity that was entered is taken at ambient as well: leave it out beside mobile_phase, and it is "
            "computed for each temperature"
        )


def of_materials(parts: Iterable[Part], phase: MobilePhase, catalogs: Catalogs, findings: Findings) -> None:
    """Warn of a tube whose material is usually kept away from one of the liquids."""
    for part in parts:
        named = next((reading.value for reading in part.readings if reading.key == "material"), None)
        material = catalogs.find(MATERIALS, named) if isinstance(named, str) else None
        away = (
            {found.name for word in material.avoid if (found := catalogs.find(SOLVENTS, word))} if material else set()
        )
        met = [c.solvent.name for c in phase.components if c.solvent.name in away]
        if material and met:
            findings.warn(
                f"{part.label}: {material.name} is usually kept away from {' and '.join(met)}: check with its maker"
            )


def of_scaled_plates(instrument: Instrument, peaks: Iterable[Peak], findings: Findings) -> None:
    """Report plates that, scaled from the flow at which they hold, are more than a column can have."""
    for part in instrument.parts:
        for bed in beds_of([part]):
            if bed.plates is None or bed.plates_at is None or not bed.particle:
                continue
            most, place = bed.length / bed.particle, replace(part.place, key="plates_at")
            held = write(bed.plates_at, "mL/min", FLOW)
            here = write(instrument.flow, "mL/min", FLOW)
            streams = (instrument.stream(part, peak.diffusion_in(part)) for peak in peaks)
            plates = max((float(bed.plates_for(stream)) for stream in streams), default=0.0)
            if plates > most:
                findings.fault(
                    place,
                    f"{bed.plates:g} plates at {held}, which are {plates:.0f} at {here}",
                    f"at most {most:.0f} plates here, length over particle diameter (h = 1)",
                    "check plates_at and its unit",
                )
            elif not 0.05 <= bed.plates_at / instrument.flow <= 20:
                findings.warn(f"{part.label}: plates hold at {held}, and the flow is {here}: is the unit meant?")


def flow_in_columns(flow: float, parts: Iterable[Part], place: Place, findings: Findings) -> None:
    """Report a flow that is certainly wrong for a column, and warn of one that is odd."""
    for bed in beds_of(parts):
        velocity = bed.length * flow / float(bed.void_volume)
        shown = f"{significant(velocity * 1e3)} mm/s in the {bed.bore * 1e3:g} mm column"
        if not SLOWEST <= velocity <= FASTEST:
            fast = velocity > FASTEST
            options = []
            factor, unit = (1e-3, "uL/min") if fast else (1e3, "mL/min")
            if SLOW <= velocity * factor <= FAST:
                options.append(f'flow = "{write(flow * factor, unit, FLOW)}"')
            if not fast and SLOW <= velocity * 1e6 <= FAST:
                options.append(f"a column bore of {write(bed.bore * 1e-3, 'um', LENGTH)}")
            findings.fault(
                place,
                f"{write(flow, 'mL/min', FLOW)}, which is {shown}",
                "a flow that gives 0.01 to 30 mm/s in the column",
                " or ".join(options) or "check flow and column bore",
            )
        elif not SLOW <= velocity <= FAST:
            findings.warn(f"flow {write(flow, 'mL/min', FLOW)} is {shown}, which is unusual: mL/min or uL/min?")


def plates_fault(draft: Draft, key: str, plates: float, length: float, particle: float) -> bool:
    """Report a plate number above length over particle diameter (h < 1); return whether it is."""
    most = length / particle
    if plates <= most:
        return False
    total = plates * length
    draft.fault(
        key,
        f"at most {most:.0f} plates, length over particle diameter (h = 1)",
        f"plates = {total:.0f}, if {plates:.0f} was per metre" if total <= most else "check N",
        f"{plates:.0f} plates in {write(length, 'mm', LENGTH)} of {write(particle, 'um', LENGTH)}",
    )
    return True


def _inject(draft: Draft) -> None:
    volume, (loop, bore) = draft.number("volume"), loop_of(draft)
    if volume is not None and loop is not None and volume > loop * (1 + 1e-9):
        draft.fault(
            "loop",
            "a loop that holds at least what is injected",
            "inject no more than the loop, or correct the loop",
            f"{write(volume, 'uL', VOLUME)} injected from a loop of {write(loop, 'uL', VOLUME)}",
        )
    _odd_volume(draft, volume, 1e-6)
    if loop is not None and bore is not None:
        length = loop / (math.pi / 4 * bore**2)
        if not max(5e-3, 5 * bore) <= length <= 10:
            draft.warn(f"a loop of this volume and bore is {write(length, 'mm', LENGTH)} long: is the bore meant?")


def _tube(draft: Draft) -> None:
    bore, length, volume = draft.number("bore"), draft.number("length"), draft.number("volume")
    if bore is None:
        return
    if length is None and volume is not None:
        length = volume / (math.pi / 4 * bore**2)
    shown = f"bore {write(bore, 'mm', LENGTH)} ({write(bore, 'in', LENGTH)})"
    outside = next((name for name, d in _OUTSIDE_DIAMETERS.items() if math.isclose(bore, d, rel_tol=0.012)), "")
    millimetres = bore * 1e3
    if outside:
        draft.warn(f"{shown} is the outside diameter of {outside} tubing: is the bore meant?")
    elif bore > WIDEST_USUAL_BORE:
        draft.warn(f"{shown} is wide for a connecting tube: o.d. for bore, or another unit?")
    elif _says_millimetres(draft) and any(
        row.reel_inches and math.isclose(millimetres, row.reel_inches, rel_tol=1e-6)
        for row in draft.catalogs.rows(TUBING)
    ):
        draft.warn(f"{shown}: reels show this number in inches; did you mean {millimetres:g} in?")
    else:
        stock = sorted(row.bore for row in draft.catalogs.rows(TUBING))
        if not any(math.isclose(bore, known, rel_tol=0.06) for known in stock):
            for known in stock:
                if math.isclose(2 * bore, known, rel_tol=0.06):
                    draft.warn(f"{shown} is half of the stock bore {write(known, 'mm', LENGTH)}: "
                               "is it a radius?")  # fmt: skip
    radius = draft.number("bend_radius") or (draft.number("coil_diameter") or 0.0) / 2
    if radius and not 5e-3 <= radius <= 1:
        draft.warn(f"a bend of radius {write(radius, 'mm', LENGTH)} is unusual: is the unit meant?")
    if length is not None and length > 10:
        draft.warn(f"length {write(length, 'm', LENGTH)} is long for a connecting tube")
    if length is not None and 0 < length < 5 * bore:
        draft.warn(f"length {write(length, 'mm', LENGTH)} is less than 5 bores: no tube formula holds")


def _says_millimetres(draft: Draft) -> bool:
    """Whether the bore was typed in mm: nobody takes 20 um for 0.020 in."""
    typed = draft.written.get("bore") or draft.written.get("tube", "")
    return "um" not in typed and "µ" not in typed and "μ" not in typed


def _fitting(draft: Draft) -> None:
    _odd_volume(draft, draft.number("volume"), 2e-8)


def _column(draft: Draft) -> None:
    bore, length = draft.number("bore"), draft.number("length")
    if bore is None or length is None:
        return
    plates, particle = draft.number("plates"), draft.number("particle")
    if plates is not None and particle is not None:
        if plates_fault(draft, "plates", plates, length, particle):
            return
        reduced = length / plates / particle
        if reduced < 1.4:
            draft.warn(f"a reduced plate height of {significant(reduced)} is better than the best columns': per metre?")
        if reduced > 50:
            draft.warn(f"{plates:g} plates are few: a reduced plate height of {significant(reduced)}")
    elif plates is not None and plates / length > 6e5:
        draft.warn(f"{plates:g} plates in {write(length, 'mm', LENGTH)}: are they per metre?")
    if particle is not None and particle > 60e-6:
        draft.warn(f"particle diameter {write(particle, 'um', LENGTH)} is unusual: um or nm?")
    for radius, known in _COLUMN_RADII.items():
        if math.isclose(bore, radius, rel_tol=0.01):
            draft.warn(f"bore {write(bore, 'mm', LENGTH)} is half of {write(known, 'mm', LENGTH)}: "
                       "is it a radius?")  # fmt: skip
    _porosities(draft, bore, length)


def _porosities(draft: Draft, bore: float, length: float) -> None:
    usual = draft.catalogs.usual_packing()
    low, high = usual.interstitial_range
    total, void = draft.number("total_porosity"), draft.number("void_volume")
    if void is not None:
        empty = math.pi / 4 * bore**2 * length
        total = void / empty
        if not 0.2 <= total < 1:
            draft.fault(
                "void_volume",
                f"0.2 to 1 times the empty column, {write(empty, 'uL', VOLUME)}",
                f"near {write(usual.total_porosity * empty, 'uL', VOLUME)}, the usual {usual.total_porosity:g} of it",
            )
            return
    if total is not None and total < 0.48:
        draft.warn(
            f"total porosity {total:.2g} is low: is the interstitial one ({low:g} to {high:g}) meant? "
            "The total one is 0.5 (core-shell) to 0.85 (size exclusion)"
        )
    if total is not None and total > 0.9:
        draft.warn(f"total porosity {total:.2g} is high: 0.5 to 0.85 is usual")
    bed = draft.number("interstitial_porosity")
    if bed is not None and not 0.33 <= bed <= 0.45:
        draft.warn(f"interstitial porosity {bed:g} is unusual: {low:g} to {high:g} is usual")
    if bed is not None and total is not None and bed >= total:
        draft.fault(
            "interstitial_porosity",
            f"less than the total porosity, {total:.3g}: the space between particles is part of it",
            "leave it out: a usual one is assumed",
        )


def _block(draft: Draft) -> None:
    variance = draft.number("variance")
    if variance is not None and variance > 1e-14:
        draft.warn("a variance above 10000 µL² is unusual: is the unit meant?")


def _detector(draft: Draft) -> None:
    cell, path = draft.number("cell"), draft.number("path_length")
    if cell and path:
        bore = math.sqrt(4 * cell / (math.pi * path))
        shown = f"{write(cell, 'uL', VOLUME)} over {write(path, 'mm', LENGTH)} is a bore of "
        shown += write(bore, "mm", LENGTH)
        if not 0.01e-3 <= bore <= 20e-3:
            draft.fault(
                "path_length",
                "a cell bore of 0.01 to 20 mm from cell and path_length",
                "check the units: uL and mm are usual",
                shown,
            )
        elif not 0.1e-3 <= bore <= 3e-3:
            draft.warn(f"{shown}, which is unusual: is the cell volume or the path length off?")
    _odd_volume(draft, cell, 1e-7)
    if cell is not None and not {"time_constant", "rise_time", "response", "filters"} & set(draft.written):
        draft.warn("no filter setting (time_constant, rise_time or response): its filter is not counted")
    for one in (draft, *draft.lists.get("filters", ())):
        for key in ("time_constant", "rise_time", "response", "dwell"):
            seconds = one.number(key)
            if seconds is not None and seconds > 5:
                one.warn(f"{key} of {seconds:g} s is unusual: is the unit meant?")


def _odd_volume(draft: Draft, volume: float | None, most: float) -> None:
    if volume is not None and volume > most:
        draft.warn(f"a volume of {write(volume, 'uL', VOLUME)} is unusual here: is the unit meant?")


_CHECKS: dict[str, Callable[[Draft], None]] = {
    "inject": _inject,
    "tube": _tube,
    "fitting": _fitting,
    "column": _column,
    "block": _block,
    "detector": _detector,
}


def _injection_and_columns(instrument: Instrument, findings: Findings) -> None:
    injected = float(instrument.parts[instrument.injection - 1].elements[0].volume)
    void = sum(float(bed.void_volume) for bed in instrument.beds)
    if void and injected > void:
        findings.warn(
            f"{write(injected, 'uL', VOLUME)} injected is more than the column's void volume, "
            f"{write(void, 'uL', VOLUME)}: is the unit meant?"
        )


def _cells_and_columns(instrument: Instrument, findings: Findings) -> None:
    void = sum(float(bed.void_volume) for bed in instrument.beds)
    for part in instrument.detectors:
        for cell in part.elements:
            if isinstance(cell, Cell) and void and cell.volume > 0.3 * void:
                size = write(float(cell.volume), "uL", VOLUME)
                findings.warn(
                    f"{part.label}: a cell of {size} is large for a column with a void volume of "
                    f"{write(void, 'uL', VOLUME)}: is the unit meant?"
                )


def _blocks(instrument: Instrument, findings: Findings) -> None:
    for part in instrument.parts:
        for reading in part.readings:
            if reading.key == "at_flow" and isinstance(reading.value, float):
                ratio = reading.value / instrument.flow
                if not 0.5 <= ratio <= 2:
                    findings.warn(
                        f"{part.label}: measured at {write(reading.value, 'mL/min', FLOW)}, and the flow is "
                        f"{write(instrument.flow, 'mL/min', FLOW)}: its variance may be another one here"
                    )


def _order(instrument: Instrument, findings: Findings) -> None:
    first, last = instrument.injection, instrument.detectors[-1].position
    for part in instrument.parts:
        if part.position < first:
            findings.warn(f"{part.label} stands before the injection: the band never meets it")
        elif part.position > last and part.kind != "outlet":
            findings.warn(
                f"{part.label} stands behind the last detector: it broadens nothing that is recorded; "
                "its pressure drop loads what is upstream"
            )
        if part.kind == "outlet" and part.position < len(instrument.parts):
            findings.warn(f"{part.label} is not the end of the path: other parts follow it")


def _viscosity(instrument: Instrument, viscosity: Estimate, findings: Findings) -> None:
    if viscosity.entered and not 1.5e-4 <= viscosity.value <= 5e-3:
        shown = write(viscosity.value, "mPa s", VISCOSITY)
        findings.warn(f"a viscosity of {shown} is unusual: 0.2 to 3 mPa s is usual; Pa s or mPa s?")
    for part in instrument.parts:
        here = part.viscosity.value if part.viscosity else viscosity.value
        for bore in (element.bore for element in part.elements if isinstance(element, InBore)):
            number = float(reynolds_number(instrument.flow, bore, here, instrument.density))
            if number > LAMINAR_LIMIT:
                findings.warn(
                    f"{part.label}: Reynolds number {number:.0f} is above {LAMINAR_LIMIT:.0f}: the flow is not "
                    "laminar, and neither its variance nor its pressure drop can be trusted"
                )
