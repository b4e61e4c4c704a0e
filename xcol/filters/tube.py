"""Round tubes, straight and bent, alone and in runs, and the long-tube formula for comparison."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.curved import bent_variance
from xcol.filters.interface import gaussian_transfer
from xcol.filters.laminar import run_third_moment, run_transfer, t_star_of

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Real


@dataclass(frozen=True)
class Tube:
    """One tube: ``length`` and ``bore`` [m], ``flow`` [m³/s], ``diffusion`` [m²/s].

    ``strength`` is De²·Sc of its bend [-], 0 where it is straight. Its layers are mixed at the inlet; a row of
    tubes with nothing between them is a ``TubeRun``.
    """

    length: Real
    bore: Real
    flow: Real
    diffusion: Real
    strength: Real = 0.0

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

    def laminar_variance(self) -> Real:
        """Variance t̄²·Φ(t*, De²Sc) [s²], without the axial term."""
        return self.time_unit**2 * bent_variance(self.t_star, self.strength)

    def variance(self) -> Real:
        """Exact variance t̄²·Φ(t*, De²Sc) and the axial term [s²]."""
        return self.laminar_variance() + self.axial_variance()

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


def shares(tubes: Sequence[Tube], joined: Sequence[Real]) -> tuple[list[Real], list[Real]]:
    """Each tube's part [s²] of the variance of a row of tubes: its own, and half of what it shares with others.

    Returns the former and the latter, one entry a tube. ``joined`` has one entry between two tubes: 1 where the
    layers run on, 0 where the stream is mixed anew. Laminar flow keeps its layers through a change of bore, so the
    delays of joined tubes are correlated. With V(t) = t²Φ(t), w_i = a_i²/D and d the t* that lies between i and j

        σ_t² = Σ w_i²V(t_i) + Σ_{i<j} w_i w_j [V(t_i+d+t_j) − V(t_i+d) − V(d+t_j) + V(d)]

    so that a tube cut in two is the same as the whole one. Exact for straight tubes; where bends differ, what two
    tubes share is taken with the stronger bend of the two.
    """
    count = len(tubes)
    edges: list[Real] = [0.0]
    for tube in tubes:
        edges.append(edges[-1] + tube.t_star)
    ranks: list[int] = []  # equal bends have equal ranks, so that no V is computed twice
    for tube in tubes:
        ranks.append(next((r for r in ranks if _is_same(tubes[r].strength, tube.strength)), len(ranks)))
    pairs = {(i, j): _weight(joined[i:j]) for i in range(count) for j in range(i + 1, count)}
    pairs = {pair: weight for pair, weight in pairs.items() if np.ndim(weight) or weight}

    wanted: dict[tuple[int, int, int, int], int] = {}  # edges of the stretch, ranks of the two bends

    def place(start: int, end: int, first: int, second: int) -> int:
        return wanted.setdefault((start, end, ranks[first], ranks[second]), len(wanted))

    own = [place(i, i + 1, i, i) for i in range(count)]
    brackets = {}
    for i, j in pairs:
        stretches = ((i, j + 1), (i, j), (i + 1, j + 1), (i + 1, j))
        brackets[i, j] = [place(*stretch, i, j) for stretch in stretches if stretch[0] < stretch[1]]
    v = _variances(list(wanted), edges, [tube.strength for tube in tubes])

    alone: list[Real] = [tube.time_unit**2 * v[own[i]] + tube.axial_variance() for i, tube in enumerate(tubes)]
    halves: list[Real] = [0.0] * count
    for (i, j), weight in pairs.items():
        whole, left, right, *between = (v[at] for at in brackets[i, j])
        half = weight * tubes[i].time_unit * tubes[j].time_unit * (whole - left - right + sum(between)) / 2
        halves[i] = halves[i] + half
        halves[j] = halves[j] + half
    return alone, halves


def _is_same(one: Real, other: Real) -> bool:
    return one is other or (np.ndim(one) == 0 and np.ndim(other) == 0 and one == other)


def _weight(joined: Sequence[Real]) -> Real:
    weight: Real = 1.0
    for join in joined:
        weight = weight * join
        if np.ndim(weight) == 0 and not weight:
            return 0.0
    return weight


def _variances(wanted: list[tuple[int, int, int, int]], edges: list[Real], strengths: list[Real]) -> list[Real]:
    """Return V over stretches from edge to edge, each with the stronger of two bends."""
    straight = all(np.ndim(strength) == 0 and strength == 0 for strength in strengths)
    stretches = [np.maximum(edges[end] - edges[start], 0.0) for start, end, _, _ in wanted]
    stacked = np.stack(np.broadcast_arrays(*stretches))  # one call, whatever the number of tubes
    if straight:
        return list(bent_variance(stacked, 0.0))  # type: ignore[arg-type]
    bends = [np.maximum(strengths[one], strengths[other]) for _, _, one, other in wanted]
    every = np.broadcast_arrays(*bends, stacked[0])[:-1]
    return list(bent_variance(stacked, np.stack(every)))  # type: ignore[arg-type]


@dataclass(frozen=True)
class TubeRun:
    """Tubes that follow each other with nothing between: one stream, whose layers run on (see ``shares``)."""

    tubes: tuple[Tube, ...]

    def delay(self) -> Real:
        """Mean delay [s]."""
        return sum(tube.delay() for tube in self.tubes)

    def variance(self) -> Real:
        """Variance [s²]."""
        return sum(self.shares())

    def shares(self) -> list[Real]:
        """Each tube's part of the variance [s²]: its own, and half of what it shares with others."""
        if not self.tubes:
            return []
        own, half = shares(self.tubes, (1.0,) * (len(self.tubes) - 1))
        return [one + other for one, other in zip(own, half, strict=True)]

    def third_moment(self) -> Real:
        """Third central moment [s³]; axial diffusion, taken as Gaussian, adds nothing to it."""
        t_stars, units, scale = self._as_straight
        return scale**3 * run_third_moment(t_stars, units)

    def transfer(self, omega: Real) -> Complex:
        """H(ω) of the laminar flow times that of axial diffusion, a Gaussian, and the delay.

        Bent tubes have the form of straight ones at the t* of the same variance, an approximation.
        """
        t_stars, units, scale = self._as_straight
        axial = sum(tube.axial_variance() for tube in self.tubes)
        laminar = run_transfer(t_stars, [scale * unit for unit in units], omega)
        return laminar * gaussian_transfer(self.delay(), axial, omega)

    @cached_property
    def _as_straight(self) -> tuple[list[Real], list[Real], Real]:
        """Return t* and a²/D [s] of straight tubes in place of bent ones, and the factor that makes their run's σ this.

        Each has the delay and the variance of its bent tube; for straight tubes nothing changes, and the factor is 1.
        """
        if all(np.ndim(tube.strength) == 0 and tube.strength == 0 for tube in self.tubes):
            return [tube.t_star for tube in self.tubes], [tube.time_unit for tube in self.tubes], 1.0
        alike = []
        for tube in self.tubes:
            t_star = np.where(tube.t_star > 0, tube.t_star, 1.0)
            same = t_star_of(bent_variance(t_star, tube.strength) / np.square(t_star)) / t_star
            # a longer tube at the same delay: D greater, and the bore with it
            alike.append(Tube(tube.length, tube.bore, tube.flow, tube.diffusion * same))
        own = self.variance() - sum(tube.axial_variance() for tube in self.tubes)
        theirs = sum(TubeRun(tuple(alike)).shares()) - sum(tube.axial_variance() for tube in alike)
        factor = np.sqrt(own / np.where(theirs > 0, theirs, 1.0))
        return [tube.t_star for tube in alike], [tube.time_unit for tube in alike], factor
