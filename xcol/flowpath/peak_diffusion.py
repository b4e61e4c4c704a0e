"""A peak's diffusion coefficient: entered, known at other conditions, of a named solute, or from a molar mass."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.catalog_kinds import SOLUTES
from xcol.flowpath.conditions import Conditions, check_range, composition_of, degrees, say_what_was_left_out
from xcol.liquids.diffusion import (
    CATALOG_VALUE,
    SMALL_ELSEWHERE,
    SMALL_IN_WATER,
    SWITCH,
    globular,
    mass_in_words,
    scaled,
    small_molecule,
)
from xcol.liquids.estimate import Estimate, as_entered
from xcol.units import significant

if TYPE_CHECKING:
    from xcol.catalog_records import Solute
    from xcol.flowpath.findings import Draft
    from xcol.liquids.mobile_phase import MobilePhase

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
    found = _small(conditions, conditions.phase, conditions.viscosity, None, TYPICAL_MASS)
    text = f"assumed: a small molecule of {mass_in_words(TYPICAL_MASS)} (half to twice of it), by Wilke–Chang"
    return Estimate(found.value, max(TYPICAL_UNCERTAINTY, found.uncertainty), text)


def is_given(draft: Draft) -> bool:
    """Whether a peak says anything about its diffusion coefficient."""
    return bool({*WAYS, "at", "molecule"} & set(draft.written))


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


def solute_of(draft: Draft) -> Solute | None:
    """Return the catalog's row of the solute that a peak names; a fault where there is none."""
    name = draft.text("solute") or ""
    row = draft.catalogs.find(SOLUTES, name)
    if row is None:
        near = draft.catalogs.near(SOLUTES, name)
        draft.fault(
            "solute",
            "a solute of the catalog (xcol catalog solutes lists them), or one of a catalog of your own",
            f'solute = "{near}"' if near else 'molar_mass = "350 g/mol" in its place, or diffusion',
        )
    return row


def _of_solute(draft: Draft, conditions: Conditions) -> Estimate | None:
    row = solute_of(draft)
    if row is None:
        return None
    molecule = row.molecule or _molecule(row.molar_mass or 0.0)
    if molecule == "globular":
        _warn_of_unfolding(draft, row.molar_mass or 0.0, conditions)
    # the value in water tells little of a liquid without water: there a small molecule is better estimated
    in_water = conditions.phase is None or conditions.phase.organic_fraction < 1
    better = molecule == "small" and not in_water and row.molar_mass is not None
    if row.diffusion is not None and row.at is not None and not better:
        return _of_catalog_value(draft, row.diffusion, row.at, conditions)
    if row.molar_mass is None or molecule not in ("small", "globular"):
        _refuse_chain(draft, "solute")
        return None
    return _by_mass(draft, "solute", molecule, row.molar_volume, row.molar_mass, conditions)


def _of_catalog_value(draft: Draft, value: float, at: float, conditions: Conditions) -> Estimate | None:
    """Return the catalog's value in water, scaled to the mobile phase."""
    here = _viscosity(draft, "solute", conditions)
    if here is None:
        return None
    from xcol.flowpath.composition import water_of  # quick where it is not needed

    there = water_of(draft.catalogs).viscosity(at)
    phase = conditions.phase
    same = phase is not None and phase.is_water and conditions.entered is None
    origin = f"catalog value in water at {degrees(at)}"
    if not same or conditions.reference != at:
        origin += f", scaled with T/η to {_where(conditions)}"
    known = Estimate(value, CATALOG_VALUE, origin)
    rule = 0.0 if phase is not None and phase.is_water else SMALL_ELSEWHERE
    return scaled(known, conditions.reference, here, at=at, viscosity_there=there, rule=rule)


