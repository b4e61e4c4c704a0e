"""A number that was not measured here: its value, its doubt, and where it comes from."""

from __future__ import annotations

import math
from dataclasses import dataclass


@dataclass(frozen=True)
class Estimate:
    """A ``value`` [SI] with its relative ``uncertainty`` (±, about 90 %) and its ``origin`` in words.

    ``entered``: it is the user's own, taken without doubt and the same at every temperature.
    """

    value: float
    uncertainty: float
    origin: str
    entered: bool = False

    @property
    def doubt(self) -> str:
        """The uncertainty in words, '±20 %'; '' for what was entered, and where it has none."""
        return "" if self.entered or not self.uncertainty else f"±{100 * self.uncertainty:.0f} %"

    @property
    def stated(self) -> str:
        """The origin with the uncertainty, 'estimated by Wilke–Chang from 194 g/mol, ±20 %'.

        >>> Estimate(1e-9, 0.2, "estimated by Wilke–Chang from 194 g/mol").stated
        'estimated by Wilke–Chang from 194 g/mol, ±20 %'
        """
        return f"{self.origin}, {self.doubt}".removesuffix(", ")


def as_entered(value: float) -> Estimate:
    """Return a value that the user entered."""
    return Estimate(value, 0.0, "as entered", entered=True)


def together(*uncertainties: float) -> float:
    """Return the relative uncertainty of a product of independent factors.

    >>> together(0.03, 0.04)
    0.05
    """
    return math.hypot(*uncertainties)
