"""Tubes and runs of tubes."""

import numpy as np
import pytest

from xcol.filters.tube import Tube, TubeRun, shares

FLOW = 1e-6 / 60


def run_of(t_stars, units):
    """A run of these t* and a²/D, with D = F = 1; the axial term is taken off by the caller."""
    return TubeRun(tuple(Tube(t / np.pi, 2 * np.sqrt(w), 1.0, 1.0) for t, w in zip(t_stars, units, strict=True)))


def laminar_part(run):
    return run.variance() - sum(tube.axial_variance() for tube in run.tubes)


@pytest.mark.parametrize(
    ("t_stars", "units", "together", "remixed"),
    [
        ([0.02, 0.05], [1.0, 2.0], 0.0039968, 0.0032781),
        ([0.05, 0.1, 0.03], [1.0, 0.5, 3.0], 0.0062468, 0.0044054),
    ],
)
def test_runs_of_the_reference(t_stars, units, together, remixed):
    assert laminar_part(run_of(t_stars, units)) == pytest.approx(together, rel=1e-4)
    apart = sum(laminar_part(run_of([t], [w])) for t, w in zip(t_stars, units, strict=True))
    assert apart == pytest.approx(remixed, rel=1e-4)
    backwards = laminar_part(run_of(t_stars[::-1], units[::-1]))
    assert backwards == pytest.approx(together, rel=1e-4)


def test_remixing_in_the_middle_at_a_tenth_takes_31_per_cent():
    halves = 2 * laminar_part(run_of([0.05], [1.0]))
    assert 1 - halves / laminar_part(run_of([0.1], [1.0])) == pytest.approx(0.31, abs=0.005)


def test_shares_add_up_and_two_equal_halves_have_equal_shares():
    run = TubeRun((Tube(0.2, 254e-6, FLOW, 1e-9), Tube(0.2, 254e-6, FLOW, 1e-9)))
    first, second = run.shares()
    assert first == pytest.approx(second)
    assert first + second == pytest.approx(Tube(0.4, 254e-6, FLOW, 1e-9).variance())


def test_a_tube_cut_into_many_is_the_whole_tube():
    whole = Tube(0.4, 254e-6, FLOW, 1e-9)
    cut = TubeRun(tuple(Tube(length, 254e-6, FLOW, 1e-9) for length in (0.1, 0.05, 0.2, 0.0, 0.05)))
    assert cut.delay() == pytest.approx(whole.delay())
    assert cut.variance() == pytest.approx(whole.variance(), rel=1e-12)
    assert cut.third_moment() == pytest.approx(whole.third_moment(), rel=1e-9)
    omega = np.array([0.1, 1.0, 5.0])
    assert np.allclose(cut.transfer(omega), whole.transfer(omega), atol=1e-8)


def test_the_bore_acts_as_its_fourth_power_at_any_t_star():
    for length in (0.02, 0.4, 20.0):
        narrow, wide = (Tube(length, bore, FLOW, 1e-9) for bore in (100e-6, 200e-6))
        ratio = (wide.variance() - wide.axial_variance()) / (narrow.variance() - narrow.axial_variance())
        assert ratio == pytest.approx(16, rel=1e-9)
        assert narrow.t_star == wide.t_star


def test_a_short_tube_grows_as_its_length_squared_and_a_long_one_as_its_length():
    short = [Tube(length, 254e-6, FLOW, 1e-10).variance() for length in (0.05, 0.1)]
    long = [Tube(length, 100e-6, FLOW, 2e-9).variance() for length in (50.0, 100.0)]
    assert 3 < short[1] / short[0] < 4
    assert long[1] / long[0] == pytest.approx(2, rel=0.02)


def test_the_long_tube_formula_is_the_limit_of_the_exact_one():
    tube = Tube(1000.0, 100e-6, FLOW, 1e-9)
    assert tube.variance() == pytest.approx(tube.longtube_variance(), rel=1e-3)
    short = Tube(0.05, 254e-6, FLOW, 1e-9)
    assert short.longtube_variance() > 5 * short.variance()


