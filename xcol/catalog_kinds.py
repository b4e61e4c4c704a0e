"""The kinds of catalog, and how a row of each is checked: a table of text and numbers -> a typed record.

All that is wrong with a row is found at once, each thing with its key. Quantities carry their unit.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import Any, Generic, TypeVar

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
    Span,
    Triple,
    Tubing,
)
from xcol.errors import Fault, Place, nearest
from xcol.units import (
    DENSITY,
    DIFFUSION,
    FLOW,
    LENGTH,
    MOLAR_MASS,
    MOLAR_VOLUME,
    PRESSURE,
    RATIO,
    TEMPERATURE,
    VARIANCE,
    VISCOSITY,
    VOLUME,
    Quantity,
    UnitError,
    described,
    parse,
    plain,
    quote,
)

WATER_FORMULA = "IAPWS"
VELOCITIES = ("hold-up", "interstitial")  # u = L/t0, or that between the particles
SHAPES = ("small", "globular", "chain", "rod")

R = TypeVar("R", bound=Record)


@dataclass(frozen=True)
class Kind(Generic[R]):
    """A kind of catalog: ``name`` is its file, ``table`` what heads a row, ``make`` reads one."""

    name: str
    table: str
    meaning: str
    record: type[R]
    make: Callable[[Row], dict[str, Any]] = field(repr=False)

    def of(self, row: Row) -> R | None:
        """Return the record of a row, None where faults were found in it (in ``row.faults``)."""
        values = {"also": row.texts("also"), "source": row.text("source"), "file": row.owner} | self.make(row)
        if "name" not in values:
            values["name"] = row.text("name")
        row.refuse_unknown()
        return None if row.faults else self.record(**values)


@dataclass
class Row:
    """One row while it is checked. A method that finds a fault notes it and returns what does no harm."""

    place: Place
    owner: str
    values: Mapping[str, Any]
    lines: Mapping[str, int]
    asked: set[str] = field(default_factory=set)
    faults: list[Fault] = field(default_factory=list)

    def has(self, key: str) -> bool:
        """Whether the row has this key, which is known from now on."""
        self.asked.add(key)
        return key in self.values

    def text(self, key: str) -> str:
        """Return a text."""
        value = self._value(key)
        if not isinstance(value, str) or not value.strip() or len(value) > 400:
            self.fault(key, "a text that is not empty, of 400 characters at most")
            return ""
        return plain(value)

    def texts(self, key: str) -> tuple[str, ...]:
        """Return a list of texts, empty where there is none."""
        value = self._value(key) if self.has(key) else []
        if not isinstance(value, list) or not all(isinstance(one, str) and one.strip() for one in value):
            self.fault(key, "a list of texts")
            return ()
        return tuple(plain(one) for one in value)

    def choice(self, key: str, options: tuple[str, ...], default: str) -> str:
        """Return one of a few words."""
        value = self._value(key) if self.has(key) else default
        if value not in (*options, default):
            self.fault(key, f"one of {', '.join(options)}")
            return default
        return str(value)

    def yes(self, key: str, default: bool) -> bool:
        """Return true or false."""
        value = self._value(key) if self.has(key) else default
        if not isinstance(value, bool):
            self.fault(key, "true or false")
        return bool(value)

    def measure(self, key: str, quantity: Quantity, low: float, high: float, default: float | None = None) -> float:
        """Return a quantity [SI]; ``default`` where the key is left out, a fault without one."""
        if not self.has(key) and default is not None:
            return default
        return self._parsed(key, self._value(key), quantity, low, high)

    def maybe(self, key: str, quantity: Quantity, low: float, high: float) -> float | None:
        """Return a quantity [SI], None where the key is left out."""
        return self.measure(key, quantity, low, high) if self.has(key) else None

    def number(self, key: str, low: float, high: float, default: float | None = None) -> float:
        """Return a plain number; ``default`` where the key is left out, a fault without one."""
        value = self._value(key) if self.has(key) or default is None else default
        if not _is_number(value) or not low <= value <= high:
            self.fault(key, f"a number from {low:g} to {high:g}")
            return low
        return float(value)

    def numbers(self, key: str, count: int) -> tuple[float, ...]:
        """Return a list of numbers."""
        value = self._value(key)
        if (
            not isinstance(value, list)
            or len(value) != count
            or not all(_is_number(n) and abs(n) <= 100 for n in value)
        ):
            self.fault(key, f"a list of {count} numbers from -100 to 100")
            return (0.0,) * count
        return tuple(float(one) for one in value)

    def span(self, key: str, quantity: Quantity, low: float, high: float, default: Span | None = None) -> Span:
        """Return a quantity from and to [SI]."""
        value = self._value(key)
        if not self.has(key) and default is not None:
            return default
        if not isinstance(value, list) or len(value) != 2:
            self.fault(key, f'{quantity.name} from and to, as in ["1 {_unit(quantity)}", "2 {_unit(quantity)}"]')
            return low, high
        first, last = (self._parsed(key, end, quantity, low, high) for end in value)
        if first > last:
            self.fault(key, "the smaller one first")
        return first, last

    def around(self, key: str, value: float) -> Span:
        """Return two fractions with the value between them; the value alone where the key is left out."""
        raw = self._value(key)
        if not self.has(key):
            return value, value
        if isinstance(raw, list) and len(raw) == 2 and all(map(_is_number, raw)) and 0 < raw[0] <= value <= raw[1] < 1:
            return float(raw[0]), float(raw[1])
        self.fault(key, f"two fractions, below and above {value:g}")
        return value, value

    def curve(self, key: str) -> tuple[Triple, str] | None:
        """Return A, B, C of a reduced plate height and their velocity; None where the key is left out."""
        raw = self._value(key)
        if not self.has(key):
            return None
        values = [raw.get(letter) for letter in "ABC"] if isinstance(raw, dict) else []
        velocity = raw.get("velocity", VELOCITIES[0]) if isinstance(raw, dict) else ""
        known = isinstance(raw, dict) and not raw.keys() - {"A", "B", "C", "velocity"}
        good = [float(n) for n in values if n is not None and _is_number(n) and 0 < n <= 100]
        if not known or len(good) != 3 or velocity not in VELOCITIES:
            self.fault(key, 'numbers above 0, { A = 0.9, B = 1.75, C = 0.065, velocity = "hold-up" }')
            return None
        return (good[0], good[1], good[2]), velocity

    def refuse_unknown(self) -> None:
        """Report the keys that nobody asked for, each with the nearest that is one."""
        for key in self.values:
            if key not in self.asked:
                expected = f"one of the row's keys: {', '.join(sorted(self.asked))}"
                self.fault(str(key), expected, nearest(str(key)[:60], self.asked) or "leave it out")

    def fault(self, key: str, expected: str, suggestion: str = "") -> None:
        """Note what is wrong at a key."""
        place = Place(self.place.file, self.lines.get(key) or self.place.line, self.place.part, plain(key)[:60])
        read = _read(self.values[key]) if key in self.values else "nothing"
        advice = "correct it, or leave the row out" if key in self.values else f"add {plain(key)[:60]} = ..."
        self.faults.append(Fault(place, read, expected, suggestion or advice))

    def _value(self, key: str) -> Any:
        self.asked.add(key)
        return self.values.get(key)

    def _parsed(self, key: str, raw: object, quantity: Quantity, low: float, high: float) -> float:
        if not isinstance(raw, str):
            bare = raw if _is_number(raw) else 1
            self.fault(key, f"{quantity.name} in quotes with its unit", f'{key} = "{bare} {_unit(quantity)}"')
            return low
        try:
            value = parse(raw, quantity)
        except UnitError as error:
            self.fault(key, error.expected, error.suggestion)
            return low
        if not low <= value <= high:
            self.fault(key, f"{quantity.name} from {low:g} to {high:g} {quantity.si}".rstrip())
            return low
        return value


def _read(raw: object) -> str:
    """Say what was read, lists and tables as they stand."""
    if isinstance(raw, list | dict):
        try:
            return quote(str(raw))
        except ValueError:  # a whole number of very many digits in it
            return described(raw)
    return described(raw)


def _unit(quantity: Quantity) -> str:
    return quantity.likely[0] or "%"


def _is_number(value: object) -> bool:
    return isinstance(value, int | float) and not isinstance(value, bool) and -1e300 < value < 1e300


_LIQUID = (TEMPERATURE, 150.0, 600.0)
_MASS = (MOLAR_MASS, 1e-3, 1e5)
_USUAL_SPAN = (283.15, 353.15)


def _solvent(row: Row) -> dict[str, Any]:
    span = row.span("span", *_LIQUID, default=_reach(row.values.get("viscosity")))
    return {
        "molar_mass": row.measure("molar_mass", *_MASS),
        "density": row.measure("density", DENSITY, 400.0, 3000.0),
        "expansion": row.number("expansion", 0.0, 0.01, default=1.2e-3),
        "association": row.number("association", 0.5, 5.0, default=1.0),
        "viscosity": _viscosity(row, span),
        "span": span,
        "uncertainty": row.measure("uncertainty", RATIO, 0.0, 1.0, default=0.05),
        "mixes_with_water": row.yes("mixes_with_water", True),
    }


def _reach(raw: object) -> Span:
    """Return from where to where a viscosity holds that gives no span: that of its measured points."""
    points = raw if isinstance(raw, list) else []
    temperatures = []
    for point in points:
        try:
            temperatures.append(parse(point[0], TEMPERATURE))
        except (TypeError, IndexError, AttributeError, KeyError, UnitError):  # told where the points are read
            return _USUAL_SPAN
    return (min(temperatures), max(temperatures)) if len(temperatures) > 1 else _USUAL_SPAN


def _viscosity(row: Row, span: Span) -> Triple | None:
    """Return A, B, C, as they are or from two or more measured points; None for water's own formula."""
    if row.has("viscosity") and row.values["viscosity"] == WATER_FORMULA:
        return None
    raw = row.values.get("viscosity")
    if isinstance(raw, list) and raw and all(isinstance(point, list) for point in raw):
        coefficients = _from_points(row, raw)
    elif not isinstance(raw, list) or len(raw) != 3:
        row.fault("viscosity", 'A, B and C, or measured points, [["20 degC", "1.2 mPa s"], ["40 degC", "0.9 mPa s"]]')
        return 0.0, 0.0, 0.0
    else:
        first, second, third = row.numbers("viscosity", 3)
        coefficients = (first, second, third)
    a, b, c = coefficients
    if not row.faults and not all(-7 < a + b * 1e3 / end + c * (1e3 / end) ** 2 < 7 for end in span):
        row.fault("viscosity", "a viscosity of 0.001 to 1000 mPa s all over the span")
    if not row.faults and b + 2 * c * 1e3 / span[1] <= 0:
        row.fault("viscosity", "a viscosity that falls when the liquid is heated")
    return coefficients


