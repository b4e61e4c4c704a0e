"""Viscosity of water, of pure organic liquids and of mixtures; SI floats or arrays, which broadcast."""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

if TYPE_CHECKING:
    from collections.abc import Sequence

    import numpy.typing as npt

    Real = float | npt.NDArray[np.float64]

_WATER = ((280.68, -1.9), (511.45, -7.7), (61.131, -19.6), (0.45903, -40.0))  # µPa s, power of T/300 K
ROOM = 298.15  # K, 25 °C


def water_viscosity(temperature: Real) -> Real:
    """Viscosity of liquid water at 0.1 MPa [Pa s]; ``temperature`` [K], shape as given.

    η = 280.68 T̃^−1.9 + 511.45 T̃^−7.7 + 61.131 T̃^−19.6 + 0.45903 T̃^−40 µPa s, T̃ = T/300 K, from 253
    to 383 K. At 1000 bar it is 0.3 % higher at 25 °C and 5.5 % at 60 °C, which is left out.
    Source: IAPWS SR6-08(2011).

    >>> round(water_viscosity(298.15) * 1e3, 4)  # mPa s
    0.89
    """
    reduced = temperature / 300.0
    total: Real = 1e-6 * sum(factor * reduced**power for factor, power in _WATER)
    return total


def organic_viscosity(temperature: Real, coefficients: tuple[float, float, float]) -> Real:
    """Viscosity of a pure liquid [Pa s]: ln(η/mPa s) = A + B·(1000/T) + C·(1000/T)².

    ``temperature`` [K]; the coefficients and where they come from stand in the catalog of solvents.

    >>> round(float(organic_viscosity(298.15, (-4.68095, 1.32897, -0.07511))) * 1e3, 4)  # acetonitrile
    0.3435
    """
    a, b, c = coefficients
    inverse = 1000.0 / temperature
    value: Real = 1e-3 * np.exp(a + b * inverse + c * inverse**2)
    return value


def excess_with_water(
    fraction: Real, temperature: Real, excess: tuple[float, float, float, float], heat: float
) -> Real:
    """What a mixture with water has above logarithmic mixing, in ln η [-].

    E = φ(1−φ)·(a + b·u + c·u² + e·u³ + d·θ), u = 2φ−1, θ = 1000/T − 1000/298.15; ``fraction`` φ of the
    organic liquid by volume before mixing, ``temperature`` [K], ``excess`` (a, b, c, e), ``heat`` d.
    The coefficients, their source and their range stand in the catalog of mixtures.

    >>> round(excess_with_water(0.5, 298.15, (3.1986, 0.3076, 0.5399, 0.5763), 3.2328), 5)
    0.79965
    """
    a, b, c, e = excess
    u = 2 * fraction - 1
    theta = 1000.0 / temperature - 1000.0 / ROOM
    return fraction * (1 - fraction) * (a + b * u + c * u**2 + e * u**3 + heat * theta)


def mixed_viscosity(fractions: Sequence[Real], viscosities: Sequence[Real], excess: Real = 0.0) -> Real:
    """Viscosity of a mixture [Pa s]: ln η = Σ φ_i ln η_i + excess, fractions by volume before mixing.

    Source: logarithmic mixing (Arrhenius 1887, from memory), by volume fraction.

    >>> round(float(mixed_viscosity([0.5, 0.5], [1e-3, 4e-3])) * 1e3, 6)
    2.0
    """
    total = sum(fraction * np.log(viscosity) for fraction, viscosity in zip(fractions, viscosities, strict=True))
    value: Real = np.exp(total + excess)
    return value
