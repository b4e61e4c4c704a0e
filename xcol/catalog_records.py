"""The typed records of the catalogs, in SI units: what the physics and the path file see of them."""

from __future__ import annotations

from dataclasses import dataclass

Span = tuple[float, float]


@dataclass(frozen=True, kw_only=True)
class Record:
    """What every row has; ``file`` is the user's catalog that it comes from, "" for a shipped row."""

    name: str
    also: tuple[str, ...] = ()
    source: str
    file: str = ""


@dataclass(frozen=True, kw_only=True)
class Solvent(Record):
    """A pure liquid: molar mass [kg/mol], density at 25 °C [kg/m³] and its fall per kelvin.

    ``viscosity`` holds A, B, C of ln(η/mPa·s) = A + B·(1000/T) + C·(1000/T)², None for water's own
    formula; ``span`` [K] is where it was fitted, ``uncertainty`` its relative ±; ``association`` is ψ
    of Wilke and Chang.
    """

    molar_mass: float
    density: float
    expansion: float
    association: float
    viscosity: tuple[float, float, float] | None
    span: Span
    uncertainty: float


@dataclass(frozen=True, kw_only=True)
class Mixture(Record):
    """Excess viscosity of a liquid with water: coefficients a, b, c, e and d of its temperature term.

    Relative ``uncertainty`` within ``span`` [K]; beyond it rises to ``uncertainty_far`` at ``far`` [K].
    """

    liquid: str
    excess: tuple[float, float, float, float]
    heat: float
    span: Span
    uncertainty: float
    far: float
    uncertainty_far: float


@dataclass(frozen=True, kw_only=True)
class Solute(Record):
    """A solute: molar mass [kg/mol], Le Bas volume [m³/mol], D in water [m²/s] at ``at`` [K]."""

    formula: str
    molar_mass: float | None
    molecule: str
    molar_volume: float | None
    diffusion: float | None
    at: float | None


@dataclass(frozen=True, kw_only=True)
class Packing(Record):
    """What is usual of a column packing; porosities as fractions of the column's volume.

    ``knox`` holds A, B, C of h = A·ν^⅓ + B/ν + C·ν with ν = u·d_p/D, best and worst the ends of their
    ranges (None: no curve is known); ``velocity`` says which u: "hold-up" for L/t0, or "interstitial".
    """

    total_porosity: float
    total_range: Span
    interstitial: float
    interstitial_range: Span
    knox: tuple[float, float, float] | None
    knox_best: tuple[float, float, float] | None
    knox_worst: tuple[float, float, float] | None
    velocity: str


@dataclass(frozen=True, kw_only=True)
class ColumnFormat(Record):
    """A column as it is sold: bore, length, particle [m], packing; plates where a user's row has them."""

    bore: float
    length: float
    particle: float
    packing: str
    plates: float | None


@dataclass(frozen=True, kw_only=True)
class Tubing(Record):
    """A stock bore [m] of connecting tubing, in inches as reels carry it (None: they do not).

    ``tolerance`` is relative, of the bore, and ``tolerance_from`` where it comes from.
    """

    bore: float
    reel_inches: float | None
    tolerance: float
    tolerance_from: str
    materials: tuple[str, ...]


@dataclass(frozen=True, kw_only=True)
class Material(Record):
    """A material of tubing, with what to keep away from it and other cautions."""

    avoid: tuple[str, ...]
    caution: str


@dataclass(frozen=True, kw_only=True)
class CellFormat(Record):
    """A detector cell: volume [m³], optical path [m] (None: has none), usual pressure limit [Pa]."""

    volume: float
    path_length: float | None
    max_pressure: float | None


@dataclass(frozen=True, kw_only=True)
class InstrumentClass(Record):
    """A class of instruments by the variance [m⁶] outside the column, and how it was measured."""

    variance: Span
    convention: str
    conditions: str
