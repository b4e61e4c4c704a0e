"""Topics: what flows, what is dissolved in it, and what the catalogs supply."""

from __future__ import annotations

from xcol.catalog_kinds import MIXTURES, PACKINGS, SOLUTES, SOLVENTS
from xcol.catalogs import Catalogs
from xcol.filters.column import PlateHeightCurve, reduced_velocity, void_volume
from xcol.flowpath.composition import read_composition
from xcol.liquids.diffusion import (
    GLOBULAR,
    SMALL_ELSEWHERE,
    SMALL_IN_WATER,
    SWITCH,
    wilke_chang,
)
from xcol.liquids.mobile_phase import MIXED_ORGANICS, MIXED_WITH_WATER
from xcol.report.topics.topic import Topic
from xcol.units import significant

_KNOWN = Catalogs()
_WARM, _ROOM = 303.15, 298.15


def _viscosity() -> str:
    shown = [
        f"{found.origin}: {significant(found.value * 1e3)} mPa s ±{100 * found.uncertainty:.0f} %"
        for text in ("acetonitrile/water 60:40", "methanol/water 50:50", "water")
        for found in [read_composition(text, _KNOWN).phase.viscosity(_WARM)]
    ]
    return "; ".join(shown)


def _diffusion() -> str:
    caffeine, water = _KNOWN.find(SOLUTES, "caffeine"), read_composition("water", _KNOWN).phase
    if caffeine is None or caffeine.molar_volume is None or caffeine.diffusion is None:
        return "-"
    eta, psi_mass = water.viscosity(_ROOM).value, water.association_mass()
    value = float(wilke_chang(_ROOM, eta, caffeine.molar_volume, psi_mass))
    return (
        f"caffeine in water at 25 °C, from {caffeine.molar_volume * 1e6:.0f} cm³/mol: {significant(value)} m²/s by "
        f"Wilke and Chang, {significant(caffeine.diffusion)} in the catalog"
    )


def _plate_height() -> str:
    shown = []
    for row in _KNOWN.rows(PACKINGS):
        if row.knox:
            void = float(void_volume(2.1e-3, 0.1, row.total_porosity))
            nu = float(reduced_velocity(0.4e-6 / 60, 0.1, void, 1.7e-6, 1e-9))
            plates = float(PlateHeightCurve(*row.knox).plates(nu, 0.1, 1.7e-6))
            shown.append(f"{row.name} ν = {significant(nu)}, N = {significant(plates)}")
    return f"2.1 x 100 mm, 1.7 µm, at 0.4 mL/min, D = 1e-9 m²/s: {'; '.join(shown)}"


def _catalogs() -> str:
    return f"{len(_KNOWN.rows(SOLVENTS))} solvents, {len(_KNOWN.rows(SOLUTES))} solutes: xcol catalog"


def _mixture_sources() -> tuple[str, ...]:
    return tuple(f"{row.name}: {row.source}" for row in _KNOWN.rows(MIXTURES))


