"""Text with a unit to SI floats, and back.

Everyday units are read from a table of factors, since importing pint costs more than all the rest
of the program's start; every other unit is looked up in one pint registry that knows this
project's own short list of definitions. A test makes the table again from the registry.

Number and unit are split before anything is looked up. Nothing is evaluated: the number is one
decimal number, the unit at most four names with single-digit powers.
"""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from functools import cache
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Sequence

    import pint

MAX_LENGTH = 80  # characters of a quantity; longer text is not a quantity


class UnitError(ValueError):
    """A text that cannot be read as the quantity asked for."""

    def __init__(self, read: str, expected: str, suggestion: str) -> None:
        super().__init__(f"read {read}; expected {expected}; try {suggestion}")
        self.read = read
        self.expected = expected
        self.suggestion = suggestion


@dataclass(frozen=True)
class Quantity:
    """A kind of quantity: its name with article, its SI unit, and what people usually type."""

    name: str
    si: str
    likely: tuple[str, ...]
    everyday: dict[str, float]


def _volumes() -> dict[str, float]:
    liters = {"L": 1e-3, "mL": 1e-6, "uL": 1e-9, "nL": 1e-12, "pL": 1e-15}
    return liters | {
        "l": 1e-3, "ml": 1e-6, "ul": 1e-9, "nl": 1e-12, "pl": 1e-15, "cc": 1e-6,
        "m^3": 1.0, "cm^3": 1e-6, "mm^3": 1e-9, "um^3": 1e-18,
    }  # fmt: skip


def _flows() -> dict[str, float]:
    times = {"s": 1.0, "min": 60.0, "h": 3600.0}
    return {
        f"{volume}/{time}": factor / seconds for volume, factor in _volumes().items() for time, seconds in times.items()
    }


LENGTH = Quantity("a length", "m", ("mm", "cm", "um", "in"), {
    "m": 1.0, "cm": 1e-2, "mm": 1e-3, "um": 1e-6, "nm": 1e-9, "in": 0.0254, "inch": 0.0254,
    "inches": 0.0254, "thou": 2.54e-5, "mil": 2.54e-5,
})  # fmt: skip
VOLUME = Quantity("a volume", "m^3", ("uL", "mL", "nL"), _volumes())
FLOW = Quantity("a flow rate", "m^3/s", ("mL/min", "uL/min", "nL/min"), _flows())
TIME = Quantity("a time", "s", ("s", "ms", "min"), {
    "s": 1.0, "sec": 1.0, "ms": 1e-3, "us": 1e-6, "min": 60.0, "h": 3600.0,
})  # fmt: skip
FREQUENCY = Quantity("a frequency", "Hz", ("Hz",), {
    "Hz": 1.0, "kHz": 1e3, "1/s": 1.0, "1/min": 1 / 60,
})  # fmt: skip
PRESSURE = Quantity("a pressure", "Pa", ("bar", "MPa", "psi"), {
    "Pa": 1.0, "kPa": 1e3, "MPa": 1e6, "bar": 1e5, "mbar": 1e2, "psi": 6894.757293168361,
    "atm": 101325.0,
})  # fmt: skip
TEMPERATURE = Quantity("a temperature", "K", ("degC", "K"), {
    "K": 1.0, "degC": 1.0, "C": 1.0, "celsius": 1.0, "degF": 5 / 9,
})  # fmt: skip
_ZERO = {"degC": 273.15, "C": 273.15, "celsius": 273.15, "degF": 459.67 * 5 / 9}
VISCOSITY = Quantity("a viscosity", "Pa s", ("mPa s", "cP"), {
    "Pa s": 1.0, "mPa s": 1e-3, "mPas": 1e-3, "uPa s": 1e-6, "cP": 1e-3, "P": 0.1,
})  # fmt: skip
DIFFUSION = Quantity("a diffusion coefficient", "m^2/s", ("m^2/s", "cm^2/s"), {
    "m^2/s": 1.0, "cm^2/s": 1e-4, "mm^2/s": 1e-6, "um^2/s": 1e-12,
})  # fmt: skip
MOLAR_MASS = Quantity("a molar mass", "kg/mol", ("g/mol", "kDa"), {
    "kg/mol": 1.0, "g/mol": 1e-3, "Da": 1e-3, "kDa": 1.0,
})  # fmt: skip
MOLAR_VOLUME = Quantity("a molar volume", "m^3/mol", ("cm^3/mol",), {
    "m^3/mol": 1.0, "cm^3/mol": 1e-6, "mL/mol": 1e-6, "ml/mol": 1e-6, "L/mol": 1e-3,
})  # fmt: skip
DENSITY = Quantity("a density", "kg/m^3", ("kg/m^3", "g/mL"), {
    "kg/m^3": 1.0, "g/cm^3": 1e3, "g/mL": 1e3, "g/ml": 1e3, "kg/L": 1e3, "g/L": 1.0,
})  # fmt: skip
VARIANCE = Quantity("a variance (a volume squared)", "m^6", ("uL^2", "mL^2"), {
    "m^6": 1.0, "uL^2": 1e-18, "ul^2": 1e-18, "mL^2": 1e-12, "ml^2": 1e-12, "nL^2": 1e-24,
    "nl^2": 1e-24, "mm^6": 1e-18,
})  # fmt: skip
RATIO = Quantity("a plain ratio or per cent", "", ("", "%"), {"": 1.0, "%": 0.01})

