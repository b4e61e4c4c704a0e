"""Filters that the signal passes one after the other, as one filter."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Filter, Real


@dataclass(frozen=True)
class InSeries:
    """A chain of ``filters``, independent of each other: moments add, transfer functions multiply."""

    filters: tuple[Filter, ...]

    def delay(self) -> Real:
        """Mean delay [s]."""
        return sum(one.delay() for one in self.filters)

    def variance(self) -> Real:
        """Variance [s²]."""
        return sum(one.variance() for one in self.filters)

    def third_moment(self) -> Real:
        """Third central moment [s³]."""
        return sum(one.third_moment() for one in self.filters)

    def transfer(self, omega: Real) -> Complex:
        """H(ω), the product of theirs."""
        result: Complex = math.prod(one.transfer(omega) for one in self.filters)  # type: ignore[assignment]
        return result
