"""The budget: worked scenarios, and what a budget must hold."""

import pytest

from xcol.answers.budget import budget
from xcol.flowpath.reader import parse, read

# shared/scenarios/expected.md: computed outside of this program (modes and finite volumes agree)
SCENARIOS = {
    "brewery-conventional": {
        "early": ([33.333, 105.99, 68.027, 8.3333, 69.444, 0.92593], 286.05, 8464),
        "middle": ([33.333, 105.99, 68.027, 8.3333, 69.444, 0.92593], 286.05, 9707),
        "late": ([33.333, 105.99, 68.027, 8.3333, 69.444, 0.92593], 286.05, 10646),
    },
    "brewery-narrow": {
        "early": ([33.333, 37.932, 26.712, 8.3333, 2.7778, 0.037037], 109.13, 1609),
        "middle": ([33.333, 37.932, 26.712, 8.3333, 2.7778, 0.037037], 109.13, 3100),
        "late": ([33.333, 37.932, 26.712, 8.3333, 2.7778, 0.037037], 109.13, 6986),
    },
    "small-column": {
        "early": ([0.1875, 1.1675, 1.3981, 0.73527, 0.12, 0.46605, 0.011719], 4.08615, 6581.2),
        "late": ([0.1875, 1.3382, 1.6289, 0.82867, 0.12, 0.46605, 0.011719], 4.58102, 9676.1),
    },
    "antibody-size-exclusion": {
        "monomer": ([2.0833, 64.744, 44.139, 5.3333, 6.25, 0.083333], 122.63, 4274),
    },
}


def in_uL2(answer, variance):
    return variance * (answer.instrument.flow * 1e9) ** 2


@pytest.mark.parametrize("name", SCENARIOS)
def test_worked_scenarios(name, examples):
    answer = budget(read(str(examples / f"{name}.toml")))
    (detector,) = answer.detectors
    assert [peak.peak.name for peak in detector.peaks] == list(SCENARIOS[name])
    for peak in detector.peaks:
        rows, total, plates = SCENARIOS[name][peak.peak.name]
        found = [in_uL2(answer, row.variance) for row in peak.rows]
        assert found == pytest.approx(rows, rel=1e-3)
        assert in_uL2(answer, peak.variance_extra) == pytest.approx(total, rel=1e-3)
        assert peak.plates_observed == pytest.approx(plates, rel=1e-3)


def test_the_long_tube_formula_would_blame_the_antibody_s_tubes(examples):
    answer = budget(read(str(examples / "antibody-size-exclusion.toml")))
    peak = answer.detectors[0].peaks[0]
    longtube = [in_uL2(answer, r.tube.longtube_variance) for r in peak.rows if r.tube]
    assert longtube == pytest.approx([427, 342], rel=2e-3)
    others = in_uL2(answer, sum(r.variance for r in peak.rows if r.tube is None))
    own = in_uL2(answer, peak.variance_column)
    assert 1 - own / (own + sum(longtube) + others) == pytest.approx(0.72, abs=0.005)
    assert 1 - peak.plates_kept == pytest.approx(0.288, abs=0.0005)


def test_what_lies_behind_the_last_detector_loads_its_cell_and_adds_nothing(examples):
    text = (examples / "sugar-two-detectors.toml").read_text(encoding="utf-8")
    whole = budget(parse(text, "f"))
    bare = budget(parse("\n".join(line for line in text.splitlines() if "waste" not in line), "f"))
    for one, other in zip(whole.detectors, bare.detectors, strict=True):
        assert one.delay == other.delay
        assert [p.variance_extra for p in one.peaks] == [p.variance_extra for p in other.peaks]
    at_cell = next(row for row in whole.pressure.rows if row.part.name == "RI")
    assert at_cell.inlet.value > 0
    assert next(row for row in bare.pressure.rows if row.part.name == "RI").inlet.value == 0
    assert any("RI waste line" in warning for warning in whole.warnings)