def test_axial_diffusion_is_in_both_figures():
    slow = Tube(0.3, 4e-3, FLOW / 1000, 5e-9)
    assert slow.axial_variance() > 0
    bare = slow.longtube_variance() - slow.axial_variance()
    assert bare == pytest.approx(np.pi * (2e-3) ** 4 * 0.3 / (24 * 5e-9 * FLOW / 1000))


def test_no_tube_has_more_variance_than_its_volume_squared():
    t = np.logspace(-3, 3, 200)
    tube = Tube(t * FLOW / (np.pi * 1e-9), 254e-6, FLOW, 1e-9)
    assert np.all(tube.variance() - tube.axial_variance() <= tube.delay() ** 2)


def test_a_bent_tube_cut_into_many_is_the_whole_tube():
    whole = Tube(0.4, 254e-6, FLOW, 1e-9, 2e4)
    cut = TubeRun(tuple(Tube(length, 254e-6, FLOW, 1e-9, 2e4) for length in (0.1, 0.05, 0.2, 0.0, 0.05)))
    assert cut.variance() == pytest.approx(whole.variance(), rel=1e-12)
    assert cut.third_moment() == pytest.approx(whole.third_moment(), rel=1e-9)
    assert np.allclose(cut.transfer(np.array([0.1, 1.0])), whole.transfer(np.array([0.1, 1.0])), atol=1e-9)
    assert whole.variance() < 0.4 * Tube(0.4, 254e-6, FLOW, 1e-9).variance()


def test_where_bends_differ_the_stronger_one_holds_for_what_is_shared():
    weak, strong = (Tube(0.2, 254e-6, FLOW, 1e-9, strength) for strength in (1e3, 1e5))
    both = TubeRun((weak, strong))
    own = float(weak.variance() + strong.variance())
    alike = TubeRun((strong, strong))
    shared = float(both.variance()) - own
    assert shared == pytest.approx(float(alike.variance()) - 2 * float(strong.variance()), rel=1e-9)
    assert float(TubeRun((strong, weak)).variance()) == pytest.approx(float(both.variance()), rel=1e-12)
    # between a run of the stronger bend and one of the weaker
    assert alike.variance() < both.variance() < TubeRun((weak, weak)).variance()


def test_what_is_joined_in_a_share_of_the_draws_lies_between():
    tubes = [Tube(0.2, 254e-6, FLOW, 1e-9), Tube(0.1, 127e-6, FLOW, 1e-9), Tube(0.1, 254e-6, FLOW, 1e-9)]
    joined = np.array([0.0, 1.0, 1.0, 0.0])
    own, half = shares(tubes, (joined, np.array([0.0, 0.0, 1.0, 1.0])))
    total = sum(own) + sum(half)
    runs = [
        [tubes[:1], tubes[1:2], tubes[2:]], [tubes[:2], tubes[2:]], [tubes], [tubes[:1], tubes[1:]],
    ]  # fmt: skip
    for n, groups in enumerate(runs):
        assert total[n] == pytest.approx(sum(float(TubeRun(tuple(group)).variance()) for group in groups), rel=1e-12)


def test_bends_as_arrays_are_bends_one_by_one():
    strengths = np.array([0.0, 500.0, 2e4, 3e5])
    run = TubeRun((Tube(0.2, 254e-6, FLOW, 1e-9, strengths), Tube(0.3, 127e-6, FLOW, 1e-9, strengths[::-1])))
    alone = [
        TubeRun((Tube(0.2, 254e-6, FLOW, 1e-9, float(s)), Tube(0.3, 127e-6, FLOW, 1e-9, float(r)))).variance()
        for s, r in zip(strengths, strengths[::-1], strict=True)
    ]
    assert run.variance() == pytest.approx(np.array(alone), rel=1e-12)
