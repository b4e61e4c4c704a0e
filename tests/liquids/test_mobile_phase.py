"""Mixtures of liquids: viscosity with its doubt, density, psi times M."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from xcol.catalog_kinds import SOLVENTS
from xcol.catalogs import Catalogs
from xcol.flowpath.composition import read_composition
from xcol.liquids.mobile_phase import FAR, MIXED_ORGANICS, MIXED_WITH_WATER

KNOWN = Catalogs()
NAMES = [solvent.name for solvent in KNOWN.rows(SOLVENTS)]


def phase(text):
    return read_composition(text, KNOWN).phase


def test_its_name_holds_the_parts():
    assert phase("ACN/H2O 3:2").name == "acetonitrile/water 60:40"
    assert phase("MeOH").name == "methanol"


@pytest.mark.parametrize(
    ("text", "celsius", "value", "uncertainty"),
    [
        ("water", 25, 0.8900, 0.01),
        ("acetonitrile/water 17:83", 25, 0.985, 0.03),
        ("methanol/water 45:55", 25, 1.56, 0.03),
        ("acetonitrile/water 50:50", 60, 0.45, 0.12),
        ("methanol/water 50:50", 60, 0.67, 0.12),
        ("acetonitrile/water 50:50", 80, None, 0.12),
        ("acetonitrile/water 50:50", 52.5, None, 0.075),
        ("methanol/water 50:50", 10, None, 0.06),
        ("methanol/water 50:50", 5, None, 0.075 + 5 * 0.0025),  # and outside methanol's own fit
        ("ethanol/water 50:50", 60, None, 0.06 + 0.5 * 0.19),
        ("water", 150, None, 0.01 + 40 * 0.0025),
        ("acetonitrile", 65, None, 0.03 + 40 * 0.001),
        ("acetonitrile", 90, None, 0.03 + 65 * 0.001 + 10 * 0.0025),
        ("hexane/2-propanol 90:10", 25, 0.298**0.9 * 2.049**0.1, MIXED_ORGANICS),
        # the mean of a/4 of the three known pairs above logarithmic mixing
        ("water/THF 50:50", 25, (0.89 * 0.456) ** 0.5 * 2.71828 ** ((1.5086 + 3.1986 + 3.6149) / 12), MIXED_WITH_WATER),
        ("water/acetonitrile/THF 60:30:10", 25, None, MIXED_WITH_WATER * 8 * 0.6 * 0.1),
        ("water/acetone 99:1", 25, None, 0.05),
        ("water/THF 15:85", 25, None, MIXED_WITH_WATER),
        # by hand: ln η = Σ φ ln η + 0.75² (E of ACN/water 1:2 + E of MeOH/water 1:2)
        (
            "water/acetonitrile/methanol 50:25:25",
            25,
            0.6203 * 2.71828 ** (0.5625 * (0.36338 + 0.69660)),
            MIXED_ORGANICS,
        ),
    ],
)
def test_viscosity_with_its_doubt(text, celsius, value, uncertainty):
    found = phase(text).viscosity(celsius + 273.15)
    assert found.uncertainty == pytest.approx(uncertainty, abs=1e-6)
    if value:
        assert found.value * 1e3 == pytest.approx(value, rel=0.012)


def test_a_third_liquid_that_goes_to_nothing_leaves_the_pair():
    pair = phase("water/acetonitrile 60:40").viscosity_at(298.15)
    assert phase("water/acetonitrile/methanol 60:40:0.01").viscosity_at(298.15) == pytest.approx(pair, rel=1e-3)
    # and one liquid split in two parts of the same is one
    assert phase("water/ACN/MeCN 60:20:20").viscosity_at(298.15) == pytest.approx(pair)


def test_arrays_of_temperatures():
    mixed = phase("methanol/water 30:70")
    temperatures = np.array([288.15, 298.15, 308.15])
    assert mixed.viscosity_at(temperatures) == pytest.approx([mixed.viscosity(float(t)).value for t in temperatures])


def test_psi_times_mass_is_the_mole_fraction_mean():
    assert phase("water").association_mass() * 1e3 == pytest.approx(2.26 * 18.015)
    acetonitrile, water = 0.6 * 776.8 / 41.05, 0.4 * 997.1 / 18.015
    mean = (acetonitrile * 1.37 * 41.05 + water * 2.26 * 18.015) / (acetonitrile + water)
    assert phase("acetonitrile/water 60:40").association_mass() * 1e3 == pytest.approx(mean)


def test_density_is_the_mean_by_volume():
    assert phase("acetonitrile/water 60:40").density(298.15) == pytest.approx(0.6 * 776.8 + 0.4 * 997.05, abs=0.1)


def test_by_how_much_a_temperature_is_outside():
    mixed = phase("hexane/DMSO 50:50")
    assert mixed.outside(313.15)[0] == 0
    distance, solvent = mixed.outside(283.15)
    assert (distance, solvent.name) == (pytest.approx(8.5), "dimethyl sulfoxide")
    assert mixed.outside(353.15 + FAR + 1)[0] > FAR


def test_the_rule_is_said_where_it_is_no_measured_pair():
    for text in ("water", "acetonitrile/water 60:40"):
        assert phase(text).rule() == ""
    assert "tetrahydrofuran" in phase("water/THF 1:1").rule()
    assert "volume fraction" in phase("hexane/ethanol 1:1").rule()
    assert "excess" in phase("water/ACN/MeOH 1:1:1").rule()


@given(first=st.sampled_from(NAMES), second=st.sampled_from(NAMES), share=st.integers(1, 99), celsius=st.floats(20, 75))
def test_any_two_liquids_have_a_viscosity_that_falls_when_heated(first, second, share, celsius):
    mixed = phase(f"{first}/{second} {share}:{100 - share}")
    cool, warm = mixed.viscosity_at(celsius + 273.15), mixed.viscosity_at(celsius + 274.15)
    assert 1e-4 < warm < cool < 5e-3
    assert 500 < mixed.density(celsius + 273.15) < 1500
