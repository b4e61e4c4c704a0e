"""Budgets in which plates or diffusion coefficients come from the catalogs."""

import pytest

from xcol.answers.budget import budget
from xcol.flowpath.reader import parse


def text(column, peaks='{ k = 2, diffusion = "1e-9 m^2/s" }', flow="0.4 mL/min", head=""):
    return f"""flow = "{flow}"
viscosity = "0.9 mPa s"
{head}
path = [
  {{ inject = "2 uL" }},
  {{ tube = "30 cm x 0.17 mm" }},
  {{ column = "2.1 x 100 mm, 3 um", total_porosity = 0.65, {column} }},
  {{ detector = "UV", cell = "2 uL", time_constant = "0.1 s" }},
]
peaks = [ {peaks} ]
"""


def peaks_of(*words, **more):
    return budget(parse(text(*words, **more), "f.toml")).detectors[0].peaks


def height(nu, a=0.9, b=1.75, c=0.065):
    return a * nu ** (1 / 3) + b / nu + c * nu


def nu_at(flow_ml_min, diffusion=1e-9, particle=3e-6):
    """Reduced velocity with u = L/t0 in 2.1 x 100 mm, total porosity 0.65."""
    return flow_ml_min * 1e-6 / 60 / (0.65 * 3.141592653589793 / 4 * 2.1e-3**2) * particle / diffusion


def test_without_plates_they_come_from_the_curve_at_this_flow_and_for_each_solute():
    peaks = peaks_of(
        'packing = "fully porous"', '{ k = 2, diffusion = "1e-9 m^2/s" }, { k = 2, diffusion = "2e-10 m^2/s" }'
    )
    expected = [0.1 / 3e-6 / height(nu_at(0.4, diffusion)) for diffusion in (1e-9, 2e-10)]
    assert [peak.plates_column for peak in peaks] == pytest.approx(expected)
    for peak in peaks:
        fewest, most = peak.columns_range
        assert fewest < peak.plates_column < most
    fast = peaks_of('packing = "fully porous"', flow="0.8 mL/min")[0]
    assert fast.plates_column == pytest.approx(0.1 / 3e-6 / height(nu_at(0.8)))


def test_a_core_shell_packing_has_more():
    porous, shell = (peaks_of(f'packing = "{name}"')[0].plates_column for name in ("fully porous", "core-shell"))
    assert shell > 1.2 * porous


def test_a_curve_of_one_s_own_and_its_velocity():
    own = peaks_of("knox = { A = 0.9, B = 1.75, C = 0.065 }")[0]
    assert own.plates_column == pytest.approx(0.1 / 3e-6 / height(nu_at(0.4)))
    assert own.columns_range == (own.plates_column, own.plates_column)
    interstitial = 'knox = { A = 0.9, B = 1.75, C = 0.065, velocity = "interstitial" }, interstitial_porosity = 0.4'
    assert peaks_of(interstitial)[0].plates_column == pytest.approx(0.1 / 3e-6 / height(nu_at(0.4) * 0.65 / 0.4))


def test_entered_plates_hold_at_any_flow_and_with_plates_at_they_are_scaled():
    for flow in ("0.4 mL/min", "0.8 mL/min"):
        assert peaks_of("plates = 12000", flow=flow)[0].plates_column == pytest.approx(12000)
    same = peaks_of('plates = 12000, plates_at = "0.4 mL/min"')[0]
    assert same.plates_column == pytest.approx(12000)
    moved = peaks_of('plates = 12000, plates_at = "0.2 mL/min"')[0]
    assert moved.plates_column == pytest.approx(12000 * height(nu_at(0.2)) / height(nu_at(0.4)))
    assert moved.columns_range is None


def test_a_peak_s_own_plates_stand_before_the_curve():
    peak = peaks_of('packing = "core-shell"', '{ k = 2, diffusion = "1e-9 m^2/s", plates = 9000 }')[0]
    assert peak.plates_column == pytest.approx(9000)
    assert peak.columns_range is None


def test_the_answer_is_given_at_both_ends_of_an_estimated_coefficient():
    head = 'mobile_phase = "water"\ntemperature = "25 degC"'
    estimated, entered = peaks_of(
        "plates = 12000", '{ k = 2, molar_mass = "300 g/mol" }, { k = 2, diffusion = "1e-9 m^2/s" }', head=head
    )
    assert entered.over_diffusion is None
    slow, fast = estimated.over_diffusion
    assert slow.plates < estimated.plates_observed < fast.plates
    factor = 1 + estimated.peak.estimate.uncertainty
    for end, diffusion in ((slow, estimated.peak.diffusion / factor), (fast, estimated.peak.diffusion * factor)):
        typed = peaks_of("plates = 12000", f'{{ k = 2, diffusion = "{diffusion:.6e} m^2/s" }}', head=head)[0]
        assert end.plates == pytest.approx(typed.plates_observed, rel=1e-5)
        assert end.variance == pytest.approx(typed.variance_total, rel=1e-5)


def test_a_union_has_its_variance_at_both_ends():
    union = """flow = "0.4 mL/min"\nmobile_phase = "water"
path = [ { inject = "2 uL" }, { tube = "3 m x 0.17 mm" }, { detector = "2 uL", time_constant = "0.1 s" } ]
peaks = [ { solute = "caffeine" } ]"""
    peak = budget(parse(union, "f")).detectors[0].peaks[0]
    slow, fast = peak.over_diffusion
    assert slow.variance > peak.variance_total > fast.variance
    assert slow.plates is None
