"""What is found while a file is read: faults, warnings and assumptions, collected in one place."""

from __future__ import annotations

import re
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from xcol.catalogs import Catalogs
from xcol.errors import Fault, InputError, Place
from xcol.flowpath.model import Assumption
from xcol.units import plain, quote

if TYPE_CHECKING:
    from xcol.catalog_records import Record
    from xcol.flowpath.keys import Value
    from xcol.units import UnitError


@dataclass
class Findings:
    """Collects what is found in a file, so that all of it is reported together."""

    faults: list[Fault] = field(default_factory=list)
    warnings: list[str] = field(default_factory=list)
    assumed: list[Assumption] = field(default_factory=list)

    def fault(self, place: Place, read: str, expected: str, suggestion: str) -> None:
        """Add a fault, unless it has been reported already."""
        fault = Fault(place, read, expected, suggestion)
        if fault not in self.faults:
            self.faults.append(fault)

    def fault_of(self, place: Place, error: UnitError) -> None:
        """Add the fault of a value that could not be read."""
        self.fault(place, error.read, error.expected, error.suggestion)

    def warn(self, text: str) -> None:
        """Add a warning, once."""
        if text not in self.warnings:
            self.warnings.append(text)

    def assume(self, short: str, text: str, *, leads: bool = False) -> None:
        """Add an assumption, once."""
        assumption = Assumption(short, text, leads)
        if assumption not in self.assumed:
            self.assumed.append(assumption)

    def raise_faults(self) -> None:
        """Raise ``InputError`` with all faults in the order of the file, if there are any."""
        if self.faults:
            raise InputError(tuple(sorted(self.faults, key=_order)))


@dataclass
class Draft:
    """One part or peak while it is read: its values in SI units, and where each stands."""

    kind: str
    name: str
    position: int
    file: str
    lines: dict[str, int]  # of each key; "" of the part itself
    findings: Findings
    catalogs: Catalogs = field(default_factory=Catalogs)
    values: dict[str, Value] = field(default_factory=dict)
    written: dict[str, str] = field(default_factory=dict)  # values as typed, for messages
    inner: dict[str, Draft] = field(default_factory=dict)  # its tables
    lists: dict[str, list[Draft]] = field(default_factory=dict)  # its lists of tables
    within: str = ""  # the table it is, "at." for instance
    row: Record | None = None  # the catalog row that its name stands for

    def number(self, key: str) -> float | None:
        """Return a number in SI units, None where the key was not given."""
        value = self.values.get(key)
        return float(value) if isinstance(value, int | float) else None

    def text(self, key: str) -> str | None:
        """Return a text, None where the key was not given."""
        value = self.values.get(key)
        return value if isinstance(value, str) else None

    def texts(self, key: str) -> tuple[str, ...]:
        """Return a list of texts, empty where the key was not given."""
        value = self.values.get(key)
        return tuple(one for one in value if isinstance(one, str)) if isinstance(value, tuple) else ()

    def sizes(self, key: str) -> tuple[float, ...]:
        """Return sizes in SI units, empty where the key was not given."""
        value = self.values.get(key)
        return tuple(one for one in value if isinstance(one, float)) if isinstance(value, tuple) else ()

    def table(self, key: str) -> Draft:
        """Return the draft of an inner table of this part or peak; faults name the table's place."""
        line = self.lines.get(key.partition("[")[0]) or self.lines.get("")
        lines = {"": line} if line else {}
        within = f"{self.within}{key}."
        return Draft(self.kind, self.name, self.position, self.file, lines, self.findings, self.catalogs, within=within)

    @property
    def label(self) -> str:
        """Say which part or peak it is: 'part 2 (tube "valve to column")'; "" for the file."""
        name = f' "{self.name}"' if self.name else ""
        if self.kind == "file":
            return ""
        if self.kind == "peak":
            return f"peak {self.position}{name}"
        return f"part {self.position} ({self.kind}{name})" if self.kind else f"part {self.position}"

    @property
    def has_fault(self) -> bool:
        """Whether a fault was found in it: a key that is missed may be one that was not understood."""
        return any(fault.place.part == self.label for fault in self.findings.faults)

    def place(self, key: str = "") -> Place:
        """Return the place of a key, or of the part."""
        line = self.lines.get(key) or self.lines.get("")
        return Place(self.file, line, self.label, f"{self.within}{plain(key)}".removesuffix(".")[:60])

    def fault(self, key: str, expected: str, suggestion: str, read: str = "") -> None:
        """Add a fault at a key; ``read`` defaults to what was typed there."""
        shown = read or (quote(self.written[key]) if key in self.written else "nothing")
        self.findings.fault(self.place(key), shown, expected, suggestion)

    def warn(self, text: str) -> None:
        """Add a warning that names the part."""
        self.findings.warn(f"{self.label}: {text}")

    def assume(self, short: str, text: str, *, leads: bool = False) -> None:
        """Add an assumption that names the part."""
        self.findings.assume(short, f"{self.label}: {text}", leads=leads)


def _order(fault: Fault) -> tuple[str, int, int]:
    """Order faults by file and line, and on one line by the part's or peak's number."""
    number = re.search(r"\d+", fault.place.part)
    return fault.place.file, fault.place.line or 0, int(number[0]) if number else 0
