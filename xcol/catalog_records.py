"""The typed records of the catalogs, in SI units: what the physics and the path file see of them."""

from __future__ import annotations

from dataclasses import dataclass

Span = tuple[float, float]
Triple = tuple[float, float, float]


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
    of Wilke and Chang; ``mixes_with_water`` in all parts.
    """

    molar_mass: float
    density: float
    expansion: float
    association: float
    viscosity: Triple | None
    span: Span
    uncertainty: float
    mixes_with_water: bool = True

    @property
    def is_water(self) -> bool:
        """Whether it is water itself, whatever formula its row gives for the viscosity."""
        return self.name.strip().lower() in ("water", "h2o")


@dataclass(frozen=True, kw_only=True)
class Mixture(Record):
    """Excess viscosity of a liquid with water: a, b, c, e [-], and ``heat``, d of its temperature term [kK].

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
    """A solute: molar mass [kg/mol], Le Bas volume [m³/mol], D in water [m²/s] at ``at`` [K].

    ``molecule`` is "small", "globular", "chain" or "rod", "" where the molar mass decides.
    """

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
    interstitial_porosity: float
    interstitial_range: Span
    knox: Triple | None
    knox_best: Triple | None
    knox_worst: Triple | None
    velocity: str


@dataclass(frozen=True, kw_only=True)
class ColumnFormat(Record):
    """A column as it is sold: bore, length, particle [m], packing.

    A user's row may have plates, the flow [m³/s] at which they hold, total porosity and limit [Pa].
    """

    bore: float
    length: float
    particle: float
    packing: str
    plates: float | None
    plates_at: float | None
    total_porosity: float | None
    max_pressure: float | None


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