def _from_points(row: Row, raw: list[Any]) -> Triple:
    """Return A and B of ln(η/mPa s) = A + B·(1000/T) by least squares through measured points."""
    points = []
    for point in raw:
        if len(point) != 2 or not all(isinstance(value, str) for value in point):
            row.fault("viscosity", 'measured points, [["20 degC", "1.2 mPa s"], ["40 degC", "0.9 mPa s"]]')
            return 0.0, 0.0, 0.0
        temperature = row._parsed("viscosity", point[0], *_LIQUID)
        points.append((1e3 / temperature, math.log(row._parsed("viscosity", point[1], VISCOSITY, 1e-6, 1.0) * 1e3)))
    x, y = (sum(values) / len(points) for values in zip(*points, strict=True))
    spread = sum((one - x) ** 2 for one, _ in points)
    if len(points) < 2 or spread < 1e-6:
        row.fault("viscosity", "points at two temperatures at least")
        return 0.0, 0.0, 0.0
    slope = sum((one - x) * (other - y) for one, other in points) / spread
    return y - slope * x, slope, 0.0


def _mixture(row: Row) -> dict[str, Any]:
    span = row.span("span", *_LIQUID)
    near = row.measure("uncertainty", RATIO, 0.0, 1.0)
    return {
        "liquid": row.text("liquid"),
        "excess": row.numbers("excess", 4),
        "heat": row.number("heat", -100.0, 100.0),
        "span": span,
        "uncertainty": near,
        "far": row.measure("far", TEMPERATURE, span[1] + 1.0, 700.0),
        "uncertainty_far": row.measure("uncertainty_far", RATIO, near, 1.0),
    }


