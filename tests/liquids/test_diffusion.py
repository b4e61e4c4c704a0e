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


def test_an_estimate_says_where_it_comes_from():
    small = {"molar_mass": 0.194, "in_water": True}
    from_volume = d.small_molecule(298.15, WATER, 40.7e-3, molar_volume=196e-6, **small)
    from_mass = d.small_molecule(298.15, WATER, 40.7e-3, molar_volume=None, **small)
    assert from_volume.stated == "estimated by Wilke–Chang from a molar volume of 196 cm³/mol, ±20 %"
    assert from_mass.stated == "estimated by Wilke–Chang from 194 g/mol, ±22 %"
    assert from_mass.value == pytest.approx(d.wilke_chang(298.15, 0.89e-3, 0.194 * 1.11e-3, 40.7e-3))
    assert d.globular(298.15, WATER, 150.0).stated == "estimated by Young–Carroad–Bell from 150 kg/mol, folded, ±25 %"
    assert as_entered(1e-9).stated == "as entered"


def test_a_doubtful_viscosity_adds_its_doubt():
    doubtful = Estimate(0.89e-3, 0.5, "a mixture")
    found = d.globular(298.15, doubtful, 150.0)
    assert found.uncertainty == pytest.approx(together(d.GLOBULAR, 0.5))


def test_scaling_goes_with_t_over_eta_and_back():
    known = Estimate(1e-9, 0.05, "measured")
    there = Estimate(2e-3, 0.1, "x")
    moved = d.scaled(known, 320.0, there, at=298.15, viscosity_there=WATER, same_liquid=False)
    assert moved.value == pytest.approx(1e-9 * 320 / 2e-3 / (298.15 / 0.89e-3))
    assert moved.uncertainty == pytest.approx(together(0.05, d.SMALL_ELSEWHERE, 0.1))
    back = d.scaled(moved, 298.15, WATER, at=320.0, viscosity_there=there, same_liquid=False)
    assert back.value == pytest.approx(known.value)
    same = d.scaled(known, 298.15, WATER, at=298.15, viscosity_there=WATER, same_liquid=True)
    assert (same.value, same.uncertainty) == (pytest.approx(1e-9), 0.05)
