"""The described instrument: what a path file says, in SI units, with what was assumed."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from xcol.flowpath.bed import Bed
from xcol.flowpath.elements import Stream

if TYPE_CHECKING:
    from collections.abc import Iterable

    from xcol.errors import Place
    from xcol.filters.interface import Real
    from xcol.flowpath.elements import Element
    from xcol.liquids.estimate import Estimate
    from xcol.units import Quantity


@dataclass(frozen=True)
class Reading:
    """One value as it was understood: SI float with its quantity, a plain number, or text."""

    key: str
    value: float | str | bool
    quantity: Quantity | None = None


@dataclass(frozen=True)
class Assumption:
    """Something that the file does not say: ``short`` for a line of several, ``text`` in full.

    ``leads``: it stands for a number that was estimated, and is named before what is only simplified.
    """

    short: str
    text: str
    leads: bool = False


@dataclass(frozen=True)
class Part:
    """One part of the path; pressures [Pa]; ``drop`` is a measured one."""

    kind: str
    name: str
    position: int  # 1-based, in the file
    place: Place
    elements: tuple[Element, ...]
    readings: tuple[Reading, ...] = ()
    drop: float | None = None
    max_pressure: float | None = None
    max_drop: float | None = None
    temperature: float | None = None  # K; None where nobody entered any
    viscosity: Estimate | None = None  # Pa s, of what flows at this temperature
    mobility: float = 1.0  # T/η here over T/η at the columns: what an estimated D changes by

    def diffusion_of(self, estimate: Estimate) -> float:
        """Return a diffusion coefficient [m²/s] at this part's temperature; an entered one is the same everywhere."""
        return estimate.value if estimate.entered else estimate.value * self.mobility

    @property
    def label(self) -> str:
        """Name for messages: 'tube "valve to column"', or 'tube (part 2)' without a name."""
        return f'{self.kind} "{self.name}"' if self.name else f"{self.kind} (part {self.position})"


@dataclass(frozen=True)
class Peak:
    """One peak: retention factor ``k`` at elution (None where the path has no column)."""

    name: str
    k: float | None
    estimate: Estimate  # of the diffusion coefficient [m²/s] at the columns' temperature
    place: Place
    plates: float | None = None
    retention: float | None = None  # s, as recorded at the first detector, where the file gives it

    @property
    def diffusion(self) -> float:
        """Diffusion coefficient [m²/s] at the columns' temperature."""
        return self.estimate.value

    def diffusion_in(self, part: Part) -> float:
        """Diffusion coefficient [m²/s] at a part's temperature."""
        return part.diffusion_of(self.estimate)


@dataclass(frozen=True)
class Instrument:
    """A flow path with what flows through it; everything in SI units."""

    title: str
    flow: float  # m³/s
    mobile_phase: str  # as read, "" where none was entered
    viscosity: Estimate | None  # Pa s, at the columns' temperature
    density: float  # kg/m³
    temperature: float | None  # K, of the columns
    pump_pressure: float | None  # Pa
    bend_radius: float | None  # m, of the tubes and loops that give none
    parts: tuple[Part, ...]
    peaks: tuple[Peak, ...]
    place: Place
    files: tuple[str, ...] = ()  # that it was read from: the path file and the catalogs that it names
    assumed: tuple[Assumption, ...] = ()
    warnings: tuple[str, ...] = ()

    @property
    def detectors(self) -> tuple[Part, ...]:
        """The detectors, in the order of flow."""
        return tuple(part for part in self.parts if part.kind == "detector")

    @property
    def injection(self) -> int:
        """Position of the injection."""
        return next(part.position for part in self.parts if part.kind == "inject")

    def stream(self, part: Part, diffusion: Real) -> Stream:
        """Return what flows through a part, with a solute of this diffusion coefficient [m²/s] there."""
        return Stream(self.flow, diffusion, part.viscosity.value if part.viscosity else None, self.density)

    @property
    def outside(self) -> float | None:
        """The one temperature [K] of all parts but the columns, None where it is the columns' own or not one."""
        found = {part.temperature for part in self.parts if part.kind != "column"} - {self.temperature}
        return found.pop() if len(found) == 1 and self.temperature is not None else None

    @property
    def beds(self) -> list[Bed]:
        """The beds of all columns, in the order of flow."""
        return beds_of(self.parts)


def beds_of(parts: Iterable[Part]) -> list[Bed]:
    """Return the beds of the columns among these parts, in their order."""
    return [element for part in parts for element in part.elements if isinstance(element, Bed)]
