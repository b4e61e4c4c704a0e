"""Catalog files -> typed records, checked on loading.

Every row has a ``source``; an invalid row is named by file, line and key. A user's own rows are read by
the same code and stand before the shipped ones.
"""

from __future__ import annotations

import re
import tomllib
from collections.abc import Callable, Iterable, Mapping
from dataclasses import replace
from functools import cache
from pathlib import Path
from typing import Any, TypeVar

from xcol.catalog_kinds import COLUMNS, KINDS, MIXTURES, PACKINGS, SOLVENTS, Kind, Row
from xcol.catalog_records import Packing, Record
from xcol.errors import Fault, InputError, Place, nearest
from xcol.units import described, plain, quote

# Shipped inside the package in a wheel; at the top of the repository in an editable install.
_FOLDERS = (Path(__file__).parent / "catalog_files", Path(__file__).parent.parent / "catalogs")

Lines = Callable[[str, int], Mapping[str, int]]  # the lines of the keys of a table's n-th row, its own as ""

R = TypeVar("R", bound=Record)


class Catalogs:
    """What is known: the shipped rows, each kind read when it is first asked for, and the user's own.

    An own row stands before the shipped ones, and in place of one that has its name, whose other names
    it takes over.
    """

    def __init__(self, own: Iterable[Record] = ()) -> None:
        self._own = tuple(own)
        self._rows: dict[str, tuple[Any, ...]] = {}  # of each kind, once it was asked for
        self._names: dict[str, dict[str, Any]] = {}

    def rows(self, kind: Kind[R]) -> tuple[R, ...]:
        """Return the rows of a kind, the user's own first (a later one in place of an earlier)."""
        if kind.name not in self._rows:
            self._rows[kind.name] = self._made(kind)
        return self._rows[kind.name]

    def find(self, kind: Kind[R], word: str) -> R | None:
        """Return the row of that name, or other name, however it is spelled; None without one."""
        if kind.name not in self._names:
            rows = self.rows(kind)
            others = {name: row for row in reversed(rows) for name in _names(row)}
            self._names[kind.name] = others | {normal(row.name): row for row in rows}
        return self._names[kind.name].get(normal(word))

    def own(self, kind: Kind[R], word: str) -> R | None:
        """Return the user's own row of that name, None without one."""
        asked = normal(word)
        rows = (record for record in reversed(self._own) if isinstance(record, kind.record))
        return next((row for row in rows if normal(row.name) == asked), None)

    def _made(self, kind: Kind[R]) -> tuple[R, ...]:
        own: dict[str, R] = {}
        for record in self._own:
            if isinstance(record, kind.record):
                own[normal(record.name)] = record
        kept = []
        for row in _shipped(kind):
            replaced = own.keys() & _names(row)
            for name in replaced:
                own[name] = replace(own[name], also=(*own[name].also, row.name, *row.also))
            if not replaced:
                kept.append(row)
        return (*own.values(), *kept)

    def near(self, kind: Kind[Any], word: str) -> str:
        """Return the name of a row, or other name, that is a likely misspelling; "" where none is."""
        names = {normal(name): name for row in self.rows(kind) for name in (row.name, *row.also)}
        near = nearest(normal(word)[:60], names, alike=0.8)
        return names[near] if near else ""

    def remarks(self) -> list[str]:
        """Say which of the user's own rows stand in place of others."""
        found = []
        for number, record in enumerate(self._own):
            kind = _kind_of(record)
            for row in _shipped(kind):
                if normal(record.name) in _names(row):
                    found.append(f'{record.file}: "{record.name}" stands in place of the shipped "{row.name}"')
            for other in record.also:
                meant = self.find(kind, other)
                if any(normal(other) in _names(row) for row in _shipped(kind)) and meant is not None:
                    found.append(f'{record.file}: "{other}" is a shipped name too: it means "{meant.name}"')
            twins = [row for row in self._own[:number] if type(row) is type(record)]
            if any(normal(row.name) == normal(record.name) for row in twins):
                found.append(f'{record.file}: a second {kind.table} "{record.name}": the last one stands')
        return found

    def loose_ends(self) -> list[Fault]:
        """Return what the user's own rows refer to and nobody knows."""
        Tie = tuple[str, str, str, Record, Kind[Any]]
        packings: list[Tie] = [("column", "packing", row.packing, row, PACKINGS) for row in self.rows(COLUMNS)]
        liquids: list[Tie] = [("mixture", "liquid", row.liquid, row, SOLVENTS) for row in self.rows(MIXTURES)]
        found = []
        for table, key, name, record, known in (*packings, *liquids):
            if record.file and name and self.find(known, name) is None:
                names = ", ".join(row.name for row in self.rows(known))
                place = Place(record.file, None, f'{table} "{record.name}"', key)
                near = self.near(known, name) or f"one of them, or a [[{known.table}]] of your own"
                found.append(Fault(place, quote(name), f"one of {names}", near))
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


