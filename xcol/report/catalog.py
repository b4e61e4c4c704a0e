"""What the catalogs hold: kinds, and the rows of one that have a word in them, with their sources."""

from __future__ import annotations

import csv
import io
from dataclasses import dataclass
from typing import TYPE_CHECKING, Any

from xcol import __version__
from xcol.catalog_kinds import KINDS, Kind
from xcol.catalog_records import Record
from xcol.catalogs import Catalogs, normal, row_text
from xcol.errors import Place, nearest, refusal
from xcol.report.budget_record import spreadsheet_cell
from xcol.report.catalog_values import VALUES
from xcol.report.sheet import Grid, markdown
from xcol.units import quote

if TYPE_CHECKING:
    from collections.abc import Iterable

    from xcol.report.sheet import Sheet

SCHEMA = "xcol.catalog/1"
FEW_ROWS = 3  # so many are shown in full


@dataclass(frozen=True)
class Listing:
    """The rows of one kind that were asked for, with what is known as a whole (for what rows refer to)."""

    kind: Kind[Any]
    rows: tuple[Record, ...]
    catalogs: Catalogs


def find(catalogs: Catalogs, kind: str | None, word: str | None) -> tuple[Listing, ...]:
    """Return the rows of a kind with a word in name, other names, or what they say; of all kinds without one.

    A first word that is no kind is looked for in all of them. Raises ``InputError`` where nothing is found.
    """
    chosen = KINDS
    if kind is not None:
        named = [one for one in KINDS if normal(kind) in (one.name, one.table)]
        if not named and word is not None:
            names = tuple(one.name for one in KINDS)
            near = nearest(kind.lower(), names)
            raise refusal(Place(key="KIND"), quote(kind), f"one of {', '.join(names)}", near or "xcol catalog")
        if named:
            chosen = tuple(named)
        else:
            word = kind
    found = tuple(Listing(one, _matching(catalogs, one, word), catalogs) for one in chosen)
    found = tuple(listing for listing in found if listing.rows)
    if not found:
        near = next((near for one in chosen if (near := catalogs.near(one, word or ""))), "")
        where = f"rows of {chosen[0].name} that have it" if len(chosen) == 1 else "a kind, or a word of some row"
        raise refusal(Place(key="WORD"), quote(word or ""), where, near or "xcol catalog, for the kinds")
    return found


def _matching(catalogs: Catalogs, kind: Kind[Any], word: str | None) -> tuple[Record, ...]:
    rows: tuple[Record, ...] = catalogs.rows(kind)
    if word is None:
        return rows
    asked = normal(word)
    exact = tuple(row for row in rows if asked in map(normal, (row.name, *row.also)))
    return exact or tuple(row for row in rows if asked in normal(" ".join((row.name, *row.also, *_words(row)))))


def _words(row: Record) -> list[str]:
    """Return the texts of a row that a word is looked for in; sources are none of them."""
    values = {name: value for name, value in vars(row).items() if name not in ("source", "file", "tolerance_from")}
    texts: list[str] = [value for value in values.values() if isinstance(value, str)]
    return texts + [
        text for value in values.values() if isinstance(value, tuple) for text in value if isinstance(text, str)
    ]


def kinds_text(catalogs: Catalogs, sheet: Sheet) -> None:
    """Write the kinds, and how many rows each has."""
    sheet.line("Catalogs: xcol catalog KIND [WORD]", "bold")
    rows = tuple((kind.name, str(len(catalogs.rows(kind))), kind.meaning) for kind in KINDS)
    sheet.grid(Grid(("kind", "rows", ""), rows, (False, True, False)), indent=2, flexible=2)


def listings_text(listings: tuple[Listing, ...], sheet: Sheet) -> None:
    """Write a few rows in full, more of them as tables, with the sources below by letter."""
    in_full = sum(len(listing.rows) for listing in listings) <= FEW_ROWS
    for number, listing in enumerate(listings):
        if number:
            sheet.line()
        sheet.line(f"{listing.kind.name}: {listing.kind.meaning}", "bold")
        if in_full:
            for row in listing.rows:
                _row_text(row, listing.catalogs, sheet)
            continue
        marks = _marks(listing.rows)
        grid = _grid(listing, [marks[_source(row)] for row in listing.rows])
        widest = max(range(1, len(grid.headers)), key=lambda n: max(len(line[n]) for line in grid.rows))
        sheet.grid(grid, indent=2, flexible=widest)
        for source, mark in marks.items():
            sheet.line(f"[{mark}] {source}", indent=2, hang=4)
    if not in_full:
        sheet.line("All of a row: xcol catalog KIND NAME", "dim")