QUANTITIES = (
    LENGTH, VOLUME, FLOW, TIME, FREQUENCY, PRESSURE, TEMPERATURE, VISCOSITY, DIFFUSION,
    MOLAR_MASS, MOLAR_VOLUME, DENSITY, VARIANCE, RATIO,
)  # fmt: skip

_DEFINITIONS = """
atto- = 1e-18 = a-
femto- = 1e-15 = f-
pico- = 1e-12 = p-
nano- = 1e-9 = n-
micro- = 1e-6 = u-
milli- = 1e-3 = m-
centi- = 1e-2 = c-
deci- = 1e-1 = d-
hecto- = 1e2 = h-
kilo- = 1e3 = k-
mega- = 1e6 = M-
meter = [length] = m = metre
second = [time] = s = sec
gram = [mass] = g
mole = [substance] = mol
kelvin = [temperature]; offset: 0 = K
degree_Celsius = kelvin; offset: 273.15 = degC = celsius = C
degree_Fahrenheit = 5 / 9 * kelvin; offset: 233.15 + 200 / 9 = degF = fahrenheit
minute = 60 * second = min
hour = 60 * minute = h = hr
day = 24 * hour = d
hertz = 1 / second = Hz
inch = 0.0254 * meter = in = inches
foot = 12 * inch = ft
thou = 1e-3 * inch = _ = mil
micron = 1e-6 * meter
angstrom = 1e-10 * meter
liter = 1e-3 * meter ** 3 = L = l = litre
cc = 1e-6 * meter ** 3
newton = kilogram * meter / second ** 2 = N
pascal = newton / meter ** 2 = Pa
mPas = 1e-3 * pascal * second
bar = 1e5 * pascal
atmosphere = 101325 * pascal = atm
torr = 101325 / 760 * pascal = _ = mmHg
kilogram_force = 9.80665 * newton = kgf
pound_force = 4.4482216152605 * newton = lbf
pound_force_per_square_inch = pound_force / inch ** 2 = psi
poise = 0.1 * pascal * second = P
dalton = 1e-3 * kilogram / mole = Da
"""

