"""The column's own band."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

from xcol.filters.interface import gaussian_transfer

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Real


def void_volume(bore: Real, length: Real, total_porosity: Real) -> Real:
    """Void volume V₀ = ε_t·π/4·d²·L [m³] of a column; ``bore`` and ``length`` [m].

    >>> round(void_volume(4.6e-3, 0.15, 0.65) * 1e6, 4)  # mL
    1.6204
    """
    return total_porosity * math.pi / 4 * bore**2 * length


@dataclass(frozen=True)
class Column:
    """A column as a Gaussian filter: hold-up time ``dead_time`` [s], retention factor, plates.

    Source: σ = t₀(1+k)/√N, the definition of the plate number.

    >>> Column(dead_time=100.0, retention_factor=1.0, plates=10000.0).variance()
    4.0
    """

    dead_time: Real
    retention_factor: Real
    plates: Real

    def delay(self) -> Real:
        """Retention time in the column, t₀(1+k) [s]."""
        return self.dead_time * (1 + self.retention_factor)

    def variance(self) -> Real:
        """Variance t_R²/N [s²]."""
        return self.delay() ** 2 / self.plates

    def third_moment(self) -> Real:
        """Third central moment [s³]: none, the band is taken as Gaussian."""
        return 0.0 * self.variance()

    def transfer(self, omega: Real) -> Complex:
        """H(ω) of a Gaussian with this delay and variance."""
        return gaussian_transfer(self.delay(), self.variance(), omega)
