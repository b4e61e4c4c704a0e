"""Filters of the recorded signal: time constants, noise filters, averaging between data points."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.interface import gaussian_transfer, outer, widen

if TYPE_CHECKING:
    from xcol.filters.interface import Complex, Real

# 10-90 % of a Gaussian step response: twice the 90 % quantile of the normal distribution.
GAUSSIAN_RISE = 2 * 1.2815515655446004
# A boxcar rises linearly: 10-90 % is 0.8 of its dwell, whose standard deviation is dwell/√12.
BOXCAR_RISE = 0.8 * math.sqrt(12)


@dataclass(frozen=True)
class FirstOrder:
    """A first-order (RC) low-pass of time constant ``tau`` [s], or ``stages`` equal ones in a row.

    Source: impulse response exp(−t/τ)/τ (Sternberg, Adv. Chromatogr. 2 (1966) 205, from memory).

    >>> FirstOrder(tau=0.5).variance()
    0.25
    """

    tau: Real
    stages: Real = 1.0

    def delay(self) -> Real:
        """Mean delay nτ [s]."""
        return self.stages * self.tau

    def variance(self) -> Real:
        """Variance nτ² [s²]."""
        return self.stages * self.tau**2

    def third_moment(self) -> Real:
        """Third central moment 2nτ³ [s³]."""
        return 2 * self.stages * self.tau**3

    def transfer(self, omega: Real) -> Complex:
        """H(ω) = (1 + iωτ)⁻ⁿ."""
        base = 1 + 1j * outer(self.tau, omega)
        result: Complex = np.power(base, -widen(self.stages, omega), dtype=np.complex128)
        return result


@dataclass(frozen=True)
class GaussianFilter:
    """A symmetric noise filter of standard deviation ``sigma`` [s], written about zero delay."""

    sigma: Real

    def delay(self) -> Real:
        """Mean delay [s]: none."""
        return 0.0 * self.sigma

    def variance(self) -> Real:
        """Variance σ² [s²]."""
        return self.sigma**2

    def third_moment(self) -> Real:
        """Third central moment [s³]: none."""
        return 0.0 * self.sigma

    def transfer(self, omega: Real) -> Complex:
        """H(ω) = exp(−ω²σ²/2)."""
        return gaussian_transfer(self.delay(), self.variance(), omega)


@dataclass(frozen=True)
class Boxcar:
    """The mean over a dwell time [s]: what a detector does that averages between its data points.

    Averaging broadens by dwell²/12; bare sampling would only scatter the points.

    >>> Boxcar(dwell=0.2).variance()  # a 5 Hz data rate
    0.003333333333333334
    """

    dwell: Real

    def delay(self) -> Real:
        """Mean delay, half the dwell [s]."""
        return self.dwell / 2

    def variance(self) -> Real:
        """Variance dwell²/12 [s²]."""
        return self.dwell**2 / 12

    def third_moment(self) -> Real:
        """Third central moment [s³]: none."""
        return 0.0 * self.dwell

    def transfer(self, omega: Real) -> Complex:
        """H(ω) = sinc(ω·dwell/2) exp(−iω·dwell/2)."""
        form = np.sinc(outer(self.dwell, omega) / (2 * math.pi))
        result: Complex = form * np.exp(-1j * outer(self.delay(), omega))
        return result


def first_order_rise(stages: int) -> float:
    """10-90 % rise time of ``stages`` equal first-order stages, in units of their total σ [-].

    The step response of n stages is 1 − e⁻ˣ Σ_{j<n} xʲ/j!, x = t/τ, and σ = √n·τ.

    >>> round(first_order_rise(1), 3)  # ln 9
    2.197
    """
    return (_step_time(0.9, stages) - _step_time(0.1, stages)) / math.sqrt(stages)


def _step_time(level: float, stages: int) -> float:
    """Time, in time constants, at which the step response of the stages reaches ``level``."""

    def response(x: float) -> float:
        term = total = math.exp(-x)
        for j in range(1, stages):
            term *= x / j
            total += term
        return 1 - total

    low, high = 0.0, stages + 10 * math.sqrt(stages) + 10
    for _ in range(80):  # bisection to the last bit: the response rises monotonically
        middle = (low + high) / 2
        low, high = (middle, high) if response(middle) < level else (low, middle)
    return (low + high) / 2