_NUMBER = re.compile(r"[+-]?(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:[eE][+-]?\d{1,3})?(?![\d.,])")
_FRACTION = re.compile(r"(?:(\d{1,2})\s+)?(\d{1,2})\s*/\s*(\d{1,4})\s*(?:in|inch|inches)\.?")
_UNIT_NAME = r"[A-Za-z]+(?:\^-?[1-9])?"
_UNIT = re.compile(rf"1/{_UNIT_NAME}|{_UNIT_NAME}(?:[ /]{_UNIT_NAME}){{0,3}}")
_TIMES_TEN = re.compile(r"([+-]?[\d.,]+)\s*(?:x|×|\*|·)\s*10\s*\^?\s*([-+−⁻⁺]?[\d⁰¹²³⁴-⁹]+)\s*(.*)")
_SUPERSCRIPTS = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺−", "0123456789-+-")


def spell(unit: str) -> str:
    """Return a unit in the one spelling that the table and the registry know.

    >>> spell("µL²"), spell("mPa·s"), spell("cm2 / s"), spell("°C")
    ('uL^2', 'mPa s', 'cm^2/s', 'degC')
    """
    text = unit.strip().replace("µ", "u").replace("μ", "u").replace("℃", "degC")
    text = re.sub(r"^mc(?=[LlmMgG])", "u", text)  # "mcL", as clinics write the microlitre
    text = re.sub(r"°\s*([CFK])\b", r"deg\1", text).replace("″", "in").replace('"', "in")
    text = re.sub(r"(?<=[A-Za-z])[⁻⁺]?[⁰¹²³⁴-⁹]+", lambda m: "^" + m[0].translate(_SUPERSCRIPTS), text)
    text = re.sub(r"[·⋅∙*]|(?<=[A-Za-z])\.(?=[A-Za-z])", " ", text.replace("**", "^"))
    text = re.sub(r"(?<=[A-Za-z])(-?\d)", r"^\1", text.rstrip(". "))
    text = re.sub(r"\s*([/^])\s*", r"\1", text)
    text = re.sub(r"^(?:per ?cent|pct)$", "%", text)
    return re.sub(r"\s+", " ", text)


def split(text: str, example: str = "0.25 mm") -> tuple[float, str]:
    """Split a text into its number and its unit in the one spelling; raise ``UnitError``.

    ``example`` is what the error offers to someone who typed no number.

    >>> split("1,8 µm")
    (1.8, 'um')
    """
    shown = quote(text)
    if len(text) > MAX_LENGTH:
        raise UnitError(shown, "a number and a unit", f"at most {MAX_LENGTH} characters")
    stripped = text.strip().replace("−", "-")
    if match := _TIMES_TEN.fullmatch(stripped):
        exponent = match[2].translate(_SUPERSCRIPTS)
        raise UnitError(shown, "one decimal number and a unit", f'"{match[1]}e{exponent} {match[3]}"')
    match = _NUMBER.match(stripped)
    if not match:
        raise UnitError(shown, "a number and a unit", f'a decimal number first, as in "{example}"')
    number, unit = match[0], stripped[match.end() :]
    if re.fullmatch(r"[+-]?[1-9]\d{0,2},\d{3}", number):
        point, none = number.replace(",", "."), number.replace(",", "")
        raise UnitError(
            shown,
            "a number that reads one way only (a comma before three digits may mean two things)",
            f'"{point}{unit}" or "{none}{unit}"',
        )
    value = float(number.replace(",", "."))
    if not math.isfinite(value):
        raise UnitError(shown, "a finite number", "fewer digits in the exponent")
    return value, spell(unit)


def plain(text: str) -> str:
    """Return a text on one line, without control characters."""
    return " ".join("".join(c if c.isprintable() else " " for c in text).split())


def quote(text: object) -> str:
    """Return what was read, in quotes, cut where it is long, on one line."""
    shown = plain(str(text)[:200])
    return f'"{shown[:57]}..."' if len(shown) > 60 else f'"{shown}"'


def described(raw: object) -> str:
    """Say what a TOML value is, for a message."""
    if isinstance(raw, str):
        return quote(raw) if raw.strip() else "an empty text"
    if isinstance(raw, bool):
        return str(raw).lower()
    if isinstance(raw, list):
        return "a list"
    if isinstance(raw, dict):
        return "a table"
    if is_huge(raw):
        return "a whole number of very many digits"
    return str(raw)[:60]


