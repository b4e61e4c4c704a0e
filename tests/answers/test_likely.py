"""Intervals, leaders and the ranking of the unknowns: coverage by simulation, scenarios, exact cases."""

import math
from dataclasses import replace

import numpy as np
import pytest

from xcol.answers import likely as likely_module
from xcol.answers.budget import budget
from xcol.answers.likely import SURE, Sampler
from xcol.filters.laminar import run_third_moment, variance_by_modes
from xcol.flowpath.reader import parse, read

VAGUE = """\
flow = "0.3 mL/min"
viscosity = "0.9 mPa s"
path = [
  { inject = "5 uL" },
  { tube = "40 cm x 0.17 mm", name = "first" },
  { column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 },
  { tube = "30 cm x 0.17 mm", name = "second" },
  { detector = "UV", cell = "4 uL", time_constant = "0.1 s" },
]
peaks = [ { k = 2, diffusion = "1e-9 m^2/s" } ]
"""


# σ²/V² of 4 µL over a straight 10 mm bore at this flow and D, of which t* is 6.283e-3
WORST_CELL = 0.7633


def likely_of(text, draws=2000, seed=1, at=-1, peak=0):
    answer = budget(parse(text, "f"))
    found = answer.detectors[at]
    return Sampler(answer, draws, seed).of(found, found.peaks[peak])


def true_instrument(rng):
    """An instrument of which all is known, drawn from what the vague file leaves open, in the file's own words.

    What the file format has no word for, a form between two, is a measured block of the same variance.
    """
    sigma = 1 / 1.6448536

    def factor(relative):
        return math.exp(math.log1p(relative) * sigma * rng.standard_normal())

    def tube(length, name):
        radius = 0.03 / max(rng.random(), 1e-9)
        bend = f', bend_radius = "{radius:.9g} m"' if radius < 10 else ""
        return f'{{ tube = "{length * factor(0.02):.9g} cm x {0.17 * factor(0.05):.9g} mm", name = "{name}"{bend} }}'

    injected = 25 * (1 / 12 + rng.random() / 6)
    cell = 16 / 12 * (12 * WORST_CELL) ** rng.random()
    parts = [
        '{ inject = "0 uL" }', f'{{ block = "{injected:.9g} uL^2" }}', tube(40, "first"),
        f'{{ column = "2.1 x 100 mm, 3 um", plates = {12000 * factor(0.1):.9g}, total_porosity = 0.6 }}',
        tube(30, "second"), f'{{ block = "{cell:.9g} uL^2" }}', '{ detector = "UV", time_constant = "0.1 s" }',
    ]  # fmt: skip
    start, end = VAGUE[: VAGUE.index("path")], VAGUE[VAGUE.index("peaks") :]
    return start + "path = [\n" + ",\n".join(parts) + "\n]\n" + end


def test_the_worst_cell_of_the_simulation_is_the_program_s():
    peak = budget(parse(VAGUE, "f")).detectors[0].peaks[0]
    cell = next(row for row in peak.rows if row.contribution == "cell")
    assert cell.high / (4e-9 / (0.3e-6 / 60)) ** 2 == pytest.approx(WORST_CELL, rel=1e-3)
    t = math.pi * 1e-9 * 0.01 / (0.3e-6 / 60)
    phi, skew = float(variance_by_modes(t)) / t**2, float(run_third_moment([t], [1.0])) / t**3
    assert pytest.approx(1 / 12 + phi / 2 - phi**2 / 4 + skew / 3, rel=1e-3) == WORST_CELL


def test_nine_in_ten_true_instruments_lie_in_the_interval():
    likely = likely_of(VAGUE)
    rng = np.random.default_rng(20)
    truth = [budget(parse(true_instrument(rng), "f")).detectors[0].peaks[0] for _ in range(500)]
    for figure in ("plates_kept", "plates_observed", "variance_extra", "variance_total"):
        low, high = getattr(likely, figure)
        values = np.array([getattr(peak, figure) for peak in truth])
        inside = (low <= values) & (values <= high)
        assert inside.mean() == pytest.approx(0.9, abs=0.04), figure
        assert (values < low).mean() == pytest.approx(0.05, abs=0.03), figure


