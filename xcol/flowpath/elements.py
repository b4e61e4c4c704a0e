"""What a part consists of, as the band meets it: sizes only, no flow and no solute yet.

A part is one element or a few (a detector: cell, filter, data rate). Each makes its linear filter
for a given stream; tubes and columns have a pressure drop as well.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING, Protocol

from xcol.filters.block import MeasuredBlock
from xcol.filters.column import Column, PlateHeightCurve, reduced_velocity
from xcol.filters.tube import Tube
from xcol.filters.volumes import Plug, TanksInSeries
from xcol.flowpath.hydraulics import PressureRange, bed_drop, exactly, tube_drop

if TYPE_CHECKING:
    from xcol.filters.interface import Filter, Real


@dataclass(frozen=True)
class Stream:
    """What flows through an element: ``flow`` [m³/s] and the solute's ``diffusion`` [m²/s]."""

    flow: Real
    diffusion: Real


class Element(Protocol):
    """One thing that delays or broadens the band; ``contribution`` is its name in the report."""

    @property
    def contribution(self) -> str:
        """Name of the contribution in the report, 'cell' for instance."""
        ...

    @property
    def volume(self) -> float:
        """Swept volume [m³]."""
        ...

    @property
    def of_signal(self) -> bool:
        """Whether it acts on the recorded signal of its own detector only, not on the stream."""
        ...

    @property
    def remixes(self) -> bool:
        """Whether the stream leaves it mixed across the bore, so that a run of tubes ends in it."""
        ...

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the filter it is for this stream; ``read_here`` in the detector that records."""
        ...

    def drop(self, flow: float, viscosity: float | None) -> PressureRange | None:
        """Pressure drop [Pa] at this flow [m³/s] and viscosity [Pa s]; None: cannot be computed."""
        ...


class WithoutDrop:
    """What has no pressure drop unless one is entered for its part."""

    def drop(self, flow: float, viscosity: float | None) -> PressureRange | None:
        """Return no drop."""
        return exactly(0.0)


class MixingVolume(WithoutDrop):
    """A volume in which the stream is mixed anew; what holds none mixes nothing."""

    volume: float

    @property
    def remixes(self) -> bool:
        """Whether there is any volume to mix the stream in."""
        return self.volume > 0


@dataclass(frozen=True)
class Injected(MixingVolume):
    """The injected ``volume`` [m³], as a plug."""

    volume: float
    contribution: str = "injection"
    of_signal: bool = False

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the plug."""
        return Plug(self.volume, stream.flow)


@dataclass(frozen=True)
class Bore:
    """A straight tube or bore, ``length`` and ``bore`` [m].

    ``layered``: its stream runs on into a neighbouring tube; otherwise it is remixed at both ends.
    """

    length: float
    bore: float
    layered: bool = True
    contribution: str = "tube"
    of_signal: bool = False

    @property
    def volume(self) -> float:
        """Volume [m³]."""
        return math.pi / 4 * self.bore**2 * self.length

    @property
    def remixes(self) -> bool:
        """Whether it is remixed at its ends (and has a length at all)."""
        return not self.layered and self.length > 0

    def filter(self, stream: Stream, *, read_here: bool) -> Tube:
        """Return the tube."""
        return Tube(self.length, self.bore, stream.flow, stream.diffusion)

    def drop(self, flow: float, viscosity: float | None) -> PressureRange | None:
        """Pressure drop [Pa]; None without a viscosity."""
        if viscosity is None:
            return None
        return exactly(float(tube_drop(flow, self.length, self.bore, viscosity)))


@dataclass(frozen=True)
class Mixed(MixingVolume):
    """A mixing ``volume`` [m³] of this many ``tanks`` in series: a fitting, a mixer."""

    volume: float
    tanks: float
    contribution: str
    of_signal: bool = False

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the tanks."""
        return TanksInSeries(self.volume, stream.flow, self.tanks)


@dataclass(frozen=True)
class Cell(MixingVolume):
    """A detector cell of this ``volume`` [m³]: a plug, or ``tanks`` in series where given."""

    volume: float
    tanks: float | None = None
    contribution: str = "cell"
    of_signal: bool = False

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the plug (its whole volume is passed on the way to a later detector) or tanks."""
        if self.tanks is not None:
            return TanksInSeries(self.volume, stream.flow, self.tanks)
        return Plug(self.volume, stream.flow, passed_through=not read_here)