def test_another_detector_s_electronics_never_count(examples):
    text = (examples / "sugar-two-detectors.toml").read_text(encoding="utf-8")
    slow = text.replace('time_constant = "0.2 s"', 'time_constant = "9 s", rate = "1 Hz"')
    first, second = budget(parse(text, "f")).detectors
    slow_first, slow_second = budget(parse(slow, "f")).detectors
    assert slow_first.peaks[0].variance_extra > 10 * first.peaks[0].variance_extra
    assert slow_second.peaks[0].variance_extra == pytest.approx(second.peaks[0].variance_extra, rel=1e-12)
    assert {row.contribution for row in second.peaks[0].rows if row.part.name == "UV"} == {"cell"}


def test_rows_add_up_and_shares_are_shares(examples):
    for file in examples.glob("*.toml"):
        for detector in budget(read(str(file))).detectors:
            for peak in detector.peaks:
                assert sum(r.variance for r in peak.rows) == pytest.approx(peak.variance_extra)
                assert sum(r.share_extra for r in peak.rows) == pytest.approx(1)
                own = peak.variance_column / peak.variance_total
                assert sum(r.share_total for r in peak.rows) + own == pytest.approx(1)
                assert all(r.compression == 1 for r in peak.rows)
                if peak.plates_column:
                    assert peak.plates_observed <= peak.plates_column
                    assert peak.resolution_kept**2 == pytest.approx(peak.plates_kept)


def without(text, position):
    """The text of a path file without its part of this position."""
    lines = text.splitlines()
    parts = [index for index, line in enumerate(lines) if line.strip().startswith("{ ") and "k =" not in line]
    del lines[parts[position - 1]]
    return "\n".join(lines)


RUN = """\
flow = "0.5 mL/min"
path = [
  { inject = "2 uL" },
  { tube = "12 cm x 0.13 mm" },
  { tube = "20 cm x 0.25 mm" },
  { fitting = "0.5 uL" },
  { tube = "28 cm x 0.10 mm" },
  { column = "2.1 x 50 mm, 1.7 um", plates = 10500, total_porosity = 0.62 },
  { tube = "22 cm x 0.10 mm" },
  { detector = "UV", cell = "1.2 uL" },
]
peaks = [ { k = 1.5, diffusion = "9e-10 m^2/s" }, { k = 6, diffusion = "7e-10 m^2/s" } ]
"""


@pytest.mark.parametrize("position", [2, 3, 4, 5, 7])
def test_plates_without_a_part_are_those_of_the_file_without_it(position):
    """Also where taking a fitting out lets two tubes join into one run."""
    whole = budget(parse(RUN, "f")).detectors[0].peaks
    less = budget(parse(without(RUN, position), "f")).detectors[0].peaks
    for one, other in zip(whole, less, strict=True):
        row = next(row for row in one.rows if row.part.position == position)
        assert row.plates_kept_without == pytest.approx(other.plates_kept, rel=1e-9)


def test_a_fitting_that_remixes_can_cost_plates_when_it_is_taken_out():
    text = RUN.replace('"0.5 uL"', '"1 nL"')
    peak = budget(parse(text, "f")).detectors[0].peaks[0]
    row = next(row for row in peak.rows if row.contribution == "fitting")
    assert row.variance > 0
    assert row.plates_kept_without < peak.plates_kept


@pytest.mark.parametrize("columns", [1, 2])
def test_a_recorded_retention_made_from_k_gives_the_same_budget_as_k(columns, plain):
    column = '  { column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 },\n'
    assert column in plain
    text = plain.replace(column, (column + '  { tube = "5 cm x 0.1 mm" },\n') * columns)
    by_k = budget(parse(text, "f")).detectors[0]
    for key, factor, unit in (("retention", 1 / 60, "min"), ("elution_volume", 0.5e3 / 60, "uL")):
        made = text
        for peak in by_k.peaks:
            made = made.replace(f"k = {peak.peak.k:g},", f'{key} = "{peak.retention * factor!r} {unit}",')
        assert "k =" not in made
        again = budget(parse(made, "f")).detectors[0]
        assert again.delay == by_k.delay
        for one, other in zip(again.peaks, by_k.peaks, strict=True):
            assert one.peak.k == pytest.approx(other.peak.k, rel=1e-9)
            assert one.retention == pytest.approx(other.retention, rel=1e-9)
            assert one.variance_total == pytest.approx(other.variance_total, rel=1e-9)