def _row_text(row: Record, catalogs: Catalogs, sheet: Sheet) -> None:
    sheet.line(row.name, "bold", indent=2)
    if row.also:
        sheet.line(f"also: {', '.join(row.also)}", indent=4, hang=2)
    for shown in VALUES[type(row)](row, catalogs).values():
        if shown.value is not None:
            sheet.line(f"{shown.label}: {shown.text}", indent=4, hang=2)
    sheet.line(f"source: {_source(row)}", indent=4, hang=2)
    if text := row_text(row):
        sheet.line("as a row of a catalog file:", indent=4)
        for line in text.splitlines():
            key, equals, value = line.partition("=")
            value = '"..."' if key.strip() == "source" else value.strip()
            sheet.line(f"{key.strip()} {equals} {value}".strip(), indent=6, hang=4)


def listings_markdown(listings: tuple[Listing, ...]) -> str:
    """Return the rows in Markdown, the source in each."""
    pieces = []
    for listing in listings:
        pieces += [f"# {listing.kind.name}: {listing.kind.meaning}\n"]
        pieces += [markdown(_grid(listing, [_source(row) for row in listing.rows]))]
    return "\n".join(pieces)


def listings_record(listings: Iterable[Listing]) -> dict[str, Any]:
    """Return the rows as one JSON object; units stand in the key names."""
    return {
        "schema": SCHEMA,
        "version": __version__,
        "catalogs": [
            {
                "kind": listing.kind.name,
                "meaning": listing.kind.meaning,
                "rows": [_record(row, listing.catalogs) for row in listing.rows],
            }
            for listing in listings
        ],
    }


def listings_csv(listings: Iterable[Listing]) -> str:
    """Return one line for each value of each row, as CSV: kinds have different columns."""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(("kind", "name", "key", "value"))
    for listing in listings:
        for row in listing.rows:
            record = _record(row, listing.catalogs)
            for key, value in record.items():
                if key != "name" and value not in (None, [], ""):
                    shown = "; ".join(map(str, value)) if isinstance(value, list) else spreadsheet_cell(value)
                    writer.writerow((listing.kind.name, spreadsheet_cell(row.name), key, shown))
    return out.getvalue()


def _record(row: Record, catalogs: Catalogs) -> dict[str, Any]:
    values = {key: shown.value for key, shown in VALUES[type(row)](row, catalogs).items()}
    listed = {key: list(value) if isinstance(value, tuple) else value for key, value in values.items()}
    return {"name": row.name, "also": list(row.also)} | listed | {"source": row.source, "file": row.file or None}


def _grid(listing: Listing, sources: list[str]) -> Grid:
    rows = [VALUES[type(row)](row, listing.catalogs) for row in listing.rows]
    headers = {key: shown.header for key, shown in rows[0].items() if shown.header}
    right = tuple(all(isinstance(row[key].value, float | None) for row in rows) for key in headers)
    lines = tuple(
        (row.name, *(values[key].text for key in headers), source)
        for row, values, source in zip(listing.rows, rows, sources, strict=True)
    )
    return Grid(("name", *headers.values(), "source"), lines, (False, *right, False))


def _marks(rows: tuple[Record, ...]) -> dict[str, str]:
    """Return each source of the rows once, with its mark: a to z, then aa, ab and on."""
    sources = dict.fromkeys(_source(row) for row in rows)
    letters = "abcdefghijklmnopqrstuvwxyz"
    names = (f"{letters[n // 26 - 1] if n >= 26 else ''}{letters[n % 26]}" for n in range(len(sources)))
    return dict(zip(sources, names, strict=True))


def _source(row: Record) -> str:
    return f"{row.file}: {row.source}" if row.file else row.source