def is_huge(raw: object) -> bool:
    """Whether this is a whole number that Python may refuse to write, and float to hold."""
    return isinstance(raw, int) and abs(raw) > 10**18


def parse(text: str, quantity: Quantity, *, fraction: bool = False) -> float:
    """Read a text as this quantity and return it in SI units.

    ``fraction`` allows inch fractions ("1/16 in"), which name an outside or port diameter.
    Raises ``UnitError`` for anything that is not one number with a unit of this quantity.

    >>> parse("0.4 mL/min", FLOW) * 60e6
    0.4
    """
    if match := _FRACTION.fullmatch(text.strip().replace("″", "in").replace('"', "in")):
        value = (int(match[1] or 0) + int(match[2]) / max(int(match[3]), 1)) * 0.0254
        if fraction and quantity is LENGTH and int(match[3]) in (2, 4, 8, 16, 32, 64):
            return value
        if match[3] == "1000" and not match[1]:
            raise UnitError(quote(text), f"{quantity.name} as one decimal number", f'"{int(match[2])} thou"')
        raise UnitError(
            quote(text),
            f"{quantity.name} as one decimal number; an inch fraction names an outside or port diameter",
            'a bore (inside diameter), as in "0.010 in"; an outside diameter can go into note',
        )
    if fraction and re.fullmatch(r"\d{1,2}\s*/\s*\d{1,2}", text.strip()):
        raise UnitError(f"{quote(text)}, without a unit", f"{quantity.name} with its unit", f'"{text.strip()} in"')
    value, unit = split(text, "0.65" if quantity is RATIO else f"1 {quantity.likely[0]}")
    if not unit and quantity is not RATIO:
        raise missing_unit(text.strip(), quantity)
    factor, zero = _factor(unit, quantity, text)
    result = value * factor + zero
    if not math.isfinite(result):
        raise UnitError(quote(text), "a finite number", "a smaller number")
    return result


def missing_unit(number: object, quantity: Quantity, units: Sequence[str] = ()) -> UnitError:
    """Return the error for a bare number where a unit belongs, with the likely readings."""
    options = " or ".join(f'"{number} {unit}"' for unit in (units or quantity.likely)[:3])
    return UnitError(f"{number}, without a unit", f"{quantity.name} with its unit", options)


def convert(value: float, unit: str, quantity: Quantity) -> float:
    """Return an SI value in another unit of the same quantity.

    >>> round(convert(1e7, "bar", PRESSURE), 6), convert(303.15, "degC", TEMPERATURE)
    (100.0, 30.0)
    """
    factor, zero = _factor(spell(unit), quantity, unit)
    return (value - zero) / factor


def write(value: float, unit: str, quantity: Quantity, digits: int = 3) -> str:
    """Return an SI value as text in the unit, with this many significant digits.

    >>> write(1e-6 / 60, "mL/min", FLOW)
    '1 mL/min'
    """
    return f"{significant(convert(value, unit, quantity), digits)} {unit}".rstrip()


def significant(value: float, digits: int = 3, *, zeros: bool = False) -> str:
    """Return a number with this many significant digits, without exponent from 1e-4 to 1e6.

    ``zeros`` keeps those at the end, as a computed figure wants them and an entered one does not.

    >>> significant(8331.2), significant(0.00925926), significant(0.5)
    ('8330', '0.00926', '0.5')
    """
    if value == 0 or not math.isfinite(value):
        return "0" if value == 0 else str(value)
    rounded = float(f"{value:.{digits - 1}e}")
    if not 1e-4 <= abs(rounded) < 1e6:
        mantissa, exponent = f"{rounded:.{digits - 1}e}".split("e")
        if "." in mantissa and not zeros:
            mantissa = mantissa.rstrip("0").rstrip(".")
        return f"{mantissa}e{int(exponent)}"
    decimals = max(digits - 1 - math.floor(math.log10(abs(rounded))), 0)
    text = f"{rounded:.{decimals}f}"
    return text.rstrip("0").rstrip(".") if "." in text and not zeros else text


