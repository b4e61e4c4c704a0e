"""A bore that is washed out, or read over all its length: a full sample loop, a straight detector cell."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.interface import outer
from xcol.filters.laminar import dimensionless_third_moment, fourth_moment, relative_variance
from xcol.filters.tube import TubeRun

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Real
    from xcol.filters.tube import Tube


@dataclass(frozen=True)
class WashedOut:
    """What leaves a full ``tube`` that is washed out: the density 1 − F(t) over t̄, F the tube's own distribution.

    A cell that is read over its bore sees the same of what passes through it. A long tube (t* → ∞) is a plug.
    Moments about 0 from those of the tube, m_n: mean m₂/2m₁, second m₃/3m₁, third m₄/4m₁. Of the laminar flow alone:
    diffusion along so short a bore ends at what it is connected to.

    Source: residence time theory (Danckwerts, Chem. Eng. Sci. 2 (1953) 1, from memory).

    >>> from xcol.filters.tube import Tube
    >>> cell = WashedOut(Tube(length=0.01, bore=1e-3, flow=1e-6 / 60, diffusion=1e-9))
    >>> round(float(cell.variance() / cell.tube.delay() ** 2), 3)
    1.284
    """

    tube: Tube

    def delay(self) -> Real:
        """Mean delay m₂/2m₁ [s]."""
        spread, _ = self._moments()
        return self.tube.delay() * (1 + spread) / 2

    def variance(self) -> Real:
        """Variance [s²]: t̄²(1/12 + φ/2 − φ²/4 + s/3), φ and s the tube's central moments over t̄² and t̄³."""
        spread, skew = self._moments()
        return self.tube.delay() ** 2 * (1 / 12 + spread / 2 - spread**2 / 4 + skew / 3)

    def third_moment(self) -> Real:
        """Third central moment [s³]."""
        spread, skew = self._moments()
        t_star = self.tube.straight_t_star
        fourth = fourth_moment(t_star) / t_star**4
        first, second = (1 + spread) / 2, (1 + 3 * spread + skew) / 3
        third = (1 + 6 * spread + 4 * skew + fourth) / 4
        return self.tube.delay() ** 3 * (third - 3 * first * second + 2 * first**3)

    def transfer(self, omega: Real) -> Complex:
        """H(ω) = (1 − H_tube)/(iωt̄); 1 at ω = 0."""
        turn = 1j * outer(self.tube.delay(), omega)
        still = turn == 0
        h = (1 - TubeRun((self.tube,)).laminar_transfer(omega)) / np.where(still, 1.0, turn)
        result: Complex = np.where(still, 1.0 + 0.0j, h)
        return result

    def _moments(self) -> tuple[Real, Real]:
        """Return second and third central moment of the tube over t̄² and t̄³ [-]."""
        t_star = self.tube.straight_t_star
        return relative_variance(t_star), dimensionless_third_moment(t_star) / t_star**3
