"""A peak's diffusion coefficient: by name, by molar mass, known at other conditions."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from xcol.flowpath.reader import parse

PATH = """
path = [
  { inject = "2 uL" },
  { column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 },
  { detector = "UV", cell = "2.5 uL", time_constant = "0.1 s" },
]
"""
WATER = 'mobile_phase = "water"\ntemperature = "25 degC"\n'
MIXED = 'mobile_phase = "acetonitrile/water 60:40"\ntemperature = "30 degC"\n'


def text(peak, head=WATER):
    peaks = f"peaks = [ {{ k = 2, {peak} }} ]\n" if peak else ""
    return f'flow = "0.4 mL/min"\n{head}{PATH}{peaks}'


def estimate(peak, head=WATER):
    return parse(text(peak, head), "f.toml").peaks[0].estimate


def test_a_named_solute_has_its_measured_value_in_water():
    caffeine = estimate('solute = "caffeine"')
    assert caffeine.value == pytest.approx(6.5e-10)
    assert caffeine.uncertainty == pytest.approx(0.10)
    assert "in water at 25 °C" in caffeine.stated
    assert parse(text('solute = "caffeine"'), "f").peaks[0].name == "caffeine"


def test_a_measured_value_is_scaled_with_t_over_eta():
    warm = estimate('solute = "caffeine"', WATER.replace("25", "60"))
    assert warm.value == pytest.approx(6.5e-10 * (333.15 / 0.466) / (298.15 / 0.89), rel=1e-3)
    mixed = estimate('solute = "caffeine"', MIXED)
    assert mixed.value == pytest.approx(6.5e-10 * (303.15 / 0.6483) / (298.15 / 0.89), rel=1e-3)
    assert mixed.uncertainty == pytest.approx((0.10**2 + 0.25**2 + 0.03**2 + 0.01**2) ** 0.5)
    assert "scaled" in mixed.stated


def test_a_molar_mass_gives_an_estimate_with_its_origin():
    small = estimate('molar_mass = "194 g/mol"')
    assert small.value == pytest.approx(6.3e-10, rel=0.02)
    assert "Wilke–Chang from 194 g/mol, ±22 %" in small.stated
    assert estimate('molar_mass = "194 Da"', MIXED).uncertainty == pytest.approx(0.2625, abs=0.002)
    protein = estimate('molar_mass = "150 kDa"')
    assert protein.value == pytest.approx(5.26e-11, rel=0.01)
    assert "Young–Carroad–Bell from 150 kg/mol" in protein.stated
    assert protein.uncertainty == pytest.approx(0.25)


def test_a_solute_without_a_measured_value_is_estimated_from_its_molar_volume():
    toluene = estimate('solute = "toluene"')
    assert "molar volume of 118 cm³/mol" in toluene.stated
    assert toluene.uncertainty == pytest.approx(0.20)
    assert toluene.value == pytest.approx(9.03e-10, rel=0.01)
    assert "Young" in estimate('solute = "thyroglobulin"').origin


def test_the_switch_and_the_molecule():
    assert "Wilke" in estimate('molar_mass = "500 g/mol"').origin
    assert "Young" in estimate('molar_mass = "501 g/mol"').origin
    assert "Wilke" in estimate('molar_mass = "900 g/mol", molecule = "small"').origin
    assert "Young" in estimate('molar_mass = "450 g/mol", molecule = "globular"').origin
    assert any("folded" in a.text for a in parse(text('molar_mass = "1200 g/mol"'), "f").assumed)
    assert parse(text('molar_mass = "5.8 kDa", molecule = "small"'), "f").warnings
    assert parse(text('molar_mass = "150 g/mol", molecule = "globular"'), "f").warnings
    assert parse(text('molar_mass = "150 kDa"', MIXED), "f").warnings  # a protein in 60 % acetonitrile
    assert parse(text('solute = "IgG"', MIXED), "f").warnings
    assert not parse(text('solute = "IgG"'), "f").warnings


def test_in_a_liquid_without_water_nothing_is_folded_and_a_value_in_water_tells_little(faults_of):
    head = 'mobile_phase = "hexane"\ntemperature = "25 degC"\n'
    (fault,) = faults_of(text('molar_mass = "35 kDa"', head))
    assert fault.place.key == "molar_mass"
    assert "Wilke" in estimate('molar_mass = "700 g/mol", molecule = "small"', head).origin
    benzene = estimate('solute = "benzene"', head)
    assert "Wilke" in benzene.origin
    assert benzene.value == pytest.approx(4.7e-9, rel=0.15)  # measured 4.7e-9, from memory
    assert "in water" in estimate('solute = "benzene"', MIXED).origin


def test_a_temperature_that_nobody_entered_is_said_where_an_estimate_needs_it():
    found = parse(text('molar_mass = "20 kDa"', 'viscosity = "1 mPa s"\n'), "f")
    assert any("25 °C" in assumption.text for assumption in found.assumed)
    assert not any(
        "25 °C" in a.text for a in parse(text('diffusion = "1e-9 m^2/s"', 'viscosity = "1 cP"\n'), "f").assumed
    )


def test_what_is_known_elsewhere_is_scaled():
    known = 'diffusion = "6.5e-10 m^2/s", at = { mobile_phase = "water", temperature = "25 degC" }'
    assert estimate(known).value == pytest.approx(6.5e-10)
    assert estimate(known).uncertainty == 0.0
    assert estimate(known, MIXED).value == pytest.approx(estimate('solute = "caffeine"', MIXED).value)
    elsewhere = estimate(known, MIXED)
    assert elsewhere.uncertainty == pytest.approx((0.25**2 + 0.03**2 + 0.01**2) ** 0.5)
    by_viscosity = 'diffusion = "6.5e-10 m^2/s", at = { viscosity = "0.89 mPa s", temperature = "25 degC" }'
    assert estimate(by_viscosity, MIXED).value == pytest.approx(estimate(known, MIXED).value, rel=1e-3)
    assert estimate(by_viscosity, MIXED).uncertainty > 0.25  # nobody says that it is the same liquid
    assert "acetonitrile" not in estimate(by_viscosity, MIXED).origin.split("scaled")[0]
    # a temperature alone: the same liquid, whose doubt at either temperature counts
    cold = estimate('diffusion = "1e-9 m^2/s", at = { temperature = "25 degC" }', WATER.replace("25", "60"))
    assert cold.value == pytest.approx(1e-9 * (333.15 / 0.466) / (298.15 / 0.89), rel=1e-3)
    warm = MIXED.replace("30 degC", "60 degC")
    doubt = estimate('diffusion = "1e-9 m^2/s", at = { temperature = "30 degC" }', warm).uncertainty
    assert doubt == pytest.approx((0.12**2 + 0.03**2) ** 0.5)
    here = estimate('diffusion = "1e-9 m^2/s", at = { mobile_phase = "methanol/water 50:50", temperature = "25 degC" }')
    assert here.value > 1e-9
    said = parse(
        text('diffusion = "1e-9 m^2/s", at = { mobile_phase = "6 M urea in water", temperature = "25 degC" }'), "f"
    )
    assert any("urea" in warning for warning in said.warnings)


def test_a_scaled_value_follows_a_part_s_temperature_and_an_entered_one_does_not():
    head = WATER + 'ambient = "10 degC"\n'
    known = 'diffusion = "1e-9 m^2/s", at = { temperature = "25 degC" }'
    for peak, moves in ((known, True), ('diffusion = "1e-9 m^2/s"', False)):
        found = parse(text(peak, head), "f")
        there = found.peaks[0].diffusion_in(found.parts[0])
        assert (there != found.peaks[0].diffusion) == moves


def test_with_a_mobile_phase_a_peak_that_says_nothing_has_a_typical_coefficient_and_it_is_said():
    for peak in ("", 'name = "a"'):
        found = parse(text(peak), "f")
        assert 3e-10 < found.peaks[0].diffusion < 8e-10
        assert found.peaks[0].estimate.uncertainty >= 0.5
        assert any("300 g/mol" in assumption.text for assumption in found.assumed)


def test_the_file_s_own_diffusion_serves_the_peaks_that_give_none():
    head = WATER + 'diffusion = "2e-9 m^2/s"\n'
    assert estimate('name = "a"', head).value == pytest.approx(2e-9)
    assert estimate('solute = "caffeine"', head).value == pytest.approx(6.5e-10)


def test_a_viscosity_alone_is_enough_for_what_needs_no_more():
    head = 'viscosity = "0.89 mPa s"\ntemperature = "25 degC"\n'
    assert estimate('molar_mass = "150 kDa"', head).value == pytest.approx(5.26e-11, rel=0.01)
    assert estimate('solute = "caffeine"', head).value == pytest.approx(6.5e-10, rel=1e-3)


WRONG = {
    'solute = "cafeine"': "solute",
    'solute = "nobody knows"': "solute",
    "solute = 3": "solute",
    'solute = "caffeine", molar_mass = "194 g/mol"': "molar_mass",
    'solute = "caffeine", diffusion = "1e-9 m^2/s"': "solute",
    'solute = "caffeine", molecule = "small"': "molecule",
    "molar_mass = 194": "molar_mass",
    'molar_mass = "194 kg"': "molar_mass",
    'molar_mass = "194 g/mol", molecule = "big"': "molecule",
    'molar_mass = "194 kDa", molecule = "chain"': "molecule",
    'molecule = "small"': "molecule",
    'at = { temperature = "25 degC" }': "at",
    'diffusion = "1e-9 m^2/s", at = "25 degC"': "at",
    'diffusion = "1e-9 m^2/s", at = { }': "at",
    'diffusion = "1e-9 m^2/s", at = { temp = "25 degC" }': "at.temp",
    'diffusion = "1e-9 m^2/s", at = { temperature = 25 }': "at.temperature",
    'diffusion = "1e-9 m^2/s", at = { mobile_phase = "beer" }': "at.mobile_phase",
    'diffusion = "1e-9 m^2/s", at = { mobile_phase = "water" }': "at",
    'diffusion = "1e-9 m^2/s", at = { mobile_phase = "hexane", temperature = "200 degC" }': "at",
}


@pytest.mark.parametrize(("peak", "key"), WRONG.items(), ids=WRONG)
def test_what_is_wrong_is_found_at_its_place(peak, key, faults_of):
    faults = faults_of(text(peak))
    assert [fault.place.key for fault in faults] == [key]
    assert "peak 1" in faults[0].place.part
    assert faults[0].place.line == 10
    assert faults[0].suggestion


def test_an_unknown_solute_is_told_beside_an_unknown_liquid(faults_of):
    faults = faults_of(text('solute = "cafeine"', 'mobile_phase = "beer"\n'))
    assert [fault.place.key for fault in faults] == ["mobile_phase", "solute"]


def test_near_solutes_are_proposed(faults_of):
    assert '"caffeine"' in faults_of(text('solute = "cafeine"'))[0].suggestion


def test_an_estimate_without_a_liquid_is_refused(faults_of):
    for peak in ('solute = "toluene"', 'molar_mass = "194 g/mol"', 'solute = "caffeine"'):
        (fault,) = faults_of(text(peak, ""))
        assert "mobile_phase" in fault.expected
    (fault,) = faults_of(text('molar_mass = "194 g/mol"', 'viscosity = "1 cP"\n'))
    assert "mobile_phase" in fault.expected


@given(mass=st.floats(50, 490), factor=st.floats(1.01, 1.5))
def test_a_heavier_molecule_is_slower(mass, factor):
    heavier = min(mass * factor, 495)
    first, second = (estimate(f'molar_mass = "{value:.3f} g/mol"', MIXED).value for value in (mass, heavier))
    assert first / second == pytest.approx((heavier / mass) ** 0.6, rel=1e-3)


@given(celsius=st.floats(15, 75), more=st.floats(0.5, 10))
def test_every_estimate_grows_with_temperature(celsius, more):
    for peak in ('molar_mass = "300 g/mol"', 'solute = "IgG"', 'molar_mass = "20 kDa"', 'solute = "caffeine"'):
        cool, warm = (
            estimate(peak, f'mobile_phase = "water"\ntemperature = "{value:.2f} degC"\n')
            for value in (celsius, celsius + more)
        )
        assert warm.value > cool.value
