"""Diffusion correlations, and what chooses between them."""

import numpy as np
import pytest

from xcol.liquids import diffusion as d
from xcol.liquids.estimate import Estimate, as_entered, together

WATER = Estimate(0.89e-3, 0.01, "water")


def test_floats_and_arrays_agree():
    temperatures, volumes = np.array([298.15, 333.15]), np.array([[50e-6], [196e-6]])
    found = d.wilke_chang(temperatures, 0.89e-3, volumes, 40.7e-3)
    assert found.shape == (2, 2)
    assert found[1, 0] == pytest.approx(d.wilke_chang(298.15, 0.89e-3, 196e-6, 40.7e-3))
    masses = np.array([14.3, 150.0])
    proteins = d.young_carroad_bell(298.15, 0.89e-3, masses)
    assert proteins[1] == pytest.approx(d.young_carroad_bell(298.15, 0.89e-3, 150.0))


def test_the_shape_of_each_correlation():
    assert d.wilke_chang(298.15, 0.89e-3, 64e-6, 40.7e-3) / d.wilke_chang(
        298.15, 0.89e-3, 2e-6, 40.7e-3
    ) == pytest.approx(32**-0.6)
    assert d.young_carroad_bell(298.15, 1e-3, 80.0) * 2 == pytest.approx(d.young_carroad_bell(298.15, 1e-3, 10.0))
    assert d.hayduk_laudie(2e-3, 1e-4) / d.hayduk_laudie(1e-3, 1e-4) == pytest.approx(2**-1.14)


def test_an_estimate_carries_its_origin_and_doubt():
    small = {"molar_mass": 0.194, "method": d.SMALL_IN_WATER}
    from_volume = d.small_molecule(298.15, WATER, 40.7e-3, molar_volume=196e-6, **small)
    from_mass = d.small_molecule(298.15, WATER, 40.7e-3, molar_volume=None, **small)
    assert from_volume.uncertainty == pytest.approx(0.20)
    assert from_mass.uncertainty == pytest.approx(together(0.20, 0.08))
    assert from_mass.value == pytest.approx(d.wilke_chang(298.15, 0.89e-3, 0.194 * 1.11e-3, 40.7e-3))
    for found, words in ((from_volume, "196 cm³/mol"), (from_mass, "194 g/mol"), (from_mass, "±22 %")):
        assert words in found.stated
    assert "150 kg/mol" in d.globular(298.15, WATER, 150.0).stated
    assert as_entered(1e-9).doubt == ""
    assert as_entered(1e-9).stated == "as entered"


def test_a_doubtful_viscosity_adds_its_doubt():
    doubtful = Estimate(0.89e-3, 0.5, "a mixture")
    found = d.globular(298.15, doubtful, 150.0)
    assert found.uncertainty == pytest.approx(together(d.GLOBULAR, 0.5))
    slightly = Estimate(0.89e-3, 0.12, "a mixture")
    assert d.globular(298.15, slightly, 150.0).uncertainty == pytest.approx(together(d.GLOBULAR, 0.12))
    assert d.globular(298.15, WATER, 150.0).uncertainty == pytest.approx(d.GLOBULAR)


def test_scaling_goes_with_t_over_eta_and_back():
    known = Estimate(1e-9, 0.05, "known")
    there = Estimate(2e-3, 0.1, "x")
    moved = d.scaled(known, 320.0, there, at=298.15, viscosity_there=WATER, rule=d.SMALL_ELSEWHERE)
    assert moved.value == pytest.approx(1e-9 * 320 / 2e-3 / (298.15 / 0.89e-3))
    assert moved.uncertainty == pytest.approx(together(0.05, d.SMALL_ELSEWHERE, 0.1, 0.01))
    back = d.scaled(moved, 298.15, WATER, at=320.0, viscosity_there=there, rule=d.SMALL_ELSEWHERE)
    assert back.value == pytest.approx(known.value)
    assert d.scaled(known, 298.15, WATER, at=298.15, viscosity_there=WATER, rule=0.0) == known
