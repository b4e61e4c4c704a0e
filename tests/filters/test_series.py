"""Filters one after the other."""

import numpy as np
import pytest

from xcol.filters.series import InSeries
from xcol.filters.signal import FirstOrder
from xcol.filters.tube import Tube
from xcol.filters.volumes import Plug


def test_moments_add_and_transfer_functions_multiply():
    flow = 1e-8
    parts = (Plug(3e-9, flow), Tube(0.1, 0.3e-3, flow, 1e-9), FirstOrder(0.2))
    chain = InSeries(parts)
    for moment in ("delay", "variance", "third_moment"):
        assert getattr(chain, moment)() == pytest.approx(sum(getattr(part, moment)() for part in parts))
    omega = np.array([0.0, 0.5, 2.0])
    product = parts[0].transfer(omega) * parts[1].transfer(omega) * parts[2].transfer(omega)
    assert np.allclose(chain.transfer(omega), product)
