"""What was understood."""

import csv
import io
import json

import pytest

from xcol.answers.budget import budget
from xcol.flowpath.reader import parse, read
from xcol.report.check import check_csv, check_markdown, check_record, check_text
from xcol.report.sheet import Sheet


def text_of(answer, **sheet):
    made = Sheet(**sheet)
    check_text(answer, made)
    return made.text()


def test_sizes_are_shown_in_metric_and_inch(examples):
    text = text_of(budget(read(str(examples / "brewery-conventional.toml"))))
    for words in ("0.254 mm", "0.01 in", "400 mm", "15.7 in", "5 µm", "11000", "1 mL/min", "30 °C", "0.9 mPa s"):
        assert words in text


def test_everything_assumed_and_every_warning_is_listed(examples):
    for file in examples.glob("*.toml"):
        answer = budget(read(str(file)))
        instrument = answer.instrument
        flat = " ".join(text_of(answer).split())
        for words in (*answer.warnings, *(a.text for a in instrument.assumed)):
            assert words in flat
        markdown = check_markdown(answer)
        assert all(part.name in markdown for part in instrument.parts)


def test_the_smaller_size_is_echoed_as_the_bore(plain):
    answer = budget(parse(plain.replace("30 cm x 0.17 mm", "0.17 mm x 30 cm"), "f"))
    values = {v["key"]: v for v in check_record(answer)["parts"][1]["values"]}
    assert values["bore"]["value"] == pytest.approx(0.17e-3)
    assert values["length"]["shown"] == "300 mm"


def test_json_and_csv(examples):
    answer = budget(read(str(examples / "guarded-column.toml")))
    record = check_record(answer)
    assert record["schema"] == "xcol.check/1"
    json.dumps(record, allow_nan=False)
    assert [part["position"] for part in record["parts"]] == list(range(1, 12))
    assert record["pump_pressure_bar"] == pytest.approx(290)
    rows = list(csv.DictReader(io.StringIO(check_csv(answer))))
    assert len(rows) == sum(len(part["values"]) for part in record["parts"])
