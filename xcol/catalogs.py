"""Catalog files -> typed records, checked on loading.

Every row has a ``source``; quantities carry their unit, as in a path file. An invalid row is named by
file, line and key. A user's own rows are read by the same code and stand before the shipped ones.
"""

from __future__ import annotations

import re
import tomllib
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass, field
from functools import cache
from pathlib import Path
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
    Tubing,
)
from xcol.errors import Fault, InputError, Place
from xcol.units import (
    DENSITY,
    DIFFUSION,
    LENGTH,
    MOLAR_MASS,
    MOLAR_VOLUME,
    PRESSURE,
    RATIO,
    TEMPERATURE,
    VARIANCE,
    VOLUME,
    Quantity,
    UnitError,
    parse,
    plain,
    quote,
)

# Shipped inside the package in a wheel; at the top of the repository in an editable install.
_FOLDERS = (Path(__file__).parent / "catalog_files", Path(__file__).parent.parent / "catalogs")

Lines = Callable[[str, int], Mapping[str, int]]  # the lines of the keys of a table's n-th row, its own as ""

WATER_FORMULA = "IAPWS"
VELOCITIES = ("hold-up", "interstitial")  # u = L/t0, or that between the particles
SHAPES = ("small", "globular", "chain", "rod")


R = TypeVar("R", bound=Record)


@dataclass(frozen=True)
class Kind(Generic[R]):
    """A kind of catalog: ``name`` is its file, ``table`` what heads a row, ``make`` checks one."""

    name: str
    table: str
    meaning: str
    record: type[R]
    make: Callable[[_Row], dict[str, Any]] = field(repr=False)

    def of(self, row: _Row) -> R:
        """Return the record of a row; raises ``InputError``."""
        values = {"also": row.texts("also"), "source": row.text("source"), "file": row.owner} | self.make(row)
        if "name" not in values:
            values["name"] = row.text("name")
        row.refuse_unknown()
        return self.record(**values)


@dataclass
class _Row:
    """One row while it is checked."""

    place: Place
    owner: str
    values: Mapping[str, Any]
    lines: Mapping[str, int]
    asked: set[str] = field(default_factory=set)

    def has(self, key: str) -> bool:
        self.asked.add(key)
        return key in self.values

    def text(self, key: str) -> str:
        value = self._value(key)
        if not isinstance(value, str) or not value.strip() or len(value) > 400:
            raise self.fault(key, "a text that is not empty, of 400 characters at most")
        return plain(value)

    def texts(self, key: str) -> tuple[str, ...]:
        if not self.has(key):
            return ()
        value = self._value(key)
        if not isinstance(value, list) or not all(isinstance(one, str) and one.strip() for one in value):
            raise self.fault(key, "a list of texts")
        return tuple(plain(one) for one in value)

    def choice(self, key: str, options: tuple[str, ...], default: str) -> str:
        value = self.text(key) if self.has(key) else default
        if value not in options:
            raise self.fault(key, f"one of {', '.join(options)}")
        return value

    def measure(self, key: str, quantity: Quantity, low: float, high: float) -> float:
        value = self._value(key)
        if not isinstance(value, str):
            raise self.fault(key, f'{quantity.name} in quotes with its unit, as in "1 {quantity.likely[0]}"')
        return self._parsed(key, value, quantity, low, high)

    def maybe(self, key: str, quantity: Quantity, low: float, high: float) -> float | None:
        return self.measure(key, quantity, low, high) if self.has(key) else None

    def number(self, key: str, low: float, high: float) -> float:
        value = self._value(key)
        if isinstance(value, bool) or not isinstance(value, int | float) or not low <= value <= high:
            raise self.fault(key, f"a number from {low:g} to {high:g}")
        return float(value)

    def numbers(self, key: str, count: int) -> tuple[float, ...]:
        value = self._value(key)
        if (
            not isinstance(value, list)
            or len(value) != count
            or not all(isinstance(one, int | float) and not isinstance(one, bool) and abs(one) <= 100 for one in value)
        ):
            raise self.fault(key, f"a list of {count} numbers from -100 to 100")
        return tuple(float(one) for one in value)

    def span(self, key: str, quantity: Quantity, low: float, high: float) -> Span:
        value = self._value(key)
        if isinstance(value, list) and len(value) == 2 and all(isinstance(end, str) for end in value):
            first, last = (self._parsed(key, end, quantity, low, high) for end in value)
            if first <= last:
                return first, last
        raise self.fault(key, f"{quantity.name} from and to, the smaller first, each in quotes with its unit")

    def fractions(self, key: str) -> Span:
        value = self._value(key)
        if isinstance(value, list) and len(value) == 2 and all(type(end) in (int, float) for end in value):
            first, last = value
            if 0 < first <= last < 1:
                return float(first), float(last)
        raise self.fault(key, "two fractions below 1, the smaller first")

    def triple(self, key: str) -> tuple[float, float, float]:
        first, second, third = self.numbers(key, 3)
        return first, second, third

    def refuse_unknown(self) -> None:
        for key in self.values:
            if key not in self.asked:
                raise self.fault(str(key), f"one of the row's keys: {', '.join(sorted(self.asked))}")

    def fault(self, key: str, expected: str, suggestion: str = "correct the row, or leave it out") -> InputError:
        place = Place(self.place.file, self.lines.get(key) or self.place.line, self.place.part, plain(key)[:60])
        raw = self.values.get(key)
        read = (quote(raw) if isinstance(raw, str) else quote(repr(raw))) if key in self.values else "nothing"
        return InputError((Fault(place, read, expected, suggestion),))

    def _value(self, key: str) -> Any:
        self.asked.add(key)
        return self.values.get(key)

    def _parsed(self, key: str, text: str, quantity: Quantity, low: float, high: float) -> float:
        try:
            value = parse(text, quantity)
        except UnitError as error:
            raise self.fault(key, error.expected, error.suggestion) from None
        if not low <= value <= high:
            raise self.fault(key, f"{quantity.name} from {low:g} to {high:g} {quantity.si}".rstrip())
        return value