def test_retention_is_that_at_the_first_detector(examples):
    text = (examples / "sugar-two-detectors.toml").read_text(encoding="utf-8")
    first, _ = budget(parse(text, "f")).detectors
    made = text.replace("k = 1.5", f'retention = "{first.peaks[0].retention!r} s"')
    assert budget(parse(made, "f")).detectors[1].peaks[0].peak.k == pytest.approx(1.5)


def test_columns_in_series_add_their_times_and_variances():
    text = RUN.replace(
        '  { column = "2.1 x 50 mm, 1.7 um", plates = 10500, total_porosity = 0.62 },\n',
        '  { column = "2.1 x 20 mm, 1.7 um", plates = 4200, total_porosity = 0.62 },\n'
        '  { column = "2.1 x 30 mm, 1.7 um", plates = 6300, total_porosity = 0.62 },\n',
    )
    one, two = budget(parse(RUN, "f")).detectors[0].peaks[0], budget(parse(text, "f")).detectors[0].peaks[0]
    assert two.plates_column == pytest.approx(one.plates_column)
    assert two.variance_column == pytest.approx(one.variance_column)
    assert two.plates_observed == pytest.approx(one.plates_observed)


def test_what_stands_between_columns_has_that_side(examples):
    peak = budget(read(str(examples / "guarded-column.toml"))).detectors[0].peaks[0]
    sides = {row.part.name or row.part.kind: row.side for row in peak.rows if row.side != "signal"}
    assert sides["between columns"] == "between"
    assert sides["valve to column"] == sides["autosampler"] == sides["inject"] == "before"
    assert sides["filter frit"] == sides["column to cell"] == sides["UV"] == "after"


def test_a_peak_s_own_plates_take_the_place_of_the_columns():
    peak = budget(parse(RUN.replace("k = 1.5,", "k = 1.5, plates = 8000,"), "f")).detectors[0].peaks[0]
    assert peak.plates_column == pytest.approx(8000)


def test_without_a_column_there_are_no_plates(examples):
    answer = budget(read(str(examples / "union-run.toml")))
    (peak,) = answer.detectors[0].peaks
    assert peak.plates_column is peak.plates_observed is peak.plates_kept is peak.resolution_kept is None
    assert peak.variance_column == 0
    assert peak.retention == answer.detectors[0].delay
    assert all(row.plates_kept_without is None for row in peak.rows)


def test_a_path_with_nothing_in_it_is_no_division_by_zero():
    text = 'flow = "1 mL/min"\ndiffusion = "1e-9 m^2/s"\npath = [{inject = "0 uL"}, {detector = "UV"}]\n'
    (peak,) = budget(parse(text, "f")).detectors[0].peaks
    assert peak.variance_total == peak.sigma == 0
    assert [row.share_extra for row in peak.rows] == [0]


def test_points_across_the_peak_and_the_warning_of_too_few(plain):
    peak = budget(parse(plain, "f")).detectors[0].peaks[0]
    assert peak.points == pytest.approx(4 * peak.sigma / 0.1)
    slow = budget(parse(plain.replace("10 Hz", "1 Hz"), "f"))
    assert any("data points" in warning for warning in slow.warnings)


def test_a_nearly_unmixed_tube_is_said_to_be_one(plain):
    text = plain.replace('"30 cm x 0.17 mm"', '"1 cm x 0.25 mm"').replace("1.0e-9", "5.0e-11")
    assert any("unmixed" in warning for warning in budget(parse(text, "f")).warnings)


def test_limits_not_entered_are_not_checked_and_never_called_good(plain):
    answer = budget(parse(plain, "f"))
    assert any("not checked" in caution for caution in answer.cautions)
    assert any("pressure at zero" in caution for caution in answer.cautions)
