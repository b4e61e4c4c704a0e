"""What was understood."""

import csv
import io
import json

import pytest

from xcol.flowpath.reader import parse, read
from xcol.report.check import check_csv, check_markdown, check_record, check_text
from xcol.report.sheet import Sheet


def text_of(instrument, **sheet):
    made = Sheet(**sheet)
    check_text(instrument, made)
    return made.text()


def test_sizes_are_shown_in_metric_and_inch(examples):
    text = text_of(read(str(examples / "brewery-conventional.toml")))
    for words in ("0.254 mm", "0.01 in", "400 mm", "15.7 in", "5 µm", "11000", "1 mL/min", "30 °C", "0.9 mPa s"):
        assert words in text


def test_everything_assumed_and_every_warning_is_listed(examples):
    for file in examples.glob("*.toml"):
        instrument = read(str(file))
        flat = " ".join(text_of(instrument).split())
        for words in (*instrument.warnings, *(a.text for a in instrument.assumed)):
            assert words in flat
        markdown = check_markdown(instrument)
        assert all(part.name in markdown for part in instrument.parts)


def test_the_smaller_size_is_echoed_as_the_bore(plain):
    instrument = parse(plain.replace("30 cm x 0.17 mm", "0.17 mm x 30 cm"), "f")
    values = {v["key"]: v for v in check_record(instrument)["parts"][1]["values"]}
    assert values["bore"]["value"] == pytest.approx(0.17e-3)
    assert values["length"]["shown"] == "300 mm"


def test_json_and_csv(examples):
    instrument = read(str(examples / "guarded-column.toml"))
    record = check_record(instrument)
    assert record["schema"] == "xcol.check/1"
    json.dumps(record, allow_nan=False)
    assert [part["position"] for part in record["parts"]] == list(range(1, 12))
    assert record["pump_pressure_bar"] == pytest.approx(290)
    rows = list(csv.DictReader(io.StringIO(check_csv(instrument))))
    assert len(rows) == sum(len(part["values"]) for part in record["parts"])
