"""What the catalogs hold: kinds, and the rows of one that have a word in them, with their sources."""

from __future__ import annotations

import csv
import io
import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

from xcol import __version__
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
from xcol.catalogs import KINDS, PACKINGS, Catalogs, Kind, normal
from xcol.errors import Place, refusal
from xcol.flowpath.keys import nearest
from xcol.liquids.mobile_phase import Component, MobilePhase
from xcol.report.budget_record import spreadsheet_cell
from xcol.report.sheet import Grid, markdown
from xcol.units import quote, significant

if TYPE_CHECKING:
    from collections.abc import Iterable

    from xcol.report.sheet import Sheet

SCHEMA = "xcol.catalog/1"
FEW_ROWS = 3  # so many are shown in full
_ROOM = 298.15  # K, of the figures that are shown of a liquid

Value = float | str | tuple[str, ...] | None


@dataclass(frozen=True)
class Listing:
    """The rows of one kind that were asked for, with what is known as a whole (for what rows refer to)."""

    kind: Kind[Any]
    rows: tuple[Record, ...]
    catalogs: Catalogs


def find(catalogs: Catalogs, kind: str | None, word: str | None) -> tuple[Listing, ...]:
    """Return the rows of a kind with a word in name, other names, or what they say; of all kinds without one.

    A first word that is no kind is looked for in all of them. Raises ``InputError`` where nothing is found.
    """
    chosen = KINDS
    if kind is not None:
        named = [one for one in KINDS if normal(kind) in (one.name, one.table)]
        if not named and word is not None:
            names = tuple(one.name for one in KINDS)
            near = nearest(kind.lower(), names)
            raise refusal(Place(key="KIND"), quote(kind), f"one of {', '.join(names)}", near or "xcol catalog")
        if named:
            chosen = tuple(named)
        else:
            word = kind
    found = tuple(Listing(one, _matching(catalogs, one, word), catalogs) for one in chosen)
    found = tuple(listing for listing in found if listing.rows)
    if not found:
        near = next((near for one in chosen if (near := catalogs.near(one, word or ""))), "")
        where = f"rows of {chosen[0].name} that have it" if len(chosen) == 1 else "a kind, or a word of some row"
        raise refusal(Place(key="WORD"), quote(word or ""), where, near or "xcol catalog, for the kinds")
    return found


def _matching(catalogs: Catalogs, kind: Kind[Any], word: str | None) -> tuple[Record, ...]:
    rows: tuple[Record, ...] = catalogs.rows(kind)
    if word is None:
        return rows
    asked = normal(word)
    exact = tuple(row for row in rows if asked in map(normal, (row.name, *row.also)))
    return exact or tuple(row for row in rows if asked in normal(" ".join((row.name, *row.also, *_words(row)))))


def _words(row: Record) -> list[str]:
    """Return the texts of a row that a word is looked for in; sources are none of them."""
    values = {name: value for name, value in vars(row).items() if name not in ("source", "file", "tolerance_from")}
    texts: list[str] = [value for value in values.values() if isinstance(value, str)]
    return texts + [
        text for value in values.values() if isinstance(value, tuple) for text in value if isinstance(text, str)
    ]


def kinds_text(catalogs: Catalogs, sheet: Sheet) -> None:
    """Write the kinds, and how many rows each has."""
    sheet.line("Catalogs: xcol catalog KIND [WORD]", "bold")
    rows = tuple((kind.name, str(len(catalogs.rows(kind))), kind.meaning) for kind in KINDS)
    sheet.grid(Grid(("kind", "rows", ""), rows, (False, True, False)), indent=2, flexible=2)