LIQUIDS = (
    Topic(
        "viscosity",
        "Mobile phase: viscosity and density",
        "mobile_phase names liquids in volume parts before mixing. Water has the IAPWS formula, an organic liquid "
        "a fit "
        "to a compilation (xcol catalog solvents). Acetonitrile, methanol and ethanol with water have a known excess "
        "over logarithmic mixing (xcol catalog mixtures). Any other liquid with water gets the mean excess of those, "
        f"±{100 * MIXED_WITH_WATER:.0f} % and a warning; organic liquids are mixed logarithmically by volume fraction, "
        f"±{100 * MIXED_ORGANICS:.0f} %; of three or more, each pair with water has its excess. Additives and dilute "
        "buffers are taken as their liquid, and said so; a word that is not known is refused. With ambient, the "
        "columns "
        "have temperature, all other parts ambient, and a part may say its own. Pressure raises the viscosity of water "
        "by up to 6 % at 1000 bar, which is left out.",
        (
            "ln η = Σ φ_i ln η_i + Σ (φ_i+φ_w)²·φ(1−φ)·(a + b·u + c·u² + e·u³ + d·θ)",
            "φ of the liquid in its pair with water, u = 2φ−1, θ = 1000/T − 1000/298.15 K",
        ),
        "The measured rows reach from 25 to 45 °C (acetonitrile/water) and 20 to 30 °C (methanol/water): ±3 % "
        "there, up "
        "to ±12 % beyond. Outside the range of a liquid's fit there is a warning, far outside an error. A "
        "viscosity that "
        "is entered is used as it is, at every temperature. Density by volume fraction, for the Reynolds number.",
        ("water: IAPWS SR6-08(2011)", *_mixture_sources(), "pairs in a mixture: Kohler 1960, from memory"),
        _viscosity,
        (
            "mobile_phase", "mobile phase", "eluent", "solvent", "mixture", "ambient", "temperature", "oven",
            "viscosity extrapolated", "viscosity by a mixing rule", "additives left out", "buffer",
        ),
    ),
    Topic(
        "diffusion",
        "Diffusion coefficient of a solute",
        "A peak gives diffusion, or solute (a name of the catalog: its value in water, scaled; without one, "
        f"its molar volume), or molar_mass. Up to {SWITCH * 1e3:.0f} g/mol, and with molecule = \"small\", a small "
        "molecule is estimated by Wilke and Chang (V = 1.11 cm³/g times the molar mass, if that is all there is); "
        "above, "
        'and with molecule = "globular", a folded protein by Young, Carroad and Bell. Chains have no relation with a '
        'source here: enter diffusion. A value known at other conditions is scaled with T/η: diffusion = "6.5e-10 '
        'm^2/s", at = { mobile_phase = "water", temperature = "25 degC" }. An estimate follows the temperature of '
        "each part; a value that is entered without at does not.",
        (
            "small: D = 7.4e-8·(ψM)^½·T/(η·V^0.6) [cm²/s; g/mol, K, mPa s, cm³/mol], ψM the mole-fraction mean",
            "globular: D = 8.34e-8·T/(η·M^⅓) [cm²/s]",
            "elsewhere: D·η/T = constant",
        ),
        f"±{100 * SMALL_IN_WATER:.0f} % in water and ±{100 * SMALL_ELSEWHERE:.0f} % in other liquids and mixtures, "
        f"±{100 * GLOBULAR:.0f} % for globular proteins (rods diffuse some 40 % more slowly than that), and the "
        "viscosity's own doubt. A long tube's variance goes as 1/D, a short one's hardly changes: xcol budget --full "
        "says for each peak how far the plates move over the doubt of D. Estimates can fail: a dye in "
        "ethanol/water was "
        "measured far below them (Anal. Chim. Acta 386 (1999) 137, abstract read).",
        (
            "Wilke and Chang, AIChE J. 1 (1955) 264, from memory; ψ of water 2.26: Hayduk and Laudie, AIChE J. 20 "
            "(1974) "
            "611, from memory",
            "Young, Carroad and Bell, Biotechnol. Bioeng. 22 (1980) 947, from memory",
            "doubt in mixtures: Safi et al., J. Chem. Eng. Data 52 (2007) 126 and 977, abstracts read; Miyabe, J. Sep. "
            "Sci. 34 (2011) 2119, abstract read",
        ),
        _diffusion,
        (
            "d", "solute", "molar_mass", "molar mass", "molecule", "at", "wilke", "chang", "wilke-chang", "protein",
            "young", "d estimated", "analyte",
        ),
    ),
    Topic(
        "plate-height",
        "Plates from the reduced plate height",
        "Without plates, a column's N comes from the reduced plate height of well packed columns of its packing "
        '(packing = "fully porous" unless you say "core-shell", or a curve of your own, knox), at this flow and '
        'for each '
        "peak's own D. With plates and plates_at, the N of the certificate is scaled from its flow to this one by the "
        "same curve, with the peak's D for both. The dependence of h on k is left out.",
        (
            'h = A·ν^⅓ + B/ν + C·ν,  ν = u·d_p/D,  u = L/t0 (velocity = "hold-up")',
            "N = L/(h·d_p);  with plates_at: N = N_entered·h(ν there)/h(ν here)",
        ),
        'Coefficients found with the interstitial velocity (velocity = "interstitial") belong to a ν that is larger by '
        "total over interstitial porosity. The range of N shown is that of the usual coefficients; a real "
        "column, its frits and its age can lie outside it: a measured N is better.",
        (
            "form: Knox, J. Chromatogr. Sci. 15 (1977) 352, from memory",
            "coefficients: usual values of well packed columns, from memory (xcol catalog packings)",
        ),
        _plate_height,
        (
            "knox", "packing", "plates_at", "h", "reduced plate height", "reduced velocity", "core-shell",
            "fully porous", "n estimated", "n scaled", "particle",
        ),
    ),
    Topic(
        "catalogs",
        "Catalogs, and your own",
        "What the program supplies stands in catalogs, every row with its source: xcol catalog lists them. Rows of "
        'your own go into a TOML file, catalogs = ["mine.toml"] in the path file (looked up beside it) or --catalog '
        "mine.toml, with the tables and keys of the shipped ones: xcol catalog KIND NAME prints a row to begin with. "
        "What a row can do without: expansion, association, span and uncertainty of a solvent, whose viscosity may be "
        "two or more measured points; the ranges of a packing; molecule of a solute (its molar mass decides). A row "
        "with the name of a shipped one stands in its place, with a warning. A column is used by its name: column = "
        '"our C18"; plates, plates_at, total_porosity and max_pressure may stand in its row.',
        (
            '[[solute]]',
            'name = "our marker"; molar_mass = "310 g/mol"; source = "our notebook"',
            'diffusion = "5.4e-10 m^2/s"; at = "25 degC"',
            '[[solvent]]',
            'name = "our diluent"; molar_mass = "76 g/mol"; density = "1.04 g/mL"',
            'viscosity = [["20 degC", "2.4 mPa s"], ["40 degC", "1.4 mPa s"]]',
            'source = "our notebook"; each key on a line of its own',
        ),
        "diffusion and at of a solute are those in water.",
        ("each row's own",),
        _catalogs,
        ("catalog", "--catalog", "mine.toml", "source"),
    ),
)  # fmt: skip
