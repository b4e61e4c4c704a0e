"""How far the answer hangs on estimated diffusion coefficients."""

import pytest

from xcol.answers.budget import budget, recorded
from xcol.answers.doubt import over_diffusion
from xcol.flowpath.reader import parse

HEAD = 'flow = "0.4 mL/min"\nmobile_phase = "water"\ntemperature = "25 degC"\n'
PATH = """path = [
  { inject = "2 uL" },
  { tube = "30 cm x 0.17 mm" },
  { column = "2.1 x 100 mm, 3 um", total_porosity = 0.65COLUMN },
  { detector = "UV", cell = "2 uL", time_constant = "0.1 s" },
]
"""


def answer_of(peaks, column=", plates = 12000"):
    return budget(parse(f"{HEAD}{PATH.replace('COLUMN', column)}peaks = [ {peaks} ]", "f.toml"))


def test_the_ends_are_those_of_the_coefficient():
    answer = answer_of('{ k = 2, molar_mass = "300 g/mol" }, { k = 2, diffusion = "1e-9 m^2/s" }')
    ((estimated, entered),) = over_diffusion(answer)
    assert entered is None
    peak = answer.detectors[0].peaks[0]
    factor = 1 + peak.peak.estimate.uncertainty
    ends = [
        answer_of(f'{{ k = 2, diffusion = "{diffusion:.8e} m^2/s" }}').detectors[0].peaks[0]
        for diffusion in (peak.peak.diffusion / factor, peak.peak.diffusion * factor)
    ]
    assert estimated.plates == pytest.approx(sorted(end.plates_observed for end in ends), rel=1e-6)
    assert estimated.variance == pytest.approx(sorted(end.variance_total for end in ends), rel=1e-6)
    assert estimated.plates[0] < peak.plates_observed < estimated.plates[1]
    assert 0 < estimated.spread < 0.2


def test_the_printed_value_lies_in_its_own_range_even_where_n_has_a_maximum():
    best = 'flow = "0.3 mL/min"'
    text = HEAD.replace('flow = "0.4 mL/min"', best) + PATH.replace("2.1 x 100", "4.6 x 100").replace("COLUMN", "")
    answer = budget(parse(text + 'peaks = [ { k = 2, molar_mass = "300 g/mol" } ]', "f.toml"))
    ((doubt,),) = over_diffusion(answer)
    assert doubt.plates[0] <= answer.detectors[0].peaks[0].plates_observed <= doubt.plates[1]


def test_a_union_has_a_range_of_variance():
    union = """flow = "0.4 mL/min"\nmobile_phase = "water"
path = [ { inject = "2 uL" }, { tube = "3 m x 0.17 mm" }, { detector = "2 uL", time_constant = "0.1 s" } ]
peaks = [ { solute = "caffeine" } ]"""
    answer = budget(parse(union, "f"))
    ((doubt,),) = over_diffusion(answer)
    assert doubt.plates is None
    assert doubt.variance[0] < answer.detectors[0].peaks[0].variance_total < doubt.variance[1]


def test_the_totals_are_those_of_the_budget():
    answer = answer_of('{ k = 2, molar_mass = "300 g/mol" }, { k = 0, diffusion = "1e-9 m^2/s" }', "")
    for found in answer.detectors:
        totals = recorded(answer.instrument, found.detector)
        assert [variance for variance, _ in totals] == pytest.approx([peak.variance_total for peak in found.peaks])
        assert [plates for _, plates in totals] == pytest.approx([peak.plates_observed for peak in found.peaks])


def test_where_all_was_entered_there_is_none():
    assert over_diffusion(answer_of('{ k = 2, diffusion = "1e-9 m^2/s" }')) == [[None]]