def listings_text(listings: tuple[Listing, ...], sheet: Sheet) -> None:
    """Write a few rows in full, more of them as tables, with the sources below by letter."""
    in_full = sum(len(listing.rows) for listing in listings) <= FEW_ROWS
    for number, listing in enumerate(listings):
        if number:
            sheet.line()
        sheet.line(f"{listing.kind.name}: {listing.kind.meaning}", "bold")
        if in_full:
            for row in listing.rows:
                _row_text(row, listing.catalogs, sheet)
            continue
        marks = _marks(listing.rows)
        grid = _grid(listing, [marks[_source(row)] for row in listing.rows])
        widest = max(range(1, len(grid.headers)), key=lambda n: max(len(line[n]) for line in grid.rows))
        sheet.grid(grid, indent=2, flexible=widest)
        for source, mark in marks.items():
            sheet.line(f"[{mark}] {source}", indent=2, hang=4)
    if not in_full:
        sheet.line("All of a row: xcol catalog KIND NAME", "dim")


def _row_text(row: Record, catalogs: Catalogs, sheet: Sheet) -> None:
    sheet.line(row.name, "bold", indent=2)
    if row.also:
        sheet.line(f"also: {', '.join(row.also)}", indent=4, hang=2)
    for shown in _VALUES[type(row)](row, catalogs).values():
        if shown.value is not None:
            sheet.line(f"{shown.label}: {shown.text}", indent=4, hang=2)
    sheet.line(f"source: {_source(row)}", indent=4, hang=2)


def listings_markdown(listings: tuple[Listing, ...]) -> str:
    """Return the rows in Markdown, the source in each."""
    pieces = []
    for listing in listings:
        pieces += [f"# {listing.kind.name}: {listing.kind.meaning}\n"]
        pieces += [markdown(_grid(listing, [_source(row) for row in listing.rows]))]
    return "\n".join(pieces)


def listings_record(listings: Iterable[Listing]) -> dict[str, Any]:
    """Return the rows as one JSON object; units stand in the key names."""
    return {
        "schema": SCHEMA,
        "version": __version__,
        "catalogs": [
            {
                "kind": listing.kind.name,
                "meaning": listing.kind.meaning,
                "rows": [_record(row, listing.catalogs) for row in listing.rows],
            }
            for listing in listings
        ],
    }


def listings_csv(listings: Iterable[Listing]) -> str:
    """Return one line for each value of each row, as CSV: kinds have different columns."""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(("kind", "name", "key", "value"))
    for listing in listings:
        for row in listing.rows:
            record = _record(row, listing.catalogs)
            for key, value in record.items():
                if key != "name" and value not in (None, [], ""):
                    shown = "; ".join(map(str, value)) if isinstance(value, list) else value
                    writer.writerow((listing.kind.name, spreadsheet_cell(row.name), key, spreadsheet_cell(shown)))
    return out.getvalue()


def _record(row: Record, catalogs: Catalogs) -> dict[str, Any]:
    values = {key: shown.value for key, shown in _VALUES[type(row)](row, catalogs).items()}
    listed = {key: list(value) if isinstance(value, tuple) else value for key, value in values.items()}
    return {"name": row.name, "also": list(row.also)} | listed | {"source": row.source, "file": row.file or None}


def _grid(listing: Listing, sources: list[str]) -> Grid:
    rows = [_VALUES[type(row)](row, listing.catalogs) for row in listing.rows]
    headers = {key: shown.header for key, shown in rows[0].items() if shown.header}
    right = tuple(all(isinstance(row[key].value, float | None) for row in rows) for key in headers)
    lines = tuple(
        (row.name, *(values[key].text for key in headers), source)
        for row, values, source in zip(listing.rows, rows, sources, strict=True)
    )
    return Grid(("name", *headers.values(), "source"), lines, (False, *right, False))


def _marks(rows: tuple[Record, ...]) -> dict[str, str]:
    """Return each source of the rows once, with its mark: a to z, then aa, ab and on."""
    sources = dict.fromkeys(_source(row) for row in rows)
    letters = "abcdefghijklmnopqrstuvwxyz"
    names = (f"{letters[n // 26 - 1] if n >= 26 else ''}{letters[n % 26]}" for n in range(len(sources)))
    return dict(zip(sources, names, strict=True))


