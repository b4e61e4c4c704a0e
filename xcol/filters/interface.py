"""The one interface that every part of the path has: a linear filter of the signal in time.

For a chain of filters the delays, variances and third central moments add, and the transfer
functions multiply (their product is the Fourier transform of the peak's shape). The transfer
function is H(ω) = ∫ E(t) exp(−iωt) dt of the residence time distribution E, so that at ω = 0

    i·dH/dω = delay,   −d² ln H/dω² = variance,   Im d³ ln H/dω³ = third central moment.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Protocol

import numpy as np

if TYPE_CHECKING:
    import numpy.typing as npt

    Real = float | npt.NDArray[np.float64]
    Complex = npt.NDArray[np.complex128]


class Filter(Protocol):
    """What a part does to the signal.

    Parameters are floats or arrays that broadcast to a shape S; so do the results (a moment that an
    array parameter does not enter may come without its axes).
    """

    def delay(self) -> Real:
        """Mean delay [s], shape S."""
        ...

    def variance(self) -> Real:
        """Variance in time [s²], shape S."""
        ...

    def third_moment(self) -> Real:
        """Third central moment in time [s³], shape S."""
        ...

    def transfer(self, omega: Real) -> Complex:
        """Transfer function H(ω) [-] at the angular frequencies ``omega`` [rad/s], S + omega.shape."""
        ...


def outer(parameter: Real, omega: Real) -> npt.NDArray[np.float64]:
    """Return ``parameter·omega`` for every pair; shape parameter.shape + omega.shape."""
    return np.asarray(np.multiply.outer(parameter, omega), dtype=np.float64)


def widen(parameter: Real, omega: Real) -> npt.NDArray[np.float64]:
    """Give ``parameter`` one trailing axis for each axis of ``omega``, so that both broadcast."""
    values = np.asarray(parameter, dtype=np.float64)
    return values.reshape(values.shape + (1,) * np.ndim(omega))


def gaussian_transfer(delay: Real, variance: Real, omega: Real) -> Complex:
    """Transfer function of a Gaussian of this delay [s] and variance [s²]."""
    square = np.asarray(omega, dtype=np.float64) ** 2
    result: Complex = np.exp(-1j * outer(delay, omega) - outer(variance, square) / 2)
    return result