def _solute(row: Row) -> dict[str, Any]:
    diffusion = row.maybe("diffusion", DIFFUSION, 1e-14, 3e-8)
    mass = row.maybe("molar_mass", *_MASS)
    if row.has("at") and diffusion is None:
        row.fault("at", "a diffusion coefficient with it, in water at this temperature")
    if diffusion is None and mass is None:
        row.fault("molar_mass", "molar_mass, or diffusion in water with its temperature, at")
    return {
        "formula": row.text("formula") if row.has("formula") else "",
        "molar_mass": mass,
        "molecule": row.choice("molecule", SHAPES, ""),
        "molar_volume": row.maybe("molar_volume", MOLAR_VOLUME, 1e-6, 1e-2),
        "diffusion": diffusion,
        "at": row.measure("at", TEMPERATURE, 273.15, 373.15) if diffusion is not None else None,
    }


def _packing(row: Row) -> dict[str, Any]:
    total = row.number("total_porosity", 0.2, 0.99)
    bed = row.number("interstitial_porosity", 0.2, 0.6)
    if bed >= total and not row.faults:
        row.fault("interstitial_porosity", f"less than the total porosity, {total:g}")
    curves = [row.curve(key) for key in ("knox", "knox_best", "knox_worst")]
    usual = curves[0]
    best, worst = (curve or usual for curve in curves[1:])
    if usual and best and worst and not usual[1] == best[1] == worst[1]:
        row.fault("knox", "one velocity in knox, knox_best and knox_worst")
    if usual and best and worst and not all(low <= at <= high for low, at, high in zip(best[0], usual[0], worst[0],
                                                                                         strict=True)):  # fmt: skip
        row.fault("knox", "A, B and C from those of knox_best to those of knox_worst")
    return {
        "total_porosity": total,
        "total_range": row.around("total_range", total),
        "interstitial_porosity": bed,
        "interstitial_range": row.around("interstitial_range", bed),
        "knox": usual[0] if usual else None,
        "knox_best": best[0] if best else None,
        "knox_worst": worst[0] if worst else None,
        "velocity": usual[1] if usual else VELOCITIES[0],
    }


