"""A mobile phase: liquids in volume parts, and what follows of viscosity, density and ψM."""

from __future__ import annotations

from dataclasses import dataclass, field
from itertools import combinations
from typing import TYPE_CHECKING

from xcol.liquids.density import organic_density, water_density
from xcol.liquids.estimate import Estimate
from xcol.liquids.viscosity import ROOM, excess_with_water, mixed_viscosity, organic_viscosity, water_viscosity

if TYPE_CHECKING:
    from collections.abc import Mapping

    from xcol.catalog_records import Mixture, Solvent, Span
    from xcol.liquids.viscosity import Real

# Relative uncertainty of mixing by rule: organic liquids; water with a liquid that nobody measured with it.
MIXED_ORGANICS = 0.20
MIXED_WITH_WATER = 0.50
FAR = 40.0  # K outside the fitted range: beyond, nothing is computed
# Compilations part by some 0.1 % for each kelvin from 25 °C, extrapolation by some 0.25 % for each beyond a fit.
APART_PER_KELVIN, BEYOND_PER_KELVIN = 0.001, 0.0025


@dataclass(frozen=True)
class Component:
    """One liquid with its ``fraction`` by volume before mixing."""

    solvent: Solvent
    fraction: float


@dataclass(frozen=True)
class MobilePhase:
    """Liquids in volume parts; ``excesses`` by the name of the liquid that is mixed with water.

    ``dissolved`` is the relative doubt that what is dissolved in it adds to the viscosity.
    """

    components: tuple[Component, ...]
    excesses: Mapping[str, Mixture] = field(default_factory=dict)
    dissolved: float = 0.0

    @property
    def name(self) -> str:
        """Name with volume parts, 'acetonitrile/water 60:40'."""
        names = "/".join(component.solvent.name for component in self.components)
        parts = ":".join(f"{100 * component.fraction:.4g}" for component in self.components)
        return f"{names} {parts}" if len(self.components) > 1 else names

    @property
    def is_water(self) -> bool:
        """Whether it is water alone."""
        return all(component.solvent.is_water for component in self.components)

    @property
    def organic_fraction(self) -> float:
        """Volume fraction of all that is not water."""
        return sum(component.fraction for component in self.components if not component.solvent.is_water)

    def viscosity(self, temperature: float) -> Estimate:
        """Viscosity at this temperature [K], with its uncertainty and the rule that gave it."""
        value = float(self.viscosity_at(temperature))
        return Estimate(value, self._uncertainty(temperature), f"{self.name} at {temperature - 273.15:.4g} °C")

    def viscosity_at(self, temperature: Real) -> Real:
        """Viscosity [Pa s] at ``temperature`` [K], a float or an array.

        Logarithmic by volume fraction, with the measured excess of pairs with water; a pair that nobody
        measured has the mean of the measured ones. Of three and more liquids a pair's excess counts at its
        own composition, times (φ_i + φ_j)² (Kohler 1960, from memory).
        """
        viscosities = [_viscosity(component.solvent, temperature) for component in self.components]
        excess: Real = 0.0
        for organic, water, mixture in self._pairs():
            both = organic.fraction + water.fraction
            known = [mixture] if mixture is not None else list(self.excesses.values())
            for row in known:
                pair = excess_with_water(organic.fraction / both, temperature, row.excess, row.heat)
                excess = excess + both**2 * pair / len(known)
        return mixed_viscosity([component.fraction for component in self.components], viscosities, excess)

    def density(self, temperature: float) -> float:
        """Density [kg/m³] at ``temperature`` [K] by volume fraction; the contraction, up to 3 %, is left out."""
        return sum(c.fraction * _density(c.solvent, temperature) for c in self.components)

    def association_mass(self) -> float:
        """Mole-fraction mean of ψM [kg/mol], for Wilke and Chang."""
        moles = [c.fraction * c.solvent.density / c.solvent.molar_mass for c in self.components]
        products = [c.solvent.association * c.solvent.molar_mass for c in self.components]
        return sum(n * product for n, product in zip(moles, products, strict=True)) / sum(moles)

    def outside(self, temperature: float) -> tuple[float, Solvent]:
        """Return by how many kelvin a temperature [K] is outside the fitted range (0: not), and of which liquid."""
        distances = [(_outside(c.solvent.span, temperature), c.solvent) for c in self.components]
        return max(distances, key=lambda pair: pair[0])

    def out_of_reach(self, temperature: float) -> Mixture | None:
        """Return the mixture whose rows do not reach to this temperature [K], None where all do."""
        known = (mixture for _, _, mixture in self._pairs() if mixture is not None)
        return next((row for row in known if _outside(row.span, temperature)), None)

    def unmeasured(self) -> list[Solvent]:
        """Return the liquids of which nothing is known with the water that is in it."""
        return [organic.solvent for organic, _, mixture in self._pairs() if mixture is None]

    def rule(self) -> str:
        """Return how the liquids are mixed, in words; "" for one liquid and for a known pair."""
        unmeasured = self.unmeasured()
        if unmeasured:
            names, known = " and ".join(solvent.name for solvent in unmeasured), ", ".join(self.excesses)
            return (
                "logarithmic mixing by volume fraction, with an excess for "
                f"{names} with water that is the mean of those known (of {known})"
            )
        if len(self.components) == 1 or (len(self.components) == 2 and self._pairs()):
            return ""
        with_pairs = ", with the known excess of each pair with water" if self._pairs() else ""
        return f"logarithmic mixing by volume fraction{with_pairs}"

    def _pairs(self) -> list[tuple[Component, Component, Mixture | None]]:
        """Return the pairs of an organic liquid with water, each with what is known of it."""
        found = []
        for first, second in combinations(self.components, 2):
            for organic, water in ((first, second), (second, first)):
                if water.solvent.is_water and not organic.solvent.is_water:
                    found.append((organic, water, self.excesses.get(organic.solvent.name)))
        return found

    def mixing_doubt(self) -> float:
        """Relative doubt of water with liquids of which nothing is known with it: less where there is little of one."""
        doubt = 0.0
        for organic, water, mixture in self._pairs():
            if mixture is None:
                amount = 8 * organic.fraction * water.fraction  # 1 from 15 to 85 %
                doubt = max(doubt, MIXED_WITH_WATER * min(amount, 1.0))
        return doubt

    def _uncertainty(self, temperature: float) -> float:
        pure = max(_of_liquid(component.solvent, temperature) for component in self.components)
        if len(self.components) == 1:
            return pure + self.dissolved
        beyond = BEYOND_PER_KELVIN * self.outside(temperature)[0]
        pairs = self._pairs()
        known = [_of_mixture(mixture, temperature) for _, _, mixture in pairs if mixture is not None]
        if len(known) < len(pairs):
            known.append(max(self.mixing_doubt(), pure))
        elif not pairs or len(self.components) > 2:
            known.append(MIXED_ORGANICS)
        return max(known) + beyond + self.dissolved


