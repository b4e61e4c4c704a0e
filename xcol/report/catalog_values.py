"""What is shown of a catalog row: its values by key, each with its unit."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

from xcol.catalog_kinds import PACKINGS, WATER_FORMULA
from xcol.catalog_records import (
    CellFormat,
    ColumnFormat,
    InstrumentClass,
    Material,
    Mixture,
    Packing,
    Record,
    Solute,
    Solvent,
    Tubing,
)
from xcol.liquids.mobile_phase import Component, MobilePhase
from xcol.liquids.viscosity import ROOM
from xcol.units import significant

if TYPE_CHECKING:
    from xcol.catalogs import Catalogs

TO = " to "

Value = float | str | tuple[str, ...] | tuple[float, ...] | None


@dataclass(frozen=True)
class Shown:
    """One value of a row, with its unit in the ``label``; ``header`` is its column in a table, "" for none.

    Several numbers are joined by ``between``.
    """

    label: str
    value: Value
    header: str = ""
    digits: int = 4
    between: str = ", "

    @property
    def text(self) -> str:
        """The value as it is printed."""
        if self.value is None:
            return "-"
        if isinstance(self.value, tuple):
            words = [one if isinstance(one, str) else significant(one, 6) for one in self.value]
            return self.between.join(dict.fromkeys(words) if self.between == TO else words)
        return significant(self.value, self.digits) if isinstance(self.value, float) else self.value


Values = dict[str, Shown]  # by key, which has the unit


def _solvent(row: Solvent, catalogs: Catalogs) -> Values:
    alone = MobilePhase((Component(row, 1.0),))
    return {
        "molar_mass_g_mol": Shown("molar mass, g/mol", row.molar_mass * 1e3, "g/mol"),
        "density_25degC_kg_m3": Shown("density at 25 °C, kg/m³", row.density, "kg/m³, 25 °C"),
        "expansion_per_K": Shown("its fall, 1/K", row.expansion),
        "viscosity_25degC_mPa_s": Shown("viscosity at 25 °C, mPa s", alone.viscosity(ROOM).value * 1e3, "mPa s, 25 °C"),
        "viscosity_fit": Shown("A, B, C of ln(η/mPa s) = A + B (1000/T) + C (1000/T)²", row.viscosity or WATER_FORMULA),
        "uncertainty_percent": Shown("its uncertainty, ±%", 100 * row.uncertainty, "±%"),
        "fitted_degC": Shown("fitted over, °C", _degrees(row.span), between=TO),
        "association": Shown("association ψ of Wilke and Chang", row.association),
        "mixes_with_water": Shown("mixes with water in all parts", "yes" if row.mixes_with_water else "no"),
    }


def _mixture(row: Mixture, catalogs: Catalogs) -> Values:
    return {
        "excess": Shown("a, b, c, e of the excess", row.excess),
        "heat": Shown("d, of its temperature term", row.heat),
        "fitted_degC": Shown("fitted over, °C", _degrees(row.span), "°C", between=TO),
        "uncertainty_percent": Shown("uncertainty there, ±%", 100 * row.uncertainty, "±%"),
        "far_degC": Shown("far outside, °C", row.far - 273.15, "far, °C"),
        "uncertainty_far_percent": Shown("uncertainty there, ±%", 100 * row.uncertainty_far, "±%, far"),
    }


def _solute(row: Solute, catalogs: Catalogs) -> Values:
    return {
        "formula": Shown("formula", row.formula or None),
        "molecule": Shown("molecule", row.molecule, "molecule"),
        "molar_mass_g_mol": Shown("molar mass, g/mol", _times(row.molar_mass, 1e3), "g/mol"),
        "molar_volume_cm3_mol": Shown("molar volume (Le Bas), cm³/mol", _times(row.molar_volume, 1e6), "cm³/mol"),
        "diffusion_in_water_m2_s": Shown("D in water, m²/s", row.diffusion, "D, m²/s"),
        "at_degC": Shown("at, °C", None if row.at is None else row.at - 273.15, "at °C"),
    }


def _packing(row: Packing, catalogs: Catalogs) -> Values:
    return {
        "total_porosity": Shown("total porosity", row.total_porosity, "total"),
        "total_porosity_range": Shown("its usual range", row.total_range, "range", between=TO),
        "interstitial_porosity": Shown("interstitial porosity", row.interstitial_porosity, "bed"),
        "interstitial_porosity_range": Shown("its usual range", row.interstitial_range, "range ", between=TO),
        "knox": Shown("A, B, C of h = A ν^1/3 + B/ν + C ν", row.knox, "A, B, C"),
        "knox_best": Shown("at best", row.knox_best),
        "knox_worst": Shown("at worst", row.knox_worst),
        "velocity": Shown("velocity of ν", _VELOCITY[row.velocity] if row.knox else None),
    }


def _column(row: ColumnFormat, catalogs: Catalogs) -> Values:
    packing = catalogs.find(PACKINGS, row.packing)
    total = row.total_porosity or (packing.total_porosity if packing else None)
    return {
        "bore_mm": Shown("bore, mm", row.bore * 1e3),
        "length_mm": Shown("length, mm", row.length * 1e3),
        "particle_um": Shown("particle, µm", row.particle * 1e6),
        "packing": Shown("packing", row.packing),
        "total_porosity": Shown("total porosity", total, "total"),
        "interstitial_porosity": Shown(
            "interstitial porosity", packing.interstitial_porosity if packing else None, "bed"
        ),
        "knox": Shown("A, B, C of h = A ν^1/3 + B/ν + C ν", packing.knox if packing else None, "A, B, C"),
        "velocity": Shown("velocity of ν", _VELOCITY[packing.velocity] if packing and packing.knox else None),
        "curve_source": Shown("source of porosities and curve", packing.source if packing else None),
        "plates": Shown("plates", row.plates),
        "plates_at_mL_min": Shown("at a flow of, mL/min", _times(row.plates_at, 60e6)),
        "max_pressure_bar": Shown("pressure limit, bar", _times(row.max_pressure, 1e-5)),
    }


def _tubing(row: Tubing, catalogs: Catalogs) -> Values:
    return {
        "bore_mm": Shown("bore, mm", row.bore * 1e3),
        "bore_in": Shown("bore, in", row.reel_inches or row.bore / 0.0254, "in", 3),
        "volume_uL_per_cm": Shown("volume, µL/cm", math.pi / 4 * row.bore**2 * 1e7, "µL/cm", 3),
        "tolerance_percent": Shown("tolerance of the bore, ±%", 100 * row.tolerance, "±%"),
        "tolerance_from": Shown("which is", row.tolerance_from, "which is"),
        "materials": Shown("materials", row.materials, "materials"),
    }


def _material(row: Material, catalogs: Catalogs) -> Values:
    return {
        "avoid": Shown("keep away from", row.avoid or None, "keep away from"),
        "caution": Shown("caution", row.caution),
    }


def _cell_format(row: CellFormat, catalogs: Catalogs) -> Values:
    return {
        "volume_uL": Shown("volume, µL", row.volume * 1e9, "µL"),
        "path_length_mm": Shown("optical path, mm", _times(row.path_length, 1e3), "path, mm"),
        "max_pressure_bar": Shown("pressure limit, bar", _times(row.max_pressure, 1e-5)),
    }


def _instrument(row: InstrumentClass, catalogs: Catalogs) -> Values:
    low, high = row.variance
    return {
        "variance_uL2": Shown("variance, µL²", (low * 1e18, high * 1e18), "µL²", between=TO),
        "convention": Shown("stated as", row.convention, "stated as"),
        "conditions": Shown("conditions", row.conditions),
    }


_VELOCITY = {"hold-up": "u = L/t0 (hold-up)", "interstitial": "interstitial"}


def _degrees(span: tuple[float, float]) -> tuple[float, float]:
    return round(span[0] - 273.15, 6), round(span[1] - 273.15, 6)


def _times(value: float | None, factor: float) -> float | None:
    return None if value is None else value * factor


VALUES: dict[type[Record], Callable[[Any, Catalogs], Values]] = {
    Solvent: _solvent,
    Mixture: _mixture,
    Solute: _solute,
    Packing: _packing,
    ColumnFormat: _column,
    Tubing: _tubing,
    Material: _material,
    CellFormat: _cell_format,
    InstrumentClass: _instrument,
}
