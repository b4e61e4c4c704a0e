"""Catalog files -> typed records, checked on loading.

Every row has a ``source``. An invalid row is named by file and number.
"""

from __future__ import annotations

import tomllib
from dataclasses import dataclass
from functools import cache
from pathlib import Path
from typing import Any

from xcol.errors import Fault, InputError, Place

# Shipped inside the package in a wheel; at the top of the repository in an editable install.
_FOLDERS = (Path(__file__).parent / "catalog_files", Path(__file__).parent.parent / "catalogs")


@dataclass(frozen=True)
class Packing:
    """What is usual of a column packing; porosities as fractions of the column's volume."""

    name: str
    total_porosity: float
    total_range: tuple[float, float]
    interstitial: float
    interstitial_range: tuple[float, float]
    source: str


@dataclass(frozen=True)
class Tubing:
    """A stock bore [m] of connecting tubing, and the inches that reels carry (None: they do not)."""

    bore: float
    reel_inches: float | None
    source: str


def folder() -> Path:
    """Return the folder of the shipped catalogs."""
    for candidate in _FOLDERS:
        if candidate.is_dir():
            return candidate
    place = Place(file="catalogs")
    raise InputError((Fault(place, "nothing", "the catalogs that ship with xcol", "install xcol again"),))


def usual_packing() -> Packing:
    """Return what is assumed of a column whose packing nobody described."""
    return packings()["fully porous"]


@cache
def packings() -> dict[str, Packing]:
    """Return the column packings by name."""
    return {
        (row := _Row(file, number, values)).text("name"): Packing(
            row.text("name"),
            row.fraction("total_porosity"),
            row.span("total_range"),
            row.fraction("interstitial"),
            row.span("interstitial_range"),
            row.text("source"),
        )
        for file, number, values in _rows("packings.toml", "packing")
    }


@cache
def tubing() -> tuple[Tubing, ...]:
    """Return the stock bores, narrowest first."""
    rows = (_Row(*row) for row in _rows("tubing.toml", "tubing"))
    records = [
        Tubing(
            r.positive("bore_mm") * 1e-3,
            r.positive("reel_in") if "reel_in" in r.values else None,
            r.text("source"),
        )
        for r in rows
    ]
    return tuple(sorted(records, key=lambda record: record.bore))


def _rows(file: str, table: str) -> list[tuple[Path, int, dict[str, Any]]]:
    path = folder() / file
    try:
        data = tomllib.loads(path.read_text(encoding="utf-8"))
    except (OSError, ValueError) as error:
        fault = Fault(Place(file=file), str(error), "a readable catalog", "install xcol again")
        raise InputError((fault,)) from None
    return [(path, number, row) for number, row in enumerate(data.get(table, []), start=1)]


@dataclass(frozen=True)
class _Row:
    """One row while it is checked."""

    file: Path
    number: int
    values: dict[str, Any]

    def text(self, key: str) -> str:
        value = self.values.get(key)
        if not isinstance(value, str) or not value.strip():
            raise self._fault(key, "a text that is not empty")
        return value

    def positive(self, key: str) -> float:
        value = self.values.get(key)
        if isinstance(value, bool) or not isinstance(value, int | float) or not value > 0:
            raise self._fault(key, "a number above 0")
        return float(value)

    def fraction(self, key: str) -> float:
        value = self.positive(key)
        if value >= 1:
            raise self._fault(key, "a fraction below 1")
        return value

    def span(self, key: str) -> tuple[float, float]:
        value = self.values.get(key)
        if not (
            isinstance(value, list)
            and len(value) == 2
            and all(isinstance(end, int | float) for end in value)
            and 0 < value[0] <= value[1] < 1
        ):
            raise self._fault(key, "two fractions, the smaller first")
        return float(value[0]), float(value[1])

    def _fault(self, key: str, expected: str) -> InputError:
        place = Place(file=self.file.name, part=f"row {self.number}", key=key)
        read = repr(self.values[key]) if key in self.values else "nothing"
        return InputError((Fault(place, read, expected, "correct the row, or leave it out"),))
