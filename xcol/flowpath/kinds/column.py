"""The column as a kind of part."""

from __future__ import annotations

from xcol.catalogs import packings, usual_packing
from xcol.filters.column import void_volume
from xcol.flowpath.elements import Bed
from xcol.flowpath.findings import Draft
from xcol.flowpath.keys import Key, Later, Measure, Number
from xcol.flowpath.kinds.table import DROP, Elements, Kind, must
from xcol.flowpath.shorthand import column_size, length_first
from xcol.units import LENGTH, RATIO, VOLUME


def _column(draft: Draft) -> Elements:
    bore, length = must(draft, "bore"), must(draft, "length")
    plates = draft.number("plates")
    if plates is None:
        draft.fault(
            "plates",
            "the column's plate number for your analyte",
            "plates = 11000, from the certificate or a measurement (as a first look, N is near "
            "length / (2 to 2.5 particle diameters))",
        )
    written = draft.written["column"]
    if "bore" not in draft.written and length_first(written):
        draft.warn(f'"{written}" has the length first: read as bore {bore * 1e3:g} mm, length {length * 1e3:g} mm')
    usual = usual_packing()
    void, total = draft.number("void_volume"), draft.number("total_porosity")
    if void is not None and total is not None:
        draft.fault("total_porosity", "void_volume or total_porosity, not both", "leave one out")
    if void is None:
        if total is None:
            total = usual.total_porosity
            spans = ", ".join(
                f"{row.name} {row.total_range[0]:g} to {row.total_range[1]:g}" for row in packings().values()
            )
            draft.assume(
                f"total porosity {total:g}",
                f"total porosity {total:g} ({spans}): the void volume, and with it all of the column's σ, hangs "
                f"on it; {usual.source}",
            )
        void = float(void_volume(bore, length, total))
    bed = draft.number("interstitial_porosity")
    low, high = (bed, bed) if bed is not None else usual.interstitial_range
    particle = draft.number("particle")
    porosity = (bed or usual.interstitial, low, high)
    return (Bed(bore, length, particle, plates or 1.0, void, porosity),)


COLUMN = Kind(
    name="column",
    meaning="a column; several in series are allowed",
    example='{ column = "4.6 x 150 mm, 5 um", plates = 11000, total_porosity = 0.65 }',
    keys=(
        Key("bore", Measure(LENGTH, 5e-6, 1.0), "inside diameter"),
        Key("length", Measure(LENGTH, 1e-3, 20.0), "length"),
        Key("particle", Measure(LENGTH, 0.1e-6, 0.5e-3), "particle diameter"),
        Key("plates", Number(1, 1e8, "a plate number"), "plate number for your analyte"),
        Key("total_porosity", Measure(RATIO, 0.2, 0.99), "total porosity"),
        Key("void_volume", Measure(VOLUME, 1e-13, 1.0), "void (hold-up) volume"),
        Key("interstitial_porosity", Measure(RATIO, 0.2, 0.6), "porosity between particles"),
        DROP,
        Key("plates_at", Later(), "flow at which the plates hold"),
        Key("role", Later(), "guard or trap"),
        Key("k_factor", Later(), "retention of this column relative to the peaks' k"),
    ),
    ways=(("bore", "length"),),
    size=column_size,
    elements=_column,
    sizes={},
)
