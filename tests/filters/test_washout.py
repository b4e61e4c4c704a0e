"""A loop that is washed out, a cell that is read over its bore."""

import math
from itertools import pairwise

import numpy as np
import pytest

from xcol.filters.tube import Tube
from xcol.filters.washout import WashedOut

FLOW, DIFFUSION = 1e-6 / 60, 1e-9


def loop(t_star, bore=0.5e-3, diffusion=DIFFUSION, flow=FLOW, strength=0.0):
    return WashedOut(Tube(t_star * flow / (math.pi * diffusion), bore, flow, diffusion, strength))


def in_plugs_of_volume(washed):
    """Variance over t̄²."""
    return float(washed.variance() / washed.tube.delay() ** 2)


@pytest.mark.parametrize(
    ("t_star", "relative"),
    [(0.02, 0.456), (0.05, 0.303), (0.1, 0.2235), (0.2, 0.1677), (0.5, 0.1219), (1.0, 0.1034), (5.0, 0.0875)],
)
def test_full_loops_of_the_reference(t_star, relative):
    # the table has three to four digits; axial diffusion is negligible in this bore
    assert in_plugs_of_volume(loop(t_star)) == pytest.approx(relative, rel=1e-3, abs=5e-4 if relative > 0.4 else 5e-5)


def test_a_loop_of_20_uL_in_half_a_millimetre_is_five_and_a_half_plugs():
    length = 20e-9 / (math.pi / 4 * 0.5e-3**2)
    washed = WashedOut(Tube(length, 0.5e-3, FLOW, DIFFUSION))
    assert 12 * in_plugs_of_volume(washed) == pytest.approx(5.5, abs=0.1)


def test_cells_of_the_reference():
    # a straight 10 mm bore at 1 mL/min, D = 1e-9 m²/s; and at t* = 2.5e-4
    cell = WashedOut(Tube(10e-3, 1.1e-3, FLOW, DIFFUSION))
    assert in_plugs_of_volume(cell) == pytest.approx(1.284, rel=1e-3)
    assert in_plugs_of_volume(loop(2.5e-4, bore=1e-3)) == pytest.approx(2.95, rel=1e-3)


def test_a_long_loop_is_a_plug():
    washed = loop(1e5, bore=0.3e-3)
    delay = washed.tube.delay()
    assert float(washed.variance()) == pytest.approx(delay**2 / 12, rel=1e-4)
    assert float(washed.delay()) == pytest.approx(delay / 2, rel=1e-4)
    assert abs(float(washed.third_moment())) < 1e-4 * float(washed.variance()) ** 1.5


def test_it_falls_from_many_plugs_to_one_with_t_star():
    relative = [in_plugs_of_volume(loop(t)) for t in np.logspace(-4, 3, 60)]
    assert all(one > other for one, other in pairwise(relative))
    assert relative[-1] > 1 / 12


def test_moments_by_quadrature_of_1_minus_f():
    """F from the tube's own H(ω) by Fourier inversion of E, then moments of 1 − F: not the formulas of the module."""
    tube = Tube(0.4, 0.25e-3, FLOW, DIFFUSION)
    sigma, mean = float(tube.variance()) ** 0.5, float(tube.delay())
    span = mean + 25 * sigma
    count = 4096
    omega = 2 * np.pi * np.fft.rfftfreq(count, span / count)
    density = np.fft.irfft(tube.transfer(omega), count) * count / span
    t = np.arange(count) * span / count
    left = 1 - np.concatenate([[0.0], np.cumsum((density[1:] + density[:-1]) / 2)]) * span / count
    weights = left / left.sum()
    first = weights @ t
    moments = [weights @ (t - first) ** n for n in (2, 3)]
    washed = WashedOut(tube)
    assert float(washed.delay()) == pytest.approx(first, rel=2e-3)
    assert float(washed.variance()) == pytest.approx(moments[0], rel=2e-3)
    assert float(washed.third_moment()) == pytest.approx(moments[1], rel=2e-2)


def test_a_bent_loop_spreads_less_and_a_faint_bend_hardly():
    straight, bent, faint = (loop(0.1, strength=s) for s in (0.0, 3e4, 1e-3))
    assert float(bent.variance()) < 0.9 * float(straight.variance())
    assert float(bent.third_moment()) < float(straight.third_moment())
    for moment in ("delay", "variance", "third_moment"):
        assert float(getattr(faint, moment)()) == pytest.approx(float(getattr(straight, moment)()), rel=1e-6)


def test_below_the_table_it_goes_on_rising():
    # finite volumes, converged to four digits
    for t_star, relative in ((1e-5, 10.10), (3e-6, 15.7), (1e-6, 23.2), (1e-7, 52.0)):
        assert in_plugs_of_volume(loop(t_star)) == pytest.approx(relative, rel=0.03)


def test_where_diffusion_along_the_bore_is_fast_it_stays_positive():
    cell = WashedOut(Tube(75e-6, math.sqrt(4 * 4e-12 / (math.pi * 75e-6)), 80e-12 / 60, 2e-9))
    assert 1 / 12 <= in_plugs_of_volume(cell) < 0.15
    assert np.all(np.abs(cell.transfer(np.array([0.0, 0.1, 1.0]))) <= 1)
