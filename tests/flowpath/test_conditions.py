"""Temperatures and viscosity of the parts, from a mobile phase or as entered."""

import pytest

from xcol.flowpath.reader import parse

WATER_25 = 0.89e-3


def text(*head, peaks="", tube="", column=""):
    lines = ['flow = "0.4 mL/min"', *head]
    return (
        "\n".join(lines)
        + f"""
path = [
  {{ inject = "2 uL" }},
  {{ tube = "30 cm x 0.17 mm"{tube} }},
  {{ column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6{column} }},
  {{ detector = "UV", cell = "2.5 uL", time_constant = "0.1 s" }},
]
{peaks}
"""
    )


def instrument(*head, **more):
    return parse(text(*head, **more), "f.toml")


def said(found):
    return " ".join(assumption.text for assumption in found.assumed)


def test_the_mobile_phase_gives_viscosity_and_density():
    found = instrument('mobile_phase = "water"', 'temperature = "25 degC"')
    assert found.viscosity.value == pytest.approx(WATER_25, rel=1e-3)
    assert found.density == pytest.approx(997.05, abs=0.1)
    assert found.mobile_phase == "water"
    assert "0.89 mPa s" in said(found)
    assert "density" not in said(found)


def test_without_a_temperature_it_is_assumed_and_said():
    found = instrument('mobile_phase = "water"')
    assert found.temperature == pytest.approx(298.15)
    assert "25 °C" in said(found)
    alone = instrument('mobile_phase = "water"', 'ambient = "20 degC"')
    assert [part.temperature for part in alone.parts] == pytest.approx([293.15] * 4)
    assert "ambient" in said(alone)


def test_with_ambient_only_the_columns_are_in_the_oven_unless_a_part_says_otherwise():
    head = ('mobile_phase = "water"', 'temperature = "40 degC"', 'ambient = "22 degC"')
    found = instrument(*head, tube=', temperature = "30 degC"')
    assert [part.temperature - 273.15 for part in found.parts] == pytest.approx([22, 30, 40, 22])
    assert [part.viscosity.value * 1e3 for part in found.parts] == pytest.approx([0.954, 0.797, 0.653, 0.954], abs=1e-3)
    assert found.parts[2].mobility == 1.0
    assert all(part.mobility < 1 for part in found.parts if part.kind != "column")


def test_ambient_at_the_oven_s_temperature_changes_nothing(budget_of):
    head = ('mobile_phase = "water/ACN 40:60"', 'temperature = "30 degC"')
    peaks = 'peaks = [{ k = 2, molar_mass = "300 g/mol" }]'
    plain, same = budget_of(text(*head, peaks=peaks)), budget_of(text(*head, 'ambient = "30 degC"', peaks=peaks))
    assert plain["detectors"] == same["detectors"]
    assert plain["pressure"] == same["pressure"]


def test_a_cold_tube_broadens_more_and_costs_more_pressure(budget_of):
    head = ('mobile_phase = "water"', 'temperature = "60 degC"')
    peaks = 'peaks = [{ k = 2, molar_mass = "300 g/mol" }]'
    warm, cold = budget_of(text(*head, peaks=peaks)), budget_of(text(*head, 'ambient = "15 degC"', peaks=peaks))
    peak = [found["detectors"][0]["peaks"][0] for found in (warm, cold)]
    assert peak[0]["diffusion_m2_s"] == pytest.approx(peak[1]["diffusion_m2_s"])
    assert peak[0]["variance_column_uL2"] == pytest.approx(peak[1]["variance_column_uL2"])
    tubes = [p["parts"][1] for p in peak]
    # D ∝ T/η of water: 333.15/0.466 over 288.15/1.138
    assert tubes[0]["tstar"] / tubes[1]["tstar"] == pytest.approx(333.15 / 0.466 * 1.138 / 288.15, rel=2e-3)
    assert tubes[1]["variance_uL2"] > tubes[0]["variance_uL2"]
    drops = [found["pressure"][1]["drop_bar"] for found in (warm, cold)]
    assert drops[1] / drops[0] == pytest.approx(1.138 / 0.466, rel=2e-3)
    assert warm["pressure"][2]["drop_bar"] == pytest.approx(cold["pressure"][2]["drop_bar"])


