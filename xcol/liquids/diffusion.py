"""Diffusion coefficients in liquids: correlations by author, and one function that chooses.

Numbers are SI floats or arrays, which broadcast. The uncertainties come from comparing the methods
with measured values (catalogs/solutes.toml); a test makes the comparison again.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.liquids.estimate import Estimate, together

if TYPE_CHECKING:
    from xcol.liquids.viscosity import Real

# Relative, about 90 %. In water by comparison with measured values; in other liquids and mixtures what
# the literature warns of (Safi et al., J. Chem. Eng. Data 52 (2007) 126 and 977, abstracts read).
SMALL_IN_WATER = 0.20
SMALL_ELSEWHERE = 0.25
GLOBULAR = 0.25
FROM_MASS = 0.08  # more, where the molar volume comes from the molar mass
CATALOG_VALUE = 0.10  # of a handbook-type value from memory, assumed
SWITCH = 0.5  # kg/mol: where the relations for small and for globular molecules meet in water

_VOLUME_PER_MASS = 1.11e-3  # m³/kg


def wilke_chang(temperature: Real, viscosity: Real, molar_volume: Real, association_mass: Real) -> Real:
    """Diffusion coefficient of a small molecule [m²/s].

    D [cm²/s] = 7.4·10⁻⁸ (ψM)^½ T/(η V^0.6): ``temperature`` T [K], ``viscosity`` η of the liquid [Pa s],
    ``molar_volume`` V of the solute at its boiling point [m³/mol], ``association_mass`` ψM of the liquid
    [kg/mol] (ψ 2.26 for water; the mole-fraction mean of a mixture).
    Source: Wilke and Chang, AIChE J. 1 (1955) 264, from memory; ψ of water: Hayduk and Laudie 1974.

    >>> round(wilke_chang(298.15, 0.89e-3, 196e-6, 2.26 * 18.015e-3) * 1e10, 2)  # caffeine in water; 6.5 measured
    6.66
    """
    in_cm2_s = 7.4e-8 * (association_mass * 1e3) ** 0.5 * temperature / (viscosity * 1e3 * (molar_volume * 1e6) ** 0.6)
    return in_cm2_s * 1e-4


def hayduk_laudie(viscosity: Real, molar_volume: Real) -> Real:
    """Diffusion coefficient of a small molecule in water [m²/s], for comparison.

    D [cm²/s] = 13.26·10⁻⁵ η^−1.14 V^−0.589, η mPa s, V cm³/mol; ``viscosity`` [Pa s], ``molar_volume``
    [m³/mol]. Source: Hayduk and Laudie, AIChE J. 20 (1974) 611, from memory.

    >>> round(hayduk_laudie(0.89e-3, 196e-6) * 1e10, 2)
    6.76
    """
    return 13.26e-9 * (viscosity * 1e3) ** -1.14 * (molar_volume * 1e6) ** -0.589


def hayduk_minhas_water(temperature: Real, viscosity: Real, molar_volume: Real) -> Real:
    """Diffusion coefficient of a small molecule in water [m²/s], for comparison.

    D [cm²/s] = 1.25·10⁻⁸ (V^−0.19 − 0.292) T^1.52 η^(9.58/V − 1.12); units as in ``wilke_chang``.
    Source: Hayduk and Minhas, Can. J. Chem. Eng. 60 (1982) 295, from memory. It falls to nothing at
    large V (650 cm³/mol); sucrose comes out 40 % low.

    >>> round(hayduk_minhas_water(298.15, 0.89e-3, 196e-6) * 1e10, 2)
    6.11
    """
    volume = molar_volume * 1e6
    power = 9.58 / volume - 1.12
    return 1.25e-12 * (volume**-0.19 - 0.292) * temperature**1.52 * (viscosity * 1e3) ** power


def young_carroad_bell(temperature: Real, viscosity: Real, molar_mass: Real) -> Real:
    """Diffusion coefficient of a globular protein [m²/s].

    D [cm²/s] = 8.34·10⁻⁸ T/(η M^⅓), η mPa s, M g/mol; ``temperature`` [K], ``viscosity`` [Pa s],
    ``molar_mass`` [kg/mol]. Source: Young, Carroad and Bell, Biotechnol. Bioeng. 22 (1980) 947, from memory.

    >>> round(young_carroad_bell(298.15, 0.89e-3, 14.3) * 1e10, 2)  # lysozyme; 1.12 measured
    1.15
    """
    return 8.34e-12 * temperature / (viscosity * 1e3 * (molar_mass * 1e3) ** (1 / 3))


def molar_volume_of(molar_mass: Real) -> Real:
    """Molar volume at the boiling point [m³/mol] where only the molar mass [kg/mol] is known: 1.11 cm³/g.

    Source: mean of the small molecules of the catalog with Le Bas volumes, which scatter by 12 %.

    >>> round(molar_volume_of(0.194) * 1e6, 1)  # cm³/mol
    215.3
    """
    return _VOLUME_PER_MASS * molar_mass


def small_molecule(
    temperature: float,
    viscosity: Estimate,
    association_mass: float,
    *,
    method: float,
    molar_mass: float,
    molar_volume: float | None,
) -> Estimate:
    """Return the estimate by Wilke and Chang, from the molar volume, or from the molar mass without one.

    ``temperature`` [K], ``viscosity`` [Pa s], ``association_mass`` ψM [kg/mol], ``molar_mass`` [kg/mol],
    ``molar_volume`` [m³/mol]; ``method`` is the relative doubt of the correlation in this liquid.
    """
    if molar_volume is None:
        source, volume, more = mass_in_words(molar_mass), float(molar_volume_of(molar_mass)), FROM_MASS
    else:
        source, volume, more = f"a molar volume of {molar_volume * 1e6:.3g} cm³/mol", molar_volume, 0.0
    value = float(wilke_chang(temperature, viscosity.value, volume, association_mass))
    own = together(method, more)
    return Estimate(value, _with(own, viscosity), f"estimated by Wilke–Chang from {source}")


def globular(temperature: float, viscosity: Estimate, molar_mass: float) -> Estimate:
    """Return the estimate by Young, Carroad and Bell for a folded protein.

    ``temperature`` [K], ``viscosity`` [Pa s], ``molar_mass`` [kg/mol].
    """
    value = float(young_carroad_bell(temperature, viscosity.value, molar_mass))
    return Estimate(
        value,
        _with(GLOBULAR, viscosity),
        f"estimated by Young–Carroad–Bell from {mass_in_words(molar_mass)}, folded",
    )


def scaled(
    known: Estimate, temperature: float, viscosity: Estimate, *, at: float, viscosity_there: Estimate, rule: float
) -> Estimate:
    """Return a known coefficient at other conditions, D·η/T = constant.

    ``known`` [m²/s] holds at the temperature ``at`` [K] in a liquid of ``viscosity_there`` [Pa s]; wanted
    is it at ``temperature`` [K] in a liquid of ``viscosity`` [Pa s]. ``rule`` is the relative doubt of the
    rule itself: 0 in the same liquid, ``SMALL_ELSEWHERE`` in another. At the same conditions D stays as it is.

    >>> there = Estimate(1e-3, 0.0, "")
    >>> scaled(Estimate(1e-9, 0.05, "x"), 300, Estimate(5e-4, 0.0, ""), at=300, viscosity_there=there, rule=0.0)
    Estimate(value=2e-09, uncertainty=0.05, origin='x', entered=False)
    """
    if not rule and at == temperature and viscosity == viscosity_there:
        return known
    value = known.value * (temperature / viscosity.value) / (at / viscosity_there.value)
    doubt = together(known.uncertainty, rule, viscosity.uncertainty, viscosity_there.uncertainty)
    return Estimate(value, doubt, known.origin)


def mass_in_words(molar_mass: float) -> str:
    """Return a molar mass [kg/mol] as people say it.

    >>> mass_in_words(0.19419), mass_in_words(5.8), mass_in_words(150.0)
    ('194 g/mol', '5800 g/mol', '150 kg/mol')
    """
    if molar_mass >= 10:
        return f"{molar_mass:.3g} kg/mol"
    return f"{molar_mass * 1e3:.3g} g/mol" if molar_mass < 1 else f"{molar_mass * 1e3:.0f} g/mol"


def _with(own: float, viscosity: Estimate) -> float:
    """Add the viscosity's uncertainty where it is more than the method's own comparison held."""
    return together(own, viscosity.uncertainty) if viscosity.uncertainty > 0.05 else own
