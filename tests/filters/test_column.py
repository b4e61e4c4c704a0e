"""The column's own band."""

import numpy as np
import pytest

from xcol.filters.column import Column, void_volume


def test_plates_are_what_they_are_defined_as():
    column = Column(60.0, np.array([0.0, 1.0, 5.0]), 10000.0)
    assert column.delay() ** 2 / column.variance() == pytest.approx(10000.0)


def test_the_void_volume_is_a_share_of_the_empty_column():
    assert void_volume(2e-3, 0.1, 1.0) == pytest.approx(np.pi * 1e-6 * 0.1)
    assert void_volume(2e-3, 0.1, 0.6) == pytest.approx(0.6 * np.pi * 1e-6 * 0.1)
