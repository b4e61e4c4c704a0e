"""Pressure along the path: drop and inlet pressure of each part, against the limits entered."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from xcol.flowpath.elements import InBore
from xcol.flowpath.hydraulics import PressureRange, exactly, reynolds_number
from xcol.flowpath.model import beds_of
from xcol.units import PRESSURE, significant, write

if TYPE_CHECKING:
    from xcol.flowpath.model import Instrument, Part

_NOTHING = exactly(0.0)
HIGHEST_USUAL = 2000e5  # Pa


@dataclass(frozen=True)
class PressureRow:
    """One part: its drop and the pressure at its inlet [Pa]; None where not computed."""

    part: Part
    flow: float
    drop: PressureRange | None
    inlet: PressureRange | None
    reynolds: float | None = None  # of a tube, the narrowest of the part


@dataclass(frozen=True)
class Pressures:
    """The pressure profile of the path, and what it says against the limits."""

    rows: tuple[PressureRow, ...]
    limits: tuple[str, ...]  # what is, or may be, above a limit that was entered
    warnings: tuple[str, ...]

    @property
    def total(self) -> PressureRange | None:
        """Pressure at the inlet of the first part [Pa]."""
        return self.rows[0].inlet


def pressures(instrument: Instrument) -> Pressures:
    """Return the pressure profile: a part's inlet carries its own drop and all drops downstream."""
    warnings: list[str] = []
    drops = [_drop(part, instrument) for part in instrument.parts]
    if instrument.pump_pressure is not None:
        drops = _with_pump_pressure(instrument, drops, instrument.pump_pressure, warnings)
    inlet: PressureRange | None = _NOTHING
    rows: list[PressureRow] = []
    for part, drop in zip(reversed(instrument.parts), reversed(drops), strict=True):
        inlet = None if drop is None or inlet is None else drop + inlet
        rows.append(PressureRow(part, instrument.flow, drop, inlet, _reynolds(part, instrument)))
    rows.reverse()
    if rows[0].inlet is None and instrument.pump_pressure is not None:
        rows = _down_from_pump(rows, instrument.pump_pressure)
    limits = [text for row in rows for text in _limits(row)]
    if any(row.inlet is None and row.part.max_pressure is not None for row in rows):
        warnings.append("pressure limits are not checked where no inlet pressure is computed")
    if rows[0].inlet is not None and rows[0].inlet.value > HIGHEST_USUAL:
        warnings.append(
            f"{significant(rows[0].inlet.value / 1e5)} bar is more than any pump of the trade gives: a bore, a "
            "length, the viscosity or the flow is not as entered?"
        )
    return Pressures(tuple(rows), tuple(limits), tuple(warnings))


def _down_from_pump(rows: list[PressureRow], pump: float) -> list[PressureRow]:
    """Fill in inlet pressures from the pump on, as far as the drops are known."""
    filled = []
    inlet: PressureRange | None = exactly(pump)
    for row in rows:
        filled.append(replace(row, inlet=inlet or row.inlet))
        inlet = exactly(inlet.value - row.drop.value) if inlet and row.drop else None
    return filled


def _drop(part: Part, instrument: Instrument) -> PressureRange | None:
    """Return the measured drop where there is one, otherwise what the elements make of it."""
    if part.drop is not None:
        return exactly(part.drop)
    total: PressureRange | None = _NOTHING
    for element in part.elements:
        drop = element.drop(instrument.flow, part.viscosity.value if part.viscosity else None)
        total = None if drop is None or total is None else total + drop
    return total.widened(part.viscosity.uncertainty) if total and part.viscosity else total


def _reynolds(part: Part, instrument: Instrument) -> float | None:
    bores = [float(element.bore) for element in part.elements if isinstance(element, InBore)]
    if not bores or part.viscosity is None:
        return None
    return float(reynolds_number(instrument.flow, min(bores), part.viscosity.value, instrument.density))


def _with_pump_pressure(
    instrument: Instrument, drops: list[PressureRange | None], pump: float, warnings: list[str]
) -> list[PressureRange | None]:
    """Give the columns what the rest of the path does not explain of the measured pressure."""
    shown = write(pump, "bar", PRESSURE)
    unmeasured = [i for i, part in enumerate(instrument.parts) if part.kind == "column" and part.drop is None]
    others = [drop for i, drop in enumerate(drops) if i not in unmeasured]
    if any(drop is None for drop in others):
        warnings.append(f"pump_pressure {shown}: not shared out, since the tubes' drop is not computed")
        return drops
    unknown = [i for i in unmeasured if drops[i] is None]
    explained = _sum(others)
    if unknown:  # columns with a computed drop keep it
        explained += _sum([drops[i] for i in unmeasured])
    rest = pump - explained
    if not unmeasured:
        if abs(rest) > 0.1 * pump:
            warnings.append(
                f"pump_pressure {shown} contradicts the drops of the parts, "
                f"{write(explained, 'bar', PRESSURE)} together"
            )
        return drops
    if rest <= 0:
        warnings.append(
            f"pump_pressure {shown} contradicts the drops computed for the rest of the path, "
            f"{write(explained, 'bar', PRESSURE)}: a bore, the viscosity or the flow is not as entered"
        )
        return drops
    if len(unknown) > 1:
        warnings.append(
            "columns without a particle size share what is left of pump_pressure as length over bore squared"
        )
    if not unknown:
        _compare_with_beds(rest, [drop for i in unmeasured if (drop := drops[i])], warnings)
    taking = unknown or unmeasured
    weights = {i: _weight(instrument.parts[i], None if unknown else drops[i]) for i in taking}
    total = sum(weights.values())
    shared = {i: rest * weight / total for i, weight in weights.items()}
    shared |= {i: drop.value for i in unmeasured if i not in weights and (drop := drops[i])}
    return [exactly(shared[i]) if i in shared else drop for i, drop in enumerate(drops)]


def _sum(drops: list[PressureRange | None]) -> float:
    return sum(drop.value for drop in drops if drop is not None)


def _weight(part: Part, drop: PressureRange | None) -> float:
    """Return a column's weight in sharing a drop: its computed one, or length over bore squared."""
    if drop is not None:
        return drop.value
    return sum(bed.length / bed.bore**2 for bed in beds_of([part]))


def _compare_with_beds(rest: float, beds: list[PressureRange], warnings: list[str]) -> None:
    low, high = sum(bed.low for bed in beds), sum(bed.high for bed in beds)
    if not low / 1.5 <= rest <= high * 1.5:
        warnings.append(
            f"pump_pressure leaves {write(rest, 'bar', PRESSURE)} for the column bed, which should take "
            f"{write(low, 'bar', PRESSURE)} to {write(high, 'bar', PRESSURE)}: a blocked frit, or a particle "
            "size or viscosity that is not as entered?"
        )


def _limits(row: PressureRow) -> list[str]:
    found = []
    for what, pressure, limit in (
        ("inlet pressure", row.inlet, row.part.max_pressure),
        ("pressure drop", row.drop, row.part.max_drop),
    ):
        if limit is None or pressure is None:
            continue
        shown = write(limit, "bar", PRESSURE)
        if pressure.value > limit:
            found.append(
                f"{row.part.label}: {what} {significant(pressure.value / 1e5)} bar is above its limit of {shown}"
            )
        elif pressure.high > limit:
            found.append(
                f"{row.part.label}: {what} {significant(pressure.value / 1e5)} bar, up to "
                f"{significant(pressure.high / 1e5)}, may be above its limit of {shown}"
            )
    return found
