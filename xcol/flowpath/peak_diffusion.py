"""A peak's diffusion coefficient: entered, known at other conditions, of a named solute, or from a molar mass."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.catalogs import SOLUTES
from xcol.flowpath.composition import water_of
from xcol.flowpath.conditions import ROOM, Conditions, check_range, composition_of
from xcol.liquids.diffusion import MEASURED, SWITCH, globular, mass_in_words, scaled, small_molecule
from xcol.liquids.estimate import Estimate, as_entered
from xcol.units import significant

if TYPE_CHECKING:
    from xcol.catalog_records import Solute
    from xcol.flowpath.findings import Draft

WAYS = ("diffusion", "solute", "molar_mass")
LARGEST_SMALL = 2.0  # kg/mol: above, Wilke and Chang is far too low
SMALLEST_PROTEIN = 5.0  # kg/mol
MOST_ORGANIC = 0.3  # volume fraction in which a protein may stay folded
# What is taken of a peak that says nothing: a small molecule, and how far D is off from half to twice the mass.
TYPICAL_MASS, TYPICAL_UNCERTAINTY = 0.300, 0.50

_BY_HAND = 'diffusion = "1.0e-9 m^2/s" (small molecules in water: 0.5 to 1.5e-9)'


def typical(conditions: Conditions) -> Estimate | None:
    """Return what is taken of a solute of which nothing is said; None without a mobile phase."""
    if conditions.phase is None or conditions.viscosity is None:
        return None
    found = _small(conditions, conditions.viscosity, None, TYPICAL_MASS)
    text = f"assumed: a small molecule of {mass_in_words(TYPICAL_MASS)} (half to twice of it), by Wilke–Chang"
    return Estimate(found.value, max(TYPICAL_UNCERTAINTY, found.uncertainty), text)


def peak_diffusion(draft: Draft, conditions: Conditions) -> Estimate | None:
    """Return the coefficient that a peak's own keys give; None where they give none, or are at fault."""
    given = [key for key in WAYS if key in draft.written]
    if len(given) > 1:
        draft.fault(given[1], "one of diffusion, solute and molar_mass", "leave the others out", " and ".join(given))
        return None
    for key, owner in (("molecule", "molar_mass"), ("at", "diffusion")):
        if key in draft.written and owner not in given:
            draft.fault(key, f"{owner} with it", "leave it out")
            return None
    if "solute" in draft.values:
        return _of_solute(draft, conditions)
    if "molar_mass" in draft.values:
        return _of_mass(draft, conditions)
    value = draft.number("diffusion")
    if value is None:
        return None
    return _known_elsewhere(draft, value, conditions) if "at" in draft.inner else as_entered(value)


def _of_solute(draft: Draft, conditions: Conditions) -> Estimate | None:
    name = draft.text("solute") or ""
    row = draft.catalogs.find(SOLUTES, name)
    if row is None:
        near = draft.catalogs.near(SOLUTES, name)
        draft.fault(
            "solute",
            "a solute of the catalog (xcol catalog solutes lists them), or one of a catalog of your own",
            f'solute = "{near}"' if near else 'molar_mass = "350 g/mol" in its place, or diffusion',
        )
        return None
    if row.molecule == "globular":
        _warn_of_unfolding(draft, row.molar_mass or 0.0, conditions)
    if row.diffusion is not None and row.at is not None:
        return _of_measured(draft, row, row.diffusion, row.at, conditions)
    if row.molecule not in ("small", "globular"):
        _refuse_chain(draft, "solute")
        return None
    if row.molar_mass is None:
        return None
    if row.molecule == "globular":
        return _folded(draft, "solute", row.molar_mass, conditions)
    return _of_small(draft, "solute", row.molar_volume, row.molar_mass, conditions)


def _of_measured(draft: Draft, row: Solute, value: float, at: float, conditions: Conditions) -> Estimate | None:
    """Return the measured value in water, scaled to the mobile phase."""
    here = _viscosity(draft, "solute", conditions)
    water = water_of(draft.catalogs)
    if here is None:
        return None
    there = water.viscosity(at)
    temperature = conditions.temperature or ROOM
    in_water = conditions.phase is not None and conditions.phase.is_water
    origin = f"measured in water at {at - 273.15:.4g} °C"
    if not in_water or temperature != at or conditions.entered is not None:
        origin += f", scaled with T/η to {_where(conditions)}"
    known = Estimate(value, MEASURED, origin)
    found = scaled(known, temperature, here, at=at, viscosity_there=there, same_liquid=in_water)
    return found


