"""How the value of one key is read: its type, its unit, what is absurd."""

from __future__ import annotations

import math
import re
from collections.abc import Callable
from dataclasses import dataclass
from typing import Protocol

from xcol.errors import nearest
from xcol.units import (
    LENGTH,
    RATIO,
    Quantity,
    UnitError,
    convert,
    described,
    is_huge,
    missing_unit,
    parse,
    plain,
    quote,
    split,
    write,
)

Value = float | str | bool | tuple[str, ...] | tuple[float, ...]


class Reader(Protocol):
    """Reads a TOML value, or raises ``UnitError`` with what was read, expected, and a suggestion."""

    def __call__(self, raw: object) -> Value:
        """Return the value in SI units."""
        ...


@dataclass(frozen=True)
class Key:
    """One key of a part, of a peak or of the file: how it is read, and what it means."""

    name: str
    read: Reader
    meaning: str

    @property
    def quantity(self) -> Quantity | None:
        """The quantity, where the key has one."""
        return self.read.quantity if isinstance(self.read, Measure) else None


@dataclass(frozen=True)
class Measure:
    """A quantity with its unit, from ``low`` to ``high`` [SI]; outside is absurd. 0 by ``zero``."""

    quantity: Quantity
    low: float
    high: float
    zero: bool = False
    fraction: bool = False  # inch fractions, for port diameters
    otherwise: str = ""  # the key for another quantity that is easily meant

    def __call__(self, raw: object) -> float:
        """Return the value in SI units."""
        if is_huge(raw):
            raise UnitError(described(raw), f"{self.quantity.name} with its unit", "a smaller number")
        if isinstance(raw, int | float) and not isinstance(raw, bool) and self.quantity is not RATIO:
            likely = [unit for unit in self._sensible(float(raw)) if unit != "thou"]
            raise missing_unit(raw, self.quantity, likely)
        try:
            value = parse(_text_or_number(raw, self.quantity), self.quantity, fraction=self.fraction)
        except UnitError as error:
            if not self.otherwise:
                raise
            suggestion = f"{error.suggestion}; or {self.otherwise}"
            raise UnitError(error.read, error.expected, suggestion) from None
        self.check(value, raw)
        return value

    def check(self, value: float, raw: object) -> None:
        """Raise ``UnitError`` if the value [SI] is absurd; ``raw`` is what was typed."""
        if self.low <= value <= self.high or (self.zero and value == 0):
            return
        unit = self.quantity.likely[0]
        span = f"{write(self.low, unit, self.quantity)} to {write(self.high, unit, self.quantity)}"
        in_unit = "" if self.quantity is RATIO else f", which is {write(value, unit, self.quantity)}"
        raise UnitError(
            described(raw) + in_unit,
            f"{self.quantity.name} of {span}" + (", or 0" if self.zero else ""),
            self._other_unit(value, as_typed(raw)),
        )

    def _other_unit(self, value: float, text: str) -> str:
        """Propose the units in which the number that was typed would make sense."""
        if value < 0:
            return "a value within that range"
        typed = {float(found.replace(",", ".")) for found in re.findall(r"\d+(?:[.,]\d+)?(?:[eE][+-]?\d+)?", text)}
        for unit in self.quantity.likely:
            number = convert(value, unit, self.quantity)
            if any(math.isclose(number, known, rel_tol=1e-6) for known in typed):
                units = [u for u in self._sensible(number) if u != "thou" or unit == "in"]
                options = [f'"{number:g} {other}"'.replace(' "', '"') for other in units]
                return f"did you mean {' or '.join(options)}?" if options else "a value within that range"
        return "a value within that range"

    def _sensible(self, number: float) -> list[str]:
        """Return the usual units in which this number is within the range."""
        units = self.quantity.likely
        if self.quantity is LENGTH:
            units = (*units, "thou")
        return [
            unit
            for unit in units
            if math.isfinite(number) and self.low <= _si(number, unit, self.quantity) <= self.high
        ]


@dataclass(frozen=True)
class Number:
    """A plain number from ``low`` to ``high``."""

    low: float
    high: float
    what: str
    whole: bool = False

    def __call__(self, raw: object) -> float:
        """Return the number."""
        value = raw
        if isinstance(raw, str):
            if re.fullmatch(r"\d{1,3}(?:[ ,.'][0-9]{3})+", raw.strip()) and "." not in raw:
                raise UnitError(described(raw), self.what, re.sub(r"\D", "", raw))
            if match := re.fullmatch(r"(\d{1,6}(?:[.,]\d+)?)\s*[kK]", raw.strip()):
                number = float(match[1].replace(",", ".")) * 1000
                raise UnitError(described(raw), self.what, f"{number:.0f}")
            try:
                value, unit = split(raw)
            except UnitError as error:
                raise UnitError(error.read, self.what, "the number alone, without quotes") from None
            if unit:
                raise UnitError(described(raw), f"{self.what}, which has no unit", "the number alone")
        if isinstance(value, bool) or not isinstance(value, int | float):
            raise UnitError(described(raw), self.what, "a number, without quotes")
        # compared before it becomes a float: TOML has whole numbers of any length
        if not self.low <= value <= self.high:
            raise UnitError(described(raw), f"{self.what}, from {self.low:g} to {self.high:g}", "check the number")
        if self.whole and value != int(value):
            raise UnitError(described(raw), f"{self.what}, a whole number", f"{round(value)}")
        return float(value)