def _source(row: Record) -> str:
    return f"{row.file}: {row.source}" if row.file else row.source


@dataclass(frozen=True)
class _Shown:
    """One value of a row, with its unit in the ``label``; ``header`` is its column in a table, "" for none."""

    label: str
    value: Value
    header: str = ""
    digits: int = 4

    @property
    def text(self) -> str:
        """The value as it is printed."""
        if self.value is None:
            return "-"
        if isinstance(self.value, tuple):
            return ", ".join(self.value)
        return significant(self.value, self.digits) if isinstance(self.value, float) else self.value


_Values = dict[str, _Shown]  # by key, which has the unit


def _solvent(row: Solvent, catalogs: Catalogs) -> _Values:
    alone = MobilePhase((Component(row, 1.0),))
    fit = "IAPWS" if row.viscosity is None else ", ".join(f"{value:g}" for value in row.viscosity)
    return {
        "molar_mass_g_mol": _Shown("molar mass, g/mol", row.molar_mass * 1e3, "g/mol"),
        "density_25degC_kg_m3": _Shown("density at 25 °C, kg/m³", row.density, "kg/m³, 25 °C"),
        "expansion_per_K": _Shown("its fall, 1/K", row.expansion),
        "viscosity_25degC_mPa_s": _Shown(
            "viscosity at 25 °C, mPa s", alone.viscosity(_ROOM).value * 1e3, "mPa s, 25 °C"
        ),
        "viscosity_fit": _Shown("A, B, C of ln(η/mPa s) = A + B (1000/T) + C (1000/T)²", fit),
        "uncertainty_percent": _Shown("its uncertainty, ±%", 100 * row.uncertainty, "±%"),
        "fitted_degC": _Shown("fitted over, °C", _degrees(row.span)),
        "association": _Shown("association ψ of Wilke and Chang", row.association),
    }


def _mixture(row: Mixture, catalogs: Catalogs) -> _Values:
    return {
        "excess": _Shown("a, b, c, e of the excess", ", ".join(f"{value:g}" for value in row.excess)),
        "heat": _Shown("d, of its temperature term", row.heat),
        "fitted_degC": _Shown("fitted over, °C", _degrees(row.span), "°C"),
        "uncertainty_percent": _Shown("uncertainty there, ±%", 100 * row.uncertainty, "±%"),
        "far_degC": _Shown("far outside, °C", row.far - 273.15, "far, °C"),
        "uncertainty_far_percent": _Shown("uncertainty there, ±%", 100 * row.uncertainty_far, "±%, far"),
    }


def _solute(row: Solute, catalogs: Catalogs) -> _Values:
    return {
        "formula": _Shown("formula", row.formula or None),
        "molecule": _Shown("molecule", row.molecule, "molecule"),
        "molar_mass_g_mol": _Shown("molar mass, g/mol", _times(row.molar_mass, 1e3), "g/mol"),
        "molar_volume_cm3_mol": _Shown("molar volume (Le Bas), cm³/mol", _times(row.molar_volume, 1e6), "cm³/mol"),
        "diffusion_in_water_m2_s": _Shown("D in water, m²/s", row.diffusion, "D, m²/s"),
        "at_degC": _Shown("measured at, °C", None if row.at is None else row.at - 273.15, "at °C"),
    }


def _packing(row: Packing, catalogs: Catalogs) -> _Values:
    return {
        "total_porosity": _Shown("total porosity", row.total_porosity, "total"),
        "total_porosity_range": _Shown("its usual range", _span(row.total_range), "range"),
        "interstitial_porosity": _Shown("interstitial porosity", row.interstitial, "bed"),
        "interstitial_porosity_range": _Shown("its usual range", _span(row.interstitial_range), "range "),
        "knox": _Shown("A, B, C of h = A ν^1/3 + B/ν + C ν", _coefficients(row.knox), "A, B, C"),
        "knox_best": _Shown("at best", _coefficients(row.knox_best)),
        "knox_worst": _Shown("at worst", _coefficients(row.knox_worst)),
        "velocity": _Shown("velocity of ν", _VELOCITY[row.velocity] if row.knox else None),
    }


