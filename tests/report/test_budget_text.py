"""The full report and Markdown."""

import pytest

from xcol.answers.budget import budget
from xcol.flowpath.reader import read
from xcol.report.budget_text import budget_markdown, full_report, verdict
from xcol.report.sheet import Sheet


@pytest.fixture(params=["guarded-column", "sugar-two-detectors", "union-run"])
def answer(request, examples):
    return budget(read(str(examples / f"{request.param}.toml")))


@pytest.mark.parametrize(("width", "ascii_only"), [(80, False), (80, True), (140, False)])
def test_the_full_report_holds_everything_within_its_width(answer, width, ascii_only):
    at = answer.detectors[-1]
    sheet = Sheet(width=width, ascii_only=ascii_only)
    full_report(answer, at, at.peaks[0], sheet)
    text = sheet.text()
    assert max(map(len, text.splitlines())) <= width
    flat = " ".join(text.split())
    for words in (*answer.warnings, *answer.cautions, *(a.text for a in answer.instrument.assumed)):
        assert ascii_only or " ".join(words.split()) in flat
    for found in answer.detectors:
        for peak in found.peaks:
            assert peak.peak.name in text
    assert "long-tube" in text
    assert "safe" not in text.lower()


def test_markdown_tables_are_whole(answer):
    at = answer.detectors[0]
    text = budget_markdown(answer, at, at.peaks[0])
    rows = [line for line in text.splitlines() if line.startswith("|")]
    assert rows
    widths = {}
    for row in rows:
        cells = row.replace("\\|", "").count("|")
        widths[cells] = widths.get(cells, 0) + 1
    assert all(count >= 3 for count in widths.values())
    for row in at.peaks[0].rows:
        assert row.side in text


def test_the_verdict_names_plates_peak_and_detector(examples):
    answer = budget(read(str(examples / "sugar-two-detectors.toml")))
    at = answer.detectors[1]
    text = " ".join(verdict(answer, at, at.peaks[0]))
    for words in ("sucrose", "k = 1.5", "RI", "5310", "12000", "44 %", "UV", "95 %"):
        assert words in text
