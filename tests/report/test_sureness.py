"""How sure an answer is, in words: what leads is named only when it leads, and what would decide it otherwise."""

import pytest

from xcol.answers.budget import budget
from xcol.answers.likely import SURE, Sampler
from xcol.flowpath.reader import parse, read
from xcol.report.budget_tables import figures
from xcol.report.sureness import beyond, ends_line, verdict_on_parts, what_settles

HEAD = 'flow = "0.3 mL/min"\nviscosity = "0.9 mPa s"\n'
COLUMN = '{ column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 }'
PEAKS = 'peaks = [ { k = 2, diffusion = "1e-9 m^2/s" } ]\n'


def answer_of(*parts):
    answer = budget(parse(HEAD + "path = [\n" + ",\n".join(parts) + "\n]\n" + PEAKS, "f"))
    return (
        answer,
        answer.detectors[-1].peaks[0],
        Sampler(answer).of(answer.detectors[-1], answer.detectors[-1].peaks[0]),
    )


def words_of(*parts):
    _, peak, likely = answer_of(*parts)
    return " ".join(verdict_on_parts(likely, peak, 2000))


@pytest.mark.parametrize(
    ("part", "words"),
    [
        ('{ tube = "2 m x 0.5 mm", name = "long line" }', "long line"),
        ('{ fitting = "filter", volume = "20 uL" }', "filter"),
        ('{ mixer = "20 uL", name = "loop of old" }', "loop of old"),
        ('{ block = "400 uL^2", name = "autosampler" }', "autosampler"),
    ],
)
def test_a_part_that_leads_whatever_is_unknown_is_named(part, words):
    text = words_of('{ inject = "0.5 uL" }', part, COLUMN, '{ detector = "UV", cell = "0.5 uL" }')
    assert text.startswith("Surest gain: ")
    assert words in text
    assert "%" in text


def test_injection_cell_filter_and_rate_are_named_by_what_to_do():
    small = '{ inject = "0.2 uL" }'
    for parts, words in (
        (('{ inject = "50 uL" }', COLUMN, '{ detector = "UV", cell = "0.5 uL" }'), "inject less"),
        ((small, COLUMN, '{ detector = "UV", cell = "50 uL", tanks = 1 }'), "smaller cell of"),
        ((small, COLUMN, '{ detector = "UV", time_constant = "3 s" }'), "faster filter of"),
        ((small, COLUMN, '{ detector = "UV", rate = "0.1 Hz" }'), "faster rate of"),
    ):
        assert words in words_of(*parts)


def test_a_name_with_a_per_cent_sign_is_printed_as_it_was_typed(examples):
    text = (examples / "small-column.toml").read_text().replace("needle seat", "seat, 5 % carbon")
    answer = budget(parse(text, "f"))
    peak = answer.detectors[0].peaks[0]
    likely = Sampler(answer).of(answer.detectors[0], peak)
    (line,) = (line for line in verdict_on_parts(likely, peak, 2000) if "seat" in line and "% of draws" in line)
    assert '"seat, 5 % carbon"' in line
    assert line.count("of draws") == 1


def test_what_is_open_names_two_or_three_and_what_decides(examples):
    answer = budget(read(str(examples / "brewery-conventional.toml")))
    peak = answer.detectors[0].peaks[1]
    likely = Sampler(answer).of(answer.detectors[0], peak)
    text = " ".join(verdict_on_parts(likely, peak, 2000))
    assert "Surest" not in text
    named = [row for row, _ in likely.leaders[:3]]
    assert 2 <= text.count("%") <= 3
    assert "union run" in text
    assert "time constant" in text  # a setting is tried before anything is measured
    assert any("loop" in words for words in what_settles(likely, named, has_column=True))


def test_the_union_run_itself_does_not_ask_for_a_union_run(examples):
    answer = budget(read(str(examples / "union-run.toml")))
    peak = answer.detectors[0].peaks[0]
    likely = Sampler(answer).of(answer.detectors[0], peak)
    text = " ".join(verdict_on_parts(likely, peak, 2000))
    assert "union run" not in text
    assert "measured" in text


def test_a_path_that_costs_nothing_names_no_part():
    text = words_of('{ inject = "0.1 uL" }', COLUMN, '{ detector = "UV", cell = "0.1 uL", time_constant = "0.01 s" }')
    assert "Surest" not in text
    assert "Nothing" in text


def test_no_part_is_named_that_leads_in_less_than_nine_of_ten_draws(examples):
    for file in examples.glob("*.toml"):
        answer = budget(read(str(file)))
        sampler = Sampler(answer)
        for found in answer.detectors:
            for peak in found.peaks:
                likely = sampler.of(found, peak)
                text = " ".join(verdict_on_parts(likely, peak, 2000))
                assert ("Surest" in text) <= (likely.leaders[0][1] >= SURE)


