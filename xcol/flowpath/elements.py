"""What a part consists of, as the band meets it: sizes only, no flow and no solute yet.

A part is one element or a few (a detector: cell, filter, data rate). Each makes its linear filter
for a given stream, and knows what is unknown of it; tubes and columns have a pressure drop as well. The column's own
element is in bed.py.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, field, replace
from typing import TYPE_CHECKING, Protocol

import numpy as np

from xcol.filters.block import MeasuredBlock
from xcol.filters.curved import bend_strength, dean_number
from xcol.filters.series import InSeries
from xcol.filters.tube import Tube
from xcol.filters.volumes import Plug, TanksInSeries
from xcol.filters.washout import WashedOut
from xcol.flowpath.hydraulics import PressureRange, exactly, reynolds_number, tube_drop

if TYPE_CHECKING:
    from xcol.filters.interface import Filter, Real
    from xcol.flowpath.unknowns import Unknown

PLUG = 1 / 12  # variance of a plug over the square of its volume
USUAL_CELL_LENGTH = 10e-3  # m, of the straight bore that is the worst case of a cell


@dataclass(frozen=True)
class Stream:
    """What flows through an element: ``flow`` [m³/s], the solute's ``diffusion`` [m²/s], the liquid.

    ``viscosity`` [Pa s] (None: not known, and bends are not computed) and ``density`` [kg/m³].
    """

    flow: float
    diffusion: Real
    viscosity: Real | None = None
    density: float = 1000.0

    def at(self, flow: float) -> Stream:
        """Return the same at another flow [m³/s]."""
        return replace(self, flow=flow)

    def dean(self, bore: Real, curvature: Real) -> Real:
        """Dean number [-] in a bore [m] of this curvature [1/m]; 0 where the viscosity is not known."""
        if self.viscosity is None:
            return 0.0
        return dean_number(reynolds_number(self.flow, bore, self.viscosity, self.density), bore, curvature)

    def bend(self, bore: Real, curvature: Real) -> Real:
        """De²·Sc [-] in a bore [m] of this curvature [1/m]; 0 where it is straight, or the viscosity is not known."""
        if self.viscosity is None or (np.ndim(curvature) == 0 and not curvature):
            return 0.0
        return bend_strength(self.dean(bore, curvature), self.viscosity / (self.density * self.diffusion))


class Element(Protocol):
    """One thing that delays or broadens the band; ``contribution`` is its name in the report."""

    @property
    def contribution(self) -> str:
        """Name of the contribution in the report, 'cell' for instance."""
        ...

    @property
    def volume(self) -> Real:
        """Swept volume [m³]."""
        ...

    @property
    def of_signal(self) -> bool:
        """Whether it acts on the recorded signal of its own detector only, not on the stream."""
        ...

    @property
    def remixes(self) -> Real:
        """Whether the stream leaves it mixed across the bore, so that a run of tubes ends in it: 1, or 0."""
        ...

    @property
    def unknowns(self) -> tuple[Unknown, ...]:
        """What nobody knows exactly of it."""
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

    volume: Real

    @property
    def remixes(self) -> Real:
        """Whether there is any volume to mix the stream in."""
        return np.where(np.asarray(self.volume) > 0, 1.0, 0.0) if np.ndim(self.volume) else float(self.volume > 0)


@dataclass(frozen=True)
class Injected(MixingVolume):
    """The injected ``volume`` [m³]: a plug, or what spreads more; ``spread`` is its variance over its volume²."""

    volume: Real
    spread: Real = PLUG
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    contribution: str = "injection"
    of_signal: bool = False

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the plug, or tanks of the same variance where it spreads more."""
        if np.ndim(self.spread) == 0 and self.spread == PLUG:
            return Plug(self.volume, stream.flow)
        return TanksInSeries(self.volume, stream.flow, 1 / self.spread)


class InBore:
    """What has a length and a bore: straight, or bent all along with ``curvature`` 1/R [1/m]."""

    length: Real
    bore: Real
    curvature: Real

    @property
    def volume(self) -> Real:
        """Volume that it holds [m³]."""
        return math.pi / 4 * self.bore**2 * self.length

    def tube(self, stream: Stream) -> Tube:
        """Return it as a tube."""
        strength = stream.bend(self.bore, self.curvature)
        return Tube(self.length, self.bore, stream.flow, stream.diffusion, strength)

    def drop(self, flow: float, viscosity: float | None) -> PressureRange | None:
        """Pressure drop [Pa]; None without a viscosity."""
        if viscosity is None:
            return None
        return exactly(float(tube_drop(flow, self.length, self.bore, viscosity)))


