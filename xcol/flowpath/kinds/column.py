"""The column as a kind of part."""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

from xcol.catalog_kinds import COLUMNS, PACKINGS, VELOCITIES
from xcol.filters.column import PlateHeightCurve, void_volume
from xcol.flowpath.bed import Bed, Curves
from xcol.flowpath.file_keys import FLOWS
from xcol.flowpath.findings import Draft
from xcol.flowpath.keys import Choice, Key, Later, Measure, Number, Table, Text, Value
from xcol.flowpath.kinds.table import DROP, Elements, Kind, must
from xcol.flowpath.kinds.tolerances import (
    check_tolerances,
    plates_of_column,
    quality_of_packing,
    tolerance_of,
    total_porosity,
)
from xcol.flowpath.shorthand import column_size, length_first
from xcol.flowpath.unknowns import Unknown, scaling
from xcol.units import LENGTH, RATIO, VOLUME, significant

if TYPE_CHECKING:
    from xcol.catalog_records import ColumnFormat, Packing
    from xcol.filters.interface import Real

_KNOX_EXAMPLE = "knox = { A = 0.9, B = 1.75, C = 0.065 }"


def _column(draft: Draft) -> Elements:
    bore, length = must(draft, "bore"), must(draft, "length")
    written = draft.written["column"]
    if "bore" not in draft.written and draft.row is None and length_first(written):
        draft.warn(f'"{written}" has the length first: read as bore {bore * 1e3:g} mm, length {length * 1e3:g} mm')
    packing = _packing(draft)
    if packing is None:
        return ()
    void = _void_volume(draft, packing, bore, length)
    bed = draft.number("interstitial_porosity")
    low, high = (bed, bed) if bed is not None else packing.interstitial_range
    porosity = (bed or packing.interstitial_porosity, low, high)
    plates, plates_at = draft.number("plates"), draft.number("plates_at")
    if plates is not None and plates_at is None and "knox" in draft.inner:
        draft.fault("knox", "plates or knox, not both (with plates_at, knox scales the plates)", "leave one out")
    if draft.row is not None and plates is not None and "plates" not in draft.written:
        draft.assume(
            "plates of a catalog", f"{significant(plates, 6)} plates, from {draft.row.file}: {draft.row.source}"
        )
    if plates_at is not None and plates is None:
        draft.fault("plates_at", "plates with it, which hold at this flow", "plates = 11000, or leave plates_at out")
        return ()
    curve = None
    if plates is None or plates_at is not None:
        total = void / float(void_volume(bore, length, 1.0))
        curve = _curve(draft, packing, total / porosity[0])
        if curve is None or not _particle_is_known(draft):
            return ()
    unknowns = (
        *(
            (plates_of_column(draft),)
            if plates is not None
            else (quality_of_packing(),)
            if curve and curve.ends
            else ()
        ),
        *_of_void_volume(draft, packing),
    )
    particle = draft.number("particle")
    return (Bed(bore, length, particle, plates, void, porosity, plates_at, curve, packing.source, unknowns=unknowns),)


def _of_void_volume(draft: Draft, packing: Packing) -> tuple[Unknown, ...]:
    """Return what is unknown of the void volume: an assumed porosity, or what the file's tolerances leave open."""
    check_tolerances(draft, *(("volume",) if "void_volume" in draft.values else ("bore", "length")))

    def square(element: Bed, factor: Real) -> Bed:
        return replace(element, void_volume=element.void_volume * factor**2)

    if draft.number("void_volume") is None and draft.number("total_porosity") is None:
        return (total_porosity(packing.total_porosity, _porosities(draft, packing)),)
    puts = {"bore": square, "length": scaling("void_volume"), "volume": scaling("void_volume")}
    return tuple(
        unknown
        for size, put in puts.items()
        if f"{size}_tolerance" in draft.values
        for unknown in tolerance_of(draft, size, put)
    )


def _packing(draft: Draft) -> Packing | None:
    """Return the packing that the file names, or the usual one; None with a fault."""
    named = draft.text("packing")
    if named is None:
        return draft.catalogs.usual_packing()
    packing = draft.catalogs.find(PACKINGS, named)
    if packing is None:
        names = tuple(row.name for row in draft.catalogs.rows(PACKINGS))
        suggestion = f'packing = "{draft.catalogs.near(PACKINGS, named) or names[0]}"'
        draft.fault("packing", f"one of {', '.join(names)}, or a packing of your own catalog", suggestion)
    return packing


def _porosities(draft: Draft, packing: Packing) -> tuple[float, float]:
    """Return the range of the total porosity: of the packing that is named, or of all with a plate height curve."""
    usual = [row for row in draft.catalogs.rows(PACKINGS) if row.knox is not None]
    spans = (
        [packing.total_range] if draft.text("packing") else [packing.total_range, *(row.total_range for row in usual)]
    )
    return min(low for low, _ in spans), max(high for _, high in spans)


def _void_volume(draft: Draft, packing: Packing, bore: float, length: float) -> float:
    void, total = draft.number("void_volume"), draft.number("total_porosity")
    if void is not None and total is not None:
        draft.fault("total_porosity", "void_volume or total_porosity, not both", "leave one out")
    if void is not None:
        return void
    if total is None:
        total = packing.total_porosity
        others = [packing] if draft.text("packing") else draft.catalogs.rows(PACKINGS)
        spans = ", ".join(f"{row.name} {row.total_range[0]:g} to {row.total_range[1]:g}" for row in others)
        draft.assume(
            f"total porosity {total:g}",
            f"total porosity {total:g} ({spans}): the void volume, and with it all of the column's σ, hangs "
            f"on it; {packing.source}",
        )
    return float(void_volume(bore, length, total))


