"""Pressure drop and Reynolds number."""

import numpy as np
import pytest

from xcol.flowpath.hydraulics import PressureRange, bed_drop, exactly, reynolds_number, tube_drop


def test_doubling_the_bore_divides_the_drop_by_sixteen():
    narrow, wide = (tube_drop(1e-8, 1.0, bore, 1e-3) for bore in (1e-4, 2e-4))
    assert narrow / wide == pytest.approx(16)


def test_a_bed_of_total_porosity_would_drop_a_twelfth():
    interstitial, total = (bed_drop(1e-8, 0.1, 2e-3, 1e-3, 3e-6, e) for e in (0.40, 0.65))
    assert interstitial / total == pytest.approx(12.6, rel=5e-3)
    low, high = (bed_drop(1e-8, 0.1, 2e-3, 1e-3, 3e-6, e) / interstitial for e in (0.42, 0.36))
    assert (low, high) == pytest.approx((0.81, 1.56), rel=5e-3)


def test_arrays():
    flows = np.array([1e-9, 1e-8])
    assert tube_drop(flows, 1.0, 1e-4, 1e-3).shape == (2,)
    assert bed_drop(flows, 1.0, 1e-3, 1e-3, 5e-6, 0.4)[1] == pytest.approx(
        10 * bed_drop(1e-9, 1.0, 1e-3, 1e-3, 5e-6, 0.4)
    )
    assert reynolds_number(flows, 1e-4, 1e-3, 1000.0)[0] == pytest.approx(4e-6 / (np.pi * 1e-7))


def test_ranges_add():
    assert PressureRange(2, 1, 3) + exactly(5.0) == PressureRange(7, 6, 8)
