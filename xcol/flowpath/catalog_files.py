"""The user's own catalog files: read like path files, checked like the shipped ones."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from xcol.catalogs import Catalogs, records_of
from xcol.errors import InputError, Place
from xcol.flowpath.locate import KeyLines, key_lines
from xcol.flowpath.source import read_text
from xcol.flowpath.toml_text import load

if TYPE_CHECKING:
    from collections.abc import Iterable

    from xcol.catalog_records import Record
    from xcol.catalogs import Lines
    from xcol.flowpath.findings import Findings


def read_catalogs(names: Iterable[str], findings: Findings) -> Catalogs:
    """Return the shipped catalogs with the rows of these files on top; faults go to the findings.

    A row that stands in place of another is warned of.
    """
    records: list[Record] = []
    for name in dict.fromkeys(names):
        if Path(name).name == "-":
            place = Place(name, key="catalogs")
            findings.fault(place, "standard input", "the name of a catalog file", "a file of its own")
            continue
        try:
            text = read_text(
                name, "a catalog file", 'begin with [[solute]], name = "...", molar_mass = "...", source = "..."'
            )
        except InputError as error:
            findings.faults += error.faults
            continue
        data, mended, faults = load(text, name)
        findings.faults += faults
        if data is None:
            continue
        found, faults = records_of(data, name, name, _lines_of(mended))
        records += found
        findings.faults += faults
    catalogs = Catalogs(records)
    if not findings.faults:  # otherwise what is missed may be what was not read
        findings.faults += catalogs.loose_ends()
    for remark in catalogs.remarks():
        findings.warn(remark)
    return catalogs


def _lines_of(text: str) -> Lines:
    """Return the function that gives the lines of the keys of a table's n-th row, the row's own as ""."""
    lines = KeyLines(key_lines(text))
    return lambda table, number: lines.of(table, number) if table else lines.of()