def _viscosity(solvent: Solvent, temperature: Real) -> Real:
    if solvent.viscosity is None:
        return water_viscosity(temperature)
    return organic_viscosity(temperature, solvent.viscosity)


def _density(solvent: Solvent, temperature: float) -> float:
    if solvent.is_water:
        return float(water_density(temperature))
    return float(organic_density(temperature, solvent.density, solvent.expansion))


def _outside(span: Span, temperature: float) -> float:
    """Return by how many kelvin a temperature [K] is outside a span, 0 where it is not."""
    return max(span[0] - temperature, temperature - span[1], 0.0)


def _of_liquid(solvent: Solvent, temperature: float) -> float:
    """Return a liquid's uncertainty: more away from room temperature (but for water's formula) and beyond the fit."""
    apart = 0.0 if solvent.viscosity is None else APART_PER_KELVIN * abs(temperature - ROOM)
    return solvent.uncertainty + apart + BEYOND_PER_KELVIN * _outside(solvent.span, temperature)


def _of_mixture(mixture: Mixture, temperature: float) -> float:
    """Return a mixture's uncertainty: that of the fit within its span, rising to the far one outside."""
    share = min(_outside(mixture.span, temperature) / (mixture.far - mixture.span[1]), 1.0)
    return mixture.uncertainty + share * (mixture.uncertainty_far - mixture.uncertainty)
