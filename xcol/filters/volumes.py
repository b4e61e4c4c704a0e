"""Volumes that the band is injected as, is read in, or is mixed in."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.interface import outer, widen

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Real


@dataclass(frozen=True)
class Plug:
    """A volume that passes as a rectangle: an injected plug, or a cell read over its volume.

    The best case of both: nothing mixes. ``volume`` [m³], ``flow`` [m³/s]. A cell that is only
    passed through, on the way to a later detector, delays by its whole volume
    (``passed_through=True``) but spreads the band as the cell that is read does.

    Source: variance of a rectangular distribution, (V/F)²/12 (Sternberg, Adv. Chromatogr. 2
    (1966) 205, from memory).

    >>> round(Plug(volume=20e-9, flow=1e-6 / 60).variance() * (1e-6 / 60) ** 2 * 1e18, 3)  # µL²
    33.333
    """

    volume: Real
    flow: Real
    passed_through: bool = False

    def delay(self) -> Real:
        """Mean delay [s]: half of the volume over the flow; all of it where it is passed through."""
        return self.volume / self.flow * (1.0 if self.passed_through else 0.5)

    def variance(self) -> Real:
        """Variance [s²]."""
        return (self.volume / self.flow) ** 2 / 12

    def third_moment(self) -> Real:
        """Third central moment [s³]: none, a rectangle is symmetric."""
        return 0.0 * self.variance()

    def transfer(self, omega: Real) -> Complex:
        """H(ω) = sinc(ωT/2) exp(−iω·delay) with T = V/F."""
        # numpy's sinc(x) is sin(πx)/(πx)
        form = np.sinc(outer(self.volume / self.flow, omega) / (2 * math.pi))
        result: Complex = form * np.exp(-1j * outer(self.delay(), omega))
        return result


@dataclass(frozen=True)
class TanksInSeries:
    """A volume that mixes like ``tanks`` equal stirred tanks (1 or more, need not be whole).

    ``volume`` [m³] of all tanks together, ``flow`` [m³/s]. One tank is a perfect mixer, many
    tanks a delay without mixing. Source: Levenspiel, Chemical Reaction Engineering, tanks-in-series
    model (from memory).

    >>> TanksInSeries(volume=10e-9, flow=1e-8, tanks=4).variance()
    0.25
    """

    volume: Real
    flow: Real
    tanks: Real = 1.0

    def delay(self) -> Real:
        """Mean delay V/F [s]."""
        return self.volume / self.flow

    def variance(self) -> Real:
        """Variance (V/F)²/n [s²]."""
        return self.delay() ** 2 / self.tanks

    def third_moment(self) -> Real:
        """Third central moment 2(V/F)³/n² [s³]."""
        return 2 * self.delay() ** 3 / self.tanks**2

    def transfer(self, omega: Real) -> Complex:
        """H(ω) = (1 + iωV/(nF))⁻ⁿ."""
        base = 1 + 1j * outer(self.delay() / self.tanks, omega)
        result: Complex = np.power(base, -widen(self.tanks, omega), dtype=np.complex128)
        return result


def dead_gap_volume(port: Real, gap: Real) -> Real:
    """Volume [m³] of the gap that is left in a port, π/4·d²·gap; ``port`` diameter and ``gap`` [m].

    >>> round(dead_gap_volume(port=25.4e-3 / 16, gap=0.5e-3) * 1e9, 2)  # µL, in a 1/16 in port
    0.99
    """
    return math.pi / 4 * port**2 * gap
