"""Pressure drop and Reynolds number; floats or arrays, SI."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from xcol.filters.interface import Real

LAMINAR_LIMIT = 2000.0  # Reynolds number above which the tube formulas do not hold


@dataclass(frozen=True)
class PressureRange:
    """A pressure drop [Pa] with the range that what is not known leaves open."""

    value: float
    low: float
    high: float

    def __add__(self, other: PressureRange) -> PressureRange:
        """Add drops in series: the ends add, since one bed porosity is likely off like the next."""
        return PressureRange(self.value + other.value, self.low + other.low, self.high + other.high)

    def widened(self, uncertainty: float) -> PressureRange:
        """Return the range with the relative uncertainty of a factor, the viscosity, on top of it."""
        return PressureRange(self.value, self.low / (1 + uncertainty), self.high * (1 + uncertainty))


def exactly(value: float) -> PressureRange:
    """Return a drop [Pa] that carries no range of its own."""
    return PressureRange(value, value, value)


def tube_drop(flow: Real, length: Real, bore: Real, viscosity: Real) -> Real:
    """Pressure drop 128·η·L·F/(π·d⁴) [Pa] of laminar flow; ``flow`` [m³/s], [m], [Pa s].

    Source: Hagen-Poiseuille.

    >>> round(tube_drop(1e-6 / 60, 2.0, 0.3e-3, 0.89e-3) / 1e5, 2)  # bar, water, 1 mL/min
    1.49
    """
    return 128 * viscosity * length * flow / (math.pi * bore**4)


def bed_drop(flow: Real, length: Real, bore: Real, viscosity: Real, particle: Real, porosity: Real) -> Real:
    """Pressure drop 180·η·u_s·L·(1−ε)²/(ε³·d_p²) [Pa] of a packed bed, laminar.

    ``porosity`` ε is the interstitial one, between the particles; ``particle`` diameter d_p [m];
    u_s = F/(π/4·d²). Source: Kozeny-Carman with the constant 180 (Carman 1937, from memory).

    >>> round(bed_drop(0.2e-6 / 60, 0.1, 2.1e-3, 0.9e-3, 3.5e-6, 0.40) / 1e5, 1)  # bar
    71.6
    """
    superficial = flow / (math.pi / 4 * bore**2)
    return 180 * viscosity * superficial * length * (1 - porosity) ** 2 / (porosity**3 * particle**2)


def reynolds_number(flow: Real, bore: Real, viscosity: Real, density: Real) -> Real:
    """Reynolds number 4ρF/(π·d·η) [-] on the diameter.

    >>> round(reynolds_number(1e-6 / 60, 0.25e-3, 0.9e-3, 1000.0), 1)
    94.3
    """
    return 4 * density * flow / (math.pi * bore * viscosity)
