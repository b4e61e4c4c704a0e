"""Pressure along the path: drop and inlet pressure of each part, against the limits entered."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from xcol.flowpath.elements import Bed, Bore
from xcol.flowpath.hydraulics import Drop, exactly, reynolds_number
from xcol.units import PRESSURE, significant, write

if TYPE_CHECKING:
    from xcol.flowpath.model import Instrument, Part

_NOTHING = exactly(0.0)


@dataclass(frozen=True)
class PressureRow:
    """One part: its drop and the pressure at its inlet [Pa]; None where not computed."""

    part: Part
    flow: float
    drop: Drop | None
    inlet: Drop | None
    reynolds: float | None = None  # of a tube, the narrowest of the part


@dataclass(frozen=True)
class Pressures:
    """The pressure profile of the path, and what it says against the limits."""

    rows: tuple[PressureRow, ...]
    warnings: tuple[str, ...]

    @property
    def total(self) -> Drop | None:
        """Pressure at the inlet of the first part [Pa]."""
        return self.rows[0].inlet


def pressures(instrument: Instrument) -> Pressures:
    """Return the pressure profile: a part's inlet carries its own drop and all drops downstream."""
    warnings: list[str] = []
    drops = [_drop(part, instrument) for part in instrument.parts]
    if instrument.pump_pressure is not None:
        drops = _with_pump_pressure(instrument, drops, instrument.pump_pressure, warnings)
    inlet: Drop | None = _NOTHING
    rows: list[PressureRow] = []
    for part, drop in zip(reversed(instrument.parts), reversed(drops), strict=True):
        inlet = None if drop is None or inlet is None else drop + inlet
        rows.append(PressureRow(part, instrument.flow, drop, inlet, _reynolds(part, instrument)))
    rows.reverse()
    for row in rows:
        warnings += _limits(row)
    return Pressures(tuple(rows), tuple(warnings))


def _drop(part: Part, instrument: Instrument) -> Drop | None:
    """Return the measured drop where there is one, otherwise what the elements make of it."""
    if part.drop is not None:
        return exactly(part.drop)
    total: Drop | None = _NOTHING
    for element in part.elements:
        if isinstance(element, Bore | Bed):
            viscosity = instrument.viscosity
            drop = None if viscosity is None else element.drop(instrument.flow, viscosity)
            total = None if drop is None or total is None else total + drop
    return total


def _reynolds(part: Part, instrument: Instrument) -> float | None:
    bores = [element.bore for element in part.elements if isinstance(element, Bore)]
    if not bores or instrument.viscosity is None:
        return None
    return float(reynolds_number(instrument.flow, min(bores), instrument.viscosity, instrument.density))


def _with_pump_pressure(
    instrument: Instrument, drops: list[Drop | None], pump: float, warnings: list[str]
) -> list[Drop | None]:
    """Give the columns what the rest of the path does not explain of the measured pressure."""
    unmeasured = [part.kind == "column" and part.drop is None for part in instrument.parts]
    others = [drop for drop, column in zip(drops, unmeasured, strict=True) if not column]
    shown = write(pump, "bar", PRESSURE)
    if any(drop is None for drop in others):
        warnings.append(f"pump_pressure {shown}: not used, since the tubes' drop is not computed")
        return drops
    explained = sum(drop.value for drop in others if drop is not None)
    rest = pump - explained
    if not any(unmeasured):
        if abs(rest) > 0.1 * pump:
            warnings.append(
                f"pump_pressure {shown} contradicts the drops of the parts, "
                f"{write(explained, 'bar', PRESSURE)} together"
            )
        return drops
    if rest <= 0:
        warnings.append(
            f"pump_pressure {shown} contradicts the drops computed for the parts other than the column, "
            f"{write(explained, 'bar', PRESSURE)}: a bore, the viscosity or the flow is not as entered"
        )
        return drops
    computed = [drop for drop, column in zip(drops, unmeasured, strict=True) if column]
    known = [drop.value for drop in computed if drop is not None]
    if len(known) == len(computed):
        total = sum(known)
        low = sum(drop.low for drop in computed if drop is not None)
        high = sum(drop.high for drop in computed if drop is not None)
        if not low / 1.5 <= rest <= high * 1.5:
            warnings.append(
                f"pump_pressure leaves {write(rest, 'bar', PRESSURE)} for the column, where its bed "
                f"should take {write(low, 'bar', PRESSURE)} to {write(high, 'bar', PRESSURE)}: a "
                "blocked frit, a particle size or a viscosity that is not as entered?"
            )
        shares = [value / total for value in known]
    else:
        shares = [1 / len(computed)] * len(computed)
    given = iter(shares)
    return [
        exactly(rest * next(given)) if column else drop
        for drop, column in zip(drops, unmeasured, strict=True)
    ]


def _limits(row: PressureRow) -> list[str]:
    found = []
    for what, pressure, limit in (
        ("inlet pressure", row.inlet, row.part.max_pressure),
        ("pressure drop", row.drop, row.part.max_drop),
    ):
        if limit is None:
            continue
        shown = write(limit, "bar", PRESSURE)
        if pressure is None:
            found.append(f"{row.part.label}: limit of {shown} not checked, no {what} is computed")
        elif pressure.value > limit:
            found.append(
                f"{row.part.label}: {what} {significant(pressure.value / 1e5)} bar is above its limit "
                f"of {shown}"
            )
        elif pressure.high > limit:
            found.append(
                f"{row.part.label}: {what} {significant(pressure.value / 1e5)} bar, up to "
                f"{significant(pressure.high / 1e5)}, may be above its limit of {shown}"
            )
    return found