def _kind_of(record: Record) -> Kind[Any]:
    return next(kind for kind in KINDS if kind.record is type(record))


def _names(row: Record) -> set[str]:
    return {normal(name) for name in (row.name, *row.also)}


def records_of(data: Mapping[str, Any], file: str, owner: str, lines: Lines) -> tuple[tuple[Record, ...], list[Fault]]:
    """Return the records of a catalog's tables, whatever their kinds, and all that is wrong with its rows.

    ``file`` is its name in messages, ``owner`` that in the records ("" for the shipped ones).
    """
    tables = {kind.table: kind for kind in KINDS}
    records: list[Record] = []
    faults: list[Fault] = []
    for table, rows in data.items():
        kind = tables.get(table)
        if kind is None or not isinstance(rows, list):
            known = ", ".join(f"[[{name}]]" for name in tables)
            line = lines(table, 0).get("") or lines("", 0).get(table)
            place = Place(file, line, "", plain(str(table))[:60])
            faults.append(Fault(place, quote(table), f"tables of a catalog: {known}", "[[solute]] above each row"))
            continue
        for number, values in enumerate(rows):
            where = lines(table, number)
            place = Place(file, where.get(""), f"{kind.table} {number + 1}")
            if not isinstance(values, dict):
                faults.append(
                    Fault(place, described(values), "a row with keys", f"[[{kind.table}]] above the row's keys")
                )
                continue
            row = Row(place, owner, values, where)
            record = kind.of(row)
            faults += row.faults
            records += [record] if record is not None else []
    return tuple(records), faults


@cache
def _shipped(kind: Kind[R]) -> tuple[R, ...]:
    """Return the shipped rows of a kind; raises ``InputError``."""
    file = f"{kind.name}.toml"
    try:
        text = shipped_text(kind)
        data = tomllib.loads(text)
    except (OSError, ValueError) as error:
        fault = Fault(Place(file=file), str(error), "a readable catalog", "install xcol again")
        raise InputError((fault,)) from None
    records, faults = records_of(data, file, "", lambda table, number: {})
    if faults:  # lines are looked for only now: shipped rows are right
        _, faults = records_of(data, file, "", lambda table, number: _header_line(text, table, number))
        raise InputError(tuple(faults))
    return tuple(record for record in records if isinstance(record, kind.record))


def shipped_text(kind: Kind[Any]) -> str:
    """Return the text of a shipped catalog; raises ``OSError``."""
    return (folder() / f"{kind.name}.toml").read_text(encoding="utf-8")


def row_text(record: Record) -> str:
    """Return a shipped row as it stands in its file, "" for a user's own."""
    kind = _kind_of(record)
    if record.file:
        return ""
    blocks = re.split(rf"^(?=\[\[{kind.table}\]\])", shipped_text(kind), flags=re.M)[1:]
    place = next((n for n, row in enumerate(_shipped(kind)) if row.name == record.name), None)
    return blocks[place].strip() if place is not None else ""


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