def _curve(draft: Draft, packing: Packing, total_over_interstitial: float) -> Curves | None:
    """Return the reduced plate height curve that the file enters, or the packing's; None with a fault."""
    velocity, source = packing.velocity, packing.source
    triples = (packing.knox, packing.knox_best, packing.knox_worst)
    whose = f" of well packed {packing.name} columns"
    if entered := draft.inner.get("knox"):
        a, b, c = (entered.number(key) for key in ("A", "B", "C"))
        if a is None or b is None or c is None:
            draft.fault("knox", "all of A, B and C", _KNOX_EXAMPLE, f"{len(entered.values)} of its keys")
            return None
        triples, whose = ((a, b, c), None, None), ""
        velocity, source = entered.text("velocity") or VELOCITIES[0], "as entered"
    usual, best, worst = triples
    if usual is None:
        draft.fault(
            "plates",
            f"the plate number: no reduced plate height curve is known for {packing.name} packings",
            "plates = 11000, from the certificate or a measurement, or a curve of your own, knox",
        )
        return None
    curve = PlateHeightCurve(*usual)
    lowest = min(curve.height(1.3**power) for power in range(-10, 40)) if max(usual) > 0 else 0.0
    if lowest < 1:
        key = "knox" if draft.inner.get("knox") else "packing"
        draft.fault(key, "a reduced plate height of 1 or more at every velocity", _KNOX_EXAMPLE, f"h = {lowest:.2g}")
        return None
    ratio = 1.0 if velocity == VELOCITIES[0] else total_over_interstitial
    which = "u = L/t0" if velocity == VELOCITIES[0] else "interstitial velocity"
    shown = f"h = {usual[0]:g} ν^1/3 + {usual[1]:g}/ν + {usual[2]:g} ν ({which}; {source})"
    if draft.number("plates") is None:
        text = f"no plates entered: N from the reduced plate height{whose}, {shown}, for each peak's D"
        draft.assume("N estimated", text, leads=True)
    else:
        draft.assume(
            "N scaled",
            f"plates scaled from the flow at which they hold to this one by {shown}, with each peak's own D",
            leads=True,
        )
    ends = [PlateHeightCurve(*triple, ratio) for triple in (best, worst) if triple is not None]
    return Curves(PlateHeightCurve(*usual, ratio), (ends[0], ends[1]) if len(ends) == 2 else None)


def _particle_is_known(draft: Draft) -> bool:
    if draft.number("particle") is not None:
        return True
    key = "plates" if draft.number("plates") is None else "plates_at"
    draft.fault(
        key,
        "the plate number, or the particle size for the reduced plate height",
        'plates = 11000, or the particle in the size, column = "4.6 x 150 mm, 5 um"',
    )
    return False


def _of_row(row: ColumnFormat, draft: Draft) -> dict[str, Value]:
    """Return what a catalog's column gives, by key; what the file enters in its place is left out."""
    values: dict[str, Value | None] = {
        "bore": row.bore,
        "length": row.length,
        "particle": row.particle,
        "packing": row.packing or None,
        "total_porosity": None if "void_volume" in draft.written else row.total_porosity,
        "plates": None if "knox" in draft.written else row.plates,
        "plates_at": None if {"knox", "plates"} & set(draft.written) else row.plates_at,
        "max_pressure": row.max_pressure,
    }
    return {key: value for key, value in values.items() if value is not None and key not in draft.written}


COLUMN = Kind(
    name="column",
    meaning="a column; several in series are allowed",
    example='{ column = "4.6 x 150 mm, 5 um", plates = 11000, total_porosity = 0.65 }',
    keys=(
        Key("bore", Measure(LENGTH, 5e-6, 1.0), "inside diameter"),
        Key("length", Measure(LENGTH, 1e-3, 20.0), "length"),
        Key("particle", Measure(LENGTH, 0.1e-6, 0.5e-3), "particle diameter"),
        Key("plates", Number(1, 1e8, "a plate number"), "plate number for your analyte"),
        Key("plates_at", FLOWS, "flow at which the plates hold, where it is not this one"),
        Key("packing", Text(60), '"fully porous", "core-shell", or one of your own catalog'),
        Key(
            "knox",
            Table(
                (
                    Key("A", Number(0, 10, "a coefficient of ν^1/3"), "of the cube root of the reduced velocity"),
                    Key("B", Number(0, 100, "a coefficient of 1/ν"), "of its inverse"),
                    Key("C", Number(0, 10, "a coefficient of ν"), "of the reduced velocity"),
                    Key("velocity", Choice(VELOCITIES), "hold-up (u = L/t0) or interstitial: the velocity of ν"),
                ),
                _KNOX_EXAMPLE,
            ),
            "reduced plate height, h = A ν^1/3 + B/ν + C ν",
        ),
        Key("total_porosity", Measure(RATIO, 0.2, 0.99), "total porosity"),
        Key("void_volume", Measure(VOLUME, 1e-13, 1.0), "void (hold-up) volume"),
        Key("interstitial_porosity", Measure(RATIO, 0.2, 0.6), "porosity between particles"),
        DROP,
        Key("role", Later(), "guard or trap"),
        Key("k_factor", Later(), "retention of this column relative to the peaks' k"),
    ),
    ways=(("bore", "length"),),
    size=column_size,
    elements=_column,
    sizes={},
    catalog=COLUMNS,
    of_row=_of_row,
)