def _column(row: Row) -> dict[str, Any]:
    plates = row.number("plates", 1.0, 1e8) if row.has("plates") else None
    plates_at = row.maybe("plates_at", FLOW, 1e-14, 1e-5)
    if plates_at is not None and plates is None:
        row.fault("plates_at", "plates with it, which hold at this flow")
    return {
        "bore": row.measure("bore", LENGTH, 5e-6, 0.2),
        "length": row.measure("length", LENGTH, 1e-3, 20.0),
        "particle": row.measure("particle", LENGTH, 0.1e-6, 0.5e-3),
        "packing": row.text("packing") if row.has("packing") else "",
        "plates": plates,
        "plates_at": plates_at,
        "total_porosity": row.maybe("total_porosity", RATIO, 0.2, 0.99),
        "max_pressure": row.maybe("max_pressure", PRESSURE, 1e3, 3e8),
    }


def _tubing(row: Row) -> dict[str, Any]:
    bore = row.measure("bore", LENGTH, 1e-6, 10e-3)
    reel = row.maybe("reel", LENGTH, 1e-6, 10e-3)
    return {
        "name": f"{bore * 1e3:g} mm",
        "bore": bore,
        "reel_inches": None if reel is None else reel / 0.0254,
        "tolerance": row.measure("tolerance", RATIO, 0.0, 0.5),
        "tolerance_from": row.text("tolerance_from"),
        "materials": row.texts("materials"),
    }


def _material(row: Row) -> dict[str, Any]:
    return {"avoid": row.texts("avoid"), "caution": row.text("caution")}


def _cell(row: Row) -> dict[str, Any]:
    return {
        "volume": row.measure("volume", VOLUME, 1e-15, 1e-3),
        "path_length": row.maybe("path_length", LENGTH, 1e-5, 1.0),
        "max_pressure": row.maybe("max_pressure", PRESSURE, 1e3, 3e8),
    }


def _instrument(row: Row) -> dict[str, Any]:
    return {
        "variance": row.span("variance", VARIANCE, 1e-30, 1e-10),
        "convention": row.text("convention"),
        "conditions": row.text("conditions"),
    }


SOLVENTS = Kind("solvents", "solvent", "liquids of mobile phases", Solvent, _solvent)
MIXTURES = Kind("mixtures", "mixture", "viscosity of liquids with water", Mixture, _mixture)
SOLUTES = Kind("solutes", "solute", "diffusion in water, molar mass and volume", Solute, _solute)
PACKINGS = Kind("packings", "packing", "porosities and reduced plate height of columns", Packing, _packing)
COLUMNS = Kind("columns", "column", "usual column formats", ColumnFormat, _column)
TUBING = Kind("tubing", "tubing", "stock bores of connecting tubing", Tubing, _tubing)
MATERIALS = Kind("materials", "material", "materials of tubing, with cautions", Material, _material)
CELLS = Kind("cells", "cell", "usual detector cells", CellFormat, _cell)
INSTRUMENTS = Kind("instruments", "instrument", "classes of instruments by variance", InstrumentClass, _instrument)
KINDS: tuple[Kind[Any], ...] = (
    SOLVENTS, MIXTURES, SOLUTES, PACKINGS, COLUMNS, TUBING, MATERIALS, CELLS, INSTRUMENTS,
)  # fmt: skip