_LIQUID = (TEMPERATURE, 150.0, 600.0)
_MASS = (MOLAR_MASS, 1e-3, 1e5)


def _solvent(row: _Row) -> dict[str, Any]:
    own = row.has("viscosity") and row.values["viscosity"] == WATER_FORMULA
    span = row.span("span", *_LIQUID)
    coefficients = None if own else row.triple("viscosity")
    if coefficients:
        a, b, c = coefficients
        if not all(-7 < a + b * 1e3 / end + c * (1e3 / end) ** 2 < 7 for end in span):
            raise row.fault("viscosity", "A, B, C that give 0.001 to 1000 mPa s over the span")
    return {
        "molar_mass": row.measure("molar_mass", *_MASS),
        "density": row.measure("density", DENSITY, 400.0, 3000.0),
        "expansion": row.number("expansion", 0.0, 0.01),
        "association": row.number("association", 0.5, 5.0),
        "viscosity": coefficients,
        "span": span,
        "uncertainty": row.measure("uncertainty", RATIO, 0.0, 1.0),
    }


def _mixture(row: _Row) -> dict[str, Any]:
    span = row.span("span", *_LIQUID)
    return {
        "liquid": row.text("liquid"),
        "excess": row.numbers("excess", 4),
        "heat": row.number("heat", -100.0, 100.0),
        "span": span,
        "uncertainty": row.measure("uncertainty", RATIO, 0.0, 1.0),
        "far": row.measure("far", TEMPERATURE, span[1] + 1.0, 600.0),
        "uncertainty_far": row.measure("uncertainty_far", RATIO, 0.0, 1.0),
    }


def _solute(row: _Row) -> dict[str, Any]:
    diffusion = row.maybe("diffusion", DIFFUSION, 1e-14, 3e-8)
    mass = row.maybe("molar_mass", *_MASS)
    if diffusion is None and mass is None:
        raise row.fault("molar_mass", "molar_mass, or a measured diffusion with its temperature")
    return {
        "formula": row.text("formula") if row.has("formula") else "",
        "molar_mass": mass,
        "molecule": row.choice("molecule", SHAPES, "small"),
        "molar_volume": row.maybe("molar_volume", MOLAR_VOLUME, 1e-6, 1e-2),
        "diffusion": diffusion,
        "at": row.measure("at", TEMPERATURE, 273.15, 373.15) if diffusion is not None else None,
    }


def _packing(row: _Row) -> dict[str, Any]:
    has_curve = row.has("knox")
    return {
        "total_porosity": row.number("total_porosity", 0.2, 0.99),
        "total_range": row.fractions("total_range"),
        "interstitial": row.number("interstitial", 0.2, 0.6),
        "interstitial_range": row.fractions("interstitial_range"),
        "knox": row.triple("knox") if has_curve else None,
        "knox_best": row.triple("knox_best") if has_curve else None,
        "knox_worst": row.triple("knox_worst") if has_curve else None,
        "velocity": row.choice("velocity", VELOCITIES, VELOCITIES[0]),
    }


def _column(row: _Row) -> dict[str, Any]:
    return {
        "bore": row.measure("bore", LENGTH, 5e-6, 1.0),
        "length": row.measure("length", LENGTH, 1e-3, 20.0),
        "particle": row.measure("particle", LENGTH, 0.1e-6, 0.5e-3),
        "packing": row.text("packing"),
        "plates": row.number("plates", 1.0, 1e8) if row.has("plates") else None,
    }


def _tubing(row: _Row) -> dict[str, Any]:
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


def _material(row: _Row) -> dict[str, Any]:
    return {"avoid": row.texts("avoid"), "caution": row.text("caution")}


def _cell(row: _Row) -> dict[str, Any]:
    return {
        "volume": row.measure("volume", VOLUME, 1e-15, 1e-3),
        "path_length": row.maybe("path_length", LENGTH, 1e-5, 1.0),
        "max_pressure": row.maybe("max_pressure", PRESSURE, 1e3, 3e8),
    }


