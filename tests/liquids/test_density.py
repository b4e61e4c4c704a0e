"""Density of water and of organic liquids."""

import numpy as np
import pytest

from xcol.liquids.density import organic_density, water_density


def test_water_is_densest_at_four_degrees():
    celsius = np.arange(0, 12, 0.1)
    assert celsius[np.argmax(water_density(celsius + 273.15))] == pytest.approx(4.0, abs=0.11)
    assert water_density(277.13) == pytest.approx(999.97, abs=0.01)


def test_an_organic_liquid_has_its_density_at_25_degrees_and_less_above():
    assert organic_density(298.15, 776.8, 1.41e-3) == 776.8
    assert organic_density(np.array([298.15, 308.15]), 776.8, 1.41e-3) == pytest.approx([776.8, 776.8 * (1 - 0.0141)])