def test_an_entered_viscosity_is_used_at_every_temperature_and_said_so():
    head = ('viscosity = "0.9 mPa s"', 'temperature = "40 degC"', 'ambient = "22 degC"', 'diffusion = "1e-9 m^2/s"')
    found = instrument(*head)
    assert [part.viscosity.value for part in found.parts] == pytest.approx([0.9e-3] * 4)
    assert {part.mobility for part in found.parts} == {1.0}
    assert "as entered" in said(found)


def test_an_entered_diffusion_coefficient_is_the_same_in_a_cold_tube(budget_of):
    head = ('mobile_phase = "water"', 'temperature = "60 degC"', 'diffusion = "1e-9 m^2/s"')
    warm, cold = budget_of(text(*head)), budget_of(text(*head, 'ambient = "15 degC"'))
    for one, other in zip(warm["detectors"][0]["peaks"], cold["detectors"][0]["peaks"], strict=True):
        for key in ("diffusion_m2_s", "variance_extra_uL2", "plates_observed"):
            assert one[key] == other[key]
    assert warm["pressure"] != cold["pressure"]


def test_an_entered_viscosity_that_contradicts_the_mobile_phase_is_warned_of():
    head = ('mobile_phase = "acetonitrile"', 'temperature = "25 degC"')
    found = instrument(*head, 'viscosity = "0.9 mPa s"')
    assert any("acetonitrile" in warning for warning in found.warnings)
    assert found.viscosity.value == pytest.approx(0.9e-3)
    assert not instrument(*head, 'viscosity = "0.36 mPa s"').warnings


def test_outside_the_measured_rows_the_doubt_grows_and_is_said():
    inside = instrument('mobile_phase = "methanol/water 50:50"', 'temperature = "25 degC"')
    outside = instrument('mobile_phase = "methanol/water 50:50"', 'temperature = "60 degC"')
    assert inside.viscosity.uncertainty == pytest.approx(0.03)
    assert outside.viscosity.uncertainty == pytest.approx(0.12)
    assert "extrapolated" in said(outside)
    assert "extrapolated" not in said(inside)


def test_outside_the_fit_there_is_a_warning_and_far_outside_a_fault(faults_of):
    head = 'mobile_phase = "hexane"'
    assert not instrument(head, 'temperature = "70 degC"').warnings
    assert any("extrapolated" in warning for warning in instrument(head, 'temperature = "100 degC"').warnings)
    hot, cold = ('temperature = "150 degC"',), ('ambient = "-38 degC"', 'temperature = "25 degC"')
    for more, key in ((hot, "temperature"), (cold, "ambient")):
        (fault,) = faults_of(text(head, *more))
        assert fault.place.key == key
        assert fault.place.line
    (fault,) = faults_of(text(head, tube=', temperature = "150 degC"'))
    assert "tube" in fault.place.part


def test_an_entered_viscosity_has_no_range_to_leave():
    head = (
        'mobile_phase = "hexane"',
        'temperature = "150 degC"',
        'viscosity = "0.2 mPa s"',
        'diffusion = "5e-9 m^2/s"',
    )
    assert instrument(*head).viscosity.value == pytest.approx(0.2e-3)


def test_the_pressure_s_range_holds_the_viscosity_s_doubt(budget_of):
    mixed = budget_of(text('mobile_phase = "hexane/2-propanol 90:10"'))
    tube = mixed["pressure"][1]
    column = mixed["pressure"][2]
    assert tube["inlet_high_bar"] > tube["inlet_bar"] > tube["inlet_low_bar"]
    low, high = column["inlet_low_bar"] / column["inlet_bar"], column["inlet_high_bar"] / column["inlet_bar"]
    assert low < 0.81 / 1.2 + 0.01
    assert high > 1.55 * 1.2