def _of_mass(draft: Draft, conditions: Conditions) -> Estimate | None:
    mass, molecule = draft.number("molar_mass") or 0.0, draft.text("molecule")
    if molecule == "chain":
        _refuse_chain(draft, "molecule")
        return None
    words = mass_in_words(mass)
    if molecule is None:
        molecule = _molecule(mass)
        if molecule == "globular" and conditions.phase is not None and conditions.phase.organic_fraction == 1:
            draft.fault(
                "molar_mass",
                "the molecule beside it: in an organic liquid nothing above 500 g/mol is taken as folded",
                'molecule = "small" for a compact drug; diffusion for a chain (polymer)',
            )
            return None
        if molecule == "globular":
            draft.assume(
                "large molecules folded",
                f"{words} read as a folded (globular) molecule, being above {mass_in_words(SWITCH)}: "
                'molecule = "small" for a compact drug; a chain (polymer, unfolded protein) needs its diffusion',
                leads=True,
            )
    elif molecule == "small" and mass > LARGEST_SMALL:
        draft.warn(f'molecule = "small" with {words}: the estimate for small molecules is too low for it')
    elif molecule == "globular" and mass < SWITCH:
        draft.warn(f'molecule = "globular" with {words}: is the unit meant?')
    if molecule == "globular":
        _warn_of_unfolding(draft, mass, conditions)
    return _by_mass(draft, "molar_mass", molecule, None, mass, conditions)


def _molecule(mass: float) -> str:
    """Return what a molecule of this mass [kg/mol] is taken for, where nobody says."""
    return "small" if mass <= SWITCH else "globular"


def _by_mass(
    draft: Draft, key: str, molecule: str, volume: float | None, mass: float, conditions: Conditions
) -> Estimate | None:
    """Return the estimate for a small or a globular molecule; a fault at the key without a liquid."""
    viscosity = _viscosity(draft, key, conditions)
    if viscosity is None:
        return None
    if molecule == "globular":
        return globular(conditions.reference, viscosity, mass)
    if conditions.phase is None:
        draft.fault(key, "mobile_phase beside it: the estimate needs the liquid, not its viscosity alone", _BY_HAND)
        return None
    return _small(conditions, conditions.phase, viscosity, volume, mass)


def _warn_of_unfolding(draft: Draft, mass: float, conditions: Conditions) -> None:
    organic = conditions.phase.organic_fraction if conditions.phase else 0.0
    if organic > MOST_ORGANIC and mass > SMALLEST_PROTEIN:
        draft.warn(
            f"a protein may unfold in {100 * organic:.3g} % of organic liquid, and then diffuses more slowly than "
            "stated"
        )


def _small(
    conditions: Conditions, phase: MobilePhase, viscosity: Estimate, volume: float | None, mass: float
) -> Estimate:
    return small_molecule(
        conditions.reference,
        viscosity,
        phase.association_mass(),
        method=SMALL_IN_WATER if phase.is_water else SMALL_ELSEWHERE,
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
    example = 'at = { mobile_phase = "water", temperature = "25 degC" }'
    at, viscosity = inner.number("temperature"), inner.number("viscosity")
    if at is None:
        draft.fault("at", "the temperature at which it is known", example, "no temperature in it")
        return None
    phase = None if viscosity is not None else composition.phase if composition else conditions.phase
    there = Conditions(phase, viscosity, at, None)
    if there.viscosity is None:
        draft.fault("at", "the liquid in which it is known: mobile_phase, or viscosity", example)
        return None
    if composition:
        say_what_was_left_out(composition, f"{draft.label}, at", draft.findings)
    if there.phase is not None and not check_range(there.phase, at, draft.place("at"), draft.findings):
        return None
    rule = 0.0 if phase is not None and phase == conditions.phase and conditions.entered is None else SMALL_ELSEWHERE
    origin = f"{significant(value)} m²/s as entered, in {_where(there)}"
    if rule or at != conditions.reference:
        origin += f", scaled with T/η to {_where(conditions)}"
    known = Estimate(value, 0.0, origin)
    return scaled(known, conditions.reference, here, at=at, viscosity_there=there.viscosity, rule=rule)


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
    liquid = conditions.phase.name if conditions.phase else "a liquid"
    if conditions.entered is not None:
        liquid += f" of {significant(conditions.entered * 1e3)} mPa s"
    return f"{liquid} at {degrees(conditions.reference)}"
