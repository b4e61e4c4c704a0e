"""Straight round tubes, alone and in runs, and the long-tube formula for comparison."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.interface import gaussian_transfer
from xcol.filters.laminar import dimensionless_variance, run_third_moment, run_transfer

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Real


@dataclass(frozen=True)
class Tube:
    """One straight tube: ``length`` and ``bore`` [m], ``flow`` [m³/s], ``diffusion`` [m²/s].

    Its layers are mixed at the inlet; a row of tubes with nothing between them is a ``TubeRun``.
    """

    length: Real
    bore: Real
    flow: Real
    diffusion: Real

    @property
    def volume(self) -> Real:
        """Volume π/4·d²·L [m³]."""
        return math.pi / 4 * self.bore**2 * self.length

    @property
    def t_star(self) -> Real:
        """Dimensionless residence time t* = D·t̄/a² = π·D·L/F [-]; the bore is not in it."""
        return math.pi * self.diffusion * self.length / self.flow

    @property
    def time_unit(self) -> Real:
        """a²/D [s], the time in which a molecule diffuses across the bore."""
        return (self.bore / 2) ** 2 / self.diffusion

    def delay(self) -> Real:
        """Mean delay, volume over flow [s]."""
        return self.volume / self.flow

    def axial_variance(self) -> Real:
        """Variance by molecular diffusion along the tube, 2·D·L/u³ [s²]."""
        velocity = self.flow / (math.pi / 4 * self.bore**2)
        return 2 * self.diffusion * self.length / velocity**3

    def variance(self) -> Real:
        """Exact variance t̄²·Φ(t*) and the axial term [s²]."""
        return TubeRun((self,)).variance()

    def longtube_variance(self) -> Real:
        """Variance by the long-tube formula [s²], π·a⁴·L·F/(24·D) over F², and the axial term.

        For comparison only: at t* of 0.01 to 0.5, where ordinary connecting tubes are, it is 8 to
        1.1 times too large. Source: Taylor 1953, Aris 1956, Golay 1958 (from memory).
        """
        radius = self.bore / 2
        convective = math.pi * radius**4 * self.length / (24 * self.diffusion * self.flow)
        return convective + self.axial_variance()

    def third_moment(self) -> Real:
        """Third central moment [s³]."""
        return TubeRun((self,)).third_moment()

    def transfer(self, omega: Real) -> Complex:
        """H(ω), see ``TubeRun.transfer``."""
        return TubeRun((self,)).transfer(omega)


@dataclass(frozen=True)
class TubeRun:
    """Tubes that follow each other with nothing between: one stream, whose layers run on.

    Laminar flow keeps its layers through a change of bore, so the delays of the tubes are
    correlated. With V(t) = t²Φ(t), w_i = a_i²/D and d the t* that lies between i and j

        σ_t² = Σ w_i²V(t_i) + Σ_{i<j} w_i w_j [V(t_i+d+t_j) − V(t_i+d) − V(d+t_j) + V(d)]

    so that a tube cut in two is the same as the whole one.
    """

    tubes: tuple[Tube, ...]

    def delay(self) -> Real:
        """Mean delay [s]."""
        return sum(tube.delay() for tube in self.tubes)

    def variance(self) -> Real:
        """Variance [s²]."""
        return sum(self.shares())

    def shares(self) -> list[Real]:
        """Each tube's part of the variance [s²]: its own, and half of what it shares with others."""
        count = len(self.tubes)
        if not count:
            return []
        t_stars = np.broadcast_arrays(*(np.asarray(tube.t_star) for tube in self.tubes))
        units = [tube.time_unit for tube in self.tubes]
        edges = np.concatenate([np.zeros((1, *t_stars[0].shape)), np.cumsum(t_stars, axis=0)])
        # V over every stretch from edge i to edge j: one call, whatever the number of tubes
        starts, ends = np.triu_indices(count + 1, k=1)
        stretches = np.asarray(dimensionless_variance(np.maximum(edges[ends] - edges[starts], 0.0)))
        v = {(int(i), int(j)): stretches[n] for n, (i, j) in enumerate(zip(starts, ends, strict=True))}

        shares: list[Real] = [units[i] ** 2 * v[i, i + 1] + tube.axial_variance() for i, tube in enumerate(self.tubes)]
        for i in range(count):
            for j in range(i + 1, count):
                between = v[i + 1, j] if j > i + 1 else 0.0
                bracket = v[i, j + 1] - v[i, j] - v[i + 1, j + 1] + between
                half = units[i] * units[j] * bracket / 2
                shares[i] = shares[i] + half
                shares[j] = shares[j] + half
        return shares

    def third_moment(self) -> Real:
        """Third central moment [s³]; axial diffusion, taken as Gaussian, adds nothing to it."""
        return run_third_moment([tube.t_star for tube in self.tubes], [tube.time_unit for tube in self.tubes])

    def transfer(self, omega: Real) -> Complex:
        """H(ω) of the laminar flow times that of axial diffusion, a Gaussian, and the delay."""
        laminar = run_transfer([tube.t_star for tube in self.tubes], [tube.time_unit for tube in self.tubes], omega)
        axial = sum(tube.axial_variance() for tube in self.tubes)
        return laminar * gaussian_transfer(self.delay(), axial, omega)
