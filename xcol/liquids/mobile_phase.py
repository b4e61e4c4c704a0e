"""A mobile phase: liquids in volume parts, and what follows of viscosity, density and ψM."""

from __future__ import annotations

from dataclasses import dataclass, field
from itertools import combinations
from typing import TYPE_CHECKING

from xcol.liquids.density import organic_density, water_density
from xcol.liquids.estimate import Estimate
from xcol.liquids.viscosity import excess_with_water, mixed_viscosity, organic_viscosity, water_viscosity

if TYPE_CHECKING:
    from collections.abc import Mapping

    from xcol.catalog_records import Mixture, Solvent
    from xcol.liquids.viscosity import Real

# Relative uncertainty of logarithmic mixing by volume fraction.
MIXED_ORGANICS = 0.20
MIXED_WITH_WATER = 0.50
FAR = 40.0  # K outside the fitted range: beyond, nothing is computed


@dataclass(frozen=True)
class Component:
    """One liquid with its ``fraction`` by volume before mixing."""

    solvent: Solvent
    fraction: float


@dataclass(frozen=True)
class MobilePhase:
    """Liquids in volume parts; ``excesses`` by the name of the liquid that is mixed with water."""

    components: tuple[Component, ...]
    excesses: Mapping[str, Mixture] = field(default_factory=dict)

    @property
    def name(self) -> str:
        """Name with volume parts, 'acetonitrile/water 60:40'."""
        names = "/".join(component.solvent.name for component in self.components)
        parts = ":".join(f"{100 * component.fraction:.4g}" for component in self.components)
        return f"{names} {parts}" if len(self.components) > 1 else names

    @property
    def is_water(self) -> bool:
        """Whether it is water alone."""
        return all(component.solvent.viscosity is None for component in self.components)

    def viscosity(self, temperature: float) -> Estimate:
        """Viscosity at this temperature [K], with its uncertainty and the rule that gave it."""
        value = float(self.viscosity_at(temperature))
        return Estimate(value, self._uncertainty(temperature), f"{self.name} at {temperature - 273.15:.4g} °C")

    def viscosity_at(self, temperature: Real) -> Real:
        """Viscosity [Pa s] at ``temperature`` [K], a float or an array.

        Logarithmic by volume fraction, with the measured excess of pairs with water; of three and more
        liquids a pair's excess counts at its own composition, times (φ_i + φ_j)² (Kohler 1960, from memory).
        """
        viscosities = [_viscosity(component.solvent, temperature) for component in self.components]
        excess: Real = 0.0
        for organic, water, mixture in self._pairs():
            if mixture is not None:
                both = organic.fraction + water.fraction
                share = organic.fraction / both
                excess = excess + both**2 * excess_with_water(share, temperature, mixture.excess, mixture.heat)
        return mixed_viscosity([component.fraction for component in self.components], viscosities, excess)

    def density(self, temperature: float) -> float:
        """Density [kg/m³] by volume fraction; the contraction on mixing, up to 3 %, is left out."""
        return sum(c.fraction * _density(c.solvent, temperature) for c in self.components)

    def association_mass(self) -> float:
        """Mole-fraction mean of ψM [kg/mol], for Wilke and Chang."""
        moles = [c.fraction * c.solvent.density / c.solvent.molar_mass for c in self.components]
        products = [c.solvent.association * c.solvent.molar_mass for c in self.components]
        return sum(n * product for n, product in zip(moles, products, strict=True)) / sum(moles)

    def outside(self, temperature: float) -> tuple[float, Solvent]:
        """Return by how many kelvin this is outside the fitted range (0: it is not), and of which liquid."""
        distances = [
            (max(c.solvent.span[0] - temperature, temperature - c.solvent.span[1], 0.0), c.solvent)
            for c in self.components
        ]
        return max(distances, key=lambda pair: pair[0])

    def extrapolated(self, temperature: float) -> Mixture | None:
        """Return the mixture whose measured rows do not reach to this temperature, if there is one."""
        known = (mixture for _, _, mixture in self._pairs() if mixture is not None)
        return next((row for row in known if not row.span[0] <= temperature <= row.span[1]), None)

    def rule(self) -> str:
        """Return how the liquids are mixed, in words; "" for one liquid and for a measured pair."""
        if len(self.components) == 1:
            return ""
        unknown = [organic.solvent.name for organic, _, mixture in self._pairs() if mixture is None]
        if unknown:
            return (
                f"logarithmic mixing by volume fraction, and no measured rows for {' and '.join(unknown)} with water: "
                "the true viscosity is likely higher, with an alcohol up to twice as high"
            )
        if len(self.components) == 2 and self._pairs():
            return ""
        with_pairs = ", with the measured excess of each pair with water" if self._pairs() else ""
        return f"logarithmic mixing by volume fraction{with_pairs}"

    def _pairs(self) -> list[tuple[Component, Component, Mixture | None]]:
        """Return the pairs of an organic liquid with water, each with what is known of it."""
        found = []
        for first, second in combinations(self.components, 2):
            for organic, water in ((first, second), (second, first)):
                if water.solvent.viscosity is None and organic.solvent.viscosity is not None:
                    found.append((organic, water, self.excesses.get(organic.solvent.name)))
        return found

    def _uncertainty(self, temperature: float) -> float:
        pure = max(component.solvent.uncertainty for component in self.components)
        if len(self.components) == 1:
            return pure
        pairs = self._pairs()
        if any(mixture is None for _, _, mixture in pairs):
            return MIXED_WITH_WATER
        known = [_uncertainty(mixture, temperature) for _, _, mixture in pairs if mixture is not None]
        return max(known) if len(self.components) == 2 and known else max([MIXED_ORGANICS, *known])


def _viscosity(solvent: Solvent, temperature: Real) -> Real:
    if solvent.viscosity is None:
        return water_viscosity(temperature)
    return organic_viscosity(temperature, solvent.viscosity)


def _density(solvent: Solvent, temperature: float) -> float:
    if solvent.viscosity is None:
        return float(water_density(temperature))
    return float(organic_density(temperature, solvent.density, solvent.expansion))


def _uncertainty(mixture: Mixture, temperature: float) -> float:
    """Return the uncertainty: that of the fit within its span, rising to the far one outside."""
    low, high = mixture.span
    outside = max(low - temperature, temperature - high, 0.0)
    share = min(outside / (mixture.far - high), 1.0)
    return mixture.uncertainty + share * (mixture.uncertainty_far - mixture.uncertainty)
