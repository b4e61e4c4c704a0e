"""A measured block."""

import pytest

from xcol.filters.block import MeasuredBlock


def test_the_variance_is_constant_in_volume():
    for flow in (1e-9, 1e-8, 1e-7):
        assert MeasuredBlock(4e-18, 8e-9, flow).variance() * flow**2 == pytest.approx(4e-18)
