"""The keys of the file itself and of a peak, and the words that people use for them."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.flowpath.keys import Choice, Key, Later, Measure, Number, Table, Text, Texts
from xcol.units import DENSITY, DIFFUSION, FLOW, LENGTH, MOLAR_MASS, PRESSURE, TEMPERATURE, TIME, VISCOSITY, VOLUME

if TYPE_CHECKING:
    from xcol.flowpath.findings import Draft

# 3e-8 m²/s: a coefficient in cm²/s with the unit m²/s is above, everything liquid below.
DIFFUSIONS = Measure(DIFFUSION, 1e-14, 3e-8)
FLOWS = Measure(FLOW, 1e-14, 1e-5)

TEMPERATURES = Measure(TEMPERATURE, 233.15, 523.15)
VISCOSITIES = Measure(VISCOSITY, 1e-5, 1.0)
MOBILE_PHASE = Key("mobile_phase", Text(200), 'liquids in volume parts, "acetonitrile/water 60:40"')

_BENDS = Measure(LENGTH, 5e-4, 10.0)
BEND_RADIUS = Key("bend_radius", _BENDS, "radius at which tubes are bent, all along")
COIL_DIAMETER = Key("coil_diameter", Measure(LENGTH, 1e-3, 20.0), "diameter of the coil that tubes are wound to")

MOLECULES = (
    ("protein", "globular"),
    ("antibody", "globular"),
    ("folded", "globular"),
    ("polymer", "chain"),
    ("rod", "chain"),
    ("unfolded", "chain"),
    ("drug", "small"),
    ("large", "globular"),
)
AT_KEYS = (
    Key("temperature", TEMPERATURES, "temperature at which the diffusion coefficient was known"),
    MOBILE_PHASE,
    Key("viscosity", VISCOSITIES, "viscosity of that liquid, in place of its composition"),
)

FILE_KEYS = {
    key.name: key
    for key in (
        Key("title", Text(120), "what the report is headed with"),
        Key("flow", FLOWS, "flow rate through the column"),
        Key("viscosity", VISCOSITIES, "viscosity of the mobile phase"),
        Key("density", Measure(DENSITY, 400.0, 3000.0), "density of the mobile phase"),
        MOBILE_PHASE,
        Key("temperature", TEMPERATURES, "temperature of everything; with ambient, of the columns"),
        Key("diffusion", DIFFUSIONS, "diffusion coefficient of peaks that give none"),
        Key("pump_pressure", Measure(PRESSURE, 1e4, 3e8), "measured pressure at the pump"),
        Key("note", Text(2000), "anything"),
        Key("ambient", TEMPERATURES, "temperature of what is not in the oven: of all parts but the columns"),
        Key("catalogs", Texts('catalogs = ["mine.toml"]'), "catalogs of your own"),
        Key("gradient", Later(), "gradient elution"),
        Key("sample_solvent", Later(), "solvent of the sample"),
        Key("require", Later(), "requirement to be met"),
        Key("runs", Later("one file for each run"), "several runs"),
        BEND_RADIUS,
        COIL_DIAMETER,
    )
}

PEAK_KEYS = {
    key.name: key
    for key in (
        Key("name", Text(60), "name in the report"),
        Key("k", Number(0.0, 1000.0, "a retention factor"), "retention factor"),
        Key("retention", Measure(TIME, 1e-2, 1e6), "retention time at the first detector"),
        Key("elution_volume", Measure(VOLUME, 1e-13, 1.0), "elution volume at the first detector"),
        Key("diffusion", DIFFUSIONS, "diffusion coefficient in the mobile phase"),
        Key("plates", Number(1, 1e8, "a plate number"), "the columns' plates for this peak"),
        Key("note", Text(2000), "anything"),
        Key(
            "at",
            Table(AT_KEYS, 'at = { mobile_phase = "water", temperature = "25 degC" }'),
            "conditions at which the diffusion coefficient is known",
        ),
        Key("solute", Text(60), "name of the solute in the catalog, in place of its diffusion coefficient"),
        Key("molar_mass", Measure(MOLAR_MASS, 2e-3, 1e5), "molar mass, in place of the diffusion coefficient"),
        Key("molecule", Choice(("small", "globular", "chain"), MOLECULES), "what the molar mass is that of"),
        Key("k_start", Later("k"), "retention factor at the start of the gradient"),
        Key("S", Later("k"), "slope of log k with composition"),
        Key("k_in_sample", Later(), "retention factor in the sample's solvent"),
    )
}


def curvature_of(draft: Draft) -> float | None:
    """Return the curvature 1/R [1/m] that a part or the file enters, None where it says nothing."""
    radius, diameter = draft.number("bend_radius"), draft.number("coil_diameter")
    if radius is not None and diameter is not None:
        draft.fault("coil_diameter", "bend_radius or coil_diameter, not both", "leave one out")
    if radius is None and diameter is not None:
        radius = diameter / 2
    return None if radius is None else 1 / radius


# What people write in place of a key or a kind.
OTHER_WORDS = {
    "injection": "inject", "injector": "inject", "injection_volume": "inject", "sample": "inject",
    "bend": "bend_radius", "bends": "bend_radius", "curvature": "bend_radius", "coil": "coil_diameter",
    "coil_radius": "coil_diameter", "loop_volume": "loop", "loop_bore": "loop", "averaging": "dwell",
    "tolerance": "bore_tolerance", "rise": "rise_time", "optical_path": "path_length", "pathlength": "path_length",
    "tubing": "tube", "capillary": "tube", "line": "tube", "pipe": "tube",
    "union": "fitting", "connector": "fitting", "valve": "fitting", "frit": "fitting",
    "tee": "fitting", "connection": "fitting", "fittings": "fitting",
    "guard": "column", "precolumn": "column", "waste": "outlet", "collector": "outlet",
    "flow_cell": "cell", "cell_volume": "cell", "flowcell": "cell",
    "id": "bore", "i_d": "bore", "inner_diameter": "bore", "inside_diameter": "bore",
    "diameter": "bore", "radius": "bore", "r": "bore", "od": "note", "outer_diameter": "note",
    "outside_diameter": "note", "color": "note", "colour": "note", "comment": "note",
    "n": "plates", "N": "plates", "plate_number": "plates", "efficiency": "plates",
    "porosity": "total_porosity", "particle_size": "particle", "dp": "particle",
    "dead_volume": "void_volume", "v0": "void_volume", "hold_up_volume": "void_volume",
    "tau": "time_constant", "response_time": "response", "sampling_rate": "rate",
    "data_rate": "rate", "frequency": "rate", "path_len": "path_length",
    "flow_rate": "flow", "flowrate": "flow", "eluent": "mobile_phase", "solvent": "mobile_phase",
    "temp": "temperature", "pressure": "pump_pressure", "parts": "path", "part": "path", "peak": "peaks",
    "retention_time": "retention", "rt": "retention", "tr": "retention", "k_prime": "k",
    "retention_factor": "k", "D": "diffusion", "dm": "diffusion", "pressure_limit": "max_pressure",
    "mw": "molar_mass", "molecular_weight": "molar_mass", "molar_weight": "molar_mass", "mass": "molar_mass",
    "analyte": "solute", "compound": "solute", "substance": "solute", "oven": "temperature",
    "column_temperature": "temperature", "room_temperature": "ambient", "room": "ambient",
    "catalogue": "catalogs", "catalogues": "catalogs", "catalog": "catalogs",
    "limit": "max_pressure", "pmax": "max_pressure", "label": "name",
}  # fmt: skip
