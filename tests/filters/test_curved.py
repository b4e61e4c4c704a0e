"""Bent tubes: the table against its script, against the reference values, smooth, monotone, and straight at the end."""

from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from xcol.filters import curved_table
from xcol.filters.curved import HIGHEST_DEAN, bend_strength, bent_variance, dean_number, long_tube_ratio
from xcol.filters.laminar import dimensionless_variance

T_STARS = np.array([0.003, 0.01, 0.03, 0.1, 0.3, 1.0, 3.0])
# De²Sc: g, and Φ at these t*; finite volumes with cosine modes and a Galerkin expansion, which agree. From 1e5 on they
# are good to 0.4 %, at 3e5 to 1 %, at 1e6 to 3 %
REFERENCE = {
    300: (0.84168, [0.71861, 0.53621, 0.37879, 0.22233, 0.10579, 0.03451, 0.01163], 1e-3),
    1000: (0.48361, [0.71858, 0.53588, 0.37659, 0.20845, 0.07481, 0.02075, 0.00678], 1e-3),
    3000: (0.31323, [0.71825, 0.53300, 0.35825, 0.13445, 0.04296, 0.01301, 0.00435], 2e-3),
    1e4: (0.24842, [0.71454, 0.50268, 0.23403, 0.08320, 0.03214, 0.01014, 0.00343], 2e-3),
    3e4: (0.2243, [0.68402, 0.34526, 0.15430, 0.07124, 0.02856, 0.00911, 0.00309], 2e-3),
    1e5: (0.2127, [0.480, 0.221, 0.1344, 0.0662, 0.0269, 0.00862, 0.00292], 4e-3),
    3e5: (0.208, [0.306, 0.199, 0.128, 0.0643, 0.0263, 0.0084, 0.0029], 0.014),
    1e6: (0.205, [0.265, 0.188, 0.125, 0.0632, 0.0259, 0.0083, 0.0028], 0.03),
}


def relative(t_star, strength):
    return bent_variance(t_star, strength) / np.square(t_star)


@pytest.mark.parametrize("strength", REFERENCE)
def test_the_reference_values(strength):
    limit, values, tolerance = REFERENCE[strength]
    assert float(long_tube_ratio(strength)) == pytest.approx(limit, rel=min(tolerance, 5e-3))
    assert relative(T_STARS, strength) == pytest.approx(np.array(values), rel=tolerance)


def test_the_weak_bend_of_the_reference():
    assert float(long_tube_ratio(100.0)) == pytest.approx(0.97738, abs=2e-5)


@pytest.fixture
def script(script_of):
    return script_of("curved_table")


def test_rows_of_the_table_are_what_the_script_makes(script):
    for row in (0, 12, 30, 36):
        ratio, limit = script.row_of(script.STRENGTHS[row])
        assert curved_table.TAKEN[row] == pytest.approx(1 - ratio, abs=2e-6)
        assert curved_table.TAKEN_OF_LONG[row] == pytest.approx(1 - limit, abs=2e-6)


def test_the_number_of_polynomials_and_of_steps_does_not_matter(script):
    at = [24, 36, 48, 60]  # t* of 1e-3, 1e-2, 0.1, 1
    coarse, fine = (script.variances(1e4, degree)[at] for degree in (40, 60))
    assert coarse == pytest.approx(fine, rel=1e-3)
    assert script.variances(1e4, 40, steps=16)[at] == pytest.approx(coarse, rel=1e-5)
    assert script.long_tube_ratio(1e4, 60) == pytest.approx(script.long_tube_ratio(1e4, 90), rel=1e-4)
    straight = script.straight()
    assert straight == pytest.approx(dimensionless_variance(script.T_STARS), rel=1e-5)


def test_between_the_rows_of_the_table_it_is_as_good(script):
    for strength in (1.33e3, 1.155e4):
        ratio, _ = script.row_of(strength, 60)
        ours = bent_variance(script.T_STARS, strength) / dimensionless_variance(script.T_STARS)
        assert ours == pytest.approx(ratio, rel=2e-3)


def test_it_falls_with_t_star_and_with_the_bend():
    t, strengths = np.logspace(-6, 3, 700), np.logspace(0, 6.3, 500)
    phi = relative(t[None, :], strengths[:, None])
    assert np.all(np.diff(phi, axis=1) < 0)
    assert np.all(np.diff(phi, axis=0) <= 1e-6 * phi[1:])
    assert np.all(np.diff(long_tube_ratio(strengths)) <= 0)


def test_the_variance_itself_grows_with_t_star():
    t, strengths = np.logspace(-6, 3, 1500), np.logspace(0, 6.3, 300)
    assert np.all(np.diff(bent_variance(t[None, :], strengths[:, None]), axis=1) > 0)


def test_a_bend_that_fades_joins_the_straight_tube_without_a_step():
    for t in (1e-3, 0.1, 1.0, 30.0):
        straight = float(dimensionless_variance(t))
        assert float(bent_variance(t, 0.0)) == straight
        left = [1 - float(bent_variance(t, strength)) / straight for strength in (1e-3, 1.0, 3.0, 9.99, 10.01)]
        assert all(0 <= one <= other for one, other in pairwise(left))
        assert left[0] < 1e-9
        assert left[3] == pytest.approx(left[4], rel=0.02, abs=1e-6)


def test_a_long_bent_tube_grows_by_its_dispersion():
    for strength in (300.0, 1e4, 2e6):
        grown = bent_variance(200.0, strength) - bent_variance(100.0, strength)
        assert float(grown) == pytest.approx(100 / 24 * float(long_tube_ratio(strength)), rel=1e-9)
    inside, outside = (float(bent_variance(t, 1e4)) for t in (9.999, 10.001))
    assert outside - inside == pytest.approx(0.002 / 24 * float(long_tube_ratio(1e4)), rel=0.02)


def test_beyond_the_table_the_last_value_is_kept():
    assert float(bent_variance(0.1, 1e8)) == float(bent_variance(0.1, 1e6))


def test_floats_arrays_and_large_arrays_agree():
    t, strengths = np.logspace(-4, 1, 150), np.logspace(0, 6, 120)
    large = bent_variance(t[None, :], strengths[:, None])  # 18,000 points: more than one block
    assert large.shape == (120, 150)
    for i, j in ((0, 0), (60, 75), (119, 149), (100, 149)):
        assert float(bent_variance(t[j], strengths[i])) == pytest.approx(large[i, j], rel=1e-14)


@given(st.floats(1, 100), st.floats(1e-5, 1e-3), st.floats(0.1, 100))
def test_dean_number_against_a_reference_library(reynolds, bore, curvature):
    fluids = pytest.importorskip("fluids")
    theirs = fluids.Dean(Re=reynolds, Di=bore, D=2 / curvature)
    assert float(dean_number(reynolds, bore, curvature)) == pytest.approx(theirs, rel=1e-12)


def test_above_the_highest_dean_number_its_strength_is_kept():
    assert bend_strength(HIGHEST_DEAN * 3, 1000.0) == bend_strength(HIGHEST_DEAN, 1000.0) == 4e5
    assert bend_strength(0.0, 1000.0) == 0
