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
class PlateHeightCurve:
    """Reduced plate height h = A·ν^⅓ + B/ν + C·ν against the reduced velocity ν = u·d_p/D [-].

    ``per_hold_up`` is the velocity that the coefficients were found with over L/t₀: 1 where it is L/t₀
    itself, total over interstitial porosity where it is the interstitial velocity.
    Source: Knox, J. Chromatogr. Sci. 15 (1977) 352, from memory.

    >>> curve = PlateHeightCurve(0.9, 1.75, 0.065)
    >>> round(curve.height(2.5), 3)
    2.084
    """

    a: float
    b: float
    c: float
    per_hold_up: float = 1.0

    def height(self, velocity: Real) -> Real:
        """Reduced plate height h [-] at the reduced ``velocity`` ν [-] by L/t₀; h and ν of one shape."""
        nu = self.per_hold_up * velocity
        return self.a * nu ** (1 / 3) + self.b / nu + self.c * nu

    def plates(self, velocity: Real, length: Real, particle: Real) -> Real:
        """Plate number L/(h·d_p) [-]; ``length`` and ``particle`` diameter [m]."""
        return length / (self.height(velocity) * particle)


def reduced_velocity(flow: Real, length: Real, void: Real, particle: Real, diffusion: Real) -> Real:
    """Reduced velocity ν = u·d_p/D [-] with u = L/t₀; ``flow`` [m³/s], ``void`` volume [m³], D [m²/s].

    >>> round(reduced_velocity(0.4e-6 / 60, 0.1, 0.208e-6, 1.7e-6, 1e-9), 2)
    5.45
    """
    return length * flow / void * particle / diffusion


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