def test_the_interval_does_not_hang_on_the_seed_or_on_the_number_of_draws():
    few, many = likely_of(VAGUE), likely_of(VAGUE, draws=100_000, seed=9)
    assert few.plates_kept == pytest.approx(many.plates_kept, abs=0.012)
    assert [row.part.position for row, _ in few.leaders[:2]] == [row.part.position for row, _ in many.leaders[:2]]
    assert few.leaders[0][1] == pytest.approx(many.leaders[0][1], abs=0.03)
    same = likely_of(VAGUE)
    assert same.plates_kept == few.plates_kept
    assert [i.share for i in same.influences] == [i.share for i in few.influences]


def test_what_is_known_has_no_interval():
    text = (
        'flow = "0.3 mL/min"\nviscosity = "0.9 mPa s"\npath = [\n'
        '{ inject = "5 uL", loop = "20 uL x 0.3 mm", emptied = "reversed" },\n'
        '{ tube = "40 cm x 0.17 mm", bend_radius = "4 cm", bore_tolerance = 0, length_tolerance = "0 %" },\n'
        '{ fitting = "0.2 uL", tanks = 1, remix = true },\n'
        '{ detector = "UV", cell = "4 uL", tanks = 2, rise_time = "0.1 s", rate = "10 Hz" } ]\n'
        'peaks = [ { diffusion = "1e-9 m^2/s" } ]\n'
    )
    answer = budget(parse(text, "f"))
    (peak,) = answer.detectors[0].peaks
    likely = Sampler(answer).of(answer.detectors[0], peak)
    assert likely.variance_extra == pytest.approx((peak.variance_extra,) * 2, rel=1e-12)
    assert likely.influences == ()
    assert likely.leaders[0][1] == 1
    # a bend that was entered is not drawn, and keeps its range up to straight
    assert [row.contribution for row in peak.rows if row.low < row.high] == ["tube"]
    assert all(row.low == row.variance for row in peak.rows)
    assert likely.plates_kept is None


def test_the_ranking_is_the_share_of_the_variance_of_independent_parts():
    # σ² = V²(1/12 … 1/4, even) of the injection and V²(1/12 … 1.35, log) of a fitting: variances are known
    text = (
        'flow = "0.3 mL/min"\npath = [ { inject = "10 uL" }, { fitting = "6 uL", remix = true },\n'
        '{ detector = "UV" } ]\npeaks = [ { diffusion = "1e-9 m^2/s" } ]\n'
    )
    likely = likely_of(text, draws=20_000)
    injection = 100**2 * (1 / 6) ** 2 / 12
    low, high = 1 / 12, 1.35
    log = math.log(high / low)
    fitting = 36**2 * ((high**2 - low**2) / (2 * log) - ((high - low) / log) ** 2)
    shares = {influence.what: influence.share for influence in likely.influences}
    assert shares["form of the injection"] == pytest.approx(injection / (injection + fitting), abs=0.015)
    assert shares["mixing"] == pytest.approx(fitting / (injection + fitting), abs=0.015)


def test_fittings_that_may_not_mix_are_even_odds_of_two_runs():
    tubes = '{ tube = "30 cm x 0.2 mm", bend_radius = "10 m", bore_tolerance = 0, length_tolerance = 0 }'

    def text(fitting):
        return (
            'flow = "0.3 mL/min"\nviscosity = "0.9 mPa s"\npath = [ { inject = "1 uL", loop = "2 uL x 0.2 mm", '
            f'emptied = "reversed" }},\n{tubes},\n{fitting},\n{tubes},\n{{ detector = "MS" }} ]\n'
            'peaks = [ { diffusion = "1e-9 m^2/s" } ]\n'
        )

    size = '"union", bore = "0.2 mm", length = "1 mm", bore_tolerance = 0, length_tolerance = 0'
    known = [
        budget(parse(text(f"{{ fitting = {size}, remix = {word} }}"), "f")).detectors[0].peaks[0].variance_extra
        for word in ("true", "false")
    ]
    assert known[0] < known[1]
    likely = likely_of(text(f"{{ fitting = {size} }}"))
    assert likely.variance_extra == pytest.approx(known, rel=1e-9)
    assert [(i.what, i.share > 0.9) for i in likely.influences] == [("remixing", True)]
    open_ended = budget(parse(text(f"{{ fitting = {size} }}"), "f")).detectors[0].peaks[0]
    assert sum(row.low for row in open_ended.rows) == pytest.approx(known[0], rel=1e-9)
    assert sum(row.high for row in open_ended.rows) == pytest.approx(known[1], rel=1e-3)  # straight, not a bend of 10 m