def _column(row: ColumnFormat, catalogs: Catalogs) -> _Values:
    packing = catalogs.find(PACKINGS, row.packing)
    return {
        "bore_mm": _Shown("bore, mm", row.bore * 1e3),
        "length_mm": _Shown("length, mm", row.length * 1e3),
        "particle_um": _Shown("particle, µm", row.particle * 1e6),
        "packing": _Shown("packing", row.packing),
        "total_porosity": _Shown("total porosity", packing.total_porosity if packing else None, "total"),
        "interstitial_porosity": _Shown("interstitial porosity", packing.interstitial if packing else None, "bed"),
        "knox": _Shown(
            "A, B, C of h = A ν^1/3 + B/ν + C ν", _coefficients(packing.knox if packing else None), "A, B, C"
        ),
        "velocity": _Shown("velocity of ν", _VELOCITY[packing.velocity] if packing and packing.knox else None),
        "curve_source": _Shown("source of porosities and curve", packing.source if packing else None),
        "plates": _Shown("plates", row.plates),
    }


def _tubing(row: Tubing, catalogs: Catalogs) -> _Values:
    return {
        "bore_mm": _Shown("bore, mm", row.bore * 1e3),
        "bore_in": _Shown("bore, in", row.bore / 0.0254, "in", 3),
        "reel_in": _Shown("as reels carry it, in", row.reel_inches),
        "volume_uL_per_cm": _Shown("volume, µL/cm", math.pi / 4 * row.bore**2 * 1e7, "µL/cm", 3),
        "tolerance_percent": _Shown("tolerance of the bore, ±%", 100 * row.tolerance, "±%"),
        "tolerance_from": _Shown("which is", row.tolerance_from, "which is"),
        "materials": _Shown("materials", row.materials, "materials"),
    }


def _material(row: Material, catalogs: Catalogs) -> _Values:
    return {
        "avoid": _Shown("keep away from", row.avoid or None, "keep away from"),
        "caution": _Shown("caution", row.caution),
    }


def _cell_format(row: CellFormat, catalogs: Catalogs) -> _Values:
    return {
        "volume_uL": _Shown("volume, µL", row.volume * 1e9, "µL"),
        "path_length_mm": _Shown("optical path, mm", _times(row.path_length, 1e3), "path, mm"),
        "max_pressure_bar": _Shown("pressure limit, bar", _times(row.max_pressure, 1e-5)),
    }


def _instrument(row: InstrumentClass, catalogs: Catalogs) -> _Values:
    low, high = (significant(end * 1e18) for end in row.variance)
    return {
        "variance_uL2": _Shown("variance, µL²", low if low == high else f"{low} to {high}", "µL²"),
        "convention": _Shown("stated as", row.convention, "stated as"),
        "conditions": _Shown("conditions", row.conditions),
    }


_VELOCITY = {"hold-up": "u = L/t0 (hold-up)", "interstitial": "interstitial"}


def _degrees(span: tuple[float, float]) -> str:
    return f"{span[0] - 273.15:.4g} to {span[1] - 273.15:.4g}"


def _span(ends: tuple[float, float]) -> str:
    return f"{ends[0]:g} to {ends[1]:g}"


def _coefficients(values: tuple[float, float, float] | None) -> str | None:
    return None if values is None else ", ".join(f"{value:g}" for value in values)


def _times(value: float | None, factor: float) -> float | None:
    return None if value is None else value * factor


_VALUES: dict[type[Record], Callable[[Any, Catalogs], _Values]] = {
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