def _factor(unit: str, quantity: Quantity, text: str) -> tuple[float, float]:
    """Return factor and zero point that lead from the unit to SI."""
    if unit in quantity.everyday:
        return quantity.everyday[unit], _ZERO.get(unit, 0.0) if quantity is TEMPERATURE else 0.0
    for other in QUANTITIES:
        if unit in other.everyday:
            raise _wrong_kind(text, unit, other.name, quantity)
    near = [known for known in quantity.everyday if known.lower() == unit.lower()]
    if near:
        raise _unknown(text, unit, quantity, near[0])
    if len(unit) <= 24 and _UNIT.fullmatch(unit):
        return _factor_from_registry(unit, quantity, text)
    raise _unknown(text, unit, quantity)


def _factor_from_registry(unit: str, quantity: Quantity, text: str) -> tuple[float, float]:
    """Look a unit up in the registry: only units that the everyday table does not have."""
    import pint  # noqa: PLC0415  (half of the program's start, and seldom needed)

    try:
        found = registry().Unit(unit.removeprefix("1/") + "^-1" if unit[:2] == "1/" else unit)
    except (pint.PintError, ValueError, TypeError, AttributeError, AssertionError):
        raise _unknown(text, unit, quantity) from None
    target = registry().Unit(quantity.si or "dimensionless")
    if found.dimensionality != target.dimensionality:
        for other in QUANTITIES:
            if other.si and registry().Unit(other.si).dimensionality == found.dimensionality:
                raise _wrong_kind(text, unit, other.name, quantity)
        raise _wrong_kind(text, unit, "another kind of quantity", quantity)
    zero = registry().Quantity(0.0, found).to(target).magnitude
    return registry().Quantity(1.0, found).to(target).magnitude - zero, zero


@cache
def registry() -> pint.UnitRegistry[float]:
    """Return the one pint registry, with this project's own definitions."""
    import pint  # noqa: PLC0415

    made: pint.UnitRegistry[float] = pint.UnitRegistry(None, autoconvert_offset_to_baseunit=True)
    made.load_definitions(_DEFINITIONS.strip().splitlines())
    return made


def _options(quantity: Quantity) -> str:
    """Return the usual units of a quantity, for a message."""
    return '0.65 or "65 %"' if quantity is RATIO else ", ".join(quantity.likely)


def _wrong_kind(text: str, unit: str, kind: str, quantity: Quantity) -> UnitError:
    """Return the error for a unit of another kind of quantity."""
    return UnitError(
        f"{quote(text)}, and {unit} is {kind}" if unit else quote(text),
        _expected(quantity),
        _in_options(quantity),
    )


def _expected(quantity: Quantity) -> str:
    return f"{quantity.name}, for instance {'' if quantity is RATIO else 'in '}{_options(quantity)}"


def _in_options(quantity: Quantity) -> str:
    if quantity is RATIO:
        return _options(quantity)
    return f"a unit of {quantity.name.split(' ', 1)[1]}: {_options(quantity)}"


def _unknown(text: str, unit: str, quantity: Quantity, near: str = "") -> UnitError:
    """Return the error for a unit that is not known; no near miss is offered but another case.

    A unit that differs by one letter may differ by a factor of 1000.
    """
    read = f"{quote(text)}, with the unit {quote(unit)}"
    odd = [c for c in unit if not c.isascii() and c not in "µμ°²³·×"]
    if odd:  # a letter of another alphabet, or one without width, looks like nothing is wrong
        import unicodedata  # noqa: PLC0415

        read += f", in which there is the character {unicodedata.name(odd[0], 'without a name').lower()}"
    return UnitError(
        read,
        _expected(quantity),
        f'"{near}"' if near else _in_options(quantity),
    )
