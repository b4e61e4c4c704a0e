"""The column's own band."""

import numpy as np
import pytest

from xcol.filters.column import Column, PlateHeightCurve, reduced_velocity, void_volume


def test_plates_are_what_they_are_defined_as():
    column = Column(60.0, np.array([0.0, 1.0, 5.0]), 10000.0)
    assert column.delay() ** 2 / column.variance() == pytest.approx(10000.0)


def test_the_void_volume_is_a_share_of_the_empty_column():
    assert void_volume(2e-3, 0.1, 1.0) == pytest.approx(np.pi * 1e-6 * 0.1)
    assert void_volume(2e-3, 0.1, 0.6) == pytest.approx(0.6 * np.pi * 1e-6 * 0.1)


CURVE = PlateHeightCurve(0.9, 1.75, 0.065)


def test_the_reduced_plate_height_has_its_minimum_where_the_terms_balance():
    velocities = np.linspace(0.2, 40, 4000)
    heights = CURVE.height(velocities)
    at = velocities[np.argmin(heights)]
    assert 2.0 <= heights.min() <= 2.4  # well packed, fully porous
    assert 0.9 / 3 * at ** (-2 / 3) - 1.75 / at**2 + 0.065 == pytest.approx(0, abs=1e-2)


def test_plates_are_length_over_h_times_the_particle():
    velocities = np.array([1.0, 5.0])
    plates = CURVE.plates(velocities, 0.1, 1.7e-6)
    assert plates == pytest.approx(0.1 / (CURVE.height(velocities) * 1.7e-6))
    assert plates[1] == pytest.approx(CURVE.plates(5.0, 0.1, 1.7e-6))


def test_coefficients_of_the_interstitial_velocity_belong_to_a_larger_one():
    interstitial = PlateHeightCurve(0.9, 1.75, 0.065, per_hold_up=0.65 / 0.40)
    assert interstitial.height(4.0) == pytest.approx(CURVE.height(4.0 * 0.65 / 0.40))


def test_the_reduced_velocity_is_that_of_length_over_hold_up_time():
    flow, void, diffusion = 0.4e-6 / 60, void_volume(2.1e-3, 0.1, 0.65), np.array([1e-9, 5e-10])
    velocity = 0.1 / (void / flow)
    assert reduced_velocity(flow, 0.1, void, 1.7e-6, diffusion) == pytest.approx(velocity * 1.7e-6 / diffusion)