@dataclass(frozen=True)
class Text:
    """A text; ``longest`` characters at most."""

    longest: int = 200

    def __call__(self, raw: object) -> str:
        """Return the text, on one line and without control characters."""
        if not isinstance(raw, str):
            number = isinstance(raw, int | float) and not isinstance(raw, bool)
            raise UnitError(described(raw), "a text in quotes", f'"{described(raw)}"' if number else '"..."')
        text = plain(raw)
        if len(text) > self.longest:
            raise UnitError(quote(raw), f"at most {self.longest} characters", "a shorter text")
        return text


@dataclass(frozen=True)
class Choice:
    """One of a few words; ``instead`` has what people write in their place."""

    options: tuple[str, ...]
    instead: tuple[tuple[str, str], ...] = ()

    def __call__(self, raw: object) -> str:
        """Return the word."""
        word = as_typed(raw).strip().lower().replace("_", "-")
        if word in self.options:
            return word
        listed = ", ".join(f'"{option}"' for option in self.options)
        near = dict(self.instead).get(word) or nearest(word, self.options) or self.options[0]
        raise UnitError(described(raw), f"one of {listed}", f'"{near}"')


@dataclass(frozen=True)
class Texts:
    """A list of texts, or one text for a list of one."""

    example: str

    def __call__(self, raw: object) -> tuple[str, ...]:
        """Return the texts."""
        listed = [raw] if isinstance(raw, str) else raw
        if not isinstance(listed, list) or not all(isinstance(one, str) and one.strip() for one in listed):
            raise UnitError(described(raw), "a list of texts", self.example)
        return tuple(str(one) for one in listed)


@dataclass(frozen=True)
class Table:
    """An inner table, ``{ key = value, ... }``, with keys of its own; its values are read as a draft of its own."""

    keys: tuple[Key, ...]
    example: str

    def __call__(self, raw: object) -> Value:
        """Raise ``UnitError`` for what is not a table; the keys are read by whoever has the draft."""
        if not isinstance(raw, dict):
            raise UnitError(described(raw), "a table in braces", self.example)
        return True


@dataclass(frozen=True)
class Tables:
    """A list of inner tables, each with these keys; or one table for a list of one."""

    keys: tuple[Key, ...]
    example: str

    def __call__(self, raw: object) -> Value:
        """Raise ``UnitError`` for what is not a list of tables; the keys are read by whoever has the draft."""
        if not tables_in(raw):
            raise UnitError(described(raw), "a list of tables in braces", self.example)
        return True


def tables_in(raw: object) -> list[dict[str, object]]:
    """Return the tables of a list, or of one table; empty where it is neither, or has none."""
    listed = [raw] if isinstance(raw, dict) else raw
    if not isinstance(listed, list) or not all(isinstance(one, dict) for one in listed):
        return []
    return listed


@dataclass(frozen=True)
class Later:
    """A key that the format has and that this version does not compute yet."""

    instead: str = "leave the key out"

    def __call__(self, raw: object) -> Value:
        """Raise ``UnitError``: silence would be a wrong answer."""
        raise UnitError(
            described(raw),
            "not yet: the file format has this, but this version of xcol does not compute it",
            self.instead,
        )


@dataclass(frozen=True)
class Sizes:
    """One or more sizes in one text: ``split`` parts them, ``measures`` say what each may be."""

    split: Callable[[str], tuple[float, ...]]
    measures: tuple[Measure, ...]

    def __call__(self, raw: object) -> tuple[float, ...]:
        """Return the sizes [SI] that there are, in their order."""
        if not isinstance(raw, str):
            return (self.measures[0](raw),)
        sizes = self.split(raw)
        for size, measure in zip(sizes, self.measures, strict=False):
            measure.check(size, raw)
        return sizes


_SHARE = "a share of the size, from 0 to 50 %"


class Tolerance:
    """How far a size may be off, as a share of it."""

    def __call__(self, raw: object) -> float:
        """Return the share; a sign in front of it is read over."""
        if is_huge(raw):
            raise UnitError(described(raw), _SHARE, '"5 %"')
        text = re.sub(r"^\s*(?:±|\+/-|\+-)\s*", "", as_typed(raw))
        try:
            value = parse(text, RATIO)
        except UnitError as error:
            raise UnitError(described(raw), _SHARE, '"5 %", as 0.01 mm are of 0.2 mm') from error
        if not 0 <= value <= 0.5:
            raise UnitError(described(raw), _SHARE, '"5 %"')
        return value


class YesOrNo:
    """True or false."""

    def __call__(self, raw: object) -> bool:
        """Return it."""
        if not isinstance(raw, bool):
            raise UnitError(described(raw), "true or false, without quotes", "false")
        return raw


def _si(number: float, unit: str, quantity: Quantity) -> float:
    return parse(f"{number:.17g} {unit}", quantity)


def as_typed(raw: object) -> str:
    """Return a value as text: what was typed, where it was a text or a number of sane size."""
    return raw if isinstance(raw, str) else described(raw)


def _text_or_number(raw: object, quantity: Quantity) -> str:
    if isinstance(raw, str) and raw.strip():
        return raw
    if isinstance(raw, int | float) and not isinstance(raw, bool):
        return repr(raw)
    example = f'"1 {quantity.likely[0]}"' if quantity is not RATIO else '0.65 or "65 %"'
    raise UnitError(described(raw), f"{quantity.name}, in quotes with its unit", example)