def _of_mass(draft: Draft, conditions: Conditions) -> Estimate | None:
    mass, molecule = draft.number("molar_mass") or 0.0, draft.text("molecule")
    if molecule == "chain":
        _refuse_chain(draft, "molecule")
        return None
    if molecule is None:
        molecule = "small" if mass < SWITCH else "globular"
        if molecule == "globular":
            draft.assume(
                "large molecules folded",
                f"{mass_in_words(mass)} read as a folded (globular) molecule, being above {mass_in_words(SWITCH)}: "
                'molecule = "small" for a compact drug; a chain (polymer, unfolded protein) needs its diffusion',
            )
    elif molecule == "small" and mass > LARGEST_SMALL:
        draft.warn(f'molecule = "small" with {mass_in_words(mass)}: the estimate for small molecules is too low for it')
    elif molecule == "globular" and mass < SWITCH:
        draft.warn(f'molecule = "globular" with {mass_in_words(mass)}: is the unit meant?')
    if molecule == "globular":
        _warn_of_unfolding(draft, mass, conditions)
        return _folded(draft, "molar_mass", mass, conditions)
    return _of_small(draft, "molar_mass", None, mass, conditions)


def _folded(draft: Draft, key: str, mass: float, conditions: Conditions) -> Estimate | None:
    viscosity = _viscosity(draft, key, conditions)
    if viscosity is None:
        return None
    return globular(conditions.temperature or ROOM, viscosity, mass)


def _warn_of_unfolding(draft: Draft, mass: float, conditions: Conditions) -> None:
    phase = conditions.phase
    organic = sum(c.fraction for c in phase.components if c.solvent.viscosity is not None) if phase else 0.0
    if organic > MOST_ORGANIC and mass > SMALLEST_PROTEIN:
        draft.warn(
            f"a protein may unfold in {100 * organic:.3g} % of organic liquid, and then diffuses more slowly than "
            "stated"
        )


def _of_small(draft: Draft, key: str, volume: float | None, mass: float, conditions: Conditions) -> Estimate | None:
    viscosity = _viscosity(draft, key, conditions)
    if viscosity is None:
        return None
    if conditions.phase is None:
        draft.fault(key, "mobile_phase beside it: the estimate needs the liquid, not its viscosity alone", _BY_HAND)
        return None
    return _small(conditions, viscosity, volume, mass)


def _small(conditions: Conditions, viscosity: Estimate, volume: float | None, mass: float) -> Estimate:
    phase = conditions.phase
    if phase is None:
        raise LookupError("mobile_phase")
    return small_molecule(
        conditions.temperature or ROOM,
        viscosity,
        phase.association_mass(),
        in_water=phase.is_water,
        molar_mass=mass,
        molar_volume=volume,
    )


def _known_elsewhere(draft: Draft, value: float, conditions: Conditions) -> Estimate | None:
    """Scale a coefficient that was entered with the conditions at which it is known."""
    inner = draft.inner["at"]
    here = _viscosity(draft, "at", conditions)
    composition = composition_of(inner)
    if here is None or inner.has_fault:
        return None
    there_phase = composition.phase if composition else conditions.phase
    at = inner.number("temperature")
    if at is None:
        at = conditions.temperature or ROOM
    if not inner.values:
        draft.fault("at", "its temperature, its mobile_phase, or both", 'at = { temperature = "25 degC" }')
        return None
    there = Conditions(there_phase, inner.number("viscosity"), at, None)
    if there.viscosity is None:
        expected = "the liquid in which it is known: mobile_phase, or viscosity"
        draft.fault("at", expected, 'at = { mobile_phase = "water", temperature = "25 degC" }')
        return None
    same = there_phase is not None and conditions.phase is not None and there_phase == conditions.phase
    if (
        there.phase is not None
        and there.entered is None
        and not check_range(there.phase, at, draft.place("at"), draft.findings)
    ):
        return None
    origin = f"{significant(value)} m²/s as entered, in {_where(there)}, scaled with T/η to {_where(conditions)}"
    known = Estimate(value, 0.0, origin)
    temperature = conditions.temperature or ROOM
    found = scaled(known, temperature, here, at=at, viscosity_there=there.viscosity, same_liquid=same)
    return found


def _viscosity(draft: Draft, key: str, conditions: Conditions) -> Estimate | None:
    """Return the viscosity at the columns; a fault at the key without one."""
    if conditions.viscosity is None:
        draft.fault(
            key,
            "mobile_phase at the top of the file: the solute's diffusion hangs on the liquid",
            'mobile_phase = "acetonitrile/water 60:40", or diffusion in place of this key',
        )
    return conditions.viscosity


def _refuse_chain(draft: Draft, key: str) -> None:
    draft.fault(
        key,
        "its diffusion coefficient: no relation with a source is known here for chains and rods",
        'diffusion = "5e-11 m^2/s", measured or from the literature, with at = { ... } where it was measured',
    )


def _where(conditions: Conditions) -> str:
    pieces = [conditions.phase.name] if conditions.phase else []
    if conditions.entered is not None:
        pieces.append(f"{significant(conditions.entered * 1e3)} mPa s")
    temperature = conditions.temperature if conditions.temperature is not None else ROOM
    return f"{', '.join(pieces)} at {temperature - 273.15:.4g} °C"
