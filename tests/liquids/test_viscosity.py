"""Viscosity of pure liquids and mixtures."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from xcol.liquids.viscosity import excess_with_water, mixed_viscosity, organic_viscosity, water_viscosity

ACETONITRILE = (-4.68095, 1.32897, -0.07511)
EXCESS, HEAT = (1.5086, -0.3526, -0.1499, -0.6946), 1.2444


def test_floats_and_arrays_agree():
    temperatures = np.array([283.15, 298.15, 333.15])
    for function in (water_viscosity, lambda t: organic_viscosity(t, ACETONITRILE)):
        assert function(temperatures) == pytest.approx([float(function(float(t))) for t in temperatures])
    shares = np.array([[0.1], [0.5]])
    excess = excess_with_water(shares, temperatures, EXCESS, HEAT)
    assert excess.shape == (2, 3)
    assert excess[1, 2] == pytest.approx(excess_with_water(0.5, 333.15, EXCESS, HEAT))


def test_known_points():
    assert water_viscosity(293.15) * 1e3 == pytest.approx(1.0016, abs=1e-4)
    assert organic_viscosity(298.15, ACETONITRILE) * 1e3 == pytest.approx(0.3435, abs=1e-4)
    assert excess_with_water(0.5, 298.15, EXCESS, HEAT) == pytest.approx(1.5086 / 4)


@given(share=st.floats(0, 1), first=st.floats(1e-4, 1e-2), second=st.floats(1e-4, 1e-2))
def test_a_mixture_without_excess_lies_between_its_liquids(share, first, second):
    mixed = mixed_viscosity([share, 1 - share], [first, second])
    assert min(first, second) * (1 - 1e-9) <= mixed <= max(first, second) * (1 + 1e-9)


@given(celsius=st.floats(1, 94))
def test_liquids_thin_when_heated(celsius):
    cool, warm = celsius + 273.15, celsius + 274.15
    assert water_viscosity(warm) < water_viscosity(cool)
    assert organic_viscosity(warm, ACETONITRILE) < organic_viscosity(cool, ACETONITRILE)


def test_the_excess_ends_at_the_pure_liquids():
    assert excess_with_water(np.array([0.0, 1.0]), 310.0, EXCESS, HEAT) == pytest.approx([0, 0])