def test_estimated_diffusion_coefficients_and_plates_are_drawn():
    text = VAGUE.replace('diffusion = "1e-9 m^2/s"', 'molar_mass = "300 g/mol"').replace(
        'viscosity = "0.9 mPa s"', 'mobile_phase = "water/methanol 60:40"'
    )
    likely = likely_of(text.replace("plates = 12000", 'packing = "fully porous"'))
    assert {"D", "viscosity", "plates"} <= {influence.what for influence in likely.influences}
    own = likely_of(VAGUE.replace("k = 2", "k = 2, plates = 9000"))
    assert own.plates_column == pytest.approx((9000 / 1.1, 9000 * 1.1), rel=0.01)
    assert [i.part for i in own.influences if i.what == "plates"] == [None]
    low, high = likely.plates_column
    peak = budget(parse(text.replace("plates = 12000", 'packing = "fully porous"'), "f")).detectors[0].peaks[0]
    assert 0.95 * peak.columns_range[0] < low < peak.plates_column < high < 1.05 * peak.columns_range[1]


def test_tolerances_of_the_file_take_the_place_of_the_assumed_ones():
    wide = VAGUE.replace('name = "first"', 'name = "first", bore_tolerance = "±20 %", bend_radius = "10 cm"')
    likely = likely_of(wide)
    shares = {(i.what, i.part.name): i.share for i in likely.influences if i.part}
    assert shares["bore", "first"] > 0.25 > shares["bore", "second"]
    assert ("bend", "first") not in shares
    exact = VAGUE.replace('name = "first"', 'name = "first", bore_tolerance = 0')
    assert ("bore", "first") not in {(i.what, i.part.name) for i in likely_of(exact).influences if i.part}
    bed = VAGUE.replace("plates = 12000", 'plates = 12000, bore_tolerance = "10 %"')
    assert {i.what for i in likely_of(bed).influences if i.part and i.part.kind == "column"} == {"plates", "bore"}


def scenario(examples, name):
    answer = budget(read(str(examples / f"{name}.toml")))
    found = answer.detectors[-1]
    peak = found.peaks[min(1, len(found.peaks) - 1)]
    return answer, peak, Sampler(answer).of(found, peak)


def test_brewery_conventional_names_no_tube_first(examples):
    _, _, likely = scenario(examples, "brewery-conventional")
    assert likely.leader is None
    assert likely.leaders[0][0].part.kind != "tube"


def test_brewery_narrow_gains_most_surely_by_injecting_less(examples):
    _, peak, likely = scenario(examples, "brewery-narrow")
    assert likely.leader is not None
    assert likely.leader.contribution == "injection"
    assert likely.leaders[0][1] >= SURE
    assert likely.plates_kept[0] < peak.plates_kept < likely.plates_kept[1]


def test_the_antibody_s_loss_with_its_ends(examples):
    answer, peak, likely = scenario(examples, "antibody-size-exclusion")
    assert likely.plates_kept[0] < peak.plates_kept < likely.plates_kept[1]
    worst, best = peak.plates_kept_range
    assert 1 - best == pytest.approx(0.16, abs=0.005)
    tubes = [row for row in peak.rows if row.tube]
    others = peak.variance_extra - sum(row.variance for row in tubes)
    own = peak.variance_column
    losses = [1 - own / (own + others + sum(ends)) for ends in zip(*((r.low, r.high) for r in tubes), strict=True)]
    assert losses == pytest.approx([0.16, 0.288], abs=0.01)
    # all at its worst: the cell as a straight bore has 2.95 V² for so slow a molecule; with the 1.284 V² of a small
    # molecule at 1 mL/min the loss would be 40 %
    cell = next(row for row in peak.rows if row.contribution == "cell")
    assert answer.in_uL2(cell.high) / 8**2 == pytest.approx(2.95, rel=5e-3)
    high = sum(row.high for row in peak.rows)
    assert 1 - worst == pytest.approx(0.505, abs=0.005)
    mild = high - cell.high + 1.284 * (8e-9 / answer.instrument.flow) ** 2
    assert 1 - own / (own + mild) == pytest.approx(0.40, abs=0.005)


def test_twice_the_same_text_gives_the_same_answer_whatever_the_number_of_parts():
    for tubes in (1, 12, 40):
        parts = [f'{{ tube = "{10 + n} cm x 0.2 mm" }}, {{ fitting = "0.1 uL" }}' for n in range(tubes)]
        text = VAGUE.replace('{ tube = "40 cm x 0.17 mm", name = "first" }', ",\n".join(parts))
        assert likely_of(text, draws=300) == likely_of(text, draws=300)


