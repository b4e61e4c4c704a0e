"""The column as an element of the path: its bed, its plates, its pressure drop."""

from __future__ import annotations

import math
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.column import Column, PlateHeightCurve, reduced_velocity
from xcol.flowpath.hydraulics import PressureRange, bed_drop

if TYPE_CHECKING:
    from xcol.filters.interface import Filter, Real
    from xcol.flowpath.elements import Stream
    from xcol.flowpath.unknowns import Unknown


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
    None where they come from the ``curve``; ``quality`` then says where between the worst (0) and the best (1) of
    such packings they lie (None: as is usual).
    """

    bore: float
    length: float
    particle: float | None
    plates: Real | None
    void_volume: Real
    porosity: tuple[float, float, float]  # value, smallest, largest
    plates_at: float | None = None
    curve: Curves | None = None  # needs the particle
    porosity_from: str = ""  # source of an assumed interstitial porosity
    quality: Real | None = None
    unknowns: tuple[Unknown, ...] = field(default=(), compare=False, repr=False)
    contribution: str = "column"
    of_signal: bool = False

    @property
    def porosity_is_assumed(self) -> bool:
        """Whether the interstitial porosity is a usual one, not one that was entered."""
        return self.porosity[1] < self.porosity[2]

    @property
    def volume(self) -> Real:
        """Void volume [m³]."""
        return self.void_volume

    @property
    def remixes(self) -> Real:
        """Always: a bed mixes the stream."""
        return 1.0

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
        if self.plates is None and self.quality is not None and (ends := self.plates_range(stream)):
            worst, best = ends
            between: Real = worst * np.power(best / worst, self.quality)
            return between
        usual = self._from(self.curve.usual, stream)
        if self.plates is None or self.plates_at is None:
            return usual
        return self.plates * usual / self._from(self.curve.usual, stream.at(self.plates_at))

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
