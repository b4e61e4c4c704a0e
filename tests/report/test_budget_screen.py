"""The first screen: 24 lines of 80 columns, whatever the path."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from xcol.answers.budget import budget
from xcol.answers.likely import Sampler
from xcol.flowpath.reader import parse, read
from xcol.report.budget_screen import first_screen
from xcol.report.sheet import Sheet


def screen_of(answer, at=-1, peak=0, draws=100, **sheet):
    found = answer.detectors[at]
    made = Sheet(**sheet)
    first_screen(answer, found, found.peaks[peak], made, Sampler(answer, draws) if draws else None)
    return made.text()


def fits(text):
    lines = text.splitlines()
    return len(lines) <= 24 and max(map(len, lines)) <= 80


@pytest.mark.parametrize("ascii_only", [False, True])
def test_every_example_fits(examples, ascii_only):
    for file in examples.glob("*.toml"):
        answer = budget(read(str(file)))
        for at, found in enumerate(answer.detectors):
            for peak in range(len(found.peaks)):
                text = screen_of(answer, at, peak, ascii_only=ascii_only)
                assert fits(text), text
                assert text.isascii() or not ascii_only


def big(parts, peaks, name="", limit="", detectors=1, columns=1):
    lines = [
        'flow = "0.5 mL/min"',
        'viscosity = "0.9 mPa s"',
        'diffusion = "1e-9 m^2/s"',
        f'title = "{name * 2}"',
        "path = [",
    ]
    lines.append('  { inject = "2 uL" },')
    for n in range(parts):
        lines.append(f'  {{ tube = "{10 + n} cm x 0.{1 + n % 3} mm", name = "{name}{n}"{limit} }},')
        lines.append(f'  {{ fitting = "{name}union {n}", volume = "0.{1 + n % 9} uL"{limit} }},')
    for n in range(columns):
        lines.append(f'  {{ column = "2.1 x 50 mm, 3 um", plates = 6000, name = "{name}{n}"{limit} }},')
    for n in range(detectors):
        lines.append('  { tube = "30 cm x 0.2 mm" },')
        lines.append(
            f'  {{ detector = "{name} UV {n}", cell = "2 uL", time_constant = "0.1 s", rate = "1 Hz"{limit} }},'
        )
    lines += ['  { tube = "1 m x 0.1 mm", name = "waste" },', '  { outlet = "waste" },', "]", "peaks = ["]
    k = "k = {}" if columns else 'name = "peak {}"'
    lines += [f"  {{ {k.format(1 + n)} }}," for n in range(peaks)] + ["]"]
    return budget(parse("\n".join(lines), "f"))


@settings(max_examples=40)
@given(
    parts=st.integers(0, 14), peaks=st.integers(1, 9), name=st.sampled_from(["", "a", "long " * 11]),
    limit=st.sampled_from(["", ', max_pressure = "1 bar"', ', max_pressure = "900 bar", max_drop = "0.5 bar"']),
    detectors=st.integers(1, 3), columns=st.integers(0, 5), ascii_only=st.booleans(),
)  # fmt: skip
def test_any_path_fits(parts, peaks, name, limit, detectors, columns, ascii_only):
    text = screen_of(big(parts, peaks, name, limit, detectors, columns), ascii_only=ascii_only)
    assert fits(text), text


def test_an_exceeded_limit_is_always_shown():
    for parts in (0, 3, 14):
        text = screen_of(big(parts, 5, "name", ', max_pressure = "1 bar"', detectors=2))
        assert "limit" in text
        assert "above" in text


def test_what_does_not_fit_is_counted():
    text = screen_of(big(10, 9))
    assert "more peaks" in text
    assert "others" in text


def test_up_to_seven_rows_are_shown_as_they_are(examples):
    answer = budget(read(str(examples / "brewery-narrow.toml")))
    text = screen_of(answer, peak=1)
    known = ("3100", "12000", "26 %", "33.3", "37.9", "26.7", "8.33", "2.78", "71.8", "58.0-112", "not checked")
    for words in (*known, "33.3-100", "20.3-37.9", "likely", "inject less"):
        assert words in text, words
    assert "others" not in text


def test_folded_rows_carry_their_sum():
    answer = big(4, 1)
    peak = answer.detectors[0].peaks[0]
    lines = screen_of(answer).splitlines()
    table = lines[lines.index("") + 2 : lines.index("", lines.index("") + 1)]
    rows = [line for line in table if "[" not in line]
    assert len(rows) <= 8 < len(peak.rows)
    (others,) = [line for line in rows if " others, " in line]
    count = int(others.split()[0])
    assert count == len(peak.rows) - len(rows) + 1
    folded = sorted(peak.rows, key=lambda row: row.high)[:count]  # what may be large is not hidden
    total = sum(row.variance for row in folded)
    assert f" {answer.in_uL2(total):.3g}" in others
    assert f" {100 * total / peak.variance_extra:.0f} %" in others


def test_a_name_with_the_word_limit_in_it_is_no_limit():
    text = "\n".join(
        ['flow = "1 mL/min"', 'viscosity = "0.9 mPa s"', 'diffusion = "1e-9 m^2/s"', "path = [", '{ inject = "2 uL" },']
        + [f'{{ tube = "{n + 1} cm x 1.59 mm", name = "limiter {n}" }},' for n in range(6)]
        + ['{ column = "4.6 x 150 mm, 3 um", plates = 9000, name = "column", max_pressure = "10 bar" },']
        + ['{ detector = "UV", cell = "2 uL", time_constant = "0.1 s" },', "]"]
    )
    assert "above its limit of 10 bar" in " ".join(screen_of(budget(parse(text, "f"))).split())


def test_a_contradiction_of_the_pump_pressure_is_always_shown():
    text = (
        'flow = "1 mL/min"\nviscosity = "0.9 mPa s"\ndiffusion = "1e-9 m^2/s"\npump_pressure = "1 bar"\npath = [\n'
        '{ inject = "2 uL" },\n{ tube = "2 m x 0.12 mm" },\n{ column = "4.6 x 150 mm, 3 um", plates = 9000 },\n'
        '{ detector = "UV", cell = "2 uL", time_constant = "0.1 s" },\n{ tube = "1 m x 0.5 mm", name = "waste" },\n]\n'
    )
    assert "contradicts" in screen_of(budget(parse(text, "f")))


def test_what_is_assumed_is_listed_and_nothing_is_called_safe(examples):
    for file in examples.glob("*.toml"):
        text = screen_of(budget(read(str(file))))
        assert "Assumed: " in text
        assert "safe" not in text.lower()
        assert "pressure at zero" in text


def test_without_draws_there_are_ranges_and_nothing_is_likely(examples):
    for file in examples.glob("*.toml"):
        answer = budget(read(str(file)))
        text = screen_of(answer, draws=0)
        assert fits(text)
        assert "best-worst" in text
        assert "(likely" not in text
        assert "Surest" not in text
        assert "Could lead" not in text


def test_every_first_screen_says_what_leads_or_that_nothing_matters(examples):
    for file in examples.glob("*.toml"):
        answer = budget(read(str(file)))
        for at, found in enumerate(answer.detectors):
            for peak in range(len(found.peaks)):
                text = screen_of(answer, at, peak, draws=500)
                assert sum(words in text for words in ("Surest gain", "Could lead", "Nothing is worth")) == 1