@dataclass(frozen=True)
class Electronics(WithoutDrop):
    """A filter of the recorded signal: ``made`` needs no stream.

    ``period`` [s] is the time between data points, of the element that averages between them.
    """

    made: Filter
    contribution: str
    period: float | None = None
    volume: float = 0.0
    of_signal: bool = True

    @property
    def remixes(self) -> bool:
        """Never: the stream does not meet it."""
        return False

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the filter."""
        return self.made


@dataclass(frozen=True)
class Block(WithoutDrop):
    """A module of variance ``measured`` [m⁶] and held ``volume`` [m³]."""

    measured: float
    volume: float
    contribution: str = "block"
    of_signal: bool = False

    @property
    def remixes(self) -> bool:
        """Whether it spreads anything: then its inside is taken to mix the stream."""
        return self.measured > 0

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the block."""
        return MeasuredBlock(self.measured, self.volume, stream.flow)


@dataclass(frozen=True)
class Curves:
    """The reduced plate height curve of a packing, with the best and the worst that is usual (None: not known)."""

    usual: PlateHeightCurve
    ends: tuple[PlateHeightCurve, PlateHeightCurve] | None = None


@dataclass(frozen=True)
class Bed:
    """A column: ``bore``, ``length``, ``particle`` diameter [m], ``void_volume`` [m³], plates.

    ``porosity`` is the interstitial one for the pressure drop, with its range; ``particle`` None
    where it was not entered. ``plates`` hold at the flow ``plates_at`` [m³/s] (None: at any), and are
    None where they come from the ``curve``.
    """

    bore: float
    length: float
    particle: float | None
    plates: float | None
    void_volume: float
    porosity: tuple[float, float, float]  # value, smallest, largest
    plates_at: float | None = None
    curve: Curves | None = None  # needs the particle
    porosity_from: str = ""  # source of an assumed interstitial porosity
    contribution: str = "column"
    of_signal: bool = False

    @property
    def porosity_is_assumed(self) -> bool:
        """Whether the interstitial porosity is a usual one, not one that was entered."""
        return self.porosity[1] < self.porosity[2]

    @property
    def volume(self) -> float:
        """Void volume [m³]."""
        return self.void_volume

    @property
    def remixes(self) -> bool:
        """Always: a bed mixes the stream."""
        return True

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the column for an unretained band; ``retained`` gives it for the others."""
        return self.retained(stream, 0.0)

    def retained(self, stream: Stream, retention_factor: Real) -> Column:
        """Return the column's filter for a band of this retention factor."""
        return Column(self.void_volume / stream.flow, retention_factor, self.plates_for(stream))

    def plates_for(self, stream: Stream) -> Real:
        """Plate number [-] for this flow and solute: entered, scaled with the curve, or from it alone."""
        if self.curve is None:
            return self.plates if self.plates is not None else 1.0
        usual = self._from(self.curve.usual, stream)
        if self.plates is None or self.plates_at is None:
            return usual
        return self.plates * usual / self._from(self.curve.usual, Stream(self.plates_at, stream.diffusion))

    def plates_range(self, stream: Stream) -> tuple[Real, Real] | None:
        """Return the fewest and the most plates that such packings give; None where they were entered."""
        if self.curve is None or self.curve.ends is None or self.plates is not None:
            return None
        best, worst = self.curve.ends
        return self._from(worst, stream), self._from(best, stream)

    def velocity(self, stream: Stream) -> Real:
        """Reduced velocity ν of a solute [-], by L/t₀; needs the particle size."""
        particle = self.particle or math.nan
        return reduced_velocity(stream.flow, self.length, self.void_volume, particle, stream.diffusion)

    def _from(self, curve: PlateHeightCurve, stream: Stream) -> Real:
        return curve.plates(self.velocity(stream), self.length, self.particle or math.nan)

    def drop(self, flow: float, viscosity: float | None) -> PressureRange | None:
        """Pressure drop [Pa]; None without a particle size or a viscosity."""
        if self.particle is None or viscosity is None:
            return None
        at, tightest, loosest = (
            float(bed_drop(flow, self.length, self.bore, viscosity, self.particle, porosity))
            for porosity in self.porosity
        )
        return PressureRange(at, loosest, tightest)
