"""Density of water and of organic liquids; SI floats or arrays, which broadcast."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.liquids.viscosity import ROOM

if TYPE_CHECKING:
    from xcol.liquids.viscosity import Real

_KELL = (999.83952, 16.945176, -7.9870401e-3, -46.170461e-6, 105.56302e-9, -280.54253e-12)


def water_density(temperature: Real) -> Real:
    """Density of water at 0.1 MPa [kg/m³]; ``temperature`` [K], 0 to 150 °C.

    ρ = (a₀ + a₁t + ... + a₅t⁵)/(1 + 16.879850e-3 t), t in °C. Source: Kell, J. Chem. Eng. Data 20 (1975)
    97, from memory.

    >>> round(water_density(298.15), 1)
    997.0
    """
    t = temperature - 273.15
    total: Real = sum(factor * t**power for power, factor in enumerate(_KELL))
    return total / (1 + 16.879850e-3 * t)


def organic_density(temperature: Real, at_25: float, expansion: float) -> Real:
    """Density of a liquid [kg/m³], ρ₂₅·(1 − β·(T − 298.15 K)).

    ``temperature`` [K], ``at_25`` density at 25 °C [kg/m³], ``expansion`` β [1/K].

    >>> round(organic_density(333.15, 776.8, 1.41e-3), 1)  # acetonitrile at 60 °C
    738.5
    """
    return at_25 * (1 - expansion * (temperature - ROOM))
