"""Filters of the signal."""

import math

import numpy as np
import pytest
from scipy import stats

from xcol.filters.signal import BOXCAR_RISE, GAUSSIAN_RISE, FirstOrder, first_order_rise


@pytest.mark.parametrize("stages", [1, 2, 3, 4, 7, 20])
def test_the_rise_of_stages_against_the_gamma_distribution(stages):
    low, high = stats.gamma.ppf([0.1, 0.9], stages)
    assert first_order_rise(stages) == pytest.approx((high - low) / math.sqrt(stages), rel=1e-10)


def test_the_rise_of_gaussian_and_boxcar():
    assert pytest.approx(2 * stats.norm.ppf(0.9), rel=1e-12) == GAUSSIAN_RISE
    assert pytest.approx(0.8 * math.sqrt(12), rel=1e-12) == BOXCAR_RISE


def test_many_stages_tend_to_a_gaussian_rise():
    assert first_order_rise(200) == pytest.approx(GAUSSIAN_RISE, rel=2e-3)


def test_stages_are_so_many_filters_in_a_row():
    omega = np.linspace(0, 10, 11)
    one, three = FirstOrder(0.2), FirstOrder(0.2, 3.0)
    assert np.allclose(one.transfer(omega) ** 3, three.transfer(omega))
    assert three.variance() == pytest.approx(3 * one.variance())
