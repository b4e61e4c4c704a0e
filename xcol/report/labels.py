"""How parts, contributions and values are called in reports; units as people read them."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.flowpath.kinds import KINDS
from xcol.units import (
    DENSITY,
    DIFFUSION,
    FLOW,
    FREQUENCY,
    LENGTH,
    PRESSURE,
    RATIO,
    TEMPERATURE,
    TIME,
    VARIANCE,
    VISCOSITY,
    VOLUME,
    Quantity,
    convert,
    significant,
)

if TYPE_CHECKING:
    from xcol.flowpath.model import Part, Reading

# For each quantity the units to show it in, each with the SI value from which it is used.
_UNITS: dict[str, tuple[tuple[float, str], ...]] = {
    LENGTH.name: ((1.0, "m"), (1e-4, "mm"), (0.0, "um")),
    VOLUME.name: ((1e-6, "mL"), (1e-10, "uL"), (0.0, "nL")),
    FLOW.name: ((1e-7 / 60, "mL/min"), (1e-9 / 60, "uL/min"), (0.0, "nL/min")),
    TIME.name: ((120.0, "min"), (1e-2, "s"), (0.0, "ms")),
    FREQUENCY.name: ((0.0, "Hz"),),
    PRESSURE.name: ((0.0, "bar"),),
    TEMPERATURE.name: ((0.0, "degC"),),
    VISCOSITY.name: ((0.0, "mPa s"),),
    DIFFUSION.name: ((0.0, "m^2/s"),),
    DENSITY.name: ((0.0, "kg/m^3"),),
    VARIANCE.name: ((0.0, "uL^2"),),
}


def pretty(unit: str) -> str:
    """Return a unit as it is printed.

    >>> pretty("uL^2"), pretty("degC")
    ('µL²', '°C')
    """
    for plain, printed in (("uL", "µL"), ("um", "µm"), ("^2", "²"), ("^3", "³"), ("degC", "°C")):
        unit = unit.replace(plain, printed)
    return unit


def show(value: float, quantity: Quantity | None, digits: int = 3) -> str:
    """Return an SI value with a unit that suits its size.

    >>> show(20e-9, VOLUME), show(0.254e-3, LENGTH)
    ('20 µL', '0.254 mm')
    """
    if quantity is None or quantity is RATIO:
        return significant(value, max(digits, 6))
    unit = next(unit for least, unit in _UNITS[quantity.name] if abs(value) >= least)
    return f"{significant(convert(value, unit, quantity), digits)} {pretty(unit)}"


def show_reading(reading: Reading) -> str:
    """Return what was read, with its unit."""
    if isinstance(reading.value, float):
        return show(reading.value, reading.quantity, 4)
    return str(reading.value)


def name_of(part: Part) -> str:
    """Return the part's name, or what it is: 'tube 400 x 0.254 mm'."""
    return part.name or f"{part.kind} {_sizes(part)}".strip()


def short_name(part: Part) -> str:
    """Return the part's name in a sentence: at most 24 characters."""
    name = name_of(part)
    return name if len(name) <= 24 else f"{name[:21]}..."


def quoted(part: Part) -> str:
    """Return the part's name in a sentence, in quotes where it was entered; an injection without one is the loop."""
    if part.name:
        return f'"{short_name(part)}"'
    return "the loop" if part.kind == "inject" else short_name(part)


def column_label(part: Part) -> str:
    """Return a column's name and sizes: 'column 2.1 x 100 mm'."""
    return f"{part.name or part.kind} {_sizes(part)}".strip()


def _sizes(part: Part) -> str:
    values = {reading.key: reading for reading in part.readings}
    if not {"bore", "length"} <= set(values):
        return ""
    pair = ("bore", "length") if part.kind == "column" else ("length", "bore")
    first, second = (show_reading(values[key]) for key in pair)
    if first.split()[1:] == second.split()[1:]:  # the trade writes a common unit once
        first = first.split()[0]
    return f"{first} x {second}"


def contribution_label(part: Part, contribution: str) -> str:
    """Return the line's label: 'injected 20 µL', 'UV time constant 0.5 s', 'valve to column'."""
    _, size = _size_of(part, contribution)
    if contribution == "injection":
        return f"injected {size}" + (f", {part.name}" if part.name else "")
    return f"{contribution_name(part, contribution, name_of(part))} {size}".strip()


def contribution_name(part: Part, contribution: str, name: str) -> str:
    """Return the label without its size, ``name`` being the part's: 'UV time constant', 'valve to column'."""
    if part.kind != "detector":
        return name
    key, _ = _size_of(part, contribution)  # a time constant is not a rise time: the key says which
    return f"{name} {key.replace('_', ' ') or contribution}"


def _size_of(part: Part, contribution: str) -> tuple[str, str]:
    """Return the key that says how large a contribution is, and its value as it is printed; "" where there is none."""
    values = {reading.key: reading for reading in part.readings}
    kind, _, number = contribution.partition(" ")  # "filter 2" is the second of the list
    listed = values.get(f"filters {number}") or values.get("filters") if number else None
    if listed is not None:
        key, _, value = show_reading(listed).partition(" ")
        return key, value
    key = next((key for key in KINDS[part.kind].sizes.get(kind, ()) if key in values), "")
    return key, show_reading(values[key]) if key else ""
