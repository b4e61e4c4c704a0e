"""Every filter against its own transfer function, and with arrays as with floats."""

import numpy as np
import pytest

from xcol.filters.block import MeasuredBlock
from xcol.filters.column import Column
from xcol.filters.signal import Boxcar, FirstOrder, GaussianFilter
from xcol.filters.tube import Tube, TubeRun
from xcol.filters.volumes import Plug, TanksInSeries
from xcol.filters.washout import WashedOut

FLOW = 1e-6 / 60
FILTERS = {
    "plug": Plug(20e-9, FLOW),
    "plug passed through": Plug(20e-9, FLOW, passed_through=True),
    "one tank": TanksInSeries(3e-9, FLOW),
    "tanks, not whole": TanksInSeries(50e-9, FLOW, 2.7),
    "first order": FirstOrder(0.5),
    "three stages": FirstOrder(0.2, 3.0),
    "gaussian": GaussianFilter(0.3),
    "boxcar": Boxcar(0.2),
    "block": MeasuredBlock(4e-18, 8e-9, FLOW),
    "column": Column(97.0, 2.0, 11000.0),
    "tube": Tube(0.4, 254e-6, FLOW, 1e-9),
    "short tube": Tube(0.05, 254e-6, FLOW, 5e-10),
    "long tube": Tube(10.0, 127e-6, FLOW, 2e-9),
    "tube with axial diffusion": Tube(0.3, 2e-3, FLOW / 10, 5e-9),
    "bent tube": Tube(0.4, 254e-6, FLOW, 1e-9, 5e4),
    "long bent tube": Tube(10.0, 127e-6, FLOW, 2e-9, 300.0),
    "bent run": TubeRun((Tube(0.2, 254e-6, FLOW, 1e-9, 1e4), Tube(0.3, 127e-6, FLOW, 1e-9, 2e4))),
    "full loop": WashedOut(Tube(0.102, 500e-6, FLOW, 1e-9)),
    "long full loop": WashedOut(Tube(10.0, 127e-6, FLOW, 2e-9)),
    "bent full loop": WashedOut(Tube(0.4, 250e-6, FLOW, 1e-9, 1e4)),
    "cell read over its bore": WashedOut(Tube(0.01, 1e-3, FLOW, 1e-9)),
    "slow wide loop": WashedOut(Tube(0.3, 2e-3, FLOW / 10, 5e-9)),
    "run": TubeRun((Tube(0.2, 254e-6, FLOW, 1e-9), Tube(0.3, 127e-6, FLOW, 1e-9), Tube(0.1, 500e-6, FLOW, 1e-9))),
}


@pytest.fixture(params=FILTERS.values(), ids=FILTERS.keys())
def made(request):
    return request.param


def derivatives(made):
    """−Im, −Re and Im of the first three derivatives of ln H at 0 by central differences."""

    def at(step):
        omega = step * np.array([-2.0, -1.0, 0.0, 1.0, 2.0])
        h = made.transfer(omega)
        assert h[2] == pytest.approx(1.0, abs=1e-12)
        log = np.log(np.abs(h)) + 1j * np.unwrap(np.angle(h))
        log -= log[2]
        first = (log[3] - log[1]) / (2 * step)
        second = (log[3] - 2 * log[2] + log[1]) / step**2
        third = (log[4] - 2 * log[3] + 2 * log[1] - log[0]) / (2 * step**3)
        return np.array([-first.imag, -second.real, third.imag])

    # Richardson's extrapolation removes the error of the second order in the step
    step = 0.05 / np.sqrt(made.variance())
    if made.delay() > 0:
        step = min(step, 0.5 / made.delay())
    return (4 * at(step) - at(2 * step)) / 3


def test_moments_are_the_derivatives_of_ln_h(made):
    delay, variance, third = derivatives(made)
    sigma = float(made.variance()) ** 0.5
    assert delay == pytest.approx(float(made.delay()), abs=2e-4 * sigma)
    assert variance == pytest.approx(float(made.variance()), rel=2e-4)
    assert third == pytest.approx(float(made.third_moment()), rel=3e-3, abs=3e-3 * sigma**3)


def test_h_is_that_of_a_real_non_negative_signal(made):
    omega = np.linspace(0.1, 5, 7) / float(made.variance()) ** 0.5
    h = made.transfer(omega)
    assert np.allclose(made.transfer(-omega), np.conj(h), atol=1e-9)
    assert np.all(np.abs(h) <= 1 + 1e-9)


def test_arrays_give_what_floats_give():
    flows = np.array([0.2, 1.0, 3.0]) * FLOW
    omega = np.array([0.0, 0.3, 1.1])
    makers = [
        lambda flow: Plug(20e-9, flow),
        lambda flow: TanksInSeries(3e-9, flow, 1.5),
        lambda flow: MeasuredBlock(4e-18, 8e-9, flow),
        lambda flow: Column(1e-6 / flow, 2.0, 11000.0),
        lambda flow: Tube(0.4, 254e-6, flow, 1e-9),
        lambda flow: TubeRun((Tube(0.2, 254e-6, flow, 1e-9), Tube(0.3, 127e-6, flow, 2e-9))),
        lambda flow: Tube(0.4, 254e-6, flow, 1e-9, flow * 1e12),
        lambda flow: TubeRun((Tube(0.2, 254e-6, flow, 1e-9, 1e4), Tube(0.3, 127e-6, flow, 2e-9, flow * 1e12))),
        lambda flow: WashedOut(Tube(0.1, 500e-6, flow, 1e-9)),
        lambda flow: WashedOut(Tube(0.1, 500e-6, flow, 1e-9, flow * 1e12)),
        lambda flow: FirstOrder(flow * 1e7),
        lambda flow: FirstOrder(flow * 1e7, 2.0),
        lambda flow: GaussianFilter(flow * 1e7),
        lambda flow: Boxcar(flow * 1e7),
    ]
    for make in makers:
        together = make(flows)
        for moment in ("delay", "variance", "third_moment"):
            values = np.broadcast_to(getattr(together, moment)(), flows.shape)
            alone = [getattr(make(float(flow)), moment)() for flow in flows]
            assert values == pytest.approx(np.array(alone), rel=1e-9)
        spectra = np.broadcast_to(together.transfer(omega), (3, 3))
        for row, flow in zip(spectra, flows, strict=True):
            assert np.allclose(row, make(float(flow)).transfer(omega), rtol=1e-7, atol=1e-9)


def test_arrays_of_two_axes_and_a_single_frequency():
    tanks = TanksInSeries(np.full((2, 3), 5e-9), FLOW, np.array([1.0, 2.0, 3.0]))
    assert tanks.variance().shape == (2, 3)
    assert tanks.transfer(0.7).shape == (2, 3)
    assert tanks.transfer(np.zeros((4, 5))).shape == (2, 3, 4, 5)


def test_nothing_is_added_by_what_has_no_size():
    for made in (
        Plug(0.0, FLOW),
        TanksInSeries(0.0, FLOW),
        FirstOrder(0.0),
        GaussianFilter(0.0),
        Boxcar(0.0),
        MeasuredBlock(0.0, 0.0, FLOW),
        Tube(0.0, 254e-6, FLOW, 1e-9),
        Tube(0.0, 254e-6, FLOW, 1e-9, 1e4),
        WashedOut(Tube(0.0, 254e-6, FLOW, 1e-9)),
        WashedOut(Tube(0.0, 254e-6, FLOW, 1e-9, 1e4)),
    ):
        assert made.delay() == made.variance() == made.third_moment() == 0
        assert np.allclose(made.transfer(np.array([0.0, 1.0, 10.0])), 1.0)
