"""Round tubes, straight and bent, alone and in runs, and the long-tube formula for comparison."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.curved import bent_variance
from xcol.filters.interface import gaussian_transfer
from xcol.filters.laminar import run_third_moment, run_transfer, t_star_of

if TYPE_CHECKING:
    from xcol.filters.cubic import Array
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
    def straight_t_star(self) -> Real:
        """The t* of the straight tube that has its variance over t̄² [-]; 1 where it has no length."""
        t_star = np.where(np.asarray(self.t_star) > 0, self.t_star, 1.0)
        if np.ndim(self.strength) == 0 and self.strength == 0:
            return t_star
        return t_star_of(bent_variance(t_star, self.strength) / np.square(t_star))

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


def shares(
    tubes: Sequence[Tube], joined: Sequence[Real], own: Sequence[Real] | None = None
) -> tuple[list[Real], list[Real]]:
    """Each tube's part [s²] of the variance of a row of tubes: its own, and half of what it shares with others.

    Returns the former and the latter, one entry a tube; ``own`` is the former where it is known. ``joined`` has one
    entry between two tubes: 1 where the layers run on, 0 where the stream is mixed anew. Laminar flow keeps its layers
    through a change of bore, so the delays of joined tubes are correlated. With V(t) = t²Φ(t), w_i = a_i²/D and d the
    t* that lies between i and j

        σ_t² = Σ w_i²V(t_i) + Σ_{i<j} w_i w_j [V(t_i+d+t_j) − V(t_i+d) − V(d+t_j) + V(d)]

    so that a tube cut in two is the same as the whole one. Exact for straight tubes; where bends differ, what two
    tubes share is taken with the stronger bend of the two.
    """
    if len(tubes) < 2:
        return list(own or [tube.variance() for tube in tubes]), [0.0] * len(tubes)
    quantities = [(tube.t_star, tube.time_unit, tube.strength) for tube in tubes]
    shape = np.broadcast_shapes(*(np.shape(value) for row in quantities for value in row), *map(np.shape, joined))
    t_stars, units, strengths = (
        np.stack([np.broadcast_to(value, shape) for value in column]) for column in zip(*quantities, strict=True)
    )
    if own is None:
        laminar = units**2 * bent_variance(t_stars, strengths if np.any(strengths) else 0.0)
        own = [one + tube.axial_variance() for one, tube in zip(laminar, tubes, strict=True)]
    edges = np.concatenate([np.zeros((1, *shape)), np.cumsum(t_stars, axis=0)])
    pairs = [(i, j, weight) for i in range(len(tubes)) for j, weight in _joined_to(i, joined)]
    if not pairs:
        half = np.zeros_like(units)
    elif (strengths == strengths[0]).all() and edges.size * len(edges) <= _TOGETHER:
        half = _shared_alike(edges, units, strengths[0], pairs)
    else:
        half = _shared_by_pairs(edges, units, strengths, pairs)
    return list(own), list(np.where(t_stars > 0, half, 0.0))  # where there is no length, the last digit is noise


_TOGETHER = 2**18  # numbers that are held at once


def _joined_to(i: int, joined: Sequence[Real]) -> Iterator[tuple[int, Real]]:
    """Return the tubes behind the i-th to which its layers run on, each with the weight of that."""
    weight: Real = 1.0
    for j, join in enumerate(joined[i:], start=i + 1):
        weight = weight * join
        if not np.any(weight):
            return
        yield j, weight


def _shared_alike(edges: Array, units: Array, strength: Array, pairs: list[tuple[int, int, Real]]) -> Array:
    """Return half of what each tube shares, all bent alike: V over every stretch from edge to edge, once."""
    starts, ends = np.triu_indices(len(edges), k=1)
    v = np.zeros((len(edges), *edges.shape))
    v[starts, ends] = bent_variance(np.maximum(edges[ends] - edges[starts], 0.0), strength if strength.any() else 0.0)
    brackets = v[:-1, 1:] - v[:-1, :-1] - v[1:, 1:] + v[1:, :-1]  # whole, left, right and what is between
    weights = np.zeros_like(brackets)
    for i, j, weight in pairs:
        weights[i, j] = weight
    shared = weights * brackets * units[:, None] * units[None, :] / 2
    both: Array = shared.sum(axis=0) + shared.sum(axis=1)
    return both


def _shared_by_pairs(edges: Array, units: Array, strengths: Array, pairs: list[tuple[int, int, Real]]) -> Array:
    """Return half of what each tube shares, a few pairs at a time: each pair has a bend of its own."""
    half = np.zeros_like(units)
    size = max(1, _TOGETHER // (4 * max(units[0].size, 1)))
    for start in range(0, len(pairs), size):
        batch = pairs[start : start + size]
        first, second = (np.array(places) for places in list(zip(*batch, strict=True))[:2])
        bends = np.maximum(strengths[first], strengths[second])
        near, far, left, right = edges[first], edges[second + 1], edges[first + 1], edges[second]
        stretches = [far - near, right - near, far - left]
        if (second - first > 1).any():  # something lies between
            stretches.append(right - left)
        v = np.asarray(bent_variance(np.maximum(np.stack(stretches), 0.0), bends))
        shared = units[first] * units[second] * (v[0] - v[1] - v[2] + v[3:].sum(axis=0)) / 2
        for row, (i, j, weight) in enumerate(batch):
            half[i] += weight * shared[row]
            half[j] += weight * shared[row]
    return half


def _merged(tubes: Sequence[Tube]) -> list[Tube]:
    """Return the tubes with neighbours that differ in their length only put together: a cut changes nothing."""
    found: list[Tube] = []
    for tube in tubes:
        last = found[-1] if found else None
        pairs = (
            ((last.bore, tube.bore), (last.diffusion, tube.diffusion), (last.strength, tube.strength)) if last else ()
        )
        if last is not None and all(np.array_equal(one, other) for one, other in pairs):
            found[-1] = replace(last, length=last.length + tube.length)
        else:
            found.append(tube)
    return found


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
        axial = sum(tube.axial_variance() for tube in self.tubes)
        return self.laminar_transfer(omega) * gaussian_transfer(0.0 * self.delay(), axial, omega)

    def laminar_transfer(self, omega: Real) -> Complex:
        """H(ω) of the laminar flow alone, without axial diffusion, with the delay."""
        t_stars, units, scale = self._as_straight
        laminar = run_transfer(t_stars, [scale * unit for unit in units], omega)
        return laminar * gaussian_transfer(self.delay(), 0.0, omega)

    @cached_property
    def _as_straight(self) -> tuple[list[Real], list[Real], Real]:
        """Return t* and a²/D [s] of straight tubes in place of bent ones, and the factor that makes their run's σ this.

        Each has the delay and the variance of its bent tube; for straight tubes nothing changes, and the factor is 1.
        """
        if all(np.ndim(tube.strength) == 0 and tube.strength == 0 for tube in self.tubes):
            return [tube.t_star for tube in self.tubes], [tube.time_unit for tube in self.tubes], 1.0
        alike = []
        for tube in _merged(self.tubes):
            t_star = np.where(np.asarray(tube.t_star) > 0, tube.t_star, 1.0)
            # a greater D at the same delay
            alike.append(Tube(tube.length, tube.bore, tube.flow, tube.diffusion * tube.straight_t_star / t_star))
        own = self.variance() - sum(tube.axial_variance() for tube in self.tubes)
        theirs = sum(TubeRun(tuple(alike)).shares()) - sum(tube.axial_variance() for tube in alike)
        factor = np.sqrt(own / np.where(theirs > 0, theirs, 1.0))
        return [tube.t_star for tube in alike], [tube.time_unit for tube in alike], factor
