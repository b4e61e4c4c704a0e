"""A module that is known only by its measured variance."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from xcol.filters.interface import gaussian_transfer

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Real


@dataclass(frozen=True)
class MeasuredBlock:
    """A block of variance ``measured`` [m⁶] and held ``volume`` [m³] at ``flow`` [m³/s].

    The variance is taken as constant in volume units (what mixing volumes and short tubes do), and
    the form, which nobody measured, as Gaussian.

    >>> MeasuredBlock(measured=4e-18, volume=0.0, flow=1e-8).variance()
    0.04
    """

    measured: Real
    volume: Real
    flow: Real

    def delay(self) -> Real:
        """Mean delay, volume over flow [s]."""
        return self.volume / self.flow

    def variance(self) -> Real:
        """Variance [s²]: the measured one over the flow squared."""
        return self.measured / self.flow**2

    def third_moment(self) -> Real:
        """Third central moment [s³]: none, the form is taken as Gaussian."""
        return 0.0 * self.variance()

    def transfer(self, omega: Real) -> Complex:
        """H(ω) of a Gaussian with this delay and variance."""
        return gaussian_transfer(self.delay(), self.variance(), omega)