def test_a_printed_figure_outside_of_its_interval_says_which_end_it_is(examples):
    outside = 0
    for file in examples.glob("*.toml"):
        answer = budget(read(str(file)))
        sampler = Sampler(answer)
        for found in answer.detectors:
            for peak in found.peaks:
                if peak.plates_kept is None:
                    continue
                likely = sampler.of(found, peak)
                printed = ((peak.plates_kept, likely.plates_kept), (peak.variance_extra, likely.variance_extra))
                inside = all(low <= value <= high for value, (low, high) in printed)
                assert bool(beyond(likely, peak)) != inside
                outside += not inside
    assert outside


def test_figures():
    assert figures((103.2, 208.9)) == "103-209"
    assert figures((4.0, 4.0)) == "4.00"


def test_end_to_end_says_what_tubes_and_cells_have_in_it(examples):
    peak = budget(read(str(examples / "antibody-size-exclusion.toml"))).detectors[0].peaks[0]
    text = ends_line(peak)
    for shares in ("50-84 %", "16-50 %", "16-29 %", "29-50 %"):
        assert shares in text
    (union,) = budget(read(str(examples / "union-run.toml"))).detectors[0].peaks
    assert ends_line(union) == ""


def test_two_tubes_that_lead_together_are_named_together():
    tube = '{ tube = "50 cm x 0.17 mm" }'
    text = words_of('{ inject = "0.2 uL" }', tube, COLUMN, tube, '{ detector = "MS" }')
    assert text.startswith("Surest gain: narrower or shorter tubes")
    assert "part 2" in text
    assert "part 4" in text


def test_an_injection_is_told_by_its_loop():
    tail = (COLUMN, '{ detector = "UV", cell = "0.5 uL" }')
    for loop, words in (
        ('inject = "20 uL", loop = "20 uL x 0.3 mm"', "smaller or narrower loop"),
        ('inject = "20 uL", loop = "100 uL x 0.75 mm", emptied = "same way"', "the other way"),
        ('inject = "50 uL", loop = "100 uL x 0.75 mm", emptied = "reversed"', "inject less"),
    ):
        assert words in words_of(f"{{ {loop} }}", *tail)


def test_where_the_longest_bar_is_another_part_s_it_is_said_why(examples):
    answer = budget(read(str(examples / "brewery-conventional.toml")))
    peak = answer.detectors[0].peaks[1]
    likely = Sampler(answer).of(answer.detectors[0], peak)
    assert max(peak.rows, key=lambda row: row.variance) is not likely.leaders[0][0]
    assert "Bars" in verdict_on_parts(likely, peak, 2000)[-1]


def test_nine_of_ten_are_not_rounded_up():
    assert "100 %" not in words_of('{ inject = "4 uL" }', '{ tube = "50 cm x 0.17 mm" }', COLUMN, '{ detector = "MS" }')


def test_what_is_printed_at_an_end_is_named_by_its_cause():
    small = '{ tube = "10 cm x 0.1 mm" }'
    for parts, words in (
        (('{ inject = "1 uL" }', small, '{ detector = "UV", cell = "8 uL", path_length = "10 mm" }'), "cell"),
        (('{ inject = "20 uL", loop = "20 uL x 0.25 mm" }', small, '{ detector = "UV" }'), "loop"),
        (('{ inject = "1 uL" }', '{ tube = "2 m x 0.25 mm" }', '{ detector = "UV" }'), "tubes printed straight"),
        (
            (
                '{ inject = "1 uL" }',
                '{ tube = "2 m x 0.25 mm" }',
                '{ detector = "UV" }',
            ),
            "straight",
        ),
    ):
        for column in ((), (COLUMN,)):
            before, *after = parts
            _, peak, likely = answer_of(before, *column, *after) if column else without_column(*parts)
            assert words in beyond(likely, peak), parts


def without_column(*parts):
    text = HEAD + "path = [\n" + ",\n".join(parts) + "\n]\n" + PEAKS.replace("k = 2, ", "")
    answer = budget(parse(text, "f"))
    (peak,) = answer.detectors[-1].peaks
    return answer, peak, Sampler(answer).of(answer.detectors[-1], peak)


def test_where_nothing_is_added_nothing_is_gained():
    _, peak, likely = without_column('{ inject = "0 uL" }', '{ detector = "MS" }')
    assert verdict_on_parts(likely, peak, 2000) == []


def test_bars_are_explained_by_the_ends_at_which_they_are_printed():
    tube = '{ tube = "60 cm x 0.17 mm", name = "line" }'
    cell = '{ detector = "UV", cell = "6 uL" }'
    open_ = words_of('{ inject = "0.5 uL" }', tube, COLUMN, cell)
    assert '"line" at its worst, UV cell at its best' in open_
    bent = words_of('{ inject = "0.5 uL" }', tube.replace("name", 'bend_radius = "4 cm", name'), COLUMN, cell)
    assert '"line" at its worst' not in bent
