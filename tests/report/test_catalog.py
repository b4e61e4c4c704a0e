"""The catalogs as text, JSON, CSV and Markdown."""

import csv
import io
import json

import pytest

from xcol.catalog_kinds import KINDS, SOLUTES
from xcol.catalogs import Catalogs
from xcol.errors import InputError
from xcol.report.catalog import find, kinds_text, listings_csv, listings_markdown, listings_record, listings_text
from xcol.report.sheet import Sheet

KNOWN = Catalogs()


def names(*words):
    return [row.name for listing in find(KNOWN, *words) for row in listing.rows]


def test_kinds_and_words_are_found():
    assert len(find(KNOWN, None, None)) == len(KINDS)
    assert len(names("solutes", None)) == len(KNOWN.rows(SOLUTES))
    assert names("solute", "CAFFEINE") == ["caffeine"]
    assert names("solvents", "mecn") == ["acetonitrile"]  # by its other name
    assert names("tubing", "fused silica")[0] == "0.025 mm"
    assert set(names("solutes", "acid")) == {"acetic acid", "benzoic acid", "salicylic acid"}
    assert names("caffeine", None) == ["caffeine"]  # a word in place of a kind
    assert {listing.kind.name for listing in find(KNOWN, "methanol", None)} >= {"solvents", "solutes"}


@pytest.mark.parametrize(
    ("words", "key", "near"),
    [
        (("solutes", "cafeine"), "WORD", "caffeine"),
        (("solvens", "water"), "KIND", "solvents"),
        (("acetonitril", None), "WORD", ""),
        (("zzzz", None), "WORD", "xcol catalog"),
    ],
)
def test_what_is_not_there_is_answered_with_the_nearest(words, key, near):
    if words == ("acetonitril", None):  # a part of a name is enough
        assert "acetonitrile" in names(*words)
        return
    with pytest.raises(InputError) as caught:
        find(KNOWN, *words)
    assert caught.value.faults[0].place.key == key
    assert near in caught.value.faults[0].suggestion


@pytest.mark.parametrize("ascii_only", [False, True])
@pytest.mark.parametrize("kind", [kind.name for kind in KINDS])
def test_every_kind_fits_a_terminal_with_names_whole_and_sources(kind, ascii_only):
    sheet = Sheet(ascii_only=ascii_only)
    listings = find(KNOWN, kind, None)
    listings_text(listings, sheet)
    text = sheet.text()
    assert max(map(len, text.splitlines())) <= 80
    assert text.isascii() or not ascii_only
    flat = " ".join(text.split())
    for row in listings[0].rows:
        assert row.name in text or ascii_only
        assert " ".join(row.source.split()) in flat or ascii_only
    assert "?" not in text or not ascii_only


def test_a_single_row_is_shown_in_full():
    sheet = Sheet()
    listings_text(find(KNOWN, "solvents", "acetonitrile"), sheet)
    assert "ACN" in sheet.text()
    assert "-4.68095" in sheet.text()
    sheet = Sheet()
    kinds_text(KNOWN, sheet)
    assert all(kind.name in sheet.text() for kind in KINDS)


def test_records_hold_all_rows_with_sources():
    record = json.loads(json.dumps(listings_record(find(KNOWN, None, None))))
    assert record["schema"] == "xcol.catalog/1"
    assert [one["kind"] for one in record["catalogs"]] == [kind.name for kind in KINDS]
    for one in record["catalogs"]:
        assert all(row["source"] and row["name"] for row in one["rows"])
    solutes = next(one for one in record["catalogs"] if one["kind"] == "solutes")["rows"]
    caffeine = next(row for row in solutes if row["name"] == "caffeine")
    assert caffeine["diffusion_in_water_m2_s"] == pytest.approx(6.5e-10)
    assert caffeine["at_degC"] == pytest.approx(25)
    column = next(one for one in record["catalogs"] if one["kind"] == "columns")["rows"][0]
    assert {"bore_mm", "total_porosity", "interstitial_porosity", "knox", "velocity", "curve_source"} <= set(column)


def test_csv_and_markdown():
    lines = list(csv.DictReader(io.StringIO(listings_csv(find(KNOWN, "solutes", None)))))
    assert {"kind": "solutes", "name": "caffeine", "key": "at_degC", "value": "25.0"} in lines
    assert sum(line["key"] == "source" for line in lines) == len(KNOWN.rows(SOLUTES))
    text = listings_markdown(find(KNOWN, "solutes", None))
    assert text.count("\n| ") == len(KNOWN.rows(SOLUTES)) + 2
