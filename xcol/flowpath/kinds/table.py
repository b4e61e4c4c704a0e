"""What a row of the table of kinds has, and what all kinds share."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from xcol import catalog_kinds
from xcol.flowpath.elements import Element
from xcol.flowpath.file_keys import TEMPERATURES
from xcol.flowpath.findings import Draft
from xcol.flowpath.keys import Key, Later, Measure, Number, Text, Tolerance, Value
from xcol.units import LENGTH, PRESSURE, VOLUME, Quantity, parse

Elements = tuple[Element, ...]

# Absurd outside of these; what is only odd is found by slips.py.
VOLUMES = Measure(VOLUME, 1e-16, 1e-3, zero=True)  # 0.1 pL to 1 L
TUBE_LENGTHS = Measure(LENGTH, 1e-5, 100.0, zero=True)
TUBE_BORES = Measure(LENGTH, 1e-6, 10e-3)
DROPS = Measure(PRESSURE, 1.0, 3e8, zero=True)
LIMITS = Measure(PRESSURE, 1e3, 3e8)
TANKS = Number(1, 1000, "a number of tanks in series")

NAME = Key("name", Text(60), "name in the report")
COMMON = (
    NAME,
    Key("note", Text(2000), "anything: reel colour, outside diameter, age"),
    Key("max_pressure", LIMITS, "highest pressure allowed at the part's inlet"),
    Key("max_drop", LIMITS, "highest pressure drop allowed across the part"),
    Key("temperature", TEMPERATURES, "temperature of this part, where it differs"),
    Key("flow", Later(), "flow through this part, where it differs"),
    Key("bore_tolerance", Tolerance(), "tolerance of the bore"),
    Key("length_tolerance", Tolerance(), "tolerance of the length"),
    Key("volume_tolerance", Tolerance(), "tolerance of the volume"),
)
DROP = Key("drop", DROPS, "measured pressure drop at this flow")


@dataclass(frozen=True)
class Kind:
    """One kind of part.

    ``size`` reads the kind key's value as sizes [SI] by key (None: it is always a name); ``ways``
    are the sets of keys that give a size; ``elements`` says what the part consists of.
    """

    name: str
    meaning: str
    example: str
    keys: tuple[Key, ...]
    ways: tuple[tuple[str, ...], ...]
    size: Callable[[str], dict[str, float]] | None
    elements: Callable[[Draft], Elements]
    sizes: dict[str, tuple[str, ...]]  # for each contribution the keys that say how large it is
    # the catalog whose rows are used by their name, and what such a row gives, by key
    catalog: catalog_kinds.Kind[Any] | None = None
    of_row: Callable[[Any, Draft], dict[str, Value]] | None = None

    def key(self, name: str) -> Key | None:
        """Return the key of this name, None where this kind has none."""
        return next((key for key in self.all_keys if key.name == name), None)

    @property
    def all_keys(self) -> tuple[Key, ...]:
        """The kind's own keys and those that all kinds have."""
        return (*self.keys, *COMMON)


def one_size(key: str, quantity: Quantity) -> Callable[[str], dict[str, float]]:
    """Return the reader of a size that is one quantity."""
    return lambda text: {key: parse(text, quantity)}


def must(draft: Draft, key: str) -> float:
    """Return a number that the way of giving the size makes sure of."""
    value = draft.number(key)
    if value is None:
        raise LookupError(key)
    return value