def test_a_recorded_retention_holds_whatever_the_void_volume_is():
    exact = VAGUE.replace("total_porosity = 0.6", 'void_volume = "0.208 mL"').replace("k = 2", 'retention = "2.3 min"')
    loose = exact.replace('"0.208 mL"', '"0.208 mL", volume_tolerance = "15 %"')
    assert likely_of(loose).plates_kept == pytest.approx(likely_of(exact).plates_kept, rel=1e-9)
    by_k = loose.replace('retention = "2.3 min"', "k = 2")
    low, high = likely_of(by_k).plates_kept
    assert high - low > 1.1 * np.ptp(likely_of(loose).plates_kept)


def test_an_assumed_total_porosity_is_drawn():
    assumed = VAGUE.replace(", total_porosity = 0.6", "")
    shares = {i.what: i.share for i in likely_of(assumed).influences}
    assert shares["total porosity"] > 0.05
    low, high = likely_of(assumed).plates_kept
    for porosity in (0.52, 0.66):
        entered = VAGUE.replace("total_porosity = 0.6", f"total_porosity = {porosity}")
        middle = sum(likely_of(entered).plates_kept) / 2
        assert low < middle < high
    assert "total porosity" not in {i.what for i in likely_of(VAGUE).influences}


def test_a_cell_of_no_volume_leads_nowhere():
    likely = likely_of(VAGUE.replace('cell = "4 uL"', 'cell = "0 uL"'))
    assert all(math.isfinite(end) for end in (*likely.plates_kept, *likely.variance_extra))
    (cell,) = [share for row, share in likely.leaders if row.contribution == "cell"]
    assert cell == 0


def test_a_part_is_named_from_nine_of_ten_draws_on():
    assert SURE == 0.9


def test_the_draws_are_the_same_in_whatever_blocks_they_are_computed(monkeypatch):
    text = VAGUE.replace('diffusion = "1e-9 m^2/s"', 'molar_mass = "300 g/mol"').replace(
        'viscosity = "0.9 mPa s"', 'mobile_phase = "water/THF 60:40"'
    )
    whole = likely_of(text, draws=3000)
    monkeypatch.setattr(likely_module, "_BLOCK", 700)
    assert likely_of(text, draws=3000).variance_extra == pytest.approx(whole.variance_extra, rel=1e-12)
    assert [share for _, share in likely_of(text, draws=3000).leaders] == [share for _, share in whole.leaders]


def test_an_unknown_that_moves_nothing_has_no_share():
    shares = [
        influence.share
        for seed in range(6)
        for influence in likely_of(VAGUE.replace('"4 uL"', '"1 nL"'), seed=seed).influences
        if influence.what == "mixing"
    ]
    assert np.mean(shares) < 0.004


def test_the_viscosity_s_doubt_moves_the_bends():
    text = VAGUE.replace('viscosity = "0.9 mPa s"', 'mobile_phase = "water"').replace(
        "0.17 mm", '0.17 mm", coil_diameter = "40 cm'
    )
    answer = budget(parse(text, "f"))
    found = answer.detectors[0]
    widths = []
    for uncertainty in (0.01, 4.0):
        viscosity = replace(answer.instrument.viscosity, uncertainty=uncertainty)
        moved = replace(answer, instrument=replace(answer.instrument, viscosity=viscosity))
        widths.append(np.ptp(Sampler(moved).of(found, found.peaks[0]).variance_extra))
    assert widths[1] > 1.1 * widths[0]


def test_a_peak_s_plates_are_those_of_all_columns_at_a_detector_between_them():
    column = '{ column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 }'
    text = VAGUE.replace(column, "{ column = \"2.1 x 50 mm, 3 um\", plates = 7000, total_porosity = 0.6 },\n"
                         '{ detector = "between" },\n' + column).replace("k = 2", "k = 2, plates = 9000")  # fmt: skip
    answer = budget(parse(text, "f"))
    for n, found in enumerate(answer.detectors):
        (peak,) = found.peaks
        low, high = likely_of(text, at=n).plates_column
        assert (low, high) == pytest.approx((peak.plates_column / 1.1, peak.plates_column * 1.1), rel=0.01)
    loose = text.replace("plates = 12000", 'plates = 12000, bore_tolerance = "20 %"')
    assert likely_of(loose).plates_column == pytest.approx(likely_of(text).plates_column, rel=0.03)