def _instrument(row: _Row) -> dict[str, Any]:
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


class Catalogs:
    """What is known: the shipped rows, each kind read when it is first asked for, and the user's own.

    An own row stands before the shipped ones, and in place of one that has its name.
    """

    def __init__(self, own: Iterable[Record] = ()) -> None:
        self._own = tuple(own)

    def rows(self, kind: Kind[R]) -> tuple[R, ...]:
        """Return the rows of a kind, the user's own first (a later one in place of an earlier)."""
        own: dict[str, R] = {}
        for record in self._own:
            if isinstance(record, kind.record):
                own[normal(record.name)] = record
        return (*own.values(), *(row for row in _shipped(kind) if not own.keys() & _names(row)))

    def find(self, kind: Kind[R], word: str) -> R | None:
        """Return the row of that name, or other name, however it is spelled; None without one."""
        asked = normal(word)
        rows = self.rows(kind)
        named = next((row for row in rows if normal(row.name) == asked), None)
        return named or next((row for row in rows if asked in _names(row)), None)

    def near(self, kind: Kind[Any], word: str) -> str:
        """Return the name of a row, or other name, that is closest to a word; "" where none is close."""
        import difflib  # noqa: PLC0415  (only on the way to an error)

        names = {normal(name): name for row in self.rows(kind) for name in (row.name, *row.also)}
        found = difflib.get_close_matches(normal(word)[:60], names, n=1, cutoff=0.6)
        return names[found[0]] if found else ""

    def replaced(self) -> list[tuple[Record, Record]]:
        """Return the user's own rows that stand in place of shipped ones, each with the one it replaces."""
        found = []
        for record in self._own:
            kind = next(kind for kind in KINDS if kind.record is type(record))
            found += [(record, row) for row in _shipped(kind) if normal(record.name) in _names(row)]
        return found

    def usual_packing(self) -> Packing:
        """Return what is assumed of a column whose packing nobody described."""
        return self.find(PACKINGS, "fully porous") or self.rows(PACKINGS)[0]


def normal(word: str) -> str:
    """Return a name as it is compared: lower case, hyphens and spaces alike.

    >>> normal("N-Hexane "), normal("core  shell")
    ('n hexane', 'core shell')
    """
    return " ".join(re.sub(r"[-\u2010\u2011_]", " ", word.lower()).split())


def _names(row: Record) -> set[str]:
    return {normal(name) for name in (row.name, *row.also)}


def records_of(data: Mapping[str, Any], file: str, owner: str, lines: Lines) -> tuple[tuple[Record, ...], list[Fault]]:
    """Return the records of a catalog's tables, whatever their kinds, and what is wrong with its rows."""
    tables = {kind.table: kind for kind in KINDS}
    records, faults = [], []
    for table, rows in data.items():
        kind = tables.get(table) or next((kind for kind in KINDS if kind.name == table), None)
        if kind is None or not isinstance(rows, list):
            known = ", ".join(f"[[{name}]]" for name in tables)
            place = Place(file, lines(table, 0).get("") or lines("", 0).get(table), "", plain(str(table))[:60])
            faults.append(Fault(place, quote(table), f"tables of a catalog: {known}", "[[solute]] above each row"))
            continue
        for number, values in enumerate(rows):
            where = lines(table, number)
            place = Place(file, where.get(""), f"{kind.table} {number + 1}")
            if not isinstance(values, dict):
                faults.append(Fault(place, quote(values), "a row with keys", f"[[{kind.table}]] above the row's keys"))
                continue
            try:
                records.append(kind.of(_Row(place, owner, values, where)))
            except InputError as error:
                faults += error.faults
    return tuple(records), faults


@cache
def _shipped(kind: Kind[R]) -> tuple[R, ...]:
    """Return the shipped rows of a kind; raises ``InputError``."""
    file = f"{kind.name}.toml"
    path = folder() / file
    try:
        text = path.read_text(encoding="utf-8")
        data = tomllib.loads(text)
    except (OSError, ValueError) as error:
        fault = Fault(Place(file=file), str(error), "a readable catalog", "install xcol again")
        raise InputError((fault,)) from None
    records, faults = records_of(data, file, "", lambda table, number: _header_line(text, table, number))
    if faults:
        raise InputError(tuple(faults))
    return tuple(record for record in records if isinstance(record, kind.record))


def _header_line(text: str, table: str, number: int) -> dict[str, int]:
    """Return the line of the n-th ``[[table]]``; shipped catalogs are written with such headers only."""
    headers = re.finditer(rf"^\s*\[\[\s*{re.escape(table)}\s*\]\]", text, re.M)
    lines = [text.count("\n", 0, match.end()) + 1 for match in headers]
    return {"": lines[number]} if number < len(lines) else {}


def folder() -> Path:
    """Return the folder of the shipped catalogs."""
    for candidate in _FOLDERS:
        if candidate.is_dir():
            return candidate
    place = Place(file="catalogs")
    raise InputError((Fault(place, "nothing", "the catalogs that ship with xcol", "install xcol again"),))
