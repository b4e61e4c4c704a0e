"""The rows of a budget: their ends, why they are there, and what a report says of tubes."""

import pytest

from xcol.answers.budget import budget
from xcol.filters.curved import bent_variance
from xcol.filters.tube import Tube
from xcol.flowpath.reader import parse, read


def rows_of(*parts, head=""):
    text = (
        f'flow = "0.4 mL/min"\nviscosity = "0.9 mPa s"\ndensity = "990 kg/m^3"\n{head}'
        'path = [ { inject = "3 uL", loop = "20 uL x 0.3 mm", emptied = "reversed" },\n'
        + ",\n".join([*parts, '{ detector = "UV" } ]'])
        + '\npeaks = [ { diffusion = "8e-10 m^2/s" } ]\n'
    )
    answer = budget(parse(text, "f"))
    return answer, answer.detectors[-1].peaks[0].rows


def test_a_tube_s_range_goes_from_a_bend_of_3_cm_to_straight():
    _, (_, row) = rows_of('{ tube = "40 cm x 0.2 mm" }')
    reynolds = 4 * 990 * 0.4e-6 / 60 / (3.14159265 * 0.2e-3 * 0.9e-3)
    dean = reynolds * (0.1e-3 / 0.03) ** 0.5
    strength = dean**2 * 0.9e-3 / (990 * 8e-10)
    tube = Tube(0.4, 0.2e-3, 0.4e-6 / 60, 8e-10)
    assert row.variance == row.high == pytest.approx(float(tube.variance()), rel=1e-12)
    low = tube.time_unit**2 * float(bent_variance(tube.t_star, strength)) + tube.axial_variance()
    assert row.low == pytest.approx(low, rel=1e-6)
    assert row.tube.bent_dean == pytest.approx(dean, rel=1e-6)
    assert row.tube.bent_strength == pytest.approx(strength, rel=1e-6)
    assert row.tube.strength == 0
    assert row.tube.straight_variance == pytest.approx(row.high, rel=1e-12)
    assert row.tube.bent_variance == pytest.approx(row.low, rel=1e-12)
    assert "3 cm" in row.at_low
    assert row.at_high == "straight"


@pytest.mark.parametrize(
    ("own", "head"),
    [
        (', bend_radius = "4 cm"', ""),
        (', coil_diameter = "80 mm"', ""),
        ("", 'bend_radius = "4 cm"\n'),
        ("", 'coil_diameter = "8 cm"\n'),
        (', bend_radius = "4 cm"', 'bend_radius = "9 cm"\n'),
    ],
)
def test_an_entered_bend_is_what_is_printed(own, head):
    _, (_, row) = rows_of(f'{{ tube = "40 cm x 0.2 mm"{own} }}', head=head)
    assert row.low == row.variance == pytest.approx(row.tube.bent_variance, rel=1e-12)
    assert row.tube.strength == row.tube.bent_strength > 0
    assert row.variance < 0.7 * row.tube.straight_variance == pytest.approx(0.7 * row.high, rel=1e-12)
    assert "as entered" in row.at_low
    assert "straight" in row.at_high


def test_brewery_conventional_with_every_tube_bent_at_4_cm(examples):
    text = (examples / "brewery-conventional.toml").read_text(encoding="utf-8")
    answer = budget(parse('bend_radius = "4 cm"\n' + text, "f"))
    rows = answer.detectors[0].peaks[1].rows
    tubes = [answer.in_uL2(row.variance) for row in rows if row.tube]
    assert tubes == pytest.approx([36, 25], abs=0.6)
    assert max(rows, key=lambda row: row.variance).contribution == "filter"


def test_above_a_dean_number_of_20_the_bend_is_an_upper_estimate():
    _, (_, row) = rows_of('{ tube = "40 cm x 0.5 mm", bend_radius = "5 mm" }', head="")
    assert row.tube.bent_dean < 20
    text = 'flow = "4 mL/min"\nviscosity = "0.4 mPa s"\npath = [ { inject = "3 uL" }, { tube = "40 cm x 0.25 mm" },\n'
    text += '{ detector = "UV" } ]\npeaks = [ { diffusion = "8e-10 m^2/s" } ]\n'
    (_, row) = budget(parse(text, "f")).detectors[0].peaks[0].rows
    assert row.tube.bent_dean > 20
    assert "upper estimate" in row.at_low
    assert row.tube.bent_strength == pytest.approx(400 * 0.4e-3 / (1000 * 8e-10))


def test_without_a_viscosity_bends_are_not_computed():
    text = 'flow = "0.4 mL/min"\npath = [ { inject = "3 uL" }, { tube = "40 cm x 0.2 mm", bend_radius = "3 cm" },\n'
    text += '{ detector = "UV" } ]\npeaks = [ { diffusion = "8e-10 m^2/s" } ]\n'
    answer = budget(parse(text, "f"))
    (_, row) = answer.detectors[0].peaks[0].rows
    assert row.low == row.variance == row.high == pytest.approx(row.tube.straight_variance)
    assert "viscosity" in row.at_low
    assert any("bend" in warning for warning in answer.warnings)


