"""Volumes: plug, tanks, dead gap."""

import pytest

from xcol.filters.volumes import Plug, TanksInSeries, dead_gap_volume


def test_a_plug_delays_by_half_of_itself_unless_it_is_passed_through():
    assert Plug(20e-9, 1e-8).delay() == pytest.approx(1.0)
    assert Plug(20e-9, 1e-8, passed_through=True).delay() == pytest.approx(2.0)
    assert Plug(20e-9, 1e-8, passed_through=True).variance() == Plug(20e-9, 1e-8).variance()


def test_many_tanks_tend_to_a_delay_without_spread():
    spreads = [TanksInSeries(20e-9, 1e-8, n).variance() for n in (1.0, 2.0, 10.0, 1e4)]
    assert spreads == pytest.approx([4.0, 2.0, 0.4, 4e-4])


def test_a_gap_grows_with_the_square_of_the_port():
    assert dead_gap_volume(2e-3, 0.5e-3) == pytest.approx(4 * dead_gap_volume(1e-3, 0.5e-3))
    assert dead_gap_volume(2e-3, 0.0) == 0
