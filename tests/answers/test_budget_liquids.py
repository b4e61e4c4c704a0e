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
    assert own.columns_range is None  # nothing is known of its range
    for bed in (0.4, 0.36):
        curve = 'knox = { A = 0.9, B = 1.75, C = 0.065, velocity = "interstitial" }'
        found = peaks_of(f"{curve}, interstitial_porosity = {bed}")[0]
        assert found.plates_column == pytest.approx(0.1 / 3e-6 / height(nu_at(0.4) * 0.65 / bed))


def test_columns_in_series_add_their_variances_at_the_ends_of_the_range_too():
    two = text('packing = "core-shell"').replace(
        "  { detector", '  { column = "2.1 x 50 mm, 3 um", total_porosity = 0.65 },\n  { detector'
    )
    first, both = peaks_of('packing = "core-shell"')[0], budget(parse(two, "f")).detectors[0].peaks[0]
    second = peaks_of('packing = "fully porous"')[0]
    for end in (0, 1):
        # times 2:1; the 50 mm column has half the plates of 100 mm
        expected = 9 / (4 / first.columns_range[end] + 1 / (second.columns_range[end] / 2))
        assert both.columns_range[end] == pytest.approx(expected)
    assert both.columns_range[0] < both.plates_column < both.columns_range[1]


def test_plates_that_cannot_be_after_scaling_are_refused(faults_of):
    (fault,) = faults_of(text('plates = 20000, plates_at = "5 mL/min"'))
    assert fault.place.key == "plates_at"
    assert fault.place.line
    odd = parse(text('plates = 3000, plates_at = "10 uL/min"'), "f")
    assert any("unit" in warning for warning in odd.warnings)


def test_plates_and_a_curve_are_one_too_many(faults_of):
    (fault,) = faults_of(text("plates = 12000, knox = { A = 0.9, B = 1.75, C = 0.065 }"))
    assert fault.place.key == "knox"


def test_entered_plates_hold_at_any_flow_and_with_plates_at_they_are_scaled():
    for flow in ("0.4 mL/min", "0.8 mL/min"):
        assert peaks_of("plates = 12000", flow=flow)[0].plates_column == pytest.approx(12000)
    same = peaks_of('plates = 12000, plates_at = "0.4 mL/min"')[0]
    assert same.plates_column == pytest.approx(12000)
    for diffusion in (1e-9, 3e-10):
        moved = peaks_of('plates = 12000, plates_at = "0.2 mL/min"', f'{{ k = 2, diffusion = "{diffusion} m^2/s" }}')[0]
        ratio = height(nu_at(0.2, diffusion)) / height(nu_at(0.4, diffusion))
        assert moved.plates_column == pytest.approx(12000 * ratio)
        assert moved.columns_range is None


def test_a_peak_s_own_plates_stand_before_the_curve():
    peak = peaks_of('packing = "core-shell"', '{ k = 2, diffusion = "1e-9 m^2/s", plates = 9000 }')[0]
    assert peak.plates_column == pytest.approx(9000)
    assert peak.columns_range is None