def test_cells_injections_and_fittings_have_their_ends():
    text = 'flow = "1 mL/min"\nviscosity = "1 cP"\npath = [ { inject = "20 uL" }, { fitting = "2 uL", remix = true },\n'
    text += '{ detector = "UV", cell = "10 uL" } ]\npeaks = [ { diffusion = "1e-9 m^2/s" } ]\n'
    answer = budget(parse(text, "f"))
    injection, fitting, cell = (
        (r, answer.in_uL2(r.low), answer.in_uL2(r.high)) for r in answer.detectors[0].peaks[0].rows
    )
    assert injection[1:] == pytest.approx((400 / 12, 100))
    assert fitting[1:] == pytest.approx((4 / 12, 4 * 1.35))
    assert cell[1:] == pytest.approx((100 / 12, 128.4), rel=1e-3)
    for row, low, high in (injection, fitting, cell):
        assert low <= answer.in_uL2(row.variance) <= high
        assert "plug" in row.at_low
        assert row.at_high != row.at_low


def test_tubes_beside_a_fitting_are_worst_where_their_layers_run_on(examples):
    parts = ['{ tube = "20 cm x 0.25 mm" }', '{ fitting = "0.1 uL" }', '{ tube = "20 cm x 0.25 mm" }']
    _, (_, first, _, second) = rows_of(*parts)
    _, (_, whole) = rows_of('{ tube = "40 cm x 0.25 mm" }')
    assert first.high + second.high == pytest.approx(whole.variance, rel=1e-9)
    assert "running on" in first.at_high
    assert "mixed anew" in first.at_low
    _, (_, known, *_) = rows_of(parts[0], '{ fitting = "0.1 uL", remix = true }', parts[2])
    assert known.high == known.variance == pytest.approx(first.variance)


def test_ends_hold_what_is_printed_in_every_example(examples):
    for file in examples.glob("*.toml"):
        for detector in budget(read(str(file))).detectors:
            for peak in detector.peaks:
                for row in peak.rows:
                    assert row.low <= row.variance <= row.high
                    assert row.at_low
                    assert row.at_high
                if peak.plates_kept is not None:
                    worst, best = peak.plates_kept_range
                    assert worst <= peak.plates_kept <= best


def test_strongly_bent_tubes_may_be_better_joined_than_mixed():
    head = 'bend_radius = "14 mm"\n'
    tube, union = '{ tube = "8 cm x 0.25 mm" }', '{ fitting = "a", bore = "0.25 mm", length = "0.1 mm"'
    _, (_, apart, _, _) = rows_of(tube, f"{union}, remix = true }}", tube, head=head.replace("flow", "flow"))
    _, (_, joined, _, _) = rows_of(tube, f"{union}, remix = false }}", tube, head=head)
    _, (_, open_, _, _) = rows_of(tube, f"{union} }}", tube, head=head)
    assert open_.low == pytest.approx(min(apart.variance, joined.variance), rel=1e-9)
    assert open_.high >= max(apart.high, joined.high) * (1 - 1e-9)


def test_a_cell_that_is_passed_through_has_both_ends_whichever_is_the_worse():
    for flow in ("1 uL/min", "1 mL/min"):
        text = (
            f'flow = "{flow}"\nviscosity = "1 cP"\npath = [ {{ inject = "20 nL" }},\n'
            '{ detector = "first", cell = "200 nL" },\n'
            '{ detector = "second" } ]\npeaks = [ { diffusion = "1e-9 m^2/s" } ]\n'
        )
        answer = budget(parse(text, "f"))
        cell = answer.detectors[1].peaks[0].rows[1]
        ends = [200e-3**2 / 12, answer.in_uL2(float(Tube(10e-3, (4 * 200e-12 / 3.14159265 / 10e-3) ** 0.5,
                                                           answer.instrument.flow, 1e-9).variance()))]  # fmt: skip
        assert [answer.in_uL2(cell.low), answer.in_uL2(cell.high)] == pytest.approx(sorted(ends), rel=1e-6)
        words = [cell.at_low, cell.at_high]
        assert "plug" in words[0 if ends[0] < ends[1] else 1]


def test_unmixed_loops_and_cells_and_high_dean_numbers_are_warned_of():
    text = (
        'flow = "0.3 mL/min"\nviscosity = "1 cP"\npath = [ { inject = "5 uL", loop = "5 uL x 0.5 mm" },\n'
        '{ detector = "UV", cell = "8 uL", path_length = "10 mm" } ]\npeaks = [ { diffusion = "4e-11 m^2/s" } ]\n'
    )
    (warning,) = [w for w in budget(parse(text, "f")).warnings if "unmixed" in w]
    assert "inject" in warning
    assert "UV" in warning
    answer, _ = rows_of('{ tube = "40 cm x 0.25 mm", bend_radius = "1 cm" }')
    assert not any("Dean" in warning for warning in answer.warnings)
    fast = text.replace("0.3 mL/min", "5 mL/min").replace(
        "{ detector", '{ tube = "40 cm x 0.25 mm", bend_radius = "1 cm" },\n{ detector'
    )
    assert any("Dean" in warning for warning in budget(parse(fast, "f")).warnings)