@pytest.mark.parametrize(
    ("phase", "words"),
    [
        ("hexane/2-propanol 90:10", "logarithmic mixing"),
        ("water/THF 60:40", "mean of those known"),
        ("water/acetonitrile/methanol 50:25:25", "known excess of each pair"),
        ("0.1 % formic acid in water", "taken as water"),
    ],
)
def test_a_mixing_rule_and_what_is_left_out_are_said_as_assumed(phase, words):
    assert words in said(instrument(f'mobile_phase = "{phase}"'))


def test_without_a_column_everything_is_at_ambient():
    union = """flow = "0.4 mL/min"\nmobile_phase = "water"\ntemperature = "40 degC"\nambient = "20 degC"
path = [ { inject = "2 uL" }, { tube = "30 cm x 0.17 mm" }, { detector = "2 uL", time_constant = "0.1 s" } ]
peaks = [ { molar_mass = "300 g/mol" } ]"""
    found = parse(union, "f")
    assert {part.mobility for part in found.parts} == {1.0}
    assert found.viscosity.value == pytest.approx(1.0016e-3, rel=1e-3)


def test_a_material_that_is_kept_away_from_the_liquid_is_warned_of():
    tube = ', material = "PEEK"'
    assert any("PEEK" in warning for warning in instrument('mobile_phase = "hexane/THF 50:50"', tube=tube).warnings)
    assert not instrument('mobile_phase = "water/ACN 50:50"', tube=tube).warnings
    assert not instrument('mobile_phase = "hexane/THF 50:50"', tube=', material = "steel"').warnings
    assert not instrument('mobile_phase = "hexane/THF 50:50"', tube=', material = "unobtainium"').warnings


def test_a_column_s_own_temperature_is_the_one_its_peaks_are_stated_for():
    head = ('mobile_phase = "water"', 'temperature = "25 degC"')
    peaks = 'peaks = [ { k = 2, molar_mass = "300 g/mol" } ]'
    own = instrument(*head, peaks=peaks, column=', temperature = "60 degC"')
    oven = instrument('mobile_phase = "water"', 'temperature = "60 degC"', 'ambient = "25 degC"', peaks=peaks)
    assert own.temperature == pytest.approx(333.15)
    assert own.peaks[0].diffusion == pytest.approx(oven.peaks[0].diffusion)
    assert [part.mobility for part in own.parts] == pytest.approx([part.mobility for part in oven.parts])
    assert [part.temperature for part in own.parts] == pytest.approx([part.temperature for part in oven.parts])


def test_the_reynolds_number_is_that_of_a_part_s_own_viscosity(budget_of):
    head = ('mobile_phase = "water"', 'temperature = "60 degC"', 'ambient = "15 degC"')
    tube = budget_of(text(*head))["pressure"][1]
    expected = 4 * 983.2 * 0.4e-6 / 60 / (3.141592653589793 * 0.17e-3 * 1.1375e-3)
    assert tube["reynolds_number"] == pytest.approx(expected, rel=2e-3)
    assert tube["viscosity_mPa_s"] == pytest.approx(1.1375, rel=1e-3)
    assert tube["temperature_degC"] == pytest.approx(15)


def test_temperatures_that_one_figure_cannot_stand_for_are_warned_of():
    two = text('mobile_phase = "water"', 'temperature = "30 degC"').replace(
        "  { detector", '  { column = "2.1 x 50 mm, 3 um", plates = 6000, temperature = "60 degC" },\n  { detector'
    )
    assert any("different temperatures" in warning for warning in parse(two, "f").warnings)
    head = ('viscosity = "0.9 mPa s"', 'diffusion = "1e-9 m^2/s"', 'temperature = "40 degC"')
    assert instrument(*head, 'ambient = "22 degC"').warnings
    assert not instrument(*head).warnings


def test_a_concentrated_solution_is_as_doubtful_as_it_is():
    found = instrument('mobile_phase = "6 M guanidine hydrochloride in water"')
    assert found.viscosity.uncertainty >= 0.5
    assert found.warnings


def test_a_pair_that_nobody_measured_is_warned_of():
    for phase, warned in (
        ("water/THF 50:50", True),
        ("water/acetone 99:1", False),
        ("water/ACN 50:50", False),
        ("hexane/THF 50:50", False),
    ):
        assert bool(instrument(f'mobile_phase = "{phase}"').warnings) == warned