@dataclass(frozen=True)
class Loop(InBore):
    """A sample loop of ``length`` and ``bore`` [m]: full, and washed out, or filled in part with ``injected`` [m³].

    What is injected in part leaves as a plug, through the rest of the loop where it leaves the same way as it came
    (``same_way`` 1; 0: the other way).
    """

    length: Real
    bore: Real
    injected: Real | None = None
    same_way: Real = 0.0
    curvature: Real = 0.0
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    contribution: str = "injection"
    of_signal: bool = False

    @property
    def volume(self) -> Real:
        """Injected volume [m³]."""
        return super().volume if self.injected is None else self.injected

    @property
    def remixes(self) -> Real:
        """Always, in the valve behind it."""
        return 1.0

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the washing-out of the whole loop, or the plug and the tube that it passes."""
        whole = self.tube(stream)
        if self.injected is None:
            return WashedOut(whole)
        plug = Plug(self.injected, stream.flow)
        if np.ndim(self.same_way) == 0 and not self.same_way:
            return plug
        rest = np.maximum(self.length - self.injected / (math.pi / 4 * self.bore**2), 0.0) * self.same_way
        return InSeries((plug, replace(whole, length=rest)))


@dataclass(frozen=True)
class Bore(InBore):
    """A tube or bore, ``length`` and ``bore`` [m].

    ``remixed`` 0: its stream runs on into a neighbouring tube; 1: it is mixed anew at both ends.
    """

    length: Real
    bore: Real
    remixed: Real = 0.0
    curvature: Real = 0.0
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    contribution: str = "tube"
    of_signal: bool = False

    @property
    def remixes(self) -> Real:
        """Whether it is remixed at its ends (and has a length at all)."""
        return self.remixed * np.where(np.asarray(self.length) > 0, 1.0, 0.0)

    def filter(self, stream: Stream, *, read_here: bool) -> Tube:
        """Return the tube."""
        return self.tube(stream)


@dataclass(frozen=True)
class Mixed(MixingVolume):
    """A mixing ``volume`` [m³] of this many ``tanks`` in series: a fitting, a mixer; ``remixed`` as for a bore."""

    volume: Real
    tanks: Real
    contribution: str
    remixed: Real = 1.0
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    of_signal: bool = False

    @property
    def remixes(self) -> Real:
        """Whether it mixes the stream across the bore (and has any volume to do so)."""
        return self.remixed * super().remixes

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the tanks."""
        return TanksInSeries(self.volume, stream.flow, self.tanks)


@dataclass(frozen=True)
class Cell(MixingVolume):
    """A detector cell of this ``volume`` [m³]: a plug, ``tanks`` in series where given, or a straight bore.

    ``likeness`` 0 is the plug, 1 the bore of ``length`` [m] that is read over its volume (passed through: a tube),
    between them the variance lies between theirs, each factor alike.
    """

    volume: Real
    tanks: float | None = None
    length: float = USUAL_CELL_LENGTH
    likeness: Real = 0.0
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    contribution: str = "cell"
    of_signal: bool = False

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the filter; of a plug that is not read here, the whole volume is passed."""
        if self.tanks is not None:
            return TanksInSeries(self.volume, stream.flow, self.tanks)
        fixed = np.ndim(self.likeness) == 0
        if fixed and not self.likeness:
            return Plug(self.volume, stream.flow, passed_through=not read_here)
        bore = np.sqrt(4 * self.volume / (math.pi * self.length))
        tube = Tube(self.length, bore, stream.flow, stream.diffusion)
        straight: Filter = WashedOut(tube) if read_here else tube
        if fixed and self.likeness == 1:
            return straight
        relative = straight.variance() / (self.volume / stream.flow) ** 2
        return TanksInSeries(self.volume, stream.flow, 1 / (PLUG * (relative / PLUG) ** self.likeness))


@dataclass(frozen=True)
class Electronics(WithoutDrop):
    """A filter of the recorded signal: ``made`` needs no stream.

    ``period`` [s] is the time between data points, of the element that averages between them.
    """

    made: Filter
    contribution: str
    period: float | None = None
    volume: float = 0.0
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    of_signal: bool = True

    @property
    def remixes(self) -> Real:
        """Never: the stream does not meet it."""
        return 0.0

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the filter."""
        return self.made


@dataclass(frozen=True)
class Block(WithoutDrop):
    """A module of variance ``measured`` [m⁶] and held ``volume`` [m³]."""

    measured: float
    volume: float
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    contribution: str = "block"
    of_signal: bool = False

    @property
    def remixes(self) -> Real:
        """Whether it spreads anything: then its inside is taken to mix the stream."""
        return float(self.measured > 0)

    def filter(self, stream: Stream, *, read_here: bool) -> Filter:
        """Return the block."""
        return MeasuredBlock(self.measured, self.volume, stream.flow)
